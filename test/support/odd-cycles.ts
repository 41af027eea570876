/** What every answer about odd cycles must satisfy, checked edge by edge. */
import type { Graph } from "../../lib/graph/graph.ts";
import { twoColouring } from "../../lib/graph/two-colouring.ts";

/** What is wrong with these as vertex-disjoint odd cycles of the graph; "" if nothing is. */
export function faultOfOddCycles(graph: Graph, cycles: Iterable<ArrayLike<number>>): string {
  const near = Array.from({ length: graph.n }, () => new Set<number>());
  for (let e = 0; e < graph.m; e++) {
    near[graph.tails[e]].add(graph.heads[e]);
    near[graph.heads[e]].add(graph.tails[e]);
  }
  const used = new Set<number>();
  for (const cycle of cycles) {
    if (cycle.length < 3 || cycle.length % 2 === 0) return `a cycle of length ${cycle.length}`;
    for (let i = 0; i < cycle.length; i++) {
      if (used.has(cycle[i])) return `vertex ${cycle[i]} used twice`;
      used.add(cycle[i]);
      const next = cycle[(i + 1) % cycle.length];
      if (!near[cycle[i]].has(next)) return `no edge between ${cycle[i]} and ${next}`;
    }
  }
  return "";
}

/** Whether the graph without these vertices is bipartite. */
export function isTransversal(graph: Graph, vertices: ArrayLike<number>): boolean {
  const keep = new Uint8Array(graph.n).fill(1);
  for (let i = 0; i < vertices.length; i++) keep[vertices[i]] = 0;
  return twoColouring(graph, keep).side !== undefined;
}
