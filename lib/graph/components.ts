/** Connected components by breadth-first search, in O(n + m) time and without recursion. */
import { type Graph, graphFromEdges, type Subgraph } from "./graph.ts";

/** The components of a graph, numbered by their least vertex. */
export interface Components {
  readonly count: number;
  /** Length n: the component of each vertex; -1 where the vertex was left out. */
  readonly of: Int32Array;
}

/**
 * Numbers the connected components.
 *
 * @param graph any graph
 * @param keep length n; vertices with 0 are left out (default: none)
 * @returns the component of each vertex, components in order of their least vertex
 */
export function components(graph: Graph, keep?: Uint8Array): Components {
  const { n, offsets, targets } = graph;
  const of = new Int32Array(n).fill(-1);
  const queue = new Int32Array(n);
  let count = 0;
  for (let root = 0; root < n; root++) {
    if (of[root] >= 0 || (keep !== undefined && keep[root] === 0)) continue;
    let head = 0, tail = 0;
    queue[tail++] = root;
    of[root] = count;
    while (head < tail) {
      const v = queue[head++];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (of[u] >= 0 || (keep !== undefined && keep[u] === 0)) continue;
        of[u] = count;
        queue[tail++] = u;
      }
    }
    count++;
  }
  return { count, of };
}

/**
 * The components as graphs of their own, in O(n + m) time for all of them together.
 *
 * @param graph any graph
 * @param keep length n; vertices with 0 are left out (default: none)
 * @returns one subgraph for each component, in order of the least vertex
 */
export function componentSubgraphs(graph: Graph, keep?: Uint8Array): Subgraph[] {
  const { count, of } = components(graph, keep);
  const { n, m } = graph;
  const vertexStart = new Int32Array(count + 1), edgeStart = new Int32Array(count + 1);
  for (let v = 0; v < n; v++) if (of[v] >= 0) vertexStart[of[v] + 1]++;
  for (let e = 0; e < m; e++) {
    const c = of[graph.tails[e]];
    if (c >= 0 && c === of[graph.heads[e]]) edgeStart[c + 1]++;
  }
  for (let c = 0; c < count; c++) {
    vertexStart[c + 1] += vertexStart[c];
    edgeStart[c + 1] += edgeStart[c];
  }
  const vertices = new Int32Array(vertexStart[count]), edges = new Int32Array(edgeStart[count]);
  const tails = new Int32Array(edges.length), heads = new Int32Array(edges.length);
  const index = new Int32Array(n);
  const next = vertexStart.slice(0, count);
  for (let v = 0; v < n; v++) {
    const c = of[v];
    if (c < 0) continue;
    index[v] = next[c] - vertexStart[c];
    vertices[next[c]++] = v;
  }
  next.set(edgeStart.subarray(0, count));
  for (let e = 0; e < m; e++) {
    const u = graph.tails[e], v = graph.heads[e], c = of[u];
    if (c < 0 || c !== of[v]) continue;
    const at = next[c]++;
    edges[at] = e;
    tails[at] = index[u];
    heads[at] = index[v];
  }
  const parts: Subgraph[] = [];
  for (let c = 0; c < count; c++) {
    const [v0, v1, e0, e1] = [vertexStart[c], vertexStart[c + 1], edgeStart[c], edgeStart[c + 1]];
    parts.push({
      graph: graphFromEdges(v1 - v0, tails.slice(e0, e1), heads.slice(e0, e1)),
      vertices: vertices.slice(v0, v1),
      edges: edges.slice(e0, e1),
    });
  }
  return parts;
}
