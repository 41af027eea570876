/**
 * Pairs of points at most a given distance apart: points are sorted into square columns of that
 * width along z, and each is compared with the nearby stretch of its own column and of the columns
 * next to it. O(n log n + k) time, k within a constant factor of the pairs found unless points
 * cluster just outside each other's reach.
 */

/** Points in space. */
export interface Points {
  /** Length n, finite. */
  readonly x: Float64Array;
  /** Length n, finite. */
  readonly y: Float64Array;
  /** Length n, finite. */
  readonly z: Float64Array;
}

/**
 * Reports each pair once.
 *
 * @param points n points
 * @param reach greatest distance, >= 0
 * @param found called with i < j and their distance, in an order that depends on the input alone
 */
export function closePairs(
  points: Points,
  reach: number,
  found: (i: number, j: number, distance: number) => void,
): void {
  const { x, y, z } = points;
  const n = x.length;
  // A little wider than the reach, so that rounding never puts a pair two columns apart.
  const width = reach * (1 + 1e-9);
  const column = (value: number) => width > 0 ? Math.floor(value / width) : value;
  const cx = x.map(column), cy = y.map(column);
  const order = Int32Array.from(x, (_, i) => i)
    .sort((i, j) => cx[i] - cx[j] || cy[i] - cy[j] || z[i] - z[j] || i - j);

  /** First place of each column in `order`, by cx and then cy. */
  const firstOf = new Map<number, Map<number, number>>();
  const starts: number[] = [];
  for (let at = 0; at < n; at++) {
    const i = order[at], before = order[at - 1];
    if (at > 0 && cx[i] === cx[before] && cy[i] === cy[before]) continue;
    let line = firstOf.get(cx[i]);
    if (line === undefined) firstOf.set(cx[i], line = new Map());
    line.set(cy[i], starts.length);
    starts.push(at);
  }
  starts.push(n);

  const compare = (i: number, j: number) => {
    const dx = x[i] - x[j], dy = y[i] - y[j], dz = z[i] - z[j];
    const distance = Math.hypot(dx, dy, dz);
    if (distance <= reach) found(Math.min(i, j), Math.max(i, j), distance);
  };
  for (let c = 0; c + 1 < starts.length; c++) {
    const [from, to] = [starts[c], starts[c + 1]];
    for (let at = from; at < to; at++) {
      for (let next = at + 1; next < to && z[order[next]] - z[order[at]] <= width; next++) {
        compare(order[at], order[next]);
      }
    }
    const [ux, uy] = [cx[order[from]], cy[order[from]]];
    const steps = [[0, 1], [1, -1], [1, 0], [1, 1]];
    for (const [stepX, stepY] of width > 0 ? steps : []) {
      const other = firstOf.get(ux + stepX)?.get(uy + stepY);
      if (other === undefined || other === c) continue;
      let low = starts[other];
      const end = starts[other + 1];
      for (let at = from; at < to; at++) {
        const i = order[at];
        while (low < end && z[order[low]] < z[i] - width) low++;
        for (let p = low; p < end && z[order[p]] <= z[i] + width; p++) compare(i, order[p]);
      }
    }
  }
}
