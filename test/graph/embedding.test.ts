import { describe, expect, it } from "vitest";
import {
  dartEnd,
  dartStart,
  eulerGenus,
  isRotationSystem,
  mirrored,
  signedEulerGenus,
  traceFaces,
  traceSignedFaces,
} from "../../lib/graph/embedding.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Random } from "../../lib/run/random.ts";
import { planarProblem } from "../oracle/planarity.ts";
import { randomConnectedGraph } from "../support/random-graphs.ts";

/** The darts around each vertex in random order. */
function randomRotation(graph: Graph, random: Random): Int32Array {
  const next = new Int32Array(2 * graph.m);
  const around: number[][] = Array.from({ length: graph.n }, () => []);
  for (let d = 0; d < 2 * graph.m; d++) around[dartStart(graph, d)].push(d);
  for (const list of around) {
    random.shuffle(list).forEach((d, i) => next[d] = list[(i + 1) % list.length]);
  }
  return next;
}

// Counterclockwise square 0 1 2 3 with the edges 01, 12, 23, 30.
const square = graphFromPairs(4, [[0, 1], [1, 2], [2, 3], [3, 0]]);

describe("rotation systems", () => {
  it("puts the face on the left of a dart: the square has an inside and an outside", () => {
    const next = Int32Array.of(7, 2, 1, 4, 3, 6, 5, 0);
    expect(isRotationSystem(square, next)).toBe(true);
    const faces = traceFaces(next);
    expect(faces.count).toBe(2);
    expect([...faces.of]).toEqual([0, 1, 0, 1, 0, 1, 0, 1]);
  });

  it("turns counterclockwise: in K4 drawn with 3 inside the triangle 0 1 2", () => {
    // Vertex 0 to the left, 1 to the right, 2 on top: around 0 counterclockwise come 1, 3, 2.
    const k4 = graphFromPairs(4, [[0, 1], [0, 3], [0, 2], [1, 2], [1, 3], [2, 3]]);
    const orders = [[1, 3, 2], [2, 3, 0], [0, 3, 1], [0, 1, 2]];
    const next = new Int32Array(12);
    const dart = (u: number, v: number) =>
      [...next.keys()].find((d) => dartStart(k4, d) === u && dartEnd(k4, d) === v)!;
    orders.forEach((list, v) =>
      list.forEach((w, i) => next[dart(v, w)] = dart(v, list[(i + 1) % 3]))
    );
    expect(eulerGenus(k4, next)).toBe(0);
    const { of } = traceFaces(next);
    // Inside triangle 0 1 3, walked 0 → 1 → 3 → 0 with the inside on the left.
    expect(of[dart(0, 1)]).toBe(of[dart(1, 3)]);
    expect(of[dart(0, 1)]).toBe(of[dart(3, 0)]);
    // The outer face is on the left of 0 → 2 → 1 → 0.
    expect(of[dart(0, 2)]).toBe(of[dart(2, 1)]);
    expect(of[dart(0, 2)]).toBe(of[dart(1, 0)]);
  });

  it("tells rotation systems from other arrays", () => {
    const right = Int32Array.of(7, 2, 1, 4, 3, 6, 5, 0);
    for (
      const wrong of [
        [7, 2, 1, 4, 3, 6, 5],
        [7, 2, 1, 4, 3, 6, 5, 8],
        [0, 2, 1, 4, 3, 6, 5, 7],
        [7, 2, 1, 4, 3, 6, 0, 5],
        [7, 7, 1, 4, 3, 6, 5, 0],
        [-1, 2, 1, 4, 3, 6, 5, 0],
      ]
    ) expect(isRotationSystem(square, Int32Array.from(wrong))).toBe(false);
    expect(isRotationSystem(square, right)).toBe(true);
  });

  it("keeps the invariants on random rotation systems", () => {
    const random = new Random(3);
    let planar = 0;
    for (let t = 0; t < 1000; t++) {
      const graph = randomConnectedGraph(random, 2 + random.below(7), random.below(6));
      const next = randomRotation(graph, random), prev = mirrored(next);
      expect(isRotationSystem(graph, next)).toBe(true);
      expect(isRotationSystem(graph, prev)).toBe(true);
      const genus = eulerGenus(graph, next);
      expect(genus % 2).toBe(0);
      expect(genus).toBeGreaterThan(-1);
      expect(eulerGenus(graph, prev)).toBe(genus);
      expect(planarProblem(graph, next) === undefined).toBe(genus === 0);
      if (genus === 0) planar++;
      const faces = traceFaces(next, prev);
      expect(Math.max(...faces.of)).toBe(faces.count - 1);
      expect(faces.of.every((f, d) => faces.of[prev[d ^ 1]] === f)).toBe(true);
      // Nothing twisted is the same surface; so is it after a vertex has changed its sense.
      const twisted = new Uint8Array(graph.m);
      expect(signedEulerGenus(graph, { next, twisted })).toBe(genus);
      const v = random.below(graph.n), turned = next.slice();
      for (let d = 0; d < 2 * graph.m; d++) {
        if (dartStart(graph, d) !== v) continue;
        turned[d] = prev[d];
        twisted[d >> 1] ^= 1;
      }
      expect(signedEulerGenus(graph, { next: turned, twisted })).toBe(genus);
      const { lengths } = traceSignedFaces({ next: turned, twisted });
      expect(lengths.reduce((sum, length) => sum + length, 0)).toBe(2 * graph.m);
    }
    expect(planar).toBeGreaterThan(50);
  });

  it("finds the projective plane: one twisted cycle, and K4 with three faces of length four", () => {
    const triangle = graphFromPairs(3, [[0, 1], [1, 2], [2, 0]]);
    const next = Int32Array.of(5, 2, 1, 4, 3, 0);
    const one = { next, twisted: Uint8Array.of(1, 0, 0) };
    expect(signedEulerGenus(triangle, one)).toBe(1);
    expect([...traceSignedFaces(one).lengths]).toEqual([6]);
    expect(signedEulerGenus(triangle, { next, twisted: Uint8Array.of(1, 1, 0) })).toBe(0);
    const k4 = graphFromPairs(4, [[0, 1], [0, 2], [0, 3], [1, 2], [1, 3], [2, 3]]);
    const twisted = new Uint8Array(6).fill(1);
    const lengths: number[][] = [];
    const random = new Random(1);
    for (let t = 0; t < 200; t++) {
      const signed = { next: randomRotation(k4, random), twisted };
      if (signedEulerGenus(k4, signed) === 1) lengths.push([...traceSignedFaces(signed).lengths]);
    }
    expect(lengths.length).toBeGreaterThan(0);
    for (const list of lengths) expect(list).toEqual([4, 4, 4]);
  });
});
