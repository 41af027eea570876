/**
 * Least odd cycle transversals: the fewest vertices whose removal leaves a bipartite graph. Exact
 * while the answer is small, an interval beyond or when the meter runs out.
 *
 * The graph is reduced to its odd kernel, and each component is treated alone: disjoint odd cycles
 * from below, greedy balanced subgraphs from above, and where these do not meet, iterative
 * compression: the vertices left over by the balanced subgraph are put back one by one, and each
 * time the transversal would grow, the compression step finds a smaller one or proves that it must.
 * At most O(3^k · n) augmenting path searches of O(m) each for a transversal of k vertices, far fewer
 * in practice (see parity/compress.ts).
 */
import { componentSubgraphs } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import type { OddCycle } from "./balance.ts";
import { greedyTransversal } from "./balanced-subgraph.ts";
import { Compressor } from "./compress.ts";
import { greedyOddCycles } from "./greedy-packing.ts";
import { expandCycle, type OddKernel, oddKernel } from "./odd-kernel.ts";

/** Transversals of up to so many vertices are found exactly, unless asked otherwise. */
export const EXACT_UP_TO = 12;

/** A transversal between two bounds. */
export interface Transversal {
  /** No odd cycle transversal has fewer vertices. */
  readonly lower: number;
  /** The number of `vertices`; least exactly if equal to `lower`. */
  readonly upper: number;
  /** Length `upper`, increasing: a transversal. */
  readonly vertices: Int32Array;
  /** Vertex-disjoint odd cycles, vertices in order; where there are `lower` they prove it. */
  readonly cycles: readonly Int32Array[];
  /** Why the bounds are apart, if they are. */
  readonly stopped?: "limit" | "time" | "stop" | "work";
}

/** What `leastTransversal` may be told. */
export interface TransversalOptions {
  /** Length n; vertices with 0 are left out (default: none). */
  readonly keep?: Uint8Array;
  /** Stop once it is proved that more than so many vertices are needed (default 12). */
  readonly limit?: number;
}

/**
 * Finds a least odd cycle transversal.
 *
 * @param graph any graph
 * @param meter counts about one unit for each arc scanned; when it runs out the bounds so far return
 * @returns bounds, the transversal, and disjoint odd cycles
 */
export function leastTransversal(
  graph: Graph,
  meter: Meter,
  options: TransversalOptions = {},
): Transversal {
  const limit = options.limit ?? EXACT_UP_TO;
  let kernel: OddKernel;
  try {
    kernel = oddKernel(graph, meter, options.keep);
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    // Nothing is known yet; all vertices are a transversal.
    const all: number[] = [];
    for (let v = 0; v < graph.n; v++) if (options.keep?.[v] !== 0) all.push(v);
    return {
      lower: 0,
      upper: all.length,
      vertices: Int32Array.from(all),
      cycles: [],
      stopped: error.reason,
    };
  }
  const cycles = kernel.forced.map((f) => f.cycle);
  const vertices = kernel.forced.map((f) => f.vertex);
  const parts = componentSubgraphs(kernel.graph).map((part) =>
    new Part(part.graph, Uint8Array.from(part.edges, (e) => kernel.even[e]), part)
  );
  let stopped: Transversal["stopped"];
  let lower = kernel.forced.length;
  try {
    for (const part of parts) {
      part.bound(meter);
      lower += part.lower;
    }
    // The small ones first: what they need counts against the limit of the large ones.
    for (const part of [...parts].sort((a, b) => a.graph.n - b.graph.n)) {
      lower -= part.lower;
      try {
        part.close(meter, limit - lower);
      } finally {
        lower += part.lower;
      }
      if (part.lower < part.best.length) stopped = "limit";
    }
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    stopped = error.reason;
    lower = kernel.forced.length + parts.reduce((sum, part) => sum + part.lower, 0);
  }
  for (const part of parts) {
    for (const v of part.best) vertices.push(kernel.vertices[part.whole.vertices[v]]);
    for (const c of part.cycles) {
      cycles.push(expandCycle(
        kernel,
        c.vertices.map((v) => part.whole.vertices[v]),
        c.edges.map((e) => part.whole.edges[e]),
      ));
    }
  }
  const found = {
    lower,
    upper: vertices.length,
    vertices: Int32Array.from(vertices).sort(),
    cycles,
  };
  return stopped === undefined ? found : { ...found, stopped };
}

/**
 * The same for one component of an odd kernel, with vertices numbered as there.
 *
 * @param graph a component of an odd kernel
 * @param even length m, nonzero where an edge is even
 * @param limit stop once it is proved that more than so many vertices are needed
 * @returns a lower bound, and a transversal that meets it unless the bound is above the limit
 * @throws {Interrupted} when the meter runs out
 */
export function transversalWithin(
  graph: Graph,
  even: Uint8Array,
  limit: number,
  meter: Meter,
): { lower: number; best: readonly number[]; cycles: readonly OddCycle[] } {
  const part = new Part(graph, even, undefined);
  part.bound(meter);
  part.close(meter, limit);
  return part;
}

/** One component of the kernel. */
class Part<Whole> {
  lower = 0;
  best: number[];
  cycles: OddCycle[] = [];

  constructor(readonly graph: Graph, readonly even: Uint8Array, readonly whole: Whole) {
    this.best = Array.from({ length: graph.n }, (_, v) => v);
  }

  /** Greedy bounds. */
  bound(meter: Meter): void {
    this.cycles = greedyOddCycles(this.graph, meter, this.even);
    this.lower = this.cycles.length;
    this.best = greedyTransversal(this.graph, this.even, this.lower, meter);
  }

  /** Iterative compression, until the bounds meet or more than `limit` vertices are needed. */
  close(meter: Meter, limit: number): void {
    if (this.lower === this.best.length || this.lower > limit) return;
    const { n } = this.graph;
    const compressor = new Compressor(this.graph, this.even, meter);
    const rest = this.best;
    const inPlay = new Uint8Array(n).fill(1);
    for (const v of rest) inPlay[v] = 0;
    // Invariant: X is a least transversal of the vertices in play.
    let X: number[] = [];
    for (let i = 0; i < rest.length; i++) {
      inPlay[rest[i]] = 1;
      X = [...X, rest[i]];
      const left = rest.length - i - 1;
      const { smaller } = compressor.smallerThan(inPlay, X, this.cycles);
      if (smaller !== undefined) {
        X = smaller;
        if (X.length + left < this.best.length) this.best = [...X, ...rest.slice(i + 1)];
      }
      this.lower = Math.max(this.lower, X.length);
      if (this.lower === this.best.length || this.lower > limit) return;
    }
  }
}
