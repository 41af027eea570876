/** The gadget instance of a decomposition: the same optimum up to a constant, from fewer items. */
import { exactSum } from "../run/exact.ts";
import { Interrupted, Meter } from "../run/meter.ts";
import type { RunOptions } from "../run/options.ts";
import type { Decomposition } from "./decomposition.ts";
import { replaceByGadgets, type Replacing } from "./gadgets-apply.ts";
import { gadgetInstance } from "./replace-blocks-instance.ts";
import { kernelOf, survivingBlocks } from "./replace-blocks-kernel.ts";
import { liftSolution } from "./replace-blocks-lift.ts";
import { Replacement } from "./replacement.ts";

/**
 * Replaces the blocks of a decomposition by gadgets. Works in the half-integral kernel, where the
 * worth of a choice is a constant less the cost of the slack it leaves: what a block costs in each
 * state of its attachments is a table of at most eight numbers, and a gadget of at most five items
 * costs the same.
 *
 * @param decomposition what `decompose` returned
 * @param run limits and progress. The kernel's one maximum flow is always finished; when a limit
 *   comes before all tables are known, no block is replaced, which is valid too
 * @returns the gadget instance, what each gadget stands for with its table, and `lift`
 * @throws {RangeError} for run options that mean nothing, or when the weights of the gadget instance,
 *   up to twelve times the total of the original's scaled weights, add up to 2^53 or more
 *
 * @example
 * ```ts
 * import { Instance } from "../instance/mod.ts";
 * import { decompose, replaceBlocks } from "./mod.ts";
 * const ids = ["a", "b", "c", "d", "e", "p", "q", "r"];
 * const core = ids.slice(0, 5).flatMap((u, i) => ids.slice(0, i).map((v) => [u, v] as const));
 * const instance = Instance.from({
 *   items: ids.map((id) => ({ id, weight: 1 })),
 *   conflicts: [...core, ["a", "p"], ["p", "q"], ["q", "r"], ["r", "b"]],
 * });
 * const { instance: smaller, gadgets } = await replaceBlocks(await decompose(instance));
 * console.assert(smaller.size <= instance.size && gadgets.length <= 1);
 * ```
 */
export async function replaceBlocks(
  decomposition: Decomposition,
  run: RunOptions = {},
): Promise<Replacement> {
  const meter = new Meter(run);
  const original = decomposition.source;
  meter.report("half-integral kernel", { done: 0, total: original.size }, true);
  await meter.breathe();
  const kernel = kernelOf(original);
  const blocks = survivingBlocks(decomposition, kernel);
  meter.report("gadgets", { done: 0, total: blocks.length }, true);
  await meter.breathe();
  let round: Replacing;
  try {
    round = replaceByGadgets(kernel.start, blocks, meter);
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    round = replaceByGadgets(kernel.start, [], new Meter());
  }
  const small = gadgetInstance(original, kernel, round);
  let settledWeight = 0;
  kernel.chosen.forEach((x, i) => settledWeight += x * original.weights[i]);
  const constant = exactSum(kernel.start.costs) - exactSum(round.after.costs);
  const unitsPer = 2 * original.scale;
  meter.report("gadgets", { done: blocks.length, total: blocks.length }, true);
  return new Replacement({
    instance: small.instance,
    unitsPer,
    offset: (2 * settledWeight + constant) / unitsPer,
    gadgets: small.gadgets,
    settled: original.size - kernel.items.length,
    elapsedMs: meter.elapsedMs,
  }, (solution) => liftSolution(original, kernel, round, small, solution));
}
