/**
 * A spanning tree of the cover's vertices along the edges that a spanning tree of the sphere's faces
 * does not cross. O(n + m) time.
 */
import type { Graph } from "../../graph/graph.ts";
import type { Meter } from "../../run/meter.ts";

/** Vertices met between two ticks of the meter. */
const VERTICES_PER_TICK = 4096;

/**
 * A rooted tree. Its vertices have places 0 … 2n - 1, the root place 0. Every vertex has its largest
 * branch at the next place, so that long ways to the root run through memory in order.
 */
export interface Cotree {
  /** Length 2n: the place of (v,0) at 2v, that of (v,1) at 2v + 1. */
  readonly places: Int32Array;
  /** Length 2n: for each place the cover vertex, numbered like that. */
  readonly vertices: Int32Array;
  /** Length 2n: for each place that of the vertex one step nearer to the root, -1 for the root. */
  readonly next: Int32Array;
  /** Length 2n: for each place the dart whose edge leads there, see directed-dual.ts; -1 for the root. */
  readonly darts: Int32Array;
}

/**
 * Grows the tree, breadth first.
 *
 * @param graph H, connected and not bipartite
 * @param meter counts one unit for each arc of the cover
 * @param crossed length 2m: 1 for the darts whose arcs are in the tree of faces, 0 for the others
 */
export function cotreeOf(graph: Graph, crossed: Uint8Array, meter: Meter): Cotree {
  const { n, offsets, targets, edgeOf, tails } = graph;
  // In the order in which they are met: the vertex, when that was for the one before it, and by what.
  const order = new Int32Array(2 * n), before = new Int32Array(2 * n), by = new Int32Array(2 * n);
  const met = new Uint8Array(2 * n);
  met[0] = 1;
  before[0] = by[0] = -1;
  let tail = 1;
  for (let head = 0; head < tail; head++) {
    const v = order[head] >> 1, white = order[head] & 1;
    if (head % VERTICES_PER_TICK === 0) meter.tick(2 * VERTICES_PER_TICK);
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const e = edgeOf[a], y = 2 * targets[a] + 1 - white;
      // The dart from the black end to the white one.
      const d = (tails[e] === v) === (white === 0) ? 2 * e : 2 * e + 1;
      if (met[y] !== 0 || crossed[d] !== 0) continue;
      met[y] = 1;
      order[tail] = y;
      before[tail] = head;
      by[tail++] = d;
    }
  }
  if (tail < 2 * n) throw new Error("internal: the cotree does not span the cover");

  const size = new Int32Array(2 * n).fill(1), largest = new Int32Array(2 * n).fill(-1);
  for (let i = 2 * n - 1; i > 0; i--) {
    const k = before[i];
    size[k] += size[i];
    if (largest[k] < 0 || size[i] > size[largest[k]]) largest[k] = i;
  }
  meter.tick(2 * n);
  const place = new Int32Array(2 * n), free = new Int32Array(2 * n);
  const places = new Int32Array(2 * n), vertices = new Int32Array(2 * n);
  const next = new Int32Array(2 * n), darts = new Int32Array(2 * n);
  for (let i = 0; i < 2 * n; i++) {
    const k = before[i];
    if (i > 0) {
      if (largest[k] === i) place[i] = place[k] + 1;
      else {
        place[i] = free[k];
        free[k] += size[i];
      }
    }
    free[i] = place[i] + 1 + (largest[i] < 0 ? 0 : size[largest[i]]);
    places[order[i]] = place[i];
    vertices[place[i]] = order[i];
    next[place[i]] = i > 0 ? place[k] : -1;
    darts[place[i]] = by[i];
  }
  return { places, vertices, next, darts };
}
