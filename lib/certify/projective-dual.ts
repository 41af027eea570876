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
 * The faces of the sphere are 0 … 2·pairs - 1, swapping the sheets takes x to x ^ 1. Each edge of H
 * gives two dual arcs that are swapped; they are stored for even faces only.
 */
export interface SphereDual {
  readonly pairs: number;
  /** Length 2m: the face on the left of each dart lifted to sheet 0. */
  readonly left: Int32Array;
  /** The arcs out of the even faces. */
  readonly out: DualArcs;
  /** The arcs into the even faces. */
  readonly into: DualArcs;
}

/** The arcs at face 2k are those from offsets[k] to offsets[k+1]-1. */
export interface DualArcs {
  /** Length pairs + 1. */
  readonly offsets: Int32Array;
  /**
   * Length 2m: for arc i of an even face the face at its other end at 2i, its cost at 2i + 1. In 32
   * bits where all costs fit.
   */
  readonly entries: Int32Array | Float64Array;
}

/**
 * Checks the embedding.
 *
 * @param inner H, connected and not bipartite
 * @param rotation length 2m, as in `ProjectiveProof`
 * @param costs length m, edges in order of their first dart
 * @throws {Rejected} when it is no rotation, or the surface is no sphere
 */
export function sphereDual(
  inner: InnerGraph,
  rotation: Numbers,
  costs: Float64Array,
): SphereDual {
  const { offsets, targets, reverse } = inner;
  const n = offsets.length - 1, darts = targets.length;
  const { next, previous } = requireRotation(inner, rotation);
  // Faces are traced in breadth-first order, so that neighbours are near in memory.
  const left = new Int32Array(darts).fill(-1), queue = new Int32Array(darts);
  let pairs = 0, tail = 0;
  const trace = (start: number): void => {
    for (let d = start; left[d] < 0; d = previous[reverse[next[reverse[d]]]]) {
      left[d] = 2 * pairs;
      left[reverse[d]] = 2 * pairs + 1;
      queue[tail++] = d;
    }
    pairs++;
  };
  trace(0);
  for (let head = 0; head < tail; head++) {
    const d = queue[head];
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
  const narrow = costs.every((cost) => cost < 2 ** 31);
  // Around (v,0) the arcs go counterclockwise: across d from the corner before d to the one after.
  const arcs = (near: (d: number) => number, far: (d: number) => number): DualArcs => {
    const at = new Int32Array(pairs + 1);
    const entries = narrow ? new Int32Array(darts) : new Float64Array(darts);
    for (let d = 0; d < darts; d++) if ((near(d) & 1) === 0) at[(near(d) >> 1) + 1]++;
    for (let k = 0; k < pairs; k++) at[k + 1] += at[k];
    const fill = at.slice();
    for (let d = 0; d < darts; d++) {
      if ((near(d) & 1) !== 0) continue;
      const a = fill[near(d) >> 1]++;
      entries[2 * a] = far(d);
      entries[2 * a + 1] = costs[edgeOf[d]];
    }
    return { offsets: at, entries };
  };
  const before = (d: number) => left[previous[d]], after = (d: number) => left[d];
  return { pairs, left, out: arcs(before, after), into: arcs(after, before) };
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

/**
 * Checks that every one-sided cycle of the dual passes a source: without the sources no face of the
 * sphere is connected to its antipode, whatever the direction of the arcs.
 *
 * @param sources faces; their antipodes are left out with them
 * @throws {Rejected} naming nothing but the fact: the sources miss a one-sided cycle
 */
export function requireMeetsOneSided(dual: SphereDual, sources: Int32Array): void {
  const { pairs, out, into } = dual;
  // For each pair the lift that the search has met, 1 + its parity; 3 for sources.
  const met = new Uint8Array(pairs), queue = new Int32Array(pairs);
  for (let i = 0; i < sources.length; i++) met[sources[i] >> 1] = 3;
  for (let root = 0; root < pairs; root++) {
    if (met[root] !== 0) continue;
    let tail = 1;
    queue[0] = 2 * root;
    met[root] = 1;
    for (let head = 0; head < tail; head++) {
      const x = queue[head], row = x >> 1;
      for (const { offsets, entries } of [out, into]) {
        for (let a = offsets[row]; a < offsets[row + 1]; a++) {
          const y = entries[2 * a] ^ (x & 1), lift = 1 + (y & 1);
          if (met[y >> 1] === 0) {
            met[y >> 1] = lift;
            queue[tail++] = y;
          } else if (met[y >> 1] === 3 - lift) {
            throw new Rejected("projective: the sources miss a one-sided cycle of the dual");
          }
        }
      }
    }
  }
}
