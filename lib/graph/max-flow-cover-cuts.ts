/**
 * All minimum cuts of a double cover at once: the least and the greatest one, and between them the
 * strong components of the residual network, whose closed sets are the minimum cuts (J.-C. Picard
 * and M. Queyranne, "On the structure of all minimum cuts in a network and applications", Math.
 * Programming Study 13, 1980). O(n + m) time each, without recursion.
 */
import type { Meter } from "../run/meter.ts";
import type { CoverFlow, CoverNetwork } from "./max-flow-cover.ts";

/** What every minimum cut agrees on. */
export interface ExtremeCuts {
  /**
   * Length n, for the left copies: 1 on the source side of every minimum cut, 2 on the sink side of
   * every one, 0 where they differ.
   */
  readonly left: Uint8Array;
  /** Length n: the same for the right copies. */
  readonly right: Uint8Array;
}

/** The meter is told after so many scans. */
const BATCH = 1 << 13;

/**
 * The least and the greatest minimum cut: what the source reaches in the residual network, and what
 * reaches the sink.
 *
 * @param state a maximum flow of the network
 * @throws {Interrupted} when the meter runs out
 */
export function extremeCuts(network: CoverNetwork, state: CoverFlow, meter: Meter): ExtremeCuts {
  const { n, offsets, targets, twin } = network;
  const { supply, demand, flow } = state;
  const left = new Uint8Array(n), right = new Uint8Array(n);
  const queue = new Int32Array(n);
  let scans = 0, tail = 0;
  for (let v = 0; v < n; v++) {
    if (supply[v] > 0) {
      left[v] = 1;
      queue[tail++] = v;
    }
  }
  for (let head = 0; head < tail; head++) {
    const i = queue[head];
    for (let p = offsets[i], end = offsets[i + 1]; p < end; p++) {
      const j = targets[p];
      if (right[j] !== 0) continue;
      right[j] = 1;
      const rowEnd = offsets[j + 1];
      for (let q = offsets[j]; q < rowEnd; q++) {
        const k = targets[q];
        if (left[k] === 0 && flow[q] > 0) {
          left[k] = 1;
          queue[tail++] = k;
        }
      }
      scans += rowEnd - offsets[j];
    }
    scans += offsets[i + 1] - offsets[i];
    if (scans >= BATCH) {
      meter.tick(scans);
      scans = 0;
    }
  }
  tail = 0;
  for (let v = 0; v < n; v++) {
    if (demand[v] > 0) {
      right[v] = 2;
      queue[tail++] = v;
    }
  }
  for (let head = 0; head < tail; head++) {
    const j = queue[head];
    for (let p = offsets[j], end = offsets[j + 1]; p < end; p++) {
      const i = targets[p];
      if (left[i] !== 0) continue;
      left[i] = 2;
      const rowEnd = offsets[i + 1];
      for (let q = offsets[i]; q < rowEnd; q++) {
        const k = targets[q];
        if (right[k] === 0 && flow[twin[q]] > 0) {
          right[k] = 2;
          queue[tail++] = k;
        }
      }
      scans += rowEnd - offsets[i];
    }
    scans += offsets[j + 1] - offsets[j];
    if (scans >= BATCH) {
      meter.tick(scans);
      scans = 0;
    }
  }
  return { left, right };
}

/** Strong components of the residual network; numbers are equal exactly inside a component. */
export interface ResidualComponents {
  /** Length n, for the left copies; -1 where minimum cuts agree or the vertex is left out. */
  readonly left: Int32Array;
  /** Length n: the same for the right copies. Residual arcs lead to equal or lower numbers. */
  readonly right: Int32Array;
}

/**
 * Numbers the strong components among the copies on which minimum cuts differ (R. Tarjan,
 * "Depth-first search and linear graph algorithms", SIAM J. Comput. 1, 1972,
 * doi:10.1137/0201010).
 *
 * @param state a maximum flow of the network
 * @param cuts its extreme cuts
 * @param keep length n; vertices with 0 are left out, with all of their component
 * @throws {Interrupted} when the meter runs out
 */
export function residualComponents(
  network: CoverNetwork,
  state: CoverFlow,
  cuts: ExtremeCuts,
  keep: Uint8Array,
  meter: Meter,
): ResidualComponents {
  const { n, offsets, targets } = network;
  const { flow } = state;
  // Nodes are v on the left and n + v on the right.
  const component = new Int32Array(2 * n).fill(-1);
  // When a node was first seen, from 1 on; of an open node later the least it reaches.
  const low = new Int32Array(2 * n);
  const seen = new Int32Array(2 * n);
  const next = new Int32Array(2 * n);
  next.set(offsets.subarray(0, n));
  next.set(offsets.subarray(0, n), n);
  const path = new Int32Array(2 * n), open = new Int32Array(2 * n);
  let clock = 0, count = 0, opened = 0, steps = 0;
  for (let root = 0; root < 2 * n; root++) {
    const base = root < n ? root : root - n;
    if (seen[root] !== 0 || keep[base] === 0) continue;
    if ((root < n ? cuts.left[base] : cuts.right[base]) !== 0) continue;
    let depth = 0;
    path[0] = open[opened++] = root;
    seen[root] = low[root] = ++clock;
    while (depth >= 0) {
      const x = path[depth];
      let into = -1, p = next[x], least = low[x];
      const from = p;
      if (x < n) {
        for (const end = offsets[x + 1]; p < end; p++) {
          const y = n + targets[p];
          if (component[y] >= 0 || cuts.right[y - n] !== 0) continue;
          if (seen[y] === 0) {
            into = y;
            break;
          }
          if (seen[y] < least) least = seen[y];
        }
      } else {
        for (const end = offsets[x - n + 1]; p < end; p++) {
          if (flow[p] === 0) continue;
          const y = targets[p];
          if (component[y] >= 0 || cuts.left[y] !== 0) continue;
          if (seen[y] === 0) {
            into = y;
            break;
          }
          if (seen[y] < least) least = seen[y];
        }
      }
      steps += 1 + p - from;
      low[x] = least;
      if (into >= 0) {
        next[x] = p + 1; // what is found below reaches x through `low` when it is left
        path[++depth] = open[opened++] = into;
        seen[into] = low[into] = ++clock;
        continue;
      }
      next[x] = p;
      if (least === seen[x]) {
        let y: number;
        do {
          y = open[--opened];
          component[y] = count;
        } while (y !== x);
        count++;
      }
      depth--;
      if (depth >= 0 && least < low[path[depth]]) low[path[depth]] = least;
      if (steps >= BATCH) {
        meter.tick(steps);
        steps = 0;
      }
    }
  }
  return { left: component.subarray(0, n), right: component.subarray(n) };
}
