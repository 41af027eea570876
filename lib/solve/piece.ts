/**
 * Chooses the engine for one connected piece. The cheap special engines come first and decline with
 * a reason where they do not apply; branch and bound takes what is left, first alone under a budget
 * of work, then with the help of a floating-point solver's solutions, then until it is done.
 */
import { Interrupted, type Meter } from "../run/meter.ts";
import { branch } from "./branch.ts";
import type { Declined, Engine, EngineName, Piece, Solved } from "./engine.ts";
import { greedyPacking, greedyStableSet } from "./greedy.ts";
import { solveBipartite } from "./bipartite.ts";
import { solveByTransversal } from "./transversal.ts";

/** The special engines, in the order in which they are asked. */
const SPECIAL: readonly (readonly [EngineName, Engine])[] = [
  ["bipartite", solveBipartite],
  ["transversal", solveByTransversal],
];

export interface PieceResult {
  readonly engine: string;
  /** One sentence for each engine that was asked before, and for the one that answered. */
  readonly why: readonly string[];
  readonly solved: Solved;
}

/**
 * Solves one piece.
 *
 * @param piece a connected piece
 * @param only use this engine alone
 * @param meter counts the work
 * @returns the solution, the engine it came from, and what each engine said
 */
export async function solvePiece(
  piece: Piece,
  only: EngineName | undefined,
  meter: Meter,
): Promise<PieceResult> {
  const why: string[] = [];
  for (const [name, engine] of SPECIAL) {
    if (only !== undefined && only !== name) continue;
    if (meter.interruption !== undefined) break;
    const answer = await asked(engine, piece, meter);
    if (answer === undefined) break;
    if (answer.status !== "declined") return { engine: name, why, solved: answer };
    why.push(`${name} declined: ${answer.reason}`);
  }
  if (meter.interruption === undefined) {
    if (only === undefined || only === "branch") {
      return await byBranching(piece, meter, why);
    }
  }
  if (meter.interruption !== undefined) why.push(`the run ended (${meter.interruption})`);
  return { engine: "greedy", why, solved: greedily(piece) };
}

/** An engine's answer; undefined where the run ended before it had one. */
async function asked(
  engine: Engine,
  piece: Piece,
  meter: Meter,
): Promise<Solved | Declined | undefined> {
  try {
    return await engine(piece, meter);
  } catch (error) {
    if (error instanceof Interrupted) return undefined;
    throw error;
  }
}

async function byBranching(
  piece: Piece,
  meter: Meter,
  why: string[],
): Promise<PieceResult> {
  return { engine: "branch", why, solved: await branch(piece, meter) };
}

/** The greedy choice under the better of the half-integral bound and a greedy packing. */
function greedily(piece: Piece): Solved {
  const chosen = greedyStableSet(piece.graph, piece.weights);
  const packing = greedyPacking(piece.graph, piece.weights, piece.labels);
  let weight = 0, total = 0;
  for (let v = 0; v < chosen.length; v++) {
    total += piece.weights[v];
    if (chosen[v] !== 0) weight += piece.weights[v];
  }
  const relaxed = piece.doubledCosts === undefined ? Infinity : Math.floor(total / 2);
  const upperBound = Math.min(packing.upperBound, relaxed);
  if (packing.upperBound === weight) {
    return { status: "optimal", chosen, weight, upperBound, proof: packing.proof, figures: {} };
  }
  return { status: "feasible", chosen, weight, upperBound, figures: {} };
}
