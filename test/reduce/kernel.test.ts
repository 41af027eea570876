import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type Graph, graphFromEdges, graphFromPairs } from "../../lib/graph/graph.ts";
import { halfIntegralKernel } from "../../lib/reduce/kernel.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { bestHalfIntegral, validateKernel } from "../oracle/half-integral.ts";
import { hardWeights, mirroredGrid, uniformWeights } from "../support/mirrored-grid.ts";
import { ParkMiller, type RecordedFlows } from "../support/park-miller.ts";
import { randomGraph, randomGraphWithEdges } from "../support/random-graphs.ts";

const kernelOf = (graph: Graph, weights: Float64Array) =>
  halfIntegralKernel(graph, weights, new Meter());

/** Pairs drawn with repetition: parallel edges are common. */
function randomMultigraph(random: Random, n: number, m: number): Graph {
  const pairs: [number, number][] = [];
  while (pairs.length < m) {
    const u = random.below(n), v = random.below(n);
    if (u !== v) pairs.push([u, v]);
  }
  return graphFromPairs(n, pairs);
}

function halves(value: Uint8Array): number {
  return value.reduce((count, x) => count + (x === 1 ? 1 : 0), 0);
}

function path(n: number): Graph {
  const tails = Int32Array.from({ length: n - 1 }, (_, e) => e);
  return graphFromEdges(n, tails, tails.map((v) => v + 1));
}

function cycle(n: number): Graph {
  const tails = Int32Array.from({ length: n }, (_, e) => e);
  return graphFromEdges(n, tails, tails.map((v) => (v + 1) % n));
}

describe("half-integral kernel", () => {
  it("has the best value and the fewest halves, 6000 random graphs and multigraphs", () => {
    const random = new Random(21);
    let kernels = 0;
    for (let t = 0; t < 6000; t++) {
      const n = 2 + random.below(7);
      const graph = t % 3 === 0
        ? randomMultigraph(random, n, random.below(2 * n))
        : randomGraph(random, n, random.unit());
      const weights = uniformWeights(n, random, 1 + random.below(6));
      const kernel = kernelOf(graph, weights);
      validateKernel(graph, weights, kernel);
      const { doubledValue, fewestHalves } = bestHalfIntegral(graph, weights);
      const value = kernel.value.reduce((sum, x, v) => sum + x * weights[v], 0);
      expect(value).toBe(doubledValue);
      expect(halves(kernel.value)).toBe(fewestHalves);
      if (fewestHalves > 0) kernels++;
    }
    expect(kernels).toBeGreaterThan(1000);
  });

  it("persists: some heaviest stable set agrees, 3000 random graphs", () => {
    const random = new Random(22);
    for (let t = 0; t < 3000; t++) {
      const n = 1 + random.below(16);
      const graph = randomGraph(random, n, 4 * random.unit() / n);
      const weights = uniformWeights(n, random, 1 + random.below(9));
      const { value } = kernelOf(graph, weights);
      // Vertices left count nothing; vertices chosen are worth more than all else together.
      const big = 2 * weights.reduce((sum, w) => sum + w, 0);
      const forced = weights.map((w, v) => value[v] === 0 ? 0 : value[v] === 2 ? w + big : w);
      const best = bruteForce(graph, forced);
      const chosen = value.filter((x) => x === 2).length;
      expect(best.weight - chosen * big).toBe(bruteForce(graph, weights).weight);
    }
  });

  it("proves itself on 400 graphs of up to 400 vertices, sparse to dense", () => {
    const random = new Random(23);
    for (let t = 0; t < 400; t++) {
      const n = 20 + random.below(380);
      const graph = randomGraphWithEdges(random, n, Math.floor(n * (0.4 + 4 * random.unit() ** 2)));
      const weights = t % 4 === 0
        ? new Float64Array(n).fill(1)
        : t % 4 === 1
        ? hardWeights(cycle(n), random)
        : uniformWeights(n, random, 1 + random.below(1000));
      validateKernel(graph, weights, kernelOf(graph, weights));
    }
  });

  it("is exact for weights whose sum is just below 2^53", () => {
    const random = new Random(24);
    for (let t = 0; t < 300; t++) {
      const n = 2 + random.below(7);
      const graph = randomGraph(random, n, random.unit());
      // One or two giants and small ones; or all of them giants.
      const top = Math.floor((2 ** 53 - 1) / n);
      const weights = Float64Array.from(
        { length: n },
        () => random.below(3) === 0 ? 1 + random.below(9) : top - random.below(9),
      );
      const kernel = kernelOf(graph, weights);
      validateKernel(graph, weights, kernel);
      // The enumeration adds doubled weights in floating point, so compare what is exact: halves.
      const small = bestHalfIntegral(graph, weights.map((w) => w > 100 ? 2 ** 20 + w - top : w));
      if (weights.every((w) => w > 100) || weights.every((w) => w < 100)) {
        expect(halves(kernel.value)).toBe(small.fewestHalves);
      }
    }
    const edge = graphFromPairs(2, [[0, 1]]);
    const giants = Float64Array.of(2 ** 52, 2 ** 52 - 1);
    expect([...kernelOf(edge, giants).value]).toEqual([2, 0]);
    expect(kernelOf(edge, giants).packed).toBe(2 ** 53 - 2);
  });

  it("agrees with networkx on the value, 1500 recorded graphs", () => {
    // Source: networkx, maximum_flow_value on the double cover, through test/fixtures/record-flows.py.
    const file = new URL("../fixtures/flows.json", import.meta.url);
    const recorded: RecordedFlows = JSON.parse(readFileSync(file, "utf8"));
    recorded.relaxations.forEach((value, k) => {
      const random = new ParkMiller(k + 1);
      const n = 3 + random.below(25);
      const weights = Float64Array.from({ length: n }, () => 1 + random.below(30));
      const pairs = new Map<number, [number, number]>();
      for (let e = random.below(2 * n); e > 0; e--) {
        const u = random.below(n), v = random.below(n);
        if (u !== v) pairs.set(Math.min(u, v) * n + Math.max(u, v), [u, v]);
      }
      expect(kernelOf(graphFromPairs(n, pairs.values()), weights).packed).toBe(value);
    });
  });

  it("keeps mirrored grids whole when their weights are sums of costs", () => {
    for (const [rows, columns] of [[2, 2], [3, 3], [13, 21], [40, 40], [101, 7], [120, 120]]) {
      const graph = mirroredGrid(rows, columns);
      const weights = hardWeights(graph, new Random(rows));
      const kernel = kernelOf(graph, weights);
      validateKernel(graph, weights, kernel);
      expect(2 * kernel.packed).toBe(2 * weights.reduce((sum, w) => sum + w, 0));
    }
  });

  it("handles the empty graph, isolated vertices and several components", () => {
    const nothing = kernelOf(graphFromPairs(0, []), new Float64Array(0));
    expect([nothing.value.length, nothing.packed]).toEqual([0, 0]);
    expect([...kernelOf(graphFromPairs(3, []), Float64Array.of(1, 5, 2)).value]).toEqual([2, 2, 2]);
    // A triangle, an edge, an isolated vertex and a double edge.
    const graph = graphFromPairs(8, [[0, 1], [1, 2], [0, 2], [3, 4], [6, 7], [6, 7]]);
    const kernel = kernelOf(graph, Float64Array.of(1, 1, 1, 4, 3, 9, 2, 5));
    expect([...kernel.value]).toEqual([1, 1, 1, 2, 0, 2, 0, 2]);
    expect([...kernel.doubledCosts]).toEqual([1, 1, 1, 6, 4, 0]);
  });

  it("walks paths, odd cycles and stars of 300,000 vertices without recursion", () => {
    const n = 300_000;
    const random = new Random(25);
    const long = uniformWeights(n, random);
    validateKernel(path(n), long, kernelOf(path(n), long));
    const ring = cycle(n + 1);
    const ones = new Float64Array(n + 1).fill(1);
    expect(halves(kernelOf(ring, ones).value)).toBe(n + 1);
    const star = graphFromEdges(n, new Int32Array(n - 1), path(n).heads);
    const heavy = new Float64Array(n).fill(1);
    heavy[0] = n - 2;
    const { value } = kernelOf(star, heavy);
    expect([value[0], value[1], value[n - 1]]).toEqual([0, 2, 2]);
  });

  it("gives the same answer twice", () => {
    const graph = randomGraphWithEdges(new Random(26), 2000, 3500);
    const weights = uniformWeights(2000, new Random(27));
    const a = kernelOf(graph, weights), b = kernelOf(graph, weights);
    expect(a.value).toEqual(b.value);
    expect(a.doubledCosts).toEqual(b.doubledCosts);
  });

  it("ends with the meter, wherever that is", () => {
    const graph = mirroredGrid(60, 60);
    const weights = hardWeights(graph, new Random(28));
    const meter = new Meter().within(1e9);
    halfIntegralKernel(graph, weights, meter);
    const work = 1e9 - meter.remainingWork;
    expect(work).toBeGreaterThan(graph.m);
    for (let part = 0; part < 20; part++) {
      const short = new Meter().within(Math.floor((work * part) / 20));
      expect(() => halfIntegralKernel(graph, weights, short)).toThrow(Interrupted);
    }
  });
});
