/**
 * Solves a component of a half-integral kernel that has an even-face embedding in the projective
 * plane, exactly: a heaviest stable set is a shortest one-sided cycle in the directed dual. See
 * Conforti, Fiorini, Huynh, Joret and Weltge, "The stable set problem in graphs with bounded genus and
 * bounded odd cycle packing number" (SODA 2020) for slacks as circulations in the dual (written from
 * memory). Recognition, dual and lifting take near-linear time; projective/least-cycle.ts says what
 * the search takes.
 */
import type { Graph } from "../graph/graph.ts";
import { evenFaceEmbedding } from "../parity/even-face.ts";
import type { NoEvenFace } from "../parity/even-face-result.ts";
import type { Meter } from "../run/meter.ts";
import type { Declined, Piece, Solved } from "./engine.ts";
import { directedDual } from "./projective/directed-dual.ts";
import { leastOneSidedCycle } from "./projective/least-cycle.ts";
import { stableSetOfCycle } from "./projective/lift.ts";
import { proofOf } from "./projective/proof.ts";
import { sourceWalk } from "./projective/source-walk.ts";

/** What the dual arcs around all vertices may cost together: sums of distances stay exact. */
const MOST_AROUND = 2 ** 51;

/**
 * The engine for even-face embeddings.
 *
 * @param piece a component of a half-integral kernel, with its doubled costs
 * @param meter counts about one unit for each arc scanned
 * @returns the optimum with its proof, or why the piece is not one for this engine
 * @throws {Interrupted} when the meter runs out before there is any solution
 */
export function solveProjective(piece: Piece, meter: Meter): Solved | Declined {
  const { graph, weights, doubledCosts } = piece;
  if (doubledCosts === undefined) {
    return { status: "declined", reason: "it is not a component of a half-integral kernel" };
  }
  if (hasParallelEdges(graph)) {
    return { status: "declined", reason: "it has parallel edges" };
  }
  const twice = 2 * weights.reduce((sum, weight) => sum + weight, 0);
  if (!(twice / greatestCommonDivisor(doubledCosts) <= MOST_AROUND)) {
    return { status: "declined", reason: "its costs are too large to add up distances exactly" };
  }
  meter.report("even-face embedding", { done: 0, total: 1 });
  const embedding = evenFaceEmbedding(graph, meter, { witness: false });
  if (embedding.kind === "no") return { status: "declined", reason: whyNot(embedding) };
  return solveEmbedded(piece, doubledCosts, embedding.next, meter);
}

/**
 * Solves a piece whose embedding is known.
 *
 * @param piece connected, simple, not bipartite
 * @param doubledCosts length m, integers >= 0 with Mᵀc = 2w
 * @param next length 2m, the rotation system of an even-face embedding, every edge twisted
 * @returns the optimum with its proof; the best found and a bound, when the meter runs out
 * @throws {Interrupted} when the meter runs out before there is any solution
 */
export function solveEmbedded(
  piece: Piece,
  doubledCosts: Float64Array,
  next: Int32Array,
  meter: Meter,
): Solved {
  const { graph, weights } = piece;
  const { unit, step, costs, around } = inUnits(graph, weights, doubledCosts);
  const dual = directedDual(next, meter);
  const walk = sourceWalk(graph, dual, costs, around, meter);
  const cycle = leastOneSidedCycle(graph, dual, costs, walk, step, meter);
  const chosen = stableSetOfCycle(graph, cycle.crossed);

  let total = 0, weight = 0;
  for (let v = 0; v < graph.n; v++) {
    total += weights[v];
    if (chosen[v] !== 0) weight += weights[v];
  }
  const figures = {
    faces: dual.pairs,
    slack: unit * cycle.cost / 2,
    sources: walk.faces.length,
    distances: 1 + cycle.moves,
  };
  // Clamping may gain where the cycle is not a least one.
  if (2 * weight < total - unit * cycle.cost) throw mismatch();
  if (cycle.atLeast < cycle.cost) {
    const upperBound = Math.floor((total - unit * cycle.atLeast) / 2);
    if (weight > upperBound) throw mismatch();
    return { status: "feasible", chosen, weight, upperBound, figures };
  }
  // Every stable set weighs at most (w(V) - cost) / 2, and this one must reach it.
  if (2 * weight !== total - unit * cycle.cost) throw mismatch();
  const proof = proofOf(piece, next, unit, costs, dual, walk.faces, cycle.cost);
  return { status: "optimal", chosen, weight, upperBound: weight, proof, figures };

  function mismatch(): Error {
    return new Error(
      `internal: a one-sided cycle of cost ${unit * cycle.cost}, least at least ` +
        `${unit * cycle.atLeast}, gave a stable set of weight ${weight} out of ${total}`,
    );
  }
}

/** Costs divided by what divides them all, and what one-sided cycles are equal modulo. */
function inUnits(graph: Graph, weights: Float64Array, doubledCosts: Float64Array) {
  const unit = greatestCommonDivisor(doubledCosts), divisor = greatestCommonDivisor(weights);
  const around = new Float64Array(graph.n), units = new Float64Array(graph.m);
  for (let v = 0; v < graph.n; v++) around[v] = 2 * weights[v] / unit;
  let most = 0;
  for (let e = 0; e < graph.m; e++) {
    units[e] = doubledCosts[e] / unit;
    if (units[e] > most) most = units[e];
  }
  const costs = most < 2 ** 31 ? Int32Array.from(units) : units;
  // The cost of a cycle is w(V) - 2 w(x) for an integer vector x, see certify/projective.ts.
  return { unit, step: 2 * divisor / unit, costs, around };
}

/** Of a list of integers >= 0; 0 if all are 0. */
function greatestCommonDivisor(list: Float64Array): number {
  let divisor = 0;
  for (let i = 0; i < list.length && divisor !== 1; i++) {
    for (let a = list[i]; a !== 0;) {
      const rest = divisor % a;
      divisor = a;
      a = rest;
    }
  }
  return divisor;
}

function hasParallelEdges(graph: Graph): boolean {
  const { n, offsets, targets } = graph;
  const last = new Int32Array(n).fill(-1);
  for (let v = 0; v < n; v++) {
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (last[targets[a]] === v) return true;
      last[targets[a]] = v;
    }
  }
  return false;
}

function whyNot(no: NoEvenFace): string {
  switch (no.reason) {
    case "not connected":
      return "it is not connected";
    case "bipartite":
      return "it is bipartite";
    case "odd cycles in separate blocks":
      return "it has no even-face embedding: the odd cycles lie in separate blocks";
    case "cover not planar":
      return "it has no even-face embedding: its double cover is not planar";
    case "orientation kept":
      return "it has no even-face embedding: swapping the sheets of its cover keeps orientation";
  }
}
