/**
 * Repeats the searches of a proof and reads off what distances they prove. The searches stand in a
 * tree; each works on the potential its parent left, and what it changes is undone for its siblings.
 *
 * A potential a has a(x) <= c(x→y) + a(y) on every arc, so d(x, z) >= a(x) - a(z). The first is 0.
 * Dijkstra's method from s on the reduced costs c(x→y) + a(y) - a(x) >= 0 gives reduced distances
 * r(x). Raising a(x) by max(0, limit - r(x)) everywhere keeps it a potential, since r(y) is at most
 * r(x) plus the reduced cost of x→y; faces at the limit or beyond need not be looked at. This is a
 * search forward, at even depth. At odd depth a search goes backward, against the arcs, and lowers
 * a(x) likewise. Swapping the sheets keeps arcs and costs, so d(x, x̄) = d(x̄, x), and every potential
 * proves d(x, x̄) >= |a(x) - a(x̄)|.
 */
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../graph/heap.ts";
import type { Numbers, ProjectiveProof } from "./certificate.ts";
import { requireMultiplier } from "./play.ts";
import type { SphereDual } from "./projective-dual.ts";
import { Rejected } from "./rejected.ts";

/** Deeper trees are refused; sums of so many limits below 2^46 are exact. */
const MOST_DEPTH = 64;
const MOST_LIMIT = 2 ** 46;
/** Where the largest reduced cost is at most this, buckets are used. */
const MOST_BUCKETS = 1 << 16;

/**
 * The distances between the sources and their antipodes that the searches prove.
 *
 * @param dual the sphere
 * @param sources one face for each source
 * @param span the largest cost of going once around a vertex; no reduced cost is larger, since
 *   p(y) - p(x) is at most the cost of the way from y to x that completes the arc to such a circle
 * @param proof `starts`, `depths` and `limits` are read
 * @returns as long as `sources`: a lower bound for each
 * @throws {Rejected} when the tree is malformed
 */
export function provenDistances(
  dual: SphereDual,
  sources: Int32Array,
  span: number,
  proof: ProjectiveProof,
): Float64Array {
  const { starts, depths, limits } = proof;
  if (depths.length !== starts.length || limits.length !== starts.length) {
    throw new Rejected("projective: expected as many depths and limits as starts");
  }
  const proven = new Float64Array(sources.length);
  const sphere = new Searches(dual, span, largestSum(depths, limits) + span);
  for (let i = 0; i < starts.length; i++) {
    const where = `projective, search ${i}`;
    const start = starts[i];
    if (!Number.isInteger(start) || start < 0 || start >= sources.length) {
      throw new Rejected(
        `${where}: expected a source from 0 to ${sources.length - 1}, got ${start}`,
      );
    }
    const depth = requireMultiplier(depths[i], `${where}, depth`);
    const limit = requireMultiplier(limits[i], `${where}, limit`);
    if (depth > sphere.depth || depth >= MOST_DEPTH) {
      throw new Rejected(`${where}: depth ${depth} without a search above it`);
    }
    if (limit > MOST_LIMIT) throw new Rejected(`${where}: limit ${limit} is too large`);
    while (sphere.depth > depth) sphere.undo();
    sphere.search(sources[start], limit, where);
    for (let j = 0; j < sources.length; j++) {
      const distance = sphere.difference(sources[j]);
      if (distance > proven[j]) proven[j] = distance;
    }
  }
  return proven;
}

/** The largest sum of limits from a root down to a search; at least as large as any potential. */
function largestSum(depths: Numbers, limits: Numbers): number {
  const above = new Float64Array(MOST_DEPTH + 1);
  let largest = 0;
  for (let i = 0; i < depths.length; i++) {
    if (!(depths[i] >= 0 && depths[i] < MOST_DEPTH)) continue; // refused when its turn comes
    above[depths[i] + 1] = above[depths[i]] + limits[i];
    if (above[depths[i] + 1] > largest) largest = above[depths[i] + 1];
  }
  return largest;
}

class Searches {
  /**
   * For face x the potential a(x) at 2x, and at 2x + 1 its reduced distance during a search,
   * `#unreached` otherwise. In 32 bits where everything fits, for speed.
   */
  readonly #state: Int32Array | Float64Array;
  readonly #unreached: number;
  readonly #queue: MonotoneQueue;
  /** For each search: the faces it changed and their former potentials. */
  readonly #done: { faces: Int32Array; former: Int32Array | Float64Array }[] = [];
  readonly #touched: Int32Array;

  /**
   * @param span the largest reduced cost
   * @param most the largest potential or reduced distance that can occur
   */
  constructor(readonly dual: SphereDual, span: number, most: number) {
    const faces = 2 * dual.pairs, narrow = most < 2 ** 30;
    this.#state = narrow ? new Int32Array(2 * faces) : new Float64Array(2 * faces);
    this.#unreached = narrow ? 2 ** 31 - 1 : Infinity;
    for (let x = 0; x < faces; x++) this.#state[2 * x + 1] = this.#unreached;
    this.#touched = new Int32Array(faces);
    this.#queue = span <= MOST_BUCKETS ? new BucketQueue(span) : new HeapQueue();
  }

  get depth(): number {
    return this.#done.length;
  }

  /** What the potential proves for the distance between x and its antipode. */
  difference(x: number): number {
    return Math.abs(this.#state[2 * x] - this.#state[2 * (x ^ 1)]);
  }

  /** A search that serves face x: from x or its antipode, whichever the potential says more for. */
  search(x: number, limit: number, where: string): void {
    const backward = this.depth % 2 === 1;
    const { offsets, ends, costs } = backward ? this.dual.into : this.dual.out;
    const state = this.#state, queue = this.#queue, touched = this.#touched;
    const unreached = this.#unreached;
    const source = (state[2 * x] >= state[2 * (x ^ 1)]) === backward ? x ^ 1 : x;
    let count = 1, settled = 0, last = 0;
    queue.clear();
    state[2 * source + 1] = 0;
    touched[0] = source;
    queue.push(0, source);
    for (let near = queue.pop(); near >= 0; near = queue.pop()) {
      const r = queue.key;
      if (state[2 * near + 1] !== r) continue;
      if (r < last) throw new Error("internal: the queue is out of order");
      last = r;
      settled++;
      const flip = near & 1, at = state[2 * near], row = near >> 1;
      for (let arc = offsets[row]; arc < offsets[row + 1]; arc++) {
        const far = ends[arc] ^ flip, rise = state[2 * far] - at;
        const reached = r + costs[arc] + (backward ? -rise : rise);
        if (reached < r) throw new Error(`internal: ${where}: not a potential`);
        if (reached > limit || reached >= state[2 * far + 1]) continue;
        if (state[2 * far + 1] === unreached) touched[count++] = far;
        state[2 * far + 1] = reached;
        queue.push(reached, far);
      }
    }
    // Every face within the limit was settled with its final value, whatever the queue did.
    if (settled !== count) throw new Error("internal: the queue lost a face");
    const faces = touched.slice(0, count);
    const former = state instanceof Int32Array ? new Int32Array(count) : new Float64Array(count);
    for (let i = 0; i < count; i++) {
      const y = faces[i], raised = limit - state[2 * y + 1];
      former[i] = state[2 * y];
      state[2 * y] += backward ? -raised : raised;
      state[2 * y + 1] = unreached;
    }
    this.#done.push({ faces, former });
  }

  /** Takes the last search back. */
  undo(): void {
    const { faces, former } = this.#done.pop()!;
    for (let i = 0; i < faces.length; i++) this.#state[2 * faces[i]] = former[i];
  }
}
