/**
 * The network of the half-integral relaxation max w·x, Mx <= 1, x >= 0: the double cover of every
 * component that is not bipartite, and of a bipartite component only one of the two halves into
 * which its cover falls, since the other is its mirror image. A flow in it is a fractional packing of
 * edges. Setting up takes O(n + m) time and about 20 bytes for each arc.
 */
import type { Graph } from "../graph/graph.ts";
import type { CoverFlow, CoverNetwork } from "../graph/max-flow-cover.ts";
import type { Meter } from "../run/meter.ts";

/** Which copies of a vertex are in play. */
export const LEFT_ONLY = 0, RIGHT_ONLY = 1, BOTH = 2;

/** The meter is told after so many scans. */
const BATCH = 1 << 13;

/** The network, its flow, and where the vertices stand in it. */
export interface Relaxation {
  /** Its vertices are those of the graph in another order, so that neighbours are near. */
  readonly network: CoverNetwork;
  /** Supplies and demands are the weights of the copies in play, zero elsewhere; no flow yet. */
  readonly state: CoverFlow;
  /** Length n: the vertex of the graph that each vertex of the network is. */
  readonly order: Int32Array;
  /** Length n, by network vertex: LEFT_ONLY, RIGHT_ONLY or BOTH. */
  readonly copies: Uint8Array;
  /** Length 2m: the edge of the graph that each arc of the network belongs to. */
  readonly edgeAt: Int32Array;
}

/** Vertices are numbered in clusters of about so many, so that searches stay in the cache. */
const CLUSTER = 1024;

/**
 * Sets the network up.
 *
 * @param graph any graph, parallel edges allowed
 * @param weights length n, integers >= 0 with a sum below 2^53
 * @param meter counts about one unit for each arc
 * @throws {Interrupted} when the meter runs out
 */
export function relaxationOf(graph: Graph, weights: Float64Array, meter: Meter): Relaxation {
  const { n, m, offsets, targets, edgeOf } = graph;
  const { order, rank, copies } = clustered(graph, meter);
  const starts = new Int32Array(n + 1);
  const supply = new Float64Array(n), demand = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const v = order[i];
    starts[i + 1] = starts[i] + offsets[v + 1] - offsets[v];
    if (copies[i] !== RIGHT_ONLY) supply[i] = weights[v];
    if (copies[i] !== LEFT_ONLY) demand[i] = weights[v];
  }
  let scans = 0;
  // Rows sorted by number: in ascending order every vertex enters itself in its neighbours' rows.
  const next = starts.slice(0, n);
  const ends = new Int32Array(2 * m), edgeAt = new Int32Array(2 * m);
  for (let i = 0; i < n; i++) {
    const v = order[i];
    for (let a = offsets[v], end = offsets[v + 1]; a < end; a++) {
      const p = next[rank[targets[a]]]++;
      ends[p] = i;
      edgeAt[p] = edgeOf[a];
    }
    scans += 1 + offsets[v + 1] - offsets[v];
    if (scans >= BATCH) {
      meter.tick(scans);
      scans = 0;
    }
  }
  // Read in the same order, the rows give the place of each arc in the row of its far end.
  const twin = new Int32Array(2 * m);
  next.set(starts.subarray(0, n));
  for (let p = 0; p < 2 * m;) {
    const end = Math.min(p + BATCH, 2 * m);
    meter.tick(end - p);
    for (; p < end; p++) twin[p] = next[ends[p]]++;
  }
  const network = { n, offsets: starts, targets: ends, twin };
  return {
    network,
    state: { supply, demand, flow: new Float64Array(2 * m) },
    order,
    copies,
    edgeAt,
  };
}

/**
 * The packing of edges that a flow is, doubled: Mᵀc <= 2w for any flow, whether maximum or not.
 *
 * @returns length m, by edge of the graph: integers >= 0 whose sum is at most w(V)
 */
export function doubledCostsOf(graph: Graph, relaxation: Relaxation): Float64Array {
  const { network: { n, offsets }, state: { flow }, copies, edgeAt } = relaxation;
  const doubled = new Float64Array(graph.m);
  for (let v = 0; v < n; v++) {
    if (copies[v] === LEFT_ONLY) continue;
    const times = copies[v] === BOTH ? 1 : 2;
    for (let p = offsets[v], end = offsets[v + 1]; p < end; p++) {
      if (flow[p] > 0) doubled[edgeAt[p]] += times * flow[p];
    }
  }
  return doubled;
}

/**
 * Numbers the vertices cluster by cluster, each a breadth-first ball around a vertex at the border
 * of earlier ones, and finds out which components are bipartite.
 *
 * @returns the vertices in order, the number of each, and the copies in play, by number
 */
function clustered(
  graph: Graph,
  meter: Meter,
): { order: Int32Array; rank: Int32Array; copies: Uint8Array } {
  const { n, offsets, targets } = graph;
  const order = new Int32Array(n), rank = new Int32Array(n);
  const copies = new Uint8Array(n);
  // A vertex enters `border` when it is met; `ball` holds those met in the present cluster.
  const border = new Int32Array(n), ball = new Int32Array(n);
  // 0: not met; otherwise 4·(last cluster that met it, from 1) + 2·side, + 1 once it has its number.
  const tag = new Int32Array(n);
  let count = 0, scans = 0, cluster = 0;
  for (let root = 0; root < n; root++) {
    if (tag[root] !== 0) continue;
    const first = count;
    let bipartite = true, next = 0, entered = 0;
    tag[root] = 4 * (cluster + 1);
    border[entered++] = root;
    while (next < entered) {
      const centre = border[next++];
      if ((tag[centre] & 1) !== 0) continue;
      let head = 0, tail = 0;
      const full = count + CLUSTER, entry = 4 * ++cluster;
      ball[tail++] = centre;
      tag[centre] = entry + (tag[centre] & 2);
      while (head < tail && count < full) {
        const v = ball[head++], other = 2 - (tag[v] & 2);
        tag[v] |= 1;
        rank[v] = count;
        copies[count] = other === 2 ? LEFT_ONLY : RIGHT_ONLY;
        order[count++] = v;
        for (let a = offsets[v], end = offsets[v + 1]; a < end; a++) {
          const u = targets[a], t = tag[u];
          if (t === 0) {
            tag[u] = entry + other;
            border[entered++] = u;
            ball[tail++] = u;
          } else {
            if ((t & 2) !== other) bipartite = false;
            if ((t & 1) === 0 && t < entry) {
              tag[u] = entry + (t & 2);
              ball[tail++] = u;
            }
          }
        }
        scans += 1 + offsets[v + 1] - offsets[v];
        if (scans >= BATCH) {
          meter.tick(scans);
          scans = 0;
        }
      }
    }
    if (!bipartite) copies.fill(BOTH, first, count);
  }
  return { order, rank, copies };
}
