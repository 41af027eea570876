/**
 * Repeats the searches of a proof and reads off what distances they prove. The searches stand in a
 * tree; each uses the potential its parent left, and what it changes is undone for its siblings.
 *
 * A potential p has p(x) <= c(x→y) + p(y) on every arc, so d(x, z) >= p(x) - p(z). The first is 0.
 * Dijkstra's method from s on the reduced costs c(x→y) + p(y) - p(x) >= 0 settles the faces whose
 * reduced distance r(x) is at most `limit`; their distance from s is r(x) - p(x) + p(s). Then
 *
 *     p'(x) = limit + p(s) - p(x) - max(0, limit - r(x))
 *
 * is a potential once all arcs are reversed: it is the smaller of two, the distance from s and
 * limit + p(s) - p. So the searches alternate between the two directions. As swapping the sheets
 * keeps arcs and costs, d(x, x̄) = d(x̄, x) in both directions, and every potential proves
 * d(x, x̄) >= |p(x) - p(x̄)|. For s itself this is d(s, s̄), if s̄ was settled.
 */
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../graph/heap.ts";
import type { ProjectiveProof } from "./certificate.ts";
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
  const sphere = new Searches(dual, span);
  for (let i = 0; i < starts.length; i++) {
    const where = `projective, search ${i}`;
    const start = sources[starts[i]];
    if (start === undefined) {
      throw new Rejected(
        `${where}: expected a source from 0 to ${sources.length - 1}, got ${starts[i]}`,
      );
    }
    const depth = requireMultiplier(depths[i], `${where}, depth`);
    const limit = requireMultiplier(limits[i], `${where}, limit`);
    if (depth > sphere.depth || depth >= MOST_DEPTH) {
      throw new Rejected(`${where}: depth ${depth} without a search above it`);
    }
    if (limit > MOST_LIMIT) throw new Rejected(`${where}: limit ${limit} is too large`);
    while (sphere.depth > depth) sphere.undo();
    sphere.search(start, limit, where);
    for (let j = 0; j < sources.length; j++) {
      const distance = sphere.difference(sources[j]);
      if (distance > proven[j]) proven[j] = distance;
    }
  }
  return proven;
}

class Searches {
  /** The potential is sign·a + constant. */
  readonly #a: Float64Array;
  #sign = 1;
  /** Reduced distances of the search at work; `Infinity` outside of it. */
  readonly #reduced: Float64Array;
  readonly #queue: MonotoneQueue;
  /** For each search: the faces it changed and what their entries were. */
  readonly #done: { faces: Int32Array; former: Float64Array }[] = [];
  #touched: Int32Array;

  constructor(readonly dual: SphereDual, span: number) {
    const faces = 2 * dual.pairs;
    this.#a = new Float64Array(faces);
    this.#reduced = new Float64Array(faces).fill(Infinity);
    this.#touched = new Int32Array(faces);
    this.#queue = span <= MOST_BUCKETS ? new BucketQueue(span) : new HeapQueue();
  }

  get depth(): number {
    return this.#done.length;
  }

  /** What the potential proves for the distance between x and its antipode. */
  difference(x: number): number {
    return Math.abs(this.#a[x] - this.#a[x ^ 1]);
  }

  search(start: number, limit: number, where: string): void {
    const { offsets, ends, costs } = this.depth % 2 === 0 ? this.dual.out : this.dual.into;
    const a = this.#a, reduced = this.#reduced, queue = this.#queue, touched = this.#touched;
    const sign = this.#sign;
    // From the lift for which the potential at hand says more; if both are equal, the one named.
    const source = sign * (a[start] - a[start ^ 1]) >= 0 ? start : start ^ 1;
    let count = 0, settled = 0, last = 0;
    queue.clear();
    reduced[source] = 0;
    touched[count++] = source;
    queue.push(0, source);
    for (let x = queue.pop(); x >= 0; x = queue.pop()) {
      const r = queue.key;
      if (reduced[x] !== r) continue;
      if (r < last) throw new Error("internal: the queue is out of order");
      last = r;
      settled++;
      const flip = x & 1, base = r - sign * a[x], row = x >> 1;
      for (let arc = offsets[row]; arc < offsets[row + 1]; arc++) {
        const y = ends[arc] ^ flip, reached = base + costs[arc] + sign * a[y];
        if (reached < r) throw new Error(`internal: ${where}: not a potential`);
        if (reached > limit || reached >= reduced[y]) continue;
        if (reduced[y] === Infinity) touched[count++] = y;
        reduced[y] = reached;
        queue.push(reached, y);
      }
    }
    // Every face within the limit was settled with its final value, whatever the queue did.
    if (settled !== count) throw new Error("internal: the queue lost a face");
    const faces = touched.slice(0, count), former = new Float64Array(count);
    for (let i = 0; i < count; i++) {
      const x = faces[i];
      former[i] = a[x];
      a[x] += sign * (limit - reduced[x]);
      reduced[x] = Infinity;
    }
    this.#done.push({ faces, former });
    this.#sign = -sign;
  }

  /** Takes the last search back. */
  undo(): void {
    const { faces, former } = this.#done.pop()!;
    for (let i = 0; i < faces.length; i++) this.#a[faces[i]] = former[i];
    this.#sign = -this.#sign;
  }
}
