/**
 * A mixed-integer solver on floating-point numbers, for what it is good at: solutions. Each is rounded
 * and verified here before it counts. Its bound is handed on as `floatingBound`, and nothing it calls
 * optimal is called so here: the status is `feasible` unless the exact bound of this library is met.
 */
import { edgeCliqueCover } from "../polytope/clique-rows.ts";
import { highsAside } from "../polytope/highs-aside.ts";
import { stableSetModel } from "../polytope/model.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import type { Piece, Solved } from "./engine.ts";
import { greedyPacking } from "./greedy.ts";
import { type Incumbent, localSearch } from "./incumbent.ts";

/** Heaviest cost handed to HiGHS; weights above are divided by a power of two. */
const HEAVIEST_COST = 2 ** 20;

/** What a caller may add. */
export interface MipOptions {
  /** A stable set to begin with, with its exact weight. */
  readonly start?: Incumbent;
  /** Most nodes of the solver's tree; a limit that does not depend on the machine's speed. */
  readonly nodeLimit?: number;
  /** Called with each better stable set, verified. */
  readonly onIncumbent?: (incumbent: Incumbent) => void;
}

/**
 * Looks for heavy stable sets with HiGHS on the clique formulation.
 *
 * @param piece a connected piece; weights positive integers with a sum below 2^53
 * @param meter seed and limits; a stop ends the run within 200 ms where there are workers
 * @param options a start, a limit of nodes
 * @returns the heaviest stable set verified; `upperBound` is the exact bound of the half-integral
 *   relaxation or of a packing of edges, `floatingBound` what HiGHS says, in scaled units
 */
export async function mip(piece: Piece, meter: Meter, options: MipOptions = {}): Promise<Solved> {
  const { graph, weights, labels } = piece;
  const { n } = graph;
  let best = options.start ?? localSearch(graph, weights, meter, 2 ** 20);
  const packing = greedyPacking(graph, weights, labels);
  let upperBound = packing.upperBound;
  if (piece.doubledCosts !== undefined) {
    let total = 0;
    for (let v = 0; v < n; v++) total += weights[v];
    upperBound = Math.min(upperBound, Math.floor(total / 2));
  }
  if (best.weight === packing.upperBound) {
    const { proof } = packing;
    return { status: "optimal", ...best, upperBound: best.weight, proof, figures: { nodes: 0 } };
  }

  const take = (x: Float64Array): void => {
    const candidate = verified(piece, x);
    if (candidate === undefined || candidate.weight <= best.weight) return;
    best = candidate;
    options.onIncumbent?.(best);
    meter.report("mixed-integer solver", { done: 0, lower: best.weight, upper: upperBound });
  };
  let scale = 1;
  for (let v = 0; v < n; v++) while (weights[v] / scale > HEAVIEST_COST) scale *= 2;
  let floatingBound: number | undefined;
  let ended = "interrupted", nodes = 0;
  try {
    meter.look();
    const cliques = edgeCliqueCover(graph, meter);
    const outcome = await highsAside(
      stableSetModel(weights.map((w) => w / scale), cliques, true),
      meter,
      {
        seed: meter.seed,
        nodeLimit: options.nodeLimit,
        absoluteGap: 0.5 / scale,
        start: Float64Array.from(best.chosen),
        onPoint: take,
      },
    );
    if (outcome.x !== undefined) take(outcome.x);
    if (Number.isFinite(outcome.bound)) {
      floatingBound = Math.max(best.weight, outcome.bound * scale);
    }
    ended = outcome.status;
    nodes = outcome.nodes;
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
  }
  return {
    status: "feasible",
    ...best,
    upperBound: Math.max(upperBound, best.weight),
    ...(floatingBound === undefined ? {} : { floatingBound }),
    figures: { nodes, "the solver's word": ended },
  };
}

/** The stable set a point stands for, its weight summed exactly; undefined when it is not stable. */
function verified({ graph, weights }: Piece, x: Float64Array): Incumbent | undefined {
  const chosen = new Uint8Array(graph.n);
  let weight = 0;
  for (let v = 0; v < graph.n; v++) {
    if (x[v] < 0.5) continue;
    chosen[v] = 1;
    weight += weights[v];
  }
  for (let e = 0; e < graph.m; e++) {
    if (chosen[graph.tails[e]] !== 0 && chosen[graph.heads[e]] !== 0) return undefined;
  }
  return { chosen, weight };
}
