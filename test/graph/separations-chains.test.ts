import { describe, expect, it } from "vitest";
import { degree, graphFromPairs } from "../../lib/graph/graph.ts";
import { chains } from "../../lib/graph/separations-chains.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { randomConnectedGraph } from "../support/random-graphs.ts";

describe("chains", () => {
  it("are walked once, between ends that are not of degree two, 1000 cases", () => {
    const random = new Random(1);
    for (let run = 0; run < 1000; run++) {
      const n = 3 + random.below(20);
      const graph = randomConnectedGraph(random, n, random.below(8));
      const joined = new Set(
        Array.from(graph.tails, (u, e) => [`${u} ${graph.heads[e]}`, `${graph.heads[e]} ${u}`])
          .flat(),
      );
      const seen = new Set<number>();
      for (const { ends: [a, b], inside } of chains(graph, new Meter())) {
        expect(a).toBeLessThan(b);
        for (const end of [a, b]) expect(degree(graph, end)).not.toBe(2);
        const walk = [a, ...inside, b];
        for (let i = 1; i < walk.length; i++) {
          expect(joined.has(`${walk[i - 1]} ${walk[i]}`)).toBe(true);
        }
        for (const v of inside) {
          expect(degree(graph, v)).toBe(2);
          expect(seen.has(v)).toBe(false);
          seen.add(v);
        }
      }
      // All others of degree two lie on a cycle with at most one vertex of another degree.
      for (let v = 0; v < n; v++) {
        if (degree(graph, v) !== 2 || seen.has(v)) continue;
        const branching = new Set<number>();
        const run = [v], met = new Set(run);
        for (const u of run) {
          for (let a = graph.offsets[u]; a < graph.offsets[u + 1]; a++) {
            const w = graph.targets[a];
            if (degree(graph, w) !== 2) branching.add(w);
            else if (!met.has(w)) {
              met.add(w);
              run.push(w);
            }
          }
        }
        expect(branching.size).toBeLessThanOrEqual(1);
      }
    }
  });

  it("follow long paths without recursion", () => {
    const n = 300_000;
    const pairs = Array.from({ length: n - 1 }, (_, v) => [v, v + 1] as const);
    const [chain] = chains(graphFromPairs(n, pairs), new Meter());
    expect([chain.ends, chain.inside.length]).toEqual([[0, n - 1], n - 2]);
  });
});
