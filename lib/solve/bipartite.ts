/**
 * The engine for bipartite pieces: one maximum flow gives a heaviest stable set and a packing of
 * edges that proves it (D. König, "Gráfok és mátrixok", 1931; weighted by flow duality). Declines
 * other pieces with an odd cycle. Costs the flow; everything else is O(n + m).
 */
import type { PackingProof } from "../certify/certificate.ts";
import { raiseToMaximum } from "../graph/max-flow-cover.ts";
import { extremeCuts } from "../graph/max-flow-cover-cuts.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { doubledCostsOf, LEFT_ONLY, type Relaxation, relaxationOf } from "../reduce/relaxation.ts";
import { startSymmetric } from "../reduce/relaxation-start.ts";
import { exactSum } from "../run/exact.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import type { Declined, Piece, Solved } from "./engine.ts";
import { greedyStableSet } from "./greedy.ts";

/**
 * Solves a bipartite piece to optimality.
 *
 * @param piece may also be disconnected
 * @param meter on interruption the answer is feasible, with the bound that the flow so far proves
 * @returns optimal with a packing as proof; feasible; or declined with the length of an odd cycle
 */
export function solveBipartite(piece: Piece, meter: Meter): Solved | Declined {
  const { graph, weights } = piece;
  const { side, oddCycle } = twoColouring(graph);
  if (side === undefined) {
    return { status: "declined", reason: `it has an odd cycle of ${oddCycle!.length} items` };
  }
  const total = exactSum(weights);
  let relaxation: Relaxation | undefined;
  try {
    relaxation = relaxationOf(graph, weights, meter);
    const { network, state, order, copies } = relaxation;
    startSymmetric(relaxation, meter);
    raiseToMaximum(network, state, meter);
    const cuts = extremeCuts(network, state, meter);
    const chosen = new Uint8Array(graph.n);
    for (let i = 0; i < graph.n; i++) {
      chosen[order[i]] = copies[i] === LEFT_ONLY
        ? (cuts.left[i] === 1 ? 1 : 0)
        : (cuts.right[i] === 1 ? 0 : 1);
    }
    const weight = weightOf(weights, chosen);
    const packed = exactSum(state.flow);
    if (weight !== total - packed) {
      throw new Error(`cut and flow disagree: ${weight} and ${total} - ${packed}`);
    }
    return {
      status: "optimal",
      chosen,
      weight,
      upperBound: weight,
      proof: packingProof(piece, doubledCostsOf(graph, relaxation)),
      figures: { "worth excluded by conflicts": packed },
    };
  } catch (stop) {
    if (!(stop instanceof Interrupted)) throw stop;
    const chosen = heavierOf(piece, heavierSide(piece, side), greedyStableSet(graph, weights));
    return {
      status: "feasible",
      chosen,
      weight: weightOf(weights, chosen),
      upperBound: total - (relaxation === undefined ? 0 : exactSum(relaxation.state.flow)),
      figures: { interrupted: stop.reason },
    };
  }
}

/** The edges that carry a multiplier, by the labels of their ends. */
function packingProof(piece: Piece, doubledCosts: Float64Array): PackingProof {
  const { graph: { m, tails, heads }, labels } = piece;
  let used = 0;
  for (let e = 0; e < m; e++) if (doubledCosts[e] > 0) used++;
  const ends = new Int32Array(2 * used), doubled = new Float64Array(used);
  let at = 0;
  for (let e = 0; e < m; e++) {
    if (doubledCosts[e] === 0) continue;
    ends[2 * at] = labels[tails[e]];
    ends[2 * at + 1] = labels[heads[e]];
    doubled[at++] = doubledCosts[e];
  }
  return { rule: "packing", ends, doubled };
}

/** The heavier of the two sides: at least half of all weight, when the piece is connected. */
function heavierSide({ weights }: Piece, side: Uint8Array): Uint8Array {
  let balance = 0;
  for (let v = 0; v < side.length; v++) balance += side[v] === 0 ? weights[v] : -weights[v];
  return side.map((s) => s === (balance >= 0 ? 0 : 1) ? 1 : 0);
}

function heavierOf({ weights }: Piece, a: Uint8Array, b: Uint8Array): Uint8Array {
  return weightOf(weights, a) >= weightOf(weights, b) ? a : b;
}

function weightOf(weights: Float64Array, chosen: Uint8Array): number {
  let weight = 0;
  for (let v = 0; v < chosen.length; v++) if (chosen[v] !== 0) weight += weights[v];
  return weight;
}
