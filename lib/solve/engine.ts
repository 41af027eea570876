/**
 * The contract of all engines: a connected piece of a reduced instance in, a solution with its proof
 * or a reason to decline out. An engine is synchronous where it can be, counts its work on the
 * meter, and catches the meter's interruption to return the best it has with an honest bound.
 */
import type { Graph } from "../graph/graph.ts";
import type { Proof } from "../certify/certificate.ts";
import type { Meter } from "../run/meter.ts";

/** A connected piece. All weights are positive integers; their sum is below 2^53. */
export interface Piece {
  readonly graph: Graph;
  /** Length n, scaled integer weights, all > 0. */
  readonly weights: Float64Array;
  /** Length n: the number each vertex carries in the certificate. */
  readonly labels: Int32Array;
  /**
   * Length m, when the piece is a component of a half-integral kernel: doubled edge costs c >= 0 with
   * Mᵀc = 2w at every vertex, and all-half optimal for the relaxation.
   */
  readonly doubledCosts?: Float64Array;
}

/** What an engine found. */
export interface Solved {
  readonly status: "optimal" | "feasible";
  /** Length n, entries 0 and 1: a stable set of the piece. */
  readonly chosen: Uint8Array;
  /** Its exact scaled weight. */
  readonly weight: number;
  /** Exact scaled integer >= the optimum; equal to `weight` when optimal. */
  readonly upperBound: number;
  /** Present when optimal: proves `upperBound`, vertices by their labels. */
  readonly proof?: Proof;
  /** A bound in floating point that nothing exact backs, in scaled units; never called a proof. */
  readonly floatingBound?: number;
  /** Figures worth telling a reader, such as the size of a transversal or the nodes of a tree. */
  readonly figures: Readonly<Record<string, number | string>>;
}

/** Why an engine does not take a piece; `reason` completes "declined because …". */
export interface Declined {
  readonly status: "declined";
  readonly reason: string;
}

/** Engines by name, as `SolveOptions.engine` takes them. */
export type EngineName = "bipartite" | "transversal" | "projective" | "branch" | "mip";

/** A connected piece and a meter in; a solution with its proof, or a reason to decline, out. */
export type Engine = (
  piece: Piece,
  meter: Meter,
) => Solved | Declined | Promise<Solved | Declined>;
