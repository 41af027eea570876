/**
 * A graph whose edges stand for paths of another graph, made smaller without changing whether it is
 * planar: what is left of a large graph while a Kuratowski subdivision in it is searched for.
 */
import { type Graph, graphFromEdges, otherEnd } from "./graph.ts";

/** A topological minor of some whole graph. */
export interface Skeleton {
  readonly graph: Graph;
  /** Length graph.n: the vertex of the whole graph that each vertex is. */
  readonly vertices: Int32Array;
  /** Length graph.m + 1: the path of edge e is pathEdges[pathStart[e]] … up to pathStart[e + 1]. */
  readonly pathStart: Int32Array;
  /** Edges of the whole graph, each path in order from tail to head. */
  readonly pathEdges: Int32Array;
}

/** The whole graph as a skeleton of itself. */
export function trivialSkeleton(graph: Graph): Skeleton {
  const pathStart = new Int32Array(graph.m + 1);
  for (let e = 0; e <= graph.m; e++) pathStart[e] = e;
  return {
    graph,
    vertices: Int32Array.from({ length: graph.n }, (_, v) => v),
    pathStart,
    pathEdges: pathStart.slice(0, graph.m),
  };
}

/**
 * Keeps some edges; then drops what hangs on by one vertex, replaces chains of vertices of degree
 * two by edges and keeps the shortest of parallel edges. Planarity does not change but for the edges
 * not kept. One pass: merged parallels may leave new chains. Linear time.
 *
 * @param skeleton what there is
 * @param keep length graph.m; edges with 0 are dropped
 * @returns the smaller skeleton; all its vertices had degree three or more before parallels merged
 */
export function compress(skeleton: Skeleton, keep: Uint8Array): Skeleton {
  const { graph, pathStart, pathEdges } = skeleton;
  const { n, m, offsets, targets, edgeOf } = graph;
  const alive = keep.slice();
  const degree = new Int32Array(n);
  for (let e = 0; e < m; e++) {
    if (alive[e] === 0) continue;
    degree[graph.tails[e]]++;
    degree[graph.heads[e]]++;
  }
  const pending: number[] = [];
  for (let v = 0; v < n; v++) if (degree[v] === 1) pending.push(v);
  while (pending.length > 0) {
    const v = pending.pop()!;
    if (degree[v] !== 1) continue;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (alive[edgeOf[a]] === 0) continue;
      alive[edgeOf[a]] = 0;
      degree[v]--;
      if (--degree[targets[a]] === 1) pending.push(targets[a]);
    }
  }

  // Chains between vertices of degree three or more; loops are dropped.
  const index = new Int32Array(n).fill(-1);
  let count = 0;
  for (let v = 0; v < n; v++) if (degree[v] >= 3) index[v] = count++;
  const chainTail: number[] = [], chainHead: number[] = [], chainStart: number[] = [0];
  const links: number[] = []; // 2e + 1 where edge e is run through from head to tail
  const chainLength: number[] = [];
  for (let v = 0; v < n; v++) {
    if (index[v] < 0) continue;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (alive[edgeOf[a]] === 0) continue;
      let at = v, e = edgeOf[a], length = 0;
      while (true) {
        alive[e] = 0;
        links.push(2 * e + (graph.tails[e] === at ? 0 : 1));
        length += pathStart[e + 1] - pathStart[e];
        at = otherEnd(graph, e, at);
        if (index[at] >= 0) break;
        let b = offsets[at];
        while (alive[edgeOf[b]] === 0) b++;
        e = edgeOf[b];
      }
      if (at === v) {
        links.length = chainStart[chainStart.length - 1];
        continue;
      }
      chainTail.push(index[v]);
      chainHead.push(index[at]);
      chainStart.push(links.length);
      chainLength.push(length);
    }
  }

  const kept = shortestOfParallels(count, chainTail, chainHead, chainLength);
  const tails = Int32Array.from(kept, (c) => chainTail[c]);
  const heads = Int32Array.from(kept, (c) => chainHead[c]);
  const start = new Int32Array(kept.length + 1);
  for (let i = 0; i < kept.length; i++) start[i + 1] = start[i] + chainLength[kept[i]];
  const edges = new Int32Array(start[kept.length]);
  let to = 0;
  for (const c of kept) {
    for (let i = chainStart[c]; i < chainStart[c + 1]; i++) {
      const e = links[i] >> 1;
      if ((links[i] & 1) === 0) {
        for (let j = pathStart[e]; j < pathStart[e + 1]; j++) edges[to++] = pathEdges[j];
      } else for (let j = pathStart[e + 1] - 1; j >= pathStart[e]; j--) edges[to++] = pathEdges[j];
    }
  }
  const vertices = new Int32Array(count);
  for (let v = 0; v < n; v++) if (index[v] >= 0) vertices[index[v]] = skeleton.vertices[v];
  return {
    graph: graphFromEdges(count, tails, heads),
    vertices,
    pathStart: start,
    pathEdges: edges,
  };
}

/** Of chains with the same two ends only the shortest, in their old order. */
function shortestOfParallels(
  n: number,
  tails: number[],
  heads: number[],
  lengths: number[],
): number[] {
  // Chains in rows by their smaller end; within a row the larger end is looked up in `best`.
  const rows = new Int32Array(n + 1);
  for (let c = 0; c < tails.length; c++) rows[Math.min(tails[c], heads[c]) + 1]++;
  for (let v = 0; v < n; v++) rows[v + 1] += rows[v];
  const fill = rows.slice(0, n), inRow = new Int32Array(tails.length);
  for (let c = 0; c < tails.length; c++) inRow[fill[Math.min(tails[c], heads[c])]++] = c;
  const best = new Int32Array(n).fill(-1);
  const drop = new Uint8Array(tails.length);
  for (let v = 0; v < n; v++) {
    for (let i = rows[v]; i < rows[v + 1]; i++) {
      const c = inRow[i], w = Math.max(tails[c], heads[c]), other = best[w];
      if (other < 0 || lengths[c] < lengths[other]) best[w] = c;
      if (other >= 0) drop[best[w] === c ? other : c] = 1;
    }
    for (let i = rows[v]; i < rows[v + 1]; i++) {
      best[Math.max(tails[inRow[i]], heads[inRow[i]])] = -1;
    }
  }
  const kept: number[] = [];
  for (let c = 0; c < tails.length; c++) if (drop[c] === 0) kept.push(c);
  return kept;
}
