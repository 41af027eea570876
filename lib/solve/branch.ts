/**
 * Exact branch and bound for any piece. Two searches share the work: clique covers on bit sets (very
 * many cheap nodes, good for small and dense pieces) and linear relaxations with rounded duals (few
 * strong nodes, good for sparse and structured ones). Which of the two fits a piece is hard to foresee,
 * so they take turns under growing budgets of work; the loser costs a constant factor.
 * Budgets count work, not time: the same piece and seed take the same path on every machine.
 */
import { edgeCliqueCover } from "../polytope/clique-rows.ts";
import { loadHighs } from "../polytope/highs.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import { CaseTree, proofSize } from "./branch/case-tree.ts";
import { coverSearch, type SearchResult } from "./branch/cover-search.ts";
import { RelaxationSearch } from "./branch/relaxation-search.ts";
import type { Piece, Solved } from "./engine.ts";
import { greedyPacking } from "./greedy.ts";
import { type Incumbent, localSearch } from "./incumbent.ts";

/** Bit sets of n² bits are made up to this size. */
const MOST_COVER_VERTICES = 4096;
/** With more vertices and edges than this the relaxation is left out: it could not be stopped in time. */
const MOST_RELAXATION_SIZE = 50_000;
/** Most work of the first local search; in a piece too large for both searches there is more. */
const FIRST_LOOK = 2 ** 28;
const ONLY_LOOK = 2 ** 31;
/**
 * Budgets of the turns, in units of work (about 2^18 a millisecond): a short look by covers, which is
 * all that small pieces need, then both in earnest, relaxations with more where the piece is sparse.
 * Later turns grow fourfold.
 */
const FIRST_COVER_TURN = 2 ** 24;
const DENSE_TURNS = { cover: 2 ** 30, relaxation: 2 ** 28 };
const SPARSE_TURNS = { cover: 2 ** 28, relaxation: 2 ** 30 };
/** Edges to a vertex up to which a piece counts as sparse. */
const SPARSE = 5;
/** A proof with more numbers than this is not kept: the search it comes from is given up. */
const MOST_NUMBERS = 2 ** 24;

/**
 * Solves a piece exactly, or says how far it came.
 *
 * @param piece a connected piece; weights positive integers with a sum below 2^53
 * @param meter seed and limits; an interruption ends the search within a few milliseconds
 * @param start a stable set known from elsewhere, with its exact weight
 * @returns the heaviest stable set found. `optimal` with a proof by cases; or `feasible`, with the
 *   largest bound of a case not closed
 */
export async function branch(piece: Piece, meter: Meter, start?: Incumbent): Promise<Solved> {
  const { graph, weights, labels } = piece;
  const { n, m } = graph;
  let total = 0;
  for (let v = 0; v < n; v++) total += weights[v];

  const covers = n <= MOST_COVER_VERTICES;
  const relaxations = n + m <= MOST_RELAXATION_SIZE;
  const look = covers || relaxations ? Math.min(FIRST_LOOK, 4000 * (n + m)) : ONLY_LOOK;
  const found = localSearch(graph, weights, meter, look, start?.chosen);
  let best: Incumbent = start !== undefined && start.weight >= found.weight ? start : found;
  const packing = greedyPacking(graph, weights, labels);
  let upperBound = packing.upperBound;
  if (piece.doubledCosts !== undefined) upperBound = Math.min(upperBound, Math.floor(total / 2));
  let nodes = 0;
  const solved = (search: string, result?: SearchResult, tree?: CaseTree): Solved => {
    const figures = { nodes, search };
    if (result?.root !== undefined && tree !== undefined) {
      const proof = unlessInterrupted(() =>
        tree.toProof(result.root!, result.denominator, labels, meter)
      );
      if (proof !== undefined) {
        const { numbers } = proofSize(proof);
        return {
          status: "optimal",
          ...best,
          upperBound: best.weight,
          proof,
          figures: { ...figures, "numbers in the proof": numbers },
        };
      }
    }
    return { status: "feasible", ...best, upperBound: Math.max(best.weight, upperBound), figures };
  };
  if (best.weight === upperBound) {
    return {
      status: "optimal",
      ...best,
      upperBound,
      proof: upperBound === packing.upperBound
        ? packing.proof
        : packingOf(piece, piece.doubledCosts as Float64Array),
      figures: { nodes: 0, search: "a packing of edges" },
    };
  }

  const turns = m <= SPARSE * n ? SPARSE_TURNS : DENSE_TURNS;
  let coverTurn = FIRST_COVER_TURN, nextCoverTurn = turns.cover, relaxationTurn = turns.relaxation;
  let coverOutgrown = !covers, relaxationOutgrown = !relaxations;
  const relaxationTree = new CaseTree();
  let relaxation: RelaxationSearch | undefined;
  let last = "none, the piece is too large";
  try {
    for (let round = 0; !(coverOutgrown && relaxationOutgrown); round++) {
      if (round > 0) {
        const again = localSearch(graph, weights, meter, look * 2 ** round, best.chosen, round);
        if (again.weight > best.weight) best = again;
      }
      if (!coverOutgrown) {
        last = "clique covers";
        const tree = new CaseTree();
        const turn = meter.within(relaxationOutgrown ? Infinity : coverTurn);
        const result = coverSearch(graph, weights, best, tree, turn, MOST_NUMBERS);
        take(result);
        if (result.root !== undefined) return solved(last, result, tree);
        if (meter.interruption !== undefined) break;
        coverOutgrown = result.outgrown === true;
        coverTurn = nextCoverTurn;
        nextCoverTurn *= 4;
      }
      if (!relaxationOutgrown) {
        last = "linear relaxations";
        if (relaxation === undefined) {
          const cliques = unlessInterrupted(() => edgeCliqueCover(graph, meter));
          if (cliques === undefined) break;
          const highs = await loadHighs();
          relaxation = new RelaxationSearch(graph, weights, cliques, best, relaxationTree, highs);
        }
        relaxation.offer(best);
        const turn = meter.within(coverOutgrown ? Infinity : relaxationTurn);
        const result = relaxation.turn(turn, MOST_NUMBERS);
        take(result);
        if (result.root !== undefined) return solved(last, result, relaxationTree);
        if (meter.interruption !== undefined) break;
        relaxationOutgrown = result.outgrown === true;
        relaxationTurn *= 4;
      }
      await meter.breathe();
      if (meter.interruption !== undefined) break;
    }
  } finally {
    relaxation?.dispose();
  }
  const outgrown = (covers || relaxations) && coverOutgrown && relaxationOutgrown;
  return solved(outgrown ? `given up when the proof had more than ${MOST_NUMBERS} numbers` : last);

  function take(result: SearchResult): void {
    nodes += result.nodes;
    if (result.weight > best.weight) best = { chosen: result.chosen, weight: result.weight };
    upperBound = Math.min(upperBound, result.upperBound);
    meter.report("cases", {
      done: nodes,
      lower: best.weight,
      upper: Math.max(best.weight, upperBound),
    });
  }
}

/** What `make` makes; undefined when the meter runs out over it. */
function unlessInterrupted<T>(make: () => T): T | undefined {
  try {
    return make();
  } catch (error) {
    if (error instanceof Interrupted) return undefined;
    throw error;
  }
}

/** The piece's own edge costs as a proof of half its weight. */
function packingOf({ graph, labels }: Piece, doubledCosts: Float64Array): Solved["proof"] {
  const ends: number[] = [], doubled: number[] = [];
  for (let e = 0; e < graph.m; e++) {
    if (doubledCosts[e] === 0) continue;
    ends.push(labels[graph.tails[e]], labels[graph.heads[e]]);
    doubled.push(doubledCosts[e]);
  }
  return { rule: "packing", ends, doubled };
}
