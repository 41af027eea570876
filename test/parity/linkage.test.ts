import { describe, expect, it } from "vitest";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { linked } from "../../lib/parity/linkage.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { randomConnectedGraph } from "../support/random-graphs.ts";

type Ends = [number, number, number, number];

/** Tries every path from s1 to t1. */
function bruteLinked(graph: Graph, [s1, t1, s2, t2]: Ends): boolean {
  const { offsets, targets } = graph;
  const used = new Uint8Array(graph.n);
  used[s1] = used[s2] = used[t2] = 1;
  const joined = (): boolean => {
    const seen = Uint8Array.from(used);
    seen[t2] = 0;
    const stack = [s2];
    while (stack.length > 0) {
      const v = stack.pop() as number;
      if (v === t2) return true;
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        if (seen[targets[a]] !== 0) continue;
        seen[targets[a]] = 1;
        stack.push(targets[a]);
      }
    }
    return false;
  };
  const walk = (v: number): boolean => {
    if (v === t1) return joined();
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (used[u] !== 0) continue;
      used[u] = 1;
      if (walk(u)) return true;
      used[u] = 0;
    }
    return false;
  };
  return walk(s1);
}

/** A small grid, some edges missing and some diagonals added, with knots tied to three vertices. */
function web(random: Random): { graph: Graph; corners: Ends } {
  const a = 3 + random.below(2), b = 3 + random.below(2);
  const at = (i: number, j: number): number => i * b + j;
  const pairs: [number, number][] = [];
  for (let i = 0; i < a; i++) {
    for (let j = 0; j < b; j++) {
      if (j + 1 < b && random.below(12) > 0) pairs.push([at(i, j), at(i, j + 1)]);
      if (i + 1 < a && random.below(12) > 0) pairs.push([at(i, j), at(i + 1, j)]);
      if (i + 1 < a && j + 1 < b && random.below(3) === 0) {
        pairs.push(
          random.below(2) === 0 ? [at(i, j + 1), at(i + 1, j)] : [at(i, j), at(i + 1, j + 1)],
        );
      }
    }
  }
  let n = a * b;
  for (let k = random.below(3); k > 0; k--) {
    const knot = 1 + random.below(2), start = n;
    for (let i = 0; i < knot; i++, n++) {
      for (let t = 0; t < 3; t++) pairs.push([n, (start * 7 + t * 5 + k) % (a * b)]);
    }
  }
  return {
    graph: graphFromPairs(n, pairs),
    corners: [at(0, 0), at(a - 1, b - 1), at(0, b - 1), at(a - 1, 0)],
  };
}

describe("linked", () => {
  it("agrees with trying every path, on grids and on random graphs", () => {
    const random = new Random(70);
    let yes = 0, no = 0;
    for (let i = 0; i < 8000; i++) {
      let graph: Graph, ends: Ends;
      if (i % 3 === 0) {
        graph = randomConnectedGraph(random, 5 + random.below(7), random.below(14));
        ends = random.shuffle(Array.from({ length: graph.n }, (_, v) => v)).slice(0, 4) as Ends;
      } else ({ graph, corners: ends } = web(random));
      const expected = bruteLinked(graph, ends);
      if (expected) yes++;
      else no++;
      if (linked(graph, ends, new Meter()) !== expected) {
        throw new Error(`case ${i}: expected ${expected}`);
      }
    }
    expect(Math.min(yes, no)).toBeGreaterThan(1500);
  });

  it("decides the corners of a large grid, plain and with one crossing", () => {
    const side = 150;
    const pairs: [number, number][] = [];
    for (let i = 0; i < side; i++) {
      for (let j = 0; j < side; j++) {
        if (j + 1 < side) pairs.push([i * side + j, i * side + j + 1]);
        if (i + 1 < side) pairs.push([i * side + j, (i + 1) * side + j]);
      }
    }
    const n = side * side;
    const ends: Ends = [0, n - 1, side - 1, n - side];
    expect(linked(graphFromPairs(n, pairs), ends, new Meter())).toBe(false);
    const v = 70 * side + 70;
    const crossed = [...pairs, [v, v + side + 1], [v + 1, v + side]] as [number, number][];
    expect(linked(graphFromPairs(n, crossed), ends, new Meter())).toBe(true);
  });

  it("refuses ends that are not four", () => {
    expect(() => linked(graphFromPairs(3, [[0, 1]]), [0, 1, 2, 0], new Meter())).toThrow(
      RangeError,
    );
  });
});
