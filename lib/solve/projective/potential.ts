/**
 * Shortest paths on the sphere that use what earlier searches found: each search improves a potential,
 * and the next one only looks at faces near the shortest paths. Taking a search back costs as much as
 * it touched.
 *
 * A *potential* a has a(x) <= c(x→y) + a(y) on every arc, so d(x, z) >= a(x) - a(z), and the *reduced
 * costs* c(x→y) + a(y) - a(x) are not negative. For a face s write r(x) for the reduced distance from
 * s, which is d(s, x) + a(x) - a(s). Raising a(x) by max(0, limit - r(x)) everywhere keeps it a
 * potential, since r(y) is at most r(x) plus the reduced cost of x→y. It raises a(s) by `limit`, and
 * a(s̄) not at all if s̄ is that far away: so d(s, s̄) >= a(s) - a(s̄) is as good as can be. Going
 * backward, against the arcs, and lowering a(x) likewise serves the target instead of the source. The
 * two directions take turns: where a search has gone forward the potential is exact from its source
 * on, and a search backward from a target nearby stays close to the shortest paths.
 *
 * The search itself is Dijkstra's on the costs, leaving out faces with r(x) > limit: r does not fall
 * along a path, so no path to a face within the limit is lost. Taking faces by d(s, x) and not by r(x)
 * they come as one front, which memory likes: many times faster than the jumps from plateau to plateau
 * of r.
 */
import type { MonotoneQueue } from "../../graph/heap.ts";
import type { Meter } from "../../run/meter.ts";
import type { Arcs, DirectedDual } from "./directed-dual.ts";

/** Distances up to here, and sums of a few dozen of them, fit into 32 bits. */
export const NARROW_LIMIT = 1 << 25;
/** Arcs scanned between two ticks of the meter. */
const UNITS_PER_TICK = 4096;

/** Thrown when distances pass what a potential in 32-bit integers can hold. */
export class TooWide extends Error {
  override readonly name = "TooWide";
}

export class Potential {
  /**
   * Length 4·pairs: for face x the potential a(x) at 2x, and at 2x + 1 its distance in the last search,
   * `#unreached` if it was not touched. Side by side, so that both come with one look.
   */
  readonly #state: Int32Array | Float64Array;
  readonly #unreached: number;
  readonly #ceiling: number;
  /** The faces touched by the last search are the first `#touchedCount` here; length 2·pairs. */
  readonly #touched: Int32Array;
  #touchedCount = 0;
  #limit = 0;
  #source = 0;
  /** How to take back each `advance`, the last one last. */
  readonly #undo: Undo[] = [];
  /** Records of the same depth use the same arrays again. */
  readonly #spare: Undo[] = [];
  readonly #out: PackedArcs;
  readonly #into: PackedArcs;

  /**
   * @param queue takes keys that differ by at most the largest cost
   * @param wide hold distances in doubles rather than in 32-bit integers
   */
  constructor(readonly dual: DirectedDual, readonly queue: MonotoneQueue, readonly wide: boolean) {
    const faces = 2 * dual.pairs;
    this.#unreached = wide ? Infinity : 0x7fffffff;
    this.#ceiling = wide ? Number.MAX_SAFE_INTEGER / 64 : NARROW_LIMIT;
    this.#state = this.#numbers(2 * faces);
    for (let x = 0; x < faces; x++) this.#state[2 * x + 1] = this.#unreached;
    this.#touched = new Int32Array(faces);
    this.#out = this.#packed(dual.out);
    this.#into = this.#packed(dual.into);
  }

  /** Number of searches the potential stands on; the next runs forward if it is even. */
  get depth(): number {
    return this.#undo.length;
  }

  /** The largest reduced distance up to which the last search is complete. */
  get limit(): number {
    return this.#limit;
  }

  /** A lower bound for the distance between x and its antipode, which is the same both ways. */
  bound(x: number): number {
    return Math.abs(this.#state[2 * x] - this.#state[2 * (x ^ 1)]);
  }

  /**
   * Runs a search for the good of one face: forward from the lift from which `bound` holds (x itself if
   * it holds both ways), or backward from that lift's antipode. Then `advance` improves the potential.
   *
   * @param x a face
   * @param most largest reduced distance wanted; `Infinity` for the whole sphere, at depth 0 only
   * @param beyond once the antipode is reached, go on by no more than this
   * @returns the distance between x and its antipode, `Infinity` if it is beyond the limit
   * @throws {TooWide} when distances pass 32 bits and the potential is not wide
   * @throws {Interrupted} when the meter runs out; the potential is of no further use then
   */
  search(x: number, most: number, beyond: number, meter: Meter): number {
    if (!this.wide && most !== Infinity && most > NARROW_LIMIT) {
      throw new TooWide(`a limit of ${most} passes 32 bits`);
    }
    const backward = this.depth % 2 === 1;
    const { offsets, entries } = backward ? this.#into : this.#out;
    const state = this.#state, touched = this.#touched, queue = this.queue;
    const source = (state[2 * x] >= state[2 * (x ^ 1)]) === backward ? x ^ 1 : x;
    const target = source ^ 1, ceiling = this.#ceiling, unreached = this.#unreached;
    this.#forget();
    this.#source = source;
    queue.clear();
    state[2 * source + 1] = 0;
    touched[0] = source;
    queue.push(0, source);
    const sign = backward ? -1 : 1;
    // A face y is within the limit if d(y) + sign·a(y) <= within.
    let limit = most, within = limit + sign * state[2 * source];
    let found = Infinity, furthest = 0, count = 1, work = 0;
    for (let near = queue.pop(); near >= 0; near = queue.pop()) {
      const d = queue.key, at = sign * state[2 * near];
      if (state[2 * near + 1] !== d || d + at > within) continue;
      if (d > ceiling) throw new TooWide("distances pass 32 bits");
      if (near === target) {
        found = d;
        if (d + at + beyond < within) {
          within = d + at + beyond;
          limit = within - sign * state[2 * source];
        }
      }
      if (d + at > furthest) furthest = d + at;
      const flip = near & 1, end = 2 * offsets[(near >> 1) + 1];
      for (let arc = 2 * offsets[near >> 1]; arc < end; arc += 2) {
        const far = entries[arc] ^ flip, reached = d + entries[arc + 1];
        const known = state[2 * far + 1];
        if (reached < known && reached + sign * state[2 * far] <= within) {
          if (known === unreached) touched[count++] = far;
          state[2 * far + 1] = reached;
          queue.push(reached, far);
        }
        work++;
      }
      if (work >= UNITS_PER_TICK) {
        meter.tick(work);
        work = 0;
      }
    }
    meter.tick(work);
    this.#touchedCount = count;
    // Without a limit the potential was 0 and every face was reached.
    this.#limit = limit === Infinity ? furthest : limit;
    return found;
  }

  /** Improves the potential by the last search, to the good of its source. */
  advance(): void {
    const state = this.#state, touched = this.#touched, unreached = this.#unreached;
    const sign = this.depth % 2 === 1 ? -1 : 1;
    const within = this.#limit + sign * state[2 * this.#source];
    const undo = this.#record(this.#touchedCount);
    const { faces, former } = undo;
    if (faces === undefined) {
      // In the order of memory, not of the search.
      for (let x = 0; x < former.length; x++) {
        const d = state[2 * x + 1], now = state[2 * x];
        former[x] = now;
        if (d === unreached) continue;
        state[2 * x + 1] = unreached;
        const raised = sign * (within - d);
        if (sign * (raised - now) > 0) state[2 * x] = raised;
      }
    } else {
      for (let i = 0; i < this.#touchedCount; i++) {
        const x = touched[i], d = state[2 * x + 1], now = state[2 * x];
        faces[i] = x;
        former[i] = now;
        state[2 * x + 1] = unreached;
        const raised = sign * (within - d);
        if (sign * (raised - now) > 0) state[2 * x] = raised;
      }
    }
    this.#touchedCount = 0;
    this.#undo.push(undo);
  }

  /** Takes the last `advance` back. */
  retreat(): void {
    const undo = this.#undo.pop();
    if (undo === undefined) throw new RangeError("no search to take back");
    const state = this.#state, { faces, former, count } = undo;
    if (faces === undefined) {
      for (let x = 0; x < former.length; x++) state[2 * x] = former[x];
    } else {
      for (let i = 0; i < count; i++) state[2 * faces[i]] = former[i];
    }
  }

  /** Arrays to write `count` former values down in: a list, or the whole if that is no longer. */
  #record(count: number): Undo {
    const spare = this.#spare[this.depth], all = this.#state.length / 2;
    if (count > all / SPARSE) {
      if (spare !== undefined && spare.faces === undefined) return spare;
      return this.#spare[this.depth] = { faces: undefined, former: this.#numbers(all), count: all };
    }
    if (spare?.faces !== undefined && spare.faces.length >= count) {
      spare.count = count;
      return spare;
    }
    const size = Math.min(2 * count, Math.ceil(all / SPARSE));
    const undo = { faces: new Int32Array(size), former: this.#numbers(size), count };
    return this.#spare[this.depth] = undo;
  }

  /**
   * The edges crossed by a shortest path between the source of the last search and its antipode, which
   * it has reached; before `advance`.
   *
   * @returns edges of H, one for each crossing
   */
  path(): number[] {
    const backward = this.depth % 2 === 1;
    const { offsets, ends, costs, edges } = backward ? this.dual.out : this.dual.into;
    const state = this.#state, source = this.#source;
    // Walk back along tight arcs; those of cost 0 may lead in circles, so depth first.
    const seen = new Uint8Array(2 * this.dual.pairs);
    const path: number[] = [source ^ 1], crossed: number[] = [];
    const next: number[] = [offsets[source >> 1]];
    seen[source ^ 1] = 1;
    while (path[path.length - 1] !== source) {
      const top = path.length - 1, y = path[top];
      if (top < 0) throw new Error("internal: a face was reached without a path to it");
      if (next[top] === offsets[(y >> 1) + 1]) {
        path.pop();
        next.pop();
        crossed.pop();
        continue;
      }
      const arc = next[top]++, x = ends[arc] ^ (y & 1);
      if (seen[x] !== 0 || state[2 * x + 1] === this.#unreached) continue;
      if (state[2 * x + 1] + costs[arc] !== state[2 * y + 1]) continue;
      seen[x] = 1;
      path.push(x);
      crossed.push(edges[arc]);
      next.push(offsets[x >> 1]);
    }
    return crossed;
  }

  #forget(): void {
    for (let i = 0; i < this.#touchedCount; i++) {
      this.#state[2 * this.#touched[i] + 1] = this.#unreached;
    }
    this.#touchedCount = 0;
  }

  #numbers(length: number): Int32Array | Float64Array {
    return this.wide ? new Float64Array(length) : new Int32Array(length);
  }

  #packed({ offsets, ends, costs }: Arcs): PackedArcs {
    const entries = this.#numbers(2 * ends.length);
    for (let arc = 0; arc < ends.length; arc++) {
      entries[2 * arc] = ends[arc];
      entries[2 * arc + 1] = costs[arc];
    }
    return { offsets, entries };
  }
}

/** Searches that touch less than this fraction of the sphere note what they touched; others all. */
const SPARSE = 8;

/** What a search changed. */
interface Undo {
  /** The faces whose former potentials stand in `former`; absent where that holds all of them. */
  readonly faces: Int32Array | undefined;
  readonly former: Int32Array | Float64Array;
  /** How many of the entries count. */
  count: number;
}

/** Arcs with end and cost side by side. */
interface PackedArcs {
  /** As in `Arcs`. */
  readonly offsets: Int32Array;
  /** Length 2m: for arc i its end at 2i and its cost at 2i + 1. */
  readonly entries: Int32Array | Float64Array;
}
