import { describe, expect, it } from "vitest";
import { type Graph, graphFromEdges, graphFromPairs } from "../../lib/graph/graph.ts";
import { oddKernel } from "../../lib/parity/odd-kernel.ts";
import { leastTransversal } from "../../lib/parity/transversal.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteOct } from "../oracle/oct.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { nearBipartite } from "../support/near-bipartite.ts";
import { faultOfOddCycles, isTransversal } from "../support/odd-cycles.ts";
import { randomConnectedGraph, randomGraph, randomRegularGraph } from "../support/random-graphs.ts";

/** Asserts what must hold of every answer, exact or not. */
function expectSound(graph: Graph, found: ReturnType<typeof leastTransversal>): void {
  expect(found.vertices.length).toBe(found.upper);
  expect(found.lower).toBeLessThanOrEqual(found.upper);
  expect(found.cycles.length).toBeLessThanOrEqual(found.lower);
  expect(isTransversal(graph, found.vertices)).toBe(true);
  expect(faultOfOddCycles(graph, found.cycles)).toBe("");
}

function expectExact(graph: Graph, oct: number): void {
  const found = leastTransversal(graph, new Meter());
  expectSound(graph, found);
  expect([found.lower, found.upper]).toEqual([oct, oct]);
  expect(found.stopped).toBe(undefined);
}

/** A torus grid: two cycles of lengths a and b multiplied. */
function torus(a: number, b: number): Graph {
  const pairs: [number, number][] = [];
  for (let i = 0; i < a; i++) {
    for (let j = 0; j < b; j++) {
      pairs.push([i * b + j, i * b + (j + 1) % b], [i * b + j, ((i + 1) % a) * b + j]);
    }
  }
  return graphFromPairs(a * b, pairs);
}

describe("leastTransversal", () => {
  it("finds the brute-force number on random graphs of up to 11 vertices", () => {
    const random = new Random(20);
    const counts = new Map<number, number>();
    for (let i = 0; i < 2500; i++) {
      const graph = randomGraph(random, 3 + random.below(9), 0.15 + 0.65 * random.unit());
      const oct = bruteOct(graph);
      counts.set(oct, (counts.get(oct) ?? 0) + 1);
      expectExact(graph, oct);
    }
    for (const oct of [0, 1, 2, 3, 4]) expect(counts.get(oct)).toBeGreaterThan(50);
  });

  it("finds the brute-force number on sparse connected graphs of 14 vertices", () => {
    const random = new Random(21);
    for (let i = 0; i < 150; i++) {
      const graph = randomConnectedGraph(random, 14, 4 + random.below(14));
      expectExact(graph, bruteOct(graph));
    }
  });

  it("needs as many vertices as a mirrored grid is wide", () => {
    // Mirrored grids have no two disjoint odd cycles, so greedy packings prove nothing here.
    for (const [rows, columns] of [[5, 5], [20, 6], [41, 7], [40, 8]]) {
      expectExact(mirroredGrid(rows, columns), columns);
    }
  });

  it("needs one vertex of each odd row of a torus grid with one odd side", () => {
    expectExact(torus(6, 5), 6);
    expectExact(torus(10, 11), 10);
  });

  it("finds planted transversals in large graphs", () => {
    const random = new Random(22);
    const graph = nearBipartite(random, 10_000, 30_000, 12, 20);
    expectExact(graph, 12);
    const sparse = nearBipartite(random, 10_000, 15_000, 9, 3);
    const found = leastTransversal(sparse, new Meter());
    expectSound(sparse, found);
    expect(found.lower).toBe(found.upper);
    expect(found.upper).toBeLessThanOrEqual(9);
  });

  it("adds up over components and takes only the vertices kept", () => {
    const pairs: [number, number][] = [];
    for (let c = 0; c < 5; c++) {
      for (let i = 0; i < 4; i++) {
        for (let j = i + 1; j < 4; j++) pairs.push([4 * c + i, 4 * c + j]);
      }
    }
    const graph = graphFromPairs(20, pairs);
    expectExact(graph, 10);
    const keep = new Uint8Array(20).fill(1);
    keep[0] = keep[4] = 0;
    expect(leastTransversal(graph, new Meter(), { keep }).upper).toBe(8);
  });

  it("gives an interval beyond its limit, with the reason", () => {
    const graph = randomRegularGraph(new Random(23), 300, 4);
    const found = leastTransversal(graph, new Meter(), { limit: 5 });
    expectSound(graph, found);
    expect(found.lower).toBeGreaterThan(5);
    expect(found.stopped).toBe("limit");
  });

  it("gives honest bounds when its work is spent, wherever that happens", () => {
    const graph = mirroredGrid(31, 7);
    for (let units = 1; units < 3_000_000; units *= 3) {
      const found = leastTransversal(graph, new Meter().within(units));
      expectSound(graph, found);
      expect(found.lower).toBeLessThanOrEqual(7);
      if (found.lower < found.upper) expect(found.stopped).toBe("work");
    }
  });

  it("needs nothing for bipartite, empty and edgeless graphs", () => {
    expectExact(graphFromPairs(0, []), 0);
    expectExact(graphFromPairs(3, []), 0);
    expectExact(mirroredGrid(2, 4), bruteOct(mirroredGrid(2, 4)));
  });
});

describe("oddKernel", () => {
  it("is empty for a cycle of a million vertices, with the cycle forced if it is odd", () => {
    for (const n of [1_000_000, 1_000_001]) {
      const tails = Int32Array.from({ length: n }, (_, v) => v);
      const graph = graphFromEdges(n, tails, tails.map((v) => (v + 1) % n));
      const kernel = oddKernel(graph, new Meter());
      expect(kernel.graph.n).toBe(0);
      expect(kernel.forced.map((f) => f.cycle.length)).toEqual(n % 2 === 1 ? [n] : []);
    }
  });

  it("keeps degrees of at least three and the numbers of odd cycles", () => {
    const random = new Random(24);
    for (let i = 0; i < 300; i++) {
      const graph = randomConnectedGraph(random, 12, 2 + random.below(8));
      const { graph: small, even, forced, vertices, inside } = oddKernel(graph, new Meter());
      for (let v = 0; v < small.n; v++) {
        expect(small.offsets[v + 1] - small.offsets[v]).toBeGreaterThan(2);
      }
      // Written out again as a graph whose edges are all odd, it needs as many vertices less those forced.
      const pairs: [number, number][] = [];
      let n = small.n;
      for (let e = 0; e < small.m; e++) {
        expect(inside(e).length % 2).toBe(even[e]);
        if (even[e] === 0) pairs.push([small.tails[e], small.heads[e]]);
        else pairs.push([small.tails[e], n], [n++, small.heads[e]]);
      }
      expect(vertices.length).toBe(small.n);
      if (n <= 16) {
        expect(bruteOct(graphFromPairs(n, pairs)) + forced.length).toBe(bruteOct(graph));
      }
    }
  });
});
