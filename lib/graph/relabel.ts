/**
 * New numbers for vertices and edges so that what is near in the graph is near in memory. On large
 * graphs in random order most of the time goes into waiting for memory; linear time.
 */
import { type Graph, graphFromEdges, type Subgraph } from "./graph.ts";

/** Below this many vertices everything fits into the processor's caches anyway. */
const SMALL = 1 << 15;

/** Whether more than a quarter of the edges join vertices an eighth of all numbers apart. */
export function isScattered(graph: Graph): boolean {
  const { n, m, tails, heads } = graph;
  if (n < SMALL) return false;
  let far = 0;
  for (let e = 0; e < m; e++) if (Math.abs(tails[e] - heads[e]) > n >> 3) far++;
  return far > m >> 2;
}

/**
 * Numbers the vertices in breadth-first order and the edges by their ends.
 *
 * @param graph any graph
 * @returns the same graph under new numbers: `vertices` and `edges` give the old ones (not
 *   increasing), and edges keep their direction. O(n + m) time.
 */
export function breadthFirst(graph: Graph): Subgraph {
  const { n, m, offsets, targets, edgeOf } = graph;
  const vertices = new Int32Array(n), index = new Int32Array(n).fill(-1);
  const edges = new Int32Array(m), taken = new Uint8Array(m);
  let tail = 0, count = 0;
  for (let root = 0; root < n; root++) {
    if (index[root] >= 0) continue;
    index[root] = tail;
    vertices[tail++] = root;
    for (let head = index[root]; head < tail; head++) {
      const v = vertices[head];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a], e = edgeOf[a];
        if (index[u] < 0) {
          index[u] = tail;
          vertices[tail++] = u;
        }
        if (taken[e] !== 0) continue;
        taken[e] = 1;
        edges[count++] = e;
      }
    }
  }
  const tails = new Int32Array(m), heads = new Int32Array(m);
  for (let i = 0; i < m; i++) {
    tails[i] = index[graph.tails[edges[i]]];
    heads[i] = index[graph.heads[edges[i]]];
  }
  return { graph: graphFromEdges(n, tails, heads), vertices, edges };
}
