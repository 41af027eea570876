/**
 * The half-integral kernel: an optimum of the relaxation max w·x, Mx <= 1, x >= 0 in halves, with as
 * few halves as any optimum has. Where it is 0 or 1, some heaviest stable set agrees (G. L. Nemhauser
 * and L. E. Trotter, "Vertex packings: structural properties and algorithms", Math. Programming 8,
 * 1975). Costs one maximum flow, everything else is O(n + m); no recursion.
 */
import type { Graph } from "../graph/graph.ts";
import {
  type ExtremeCuts,
  extremeCuts,
  raiseToMaximum,
  type TransportFlow,
  type TransportNetwork,
} from "../graph/max-flow-bipartite.ts";
import type { Meter } from "../run/meter.ts";
import { doubledCostsOf, relaxationOf } from "./relaxation.ts";

/** An optimum of the relaxation with its dual. */
export interface HalfIntegralKernel {
  /** Length n: 0 left, 1 half (the kernel), 2 chosen. Among all optima the fewest halves. */
  readonly value: Uint8Array;
  /**
   * Length m: doubled edge costs c, integers >= 0, with Mᵀc <= 2w everywhere and equality at vertices
   * of value 0 or 1. Positive only on edges whose values add up to 2.
   */
  readonly doubledCosts: Float64Array;
  /** Sum of `doubledCosts`, at most w(V). The relaxation's value is w(V) - packed / 2. */
  readonly packed: number;
}

/**
 * Computes the half-integral kernel.
 *
 * @param graph any graph, parallel edges allowed
 * @param weights length n, positive integers with a sum below 2^53
 * @param meter counts about one unit for each arc scanned
 * @returns values, doubled costs and their sum
 * @throws {Interrupted} when the meter runs out
 */
export function halfIntegralKernel(
  graph: Graph,
  weights: Float64Array,
  meter: Meter,
): HalfIntegralKernel {
  const relaxation = relaxationOf(graph, weights, meter);
  const { network, state, leftOf, rightOf } = relaxation;
  raiseToMaximum(network, state, meter);
  const cuts = extremeCuts(network, state, meter);
  const { left, right } = strongComponents(network, state, cuts, meter);
  const value = new Uint8Array(graph.n);
  for (let v = 0; v < graph.n; v++) {
    const i = leftOf[v], j = rightOf[v];
    if (i < 0) {
      value[v] = cuts.right[j] === 1 ? 0 : 2;
    } else if (j < 0) {
      value[v] = cuts.left[i] === 1 ? 2 : 0;
    } else if (cuts.left[i] !== 0) {
      value[v] = cuts.left[i] === 1 ? 2 : 0;
    } else if (left[i] !== right[j]) {
      // Components are numbered against the direction of the residual arcs, so the set of nodes with
      // a lower number than their mirror image has no arc out of it: it is a minimum cut.
      value[v] = left[i] < right[j] ? 2 : 0;
    } else value[v] = 1;
  }
  const doubledCosts = doubledCostsOf(graph, relaxation);
  let packed = 0;
  for (let e = 0; e < graph.m; e++) packed += doubledCosts[e];
  return { value, doubledCosts, packed };
}

/**
 * Numbers the strong components of the residual network among the nodes on which minimum cuts
 * differ (R. Tarjan, "Depth-first search and linear graph algorithms", SIAM J. Comput. 1, 1972); the
 * minimum cuts are the closed sets of components (J.-C. Picard and M. Queyranne, "On the structure
 * of all minimum cuts in a network and applications", Math. Programming Study 13, 1980).
 *
 * @returns a number for each node, equal in a component; arcs lead to equal or lower numbers
 */
function strongComponents(
  network: TransportNetwork,
  state: TransportFlow,
  cuts: ExtremeCuts,
  meter: Meter,
): { left: Int32Array; right: Int32Array } {
  const { leftOffsets, leftTargets, rightOffsets, rightTargets } = network;
  const { flow } = state;
  const L = leftOffsets.length - 1, R = rightOffsets.length - 1;
  // Nodes are 0 … L-1 on the left and L … L+R-1 on the right.
  const seen = new Int32Array(L + R), low = new Int32Array(L + R);
  const component = new Int32Array(L + R).fill(-1);
  const next = new Int32Array(L + R);
  next.set(leftOffsets.subarray(0, L));
  next.set(rightOffsets.subarray(0, R), L);
  const path = new Int32Array(L + R), open = new Int32Array(L + R);
  let clock = 0, count = 0, opened = 0;
  for (let root = 0; root < L + R; root++) {
    if (seen[root] !== 0 || (root < L ? cuts.left[root] : cuts.right[root - L]) !== 0) continue;
    let depth = 0;
    path[0] = open[opened++] = root;
    seen[root] = low[root] = ++clock;
    while (depth >= 0) {
      const x = path[depth];
      let into = -1;
      if (x < L) {
        const end = leftOffsets[x + 1];
        let a = next[x];
        meter.tick();
        for (; a < end; a++) {
          const y = L + leftTargets[a];
          if (cuts.right[y - L] !== 0 || component[y] >= 0) continue;
          if (seen[y] === 0) {
            into = y;
            break;
          }
          if (seen[y] < low[x]) low[x] = seen[y];
        }
        next[x] = a;
      } else {
        const end = rightOffsets[x - L + 1];
        let b = next[x];
        meter.tick();
        for (; b < end; b++) {
          const y = rightTargets[b];
          if (flow[b] === 0 || cuts.left[y] !== 0 || component[y] >= 0) continue;
          if (seen[y] === 0) {
            into = y;
            break;
          }
          if (seen[y] < low[x]) low[x] = seen[y];
        }
        next[x] = b;
      }
      if (into >= 0) {
        path[++depth] = open[opened++] = into;
        seen[into] = low[into] = ++clock;
        continue;
      }
      if (low[x] === seen[x]) {
        let y: number;
        do {
          y = open[--opened];
          component[y] = count;
        } while (y !== x);
        count++;
      }
      depth--;
      if (depth >= 0 && low[x] < low[path[depth]]) low[path[depth]] = low[x];
    }
  }
  return { left: component.subarray(0, L), right: component.subarray(L) };
}
