import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type Graph, graphFromEdges, graphFromPairs } from "../../lib/graph/graph.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { solveBipartite } from "../../lib/solve/bipartite.ts";
import type { Solved } from "../../lib/solve/engine.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import { mirroredGrid, uniformWeights } from "../support/mirrored-grid.ts";
import { ParkMiller, type RecordedFlows } from "../support/park-miller.ts";
import { checkedBound } from "../support/proofs.ts";
import { randomBipartiteGraph, randomGraph } from "../support/random-graphs.ts";

function shuffledLabels(random: Random, n: number): Int32Array {
  return random.shuffle(Int32Array.from({ length: n }, (_, v) => v));
}

/** Solves and asserts what every answer of the engine must satisfy. */
function solved(graph: Graph, weights: Float64Array, labels?: Int32Array, meter?: Meter): Solved {
  labels ??= Int32Array.from({ length: graph.n }, (_, v) => v);
  const result = solveBipartite({ graph, weights, labels }, meter ?? new Meter());
  if (result.status === "declined") throw new Error(result.reason);
  expect(isStable(graph, result.chosen)).toBe(true);
  expect(weightOf(weights, result.chosen)).toBe(result.weight);
  expect(result.weight).toBeLessThanOrEqual(result.upperBound);
  if (result.status === "optimal") {
    expect(result.upperBound).toBe(result.weight);
    expect(checkedBound(graph, weights, labels, result.proof!)).toBe(result.weight);
  }
  return result;
}

describe("bipartite engine", () => {
  it("finds and proves the optimum, 3000 random bipartite graphs", () => {
    const random = new Random(41);
    for (let t = 0; t < 3000; t++) {
      const a = 1 + random.below(8), b = random.below(9);
      const graph = randomBipartiteGraph(random, a, b, random.unit());
      const weights = uniformWeights(graph.n, random, 1 + random.below(20));
      const result = solved(graph, weights, shuffledLabels(random, graph.n));
      expect(result.status).toBe("optimal");
      expect(result.weight).toBe(bruteForce(graph, weights).weight);
    }
  });

  it("declines exactly the graphs with an odd cycle, and tells its length", () => {
    const random = new Random(42);
    let declined = 0;
    for (let t = 0; t < 1000; t++) {
      const n = 3 + random.below(7);
      const graph = randomGraph(random, n, 0.6 * random.unit());
      let bipartite = false;
      for (let sides = 0; sides < 1 << n && !bipartite; sides++) {
        bipartite = graph.tails.every((u, e) => ((sides >> u) ^ (sides >> graph.heads[e])) & 1);
      }
      const labels = shuffledLabels(random, n);
      const weights = new Float64Array(n).fill(1);
      const result = solveBipartite({ graph, weights, labels }, new Meter());
      expect(result.status).toBe(bipartite ? "optimal" : "declined");
      if (result.status !== "declined") continue;
      declined++;
      const length = Number(/odd cycle of (\d+) items/.exec(result.reason)![1]);
      expect(length % 2).toBe(1);
      expect(length).toBeGreaterThanOrEqual(3);
      expect(length).toBeLessThanOrEqual(n);
    }
    expect(declined).toBeGreaterThan(300);
  });

  it("meets König's theorem: unit weights leave out a maximum matching", () => {
    // Source: networkx, hopcroft_karp_matching, through test/fixtures/record-flows.py.
    const file = new URL("../fixtures/flows.json", import.meta.url);
    const recorded: RecordedFlows = JSON.parse(readFileSync(file, "utf8"));
    recorded.matchings.forEach((matching, k) => {
      const random = new ParkMiller(k + 1);
      const a = 1 + random.below(40), b = 1 + random.below(40);
      const pairs = new Map<number, [number, number]>();
      for (let e = random.below(3 * (a + b)); e > 0; e--) {
        const u = random.below(a), v = a + random.below(b);
        pairs.set(u * (a + b) + v, [u, v]);
      }
      const graph = graphFromPairs(a + b, pairs.values());
      expect(solved(graph, new Float64Array(a + b).fill(1)).weight).toBe(a + b - matching);
    });
  });

  it("returns a choice and an honest bound wherever the meter ends", () => {
    const random = new Random(43);
    // A grid with its mirrored edges left out: bipartite, and with room for a long search.
    const whole = mirroredGrid(80, 80);
    const inside = Array.from({ length: whole.m }, (_, e) => e).filter((e) =>
      Math.abs(whole.tails[e] - whole.heads[e]) <= 80
    );
    const graph = graphFromEdges(
      whole.n,
      Int32Array.from(inside, (e) => whole.tails[e]),
      Int32Array.from(inside, (e) => whole.heads[e]),
    );
    const weights = uniformWeights(graph.n, random);
    const total = weights.reduce((sum, w) => sum + w, 0);
    const full = new Meter().within(1e9);
    const best = solved(graph, weights, undefined, full);
    expect(best.status).toBe("optimal");
    const work = 1e9 - full.remainingWork;
    let last = total;
    for (let part = 0; part < 20; part++) {
      const meter = new Meter().within(Math.floor((work * part) / 20));
      const result = solved(graph, weights, undefined, meter);
      expect(result.status).toBe("feasible");
      expect(result.proof).toBe(undefined);
      expect(result.weight).toBeLessThanOrEqual(best.weight);
      expect(result.weight).toBeGreaterThan(total / 2);
      expect(result.upperBound).toBeGreaterThanOrEqual(best.weight);
      expect(result.upperBound).toBeLessThanOrEqual(last);
      last = result.upperBound;
    }
    expect(last).toBeLessThan(total);
  });

  it("solves 30,000 items with 90,000 conflicts", () => {
    const random = new Random(44);
    const n = 30_000, m = 90_000;
    const tails = Int32Array.from({ length: m }, () => random.below(n / 2));
    const heads = Int32Array.from({ length: m }, () => n / 2 + random.below(n / 2));
    const graph = graphFromEdges(n, tails, heads);
    expect(solved(graph, uniformWeights(n, random)).status).toBe("optimal");
  });
});
