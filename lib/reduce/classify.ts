/**
 * `classify`: the anatomy of an instance by its odd cycles. Every connected component is bipartite,
 * near-bipartite, projective or general, with its numbers and their witnesses; the numbers of the
 * whole instance are sums over its components. The odd cycle packing number also gives the largest
 * subdeterminant of the conflict matrix, 2^OCP (J. Grossman, D. Kulkarni and I. Schochetman, "On the
 * minors of an incidence matrix and its Smith normal form", Linear Algebra Appl. 218, 1995).
 */
import { components, componentSubgraphs } from "../graph/components.ts";
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import type { Instance } from "../instance/instance.ts";
import { classifyGraph, type GraphClass, type GraphKind } from "../parity/classify-graph.ts";
import type { EvenFaceEmbedding } from "../parity/even-face-result.ts";
import { hereOrAside, type Job } from "../run/aside.ts";
import { Displayable } from "../run/displayable.ts";
import type { Meter } from "../run/meter.ts";
import { checkRunOptions, type RunOptions } from "../run/options.ts";

/** A number that is known to lie between two others, both included. */
export interface Interval {
  readonly lower: number;
  readonly upper: number;
}

/** One connected component of the conflict graph. */
export interface ClassifiedComponent {
  /** Ids, in the order of the instance. */
  readonly items: readonly string[];
  readonly kind: GraphKind;
  /** `items`: a transversal of `upper` items, without which the component is bipartite. */
  readonly oddCycleTransversal: Interval & { readonly items: readonly string[] };
  /** `cycles`: disjoint odd cycles, ids in order. */
  readonly oddCyclePacking: Interval & { readonly cycles: readonly (readonly string[])[] };
  /** Whether it has an embedding in the projective plane with all faces even. */
  readonly evenFace: "yes" | "no" | "unknown";
  /** The two sides of a bipartite component. */
  readonly sides?: readonly [readonly string[], readonly string[]];
  /** What settled the packing number, or why it is open; completes "…, because". */
  readonly because: string;
}

/** A component's even-face embedding, on vertices numbered within the component. */
export interface ComponentEmbedding {
  readonly graph: Graph;
  readonly embedding: EvenFaceEmbedding;
}

/** What `Classification` is made from. */
export interface ClassificationData {
  readonly instance: {
    readonly name: string;
    readonly items: number;
    readonly conflicts: number;
    readonly fingerprint: string;
  };
  readonly components: readonly ClassifiedComponent[];
  readonly elapsedMs: number;
}

/** The class of an instance. */
export class Classification extends Displayable implements ClassificationData {
  readonly kind = "classification";
  readonly instance: ClassificationData["instance"];
  /** In the order of their first item. */
  readonly components: readonly ClassifiedComponent[];
  /** Sums over the components. */
  readonly oddCycleTransversal: Interval;
  readonly oddCyclePacking: Interval;
  /** 2^packing as a number: exact up to 2^1023, `Infinity` beyond. */
  readonly maxSubdeterminant: Interval;
  readonly elapsedMs: number;
  readonly #embeddings: ReadonlyMap<number, ComponentEmbedding>;

  /**
   * Takes the sums over the components.
   *
   * @param data the plain data
   * @param embeddings by index of the component
   */
  constructor(
    data: ClassificationData,
    embeddings: ReadonlyMap<number, ComponentEmbedding> = new Map(),
  ) {
    super();
    this.instance = data.instance;
    this.components = data.components;
    this.oddCycleTransversal = total(data.components.map((c) => c.oddCycleTransversal));
    this.oddCyclePacking = total(data.components.map((c) => c.oddCyclePacking));
    const { lower, upper } = this.oddCyclePacking;
    this.maxSubdeterminant = { lower: 2 ** lower, upper: 2 ** upper };
    this.elapsedMs = data.elapsedMs;
    this.#embeddings = embeddings;
  }

  /**
   * The even-face embedding of a component, for drawing it. Not part of the plain data: absent from
   * JSON and from a classification read back from it.
   *
   * @param component an index into `components`
   */
  embeddingOf(component: number): ComponentEmbedding | undefined {
    return this.#embeddings.get(component);
  }

  /** The class in one sentence that can be repeated to a client. */
  get sentence(): string {
    const { lower, upper } = this.oddCyclePacking;
    const k = this.oddCycleTransversal;
    if (k.upper === 0) {
      return "The conflicts are two-sided throughout, so the best choice comes out of one flow " +
        "computation, with its proof.";
    }
    if (upper <= 1) {
      const far = this.components.some((c) => c.kind === "projective");
      return "No two odd rings of conflicts are disjoint" +
        (far
          ? "; such instances are solved exactly by a shortest path in the projective plane" +
            `, although ${amount(k)} items stand between this one and two sides.`
          : `, and leaving out ${plural(k, "item")} makes the conflicts two-sided, so the best ` +
            "choice is found exactly by a few flow computations.");
    }
    if (lower <= 1) {
      return "It was not settled in the time allowed whether two odd rings of conflicts are disjoint.";
    }
    const rings = lower === upper ? `exactly ${lower}` : `at least ${lower}`;
    if (k.upper <= 12) {
      return `There are ${rings} disjoint odd rings of conflicts, and ` +
        `leaving out ${plural(k, "item")} makes the conflicts two-sided, so the best choice is ` +
        "found exactly by trying what these items do.";
    }
    const general = this.components.filter((c) => c.kind === "general").length;
    return `There are ${rings} disjoint odd rings of conflicts` +
      (general === 0
        ? ", each in a part that special methods solve exactly."
        : `, and ${
          amount(k)
        } items stand between this instance and two sides: no special structure ` +
          `covers ${general === 1 ? "one of its parts" : `${general} of its parts`}, which needs ` +
          "a search.");
  }

  /** The class in a few lines. */
  override toString(): string {
    const lines = [this.sentence];
    const counts = new Map<GraphKind, number>();
    for (const { kind } of this.components) counts.set(kind, (counts.get(kind) ?? 0) + 1);
    lines.push(
      [...counts].map(([kind, count]) => `${count} ${kind} component${count === 1 ? "" : "s"}`)
        .join(", ") || "no items",
    );
    lines.push(`odd cycle transversal: ${amount(this.oddCycleTransversal)} items`);
    lines.push(`odd cycle packing: ${amount(this.oddCyclePacking)}`);
    const { lower, upper } = this.oddCyclePacking;
    lines.push(
      `largest subdeterminant of the conflict matrix: 2^${lower}` +
        (upper > lower ? ` to 2^${upper}` : ""),
    );
    const pair = this.components.find((c) => c.oddCyclePacking.cycles.length >= 2);
    if (pair !== undefined) {
      const [first, second] = pair.oddCyclePacking.cycles;
      lines.push(`two disjoint odd cycles: ${written(first)} and ${written(second)}`);
    }
    return lines.join("\n");
  }
}

/**
 * Classifies an instance.
 *
 * @param instance items and conflicts; weights play no part
 * @param options limits and progress; what a limit leaves open shows as an interval or "unknown"
 * @returns the class of every component with witnesses, and the numbers of the whole. Transversals
 *   are exact up to 12 items; whether the packing number is 0, 1 or at least 2 is decided exactly.
 * @throws {RangeError} for run options that mean nothing
 *
 * Complexity: near-linear, except for transversals that no packing proves: 3^k searches at worst for
 * k items, and at most 5·10^8 units of work where it is not clear that k is at most 12.
 */
export async function classify(
  instance: Instance,
  options: RunOptions = {},
): Promise<Classification> {
  checkRunOptions(options);
  const began = performance.now();
  const { graph, ids } = instance;
  const { n, m, tails, heads } = graph;
  const classes = await hereOrAside(
    "classify",
    n + m,
    options,
    (meter) => classifyAll(graph, meter),
    (): Posted => ({ n, tails, heads }),
  );
  const { of } = components(graph);
  const members: number[][] = classes.map(() => []);
  for (let v = 0; v < graph.n; v++) members[of[v]].push(v);
  const embeddings = new Map<number, ComponentEmbedding>();
  const parts = componentSubgraphs(graph);
  const list = classes.map((found, c): ClassifiedComponent => {
    const name = (v: number): string => ids[members[c][v]];
    const { transversal, packing, side, embedding } = found;
    if (embedding !== undefined) embeddings.set(c, { graph: parts[c].graph, embedding });
    return {
      items: members[c].map((v) => ids[v]),
      kind: found.kind,
      oddCycleTransversal: {
        lower: transversal.lower,
        upper: transversal.upper,
        items: Array.from(transversal.vertices, name),
      },
      oddCyclePacking: {
        lower: packing.lower,
        upper: packing.upper,
        cycles: packing.cycles.map((cycle) => Array.from(cycle, name)),
      },
      evenFace: found.evenFace,
      ...(side !== undefined && { sides: sidesOf(members[c], side, ids) }),
      because: packing.because,
    };
  });
  return new Classification({
    instance: {
      name: instance.name,
      items: instance.size,
      conflicts: instance.conflictCount,
      fingerprint: instance.fingerprint,
    },
    components: list,
    elapsedMs: performance.now() - began,
  }, embeddings);
}

/** What is posted to the worker for the job "classify". */
interface Posted {
  readonly n: number;
  readonly tails: Int32Array;
  readonly heads: Int32Array;
}

/** The worker's side of `classify`. */
export const classifyJob: Job = async (input, meter) => {
  const { n, tails, heads } = input as Posted;
  return await classifyAll(graphFromEdges(n, tails, heads), meter);
};

/** The classes of the components, in order of their least vertex. */
async function classifyAll(graph: Graph, meter: Meter): Promise<GraphClass[]> {
  const parts = componentSubgraphs(graph);
  const classes: GraphClass[] = [];
  for (const part of parts) {
    await meter.breathe();
    meter.report("classification", { done: classes.length, total: parts.length });
    classes.push(classifyGraph(part.graph, meter));
  }
  return classes;
}

function sidesOf(
  members: readonly number[],
  side: Uint8Array,
  ids: readonly string[],
): [string[], string[]] {
  const sides: [string[], string[]] = [[], []];
  members.forEach((v, i) => sides[side[i]].push(ids[v]));
  return sides;
}

function total(intervals: readonly Interval[]): Interval {
  let lower = 0, upper = 0;
  for (const interval of intervals) {
    lower += interval.lower;
    upper += interval.upper;
  }
  return { lower, upper };
}

/** "5" or "5 to 9". */
function amount({ lower, upper }: Interval): string {
  return lower === upper ? `${lower}` : `${lower} to ${upper}`;
}

function plural(interval: Interval, noun: string): string {
  return `${amount(interval)} ${noun}${interval.upper === 1 ? "" : "s"}`;
}

/** Longest cycle that the text form writes out in full. */
const SHOWN = 12;

function written(cycle: readonly string[]): string {
  return cycle.length <= SHOWN
    ? cycle.join(" – ")
    : `${cycle.slice(0, SHOWN - 1).join(" – ")} – … (${cycle.length} items)`;
}
