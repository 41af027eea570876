/**
 * evenface: the conflict-free choice of greatest worth, with a proof. This is the public face; in a
 * notebook's kernel, loading it sets the display hooks and the Stop button up.
 *
 * @example
 * ```ts
 * import { check, Instance, solve } from "./mod.ts";
 * const instance = Instance.from({
 *   items: [{ id: "a", weight: 3 }, { id: "b", weight: 2 }, { id: "c", weight: 2 }],
 *   conflicts: [["a", "b"], ["a", "c"]],
 * });
 * const solution = await solve(instance, { workers: 0 });
 * console.assert(solution.status === "optimal" && solution.weight === 4);
 * console.assert(check(instance, solution).valid);
 * ```
 * @module
 */
import type { Solution } from "./certify/solution.ts";
import { registerRenderers } from "./display/register.ts";
import { withSource } from "./display/sources.ts";
import type { Instance } from "./instance/instance.ts";
import { enterNotebook } from "./notebook/enter.ts";
import { underKernel } from "./notebook/kernel.ts";
import { withKernelRun } from "./notebook/kernel-run.ts";
import { type Classification, classify as classifyHere } from "./reduce/classify.ts";
import { keepWorkerWarm } from "./run/aside.ts";
import type { RunOptions } from "./run/options.ts";
import { decompose as decomposeHere } from "./reduce/decompose.ts";
import type { Decomposition } from "./reduce/decomposition.ts";
import { replaceBlocks as replaceBlocksHere } from "./reduce/replace-blocks.ts";
import type { Replacement } from "./reduce/replacement.ts";
import { solve as solveHere, type SolveOptions } from "./solve/solve.ts";

registerRenderers();
enterNotebook();
if (underKernel()) keepWorkerWarm(new URL("./worker.ts", import.meta.url));

export { check } from "./certify/check.ts";
export { fromJson, toJson } from "./certify/json.ts";
export { Solution } from "./certify/solution.ts";
export { Verdict } from "./certify/verdict.ts";
export { drawConflicts } from "./display/conflict-picture.ts";
export { drawEmbedding } from "./display/disc.ts";
export { Picture } from "./display/picture.ts";
export { report, type ReportOptions } from "./display/report.ts";
export { saveReport } from "./display/save-report.ts";
export { chartWeights } from "./display/weight-chart.ts";
export * from "./instance/mod.ts";
export { show } from "./notebook/show.ts";
export { Classification, type ClassifiedComponent } from "./reduce/classify.ts";
export { type DecomposedComponent, Decomposition, type ItemBlock } from "./reduce/decomposition.ts";
export { type GadgetInfo, type GadgetState, Replacement } from "./reduce/replacement.ts";
export { InstanceError } from "./run/errors.ts";
export type { Progress, RunOptions } from "./run/options.ts";
export type { EngineName } from "./solve/engine.ts";
export type { SolveOptions } from "./solve/solve.ts";

/**
 * Finds the conflict-free choice of greatest worth and proves that nothing better exists. In a
 * notebook the Stop button ends it and a line shows its progress. See `solve/solve.ts`.
 *
 * @param instance items and conflicts
 * @param options what must be chosen or left, limits, progress
 * @returns the solution; with a limit or a stop, the best so far with an honest bound
 * @throws {InstanceError} when `choose` or `leave` names unknown ids, or one id in both
 * @throws {RangeError} for run options that mean nothing
 */
export function solve(instance: Instance, options: SolveOptions = {}): Promise<Solution> {
  return withKernelRun("solve", options, async (watched) => {
    return withSource(await solveHere(instance, watched), instance);
  });
}

/**
 * Tells the anatomy of an instance by its odd cycles: the class of each component, with witnesses.
 * In a notebook the Stop button ends it. See `reduce/classify.ts`.
 *
 * @param instance items and conflicts; weights play no part
 * @param options limits and progress; what a limit leaves open shows as an interval or "unknown"
 * @returns the class of every component and the numbers of the whole
 * @throws {RangeError} for run options that mean nothing
 */
export function classify(instance: Instance, options: RunOptions = {}): Promise<Classification> {
  return withKernelRun("classify", options, (watched) => classifyHere(instance, watched));
}

/**
 * Splits an instance into its core and the bipartite blocks that hang on it by at most three items.
 * In a notebook the Stop button ends it. See `reduce/decompose.ts`.
 *
 * @param instance items and conflicts; weights play no part
 * @param options limits and progress
 * @returns core and blocks of every component
 * @throws {RangeError} for run options that mean nothing
 */
export function decompose(instance: Instance, options: RunOptions = {}): Promise<Decomposition> {
  return withKernelRun("decompose", options, (watched) => decomposeHere(instance, watched));
}

/**
 * Replaces the blocks of a decomposition by small gadgets with the same least cost in every state.
 * In a notebook the Stop button ends it. See `reduce/replace-blocks.ts`.
 *
 * @param decomposition what `decompose` gave
 * @param options limits and progress
 * @returns the smaller instance, what each gadget stands for, and the way back
 * @throws {RangeError} for run options that mean nothing
 */
export function replaceBlocks(
  decomposition: Decomposition,
  options: RunOptions = {},
): Promise<Replacement> {
  return withKernelRun(
    "replace blocks",
    options,
    (watched) => replaceBlocksHere(decomposition, watched),
  );
}
