/**
 * The half-integral kernel: an optimum of the relaxation max w·x, Mx <= 1, x >= 0 in halves, with the
 * fewest halves that an optimum has. Where it is 0 or 1, some heaviest stable set agrees (G. L. Nemhauser
 * and L. E. Trotter, "Vertex packings: structural properties and algorithms", Math. Programming 8,
 * 1975). Costs one maximum flow, everything else is O(n + m); no recursion.
 */
import type { Graph } from "../graph/graph.ts";
import { raiseToMaximum } from "../graph/max-flow-cover.ts";
import { extremeCuts, residualComponents } from "../graph/max-flow-cover-cuts.ts";
import type { Meter } from "../run/meter.ts";
import { BOTH, doubledCostsOf, LEFT_ONLY, relaxationOf, RIGHT_ONLY } from "./relaxation.ts";
import { startSymmetric } from "./relaxation-start.ts";

/** An optimum of the relaxation with its dual. */
export interface HalfIntegralKernel {
  /** Length n: 0 left, 1 half (the kernel), 2 chosen. Among all optima the fewest halves. */
  readonly value: Uint8Array;
  /**
   * Length m: doubled edge costs c, integers >= 0, with Mᵀc <= 2w everywhere and equality at vertices
   * of value 0 or 1. Positive only on edges whose values add up to 2.
   */
  readonly doubledCosts: Float64Array;
  /** Sum of `doubledCosts`, at most w(V). The relaxation's value is w(V) - packed / 2. */
  readonly packed: number;
}

/**
 * Computes the half-integral kernel.
 *
 * @param graph any graph, parallel edges allowed
 * @param weights length n, positive integers with a sum below 2^53
 * @param meter counts about one unit for each arc scanned
 * @returns values, doubled costs and their sum
 * @throws {Interrupted} when the meter runs out
 */
export function halfIntegralKernel(
  graph: Graph,
  weights: Float64Array,
  meter: Meter,
): HalfIntegralKernel {
  const relaxation = relaxationOf(graph, weights, meter);
  const { network, state, order, copies } = relaxation;
  startSymmetric(relaxation, meter);
  raiseToMaximum(network, state, meter);
  const cuts = extremeCuts(network, state, meter);
  const keep = copies.map((c) => c === BOTH ? 1 : 0);
  const { left, right } = residualComponents(network, state, cuts, keep, meter);
  const value = new Uint8Array(graph.n);
  for (let i = 0; i < graph.n; i++) {
    // A minimum cut chooses a vertex when its left copy is on the source side, and leaves it when its
    // right copy is; both or neither make a half.
    let x: number;
    if (copies[i] === RIGHT_ONLY) x = cuts.right[i] === 1 ? 0 : 2;
    else if (copies[i] === LEFT_ONLY) x = cuts.left[i] === 1 ? 2 : 0;
    else if (cuts.left[i] !== 0) x = cuts.left[i] === 1 ? 2 : 0;
    else if (left[i] !== right[i]) {
      // The copies whose number is lower than that of the other copy of their vertex: residual arcs
      // never lead up, nor do their mirror images, so no arc leaves this set and it is a minimum cut.
      x = left[i] < right[i] ? 2 : 0;
    } else x = 1;
    value[order[i]] = x;
  }
  const doubledCosts = doubledCostsOf(graph, relaxation);
  let packed = 0;
  for (let e = 0; e < graph.m; e++) packed += doubledCosts[e];
  return { value, doubledCosts, packed };
}
