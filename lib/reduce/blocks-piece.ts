/**
 * Block replacement for one component of the half-integral kernel: smaller pieces in, their answers
 * put together again, with the proof that covers the step.
 *
 * The edge costs of a kernel are doubled, and sums of them may be odd; so the weights of the new
 * pieces are the sums of doubled costs at each vertex, that is in *half* units, and their own
 * doubled costs are twice the doubled costs here.
 */
import type { BlocksProof, CertificatePart, Proof } from "../certify/certificate.ts";
import { componentSubgraphs } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { exactAdd, exactSum } from "../run/exact.ts";
import type { Meter } from "../run/meter.ts";
import { liftBlocks, reduceBlocks, type Reduction } from "./blocks.ts";
import type { CostGraph } from "./blocks-costs.ts";
import type { Replacing } from "./gadgets-apply.ts";

/** A connected component of a kernel, as engines take it. */
export interface KernelPiece {
  readonly graph: Graph;
  /** Length n: positive integers. */
  readonly weights: Float64Array;
  /** Length n: the number of each vertex in the certificate. */
  readonly labels: Int32Array;
  /** Length m: integers c >= 0 with Mᵀc = 2w. */
  readonly doubledCosts: Float64Array;
}

/** What an engine found on one of the smaller pieces, in the piece's own units. */
export interface PieceAnswer {
  /** Length n, entries 0 and 1: a stable set. */
  readonly chosen: Uint8Array;
  readonly upperBound: number;
  /** Proves `upperBound`, vertices by the piece's labels. */
  readonly proof?: Proof;
}

/** The answers put together, in the units of the piece that was reduced. */
export interface CombinedAnswer {
  readonly chosen: Uint8Array;
  readonly weight: number;
  readonly upperBound: number;
  /** Present when all answers have proofs and these prove the weight reached. */
  readonly proof?: BlocksProof;
}

/** A piece after block replacement. */
export interface ReducedPiece {
  /** Connected, with weights in half units; labels number the vertices as the proof does. */
  readonly pieces: readonly KernelPiece[];
  readonly reduction: Reduction;
  /** Blocks replaced, rounds, and vertices left. */
  readonly figures: Readonly<Record<"blocks" | "rounds" | "verticesLeft", number>>;
  /**
   * Lifts the answers on the pieces. Optimal answers give an optimal one; any answers give a stable
   * set that loses no more than they do.
   *
   * @param answers one for each piece, in order
   */
  combine(answers: readonly PieceAnswer[], meter: Meter): CombinedAnswer;
}

/**
 * Replaces the bipartite blocks of a kernel component.
 *
 * @param piece a connected component of a kernel
 * @returns the smaller pieces, or undefined where nothing is larger than its gadget, or where the
 *   new weights would leave the exact range (at most twelve times the weight of the piece)
 * @throws {Interrupted} when the meter runs out
 */
export function reducePiece(piece: KernelPiece, meter: Meter): ReducedPiece | undefined {
  const { graph, weights, labels, doubledCosts } = piece;
  // Six costs of a gadget, each at most the cost of its block, counted twice and doubled.
  if (exactSum(weights) > Number.MAX_SAFE_INTEGER / 32) return undefined;
  const ids = ranksOf(labels);
  const start: CostGraph = { graph, costs: doubledCosts, ids, nextId: graph.n };
  const reduction = reduceBlocks(start, meter);
  if (reduction.rounds.length === 0) return undefined;
  const { after, rounds } = reduction;
  const all = asPieces(after);
  return {
    pieces: all,
    reduction,
    figures: {
      blocks: rounds.reduce((sum, round) => sum + round.blocks.length, 0),
      rounds: rounds.length,
      verticesLeft: all.reduce((sum, { graph }) => sum + graph.n, 0),
    },
    combine(answers, meter) {
      const byId = new Uint8Array(after.nextId);
      let bound = exactSum(doubledCosts) - exactSum(after.costs);
      answers.forEach(({ chosen, upperBound }, i) => {
        all[i].labels.forEach((id, v) => byId[id] = chosen[v]);
        bound = exactAdd(bound, upperBound);
      });
      liftBlocks(reduction, byId, meter);
      const chosen = Uint8Array.from(ids, (id) => byId[id]);
      let weight = 0;
      for (let v = 0; v < graph.n; v++) if (chosen[v] !== 0) weight += weights[v];
      const upperBound = Math.floor(bound / 2);
      const parts = answers.map(({ upperBound, proof }, i): CertificatePart | undefined =>
        proof && { vertices: all[i].labels, bound: upperBound, proof }
      );
      if (weight !== upperBound || !parts.every((part) => part !== undefined)) {
        return { chosen, weight, upperBound };
      }
      return { chosen, weight, upperBound, proof: { ...blockReplacements(start, rounds), parts } };
    },
  };
}

/** The components of what is left, less the vertices of weight 0, which no choice needs. */
function asPieces({ graph, costs, ids }: CostGraph): KernelPiece[] {
  const weights = new Float64Array(graph.n);
  for (let e = 0; e < graph.m; e++) {
    weights[graph.tails[e]] += costs[e];
    weights[graph.heads[e]] += costs[e];
  }
  const keep = Uint8Array.from(weights, (w) => w > 0 ? 1 : 0);
  return componentSubgraphs(graph, keep).map(({ graph, vertices, edges }) => ({
    graph,
    weights: Float64Array.from(vertices, (v) => weights[v]),
    labels: Int32Array.from(vertices, (v) => ids[v]),
    doubledCosts: Float64Array.from(edges, (e) => 2 * costs[e]),
  }));
}

/**
 * The proof of replacements, without proofs for what is left.
 *
 * @param start the graph before the first round, its ids as the proof numbers vertices
 */
export function blockReplacements(
  start: CostGraph,
  rounds: readonly Replacing[],
): Omit<BlocksProof, "parts"> {
  const { graph: { m, tails, heads }, costs, ids } = start;
  const ends: number[] = [], doubled: number[] = [];
  for (let e = 0; e < m; e++) {
    if (costs[e] === 0) continue;
    ends.push(ids[tails[e]], ids[heads[e]]);
    doubled.push(costs[e]);
  }
  return {
    rule: "blocks",
    ends: Int32Array.from(ends),
    doubled: Float64Array.from(doubled),
    blocks: rounds.flatMap(({ before, blocks }) =>
      blocks.map(({ block: { inside, attachments }, gadget, firstId }) => ({
        inside: Array.from(inside, (v) => before.ids[v]),
        attachments: Array.from(attachments, (v) => before.ids[v]),
        vertices: gadget.vertices,
        ends: gadget.edges.map((i) =>
          i < attachments.length ? before.ids[attachments[i]] : firstId + i - attachments.length
        ),
        doubled: [...gadget.costs],
      }))
    ),
  };
}

/** For each entry, how many are smaller; the entries are distinct. */
function ranksOf(labels: Int32Array): Int32Array {
  const sorted = labels.slice().sort();
  return labels.map((label) => {
    let low = 0, high = sorted.length;
    while (low + 1 < high) {
      const middle = (low + high) >> 1;
      if (sorted[middle] <= label) low = middle;
      else high = middle;
    }
    return low;
  });
}
