/**
 * The directed dual of the double cover of an even-face embedding. Building takes O(m) time and about
 * 40 bytes for each edge.
 *
 * The cover has its vertices (v,0) called black and (v,1) white. Each of its edges is named by the
 * dart of H that it lifts: dart d from v to u gives the edge between (v,0) and (u,1), and d ^ 1 the one
 * between (u,0) and (v,1). The dual arc across a cover edge runs so that the black end is on its left;
 * swapping the sheets is the antipodal map of the sphere, and it keeps the direction and the cost of
 * dual arcs. Around (v,0) the faces at its corners therefore form a directed cycle, counterclockwise:
 * the arc across dart d leads from the corner before d to the corner after it.
 */
import { mirrored } from "../../graph/embedding.ts";
import type { Meter } from "../../run/meter.ts";

/** Darts walked between two ticks of the meter. */
const DARTS_PER_TICK = 4096;

/**
 * The faces of the sphere are 0 … 2·pairs - 1; faces x and x ^ 1 are antipodes. Arcs are kept at the
 * even faces. Pairs are numbered in breadth-first order, so that neighbours are near in memory.
 */
export interface DirectedDual {
  /** Number of faces of the projective plane. */
  readonly pairs: number;
  /** The arcs out of the even faces: `ends` are the faces they lead to. */
  readonly out: Arcs;
  /** The arcs into the even faces: `ends` are the faces they come from. */
  readonly into: Arcs;
  /** Length 4m: the face where the arc of dart d leads, on the left of d, at 2d; at 2d + 1 that where it
   * comes from. */
  readonly sides: Int32Array;
}

/** Arcs at the even faces 2k, in rows; those at 2k + 1 are their antipodes. */
export interface Arcs {
  /** Length pairs + 1: the arcs at face 2k stand at offsets[k] … offsets[k+1]-1. */
  readonly offsets: Int32Array;
  /** Length m: the face at the other end; for the arc at 2k + 1 it is ends[a] ^ 1. */
  readonly ends: Int32Array;
  /** Length m: the dart that the arc crosses; for the arc at 2k + 1 it is darts[a] ^ 1. */
  readonly darts: Int32Array;
}

/**
 * Builds the directed dual.
 *
 * @param next length 2m, m > 0, the rotation system of an even-face embedding of a connected graph
 *   (every edge twisted), as in graph/embedding.ts
 * @param meter counts two units for each dart
 * @throws {Interrupted} when the meter runs out
 */
export function directedDual(next: Int32Array, meter: Meter): DirectedDual {
  const m = next.length / 2;
  const prev = mirrored(next);
  const left = new Int32Array(2 * m).fill(-1);
  // Around an even face arcs in and out take turns; faces follow each other breadth first.
  const into = new Int32Array(m), out = new Int32Array(m);
  const offsets = new Int32Array(m + 1);
  let pairs = 0, tail = 0;
  traceFace(0);
  for (let head = 0; head < tail; head++) {
    const d = into[head];
    if (head % DARTS_PER_TICK === 0) meter.tick(2 * DARTS_PER_TICK);
    if (left[next[d]] < 0) traceFace(next[d]);
    if (left[prev[d]] < 0) traceFace(prev[d]);
  }
  meter.tick(2 * m);
  const sides = new Int32Array(4 * m);
  for (let d = 0; d < 2 * m; d++) {
    sides[2 * d] = left[d];
    sides[2 * d + 1] = left[prev[d]];
  }
  const heads = new Int32Array(m), tails = new Int32Array(m);
  for (let a = 0; a < m; a++) {
    heads[a] = sides[2 * out[a]];
    tails[a] = sides[2 * into[a] + 1];
  }
  const rows = offsets.slice(0, pairs + 1);
  return {
    pairs,
    out: { offsets: rows, ends: heads, darts: out },
    into: { offsets: rows, ends: tails, darts: into },
    sides,
  };

  /** Numbers the face on the left of a dart and its antipode. */
  function traceFace(start: number): void {
    let d = start;
    do {
      left[d] = 2 * pairs;
      left[d ^ 1] = 2 * pairs + 1;
      into[tail] = d;
      d = next[d ^ 1] ^ 1;
      out[tail++] = d;
      d = prev[d];
    } while (d !== start);
    offsets[++pairs] = tail;
  }
}
