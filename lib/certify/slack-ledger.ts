/**
 * Keeps the bound of a set of terms exact while vertices leave and return and multipliers change:
 *
 *     Σ_terms λ·rhs + Σ_{v in S} max(0, D·w(v) - load(v)),   load(v) = Σ_{terms with v} λ,
 *
 * D being the common denominator of the multipliers. Each change costs O(1) for a vertex.
 */
import { Rejected } from "./rejected.ts";
import type { Play } from "./play.ts";
import { WideSum } from "./wide-sum.ts";

const IN = 1, TOUCHED = 2;

export class SlackLedger {
  readonly #play: Play;
  readonly #denominator: number;
  /** For each vertex the sum of IN, while it is in play, and TOUCHED, once it has had a load. */
  readonly #state: Uint8Array;
  readonly #load: Float64Array;
  readonly #sum = new WideSum();
  /** The vertices that are TOUCHED. */
  readonly #touched: number[] = [];
  #count = 0;

  /**
   * @param play the graph and its weights; its vertices are in play at first
   * @param denominator the common denominator of the multipliers, an integer >= 1
   */
  constructor(play: Play, denominator: number) {
    this.#play = play;
    this.#denominator = denominator;
    this.#state = play.scratch.state;
    this.#load = play.scratch.load;
    for (let i = 0; i < play.vertices.length; i++) this.enter(play.vertices[i]);
  }

  /** Gives the scratch arrays back, all zero; the ledger is of no use afterwards. */
  release(): void {
    for (let i = 0; i < this.#play.vertices.length; i++) this.#state[this.#play.vertices[i]] = 0;
    for (const v of this.#touched) this.#state[v] = this.#load[v] = 0;
  }

  /** How many vertices are in play. */
  get count(): number {
    return this.#count;
  }

  has(v: number): boolean {
    return (this.#state[v] & IN) !== 0;
  }

  /** Brings a vertex in that is out. */
  enter(v: number): void {
    this.#state[v] |= IN;
    this.#count++;
    this.#addRoom(v, 1);
  }

  /** Takes a vertex out that is in. */
  leave(v: number): void {
    this.#state[v] &= ~IN;
    this.#count--;
    this.#addRoom(v, -1);
  }

  /**
   * Changes the multiplier of a term by `change`.
   *
   * @throws {Rejected} when the multipliers at one vertex add up to more than 2^53
   */
  changeTerm(vertices: ArrayLike<number>, rhs: number, change: number): void {
    for (let i = 0; i < vertices.length; i++) {
      const v = vertices[i];
      const load = this.#load[v] + change;
      if ((this.#state[v] & TOUCHED) === 0) {
        this.#state[v] |= TOUCHED;
        this.#touched.push(v);
      }
      if (!Number.isSafeInteger(load)) {
        throw new Rejected(`multipliers at ${this.#play.nameOf(v)} add up to more than 2^53`);
      }
      if (this.has(v)) {
        this.#addRoom(v, -1);
        this.#load[v] = load;
        this.#addRoom(v, 1);
      } else {
        this.#load[v] = load;
      }
    }
    const product = change * rhs;
    if (Number.isSafeInteger(product)) this.#sum.add(product);
    else this.#sum.addWide(BigInt(change) * BigInt(rhs));
  }

  /** Adds to the sum of the terms, for a right-hand side that changed. Below 2^53 in size. */
  changeTotal(change: number): void {
    this.#sum.add(change);
  }

  /** The bound for the vertices in play, rounded down to an integer. */
  get bound(): bigint {
    return this.#sum.value / BigInt(this.#denominator);
  }

  /** Adds or takes away max(0, D·w(v) - load(v)). */
  #addRoom(v: number, sign: 1 | -1): void {
    const weight = this.#play.weights[v];
    if (weight <= 0) return;
    const scaled = weight * this.#denominator;
    if (scaled <= Number.MAX_SAFE_INTEGER) {
      const room = scaled - this.#load[v];
      if (room > 0) this.#sum.add(sign * room);
      return;
    }
    const room = BigInt(weight) * BigInt(this.#denominator) - BigInt(this.#load[v]);
    if (room > 0n) this.#sum.addWide(BigInt(sign) * room);
  }
}
