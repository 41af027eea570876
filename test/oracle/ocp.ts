/** The odd cycle packing number by listing all odd cycles without chords; up to about 20 vertices. */
import type { Graph } from "../../lib/graph/graph.ts";

/**
 * @param graph at most 30 vertices
 * @returns the largest number of vertex-disjoint odd cycles. Exponential time.
 */
export function bruteOcp(graph: Graph): number {
  const { n } = graph;
  const near = new Int32Array(n);
  for (let e = 0; e < graph.m; e++) {
    near[graph.tails[e]] |= 1 << graph.heads[e];
    near[graph.heads[e]] |= 1 << graph.tails[e];
  }
  // Every odd cycle holds the vertices of an odd one without chords.
  const cycles = new Set<number>();
  const grow = (first: number, last: number, path: number, length: number): void => {
    for (let v = first + 1; v < n; v++) {
      if ((near[last] >> v & 1) === 0 || (path >> v & 1) !== 0) continue;
      const met = near[v] & path;
      if (met === (1 << last)) grow(first, v, path | 1 << v, length + 1);
      else if (met === ((1 << last) | (1 << first)) && length % 2 === 0) cycles.add(path | 1 << v);
    }
  };
  for (let first = 0; first < n; first++) grow(first, first, 1 << first, 1);
  const list = [...cycles];
  const pack = (from: number, used: number): number => {
    let best = 0;
    for (let i = from; i < list.length; i++) {
      if ((list[i] & used) === 0) best = Math.max(best, 1 + pack(i + 1, used | list[i]));
      if (best > 0 && 3 * best + 3 > n) break;
    }
    return best;
  };
  return pack(0, 0);
}
