import { describe, expect, it } from "vitest";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { twoColouring } from "../../lib/graph/two-colouring.ts";
import { type CheapOddCycle, shortestOddCycle } from "../../lib/parity/shortest-odd-cycle.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { randomGraphWithEdges } from "../support/random-graphs.ts";

/** Cost of a least odd closed walk, by Floyd and Warshall on the double cover; Infinity if none. */
function leastOddWalk(graph: Graph, costs: ArrayLike<number>, even: Uint8Array): number {
  const size = 2 * graph.n;
  const d = Array.from(
    { length: size },
    (_, x) => Array.from({ length: size }, (_, y) => x === y ? 0 : Infinity),
  );
  for (let e = 0; e < graph.m; e++) {
    for (const s of [0, 1]) {
      const x = 2 * graph.tails[e] + s, y = 2 * graph.heads[e] + (even[e] === 0 ? 1 - s : s);
      d[x][y] = d[y][x] = Math.min(d[x][y], costs[e]);
    }
  }
  for (let k = 0; k < size; k++) {
    for (let x = 0; x < size; x++) {
      for (let y = 0; y < size; y++) d[x][y] = Math.min(d[x][y], d[x][k] + d[k][y]);
    }
  }
  return Math.min(Infinity, ...Array.from({ length: graph.n }, (_, v) => d[2 * v][2 * v + 1]));
}

function expectOddCycle(
  graph: Graph,
  cycle: CheapOddCycle,
  costs: ArrayLike<number>,
  even: Uint8Array,
): void {
  const { vertices, edges } = cycle;
  expect(new Set(vertices).size).toBe(edges.length);
  expect(vertices.length).toBe(edges.length);
  let odd = 0, sum = 0;
  edges.forEach((e, i) => {
    const ends = [vertices[i], vertices[(i + 1) % vertices.length]].sort((a, b) => a - b);
    expect([graph.tails[e], graph.heads[e]].sort((a, b) => a - b)).toEqual(ends);
    odd += even[e] === 0 ? 1 : 0;
    sum += costs[e];
  });
  expect(odd % 2).toBe(1);
  expect(sum).toBe(cycle.cost);
}

describe("shortestOddCycle", () => {
  it("agrees with Floyd and Warshall on the double cover", () => {
    const random = new Random(21);
    let none = 0;
    for (let t = 0; t < 1500; t++) {
      const n = 2 + random.below(11);
      const graph = randomGraphWithEdges(random, n, random.below(2 * n));
      const weighted = random.below(3) > 0, signed = random.below(2) === 0;
      const costs = Float64Array.from(graph.tails, () => weighted ? random.below(7) : 1);
      const even = Uint8Array.from(graph.tails, () => signed ? random.below(2) : 0);
      const found = shortestOddCycle(graph, new Meter(), {
        costs: weighted ? costs : undefined,
        even: signed ? even : undefined,
      });
      expect(found?.cost ?? Infinity).toBe(leastOddWalk(graph, costs, even));
      if (found === undefined) none++;
      else expectOddCycle(graph, found, costs, even);
    }
    expect(none).toBeGreaterThan(100);
    expect(none).toBeLessThan(1400);
  });

  it("needs only the vertices of one odd cycle as roots where any two odd cycles meet", () => {
    const random = new Random(22);
    for (const [rows, columns] of [[3, 3], [4, 4], [5, 7], [6, 4], [9, 9]]) {
      const graph = mirroredGrid(rows, columns);
      const roots = twoColouring(graph).oddCycle!;
      for (let t = 0; t < 30; t++) {
        const costs = Float64Array.from(graph.tails, () => random.below(20));
        const all = shortestOddCycle(graph, new Meter(), { costs })!;
        expect(shortestOddCycle(graph, new Meter(), { costs, roots })!.cost).toBe(all.cost);
      }
      expect(shortestOddCycle(graph, new Meter(), { roots })!.cost)
        .toBe(leastOddWalk(graph, new Float64Array(graph.m).fill(1), new Uint8Array(graph.m)));
    }
  });

  it("takes two parallel edges of different parity for an odd cycle", () => {
    const graph = graphFromPairs(3, [[0, 1], [1, 0], [1, 2], [2, 0]]);
    const even = Uint8Array.of(0, 1, 0, 0);
    const found = shortestOddCycle(graph, new Meter(), { even })!;
    expect(found.cost).toBe(2);
    expect([...found.edges].sort()).toEqual([0, 1]);
  });

  it("finds the girth of odd circulants: Möbius ladders, and long odd cycles", () => {
    // A Möbius ladder with k rungs has odd cycles of k + 1 edges (k even) or of k.
    for (const k of [4, 5, 8, 11]) {
      const pairs: [number, number][] = [];
      for (let i = 0; i < 2 * k; i++) {
        pairs.push([i, (i + 1) % (2 * k)]);
        if (i < k) pairs.push([i, i + k]);
      }
      const least = shortestOddCycle(graphFromPairs(2 * k, pairs), new Meter());
      expect(least?.cost).toBe(k % 2 === 0 ? k + 1 : undefined);
    }
    const n = 100_001;
    const ring = graphFromPairs(n, Array.from({ length: n }, (_, i) => [i, (i + 1) % n] as const));
    expect(shortestOddCycle(ring, new Meter())!.cost).toBe(n);
  });

  it("refuses costs that mean nothing, and stops when the meter has run out", () => {
    const graph = mirroredGrid(30, 30);
    const costs = new Float64Array(graph.m).fill(1);
    expect(() => shortestOddCycle(graph, new Meter(), { costs: costs.subarray(1) }))
      .toThrow(/costs: expected length/);
    for (const bad of [-1, NaN, Infinity]) {
      costs[7] = bad;
      expect(() => shortestOddCycle(graph, new Meter(), { costs })).toThrow(/costs\[7\]/);
    }
    expect(() => shortestOddCycle(graph, new Meter().within(500))).toThrow(Interrupted);
  });
});
