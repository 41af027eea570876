/**
 * The stable set polytope as linear models: rows from edges, cliques and odd cycles, models as typed
 * arrays, and the call of HiGHS on them, in this thread or in a worker that can be ended. Everything
 * HiGHS says is floating point; exact bounds are made of it elsewhere.
 *
 * @example
 * ```ts
 * import { graphFromPairs } from "../graph/graph.ts";
 * import { edgeCliqueCover, runHighs, stableSetModel } from "./mod.ts";
 * const graph = graphFromPairs(3, [[0, 1], [1, 2], [0, 2]]);
 * const model = stableSetModel(Float64Array.of(1, 3, 2), edgeCliqueCover(graph), true);
 * console.assert(Math.round((await runHighs(model)).value) === 3);
 * ```
 * @module
 */
export { type LinearModel, type Rows, rowsOfSets, stableSetModel } from "./model.ts";
export { edgeCliqueCover, violatedCliques } from "./clique-rows.ts";
export { violatedOddCycles } from "./odd-cycle-rows.ts";
export { type HighsOptions, type HighsOutcome, runHighs } from "./highs.ts";
export { highsAside } from "./highs-aside.ts";
