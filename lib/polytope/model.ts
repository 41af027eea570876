/**
 * Linear models as arrays: maximise cost·x subject to rows a·x <= upper and bounds on the columns.
 * Plain typed arrays only, so that a model can be posted to a worker.
 */

/** Rows in compressed form, each an inequality Σ value·x(index) <= upper. */
export interface Rows {
  /** Length rows + 1, from 0 to the number of entries. */
  readonly starts: Int32Array;
  /** Column of each entry. */
  readonly indices: Int32Array;
  /** Coefficient of each entry. */
  readonly values: Float64Array;
  /** Length rows: right-hand sides. */
  readonly upper: Float64Array;
}

/** Maximise cost·x over the rows and 0 <= lower <= x <= upper. */
export interface LinearModel {
  /** Length columns. */
  readonly cost: Float64Array;
  /** Length columns, finite. */
  readonly lower: Float64Array;
  readonly upper: Float64Array;
  readonly rows: Rows;
  /** Whether every column must be an integer. */
  readonly integer: boolean;
}

/**
 * Rows with coefficients 1.
 *
 * @param sets the columns of each row
 * @param upper right-hand side of each row; 1 for all if absent
 */
export function rowsOfSets(sets: readonly ArrayLike<number>[], upper?: ArrayLike<number>): Rows {
  const starts = new Int32Array(sets.length + 1);
  sets.forEach((set, i) => starts[i + 1] = starts[i] + set.length);
  const indices = new Int32Array(starts[sets.length]);
  sets.forEach((set, i) => {
    for (let k = 0; k < set.length; k++) indices[starts[i] + k] = set[k];
  });
  return {
    starts,
    indices,
    values: new Float64Array(indices.length).fill(1),
    upper: upper === undefined
      ? new Float64Array(sets.length).fill(1)
      : Float64Array.from({ length: sets.length }, (_, i) => upper[i]),
  };
}

/**
 * The stable set problem of a graph: 0/1 columns, one row for each set of pairwise adjacent vertices.
 *
 * @param weights length n
 * @param cliques cliques that cover every edge
 * @param integer false for the relaxation
 */
export function stableSetModel(
  weights: Float64Array,
  cliques: readonly ArrayLike<number>[],
  integer: boolean,
): LinearModel {
  return {
    cost: weights.slice(),
    lower: new Float64Array(weights.length),
    upper: new Float64Array(weights.length).fill(1),
    rows: rowsOfSets(cliques),
    integer,
  };
}
