/**
 * Undirected graphs as typed arrays, in compressed sparse rows. Building takes O(n + m) time and
 * 16 bytes an edge beside the endpoint lists; nothing changes afterwards.
 */

/**
 * A finite undirected graph on the vertices 0 … n-1 with the edges 0 … m-1. Parallel edges are
 * allowed; loops are not. The arcs out of v stand at positions offsets[v] … offsets[v+1]-1, in order
 * of edge number.
 */
export interface Graph {
  /** Number of vertices. */
  readonly n: number;
  /** Number of edges. */
  readonly m: number;
  /** Length m: one end of each edge. */
  readonly tails: Int32Array;
  /** Length m: the other end of each edge. */
  readonly heads: Int32Array;
  /** Length n + 1, non-decreasing, from 0 to 2m. */
  readonly offsets: Int32Array;
  /** Length 2m: the far end of each arc. */
  readonly targets: Int32Array;
  /** Length 2m: the edge each arc belongs to. */
  readonly edgeOf: Int32Array;
}

/**
 * Builds a graph from its edge list.
 *
 * @param n number of vertices, an integer from 0 to 2^30
 * @param tails length m, one end of each edge, each from 0 to n-1
 * @param heads length m, the other end, each from 0 to n-1 and not equal to the tail
 * @returns the graph; it keeps the two arrays without copying them
 * @throws {RangeError} for lengths that differ, an end out of range, or a loop; names the edge
 */
export function graphFromEdges(n: number, tails: Int32Array, heads: Int32Array): Graph {
  const m = tails.length;
  if (heads.length !== m) {
    throw new RangeError(`expected as many heads as tails (${m}), got ${heads.length}`);
  }
  const offsets = new Int32Array(n + 1);
  for (let e = 0; e < m; e++) {
    const u = tails[e], v = heads[e];
    if (u < 0 || u >= n || v < 0 || v >= n) {
      throw new RangeError(`edge ${e}: expected ends from 0 to ${n - 1}, got ${u} and ${v}`);
    }
    if (u === v) throw new RangeError(`edge ${e}: a loop at vertex ${u}`);
    offsets[u + 1]++;
    offsets[v + 1]++;
  }
  for (let v = 0; v < n; v++) offsets[v + 1] += offsets[v];
  const next = offsets.slice(0, n);
  const targets = new Int32Array(2 * m);
  const edgeOf = new Int32Array(2 * m);
  for (let e = 0; e < m; e++) {
    const u = tails[e], v = heads[e];
    const a = next[u]++, b = next[v]++;
    targets[a] = v;
    edgeOf[a] = e;
    targets[b] = u;
    edgeOf[b] = e;
  }
  return { n, m, tails, heads, offsets, targets, edgeOf };
}

/** Builds a graph from pairs; for tests and small inputs. @throws as `graphFromEdges` */
export function graphFromPairs(n: number, pairs: Iterable<readonly [number, number]>): Graph {
  const list = [...pairs];
  return graphFromEdges(
    n,
    Int32Array.from(list, (p) => p[0]),
    Int32Array.from(list, (p) => p[1]),
  );
}

/** Degree of a vertex, parallel edges counted. */
export function degree(graph: Graph, v: number): number {
  return graph.offsets[v + 1] - graph.offsets[v];
}

/** The end of edge e that is not v. */
export function otherEnd(graph: Graph, e: number, v: number): number {
  return graph.tails[e] ^ graph.heads[e] ^ v;
}

/** A graph on some of the vertices of another, with the way back. */
export interface Subgraph {
  readonly graph: Graph;
  /** Length graph.n: the vertex of the whole graph that each vertex is. Increasing. */
  readonly vertices: Int32Array;
  /** Length graph.m: the edge of the whole graph that each edge is. Increasing. */
  readonly edges: Int32Array;
}

/**
 * The subgraph induced by the vertices with keep[v] !== 0.
 *
 * @param graph the whole graph
 * @param keep length n
 * @returns the induced subgraph; vertices and edges keep their order. O(n + m) time.
 */
export function inducedSubgraph(graph: Graph, keep: Uint8Array): Subgraph {
  const index = new Int32Array(graph.n).fill(-1);
  let n = 0;
  for (let v = 0; v < graph.n; v++) if (keep[v] !== 0) index[v] = n++;
  const vertices = new Int32Array(n);
  for (let v = 0; v < graph.n; v++) if (index[v] >= 0) vertices[index[v]] = v;
  let m = 0;
  for (let e = 0; e < graph.m; e++) {
    if (keep[graph.tails[e]] !== 0 && keep[graph.heads[e]] !== 0) m++;
  }
  const tails = new Int32Array(m), heads = new Int32Array(m), edges = new Int32Array(m);
  let at = 0;
  for (let e = 0; e < graph.m; e++) {
    const u = index[graph.tails[e]], v = index[graph.heads[e]];
    if (u < 0 || v < 0) continue;
    tails[at] = u;
    heads[at] = v;
    edges[at++] = e;
  }
  return { graph: graphFromEdges(n, tails, heads), vertices, edges };
}
