/**
 * The double cover on the sphere, as a proof describes it: checks the embedding and builds the
 * directed dual. O(m) time.
 *
 * Lift dart d from (v,0) to (u,1), u its end. Counterclockwise around (v,0) the darts follow each
 * other as around v, around (v,1) the other way round; so swapping the sheets reverses orientation,
 * and it maps the face on the left of the lift of d to the one on the left of the lift of d's
 * reverse. Walking with a face on the left means going on, at each vertex, with the dart before the
 * one that leads back. Between (v,0) and the next black vertex on a face this is two steps, together
 * the map f = previous ∘ reverse ∘ next ∘ reverse on the darts of H.
 *
 * No face is its own antipode, for any rotation: `reverse` turns each cycle of f into one walked the
 * other way, so on a cycle that is its own image it is a reflection, which fixes a dart or swaps a dart
 * d with f(d). Both are impossible: no dart is its own reverse, and f(d) = reverse(d) would make
 * next(reverse(d)) its own reverse.
 */
import type { Numbers } from "./certificate.ts";
import type { InnerGraph } from "./projective-graph.ts";
import { Rejected } from "./rejected.ts";

/**
 * The faces of the sphere are 0 … 2·pairs - 1, swapping the sheets takes x to x ^ 1. An edge of the
 * cover and the dual arc across it are called by the dart they lift: from (v,0) to (u,1), for a dart
 * from v to u. Swapping the sheets takes an arc to that of the reverse dart.
 */
export interface SphereDual {
  readonly pairs: number;
  /** Length 2m: the face on the left of each dart lifted to sheet 0, where its arc leads. */
  readonly left: Int32Array;
  /** Length 2m: the face where the arc of each dart comes from. */
  readonly right: Int32Array;
  /** Length pairs + 1, see `out`. */
  readonly offsets: Int32Array;
  /** Length m: the darts whose arcs leave face 2k are out[offsets[k]] … out[offsets[k+1]-1]. */
  readonly out: Int32Array;
  /** Length 2m: the edge of each dart, edges being numbered in order of their first dart. */
  readonly edgeOf: Int32Array;
  /** Length 2m: the dart that follows counterclockwise, and the one before. */
  readonly next: Int32Array;
  readonly previous: Int32Array;
}

/**
 * Checks the embedding.
 *
 * @param inner H, connected and not bipartite
 * @param rotation length 2m, as in `ProjectiveProof`
 * @throws {Rejected} when it is no rotation, or the surface is no sphere
 */
export function sphereDual(inner: InnerGraph, rotation: Numbers): SphereDual {
  const { offsets, targets, reverse } = inner;
  const n = offsets.length - 1, darts = targets.length;
  const { next, previous } = requireRotation(inner, rotation);
  // Faces are traced in breadth-first order, so that neighbours are near in memory. Around each, arcs
  // in and out take turns.
  const left = new Int32Array(darts).fill(-1);
  const into = new Int32Array(darts / 2), out = new Int32Array(darts / 2);
  const ends = new Int32Array(darts / 2 + 1);
  let pairs = 0, tail = 0;
  const trace = (start: number): void => {
    for (let d = start; left[d] < 0; d = previous[out[tail++]]) {
      left[d] = 2 * pairs;
      left[reverse[d]] = 2 * pairs + 1;
      into[tail] = d;
      out[tail] = reverse[next[reverse[d]]];
    }
    ends[++pairs] = tail;
  };
  trace(0);
  for (let head = 0; head < tail; head++) {
    const d = into[head];
    if (left[next[d]] < 0) trace(next[d]);
    if (left[previous[d]] < 0) trace(previous[d]);
  }
  // Euler's formula for the cover: 2n vertices, as many edges as H has darts, connected.
  const characteristic = 2 * n - darts + 2 * pairs;
  if (characteristic !== 2) {
    throw new Rejected(
      `projective: the cover is not drawn on a sphere, vertices - edges + faces is ` +
        `${characteristic}, not 2`,
    );
  }
  const edgeOf = new Int32Array(darts);
  for (let v = 0, e = 0; v < n; v++) {
    for (let d = offsets[v]; d < offsets[v + 1]; d++) {
      if (targets[d] > v) edgeOf[d] = edgeOf[reverse[d]] = e++;
    }
  }
  // Around (v,0) the arcs go counterclockwise: across d from the corner before d to the corner after it.
  const right = new Int32Array(darts);
  for (let d = 0; d < darts; d++) right[d] = left[previous[d]];
  const rows = ends.slice(0, pairs + 1);
  return { pairs, left, right, offsets: rows, out, edgeOf, next, previous };
}

/** The rotation as a permutation of the darts, and its inverse. @throws {Rejected} */
function requireRotation({ offsets, vertices, targets }: InnerGraph, rotation: Numbers) {
  if (rotation.length !== targets.length) {
    throw new Rejected(
      `projective: expected a rotation of ${targets.length} darts, got ${rotation.length}`,
    );
  }
  const next = new Int32Array(targets.length).fill(-1);
  const previous = new Int32Array(targets.length);
  for (let v = 0; v < vertices.length; v++) {
    const begin = offsets[v], degree = offsets[v + 1] - begin;
    for (let i = 0; i < degree; i++) {
      const from = rotation[begin + i], to = rotation[begin + (i + 1 === degree ? 0 : i + 1)];
      if (!(Number.isInteger(from) && from >= 0 && from < degree) || next[begin + from] >= 0) {
        throw new Rejected(
          `projective, rotation at vertex ${vertices[v]}: expected each number ` +
            `from 0 to ${degree - 1} once, got ${from}`,
        );
      }
      next[begin + from] = begin + to;
      previous[begin + to] = begin + from;
    }
  }
  return { next, previous };
}
