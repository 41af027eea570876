/**
 * Instances with bipartite blocks, from a thousand to a hundred thousand items: time to classify,
 * decompose, replace, solve and check, beside HiGHS on the plain edge formulation.
 */
import { check } from "../../lib/certify/check.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { runHighs } from "../../lib/polytope/highs.ts";
import { stableSetModel } from "../../lib/polytope/model.ts";
import { classify } from "../../lib/reduce/classify.ts";
import { decompose } from "../../lib/reduce/decompose.ts";
import { replaceBlocks } from "../../lib/reduce/replace-blocks.ts";
import { Random } from "../../lib/run/random.ts";
import { solve } from "../../lib/solve/solve.ts";
import { gridWithBlocks } from "../support/grid-with-blocks.ts";
import { randomRegularGraph } from "../support/random-graphs.ts";
import { randomCosts, weightsOfCosts, withBlocks } from "../support/with-blocks.ts";

/** One line of the result; times in milliseconds. */
export interface BlocksRow {
  readonly family: string;
  readonly items: number;
  readonly conflicts: number;
  readonly blocks: number;
  /** Items in blocks. */
  readonly inBlocks: number;
  readonly packing: string;
  readonly classify: number;
  readonly decompose: number;
  readonly replace: number;
  /** Items of the gadget instance. */
  readonly left: number;
  readonly solve: number;
  readonly check: number;
  readonly status: string;
  readonly weight: number;
  /** Time of HiGHS, or what it had when its limit came; absent where it was not asked. */
  readonly highs?: number | string;
  /** HiGHS's time over solving time; "> x" when it did not finish. */
  readonly ratio?: string;
  /** What HiGHS calls optimal, where it differs from the proved optimum. */
  readonly highsSays?: number;
}

/** HiGHS is asked up to this size; beyond, it is far from done within any limit worth waiting for. */
const HIGHS_UP_TO = 4000;

/**
 * Runs all cases, one after another, in this thread.
 *
 * @param timeLimitMs limit of each solver on each case
 * @param onRow called with each line as it is ready
 * @throws {Error} when the checker rejects an optimal solution
 */
export async function blocksBench(
  timeLimitMs = 60_000,
  onRow: (row: BlocksRow) => void = (row) => console.log(JSON.stringify(row)),
): Promise<BlocksRow[]> {
  const cases: [string, () => Graph][] = [];
  for (const [side, blocks] of [[20, 60], [30, 150], [40, 250], [100, 1000], [240, 5000]]) {
    cases.push([
      "on squares of a mirrored grid",
      () => gridWithBlocks(new Random(side), side, side, { blocks, size: 14 }),
    ]);
  }
  for (const [side, blocks] of [[20, 40], [100, 800], [210, 3600]]) {
    cases.push([
      "the same, nested",
      () => gridWithBlocks(new Random(side), side, side, { blocks, size: 14, nested: true }),
    ]);
  }
  for (const [n, blocks] of [[40, 40], [60, 60], [80, 200]]) {
    cases.push(["anywhere on a graph of degree 5", () => {
      const random = new Random(n);
      return withBlocks(random, randomRegularGraph(random, n, 5), { blocks, size: 12 }).graph;
    }]);
  }
  const rows: BlocksRow[] = [];
  for (const [family, build] of cases) {
    const row = await measured(family, build(), timeLimitMs);
    rows.push(row);
    onRow(row);
  }
  return rows;
}

async function measured(family: string, graph: Graph, timeLimitMs: number): Promise<BlocksRow> {
  const weights = weightsOfCosts(graph, randomCosts(new Random(graph.n), graph.m, 9));
  const instance = Instance.from({
    items: Array.from(weights, (weight, v) => ({ id: `item ${v}`, weight })),
    conflicts: Array.from(graph.tails, (u, e) => [`item ${u}`, `item ${graph.heads[e]}`] as const),
  });
  const run = { workers: 0, timeLimitMs };
  const [anatomy, classifyMs] = await timed(() => classify(instance, run));
  const [decomposition, decomposeMs] = await timed(() => decompose(instance, run));
  const [replacement, replaceMs] = await timed(() => replaceBlocks(decomposition, run));
  const [solution, solveMs] = await timed(() => solve(instance, run));
  const [verdict, checkMs] = await timed(() => Promise.resolve(check(instance, solution)));
  if (solution.status === "optimal" && !verdict.valid) {
    throw new Error(`${family}, ${instance.size} items: ${verdict.reason}`);
  }
  const blocks = decomposition.components.flatMap((component) => component.blocks);
  const { lower, upper } = anatomy.oddCyclePacking;
  return {
    family,
    items: instance.size,
    conflicts: instance.conflictCount,
    blocks: blocks.length,
    inBlocks: blocks.reduce((sum, block) => sum + block.items.length, 0),
    packing: lower === upper ? `${lower}` : `${lower} to ${upper}`,
    classify: classifyMs,
    decompose: decomposeMs,
    replace: replaceMs,
    left: replacement.instance.size,
    solve: solveMs,
    check: checkMs,
    status: solution.status,
    weight: solution.weight,
    ...(instance.size <= HIGHS_UP_TO && await byHighs(instance, timeLimitMs, solveMs)),
  };

  async function byHighs(
    { graph, weights }: Instance,
    timeLimitMs: number,
    solveMs: number,
  ): Promise<Pick<BlocksRow, "highs" | "ratio" | "highsSays">> {
    const edges = Array.from(graph.tails, (u, e) => [u, graph.heads[e]]);
    const [found, ms] = await timed(() =>
      runHighs(stableSetModel(weights, edges, true), { timeLimitMs })
    );
    const ratio = (ms / Math.max(solveMs, 1)).toPrecision(2);
    if (found.status !== "optimal") {
      return {
        highs: `${Math.round(found.value)} to ${Math.round(found.bound)}`,
        ratio: `> ${ratio}`,
      };
    }
    const value = Math.round(found.value) / instance.scale;
    return { highs: ms, ratio, ...(value !== solution.weight && { highsSays: value }) };
  }
}

async function timed<R>(run: () => Promise<R>): Promise<[R, number]> {
  const began = performance.now();
  const result = await run();
  return [result, Math.round(performance.now() - began)];
}
