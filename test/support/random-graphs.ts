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
 * A random graph in which every vertex has degree d, by pairing half-edges at random and starting
 * again until no loop and no parallel edge appears; n·d even, d small.
 */
export function randomRegularGraph(random: Random, n: number, d: number): Graph {
  for (;;) {
    const ends = random.shuffle(Int32Array.from({ length: n * d }, (_, i) => Math.floor(i / d)));
    const seen = new Set<number>();
    let simple = true;
    for (let i = 0; simple && i < ends.length; i += 2) {
      const u = Math.min(ends[i], ends[i + 1]), v = Math.max(ends[i], ends[i + 1]);
      simple = u !== v && !seen.has(u * n + v);
      seen.add(u * n + v);
    }
    if (!simple) continue;
    return graphFromPairs(n, [...seen].map((key) => [Math.floor(key / n), key % n] as const));
  }
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
