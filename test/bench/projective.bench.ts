/**
 * The projective engine from 25 to 1,000,000 items, beside the half-integral kernel that every run
 * needs, and beside HiGHS: square mirrored grids, then grids with edges taken out and drawn out, in
 * random order. Weights are w = Mᵀc for random edge costs c, the kind that leaves (nearly) the whole
 * graph in the kernel; its largest component is solved. Every answer is checked by its certificate.
 */
import process from "node:process";
import { neighbourLists, scratchFor } from "../../lib/certify/play.ts";
import { projectiveBound } from "../../lib/certify/projective.ts";
import type { ProjectiveProof } from "../../lib/certify/certificate.ts";
import { componentSubgraphs } from "../../lib/graph/components.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { runHighs } from "../../lib/polytope/highs.ts";
import { stableSetModel } from "../../lib/polytope/model.ts";
import { evenFaceEmbedding } from "../../lib/parity/even-face.ts";
import { halfIntegralKernel } from "../../lib/reduce/kernel.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import type { Piece } from "../../lib/solve/engine.ts";
import { solveProjective } from "../../lib/solve/projective.ts";
import { directedDual } from "../../lib/solve/projective/directed-dual.ts";
import { leastOneSidedCycle } from "../../lib/solve/projective/least-cycle.ts";
import { sourceWalk } from "../../lib/solve/projective/source-walk.ts";
import { isStable, weightOf } from "../oracle/brute-force.ts";
import { hardWeights, mirroredGrid, thinnedGrid } from "../support/mirrored-grid.ts";

/** One line of the table; times in milliseconds. */
export interface ProjectiveRow {
  readonly family: "grid" | "irregular";
  /** Items of the component solved. */
  readonly n: number;
  readonly weight: number;
  /** The half-integral kernel alone. */
  readonly kernel: number;
  /** The engine: recognition of the embedding, search, lifting, certificate. */
  readonly engine: number;
  /** Of this the search for a least one-sided cycle, run once more on its own. */
  readonly search: number;
  /** The check of the certificate. */
  readonly check: number;
  /** (kernel + engine + check) / kernel. */
  readonly ratio: number;
  readonly distances: number;
  /** HiGHS on edge rows; absent where it was not run. */
  readonly highs?: number;
  /** What HiGHS ended with. */
  readonly highsSays?: string;
  /** Peak resident memory of the process so far, in megabytes; rows go up in size. */
  readonly peakMegabytes: number;
}

/** Sides of the grids. */
const SIDES = [5, 11, 21, 31, 100, 200, 316, 600, 1000];
/** Sides of those that are made irregular. */
const IRREGULAR = [31, 316, 900];
/** HiGHS is asked up to this many items; from some 100,000 on it goes far past its time limit. */
const HIGHS_UP_TO = 20_000;
/** Repetitions where one run takes milliseconds; the median counts. */
const REPEATED = 7, REPEAT_UP_TO = 1000;

/**
 * Runs the table.
 *
 * @param highsLimitMs limit of each run of HiGHS, in milliseconds; after two in a row that reach it,
 *   and above 20,000 items, sizes are run without it. The grids have no triangles, so edge rows are the clique rows.
 * @param sides sides of the grids
 * @param irregular sides of those that are made irregular
 * @param onRow called with each line as it is ready
 * @throws {Error} when an answer is not optimal, fails its check, or is beaten by HiGHS
 */
export async function projectiveBench(
  highsLimitMs = 60_000,
  sides: readonly number[] = SIDES,
  irregular: readonly number[] = IRREGULAR,
  onRow: (row: ProjectiveRow) => void = (row) => console.log(lineOf(row)),
): Promise<ProjectiveRow[]> {
  const rows: ProjectiveRow[] = [];
  console.log(HEAD);
  let timeouts = 0;
  const graphs = [
    ...sides.map((side) => () => mirroredGrid(side, side)),
    ...irregular.map((side) => () => thinnedGrid(side, new Random(2))),
  ];
  for (const [at, make] of graphs.entries()) {
    if (at === sides.length) timeouts = 0;
    const family = at < sides.length ? "grid" : "irregular";
    const graph = make();
    const weights = hardWeights(graph, new Random(1));
    const runs: Timed[] = [];
    for (let i = graph.n <= REPEAT_UP_TO ? REPEATED : 1; i > 0; i--) {
      runs.push(timed(graph, weights, family === "grid" ? 1 : 0.9));
    }
    runs.sort((a, b) => a.kernel + a.engine + a.check - b.kernel - b.engine - b.check);
    const { piece, ...run } = runs[runs.length >> 1];
    const beside = timeouts < 2 && piece.graph.n <= HIGHS_UP_TO
      ? await highsOn(piece.graph, piece.weights, run.weight, highsLimitMs)
      : {};
    timeouts = beside.highsSays === "optimal" ? 0 : timeouts + 1;
    const row: ProjectiveRow = {
      family,
      n: piece.graph.n,
      ...run,
      ratio: (run.kernel + run.engine + run.check) / run.kernel,
      ...beside,
      peakMegabytes: process.resourceUsage().maxRSS / 1024,
    };
    rows.push(row);
    onRow(row);
  }
  return rows;
}

interface Timed
  extends Pick<ProjectiveRow, "weight" | "kernel" | "engine" | "search" | "check" | "distances"> {
  readonly piece: Piece;
}

/** @param share of the graph that the largest component of its kernel must have */
function timed(whole: Graph, wholeWeights: Float64Array, share: number): Timed {
  let started = performance.now();
  const found = halfIntegralKernel(whole, wholeWeights, new Meter());
  const kernel = performance.now() - started;
  const half = Uint8Array.from(found.value, (x) => x === 1 ? 1 : 0);
  const { graph, vertices, edges } = componentSubgraphs(whole, half)
    .reduce((a, b) => a.graph.n >= b.graph.n ? a : b);
  if (graph.n < share * whole.n) {
    throw new Error(`expected ${share} of ${whole.n} vertices in one piece, got ${graph.n}`);
  }
  const weights = Float64Array.from(vertices, (v) => wholeWeights[v]);
  const doubledCosts = Float64Array.from(edges, (e) => found.doubledCosts[e]);
  const labels = Int32Array.from({ length: graph.n }, (_, v) => v);
  const piece = { graph, weights, labels, doubledCosts };
  started = performance.now();
  const answer = solveProjective(piece, new Meter());
  const engine = performance.now() - started;
  if (answer.status !== "optimal") throw new Error(`expected optimal, got ${answer.status}`);
  started = performance.now();
  const play = {
    n: graph.n,
    ...neighbourLists(graph.n, graph.tails, graph.heads),
    weights,
    vertices: labels,
    nameOf: (v: number) => `${v}`,
    scratch: scratchFor(graph.n),
  };
  const bound = projectiveBound(play, answer.proof as ProjectiveProof);
  if (bound !== BigInt(answer.weight) || !isStable(graph, answer.chosen)) {
    throw new Error(`proved ${bound}, reached ${answer.weight}`);
  }
  const check = performance.now() - started;
  return {
    piece,
    weight: answer.weight,
    kernel,
    engine,
    search: searchAlone(graph, weights, doubledCosts),
    check,
    distances: Number(answer.figures.distances),
  };
}

function searchAlone(graph: Graph, weights: Float64Array, doubledCosts: Float64Array): number {
  const meter = new Meter(), costs = Int32Array.from(doubledCosts);
  const embedding = evenFaceEmbedding(graph, meter);
  if (embedding.kind === "no") throw new Error(embedding.reason);
  const dual = directedDual(embedding.next, meter);
  const started = performance.now();
  const walk = sourceWalk(graph, dual, costs, weights.map((weight) => 2 * weight), meter);
  leastOneSidedCycle(graph, dual, costs, walk, 1, meter);
  return performance.now() - started;
}

/** HiGHS with edge rows, and whether its point, rounded and weighed here, is as good. */
async function highsOn(
  graph: Graph,
  weights: Float64Array,
  optimum: number,
  timeLimitMs: number,
): Promise<Pick<ProjectiveRow, "highs" | "highsSays">> {
  const model = stableSetModel(
    weights,
    Array.from(graph.tails, (u, e) => [u, graph.heads[e]]),
    true,
  );
  const started = performance.now();
  const outcome = await runHighs(model, { absoluteGap: 0.5, timeLimitMs });
  const highs = performance.now() - started;
  if (outcome.x === undefined) return { highs, highsSays: `${outcome.status}, no point` };
  const point = Uint8Array.from(outcome.x, (x) => x > 0.5 ? 1 : 0);
  const theirs = isStable(graph, point) ? weightOf(weights, point) : NaN;
  if (theirs > optimum) throw new Error(`HiGHS found ${theirs}, above ${optimum}`);
  if (outcome.status === "optimal" && theirs === optimum) return { highs, highsSays: "optimal" };
  return {
    highs,
    highsSays: `${outcome.status === "optimal" ? "wrongly optimal" : "stopped"} at ${theirs}`,
  };
}

const HEAD = "family            n    kernel    engine  (search)    check  ratio distances" +
  "     HiGHS  HiGHS/(kernel+engine)   peak MB  weight (HiGHS)";

/** One line of the table as text. */
function lineOf(row: ProjectiveRow): string {
  const ms = (value: number | undefined, width: number) =>
    (value === undefined
      ? "-"
      : value < 100
      ? `${value.toFixed(1)} ms`
      : `${(value / 1000).toFixed(2)} s`).padStart(width);
  const factor = row.highs === undefined
    ? "-"
    : `${row.highsSays === "optimal" ? "" : ">"}${
      Math.round(row.highs / (row.kernel + row.engine)).toLocaleString("en")
    }`;
  return [
    row.family.padEnd(9),
    row.n.toLocaleString("en").padStart(9),
    ms(row.kernel, 9),
    ms(row.engine, 9),
    ms(row.search, 9),
    ms(row.check, 9),
    row.ratio.toFixed(2).padStart(6),
    String(row.distances).padStart(9),
    ms(row.highs, 9),
    factor.padStart(22),
    row.peakMegabytes.toFixed(0).padStart(9),
    ` ${row.weight}${row.highsSays === undefined ? "" : ` (${row.highsSays})`}`,
  ].join(" ");
}
