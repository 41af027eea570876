/**
 * Maximum flow and both extreme minimum cuts in a directed network with exact integer capacities,
 * some of them without limit. Shortest augmenting paths in phases, so O(n²·arcs) at worst; without
 * recursion. For networks of moderate size; the large ones of the relaxation have their own solver.
 */
import { exactAdd } from "../run/exact.ts";
import type { Meter } from "../run/meter.ts";

/** A directed network. Parallel and opposite arcs are allowed; loops carry nothing. */
export interface FlowNetwork {
  /** Number of nodes. */
  readonly n: number;
  /** One entry for each arc: where it begins. */
  readonly tails: Int32Array;
  /** One entry for each arc: where it ends. */
  readonly heads: Int32Array;
  /** One entry for each arc: an integer from 0 to 2^53 - 1, or Infinity. */
  readonly capacities: Float64Array;
}

/** A maximum flow and what every minimum cut agrees on. */
export interface MaxFlow {
  /**
   * Value of the flow. Infinity when arcs without limit lead from source to sink; then `flow` is zero,
   * `sourceSide` marks what such arcs reach from the source, `sinkSide` from where they reach the sink.
   */
  readonly value: number;
  /** One entry for each arc, integers from 0 to its capacity. */
  readonly flow: Float64Array;
  /** Length n: 1 on the nodes that the source reaches in the residual network (least cut). */
  readonly sourceSide: Uint8Array;
  /** Length n: 1 on the nodes that reach the sink (the rest is the greatest cut). */
  readonly sinkSide: Uint8Array;
}

/**
 * Computes a maximum flow (E. A. Dinic, "Algorithm for solution of a problem of maximum flow in
 * networks with power estimation", Soviet Math. Doklady 11, 1970).
 *
 * @param network nodes and arcs
 * @param source a node
 * @param sink another node
 * @param meter counts about one unit for each arc scanned
 * @returns the flow, its value and both extreme minimum cuts
 * @throws {RangeError} for a bad node or capacity, or when the value is finite but not below 2^53
 * @throws {Interrupted} when the meter runs out
 */
export function maxFlow(
  network: FlowNetwork,
  source: number,
  sink: number,
  meter: Meter,
): MaxFlow {
  const { n, tails, heads, capacities } = network;
  const arcs = tails.length;
  check(network, source, sink);
  // Half-arcs: 2a along arc a and 2a+1 against it, so that h ^ 1 is the other half.
  const start = new Int32Array(n + 1), list = new Int32Array(2 * arcs);
  for (let a = 0; a < arcs; a++) {
    start[tails[a] + 1]++;
    start[heads[a] + 1]++;
  }
  for (let v = 0; v < n; v++) start[v + 1] += start[v];
  const next = start.slice(0, n);
  const residual = new Float64Array(2 * arcs);
  for (let a = 0; a < arcs; a++) {
    list[next[tails[a]]++] = 2 * a;
    list[next[heads[a]]++] = 2 * a + 1;
    residual[2 * a] = capacities[a];
  }
  const end = (h: number): number => (h & 1) === 0 ? heads[h >> 1] : tails[h >> 1];
  const level = new Int32Array(n), queue = new Int32Array(n), path = new Int32Array(n);

  // Levels of the nodes from `root`, along half-arcs (step 0) or against them (step 1), over those
  // with a residual capacity above `over`; -1 where none leads.
  const search = (root: number, step: 0 | 1, over: number, until = -1): void => {
    level.fill(-1);
    let tail = 0;
    queue[tail++] = root;
    level[root] = 0;
    for (let head = 0; head < tail; head++) {
      const v = queue[head];
      meter.tick(1 + start[v + 1] - start[v]);
      for (let p = start[v]; p < start[v + 1]; p++) {
        const h = list[p], u = end(h);
        if (level[u] >= 0 || !(residual[h ^ step] > over)) continue;
        level[u] = level[v] + 1;
        if (u === until) return;
        queue[tail++] = u;
      }
    }
  };
  const side = (root: number, step: 0 | 1, over: number): Uint8Array => {
    search(root, step, over);
    return Uint8Array.from(level, (l) => l >= 0 ? 1 : 0);
  };

  const unlimited = side(source, 0, Number.MAX_VALUE);
  const flow = new Float64Array(arcs);
  if (unlimited[sink] === 1) {
    const sinkSide = side(sink, 1, Number.MAX_VALUE);
    return { value: Infinity, flow, sourceSide: unlimited, sinkSide };
  }
  let value = 0;
  for (;;) {
    search(source, 0, 0, sink);
    if (level[sink] < 0) break;
    // A blocking flow, depth first with current arcs; path[d] is the half-arc that leaves depth d.
    next.set(start.subarray(0, n));
    let depth = 0, v = source;
    for (;;) {
      if (v === sink) {
        let by = Infinity;
        for (let d = 0; d < depth; d++) by = Math.min(by, residual[path[d]]);
        value = exactAdd(value, by);
        let cut = depth;
        for (let d = depth - 1; d >= 0; d--) {
          residual[path[d]] -= by;
          residual[path[d] ^ 1] += by;
          flow[path[d] >> 1] += (path[d] & 1) === 0 ? by : -by;
          if (residual[path[d]] === 0) cut = d;
        }
        meter.tick(depth);
        depth = cut;
        v = end(path[cut] ^ 1);
        continue;
      }
      let p = next[v];
      for (; p < start[v + 1]; p++) {
        const h = list[p];
        if (residual[h] > 0 && level[end(h)] === level[v] + 1) break;
      }
      meter.tick(1 + p - next[v]);
      next[v] = p;
      if (p < start[v + 1]) {
        path[depth++] = list[p];
        v = end(list[p]);
      } else if (depth > 0) {
        v = end(path[--depth] ^ 1);
        next[v]++;
      } else break;
    }
  }
  return { value, flow, sourceSide: side(source, 0, 0), sinkSide: side(sink, 1, 0) };
}

function check({ n, tails, heads, capacities }: FlowNetwork, source: number, sink: number): void {
  const node = (v: number): boolean => Number.isInteger(v) && v >= 0 && v < n;
  if (!node(source) || !node(sink) || source === sink) {
    throw new RangeError(
      `expected two different nodes from 0 to ${
        n - 1
      } as source and sink, got ${source} and ${sink}`,
    );
  }
  if (heads.length !== tails.length || capacities.length !== tails.length) {
    throw new RangeError(
      `expected as many heads and capacities as tails (${tails.length}), ` +
        `got ${heads.length} and ${capacities.length}`,
    );
  }
  for (let a = 0; a < tails.length; a++) {
    if (!node(tails[a]) || !node(heads[a])) {
      throw new RangeError(`arc ${a}: expected ends from 0 to ${n - 1}`);
    }
    const c = capacities[a];
    if (!(c === Infinity || (Number.isSafeInteger(c) && c >= 0))) {
      throw new RangeError(
        `arc ${a}: expected a capacity from 0 to 2^53 - 1 or Infinity, got ${c}`,
      );
    }
  }
}
