/** The odd cycle transversal number by trying all sets of vertices; for up to about 14 vertices. */
import type { Graph } from "../../lib/graph/graph.ts";
import { twoColouring } from "../../lib/graph/two-colouring.ts";

/**
 * @param graph at most 20 vertices
 * @returns the least number of vertices whose removal leaves a bipartite graph. O(2^n m) time.
 * @throws {RangeError} for more than 20 vertices
 */
export function bruteOct(graph: Graph): number {
  const { n } = graph;
  if (n > 20) throw new RangeError(`expected at most 20 vertices, got ${n}`);
  let best = n;
  const keep = new Uint8Array(n);
  for (let mask = 0; mask < 1 << n; mask++) {
    let size = 0;
    for (let v = 0; v < n; v++) {
      keep[v] = 1 - ((mask >> v) & 1);
      size += 1 - keep[v];
    }
    if (size < best && twoColouring(graph, keep).side !== undefined) best = size;
  }
  return best;
}
