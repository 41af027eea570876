/** All bipartite sides of a small graph, by trying every set of at most three attachments. */
import type { Graph } from "../../lib/graph/graph.ts";

export interface SmallSide {
  readonly inside: number[];
  readonly attachments: number[];
}

/** Components D of G - S, |S| <= 3 and N(D) = S, that are bipartite with S less the edges in S. */
export function allSides(graph: Graph): SmallSide[] {
  const { n } = graph;
  const joined = neighbourSets(graph);
  const sides: SmallSide[] = [];
  const sets: number[][] = [[]];
  for (let a = 0; a < n; a++) {
    sets.push([a]);
    for (let b = a + 1; b < n; b++) {
      sets.push([a, b]);
      for (let c = b + 1; c < n; c++) sets.push([a, b, c]);
    }
  }
  for (const attachments of sets) {
    const open = new Set(Array.from({ length: n }, (_, v) => v));
    for (const s of attachments) open.delete(s);
    while (open.size > 0) {
      const inside = [open.values().next().value!];
      open.delete(inside[0]);
      for (let i = 0; i < inside.length; i++) {
        for (const u of joined[inside[i]]) if (open.delete(u)) inside.push(u);
      }
      if (isSide(graph, inside, attachments)) sides.push({ inside, attachments });
    }
  }
  return sides;
}

/** Whether a connected set is a side with exactly these attachments. */
export function isSide(
  graph: Graph,
  inside: ArrayLike<number>,
  attachments: ArrayLike<number>,
): boolean {
  const joined = neighbourSets(graph);
  const within = new Set(Array.from(inside)), outside = new Set(Array.from(attachments));
  const met = new Set<number>();
  for (const v of within) {
    for (const u of joined[v]) {
      if (within.has(u)) continue;
      if (!outside.has(u)) return false;
      met.add(u);
    }
  }
  if (met.size !== outside.size || outside.size > 3) return false;
  const colour = new Map<number, number>([[inside[0], 0]]);
  const queue = [inside[0]];
  for (const v of queue) {
    for (const u of joined[v]) {
      if (outside.has(v) && outside.has(u) || !(within.has(u) || outside.has(u))) continue;
      if (outside.has(v) && !within.has(u)) continue;
      if (!colour.has(u)) {
        colour.set(u, 1 - colour.get(v)!);
        queue.push(u);
      } else if (colour.get(u) === colour.get(v)) return false;
    }
  }
  return colour.size === within.size + outside.size;
}

function neighbourSets(graph: Graph): Set<number>[] {
  const joined = Array.from({ length: graph.n }, () => new Set<number>());
  for (let e = 0; e < graph.m; e++) {
    joined[graph.tails[e]].add(graph.heads[e]);
    joined[graph.heads[e]].add(graph.tails[e]);
  }
  return joined;
}
