/**
 * Exact solving: the dispatcher, which works by connected component of the half-integral kernel, and
 * the engines behind one contract. An engine gives a solution with its proof, or declines with a
 * reason.
 *
 * @example
 * ```ts
 * import { Instance } from "../instance/mod.ts";
 * import { solve } from "./mod.ts";
 * const instance = Instance.from({
 *   items: ["a", "b", "c"].map((id) => ({ id, weight: 1 })),
 *   conflicts: [["a", "b"], ["b", "c"], ["c", "a"]],
 * });
 * const solution = await solve(instance, { workers: 0 });
 * console.assert(solution.status === "optimal" && solution.weight === 1);
 * ```
 * @module
 */
export type { Declined, Engine, EngineName, Piece, Solved } from "./engine.ts";
export { solve, type SolveOptions } from "./solve.ts";
