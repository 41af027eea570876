/**
 * Maximum flow in a transportation network: left nodes with supplies, right nodes with demands, and
 * arcs without limit from left to right. This is the network behind the half-integral relaxation.
 * All amounts are integers below 2^53, so every step is exact.
 */
import type { Meter } from "../run/meter.ts";

/**
 * The arcs, once from the left in rows of `leftOffsets` and once from the right in rows of
 * `rightOffsets`. Parallel arcs are allowed.
 */
export interface TransportNetwork {
  /** Length (left nodes) + 1: the arcs out of i stand at leftOffsets[i] … leftOffsets[i+1]-1. */
  readonly leftOffsets: Int32Array;
  /** One right node for each arc, in the order of the left rows. */
  readonly leftTargets: Int32Array;
  /** Where each arc of a left row stands in the right rows; a permutation. */
  readonly twin: Int32Array;
  /** Length (right nodes) + 1: the arcs into j stand at rightOffsets[j] … rightOffsets[j+1]-1. */
  readonly rightOffsets: Int32Array;
  /** One left node for each arc, in the order of the right rows. */
  readonly rightTargets: Int32Array;
}

/** A flow and what is left over; `supply` and `demand` start as the capacities of the nodes. */
export interface TransportFlow {
  /** For each left node, what it could still send. Never negative. */
  readonly supply: Float64Array;
  /** For each right node, what it could still take. Never negative. */
  readonly demand: Float64Array;
  /** The flow on each arc, in the order of the right rows. Never negative. */
  readonly flow: Float64Array;
}

/** The zero flow. */
export function zeroFlow(
  network: TransportNetwork,
  supply: Float64Array,
  demand: Float64Array,
): TransportFlow {
  return { supply, demand, flow: new Float64Array(network.twin.length) };
}

/**
 * Raises a flow to a maximum one: shortest augmenting paths in phases (E. A. Dinic, "Algorithm for
 * solution of a problem of maximum flow in networks with power estimation", 1970).
 *
 * @param state any flow of the network, changed in place; after an interruption it is still a flow
 * @throws {Interrupted} when the meter runs out
 */
export function raiseToMaximum(
  network: TransportNetwork,
  state: TransportFlow,
  meter: Meter,
): void {
  const { leftOffsets, leftTargets, twin, rightOffsets, rightTargets } = network;
  const { supply, demand, flow } = state;
  const L = leftOffsets.length - 1, R = rightOffsets.length - 1;
  for (let i = 0; i < L; i++) {
    let have = supply[i];
    for (let a = leftOffsets[i]; a < leftOffsets[i + 1] && have > 0; a++) {
      const j = leftTargets[a];
      const by = Math.min(have, demand[j]);
      if (by > 0) {
        have -= by;
        demand[j] -= by;
        flow[twin[a]] += by;
      }
    }
    supply[i] = have;
  }
  const leftLevel = new Int32Array(L), rightLevel = new Int32Array(R);
  const leftNext = new Int32Array(L), rightNext = new Int32Array(R);
  const queue = new Int32Array(L);
  const path = new Int32Array(2 * Math.min(L, R) + 2);
  for (;;) {
    // Levels: left nodes stand on even steps, right nodes follow.
    leftLevel.fill(-1);
    rightLevel.fill(-1);
    let tail = 0;
    for (let i = 0; i < L; i++) {
      if (supply[i] > 0) {
        leftLevel[i] = 0;
        queue[tail++] = i;
      }
    }
    let found = false;
    for (let head = 0; head < tail;) {
      const level = leftLevel[queue[head]];
      if (found) break;
      const end = tail;
      for (; head < end; head++) {
        const i = queue[head];
        meter.tick(leftOffsets[i + 1] - leftOffsets[i]);
        for (let a = leftOffsets[i]; a < leftOffsets[i + 1]; a++) {
          const j = leftTargets[a];
          if (rightLevel[j] >= 0) continue;
          rightLevel[j] = level + 1;
          if (demand[j] > 0) found = true;
          for (let b = rightOffsets[j]; b < rightOffsets[j + 1]; b++) {
            const k = rightTargets[b];
            if (flow[b] > 0 && leftLevel[k] < 0) {
              leftLevel[k] = level + 2;
              queue[tail++] = k;
            }
          }
          meter.tick(rightOffsets[j + 1] - rightOffsets[j]);
        }
      }
    }
    if (!found) return;
    // A blocking flow, depth first with current arcs.
    leftNext.set(leftOffsets.subarray(0, L));
    rightNext.set(rightOffsets.subarray(0, R));
    for (let root = 0; root < L; root++) {
      if (leftLevel[root] !== 0) continue;
      let depth = 0; // path[2k]: arc from the left, path[2k+1]: arc back from the right
      let i = root;
      while (supply[root] > 0) {
        let a = leftNext[i];
        const endA = leftOffsets[i + 1], want = leftLevel[i] + 1;
        while (a < endA && rightLevel[leftTargets[a]] !== want) a++;
        meter.tick(1 + a - leftNext[i]);
        leftNext[i] = a;
        if (a === endA) {
          if (depth === 0) break;
          depth -= 2;
          rightNext[leftTargets[path[depth]]]++; // the node left behind leads nowhere
          i = rightTargetsOwner(depth);
          continue;
        }
        const j = leftTargets[a];
        if (demand[j] > 0) {
          let by = Math.min(supply[root], demand[j]);
          for (let d = 1; d < depth; d += 2) by = Math.min(by, flow[path[d]]);
          supply[root] -= by;
          demand[j] -= by;
          flow[twin[a]] += by;
          let cut = -1;
          for (let d = depth - 2; d >= 0; d -= 2) {
            flow[twin[path[d]]] += by;
            flow[path[d + 1]] -= by;
            if (flow[path[d + 1]] === 0) cut = d;
          }
          meter.tick(depth);
          if (cut >= 0) {
            depth = cut;
            i = rightTargetsOwner(cut);
          }
          continue;
        }
        let b = rightNext[j];
        const endB = rightOffsets[j + 1];
        while (b < endB && !(flow[b] > 0 && leftLevel[rightTargets[b]] === want + 1)) b++;
        meter.tick(1 + b - rightNext[j]);
        rightNext[j] = b;
        if (b === endB) {
          leftNext[i] = a + 1;
          continue;
        }
        path[depth] = a;
        path[depth + 1] = b;
        depth += 2;
        i = rightTargets[b];
      }
      // The left node at which the path of this depth ends.
      function rightTargetsOwner(at: number): number {
        return at === 0 ? root : rightTargets[path[at - 1]];
      }
    }
  }
}

/** Two cuts of a maximum flow, as the nodes on either side that every minimum cut agrees on. */
export interface ExtremeCuts {
  /** For each left node: 1 on the source side of every minimum cut, 2 on its sink side, else 0. */
  readonly left: Uint8Array;
  /** The same for each right node. */
  readonly right: Uint8Array;
}

/**
 * The least and the greatest minimum cut: what the source reaches in the residual network, and what
 * reaches the sink. O(arcs) time.
 *
 * @param state a maximum flow of the network
 */
export function extremeCuts(
  network: TransportNetwork,
  state: TransportFlow,
  meter: Meter,
): ExtremeCuts {
  const { leftOffsets, leftTargets, twin, rightOffsets, rightTargets } = network;
  const { supply, demand, flow } = state;
  const L = leftOffsets.length - 1, R = rightOffsets.length - 1;
  const left = new Uint8Array(L), right = new Uint8Array(R);
  const queue = new Int32Array(Math.max(L, R));
  let tail = 0;
  for (let i = 0; i < L; i++) {
    if (supply[i] > 0) {
      left[i] = 1;
      queue[tail++] = i;
    }
  }
  for (let head = 0; head < tail; head++) {
    const i = queue[head];
    meter.tick(leftOffsets[i + 1] - leftOffsets[i]);
    for (let a = leftOffsets[i]; a < leftOffsets[i + 1]; a++) {
      const j = leftTargets[a];
      if (right[j] !== 0) continue;
      right[j] = 1;
      meter.tick(rightOffsets[j + 1] - rightOffsets[j]);
      for (let b = rightOffsets[j]; b < rightOffsets[j + 1]; b++) {
        const k = rightTargets[b];
        if (flow[b] > 0 && left[k] === 0) {
          left[k] = 1;
          queue[tail++] = k;
        }
      }
    }
  }
  tail = 0;
  for (let j = 0; j < R; j++) {
    if (demand[j] > 0) {
      right[j] = 2;
      queue[tail++] = j;
    }
  }
  for (let head = 0; head < tail; head++) {
    const j = queue[head];
    meter.tick(rightOffsets[j + 1] - rightOffsets[j]);
    for (let b = rightOffsets[j]; b < rightOffsets[j + 1]; b++) {
      const i = rightTargets[b];
      if (left[i] !== 0) continue;
      left[i] = 2;
      meter.tick(leftOffsets[i + 1] - leftOffsets[i]);
      for (let a = leftOffsets[i]; a < leftOffsets[i + 1]; a++) {
        const k = leftTargets[a];
        if (right[k] === 0 && flow[twin[a]] > 0) {
          right[k] = 2;
          queue[tail++] = k;
        }
      }
    }
  }
  return { left, right };
}
