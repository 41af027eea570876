/**
 * First phase of the left-right planarity test: a depth-first orientation with lowpoints, and the
 * out-edges of each vertex in nesting order. O(n + m) time, no recursion.
 *
 * Everything downstream works on *preorder numbers* instead of vertices. Tree edges go to a larger
 * number, back edges to a smaller one, and along one path from the root the preorder number grows
 * like the height, so it takes the place of the height wherever return points are compared.
 */
import type { Graph } from "./graph.ts";
import type { Meter } from "../run/meter.ts";

/** A depth-first orientation. "Vertex" means preorder number, "edge" an index into `target`. */
export interface Orientation {
  /** Number of vertices, and of oriented edges. */
  readonly n: number;
  readonly m: number;
  /** Length n: tree parent, always smaller; -1 at roots. */
  readonly parent: Int32Array;
  /** Length n: the tree edge that enters each vertex; -1 at roots. */
  readonly parentEdge: Int32Array;
  /** Length n + 1: the out-edges of v are start[v] … start[v+1]-1, by increasing nesting depth. */
  readonly start: Int32Array;
  /** Length m: where each edge leads; larger than its start exactly for tree edges. */
  readonly target: Int32Array;
  /** Length m: the dart of the graph (2e or 2e + 1) that runs along the edge. */
  readonly dart: Int32Array;
  /**
   * Length n: lowpoint of the tree edge entering v, the least return point of v's subtree, or the
   * parent if nothing returns below it; 0 at roots.
   */
  readonly low: Int32Array;
}

/** Lists longer than this are sorted by counting. */
const INSERTION_LIMIT = 24;

/**
 * Orients a graph by depth-first search.
 *
 * @param graph any graph, parallel edges allowed
 * @param meter counts about two units for each edge
 * @returns the orientation. O(n + m) time.
 */
export function orient(graph: Graph, meter: Meter): Orientation {
  const { n, m } = graph;
  const { pre, parent, treeEdge } = preorder(graph, meter);
  const { start, target, dart, parentEdge } = outEdges(graph, pre, parent, treeEdge);
  meter.tick(m);

  // Lowpoints, from the last vertex to the first: every child is done before its parent.
  const low = new Int32Array(n), low2 = new Int32Array(n);
  for (let v = 0; v < n; v++) low[v] = low2[v] = parent[v] < 0 ? 0 : parent[v];
  const depth = new Int32Array(m);
  for (let v = n - 1; v >= 0; v--) {
    let l1 = low[v], l2 = low2[v];
    for (let k = start[v]; k < start[v + 1]; k++) {
      const w = target[k];
      const e1 = w > v ? low[w] : w, e2 = w > v ? low2[w] : v;
      // A chordal edge, with a second return point below v, nests outside one without.
      depth[k] = 2 * e1 + (e2 < v ? 1 : 0);
      if (e1 < l1) {
        l2 = l1 < e2 ? l1 : e2;
        l1 = e1;
      } else if (e1 > l1) {
        if (e1 < l2) l2 = e1;
      } else if (e2 < l2) l2 = e2;
    }
    low[v] = l1;
    low2[v] = l2;
  }
  sortByDepth(n, start, target, dart, depth);
  meter.tick(m);
  for (let v = 0; v < n; v++) {
    for (let k = start[v]; k < start[v + 1]; k++) if (target[k] > v) parentEdge[target[k]] = k;
  }
  return { n, m, parent, parentEdge, start, target, dart, low };
}

/** Depth-first preorder from every unvisited vertex in turn. */
function preorder(graph: Graph, meter: Meter) {
  const { n, offsets, targets, edgeOf } = graph;
  const pre = new Int32Array(n).fill(-1);
  const parent = new Int32Array(n).fill(-1); // by preorder number
  const treeEdge = new Int32Array(n).fill(-1); // by preorder number
  const path = new Int32Array(n); // vertices from the root to where the search stands
  const cursor = offsets.slice(0, n);
  let count = 0;
  for (let root = 0; root < n; root++) {
    if (pre[root] >= 0) continue;
    pre[root] = count++;
    let depth = 0;
    path[0] = root;
    while (depth >= 0) {
      const v = path[depth];
      let a = cursor[v];
      const end = offsets[v + 1];
      meter.tick(1);
      while (a < end && pre[targets[a]] >= 0) a++;
      cursor[v] = a + 1;
      if (a >= end) {
        depth--;
        continue;
      }
      const w = targets[a];
      parent[count] = pre[v];
      treeEdge[count] = edgeOf[a];
      pre[w] = count++;
      path[++depth] = w;
    }
  }
  meter.tick(graph.m);
  return { pre, parent, treeEdge };
}

/** Out-edges of each vertex in compressed rows, not yet sorted. */
function outEdges(graph: Graph, pre: Int32Array, parent: Int32Array, treeEdge: Int32Array) {
  const { n, m, tails, heads } = graph;
  const start = new Int32Array(n + 1);
  for (let e = 0; e < m; e++) {
    const a = pre[tails[e]], b = pre[heads[e]];
    const deep = a > b ? a : b;
    start[(treeEdge[deep] === e ? parent[deep] : deep) + 1]++;
  }
  for (let v = 0; v < n; v++) start[v + 1] += start[v];
  const fill = start.slice(0, n);
  const target = new Int32Array(m), dart = new Int32Array(m);
  for (let e = 0; e < m; e++) {
    const a = pre[tails[e]], b = pre[heads[e]];
    const deep = a > b ? a : b, high = a > b ? b : a;
    const isTree = treeEdge[deep] === e;
    const k = fill[isTree ? high : deep]++;
    target[k] = isTree ? deep : high;
    dart[k] = 2 * e + ((isTree ? high : deep) === a ? 0 : 1);
  }
  return { start, target, dart, parentEdge: new Int32Array(n).fill(-1) };
}

/** Sorts each row by depth: short rows by insertion, all long rows together by counting. */
function sortByDepth(
  n: number,
  start: Int32Array,
  target: Int32Array,
  dart: Int32Array,
  depth: Int32Array,
): void {
  let long = 0;
  for (let v = 0; v < n; v++) {
    const from = start[v], to = start[v + 1];
    if (to - from > INSERTION_LIMIT) {
      long += to - from;
      continue;
    }
    for (let i = from + 1; i < to; i++) {
      const key = depth[i], t = target[i], d = dart[i];
      let j = i - 1;
      while (j >= from && depth[j] > key) {
        depth[j + 1] = depth[j];
        target[j + 1] = target[j];
        dart[j + 1] = dart[j];
        j--;
      }
      depth[j + 1] = key;
      target[j + 1] = t;
      dart[j + 1] = d;
    }
  }
  if (long === 0) return;
  // Counting sort of the edges in long rows, then a stable deal back into their rows.
  const at = new Int32Array(2 * n + 2);
  const rowOf = new Int32Array(long), edges = new Int32Array(long);
  let count = 0;
  for (let v = 0; v < n; v++) {
    if (start[v + 1] - start[v] <= INSERTION_LIMIT) continue;
    for (let k = start[v]; k < start[v + 1]; k++) {
      rowOf[count] = v;
      edges[count++] = k;
      at[depth[k] + 1]++;
    }
  }
  for (let key = 0; key <= 2 * n; key++) at[key + 1] += at[key];
  const sorted = new Int32Array(long);
  for (let i = 0; i < long; i++) sorted[at[depth[edges[i]]]++] = i;
  const oldTarget = new Int32Array(long), oldDart = new Int32Array(long);
  for (let i = 0; i < long; i++) {
    oldTarget[i] = target[edges[i]];
    oldDart[i] = dart[edges[i]];
  }
  const fill = start.slice(0, n);
  for (let i = 0; i < long; i++) {
    const k = fill[rowOf[sorted[i]]]++;
    target[k] = oldTarget[sorted[i]];
    dart[k] = oldDart[sorted[i]];
  }
}
