/**
 * The odd cycle packing number by plain search over chordless odd cycles, for up to 30 vertices and
 * not too many such cycles. (Every odd cycle has a chordless odd one among its vertices.)
 */
import type { Graph } from "../../lib/graph/graph.ts";

/**
 * @param graph at most 30 vertices
 * @returns the vertex sets of all chordless odd cycles as bit masks, by least vertex
 * @throws {RangeError} for more than 30 vertices
 */
export function chordlessOddCycles(graph: Graph): number[][] {
  const { n } = graph;
  if (n > 30) throw new RangeError(`expected at most 30 vertices, got ${n}`);
  const near = new Int32Array(n);
  for (let e = 0; e < graph.m; e++) {
    near[graph.tails[e]] |= 1 << graph.heads[e];
    near[graph.heads[e]] |= 1 << graph.tails[e];
  }
  const found: number[][] = Array.from({ length: n }, () => []);
  // Paths begin at their least vertex; inner vertices of a path have no neighbour on it but two.
  const extend = (first: number, last: number, path: number, length: number): void => {
    for (let v = first + 1; v < n; v++) {
      const bit = 1 << v;
      if ((near[last] & bit) === 0 || (path & bit) !== 0) continue;
      const onPath = near[v] & path & ~(1 << last);
      if (onPath === 0) extend(first, v, path | bit, length + 1);
      else if (onPath === 1 << first && length >= 2 && length % 2 === 0) {
        found[first].push(path | bit);
      }
    }
  };
  for (let v = 0; v < n; v++) extend(v, v, 1 << v, 1);
  return found.map((masks) => [...new Set(masks)]);
}

/** The largest number of vertex-disjoint odd cycles. */
export function bruteOcp(graph: Graph): number {
  const cycles = chordlessOddCycles(graph);
  const best = (from: number, used: number): number => {
    let most = 0;
    for (let v = from; v < graph.n; v++) {
      for (const mask of cycles[v]) {
        if ((mask & used) === 0) most = Math.max(most, 1 + best(v + 1, used | mask));
      }
    }
    return most;
  };
  return best(0, 0);
}

/** Whether two vertex-disjoint odd cycles exist. */
export function hasTwoOddCycles(graph: Graph): boolean {
  const masks = chordlessOddCycles(graph).flat();
  return masks.some((mask, i) => {
    for (let j = 0; j < i; j++) if ((masks[j] & mask) === 0) return true;
    return false;
  });
}
