/**
 * Results as tables, pictures and reports: pure functions from a result to what a notebook, a page
 * or a printer shows. Nothing here knows the notebook's kernel.
 *
 * @example
 * ```ts
 * import { report } from "./mod.ts";
 * import { Solution } from "../certify/mod.ts";
 * const solution = new Solution({
 *   status: "infeasible",
 *   reason: "a and b are both required, but they are in conflict",
 *   chosen: [],
 *   weight: 0,
 *   upperBound: 0,
 *   parts: [],
 *   elapsedMs: 0,
 *   choose: ["a", "b"],
 *   leave: [],
 *   instance: { name: "two", unit: "", items: 2, conflicts: 1, fingerprint: "0".repeat(64) },
 * });
 * const page = await report(solution, { timing: false });
 * console.assert(page.includes("No choice is possible"));
 * ```
 * @module
 */
export { type ConflictPictureOptions, drawConflicts } from "./conflict-picture.ts";
export { type DiscOptions, drawEmbedding } from "./disc.ts";
export { Picture } from "./picture.ts";
export { registerRenderers } from "./register.ts";
export { report, type ReportOptions } from "./report.ts";
export { saveReport } from "./save-report.ts";
export { sourceOf, withSource } from "./sources.ts";
export { type Bar, chartWeights, WeightChart } from "./weight-chart.ts";
