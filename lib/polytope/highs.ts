/**
 * The call of HiGHS, in this thread. HiGHS computes in floating point: nothing it says is a proof.
 * Loading takes 15 to 90 ms, once for each thread.
 */
import loader from "highs";
import type { LinearModel } from "./model.ts";

/** The loaded runtime. */
export type Highs = Awaited<ReturnType<typeof loader.default>>;
/** What `createModel` makes; to be disposed of. */
export type HighsModel = ReturnType<Highs["createModel"]>;

/** Ways to end early that are no failure. */
const STOPPED = ["interrupted", "timeLimit", "iterationLimit", "solutionLimit"] as const;

let loaded: Promise<Highs> | undefined;

/** Loads HiGHS, or returns what has been loaded. */
export function loadHighs(): Promise<Highs> {
  return loaded ??= (loader as unknown as typeof loader.default)();
}

/** The arrays of a model as HiGHS takes them. */
export function highsData(highs: Highs, model: LinearModel): Parameters<Highs["createModel"]>[0] {
  const { cost, lower, upper, rows, integer } = model;
  const numCols = cost.length, numRows = rows.upper.length;
  return {
    numCols,
    numRows,
    sense: highs.constants.objectiveSense.maximize,
    colCost: cost,
    colLower: lower,
    colUpper: upper,
    rowLower: new Float64Array(numRows).fill(-highs.infinity),
    rowUpper: rows.upper,
    matrix: {
      format: "csr",
      numRows,
      numCols,
      starts: rows.starts,
      indices: rows.indices,
      values: rows.values,
    },
    ...(integer ? { integrality: new Int32Array(numCols).fill(1) } : {}),
  };
}

/** How a run ended. */
export interface HighsOutcome {
  readonly status: "optimal" | "interrupted" | "failed";
  /** Value of `x`; -Infinity when there is none. */
  readonly value: number;
  /** Upper bound in floating point; Infinity when there is none. */
  readonly bound: number;
  /** Length columns, as HiGHS left it, not rounded; absent when no point was found. */
  readonly x?: Float64Array;
  readonly nodes: number;
}

/** What may be watched or set during a run. */
export interface HighsOptions {
  readonly seed?: number;
  /** Milliseconds; HiGHS looks at its clock itself, not very often. */
  readonly timeLimitMs?: number;
  /** Most nodes of its search tree. */
  readonly nodeLimit?: number;
  /** Integer optima are searched for up to this difference, in units of the cost; 1e-6 if absent. */
  readonly absoluteGap?: number;
  /** A point to begin with; length columns. */
  readonly start?: Float64Array;
  /** Asked now and then, sometimes only once a second; true ends the run. */
  readonly shouldStop?: () => boolean;
  /** Called with each better integer point and the bound at that time. */
  readonly onPoint?: (x: Float64Array, bound: number) => void;
  /** Called with the bound now and then. */
  readonly onBound?: (bound: number) => void;
}

/**
 * Maximises a linear model.
 *
 * @param model columns and rows; integer or not
 * @param options limits and callbacks
 * @returns point and bound in floating point
 */
export async function runHighs(
  model: LinearModel,
  options: HighsOptions = {},
): Promise<HighsOutcome> {
  const highs = await loadHighs();
  const { callbackType, modelStatus, solutionStatus } = highs.constants;
  const native = highs.createModel(highsData(highs, model));
  let bound = Infinity;
  const watchBound = (value: number | undefined): void => {
    if (value !== undefined && Math.abs(value) < 1e300) bound = Math.min(bound, value);
  };
  try {
    native.options.set({
      output_flag: false,
      random_seed: (options.seed ?? 0) & 0x7fffffff,
      mip_rel_gap: 0,
      mip_abs_gap: options.absoluteGap ?? 1e-6,
      ...(Number.isFinite(options.timeLimitMs) ? { time_limit: options.timeLimitMs! / 1000 } : {}),
      ...(Number.isFinite(options.nodeLimit) ? { mip_max_nodes: options.nodeLimit! } : {}),
    });
    if (options.start !== undefined) native.setSolution({ colValue: options.start });
    const { modelStatus: ended } = native.run({
      [callbackType.mipImprovingSolution](event) {
        watchBound(event.data.mip_dual_bound);
        if (event.data.mip_solution !== undefined) {
          options.onPoint?.(event.data.mip_solution, bound);
        }
        return undefined;
      },
      [callbackType.mipInterrupt](event) {
        watchBound(event.data.mip_dual_bound);
        options.onBound?.(bound);
        if (options.shouldStop?.() === true) event.interrupt();
        return undefined;
      },
      [callbackType.simplexInterrupt](event) {
        if (options.shouldStop?.() === true) event.interrupt();
        return undefined;
      },
    });
    const feasible = native.info.get("primal_solution_status") === solutionStatus.feasible;
    if (model.integer) watchBound(native.info.get("mip_dual_bound") as number);
    else if (ended === modelStatus.optimal) bound = native.getObjectiveValue();
    return {
      status: ended === modelStatus.optimal
        ? "optimal"
        : STOPPED.some((name) => ended === modelStatus[name])
        ? "interrupted"
        : "failed",
      value: feasible ? native.getObjectiveValue() : -Infinity,
      bound,
      x: feasible ? Float64Array.from(native.getSolution().colValue) : undefined,
      nodes: model.integer ? Math.max(0, Number(native.info.get("mip_node_count"))) : 0,
    };
  } finally {
    native.dispose();
  }
}
