/** Seeded random numbers: the same seed gives the same sequence on every machine. */

/**
 * The generator "sfc32" (small fast counting, from the PractRand suite by C. Doty-Humphrey; written
 * from memory), seeded through a 32-bit mixer. Period at least 2^32. Not for secrets.
 *
 * @example
 * ```ts
 * import { Random } from "./random.ts";
 * const a = new Random(7), b = new Random(7);
 * console.assert(a.below(1000) === b.below(1000));
 * ```
 */
export class Random {
  #a: number;
  #b: number;
  #c: number;
  #d = 1;

  /** Starts the sequence of a seed. @param seed an integer below 2^53 in size */
  constructor(seed: number) {
    this.#a = seed | 0;
    this.#b = Math.floor(seed / 4294967296) | 0;
    this.#c = 0x9e3779b9 | 0;
    for (let i = 0; i < 16; i++) this.bits();
  }

  /** 32 random bits, as an integer from -2^31 to 2^31 - 1. */
  bits(): number {
    const t = (((this.#a + this.#b) | 0) + this.#d) | 0;
    this.#d = (this.#d + 1) | 0;
    this.#a = this.#b ^ (this.#b >>> 9);
    this.#b = (this.#c + (this.#c << 3)) | 0;
    this.#c = (((this.#c << 21) | (this.#c >>> 11)) + t) | 0;
    return t;
  }

  /** A number from 0 inclusive to 1 exclusive, a multiple of 2^-32. */
  unit(): number {
    return (this.bits() >>> 0) / 4294967296;
  }

  /** An integer from 0 to n - 1, for 1 <= n <= 2^32. */
  below(n: number): number {
    return Math.floor(this.unit() * n);
  }

  /** Puts the entries into random order, in place (Fisher and Yates). */
  shuffle<T extends { length: number; [i: number]: unknown }>(list: T): T {
    for (let i = list.length - 1; i > 0; i--) {
      const j = this.below(i + 1);
      const kept = list[i];
      list[i] = list[j];
      list[j] = kept;
    }
    return list;
  }
}
