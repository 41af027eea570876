/** Shortest paths from one face of the sphere to all: Dijkstra's method, O(m log m) time at most. */
import { BucketQueue, HeapQueue } from "../../graph/heap.ts";
import type { Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";

/** Distances and a tree of shortest paths. */
export interface ShortestPaths {
  /**
   * Length 4·pairs: the distance of face x at 2x, and at 2x + 1 the dart whose arc enters x on a
   * shortest path, -1 for the source. In 32 bits where they fit.
   */
  readonly tree: Int32Array | Float64Array;
  /** The largest distance. */
  readonly furthest: number;
}

/** Distances from here on are held in doubles. */
const WIDE = 2 ** 30;
/** Arcs scanned between two ticks of the meter. */
const UNITS_PER_TICK = 4096;

/**
 * Shortest paths to all faces, along the arcs.
 *
 * @param dual the directed dual, strongly connected
 * @param costs length m, for each edge of H what the arcs across its lifts cost, integers >= 0
 * @param source a face
 * @param meter counts one unit for each arc scanned
 */
export function shortestPaths(
  { pairs, out }: DirectedDual,
  costs: Int32Array | Float64Array,
  source: number,
  meter: Meter,
): ShortestPaths {
  const { offsets, ends, darts } = out;
  let dearest = 0;
  for (let e = 0; e < costs.length; e++) if (costs[e] > dearest) dearest = costs[e];
  // Paths across the sphere have about root many arcs: the buckets passed over stay few.
  const queue = dearest * dearest <= 256 * pairs ? new BucketQueue(dearest) : new HeapQueue();
  if (costs instanceof Int32Array) {
    const narrow = run(new Int32Array(4 * pairs), new Int32Array(2 * ends.length), WIDE);
    if (narrow !== undefined) return narrow;
  }
  return run(new Float64Array(4 * pairs), new Float64Array(2 * ends.length), Infinity)!;

  /** Nothing if a distance comes to `unreached`. Ends and costs stand side by side, as in `tree`. */
  function run<T extends Int32Array | Float64Array>(tree: T, arcs: T, unreached: number) {
    for (let a = 0; a < ends.length; a++) {
      arcs[2 * a] = ends[a];
      arcs[2 * a + 1] = costs[darts[a] >> 1];
    }
    for (let x = 0; x < 2 * pairs; x++) tree[2 * x] = unreached;
    tree[2 * source] = 0;
    tree[2 * source + 1] = -1;
    queue.clear();
    queue.push(0, source);
    let furthest = 0, work = 0;
    for (let x = queue.pop(); x >= 0; x = queue.pop()) {
      const key = queue.key;
      if (tree[2 * x] !== key) continue;
      furthest = key;
      const flip = x & 1, end = offsets[(x >> 1) + 1];
      for (let a = offsets[x >> 1]; a < end; a++) {
        const y = arcs[2 * a] ^ flip, reached = key + arcs[2 * a + 1];
        work++;
        if (reached >= tree[2 * y]) continue;
        tree[2 * y] = reached;
        tree[2 * y + 1] = darts[a] ^ flip;
        queue.push(reached, y);
      }
      if (work >= UNITS_PER_TICK) {
        meter.tick(work);
        work = 0;
      }
    }
    for (let x = 0; x < 2 * pairs; x++) if (tree[2 * x] === unreached) return undefined;
    return { tree, furthest };
  }
}

/** The edges of H that a shortest path to a face crosses, from its end to its start. */
export function edgesTo(x: number, { tree }: ShortestPaths, { sides }: DirectedDual): number[] {
  const crossed: number[] = [];
  for (let d = tree[2 * x + 1]; d >= 0; d = tree[2 * x + 1]) {
    crossed.push(d >> 1);
    x = sides[2 * d + 1];
  }
  return crossed;
}
