/**
 * Repeats the searches of a proof and reads off what distances they prove. The searches stand in a
 * tree; each works on the potential its parent left, and what it changes is undone for its siblings.
 *
 * A potential a has a(x) <= c(x→y) + a(y) on every arc, so d(x, z) >= a(x) - a(z). The first is 0.
 * For a face s write r(x) = d(s, x) + a(x) - a(s) >= 0, the distance in the *reduced* costs
 * c(x→y) + a(y) - a(x) >= 0. Raising a(x) by max(0, limit - r(x)) everywhere keeps it a potential,
 * since r(y) is at most r(x) plus the reduced cost of x→y. Faces beyond the limit do not matter, nor
 * do they lie on shortest paths to others within it, as r does not fall along a path; so Dijkstra's
 * method may leave them out. This is a search forward, at even depth. At odd depth a search goes
 * backward, against the arcs, and lowers a(x) likewise. Swapping the sheets keeps arcs and costs, so
 * d(x, x̄) = d(x̄, x), and every potential proves d(x, x̄) >= |a(x) - a(x̄)|.
 */
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../graph/heap.ts";
import type { Numbers, ProjectiveProof } from "./certificate.ts";
import { requireMultiplier } from "./play.ts";
import type { SphereDual } from "./projective-dual.ts";
import { Rejected } from "./rejected.ts";

/** Deeper trees are refused; sums of so many limits below 2^46 are exact. */
const MOST_DEPTH = 64;
const MOST_LIMIT = 2 ** 46;
/** Where no cost is larger than this, buckets are used. */
const MOST_BUCKETS = 1 << 16;

/**
 * The distances between the sources and their antipodes that the searches prove.
 *
 * @param dual the sphere
 * @param sources one face for each source
 * @param proof `starts`, `depths` and `limits` are read
 * @returns as long as `sources`: a lower bound for each
 * @throws {Rejected} when the tree is malformed
 */
export function provenDistances(
  dual: SphereDual,
  sources: Int32Array,
  proof: ProjectiveProof,
): Float64Array {
  const { starts, depths, limits } = proof;
  if (depths.length !== starts.length || limits.length !== starts.length) {
    throw new Rejected("projective: expected as many depths and limits as starts");
  }
  const proven = new Float64Array(sources.length);
  const sphere = new Searches(dual, largestSum(depths, limits));
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

/** The largest sum of limits from a root down to a search; no potential is larger in size. */
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
   * For face x the potential a(x) at 2x, and at 2x + 1 its distance during a search, `#unreached`
   * otherwise. In 32 bits where everything fits, for speed.
   */
  readonly #state: Int32Array | Float64Array;
  readonly #unreached: number;
  readonly #queue: MonotoneQueue;
  /** How to take the searches back, one record for each depth; those below `#depth` count. */
  readonly #undo: Undo[] = [];
  #depth = 0;
  readonly #touched: Int32Array;

  /**
   * @param most no potential is larger in size
   */
  constructor(readonly dual: SphereDual, most: number) {
    // A distance within a limit is at most that limit and the difference of two potentials.
    const faces = 2 * dual.pairs, narrow = 3 * most < 2 ** 31;
    this.#state = narrow ? new Int32Array(2 * faces) : new Float64Array(2 * faces);
    this.#unreached = narrow ? 2 ** 31 - 1 : Infinity;
    for (let x = 0; x < faces; x++) this.#state[2 * x + 1] = this.#unreached;
    this.#touched = new Int32Array(faces);
    const { entries } = dual.out;
    let dearest = 0;
    for (let i = 1; i < entries.length; i += 2) if (entries[i] > dearest) dearest = entries[i];
    this.#queue = dearest <= MOST_BUCKETS ? new BucketQueue(dearest) : new HeapQueue();
  }

  get depth(): number {
    return this.#depth;
  }

  /** What the potential proves for the distance between x and its antipode. */
  difference(x: number): number {
    return Math.abs(this.#state[2 * x] - this.#state[2 * (x ^ 1)]);
  }

  /** A search that serves face x: from x or its antipode, whichever the potential says more for. */
  search(x: number, limit: number, where: string): void {
    const backward = this.depth % 2 === 1;
    const { offsets, entries } = backward ? this.dual.into : this.dual.out;
    const state = this.#state, queue = this.#queue, touched = this.#touched;
    const unreached = this.#unreached;
    const source = (state[2 * x] >= state[2 * (x ^ 1)]) === backward ? x ^ 1 : x;
    const sign = backward ? -1 : 1;
    // r(x) <= limit exactly if d(x) + sign·a(x) <= within.
    const within = limit + sign * state[2 * source];
    let count = 1, settled = 0, last = 0;
    queue.clear();
    state[2 * source + 1] = 0;
    touched[0] = source;
    queue.push(0, source);
    for (let near = queue.pop(); near >= 0; near = queue.pop()) {
      const d = queue.key;
      if (state[2 * near + 1] !== d) continue;
      if (d < last) throw new Error("internal: the queue is out of order");
      last = d;
      settled++;
      const flip = near & 1, row = near >> 1, at = sign * state[2 * near];
      const end = 2 * offsets[row + 1];
      for (let arc = 2 * offsets[row]; arc < end; arc += 2) {
        const far = entries[arc] ^ flip, cost = entries[arc + 1], there = sign * state[2 * far];
        if (cost + there < at) throw new Error(`internal: ${where}: not a potential`);
        const reached = d + cost;
        if (reached >= state[2 * far + 1] || reached + there > within) continue;
        if (state[2 * far + 1] === unreached) touched[count++] = far;
        state[2 * far + 1] = reached;
        queue.push(reached, far);
      }
    }
    // Every face within the limit was settled with its final value, whatever the queue did.
    if (settled !== count) throw new Error("internal: the queue lost a face");
    const { faces, former } = this.#record(count);
    const all = faces === undefined;
    const length = all ? former.length : count;
    for (let i = 0; i < length; i++) {
      const y = all ? i : touched[i], r = state[2 * y + 1];
      if (!all) faces[i] = y;
      former[i] = state[2 * y];
      if (r === unreached) continue;
      // a(y) + sign·(limit - r(y)).
      state[2 * y] = sign * (within - r);
      state[2 * y + 1] = unreached;
    }
    this.#depth++;
  }

  /** Where to note `count` former potentials: a list, or all of them if that is hardly longer. */
  #record(count: number): Undo {
    const all = this.#state.length / 2, old = this.#undo[this.#depth];
    const numbers = (length: number) =>
      this.#state instanceof Int32Array ? new Int32Array(length) : new Float64Array(length);
    if (8 * count > all) {
      if (old !== undefined && old.faces === undefined) return old;
      return this.#undo[this.#depth] = { faces: undefined, former: numbers(all), count: all };
    }
    if (old?.faces !== undefined && old.faces.length >= count) {
      old.count = count;
      return old;
    }
    const undo = { faces: new Int32Array(2 * count), former: numbers(2 * count), count };
    return this.#undo[this.#depth] = undo;
  }

  /** Takes the last search back. */
  undo(): void {
    const { faces, former, count } = this.#undo[--this.#depth];
    for (let i = 0; i < count; i++) {
      this.#state[2 * (faces === undefined ? i : faces[i])] = former[i];
    }
  }
}

/** What a search changed. */
interface Undo {
  /** The faces whose former potentials stand in `former`; absent where that holds all of them. */
  readonly faces: Int32Array | undefined;
  readonly former: Int32Array | Float64Array;
  /** How many entries count. */
  count: number;
}
