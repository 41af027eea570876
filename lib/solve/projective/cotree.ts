/**
 * A spanning tree of the cover's vertices along the edges that a spanning tree of the sphere's faces
 * does not cross. O(n + m) time.
 */
import type { Graph } from "../../graph/graph.ts";
import type { Meter } from "../../run/meter.ts";

/** Vertices met between two ticks of the meter. */
const VERTICES_PER_TICK = 4096;

/**
 * A rooted tree. Its vertices have places 0 … 2n - 1 in depth-first order, the root place 0, so that
 * long ways to the root run through memory in order for the most part.
 */
export interface Cotree {
  /** Length 2n: the place of (v,0) at 2v, that of (v,1) at 2v + 1. */
  readonly places: Int32Array;
  /** Length 2n: for each place the cover vertex one step nearer to the root, -1 for the root. */
  readonly next: Int32Array;
  /** Length 2n: for each place the dart whose edge leads there, see directed-dual.ts; -1 for the root. */
  readonly darts: Int32Array;
}

/**
 * Walks through the tree, depth first.
 *
 * @param graph H, connected and not bipartite
 * @param crossed length 2m: 1 for the darts whose arcs are in the tree of faces, 0 for the others
 * @param meter counts one unit for each arc of the cover
 */
export function cotreeOf(graph: Graph, crossed: Uint8Array, meter: Meter): Cotree {
  const { n, offsets, targets, edgeOf, tails } = graph;
  const places = new Int32Array(2 * n).fill(-1);
  const next = new Int32Array(2 * n), darts = new Int32Array(2 * n);
  // A stack of vertices met whose place is still to come, each with the way there.
  const stack = new Int32Array(2 * n), from = new Int32Array(2 * n), by = new Int32Array(2 * n);
  let top = 1, count = 0;
  from[0] = by[0] = -1;
  while (top > 0) {
    const x = stack[--top], white = x & 1, v = x >> 1;
    if (count % VERTICES_PER_TICK === 0) meter.tick(2 * VERTICES_PER_TICK);
    next[count] = from[top];
    const entered = darts[count] = by[top];
    places[x] = count++;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const e = edgeOf[a];
      // The dart from the black end to the white one. The edges not crossed hold no cycle.
      const d = (tails[e] === v) === (white === 0) ? 2 * e : 2 * e + 1;
      if (crossed[d] !== 0 || d === entered) continue;
      stack[top] = 2 * targets[a] + 1 - white;
      from[top] = x;
      by[top++] = d;
    }
  }
  if (count !== 2 * n) throw new Error("internal: the cotree does not span the cover");
  return { places, next, darts };
}
