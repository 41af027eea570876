/**
 * Where least cycles are looked for: a closed one-sided curve through faces and vertices of the
 * embedding. Every one-sided cycle of the dual meets it, and can meet it only in a face, so the faces
 * on the curve serve as sources. O(m log m) time.
 *
 * To go from one face at a vertex to any other and back costs at most what going once around the
 * vertex costs. A curve is short when these costs are: then the distances from one source tell much
 * about its neighbours.
 */
import type { Graph } from "../../graph/graph.ts";
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../../graph/heap.ts";
import type { Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";

/** A curve on the sphere from a face to its antipode. */
export interface SourceCurve {
  /** The faces passed, consecutive ones at a common vertex; the antipode at the end is left out. */
  readonly faces: Int32Array;
  /** As long as `faces`: costs of going around the vertices passed up to each, added up. */
  readonly positions: Float64Array;
  /** The costs of all vertices passed. */
  readonly length: number;
}

/**
 * Finds a short one-sided curve: through the middle of one with few vertices, the shortest there is.
 *
 * @param graph H
 * @param next length 2m, its rotation system
 * @param around length n, what the dual arcs around each vertex cost together, integers > 0
 */
export function sourceCurve(
  graph: Graph,
  next: Int32Array,
  dual: DirectedDual,
  around: Float64Array,
  meter: Meter,
): SourceCurve {
  const search = new CurveSearch(graph, next, dual);
  const few = search.through(0, new Float64Array(graph.n).fill(1), meter);
  return search.through(few.faces[few.faces.length >> 1], around, meter);
}

/** Shortest paths over faces and vertices of the sphere, where passing a vertex costs going around it. */
class CurveSearch {
  readonly #distance: Float64Array;
  readonly #from: Int32Array;
  /** Length 2n: whether vertex (v,s) has been passed, at 2v + s. */
  readonly #passed: Uint8Array;
  /** Length pairs: a dart with the face 2k on its left. */
  readonly #dartOf: Int32Array;

  constructor(
    readonly graph: Graph,
    readonly next: Int32Array,
    readonly dual: DirectedDual,
  ) {
    const { pairs, left } = dual;
    this.#distance = new Float64Array(2 * pairs);
    this.#from = new Int32Array(2 * pairs);
    this.#passed = new Uint8Array(2 * graph.n);
    this.#dartOf = new Int32Array(pairs);
    for (let d = left.length - 1; d >= 0; d--) {
      if ((left[d] & 1) === 0) this.#dartOf[left[d] >> 1] = d;
    }
  }

  /**
   * The shortest curve through one face.
   *
   * @param around length n, what passing each vertex costs
   */
  through(root: number, around: Float64Array, meter: Meter): SourceCurve {
    const { graph, next, dual: { left, prev, pairs } } = this;
    const distance = this.#distance.fill(Infinity), passed = this.#passed.fill(0);
    const from = this.#from;
    let span = 0;
    for (let v = 0; v < graph.n; v++) if (around[v] > span) span = around[v];
    const queue = queueFor(span, pairs);
    distance[root] = 0;
    queue.push(0, root);
    for (let x = queue.pop(); x !== (root ^ 1); x = queue.pop()) {
      if (x < 0) throw new Error("internal: no curve leads from a face to its antipode");
      const key = queue.key;
      if (key > distance[x]) continue;
      // The corners of face 2k at black vertices lie left of the darts of one walk, those at white
      // vertices left of the mirrored darts of its antipode's.
      const first = this.#dartOf[x >> 1];
      let work = 1;
      for (let side = 0; side < 2; side++) {
        const sheet = side ^ (x & 1), start = side === 0 ? first : first ^ 1;
        let d = start;
        do {
          work++;
          const v = (d & 1) === 0 ? graph.tails[d >> 1] : graph.heads[d >> 1];
          if (passed[2 * v + sheet] === 0) {
            passed[2 * v + sheet] = 1;
            const reached = key + around[v];
            let corner = d;
            do {
              work++;
              const y = left[corner] ^ sheet;
              if (reached < distance[y]) {
                distance[y] = reached;
                from[y] = x;
                queue.push(reached, y);
              }
              corner = next[corner];
            } while (corner !== d);
          }
          d = prev[next[d ^ 1] ^ 1];
        } while (d !== start);
      }
      meter.tick(work);
    }
    const faces: number[] = [];
    for (let x = root ^ 1; x !== root;) faces.push(x = from[x]);
    faces.reverse();
    return {
      faces: Int32Array.from(faces),
      positions: Float64Array.from(faces, (x) => distance[x]),
      length: distance[root ^ 1],
    };
  }
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
