/** The gadget instance of a decomposition: the same optimum up to a constant, from fewer items. */
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import { canWorkAside, type Job, runAside } from "../run/aside.ts";
import { exactSum } from "../run/exact.ts";
import { Interrupted, Meter } from "../run/meter.ts";
import type { RunOptions } from "../run/options.ts";
import type { Decomposition } from "./decomposition.ts";
import { replaceByGadgets, type Replacing } from "./gadgets-apply.ts";
import { gadgetInstance } from "./replace-blocks-instance.ts";
import { type InstanceKernel, kernelOf, survivingBlocks } from "./replace-blocks-kernel.ts";
import { liftSolution } from "./replace-blocks-lift.ts";
import { Replacement } from "./replacement.ts";

/** Vertices and edges above which a worker is used unless the caller wants none. */
const SIZE_HERE = 50_000;

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
  const { graph: { n, m, tails, heads }, weights, canonical: { rank } } = original;
  const blocks = decomposition.components.flatMap((component) =>
    component.blocks.map((block) => Int32Array.from(block.items, (id) => original.indexOf(id)))
  );
  const posted: Posted = { n, tails, heads, weights, rank, blocks };
  const aside = run.workers !== 0 && n + m > SIZE_HERE && canWorkAside();
  const { kernel, round } = aside
    ? await runAside(
      new URL("../worker.ts", import.meta.url),
      "replace blocks",
      posted,
      run,
    ) as Done
    : await inKernel(original.graph, posted, meter);
  const small = gadgetInstance(original, kernel, round);
  let settledWeight = 0;
  kernel.chosen.forEach((x, i) => settledWeight += x * weights[i]);
  const constant = exactSum(kernel.start.costs) - exactSum(round.after.costs);
  const unitsPer = 2 * original.scale;
  return new Replacement({
    instance: small.instance,
    unitsPer,
    offset: (2 * settledWeight + constant) / unitsPer,
    gadgets: small.gadgets,
    settled: n - kernel.items.length,
    elapsedMs: meter.elapsedMs,
  }, (solution) => liftSolution(original, kernel, round, small, solution));
}

/** What is posted to the worker for the job "replace blocks". */
interface Posted {
  readonly n: number;
  readonly tails: Int32Array;
  readonly heads: Int32Array;
  readonly weights: Float64Array;
  readonly rank: Int32Array;
  readonly blocks: readonly Int32Array[];
}

/** What comes back; all of it is plain data. */
interface Done {
  readonly kernel: InstanceKernel;
  readonly round: Replacing;
}

/** The worker's side of `replaceBlocks`. */
export const replaceBlocksJob: Job = async (input, meter) => {
  const posted = input as Posted;
  return await inKernel(graphFromEdges(posted.n, posted.tails, posted.heads), posted, meter);
};

async function inKernel(graph: Graph, posted: Posted, meter: Meter): Promise<Done> {
  meter.report("half-integral kernel", { done: 0, total: graph.n }, true);
  await meter.breathe();
  const kernel = kernelOf(graph, posted.weights, posted.rank);
  const blocks = survivingBlocks(graph.n, posted.blocks, kernel);
  meter.report("gadgets", { done: 0, total: blocks.length }, true);
  await meter.breathe();
  try {
    return { kernel, round: replaceByGadgets(kernel.start, blocks, meter) };
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    return { kernel, round: replaceByGadgets(kernel.start, [], new Meter()) };
  }
}
