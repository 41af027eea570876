/** The largest subdeterminant of a small matrix, by computing every minor exactly. */

/**
 * @param rows a matrix of small integers, at most about 9 × 9
 * @returns the largest absolute value of a square submatrix's determinant. Exact: Bareiss'
 *   elimination without fractions (E. Bareiss, Math. of Computation 22, 1968) in integers.
 */
export function largestSubdeterminant(rows: readonly (readonly number[])[]): number {
  const m = rows.length, n = m === 0 ? 0 : rows[0].length;
  let best = 0;
  for (let k = 1; k <= Math.min(m, n); k++) {
    for (const I of subsets(m, k)) {
      for (const J of subsets(n, k)) {
        best = Math.max(best, Math.abs(determinant(I.map((i) => J.map((j) => rows[i][j])))));
      }
    }
  }
  return best;
}

/** The determinant of a square matrix of small integers, exactly; the matrix is overwritten. */
export function determinant(a: number[][]): number {
  const n = a.length;
  let sign = 1, before = 1;
  for (let k = 0; k + 1 < n; k++) {
    if (a[k][k] === 0) {
      const swap = a.findIndex((row, i) => i > k && row[k] !== 0);
      if (swap < 0) return 0;
      [a[k], a[swap]] = [a[swap], a[k]];
      sign = -sign;
    }
    for (let i = k + 1; i < n; i++) {
      for (let j = k + 1; j < n; j++) {
        a[i][j] = (a[i][j] * a[k][k] - a[i][k] * a[k][j]) / before;
      }
    }
    before = a[k][k];
  }
  return sign * a[n - 1][n - 1];
}

function subsets(n: number, k: number): number[][] {
  const found: number[][] = [];
  const grow = (from: number, taken: number[]): void => {
    if (taken.length === k) {
      found.push([...taken]);
      return;
    }
    for (let i = from; i < n; i++) grow(i + 1, [...taken, i]);
  };
  grow(0, []);
  return found;
}
