/**
 * The heaviest stable set by plain recursion over bit masks: obvious, exact and slow. Meant for up
 * to about 24 vertices (30 at most, since a set of vertices is one 32-bit mask).
 */
import type { Graph } from "../../lib/graph/graph.ts";

/** A heaviest stable set; the empty one when no weight is positive. */
export interface HeaviestStableSet {
  readonly weight: number;
  /** Length n, entries 0 and 1. */
  readonly chosen: Uint8Array;
}

/**
 * Branches on a vertex of most neighbours: left, or chosen without them. A vertex without
 * neighbours is chosen when its weight is positive.
 *
 * @param graph at most 30 vertices; parallel edges do no harm
 * @param weights length n, integers of any sign
 * @returns a heaviest stable set. Exponential time.
 * @throws {RangeError} for more than 30 vertices
 */
export function bruteForce(graph: Graph, weights: ArrayLike<number>): HeaviestStableSet {
  const { n } = graph;
  if (n > 30) throw new RangeError(`expected at most 30 vertices, got ${n}`);
  const near = new Int32Array(n);
  for (let e = 0; e < graph.m; e++) {
    near[graph.tails[e]] |= 1 << graph.heads[e];
    near[graph.heads[e]] |= 1 << graph.tails[e];
  }
  let best = 0, bestMask = 0;
  const visit = (open: number, mask: number, weight: number): void => {
    let at = -1, most = 0;
    for (let rest = open; rest !== 0; rest &= rest - 1) {
      const v = 31 - Math.clz32(rest & -rest);
      const d = bitCount(near[v] & open);
      if (d > most) [at, most] = [v, d];
      if (d === 0) {
        open &= ~(1 << v);
        if (weights[v] > 0) {
          mask |= 1 << v;
          weight += weights[v];
        }
      }
    }
    if (at < 0) {
      if (weight > best) [best, bestMask] = [weight, mask];
      return;
    }
    visit(open & ~near[at] & ~(1 << at), mask | (1 << at), weight + weights[at]);
    visit(open & ~(1 << at), mask, weight);
  };
  visit(n === 0 ? 0 : 2 ** n - 1, 0, 0);
  return { weight: best, chosen: Uint8Array.from({ length: n }, (_, v) => (bestMask >> v) & 1) };
}

/** Whether no edge has both ends chosen. */
export function isStable(graph: Graph, chosen: ArrayLike<number>): boolean {
  for (let e = 0; e < graph.m; e++) {
    if (chosen[graph.tails[e]] !== 0 && chosen[graph.heads[e]] !== 0) return false;
  }
  return true;
}

/** The weight of the chosen vertices. */
export function weightOf(weights: ArrayLike<number>, chosen: ArrayLike<number>): number {
  let sum = 0;
  for (let v = 0; v < weights.length; v++) if (chosen[v] !== 0) sum += weights[v];
  return sum;
}

function bitCount(x: number): number {
  let count = 0;
  for (; x !== 0; x &= x - 1) count++;
  return count;
}
