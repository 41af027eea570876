/**
 * Checks of planarity witnesses by plain code that shares nothing with lib/graph: Euler's formula
 * with faces traced over lists of neighbours, and subdivisions taken apart edge by edge.
 */
import type { Graph } from "../../lib/graph/graph.ts";
import type { Kuratowski } from "../../lib/graph/kuratowski.ts";

/** What is wrong with a planar rotation system, or undefined. */
export function planarProblem(graph: Graph, next: Int32Array): string | undefined {
  const ends = (d: number): [number, number] =>
    d % 2 === 0
      ? [graph.tails[d / 2], graph.heads[d / 2]]
      : [graph.heads[(d - 1) / 2], graph.tails[(d - 1) / 2]];
  const darts = Array.from({ length: 2 * graph.m }, (_, d) => d);
  if (next.length !== darts.length) return "wrong length";
  // The darts around each vertex, in counterclockwise order.
  const around = new Map<number, number[]>();
  const placed = new Set<number>();
  for (const d of darts) {
    const [v] = ends(d);
    if (around.has(v)) {
      if (!placed.has(d)) return `dart ${d} is not on the cycle around vertex ${v}`;
      continue;
    }
    const order: number[] = [];
    for (let e = d; !placed.has(e); e = next[e]) {
      if (ends(e)[0] !== v) return `dart ${e} is on the cycle around vertex ${v}`;
      placed.add(e);
      order.push(e);
    }
    around.set(v, order);
  }
  // Faces: arriving at a vertex, leave by the dart clockwise of where one came from.
  const clockwise = new Map<number, number>();
  for (const order of around.values()) {
    order.forEach((d, i) => clockwise.set(d, order[(i + order.length - 1) % order.length]));
  }
  const group = Array.from({ length: graph.n }, (_, v) => v);
  const root = (v: number): number => group[v] === v ? v : (group[v] = root(group[v]));
  for (let e = 0; e < graph.m; e++) group[root(graph.tails[e])] = root(graph.heads[e]);
  const balance = new Map<number, number>(); // vertices - edges + faces of each component
  const count = (v: number, by: number) => balance.set(root(v), (balance.get(root(v)) ?? 0) + by);
  for (let v = 0; v < graph.n; v++) count(v, around.has(v) ? 1 : 2);
  for (let e = 0; e < graph.m; e++) count(graph.tails[e], -1);
  const walked = new Set<number>();
  for (const d of darts) {
    if (walked.has(d)) continue;
    for (let e = d; !walked.has(e); e = clockwise.get(e % 2 === 0 ? e + 1 : e - 1)!) walked.add(e);
    count(ends(d)[0], 1);
  }
  for (const [v, sum] of balance) if (sum !== 2) return `Euler characteristic ${sum} around ${v}`;
  return undefined;
}

/** What is wrong with a Kuratowski subdivision, or undefined. */
export function subdivisionProblem(graph: Graph, witness: Kuratowski): string | undefined {
  const edges = new Set<number>();
  for (const path of witness.paths) {
    for (const e of path) {
      if (edges.has(e) || !(e in graph.tails)) return `edge ${e}`;
      edges.add(e);
    }
  }
  const near = new Map<number, number[]>();
  for (const e of edges) {
    for (const [a, b] of [[graph.tails[e], graph.heads[e]], [graph.heads[e], graph.tails[e]]]) {
      near.set(a, [...(near.get(a) ?? []), b]);
    }
  }
  const branches = [...near].filter(([, list]) => list.length !== 2).map(([v]) => v).sort();
  if (branches.join() !== [...witness.branches].sort().join()) return `branches ${branches}`;
  const seen = new Set(branches);
  const joined = new Set<string>();
  for (const b of branches) {
    for (const start of near.get(b)!) {
      let from = b, at = start;
      while (!branches.includes(at)) {
        seen.add(at);
        const [p, q] = near.get(at)!;
        [from, at] = [at, p === from ? q : p];
      }
      joined.add(`${b},${at}`);
    }
  }
  if (seen.size !== near.size) return "a cycle apart";
  const side = (v: number) => witness.branches.indexOf(v) < 3;
  for (const a of branches) {
    for (const b of branches) {
      const expected = a !== b && (witness.kind === "K5" || side(a) !== side(b));
      if (joined.has(`${a},${b}`) !== expected) return `branches ${a} and ${b}`;
    }
  }
  return branches.length === (witness.kind === "K5" ? 5 : 6) ? undefined : "number of branches";
}
