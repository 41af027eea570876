/**
 * Where least cycles are looked for: a closed one-sided curve through faces and vertices of the
 * embedding. Every one-sided cycle of the dual meets it, and can meet it only in a face, so the faces
 * on the curve serve as sources. O(m log m) time for each of a few rounds.
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

/** The curve is started anew from the middle of the last one, while it gets shorter, so often. */
const ROUNDS = 4;

/**
 * Finds a short one-sided curve: the shortest through a face, then through its own middle.
 *
 * @param graph H
 * @param next length 2m, its rotation system
 * @param around length n, what the dual arcs around each vertex cost together, integers > 0
 * @returns a curve at most twice as long as the shortest through any face of it
 */
export function sourceCurve(
  graph: Graph,
  next: Int32Array,
  dual: DirectedDual,
  around: Float64Array,
  meter: Meter,
): SourceCurve {
  const search = new CurveSearch(graph, next, dual, around);
  let best = search.through(0, meter);
  for (let round = 1; round < ROUNDS; round++) {
    const again = search.through(best.faces[best.faces.length >> 1], meter);
    if (again.length >= best.length) break;
    best = again;
  }
  return best;
}

/** Shortest paths over faces and vertices of the sphere, where passing a vertex costs going around it. */
class CurveSearch {
  readonly #distance: Float64Array;
  readonly #from: Int32Array;
  /** Length 2n: whether vertex (v,s) has been passed, at 2v + s. */
  readonly #passed: Uint8Array;
  readonly #queue: MonotoneQueue;
  /** Length pairs: a dart with the face 2k on its left. */
  readonly #dartOf: Int32Array;

  constructor(
    readonly graph: Graph,
    readonly next: Int32Array,
    readonly dual: DirectedDual,
    readonly around: Float64Array,
  ) {
    const { pairs, left } = dual;
    this.#distance = new Float64Array(2 * pairs);
    this.#from = new Int32Array(2 * pairs);
    this.#passed = new Uint8Array(2 * graph.n);
    this.#dartOf = new Int32Array(pairs);
    for (let d = left.length - 1; d >= 0; d--) {
      if ((left[d] & 1) === 0) this.#dartOf[left[d] >> 1] = d;
    }
    let span = 0;
    for (let v = 0; v < graph.n; v++) if (around[v] > span) span = around[v];
    this.#queue = queueFor(span, pairs);
  }

  /** The shortest curve through one face. */
  through(root: number, meter: Meter): SourceCurve {
    const { graph, next, dual: { left, prev }, around } = this;
    const distance = this.#distance.fill(Infinity), passed = this.#passed.fill(0);
    const from = this.#from, queue = this.#queue;
    queue.clear();
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
