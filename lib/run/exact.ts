/** Exact sums: integers below 2^53 in size, refused rather than rounded. */

/**
 * Adds up integers exactly.
 *
 * @param values integers below 2^53 in size
 * @returns their sum
 * @throws {RangeError} when the sum, or a partial sum, leaves the exact range. O(n) time.
 */
export function exactSum(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum = exactAdd(sum, values[i]);
  return sum;
}

/** Adds two integers exactly. @throws {RangeError} when the sum leaves the range below 2^53 */
export function exactAdd(a: number, b: number): number {
  const sum = a + b;
  if (!Number.isSafeInteger(sum)) {
    throw new RangeError(`${a} + ${b} is not an integer below 2^53 in size`);
  }
  return sum;
}
