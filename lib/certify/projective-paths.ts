/** Shortest paths on the sphere from one face to all: Dijkstra's method, O(m log m) time at most. */
import { BucketQueue, HeapQueue } from "../graph/heap.ts";
import type { InnerGraph } from "./projective-graph.ts";
import type { SphereDual } from "./projective-dual.ts";

/** Where no cost is larger than this, buckets are used. */
const MOST_BUCKETS = 1024;

/**
 * Shortest paths along the dual arcs.
 *
 * @returns `state`, length 4·pairs: the distance of face x at 2x, the dart whose arc enters it at 2x + 1,
 *   -1 for the root
 */
export function shortestPaths(
  { reverse }: InnerGraph,
  { pairs, offsets, out, left, edgeOf }: SphereDual,
  costs: Float64Array,
  root: number,
): { state: Int32Array | Float64Array; furthest: number; dearest: number } {
  let dearest = 0;
  for (let e = 0; e < costs.length; e++) if (costs[e] > dearest) dearest = costs[e];
  const queue = dearest < MOST_BUCKETS ? new BucketQueue(dearest) : new HeapQueue();
  // End and cost of each arc out of an even face; out of its antipode it is the antipode of the end.
  const size = 2 * out.length;
  const arcs = dearest < 2 ** 31 ? new Int32Array(size) : new Float64Array(size);
  for (let a = 0; a < out.length; a++) {
    arcs[2 * a] = left[out[a]];
    arcs[2 * a + 1] = costs[edgeOf[out[a]]];
  }
  // A path passes no face twice.
  const narrow = 2 * pairs * dearest < 2 ** 31 - 1;
  const state = narrow ? new Int32Array(4 * pairs) : new Float64Array(4 * pairs);
  state.fill(narrow ? 2 ** 31 - 1 : Infinity);
  state[2 * root] = 0;
  state[2 * root + 1] = -1;
  queue.push(0, root);
  let furthest = 0;
  for (let x = queue.pop(); x >= 0; x = queue.pop()) {
    const key = queue.key, side = x & 1, last = offsets[(x >> 1) + 1];
    if (state[2 * x] !== key) continue;
    furthest = key;
    for (let a = offsets[x >> 1]; a < last; a++) {
      const y = arcs[2 * a] ^ side, reached = key + arcs[2 * a + 1];
      if (reached >= state[2 * y]) continue;
      state[2 * y] = reached;
      state[2 * y + 1] = side === 0 ? out[a] : reverse[out[a]];
      queue.push(reached, y);
    }
  }
  return { state, furthest, dearest };
}
