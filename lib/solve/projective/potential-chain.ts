/**
 * Shortest paths on the sphere that use what earlier searches found. Each search sets up a potential
 * for the next, which then only looks at faces near the shortest paths; taking a search back costs
 * as much as it touched.
 *
 * A *potential* p has p(x) <= c(x→y) + p(y) on every arc, so d(x, z) >= p(x) - p(z), and Dijkstra's
 * method may run on the reduced costs c(x→y) + p(y) - p(x) >= 0. Suppose it runs from s and settles
 * the faces with reduced distance at most `limit`; write g(x) for their distances from s and
 * K = limit + p(s). On the sphere with all arcs reversed
 *
 *     p'(x) = min(g(x), K - p(x))
 *
 * is a potential again: g and K - p both are, and where x is not settled g(x) > K - p(x). So
 * searches alternate between going forward and backward. With p = ±a + constant, p' comes from a by
 * changing the sign and adding ±(limit - reduced distance) at the settled faces, nowhere else.
 */
import type { MonotoneQueue } from "../../graph/heap.ts";
import type { Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";

/** Reduced distances up to here, and sums of a few dozen of them, fit into 32 bits. */
export const NARROW_LIMIT = 1 << 25;

/** Thrown when distances pass what a chain with 32-bit integers can hold. */
export class TooWide extends Error {
  override readonly name = "TooWide";
}

/** A list of integers that grows. */
class Stack {
  items: Int32Array | Float64Array;
  size = 0;
  constructor(wide: boolean) {
    this.items = wide ? new Float64Array(1024) : new Int32Array(1024);
  }
  push(item: number): void {
    if (this.size === this.items.length) {
      const grown = this.items instanceof Int32Array
        ? new Int32Array(2 * this.size)
        : new Float64Array(2 * this.size);
      grown.set(this.items);
      this.items = grown;
    }
    this.items[this.size++] = item;
  }
}

export class PotentialChain {
  /** Length 2·pairs: the potential is sign·a + constant. */
  readonly #a: Int32Array | Float64Array;
  #sign = 1;
  /** Length 2·pairs: reduced distances of the last search, `#unreached` elsewhere. */
  readonly #key: Int32Array | Float64Array;
  readonly #unreached: number;
  readonly #ceiling: number;
  /** Faces touched by the last search, in any order. */
  readonly #touched = new Stack(false);
  #limit = 0;
  /** What `advance` has changed: faces with their former entries, and where each step begins. */
  readonly #changed = new Stack(false);
  readonly #former: Stack;
  readonly #steps: { changed: number }[] = [];

  /**
   * @param queue takes keys that differ by at most the largest reduced cost, which is at most the
   *   cost of going once around a vertex
   * @param wide hold distances in doubles rather than in 32-bit integers
   */
  constructor(readonly dual: DirectedDual, readonly queue: MonotoneQueue, wide: boolean) {
    const size = 2 * dual.pairs;
    this.#a = wide ? new Float64Array(size) : new Int32Array(size);
    this.#unreached = wide ? Infinity : 0x7fffffff;
    this.#ceiling = wide ? Number.MAX_SAFE_INTEGER / 64 : NARROW_LIMIT;
    this.#key = (wide ? new Float64Array(size) : new Int32Array(size)).fill(this.#unreached);
    this.#former = new Stack(wide);
  }

  /** Number of searches the potential stands on. The next search runs forward if it is even. */
  get depth(): number {
    return this.#steps.length;
  }

  /** A lower bound for the distance between x and its antipode. */
  bound(x: number): number {
    return Math.abs(this.#a[x] - this.#a[x ^ 1]);
  }

  /** The lift of x from which the next search must start for `bound(x)` to hold. */
  start(x: number): number {
    return this.#sign * (this.#a[x] - this.#a[x ^ 1]) >= 0 ? x : x ^ 1;
  }

  /**
   * Searches from a face, forward at even depth and backward at odd depth.
   *
   * @param source a face, as `start` gives it
   * @param limit largest reduced distance to settle
   * @param beyond once the antipode is settled, go on by no more than this
   * @returns the reduced distance to the antipode, `Infinity` if it is beyond the limit; the distance
   *   is this plus `bound(source)`
   * @throws {TooWide} when distances pass 32 bits in a narrow chain
   * @throws {Interrupted} when the meter runs out; the chain is of no further use then
   */
  search(source: number, limit: number, beyond: number, meter: Meter): number {
    const { offsets, ends, costs } = this.depth % 2 === 0 ? this.dual.out : this.dual.into;
    const a = this.#a, key = this.#key, queue = this.queue, touched = this.#touched;
    const sign = this.#sign, target = source ^ 1, ceiling = this.#ceiling;
    const unreached = this.#unreached;
    this.#forget();
    queue.clear();
    key[source] = 0;
    touched.push(source);
    queue.push(0, source);
    let found = Infinity, last = 0;
    for (let x = queue.pop(); x >= 0; x = queue.pop()) {
      const k = queue.key;
      if (k > limit) break;
      if (key[x] !== k) continue;
      last = k;
      if (k > ceiling) throw new TooWide("distances pass 32 bits");
      if (x === target) {
        found = k;
        if (k + beyond < limit) limit = k + beyond;
      }
      const flip = x & 1, base = k - sign * a[x], end = offsets[(x >> 1) + 1];
      const begin = offsets[x >> 1];
      for (let arc = begin; arc < end; arc++) {
        const y = ends[arc] ^ flip;
        const reached = base + costs[arc] + sign * a[y];
        const known = key[y];
        if (reached < known && reached <= limit) {
          if (known === unreached) touched.push(y);
          key[y] = reached;
          queue.push(reached, y);
        }
      }
      meter.tick(1 + end - begin);
    }
    this.#limit = limit === Infinity ? last : limit;
    return found;
  }

  /** The largest reduced distance that the last search settled for certain. */
  get limit(): number {
    return this.#limit;
  }

  /** Makes the last search the base of the next. */
  advance(): void {
    const a = this.#a, key = this.#key, limit = this.#limit, sign = this.#sign;
    const { items, size } = this.#touched;
    this.#steps.push({ changed: this.#changed.size });
    for (let i = 0; i < size; i++) {
      const x = items[i];
      if (key[x] >= limit) continue;
      this.#changed.push(x);
      this.#former.push(a[x]);
      a[x] += sign * (limit - key[x]);
    }
    this.#forget();
    this.#sign = -sign;
  }

  /** Takes the last `advance` back. */
  retreat(): void {
    const step = this.#steps.pop();
    if (step === undefined) throw new RangeError("no search to take back");
    const changed = this.#changed, former = this.#former;
    while (changed.size > step.changed) {
      this.#a[changed.items[--changed.size]] = former.items[--former.size];
    }
    this.#sign = -this.#sign;
  }

  /**
   * The edges crossed by a shortest path that the last search found, before `advance`.
   *
   * @param source where the search started; its antipode was settled
   * @returns edges of H in order from the antipode back to the source; an edge may stand twice
   */
  pathFrom(source: number): number[] {
    const { offsets, ends, costs, edges } = this.depth % 2 === 0 ? this.dual.into : this.dual.out;
    const a = this.#a, key = this.#key, sign = this.#sign;
    // Walk back along tight arcs; those of reduced cost 0 may lead in circles, so depth first.
    const seen = new Uint8Array(a.length);
    const path: number[] = [source ^ 1], taken: number[] = [], next: number[] = [];
    next.push(offsets[source >> 1]);
    seen[source ^ 1] = 1;
    while (path[path.length - 1] !== source) {
      const top = path.length - 1, y = path[top];
      if (top < 0) throw new Error("internal: a settled face without a tight path to it");
      if (next[top] === offsets[(y >> 1) + 1]) {
        path.pop();
        next.pop();
        taken.pop();
        continue;
      }
      const arc = next[top]++, x = ends[arc] ^ (y & 1);
      if (seen[x] !== 0 || key[x] === this.#unreached) continue;
      if (key[x] + costs[arc] + sign * (a[y] - a[x]) !== key[y]) continue;
      seen[x] = 1;
      path.push(x);
      taken.push(edges[arc]);
      next.push(offsets[x >> 1]);
    }
    return taken;
  }

  #forget(): void {
    const { items, size } = this.#touched, key = this.#key;
    for (let i = 0; i < size; i++) key[items[i]] = this.#unreached;
    this.#touched.size = 0;
  }
}
