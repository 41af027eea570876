/**
 * Where least cycles are looked for: a closed one-sided walk through faces that share an edge. On the
 * projective plane every one-sided cycle of the dual meets it in a face, so its faces serve as sources.
 * O(m) time.
 *
 * From a face across an edge and back costs at most what going once around an end of the edge costs.
 * The walk is short when these costs are: then the distances from one source tell much about its
 * neighbours.
 */
import type { Graph } from "../../graph/graph.ts";
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../../graph/heap.ts";
import type { Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";

/** A walk on the sphere from a face to its antipode. */
export interface SourceCurve {
  /** The faces passed, consecutive ones share an edge; the antipode at the end is left out. */
  readonly faces: Int32Array;
  /** As long as `faces`: the bounds on going there and back, added up along the walk. */
  readonly positions: Float64Array;
}

/**
 * Finds a short one-sided walk: through the middle of one with few faces, the shortest there is.
 *
 * @param graph H
 * @param around length n, what the dual arcs around each vertex cost together, integers > 0
 * @param meter counts one unit for each arc scanned
 */
export function sourceCurve(
  graph: Graph,
  dual: DirectedDual,
  around: Float64Array,
  meter: Meter,
): SourceCurve {
  const few = fewestFaces(dual, 0, meter);
  return shortest(graph, dual, around, few[few.length >> 1], meter);
}

/** A walk with the fewest faces from this face to its antipode. O(m) time. */
function fewestFaces({ pairs, out, into }: DirectedDual, root: number, meter: Meter): Int32Array {
  const from = new Int32Array(2 * pairs).fill(-1), queue = new Int32Array(2 * pairs);
  from[root] = root;
  queue[0] = root;
  let tail = 1, work = 0;
  for (let head = 0; from[root ^ 1] < 0; head++) {
    if (head === tail) throw notReached();
    const x = queue[head];
    for (let side = 0; side < 2; side++) {
      const { offsets, ends } = side === 0 ? out : into;
      for (let a = offsets[x >> 1]; a < offsets[(x >> 1) + 1]; a++) {
        const y = ends[a] ^ (x & 1);
        work++;
        if (from[y] >= 0) continue;
        from[y] = x;
        queue[tail++] = y;
      }
    }
    if (work >= UNITS_PER_TICK) {
      meter.tick(work);
      work = 0;
    }
  }
  return walkBack((x) => from[x], root);
}

/** Lengths are rounded up to so many steps of equal size; any walk serves, the shortest serves best. */
const GRADES = 255;

/** The walk from this face to its antipode that is shortest in the bounds on going and coming back. */
function shortest(
  graph: Graph,
  { pairs, out, into }: DirectedDual,
  around: Float64Array,
  root: number,
  meter: Meter,
): SourceCurve {
  const { tails, heads, m } = graph;
  const length = (e: number) => Math.min(around[tails[e]], around[heads[e]]);
  let longest = 0;
  for (let e = 0; e < m; e++) if (length(e) > longest) longest = length(e);
  const grade = (e: number) => Math.ceil(length(e) / longest * GRADES);
  const grades = { out: new Uint8Array(m), into: new Uint8Array(m) };
  for (let a = 0; a < m; a++) {
    grades.out[a] = grade(out.edges[a]);
    grades.into[a] = grade(into.edges[a]);
  }
  const queue = new BucketQueue(GRADES);
  const unreached = 0x7fffffff;
  // Distance of face x at 2x, and the face before it at 2x + 1.
  const state = new Int32Array(4 * pairs).fill(unreached);
  state[2 * root] = 0;
  queue.push(0, root);
  let work = 0;
  for (let x = queue.pop(); x !== (root ^ 1); x = queue.pop()) {
    if (x < 0) throw notReached();
    const key = queue.key;
    if (key > state[2 * x]) continue;
    for (let side = 0; side < 2; side++) {
      const { offsets, ends } = side === 0 ? out : into;
      const steps = side === 0 ? grades.out : grades.into;
      for (let a = offsets[x >> 1]; a < offsets[(x >> 1) + 1]; a++) {
        const y = ends[a] ^ (x & 1), reached = key + steps[a];
        work++;
        if (reached >= state[2 * y]) continue;
        state[2 * y] = reached;
        state[2 * y + 1] = x;
        queue.push(reached, y);
      }
    }
    if (work >= UNITS_PER_TICK) {
      meter.tick(work);
      work = 0;
    }
  }
  const faces = walkBack((x) => state[2 * x + 1], root);
  return {
    faces,
    positions: Float64Array.from(faces, (x) => state[2 * x] / GRADES * longest),
  };
}

/** Arcs scanned between two ticks of the meter. */
const UNITS_PER_TICK = 4096;

/** The faces from `root` up to, and without, its antipode. */
function walkBack(from: (x: number) => number, root: number): Int32Array {
  const faces: number[] = [];
  for (let x = root ^ 1; x !== root;) faces.push(x = from(x));
  return Int32Array.from(faces.reverse());
}

function notReached(): Error {
  return new Error("internal: no walk leads from a face to its antipode");
}

/**
 * Buckets where the keys passed over will not outnumber the arcs scanned, otherwise a heap.
 *
 * @param span the largest step between keys, an integer
 * @param faces number of faces; searches go across about its root many
 */
export function queueFor(span: number, faces: number): MonotoneQueue {
  return span * span <= 256 * faces ? new BucketQueue(span) : new HeapQueue();
}
