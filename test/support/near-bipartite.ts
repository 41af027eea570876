/** Large graphs with a planted odd cycle transversal. */
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";

/**
 * A random bipartite graph and k more vertices joined to anything.
 *
 * @param n number of vertices, the last k of them the planted ones
 * @param m edges of the bipartite part
 * @param k number of planted vertices
 * @param degree edges tried from each of them
 * @returns a simple graph whose last k vertices are an odd cycle transversal
 */
export function nearBipartite(
  random: Random,
  n: number,
  m: number,
  k: number,
  degree: number,
): Graph {
  const seen = new Set<number>();
  const pairs: [number, number][] = [];
  const add = (a: number, b: number): void => {
    const u = Math.min(a, b), v = Math.max(a, b);
    if (u === v || seen.has(u * n + v)) return;
    seen.add(u * n + v);
    pairs.push([u, v]);
  };
  const half = (n - k) >> 1;
  while (pairs.length < m) add(random.below(half), half + random.below(n - k - half));
  for (let x = n - k; x < n; x++) for (let d = 0; d < degree; d++) add(x, random.below(n));
  return graphFromPairs(n, pairs);
}
