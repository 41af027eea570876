/** A growing list of edges without duplicates. */
import type { Graph } from "../../lib/graph/graph.ts";

export class Edges {
  readonly pairs: [number, number][] = [];
  readonly #seen = new Set<number>();

  constructor(start: Graph) {
    for (let e = 0; e < start.m; e++) this.add(start.tails[e], start.heads[e]);
  }

  /** Adds an edge unless it is there already; numbers below 2^26. */
  add(a: number, b: number): void {
    const key = Math.min(a, b) * 67108864 + Math.max(a, b);
    if (this.#seen.has(key)) return;
    this.#seen.add(key);
    this.pairs.push([a, b]);
  }
}
