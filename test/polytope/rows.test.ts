import { describe, expect, it } from "vitest";
import type { Graph } from "../../lib/graph/graph.ts";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { edgeCliqueCover, Neighbours, violatedCliques } from "../../lib/polytope/clique-rows.ts";
import { simpleOddCycle, violatedOddCycles } from "../../lib/polytope/odd-cycle-rows.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { randomGraph } from "../support/random-graphs.ts";

function joinedIn(graph: Graph): (u: number, v: number) => boolean {
  const pairs = new Set<number>();
  for (let e = 0; e < graph.m; e++) {
    pairs.add(graph.tails[e] * graph.n + graph.heads[e]);
    pairs.add(graph.heads[e] * graph.n + graph.tails[e]);
  }
  return (u, v) => pairs.has(u * graph.n + v);
}

function isClique(joined: (u: number, v: number) => boolean, set: readonly number[]): boolean {
  return set.every((u, i) => set.slice(i + 1).every((v) => joined(u, v)));
}

function isMaximal(
  graph: Graph,
  joined: (u: number, v: number) => boolean,
  set: readonly number[],
): boolean {
  for (let v = 0; v < graph.n; v++) {
    if (!set.includes(v) && set.every((u) => joined(u, v))) return false;
  }
  return true;
}

/** A random point that satisfies the edge rows. */
function relaxedPoint(random: Random, graph: Graph): Float64Array {
  const x = Float64Array.from({ length: graph.n }, () => random.unit());
  for (let round = 0; round < 3; round++) {
    for (let e = 0; e < graph.m; e++) {
      const u = graph.tails[e], v = graph.heads[e], sum = x[u] + x[v];
      if (sum <= 1) continue;
      x[u] /= sum;
      x[v] /= sum;
    }
  }
  return x;
}

describe("clique rows", () => {
  it("cover every edge by maximal cliques", () => {
    const random = new Random(1);
    for (let round = 0; round < 400; round++) {
      const graph = randomGraph(random, 1 + random.below(25), random.unit());
      const joined = joinedIn(graph);
      const covered = new Set<number>();
      for (const clique of edgeCliqueCover(graph)) {
        expect(clique.length >= 2 && isClique(joined, clique)).toBe(true);
        expect(isMaximal(graph, joined, clique)).toBe(true);
        for (const u of clique) for (const v of clique) covered.add(u * graph.n + v);
      }
      for (let e = 0; e < graph.m; e++) {
        expect(covered.has(graph.tails[e] * graph.n + graph.heads[e])).toBe(true);
      }
    }
  });

  it("cover a triangle with one row", () => {
    expect(edgeCliqueCover(graphFromPairs(3, [[0, 1], [1, 2], [0, 2]])).length).toBe(1);
  });

  it("are violated when they say so, maximal, and at most as many as asked for", () => {
    const random = new Random(2);
    let found = 0;
    for (let round = 0; round < 400; round++) {
      const graph = randomGraph(random, 2 + random.below(25), random.unit());
      const joined = joinedIn(graph);
      const x = relaxedPoint(random, graph);
      const cliques = violatedCliques(graph, x, 5, new Meter());
      expect(cliques.length <= 5).toBe(true);
      for (const clique of cliques) {
        found++;
        expect(isClique(joined, clique) && isMaximal(graph, joined, clique)).toBe(true);
        expect(clique.reduce((sum, v) => sum + x[v], 0) > 1.019).toBe(true);
      }
    }
    expect(found > 300).toBe(true);
  });

  it("grow to maximal cliques", () => {
    const random = new Random(3);
    for (let round = 0; round < 200; round++) {
      const graph = randomGraph(random, 2 + random.below(20), random.unit());
      const joined = joinedIn(graph);
      const v = random.below(graph.n);
      const grown = new Neighbours(graph).maximal([v]);
      expect(grown.includes(v)).toBe(true);
      expect(isClique(joined, grown) && isMaximal(graph, joined, grown)).toBe(true);
    }
  });
});

describe("odd cycle rows", () => {
  /** The least slack of an odd cycle, by trying all closed walks as paths in a matrix product. */
  function leastSlack(graph: Graph, x: Float64Array): number {
    const { n } = graph;
    const dist = Array.from({ length: 2 * n }, () => new Float64Array(2 * n).fill(Infinity));
    for (let e = 0; e < graph.m; e++) {
      const u = graph.tails[e], v = graph.heads[e], slack = Math.max(0, 1 - x[u] - x[v]);
      for (const [a, b] of [[u, n + v], [v, n + u]]) dist[a][b] = dist[b][a] = slack;
    }
    for (let k = 0; k < 2 * n; k++) {
      for (let i = 0; i < 2 * n; i++) {
        for (let j = 0; j < 2 * n; j++) {
          dist[i][j] = Math.min(dist[i][j], dist[i][k] + dist[k][j]);
        }
      }
    }
    let least = Infinity;
    for (let v = 0; v < n; v++) least = Math.min(least, dist[v][n + v]);
    return least;
  }

  it("are violated simple odd cycles, and one is found whenever there is one", () => {
    const random = new Random(4);
    let found = 0;
    for (let round = 0; round < 400; round++) {
      const n = 5 + random.below(9);
      const graph = randomGraph(random, n, 0.1 + random.unit() / 3);
      const joined = joinedIn(graph);
      const x = relaxedPoint(random, graph);
      for (let v = 0; v < n; v++) if (random.below(3) > 0) x[v] = Math.min(x[v], 0.5);
      for (let e = 0; e < graph.m; e++) {
        if (x[graph.tails[e]] + x[graph.heads[e]] > 1) x[graph.heads[e]] = 1 - x[graph.tails[e]];
      }
      const feasible = Array.from(
        { length: graph.m },
        (_, e) => x[graph.tails[e]] + x[graph.heads[e]] <= 1 + 1e-12,
      ).every((ok) => ok);
      if (!feasible) continue;
      const cycles = violatedOddCycles(graph, x, 100, new Meter());
      for (const cycle of cycles) {
        found++;
        expect(cycle.length % 2).toBe(1);
        expect(new Set(cycle).size).toBe(cycle.length);
        expect(cycle.every((v, i) => joined(v, cycle[(i + 1) % cycle.length]))).toBe(true);
        const sum = cycle.reduce((total, v) => total + x[v], 0);
        expect(sum > (cycle.length - 1) / 2 + 0.019).toBe(true);
      }
      // Triangles are left to the clique rows.
      const least = leastSlack(graph, x);
      const triangles = violatedCliques(graph, x, 100, new Meter()).length > 0;
      if (least < 1 - 2 * 0.021 && !triangles) expect(cycles.length > 0).toBe(true);
    }
    expect(found > 30).toBe(true);
  });

  it("are cut out of closed walks", () => {
    expect(simpleOddCycle([0, 1, 2])).toEqual([0, 1, 2]);
    expect(simpleOddCycle([0, 1, 2, 1, 3])).toEqual([0, 1, 3]);
    expect(simpleOddCycle([0, 1, 2, 3, 1]).slice().sort()).toEqual([1, 2, 3]);
  });

  it("find the pentagon at one half", () => {
    const graph = graphFromPairs(5, [[0, 1], [1, 2], [2, 3], [3, 4], [4, 0]]);
    const cycles = violatedOddCycles(graph, new Float64Array(5).fill(0.5), 10, new Meter());
    expect(cycles.length).toBe(1);
    expect(cycles[0].slice().sort()).toEqual([0, 1, 2, 3, 4]);
  });
});
