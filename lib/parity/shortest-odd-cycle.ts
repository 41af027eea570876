/**
 * Least odd cycles, by number of edges or by cost.
 *
 * Odd cycles have the three-path property: of three paths between two vertices that close one odd
 * cycle, two close. Therefore a least odd cycle through v is made of two paths of the shortest path
 * tree of v and one more edge (C. Thomassen, "Embeddings of graphs with no short noncontractible
 * cycles", J. Combin. Theory B 48, 1990; written from memory), and the search around v ends at half
 * the cost of the best cycle so far.
 *
 * Only vertices that together meet all odd cycles need to be roots. Without advice these are ends of
 * the edges that a breadth-first two-colouring fails on. In a graph without two disjoint odd cycles
 * the vertices of any one odd cycle do.
 */
import { type Graph, otherEnd } from "../graph/graph.ts";
import { HeapQueue } from "../graph/heap.ts";
import type { Meter } from "../run/meter.ts";

/** A closed walk without repeated vertices and with an odd number of odd edges. */
export interface CheapOddCycle {
  /** The vertices in order. */
  readonly vertices: Int32Array;
  /** The edges in order: edge i joins vertices i and i + 1, the last one the last and the first. */
  readonly edges: Int32Array;
  /** Sum of the costs of its edges. */
  readonly cost: number;
}

/** What counts as odd, what edges cost, and where to look. */
export interface OddCycleOptions {
  /** Length m, finite and >= 0, their sum below 2^53 if integers; default: 1 each. */
  readonly costs?: ArrayLike<number>;
  /** Length m, nonzero where an edge counts as even; default: every edge is odd. */
  readonly even?: Uint8Array;
  /** Vertices that meet all odd cycles. A wrong list gives an odd cycle that may not be a least one. */
  readonly roots?: ArrayLike<number>;
}

/**
 * Finds an odd cycle of least cost.
 *
 * @param graph any graph
 * @param meter counts one unit for each arc scanned
 * @param options costs, parities and roots
 * @returns the cycle, or undefined: no odd cycle meets a root
 * @throws {RangeError} when an array has a wrong length or a cost is negative or not a number
 * @throws {Interrupted} when the meter runs out
 *
 * Time: one shortest-path search for each root, as far as half the best cycle; O(m log n) each at
 * worst. On a square grid with √n roots that is n^1.5 altogether.
 */
export function shortestOddCycle(
  graph: Graph,
  meter: Meter,
  options: OddCycleOptions = {},
): CheapOddCycle | undefined {
  const { n, m, offsets, targets, edgeOf } = graph;
  const { costs, even } = options;
  for (const [name, list] of [["costs", costs], ["even", even]] as const) {
    if (list !== undefined && list.length !== m) {
      throw new RangeError(`${name}: expected length ${m}, got ${list.length}`);
    }
  }
  if (costs !== undefined) {
    for (let e = 0; e < m; e++) {
      if (!(costs[e] >= 0 && costs[e] < Infinity)) {
        throw new RangeError(`costs[${e}]: expected a finite number >= 0, got ${costs[e]}`);
      }
    }
  }
  const cost = (e: number) => costs === undefined ? 1 : costs[e];
  const isOdd = (e: number) => even === undefined || even[e] === 0 ? 1 : 0;

  const distance = new Float64Array(n).fill(Infinity);
  const parity = new Uint8Array(n); // of the tree path to the root
  const treeEdge = new Int32Array(n).fill(-1);
  const settled = new Uint8Array(n);
  const touched: number[] = [];
  const queue = new HeapQueue();
  let best: CheapOddCycle | undefined;
  let limit = Infinity;
  const roots = options.roots ?? meetAllOddCycles(graph, isOdd);
  for (let i = 0; i < roots.length; i++) {
    const closing = search(roots[i]);
    if (closing >= 0) {
      best = close(closing);
      limit = best.cost;
    }
    for (const v of touched) {
      distance[v] = Infinity;
      treeEdge[v] = -1;
      settled[v] = 0;
    }
    touched.length = 0;
  }
  return best;

  /** The edge that closes the cheapest odd walk from the root, if cheaper than `limit`; or -1. */
  function search(root: number): number {
    let closing = -1;
    queue.clear();
    distance[root] = parity[root] = 0;
    touched.push(root);
    queue.push(0, root);
    for (let v = queue.pop(); v >= 0; v = queue.pop()) {
      if (settled[v] !== 0) continue;
      const reached = distance[v];
      // Both ends of a closing edge are settled; from here on the walk would cost 2·reached at least.
      if (2 * reached >= limit) break;
      settled[v] = 1;
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a], e = edgeOf[a], step = cost(e);
        if (settled[u] !== 0) {
          const walk = reached + step + distance[u];
          if ((parity[v] ^ parity[u] ^ isOdd(e)) === 1 && walk < limit) {
            limit = walk;
            closing = e;
          }
        } else if (reached + step < distance[u]) {
          if (distance[u] === Infinity) touched.push(u);
          distance[u] = reached + step;
          parity[u] = parity[v] ^ isOdd(e);
          treeEdge[u] = e;
          queue.push(distance[u], u);
        }
      }
      meter.tick(1 + offsets[v + 1] - offsets[v]);
    }
    return closing;
  }

  /** The cycle that an edge closes in the tree. */
  function close(closing: number): CheapOddCycle {
    const onPath = new Map<number, number>(); // vertices from one end to the root, with their place
    const left: number[] = []; // edges on that way
    let v = graph.tails[closing];
    onPath.set(v, 0);
    for (; treeEdge[v] >= 0; v = otherEnd(graph, treeEdge[v], v)) {
      left.push(treeEdge[v]);
      onPath.set(otherEnd(graph, treeEdge[v], v), left.length);
    }
    const right: number[] = [];
    for (v = graph.heads[closing]; !onPath.has(v); v = otherEnd(graph, treeEdge[v], v)) {
      right.push(treeEdge[v]);
    }
    const edges = [...left.slice(0, onPath.get(v)).reverse(), closing, ...right];
    const vertices: number[] = [];
    let sum = 0;
    for (const e of edges) {
      vertices.push(v);
      v = otherEnd(graph, e, v);
      sum += cost(e);
    }
    return { vertices: Int32Array.from(vertices), edges: Int32Array.from(edges), cost: sum };
  }
}

/** Ends of all edges that a breadth-first two-colouring fails on, one for each, greedily few. */
function meetAllOddCycles(graph: Graph, isOdd: (e: number) => number): Int32Array {
  const { n, m, offsets, targets, edgeOf } = graph;
  const side = new Uint8Array(n).fill(2), queue = new Int32Array(n);
  for (let root = 0; root < n; root++) {
    if (side[root] !== 2) continue;
    let tail = 0;
    side[root] = 0;
    queue[tail++] = root;
    for (let head = 0; head < tail; head++) {
      const v = queue[head];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        if (side[targets[a]] !== 2) continue;
        side[targets[a]] = side[v] ^ isOdd(edgeOf[a]);
        queue[tail++] = targets[a];
      }
    }
  }
  const failed: number[] = [], count = new Int32Array(n);
  for (let e = 0; e < m; e++) {
    const u = graph.tails[e], v = graph.heads[e];
    if ((side[u] ^ side[v]) === isOdd(e)) continue;
    failed.push(e);
    count[u]++;
    count[v]++;
  }
  const chosen = new Uint8Array(n), roots: number[] = [];
  for (const e of failed) {
    const u = graph.tails[e], v = graph.heads[e];
    if (chosen[u] !== 0 || chosen[v] !== 0) continue;
    const root = count[u] >= count[v] ? u : v;
    chosen[root] = 1;
    roots.push(root);
  }
  return Int32Array.from(roots);
}
