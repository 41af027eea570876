/**
 * Where least cycles are looked for: a closed one-sided walk through faces that share an edge. On the
 * projective plane every one-sided cycle of the dual meets it in a face, so its faces serve as sources.
 * O(m) time.
 */
import type { Graph } from "../../graph/graph.ts";
import type { Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";

/** A walk on the sphere from a face to its antipode. */
export interface SourceWalk {
  /** The faces passed, consecutive ones share an edge; the antipode at the end is left out. */
  readonly faces: Int32Array;
  /** As long as `faces`: no less than the distance to each from the face before; 0 for the first. */
  readonly there: Float64Array;
  /** As long as `faces`: no less than the distance from each to the face before. */
  readonly back: Float64Array;
}

/**
 * Finds a walk of few faces: on a way from some face to its antipode with the fewest, the first part
 * that leads from a face to its antipode. The walk need not be shortest; what matters is how many faces
 * change their place in the tree of shortest paths, and that is hardly more.
 *
 * @param graph H
 * @param costs length m, what the arcs across each edge cost
 * @param around length n, what the arcs around each vertex cost together
 * @param meter counts one unit for each arc scanned
 */
export function sourceWalk(
  graph: Graph,
  dual: DirectedDual,
  costs: Int32Array | Float64Array,
  around: Float64Array,
  meter: Meter,
): SourceWalk {
  const faces = fewestFaces(dual, 0, meter);
  const there = new Float64Array(faces.length), back = new Float64Array(faces.length);
  for (let i = 1; i < faces.length; i++) {
    there[i] = stepFrom(faces[i - 1], faces[i]);
    back[i] = stepFrom(faces[i], faces[i - 1]);
  }
  return { faces, there, back };

  /** The least cost from a face over a common edge, or against its arc around one of the ends. */
  function stepFrom(x: number, y: number): number {
    let least = Infinity;
    for (let a = dual.out.offsets[x >> 1]; a < dual.out.offsets[(x >> 1) + 1]; a++) {
      const { out, into } = dual;
      if ((out.ends[a] ^ (x & 1)) === y) least = Math.min(least, costs[out.darts[a] >> 1]);
      if ((into.ends[a] ^ (x & 1)) !== y) continue;
      const e = into.darts[a] >> 1;
      least = Math.min(least, Math.min(around[graph.tails[e]], around[graph.heads[e]]) - costs[e]);
    }
    return least;
  }
}

/** Arcs scanned between two ticks of the meter. */
const UNITS_PER_TICK = 4096;

/**
 * A walk with the fewest faces from this face to its antipode, or where it passes a face and then the
 * antipode of that, the part between. The antipode at the end is left out. O(m) time.
 */
function fewestFaces({ pairs, out, into }: DirectedDual, root: number, meter: Meter): Int32Array {
  const from = new Int32Array(2 * pairs).fill(-1), queue = new Int32Array(2 * pairs);
  const { offsets } = out;
  from[root] = root;
  queue[0] = root;
  let tail = 1, work = 0;
  for (let head = 0; from[root ^ 1] < 0; head++) {
    if (head === tail) throw new Error("internal: no walk leads from a face to its antipode");
    const x = queue[head], row = x >> 1;
    for (let a = offsets[row]; a < offsets[row + 1]; a++) {
      for (let side = 0; side < 2; side++) {
        const y = (side === 0 ? out : into).ends[a] ^ (x & 1);
        if (from[y] >= 0) continue;
        from[y] = x;
        queue[tail++] = y;
      }
      work += 2;
    }
    if (work >= UNITS_PER_TICK) {
      meter.tick(work);
      work = 0;
    }
  }
  const faces: number[] = [], place = new Map<number, number>();
  for (let x = root ^ 1;; x = from[x]) {
    const met = place.get(x ^ 1);
    if (met !== undefined) return Int32Array.from(faces.slice(met + 1).concat(x).reverse());
    place.set(x, faces.length);
    faces.push(x);
  }
}
