/** From a one-sided cycle of the dual back to a stable set: the vertices that leave its edges slack. */
import type { Graph } from "../../graph/graph.ts";

/**
 * The stable set whose edge slacks are given, or one at least as heavy. Solves x(u) + x(v) = 1 - y(e)
 * along a breadth-first tree and one odd cycle; the solution is an integer vector, because the cycle
 * is one-sided. Where it leaves 0 … 1 it is clamped: since all-half is optimal for the relaxation, the
 * neighbours of the vertices clamped down weigh no less than these, so the weight does not drop.
 *
 * @param graph H, connected and not bipartite, n vertices
 * @param crossed the edges the cycle crosses, with repetitions: y(e) counts them
 * @returns length n, entries 0 and 1, a stable set. O(n + m) time.
 * @throws {Error} when y is not the slack of an integer vector; cannot happen for one-sided cycles
 */
export function stableSetOfCycle(
  graph: Graph,
  crossed: readonly number[],
): Uint8Array {
  const { n, m, offsets, targets, edgeOf } = graph;
  const slack = new Int32Array(m);
  for (const e of crossed) slack[e]++;
  // Along the tree x(v) = constant(v) + sign(v)·t, where t is x at the root.
  const constant = new Int32Array(n), sign = new Int8Array(n), order = new Int32Array(n);
  sign[0] = 1;
  let tail = 1, t = NaN;
  for (let head = 0; head < tail; head++) {
    const v = order[head];
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a], rest = 1 - slack[edgeOf[a]] - constant[v];
      if (sign[u] === 0) {
        sign[u] = -sign[v];
        constant[u] = rest;
        order[tail++] = u;
      } else if (sign[u] === sign[v]) {
        t = (rest - constant[u]) / (2 * sign[u]);
      }
    }
  }
  const chosen = new Uint8Array(n);
  for (let v = 0; v < n; v++) {
    const x = constant[v] + sign[v] * t;
    if (!Number.isInteger(x)) throw new Error("internal: the cycle is not one-sided");
    if (x >= 1) chosen[v] = 1;
  }
  for (let e = 0; e < m; e++) {
    if (chosen[graph.tails[e]] !== 0 && chosen[graph.heads[e]] !== 0) {
      throw new Error("internal: the slacks of the cycle belong to no stable set");
    }
  }
  return chosen;
}
