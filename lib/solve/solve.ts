/**
 * The public `solve`: takes the question apart, runs the dispatcher here or in a worker, and puts the
 * answer together with its certificate.
 */
import type { Certificate } from "../certify/certificate.ts";
import { Solution, type SolutionPart } from "../certify/solution.ts";
import { graphFromEdges, inducedSubgraph } from "../graph/graph.ts";
import type { Instance } from "../instance/instance.ts";
import { hereOrAside, type Job } from "../run/aside.ts";
import { InstanceError } from "../run/errors.ts";
import { checkRunOptions, type Progress, type RunOptions } from "../run/options.ts";
import { certificateParts, dispatch, type Outcome, type Problem } from "./dispatch.ts";
import type { EngineName } from "./engine.ts";

/** What may be asked beside the instance. */
export interface SolveOptions extends RunOptions {
  /** Ids that must be chosen. */
  choose?: readonly string[];
  /** Ids that must be left. */
  leave?: readonly string[];
  /** Use this engine alone on every component of the kernel. */
  engine?: EngineName;
}

/**
 * Finds the conflict-free choice of greatest worth and proves that nothing better exists.
 *
 * @param instance items and conflicts
 * @param options what must be chosen or left, limits, progress
 * @returns the solution. With a limit or a stop it is the best so far with an honest bound, never an
 *   exception. `infeasible` when two required items are in conflict.
 * @throws {InstanceError} when `choose` or `leave` names unknown ids, or one id in both
 * @throws {RangeError} for run options that mean nothing
 *
 * Complexity: one maximum flow for what the relaxation settles; beyond, that of the engine each
 * component needs, which `parts` tells.
 */
export async function solve(instance: Instance, options: SolveOptions = {}): Promise<Solution> {
  checkSolveOptions(options);
  const question = pose(instance, options);
  const began = performance.now();
  if (typeof question === "string") {
    return answer(instance, options, question, performance.now() - began);
  }
  const { problem, given } = question;
  const { graph, weights, labels, engine } = problem;
  const outcome = await hereOrAside(
    "solve",
    graph.n + graph.m,
    toUnits(options, instance.scale, given),
    (meter) => dispatch(problem, meter),
    (): Posted => (
      { n: graph.n, tails: graph.tails, heads: graph.heads, weights, labels, engine }
    ),
  );
  return answer(instance, options, { question, outcome }, performance.now() - began);
}

/** Options by name; anything else is refused, so that a misspelt one is not passed over. */
const OPTIONS: Readonly<Record<keyof SolveOptions, true>> = {
  timeLimitMs: true,
  signal: true,
  seed: true,
  workers: true,
  onProgress: true,
  choose: true,
  leave: true,
  engine: true,
};
const ENGINES: Readonly<Record<EngineName, true>> = {
  bipartite: true,
  transversal: true,
  projective: true,
  branch: true,
  mip: true,
};

function checkSolveOptions(options: SolveOptions): void {
  const unknown = Object.keys(options).filter((name) => !Object.hasOwn(OPTIONS, name));
  if (unknown.length > 0) {
    throw new RangeError(
      `expected options among ${Object.keys(OPTIONS).join(", ")}, got ${unknown.join(", ")}`,
    );
  }
  if (options.engine !== undefined && !Object.hasOwn(ENGINES, options.engine)) {
    throw new RangeError(
      `engine: expected one of ${Object.keys(ENGINES).join(", ")}, got ${options.engine}`,
    );
  }
  checkRunOptions(options);
}

/** The instance with what was required and ruled out taken off. */
interface Question {
  readonly problem: Problem;
  /** Length problem.graph.n: the item each vertex is. */
  readonly itemOf: Int32Array;
  /** Items required, ruled out, and worth nothing but free. */
  readonly choose: readonly number[];
  readonly leave: readonly number[];
  readonly worthless: readonly number[];
  /** Scaled weight of the required items. */
  readonly given: number;
}

/** The question as a problem, or a sentence that says why it has no answer. */
function pose(instance: Instance, options: SolveOptions): Question | string {
  const { graph, ids, weights } = instance;
  const problems: string[] = [];
  const indices = (name: string, list: readonly string[] = []) =>
    [...new Set(list)].flatMap((id) => {
      const i = instance.indexOf(id);
      if (i < 0) problems.push(`${name}: there is no item ${JSON.stringify(id)}`);
      return i < 0 ? [] : [i];
    });
  const choose = indices("choose", options.choose), leave = indices("leave", options.leave);
  const required = new Set(choose);
  for (const i of leave) {
    if (required.has(i)) problems.push(`${JSON.stringify(ids[i])} is both in choose and in leave`);
  }
  if (problems.length > 0) throw new InstanceError(problems);

  const open = new Uint8Array(instance.size).fill(1);
  let given = 0;
  for (const i of leave) open[i] = 0;
  for (const i of choose) {
    open[i] = 0;
    given += weights[i];
    for (let a = graph.offsets[i]; a < graph.offsets[i + 1]; a++) {
      const j = graph.targets[a];
      open[j] = 0;
      if (required.has(j)) {
        return `${JSON.stringify(ids[Math.min(i, j)])} and ` +
          `${JSON.stringify(ids[Math.max(i, j)])} are both required, but they are in conflict`;
      }
    }
  }
  const worthless: number[] = [];
  for (let i = 0; i < open.length; i++) {
    if (open[i] === 0 || weights[i] > 0) continue;
    open[i] = 0;
    worthless.push(i);
  }
  const { graph: rest, vertices } = inducedSubgraph(graph, open);
  return {
    problem: {
      graph: rest,
      weights: Float64Array.from(vertices, (i) => weights[i]),
      labels: Int32Array.from(vertices, (i) => instance.canonical.rank[i]),
      ...(options.engine !== undefined && { engine: options.engine }),
    },
    itemOf: vertices,
    choose,
    leave,
    worthless,
    given,
  };
}

/** Options whose progress reports speak in the instance's unit. */
function toUnits(options: RunOptions, scale: number, given: number): RunOptions {
  const { timeLimitMs, signal, seed, workers, onProgress } = options;
  return {
    timeLimitMs,
    signal,
    seed,
    workers,
    onProgress: onProgress && ((progress: Progress) =>
      onProgress({
        ...progress,
        ...(progress.lower !== undefined && { lower: (progress.lower + given) / scale }),
        ...(progress.upper !== undefined && { upper: (progress.upper + given) / scale }),
      })),
  };
}

/** What is posted to the worker for the job "solve". */
interface Posted {
  readonly n: number;
  readonly tails: Int32Array;
  readonly heads: Int32Array;
  readonly weights: Float64Array;
  readonly labels: Int32Array;
  readonly engine: EngineName | undefined;
}

/** The worker's side of `solve`. */
export const solveJob: Job = async (input, meter) => {
  const { n, tails, heads, weights, labels, engine } = input as Posted;
  const graph = graphFromEdges(n, tails, heads);
  return await dispatch({ graph, weights, labels, ...(engine && { engine }) }, meter);
};

function answer(
  instance: Instance,
  options: SolveOptions,
  found: string | { question: Question; outcome: Outcome },
  elapsedMs: number,
): Solution {
  const { scale, canonical } = instance;
  const common = {
    choose: [...new Set(options.choose ?? [])],
    leave: [...new Set(options.leave ?? [])],
    elapsedMs,
    instance: {
      name: instance.name,
      unit: instance.unit,
      columns: instance.columns,
      items: instance.size,
      conflicts: instance.conflictCount,
      fingerprint: instance.fingerprint,
    },
  };
  if (typeof found === "string") {
    return new Solution({
      ...common,
      status: "infeasible",
      reason: found,
      chosen: [],
      weight: 0,
      upperBound: 0,
      parts: [],
    });
  }
  const { question, outcome } = found;
  const chosen = new Uint8Array(instance.size);
  for (const i of question.choose) chosen[i] = 1;
  for (let v = 0; v < outcome.chosen.length; v++) {
    if (outcome.chosen[v] !== 0) chosen[question.itemOf[v]] = 1;
  }
  let weight = 0, upperBound = question.given, floating = question.given, optimal = true;
  for (let i = 0; i < chosen.length; i++) if (chosen[i] !== 0) weight += instance.weights[i];
  for (const part of outcome.parts) {
    upperBound += part.upperBound;
    floating += Math.min(part.upperBound, part.floatingBound ?? Infinity);
    optimal &&= part.optimal;
  }
  if (optimal && weight !== upperBound) {
    throw new Error(`parts called optimal add up to ${upperBound}, the choice to ${weight}`);
  }
  const unsolved = outcome.parts.filter((part) => !part.optimal).length;
  return new Solution({
    ...common,
    status: optimal ? "optimal" : "feasible",
    ...(!optimal && {
      reason: `${unsolved} of ${outcome.parts.length} parts not solved to the end`,
    }),
    chosen: instance.ids.filter((_, i) => chosen[i] !== 0),
    weight: weight / scale,
    upperBound: upperBound / scale,
    ...(floating < upperBound && { floatingBound: floating / scale }),
    parts: outcome.parts.map((part): SolutionPart => ({
      items: part.vertices.length,
      conflicts: part.conflicts,
      engine: part.engine,
      why: part.why,
      weight: part.weight / scale,
      upperBound: part.upperBound / scale,
      optimal: part.optimal,
      figures: part.figures,
      elapsedMs: part.elapsedMs,
    })),
    ...(optimal && { certificate: certificateOf(question, outcome, upperBound) }),
  });

  function certificateOf(question: Question, outcome: Outcome, bound: number): Certificate {
    const ranks = (items: readonly number[]) => items.map((i) => canonical.rank[i]);
    const nothing = question.worthless.length === 0 ? [] : [{
      vertices: ranks(question.worthless),
      bound: 0,
      proof: { rule: "packing" as const, ends: [], doubled: [] },
    }];
    return {
      kind: "certificate",
      version: 1,
      fingerprint: instance.fingerprint,
      choose: ranks(question.choose),
      leave: ranks(question.leave),
      bound,
      parts: [...nothing, ...certificateParts(outcome.parts)],
    };
  }
}
