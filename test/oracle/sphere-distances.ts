/** All distances on the sphere of an even-face embedding, by the slow, obvious way. */
import type { Graph } from "../../lib/graph/graph.ts";

/** The dual of the double cover, one arc for each dart of H. */
export interface Sphere {
  readonly faces: number;
  /** For each dart: tail, head and cost of its arc. */
  readonly arcs: readonly (readonly [number, number, number])[];
}

/**
 * Distances from one face by going over all arcs until nothing changes. O(faces · m) time.
 *
 * @returns length `faces`
 */
export function distancesFrom({ faces, arcs }: Sphere, source: number): number[] {
  const distance = Array<number>(faces).fill(Infinity);
  distance[source] = 0;
  for (let changed = true; changed;) {
    changed = false;
    for (const [tail, head, cost] of arcs) {
      if (distance[tail] + cost >= distance[head]) continue;
      distance[head] = distance[tail] + cost;
      changed = true;
    }
  }
  return distance;
}

/**
 * Draws the double cover, face by face: vertices are "v 0" and "v 1", each edge of it is listed at both
 * ends in the order of the rotation, mirrored on sheet 1.
 *
 * @param next length 2m, an even-face embedding
 * @param costs length m
 * @returns the sphere, its faces numbered in any order, and the face on the left of each dart
 */
export function sphereOf(graph: Graph, next: Int32Array, costs: ArrayLike<number>) {
  const prev = new Int32Array(next.length);
  for (let d = 0; d < next.length; d++) prev[next[d]] = d;
  // A side of the cover's edge is walked from dart d on sheet s, the face being on the left.
  const face = new Map<string, number>();
  let faces = 0;
  for (let d = 0; d < 2 * graph.m; d++) {
    for (let s = 0; s < 2; s++) {
      if (face.has(`${d} ${s}`)) continue;
      for (let [at, sheet] = [d, s]; !face.has(`${at} ${sheet}`);) {
        face.set(`${at} ${sheet}`, faces);
        sheet = 1 - sheet;
        at = (sheet === 0 ? prev : next)[at ^ 1];
      }
      faces++;
    }
  }
  const of = (d: number, s: number) => face.get(`${d} ${s}`)!;
  // From black to white with the head on the left; the tail is on the left the other way.
  const arcs = Array.from(
    { length: 2 * graph.m },
    (_, d): [number, number, number] => [of(d ^ 1, 1), of(d, 0), costs[d >> 1]],
  );
  return { sphere: { faces, arcs } satisfies Sphere, left: arcs.map(([, head]) => head) };
}
