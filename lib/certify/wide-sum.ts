/**
 * A running sum of integers that may pass 2^53, kept as two exact halves so that adding stays a
 * matter of nanoseconds; only the final reading makes a bigint. Up to 2^20 times 2^53 fits, beside
 * single integers of any size, which are added up as bigints.
 */
const LOW = 4294967296; // 2^32

export class WideSum {
  #high = 0;
  #low = 0;
  #wide = 0n;

  /** Adds an integer below 2^53 in size. */
  add(value: number): void {
    const high = Math.floor(value / LOW);
    this.#high += high;
    this.#low += value - high * LOW;
    if (this.#low >= LOW) {
      this.#low -= LOW;
      this.#high++;
    }
  }

  /** Adds any integer. */
  addWide(value: bigint): void {
    this.#wide += value;
  }

  /** The exact sum. */
  get value(): bigint {
    return BigInt(this.#high) * BigInt(LOW) + BigInt(this.#low) + this.#wide;
  }
}
