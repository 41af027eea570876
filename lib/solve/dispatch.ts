/**
 * Solves a weighted graph: half-integral kernel, connected components, and for each component the
 * engines in turn, cheap special ones first. What was tried, what declined and why is recorded.
 */
import type { CertificatePart, Proof } from "../certify/certificate.ts";
import { componentSubgraphs } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { halfIntegralKernel } from "../reduce/kernel.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import type { EngineName, Piece, Solved } from "./engine.ts";
import { greedyPacking, greedyStableSet } from "./greedy.ts";
import { solvePiece } from "./piece.ts";

/** A weighted graph to solve; all weights are positive integers with a sum below 2^53. */
export interface Problem {
  readonly graph: Graph;
  readonly weights: Float64Array;
  /** Length n: the number of each vertex in the certificate. */
  readonly labels: Int32Array;
  /** Use this engine alone. */
  readonly engine?: EngineName;
}

/** One part of the answer, in scaled units. */
export interface OutcomePart {
  /** Vertices by label. */
  readonly vertices: Int32Array;
  readonly conflicts: number;
  readonly engine: string;
  readonly why: readonly string[];
  readonly weight: number;
  readonly upperBound: number;
  readonly floatingBound?: number;
  readonly optimal: boolean;
  readonly figures: Readonly<Record<string, number | string>>;
  readonly elapsedMs: number;
  readonly proof?: Proof;
}

export interface Outcome {
  /** Length n, entries 0 and 1. */
  readonly chosen: Uint8Array;
  readonly parts: readonly OutcomePart[];
}

/**
 * Solves a problem on the calling thread.
 *
 * @param problem the graph, its weights and the labels of its vertices
 * @param meter counts the work; when it runs out, what is best so far comes back with its bound
 * @returns a stable set and the parts that bound it from above
 * @throws {Error} only for faults of this library
 */
export async function dispatch(problem: Problem, meter: Meter): Promise<Outcome> {
  const { graph, weights, labels } = problem;
  const started = meter.elapsedMs;
  const chosen = new Uint8Array(graph.n);
  if (graph.n === 0) return { chosen, parts: [] };
  if (twoColouring(graph).side !== undefined) return await whole(problem, meter);
  meter.report("half-integral kernel", { done: 0, total: 1 }, true);
  let kernel;
  try {
    kernel = halfIntegralKernel(graph, weights, meter);
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    return stoppedInKernel(problem, error, meter.elapsedMs - started);
  }
  const { value, doubledCosts } = kernel;
  const parts: OutcomePart[] = [];
  const settled = settledPart(problem, value, doubledCosts, chosen);
  if (settled !== undefined) parts.push({ ...settled, elapsedMs: meter.elapsedMs - started });

  const half = Uint8Array.from(value, (x) => x === 1 ? 1 : 0);
  const subgraphs = componentSubgraphs(graph, half);
  const relaxed = new Float64Array(subgraphs.length);
  const pieces = subgraphs.map(({ graph: sub, vertices, edges }, i): Piece => {
    const pieceWeights = picked(weights, vertices);
    // All-half is optimal on a component of the kernel: half its weight bounds it.
    relaxed[i] = Math.floor(sum(pieceWeights) / 2);
    return {
      graph: sub,
      weights: pieceWeights,
      labels: vertices.map((v) => labels[v]),
      doubledCosts: picked(doubledCosts, edges),
    };
  });
  let lower = sum(parts.map((part) => part.weight));
  let upper = lower + sum(relaxed);
  for (let i = 0; i < pieces.length; i++) {
    await meter.breathe();
    const piece = pieces[i];
    const before = { lower, upper: upper - relaxed[i] };
    const began = meter.elapsedMs;
    meter.report("components", { done: i, total: pieces.length, lower, upper });
    const reporting = meter.reporting((progress) => ({
      ...progress,
      lower: before.lower + (progress.lower ?? 0),
      upper: before.upper + (progress.upper ?? relaxed[i]),
    }));
    const { engine, why, solved } = await solvePiece(piece, problem.engine, reporting);
    const { vertices } = subgraphs[i];
    for (let j = 0; j < vertices.length; j++) chosen[vertices[j]] = solved.chosen[j];
    lower += solved.weight;
    upper = before.upper + solved.upperBound;
    parts.push({
      ...partOf(piece, solved),
      engine,
      why,
      elapsedMs: meter.elapsedMs - began,
    });
  }
  meter.report("done", { done: pieces.length, total: pieces.length, lower, upper }, true);
  return { chosen, parts };
}

/** A bipartite graph needs no kernel: its engine solves it in one go. */
async function whole(problem: Problem, meter: Meter): Promise<Outcome> {
  const started = meter.elapsedMs;
  const { engine, why, solved } = await solvePiece(problem, problem.engine, meter);
  const part = { ...partOf(problem, solved), engine, why, elapsedMs: meter.elapsedMs - started };
  return { chosen: solved.chosen, parts: [part] };
}

function partOf(piece: Piece, solved: Solved) {
  const { weight, upperBound, floatingBound, figures, proof, status } = solved;
  return {
    vertices: piece.labels,
    conflicts: piece.graph.m,
    weight,
    upperBound,
    optimal: status === "optimal",
    figures,
    ...(floatingBound !== undefined && { floatingBound }),
    ...(proof !== undefined && { proof }),
  };
}

/** The vertices that the relaxation settles, with the packing that proves them; sets `chosen`. */
function settledPart(
  { graph, labels, weights }: Problem,
  value: Uint8Array,
  doubledCosts: Float64Array,
  chosen: Uint8Array,
): Omit<OutcomePart, "elapsedMs"> | undefined {
  const vertices: number[] = [];
  let weight = 0;
  for (let v = 0; v < graph.n; v++) {
    if (value[v] === 1) continue;
    vertices.push(labels[v]);
    if (value[v] === 0) continue;
    chosen[v] = 1;
    weight += weights[v];
  }
  if (vertices.length === 0) return undefined;
  const ends: number[] = [], doubled: number[] = [];
  let conflicts = 0;
  for (let e = 0; e < graph.m; e++) {
    const u = graph.tails[e], v = graph.heads[e];
    if (value[u] === 1 || value[v] === 1) continue;
    conflicts++;
    if (doubledCosts[e] === 0) continue;
    ends.push(labels[u], labels[v]);
    doubled.push(doubledCosts[e]);
  }
  return {
    vertices: Int32Array.from(vertices),
    conflicts,
    engine: "relaxation",
    why: ["the half-integral relaxation settles these items"],
    weight,
    upperBound: weight,
    optimal: true,
    figures: {},
    proof: { rule: "packing", ends: Int32Array.from(ends), doubled: Float64Array.from(doubled) },
  };
}

/** What is left when the run stops before the kernel is known. */
function stoppedInKernel(problem: Problem, stop: Interrupted, elapsedMs: number): Outcome {
  const { graph, weights, labels } = problem;
  const chosen = greedyStableSet(graph, weights);
  const { upperBound, proof } = greedyPacking(graph, weights, labels);
  let weight = 0;
  for (let v = 0; v < graph.n; v++) if (chosen[v] !== 0) weight += weights[v];
  const optimal = weight === upperBound;
  return {
    chosen,
    parts: [{
      vertices: labels,
      conflicts: graph.m,
      engine: "greedy",
      why: [`the run ended (${stop.reason}) before the half-integral kernel was known`],
      weight,
      upperBound,
      optimal,
      figures: {},
      elapsedMs,
      proof,
    }],
  };
}

/** The parts of an outcome as a certificate holds them; every part must have a proof. */
export function certificateParts(parts: readonly OutcomePart[]): CertificatePart[] {
  return parts.map(({ vertices, upperBound, proof }) => {
    if (proof === undefined) throw new Error("a part without a proof cannot be certified");
    return { vertices, bound: upperBound, proof };
  });
}

function picked(values: Float64Array, places: Int32Array): Float64Array {
  const some = new Float64Array(places.length);
  for (let i = 0; i < places.length; i++) some[i] = values[places[i]];
  return some;
}

function sum(values: ArrayLike<number>): number {
  let total = 0;
  for (let i = 0; i < values.length; i++) total += values[i];
  return total;
}
