/**
 * Solves one connected piece. The engines of near-linear time are asked first; looking for bipartite
 * blocks takes longer than either. Where they decline, blocks are replaced by gadgets, and each piece
 * that is left goes to the first engine that takes it. Special engines come first and decline with a
 * reason where they do not apply; branch and bound takes what is left, first alone under a budget of
 * work, then with the help of a floating-point solver's solutions, then until it is done.
 */
import { type CombinedAnswer, type ReducedPiece, reducePiece } from "../reduce/blocks-piece.ts";
import { Interrupted, Meter } from "../run/meter.ts";
import { solveBipartite } from "./bipartite.ts";
import { branch } from "./branch.ts";
import type { Declined, Engine, EngineName, Piece, Solved } from "./engine.ts";
import { greedyPacking, greedyStableSet } from "./greedy.ts";
import { mip } from "./mip.ts";
import { solveProjective } from "./projective.ts";
import { solveByTransversal } from "./transversal.ts";

/** Engines by name, in the order in which they are asked. */
type Asked = readonly (readonly [EngineName, Engine])[];
/** The special engines of near-linear time, and the other one. */
const FAST: Asked = [["bipartite", solveBipartite], ["projective", solveProjective]];
const SLOW: Asked = [["transversal", solveByTransversal]];

/** Work of branch and bound before HiGHS is asked for a better start: about 15 s. */
const FIRST_BRANCH_WORK = 2 ** 32;
/** Nodes of HiGHS's tree; a limit that does not depend on the machine's speed. */
const MIP_NODES = 1000;

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
  const atOnce = await ask(FAST, piece, only, meter);
  if (atOnce.solved !== undefined) return atOnce;
  const reduced = withoutBlocks(piece, meter);
  if (reduced === undefined) return await byOthers(piece, only, meter, atOnce.why);
  const { pieces, figures } = reduced;
  const results: PieceResult[] = [];
  // The smaller pieces count in half units and from another zero: their bounds are not reported.
  const reporting = meter.reporting(({ phase, done, total, elapsedMs }) => (
    { phase, done, total, elapsedMs }
  ));
  for (const smaller of pieces) {
    const fast = await ask(FAST, smaller, only, reporting);
    results.push(
      fast.solved !== undefined ? fast : await byOthers(smaller, only, reporting, fast.why),
    );
  }
  // Lifting is as cheap as the tables were, and must happen even when the time is up.
  const { status, ...combined } = withStatus(
    reduced.combine(results.map((r) => r.solved), new Meter()),
  );
  const engines = [...new Set(results.map((r) => r.engine))];
  return {
    engine: engines.length === 0 ? "blocks" : engines.join(" + "),
    why: [
      ...atOnce.why.map((reason) => `with its blocks, ${reason}`),
      `${figures.blocks} bipartite blocks replaced: ${figures.verticesLeft} vertices left of ` +
      `${piece.graph.n}`,
      ...new Set(results.flatMap((r) => r.why)),
    ],
    solved: {
      ...combined,
      status,
      figures: Object.assign({ ...figures }, ...results.map((r) => r.solved.figures)),
    },
  };
}

/** The piece with its blocks replaced, where that makes it smaller and the time allows it. */
function withoutBlocks(piece: Piece, meter: Meter): ReducedPiece | undefined {
  const { doubledCosts } = piece;
  if (doubledCosts === undefined) return undefined;
  try {
    return reducePiece({ ...piece, doubledCosts }, meter);
  } catch (error) {
    if (error instanceof Interrupted) return undefined;
    throw error;
  }
}

function withStatus(answer: CombinedAnswer): CombinedAnswer & { status: Solved["status"] } {
  return { ...answer, status: answer.proof === undefined ? "feasible" : "optimal" };
}

/** Asks engines in turn until one does not decline. */
async function ask(
  engines: Asked,
  piece: Piece,
  only: EngineName | undefined,
  meter: Meter,
): Promise<PieceResult | Pick<PieceResult, "why"> & { readonly solved?: undefined }> {
  const why: string[] = [];
  for (const [name, engine] of engines) {
    if (only !== undefined && only !== name) continue;
    if (meter.interruption !== undefined) break;
    const answer = await asked(engine, piece, meter);
    if (answer === undefined) break;
    if (answer.status !== "declined") return { engine: name, why, solved: answer };
    why.push(`${name} declined: ${answer.reason}`);
  }
  return { why };
}

/** Asks the engines that are left when the fast ones have declined; the last ones take everything. */
async function byOthers(
  piece: Piece,
  only: EngineName | undefined,
  meter: Meter,
  declined: readonly string[],
): Promise<PieceResult> {
  const slow = await ask(SLOW, piece, only, meter);
  const why = [...declined, ...slow.why];
  if (slow.solved !== undefined) return { ...slow, why };
  if (meter.interruption === undefined) {
    if (only === undefined) return await byBranching(piece, meter, why);
    if (only === "branch") return { engine: only, why, solved: await branch(piece, meter) };
    if (only === "mip") return { engine: only, why, solved: await mip(piece, meter) };
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

/** Branch and bound under a budget; if that is not enough, again from the best that HiGHS finds. */
async function byBranching(piece: Piece, meter: Meter, why: string[]): Promise<PieceResult> {
  const first = await branch(piece, meter.within(FIRST_BRANCH_WORK));
  if (first.status === "optimal" || meter.interruption !== undefined) {
    return { engine: "branch", why, solved: first };
  }
  why.push("branch and bound did not finish within its first budget of work");
  const helped = await mip(piece, meter, { start: first, nodeLimit: MIP_NODES });
  why.push(`mip found ${helped.weight > first.weight ? "a better choice" : "nothing better"}`);
  const second = meter.interruption === undefined ? await branch(piece, meter, helped) : helped;
  if (second.status === "optimal") return { engine: "branch", why, solved: second };
  const { floatingBound } = helped;
  return {
    engine: second === helped ? "mip" : "branch",
    why,
    solved: {
      ...second,
      upperBound: Math.min(first.upperBound, helped.upperBound, second.upperBound),
      ...(floatingBound !== undefined && { floatingBound }),
    },
  };
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
