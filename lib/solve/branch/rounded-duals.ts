/**
 * Exact bounds from floating-point multipliers. Multipliers are rounded to multiples of 1/D, D a
 * power of two, and the bound they prove is then computed in exact integers: whatever the rounding
 * did, the bound is valid.
 */

/** Largest denominator, and the size that D·(heaviest weight) may reach. */
const FINEST = 2 ** 20;
const ROOM = 2 ** 44;

/** The denominator for weights up to `heaviest`: a power of two from 1 to 2^20. */
export function denominatorFor(heaviest: number): number {
  let denominator = 1;
  while (denominator < FINEST && 2 * denominator * heaviest <= ROOM) denominator *= 2;
  return denominator;
}

/**
 * A sum of integers, each below 2^53 in size, over a common denominator: kept as a whole part and a
 * remainder, so that it stays exact beyond 2^53.
 */
export class FractionSum {
  #whole = 0;
  #rest = 0;
  readonly #denominator: number;

  /** @param denominator a power of two */
  constructor(denominator: number) {
    this.#denominator = denominator;
  }

  /** Adds numerator / denominator. */
  add(numerator: number): void {
    const whole = Math.floor(numerator / this.#denominator);
    this.#whole += whole;
    this.#rest += numerator - whole * this.#denominator;
  }

  /** The sum rounded down; Infinity when it has left the exact range. */
  get floor(): number {
    const sum = this.#whole + Math.floor(this.#rest / this.#denominator);
    return Number.isSafeInteger(this.#whole) && Number.isSafeInteger(sum) &&
        this.#rest < Number.MAX_SAFE_INTEGER
      ? sum
      : Infinity;
  }
}
