/** Sorting pairs of small integers, by counting: O(n + m) time, two passes. */

/**
 * The order of pairs by first and then second entry; equal pairs keep their order.
 *
 * @param n all entries are from 0 to n - 1
 * @param first length m
 * @param second length m
 * @returns length m, the places of the pairs in sorted order
 */
export function sortPairs(n: number, first: Int32Array, second: Int32Array): Int32Array {
  const identity = Int32Array.from(first, (_, i) => i);
  return sortBy(n, first, sortBy(n, second, identity));
}

function sortBy(n: number, key: Int32Array, places: Int32Array): Int32Array {
  const next = new Int32Array(n + 1);
  for (const i of places) next[key[i] + 1]++;
  for (let k = 0; k < n; k++) next[k + 1] += next[k];
  const sorted = new Int32Array(places.length);
  for (const i of places) sorted[next[key[i]]++] = i;
  return sorted;
}
