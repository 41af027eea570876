/**
 * Maximum flow in the bipartite double cover of a graph: a left and a right copy of every vertex, for
 * each edge uv arcs without limit from u's left copy to v's right copy and from v's to u's, supplies
 * on the left, demands on the right. This is the network of the half-integral relaxation. The cover
 * is never built: an arc of the graph's own rows stands for the arc of the cover that enters the
 * right copy of its vertex. All amounts are integers below 2^53, so every step is exact.
 */
import type { Meter } from "../run/meter.ts";

/** Rows of a graph with the way back of every arc; parallel edges are allowed, loops are not. */
export interface CoverNetwork {
  /** Number of vertices; the cover has twice as many. */
  readonly n: number;
  /** Length n + 1: the arcs of v stand at offsets[v] … offsets[v+1]-1. */
  readonly offsets: Int32Array;
  /** Length 2m: the far end of each arc. */
  readonly targets: Int32Array;
  /** Length 2m: the same edge in the row of its far end; twin[twin[p]] = p. */
  readonly twin: Int32Array;
}

/** A flow and what is left over; `supply` and `demand` begin as the capacities of the copies. */
export interface CoverFlow {
  /** Length n: what the left copy of each vertex could still send, >= 0. */
  readonly supply: Float64Array;
  /** Length n: what the right copy of each vertex could still take, >= 0. */
  readonly demand: Float64Array;
  /** Length 2m: at p in the row of v the flow from targets[p]'s left copy to v's right copy, >= 0. */
  readonly flow: Float64Array;
}

/** Label of a copy from which no demand has been reached, and of one cut off for good. */
const NEVER = 0x3fffffff, CUT_OFF = NEVER + 1;
/** Exact labels are computed anew after scanning so many arcs for each arc of the network. */
const SCANS_PER_ARC = 0.5;
/** The meter is told after so many scans. */
const BATCH = 1 << 13;

/**
 * Raises a flow to a maximum one. Push and relabel (A. V. Goldberg and R. E. Tarjan, "A new approach
 * to the maximum-flow problem", J. ACM 35, 1988, doi:10.1145/48014.61051) in first-in first-out
 * order with current arcs and exact labels from time to time (B. V. Cherkassky and A. V. Goldberg,
 * "On implementing the push-relabel method for the maximum flow problem", Algorithmica 19, 1997).
 * What arrives at a right copy moves on at once ("double push"), so between two steps only left
 * copies hold anything and the state is a flow, not merely a preflow.
 *
 * O(n²·m) at worst; on sparse graphs with a good start about a dozen scans of all arcs.
 *
 * @param state any flow of the network, changed in place; after an interruption it is still a flow
 * @throws {Interrupted} when the meter runs out
 */
export function raiseToMaximum(network: CoverNetwork, state: CoverFlow, meter: Meter): void {
  const { n, offsets, targets, twin } = network;
  const { supply, demand, flow } = state;
  const arcs = targets.length;
  // Labels are lower bounds on the number of arcs from a copy to an unmet demand, plus one.
  const left = new Int32Array(n), right = new Int32Array(n);
  const leftNext = new Int32Array(n), rightNext = new Int32Array(n);
  const queue = new Int32Array(n), reached = new Int32Array(n);
  const queued = new Uint8Array(n);
  let head = 0, waiting = 0;
  for (;;) {
    // Global relabelling: exact labels, backwards from the demands, until every active copy that is
    // not cut off for good has one; then the queue of active copies.
    let missing = 0, tail = 0, scans = 0, enough = NEVER;
    for (let v = 0; v < n; v++) {
      left[v] = left[v] < NEVER ? NEVER : CUT_OFF;
      right[v] = right[v] < NEVER ? NEVER : CUT_OFF;
      if (supply[v] > 0 && left[v] === NEVER) missing++;
      if (demand[v] > 0) {
        right[v] = 1;
        reached[tail++] = v;
      }
    }
    if (missing === 0) return;
    for (let at = 0; at < tail; at++) {
      const j = reached[at], next = right[j] + 1;
      if (next > enough) {
        // What is left is farther away, and no nearer than this.
        for (let v = 0; v < n; v++) {
          if (left[v] === NEVER) left[v] = next;
          if (right[v] === NEVER) right[v] = next + 1;
        }
        break;
      }
      const rowEnd = offsets[j + 1];
      scans += rowEnd - offsets[j];
      for (let p = offsets[j]; p < rowEnd; p++) {
        const i = targets[p];
        if (left[i] !== NEVER) continue;
        left[i] = next;
        if (supply[i] > 0 && --missing === 0) enough = next;
        const end = offsets[i + 1];
        scans += end - offsets[i];
        for (let q = offsets[i]; q < end; q++) {
          const k = targets[q];
          if (right[k] === NEVER && flow[twin[q]] > 0) {
            right[k] = next + 1;
            reached[tail++] = k;
          }
        }
      }
      if (scans >= BATCH) {
        meter.tick(scans);
        scans = 0;
      }
    }
    leftNext.set(offsets.subarray(0, n));
    rightNext.set(offsets.subarray(0, n));
    head = waiting = 0;
    for (let v = 0; v < n; v++) {
      const active = supply[v] > 0 && left[v] < NEVER;
      queued[v] = active ? 1 : 0;
      if (active) queue[waiting++] = v;
    }
    meter.tick(scans + n);
    if (waiting === 0) return;

    // Push and relabel until labels are stale.
    let budget = SCANS_PER_ARC * arcs, unticked = 0;
    while (waiting > 0 && budget > 0) {
      const i = queue[head];
      if (++head === n) head = 0;
      waiting--;
      queued[i] = 0;
      // Everything the left copy holds goes to one right copy of least label.
      const first = offsets[i], end = offsets[i + 1];
      let p = leftNext[i];
      let want = left[i] - 1;
      while (p < end && right[targets[p]] !== want) p++;
      unticked += 1 + p - leftNext[i];
      if (p === end) {
        want = NEVER;
        for (let q = first; q < end; q++) {
          const label = right[targets[q]];
          if (label < want) {
            want = label;
            p = q;
          }
        }
        unticked += end - first;
        left[i] = want === NEVER ? NEVER : want + 1;
      }
      leftNext[i] = p === end ? first : p;
      if (want !== NEVER) {
        const j = targets[p];
        let amount = supply[i];
        supply[i] = 0;
        flow[twin[p]] += amount;
        const wanted = demand[j];
        if (wanted > 0) {
          const by = amount < wanted ? amount : wanted;
          demand[j] = wanted - by;
          amount -= by;
        }
        // The rest goes back to left copies of least label, by sending less from them to here.
        const jFirst = offsets[j], jEnd = offsets[j + 1];
        let b = rightNext[j];
        while (amount > 0) {
          const below = right[j] - 1;
          const from = b;
          for (; b < jEnd; b++) {
            if (flow[b] === 0) continue;
            const k = targets[b];
            if (left[k] !== below) continue;
            const by = amount < flow[b] ? amount : flow[b];
            amount -= by;
            flow[b] -= by;
            supply[k] += by;
            if (queued[k] === 0) {
              queued[k] = 1;
              let at = head + waiting++;
              if (at >= n) at -= n;
              queue[at] = k;
            }
            if (amount === 0) break;
          }
          unticked += 1 + b - from;
          if (amount === 0) break;
          let least = NEVER;
          b = jFirst;
          for (let q = jFirst; q < jEnd; q++) {
            if (flow[q] > 0 && left[targets[q]] < least) {
              least = left[targets[q]];
              b = q;
            }
          }
          unticked += jEnd - jFirst;
          right[j] = least + 1; // the copy it came from has a label, so there is a least one
        }
        rightNext[j] = b;
      }
      if (unticked >= BATCH) {
        budget -= unticked;
        meter.tick(unticked);
        unticked = 0;
      }
    }
    if (unticked > 0) meter.tick(unticked);
  }
}
