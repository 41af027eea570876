/**
 * The directed dual of the double cover of an even-face embedding, stored once for each antipodal
 * pair. Building takes O(m) time and about 60 bytes for each edge.
 *
 * The cover has its vertices (v,0) called black and (v,1) white. The dual arc across a cover edge
 * runs so that the black end is on its left; swapping the sheets is the antipodal map of the sphere,
 * and it keeps the direction and the cost of dual arcs. Around (v,0) the faces at its corners
 * therefore form a directed cycle, counterclockwise: the arc across dart d leads from the corner
 * before d to the corner after it.
 */
import { mirrored } from "../../graph/embedding.ts";
import type { Graph } from "../../graph/graph.ts";

/**
 * The faces of the sphere are 0 … 2·pairs - 1; faces x and x ^ 1 are antipodes. There is one arc for
 * each edge of H, kept for the even lift of its tail and of its head. Pairs are numbered in
 * breadth-first order, so that neighbours are near in memory.
 */
export interface DirectedDual {
  /** Number of faces of the projective plane. */
  readonly pairs: number;
  /** The arcs out of the even faces: `ends` are the faces they lead to. */
  readonly out: Arcs;
  /** The arcs into the even faces: `ends` are the faces they come from. */
  readonly into: Arcs;
  /** Length 2m: the face of the sphere to the left of each dart of H, lifted to start on sheet 0. */
  readonly left: Int32Array;
  /** Length 2m: the rotation of H clockwise, the inverse of `next`. */
  readonly prev: Int32Array;
}

/** Arcs at the even faces 2k, in rows; those at 2k + 1 are their antipodes. */
export interface Arcs {
  /** Length pairs + 1: the arcs at face 2k stand at offsets[k] … offsets[k+1]-1. */
  readonly offsets: Int32Array;
  /** Length m: the face at the other end; for the arc at 2k + 1 it is ends[a] ^ 1. */
  readonly ends: Int32Array;
  /** Length m: the edge of H that the arc crosses. */
  readonly edges: Int32Array;
  /** Length m: what crossing costs, integers >= 0. */
  readonly costs: Int32Array | Float64Array;
}

/**
 * Builds the directed dual.
 *
 * @param graph H with m edges
 * @param next length 2m, the rotation system of an even-face embedding (every edge twisted), as in
 *   graph/embedding.ts
 * @param costs length m, integers >= 0
 */
export function directedDual(
  graph: Graph,
  next: Int32Array,
  costs: Int32Array | Float64Array,
): DirectedDual {
  const { m } = graph;
  const prev = mirrored(next);
  const left = new Int32Array(2 * m).fill(-1);
  // `queue` holds the darts of the even faces, face by face in breadth-first order.
  const queue = new Int32Array(2 * m);
  let pairs = 0, tail = 0;
  if (m > 0) traceFace(0);
  for (let head = 0; head < tail; head++) {
    const d = queue[head];
    if (left[next[d]] < 0) traceFace(next[d]);
    if (left[prev[d]] < 0) traceFace(prev[d]);
  }
  return { pairs, out: rows(1), into: rows(0), left, prev };

  /** Numbers the face on the left of a dart and its antipode. */
  function traceFace(start: number): void {
    let d = start;
    do {
      left[d] = 2 * pairs;
      left[d ^ 1] = 2 * pairs + 1;
      queue[tail++] = d;
      d = prev[next[d ^ 1] ^ 1];
    } while (d !== start);
    pairs++;
  }

  /** The arcs in rows by their tails (from = 1) or by their heads (from = 0). */
  function rows(from: number): Arcs {
    const offsets = new Int32Array(pairs + 1);
    for (let e = 0; e < m; e++) {
      const d = 2 * e;
      offsets[((from === 1 ? left[prev[d]] : left[d]) >> 1) + 1]++;
    }
    for (let k = 0; k < pairs; k++) offsets[k + 1] += offsets[k];
    const at = offsets.slice(0, pairs);
    const ends = new Int32Array(m), edges = new Int32Array(m);
    const arcCosts = costs instanceof Int32Array ? new Int32Array(m) : new Float64Array(m);
    for (let e = 0; e < m; e++) {
      const tail = left[prev[2 * e]], head = left[2 * e];
      const near = from === 1 ? tail : head, far = from === 1 ? head : tail;
      const a = at[near >> 1]++;
      ends[a] = far ^ (near & 1);
      edges[a] = e;
      arcCosts[a] = costs[e];
    }
    return { offsets, ends, edges, costs: arcCosts };
  }
}
