/** Seeded generators of graphs and weights for the tests; all simple graphs. */
import { components } from "../../lib/graph/components.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";

/** Each pair is an edge with probability p. */
export function randomGraph(random: Random, n: number, p: number): Graph {
  const pairs: [number, number][] = [];
  for (let u = 0; u < n; u++) {
    for (let v = u + 1; v < n; v++) if (random.unit() < p) pairs.push([u, v]);
  }
  return graphFromPairs(n, pairs);
}

/** m different edges (fewer when there are not so many pairs). */
export function randomGraphWithEdges(random: Random, n: number, m: number): Graph {
  const seen = new Set<number>();
  const pairs: [number, number][] = [];
  const most = Math.min(m, (n * (n - 1)) / 2);
  while (pairs.length < most) {
    const a = random.below(n), b = random.below(n);
    if (a === b) continue;
    const u = Math.min(a, b), v = Math.max(a, b);
    if (seen.has(u * n + v)) continue;
    seen.add(u * n + v);
    pairs.push([u, v]);
  }
  return graphFromPairs(n, pairs);
}

/** A random tree and extra edges: connected, with n - 1 + extra edges at most. */
export function randomConnectedGraph(random: Random, n: number, extra: number): Graph {
  const seen = new Set<number>();
  const pairs: [number, number][] = [];
  const add = (a: number, b: number): void => {
    const u = Math.min(a, b), v = Math.max(a, b);
    if (a === b || seen.has(u * n + v)) return;
    seen.add(u * n + v);
    pairs.push([u, v]);
  };
  for (let v = 1; v < n; v++) add(v, random.below(v));
  for (let i = 0; i < extra; i++) add(random.below(n), random.below(n));
  return graphFromPairs(n, pairs);
}

/**
 * A random graph in which every vertex has degree d: half-edges are paired at random, then a pair
 * that is a loop or parallel to another changes partners with a random pair until none is left. Not
 * quite uniform. n·d even, d well below n.
 */
export function randomRegularGraph(random: Random, n: number, d: number): Graph {
  const ends = random.shuffle(Int32Array.from({ length: n * d }, (_, i) => Math.floor(i / d)));
  const half = ends.length / 2;
  const count = new Map<number, number>();
  const keyOf = (i: number): number =>
    Math.min(ends[2 * i], ends[2 * i + 1]) * n + Math.max(ends[2 * i], ends[2 * i + 1]);
  const add = (i: number, change: number): void => {
    count.set(keyOf(i), (count.get(keyOf(i)) ?? 0) + change);
  };
  const bad = (i: number): boolean =>
    ends[2 * i] === ends[2 * i + 1] || (count.get(keyOf(i)) as number) > 1;
  for (let i = 0; i < half; i++) add(i, 1);
  for (let clean = 0, i = 0; clean < half; i = (i + 1) % half) {
    if (!bad(i)) {
      clean++;
      continue;
    }
    clean = 0;
    const j = random.below(half);
    add(i, -1);
    if (j !== i) add(j, -1);
    const kept = ends[2 * i + 1];
    ends[2 * i + 1] = ends[2 * j + 1];
    ends[2 * j + 1] = kept;
    add(i, 1);
    if (j !== i) add(j, 1);
  }
  return graphFromPairs(
    n,
    Array.from({ length: half }, (_, i) => [ends[2 * i], ends[2 * i + 1]] as const),
  );
}

/** Random edges between the sides 0 … a-1 and a … a+b-1. */
export function randomBipartiteGraph(random: Random, a: number, b: number, p: number): Graph {
  const pairs: [number, number][] = [];
  for (let u = 0; u < a; u++) {
    for (let v = 0; v < b; v++) if (random.unit() < p) pairs.push([u, a + v]);
  }
  return graphFromPairs(a + b, pairs);
}

/** Integer weights from `from` to `to`, both included. */
export function randomWeights(random: Random, n: number, from: number, to: number): Float64Array {
  return Float64Array.from({ length: n }, () => from + Math.floor(random.unit() * (to - from + 1)));
}

/** Whether the graph has at most one component. */
export function isConnected(graph: Graph): boolean {
  return components(graph).count <= 1;
}
