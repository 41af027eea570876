/**
 * The network of the half-integral relaxation max w·x, Mx <= 1, x >= 0: a left and a right copy of
 * every vertex of a component that is not bipartite, and of a bipartite component only one copy, its
 * two sides. A flow in it is a fractional packing of edges, doubled on the components with two
 * copies. Building takes O(n + m) time and about 50 bytes for each arc.
 */
import type { Graph } from "../graph/graph.ts";
import {
  type TransportFlow,
  type TransportNetwork,
  zeroFlow,
} from "../graph/max-flow-bipartite.ts";
import type { Meter } from "../run/meter.ts";

/** The network of a graph and where its vertices and arcs stand in it. */
export interface Relaxation {
  readonly network: TransportNetwork;
  /** Supplies and demands are the weights; the flow starts at zero. */
  readonly state: TransportFlow;
  /** Length n: the left node of each vertex, or -1. */
  readonly leftOf: Int32Array;
  /** Length n: the right node of each vertex, or -1; both are set where there are two copies. */
  readonly rightOf: Int32Array;
  /** Length 2m: where each arc of the graph into its vertex stands in the right rows, or -1. */
  readonly rightPlace: Int32Array;
}

/**
 * Sets the network up; nodes are numbered in breadth-first order, so that neighbours are near.
 *
 * @param graph any graph, parallel edges allowed
 * @param weights length n, integers >= 0 with a sum below 2^53
 */
export function relaxationOf(graph: Graph, weights: Float64Array, meter: Meter): Relaxation {
  const { n, m, offsets, targets, edgeOf } = graph;
  const order = new Int32Array(n);
  const side = new Uint8Array(n).fill(2);
  const leftOf = new Int32Array(n).fill(-1), rightOf = new Int32Array(n).fill(-1);
  let lefts = 0, rights = 0, leftArcs = 0, tail = 0;
  for (let root = 0; root < n; root++) {
    if (side[root] !== 2) continue;
    const first = tail;
    let bipartite = true;
    side[root] = 0;
    order[tail++] = root;
    for (let head = first; head < tail; head++) {
      const v = order[head];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (side[u] === 2) {
          side[u] = 1 - side[v];
          order[tail++] = u;
        } else if (side[u] === side[v]) bipartite = false;
      }
      meter.tick(1 + offsets[v + 1] - offsets[v]);
    }
    for (let at = first; at < tail; at++) {
      const v = order[at];
      if (!bipartite || side[v] === 0) {
        leftOf[v] = lefts++;
        leftArcs += offsets[v + 1] - offsets[v];
      }
      if (!bipartite || side[v] === 1) rightOf[v] = rights++;
    }
  }
  const leftOffsets = new Int32Array(lefts + 1), rightOffsets = new Int32Array(rights + 1);
  const supply = new Float64Array(lefts), demand = new Float64Array(rights);
  const leftTargets = new Int32Array(leftArcs), twin = new Int32Array(leftArcs);
  const rightTargets = new Int32Array(leftArcs);
  const rightPlace = new Int32Array(2 * m).fill(-1);
  // For each edge, where its arc into the right copy of its tail and of its head stands.
  const intoTail = new Int32Array(m), intoHead = new Int32Array(m);
  let place = 0;
  for (let at = 0; at < n; at++) {
    const v = order[at];
    if (rightOf[v] < 0) continue;
    demand[rightOf[v]] = weights[v];
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const e = edgeOf[a];
      if (graph.tails[e] === v) intoTail[e] = place;
      else intoHead[e] = place;
      rightPlace[a] = place;
      rightTargets[place++] = leftOf[targets[a]];
    }
    rightOffsets[rightOf[v] + 1] = place;
    meter.tick(1 + offsets[v + 1] - offsets[v]);
  }
  place = 0;
  for (let at = 0; at < n; at++) {
    const v = order[at];
    if (leftOf[v] < 0) continue;
    supply[leftOf[v]] = weights[v];
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const e = edgeOf[a];
      twin[place] = graph.tails[e] === v ? intoHead[e] : intoTail[e];
      leftTargets[place++] = rightOf[targets[a]];
    }
    leftOffsets[leftOf[v] + 1] = place;
    meter.tick(1 + offsets[v + 1] - offsets[v]);
  }
  const network = { leftOffsets, leftTargets, twin, rightOffsets, rightTargets };
  return { network, state: zeroFlow(network, supply, demand), leftOf, rightOf, rightPlace };
}

/**
 * The packing of edges that a flow is, doubled: Mᵀc <= 2w for any flow, whether maximum or not.
 *
 * @returns length m, integers >= 0; their sum is at most w(V)
 */
export function doubledCostsOf(graph: Graph, relaxation: Relaxation): Float64Array {
  const { n, m, offsets, edgeOf } = graph;
  const { state: { flow }, leftOf, rightOf, rightPlace } = relaxation;
  const doubled = new Float64Array(m);
  for (let v = 0; v < n; v++) {
    if (rightOf[v] < 0) continue;
    const times = leftOf[v] < 0 ? 2 : 1;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      doubled[edgeOf[a]] += times * flow[rightPlace[a]];
    }
  }
  return doubled;
}
