/**
 * Random well-formed proofs by cases: they prove some bound, seldom a good one. For testing that the
 * checker computes what the notation says and never less than the optimum.
 */
import type { CaseNode, CasesProof } from "../../lib/certify/certificate.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";

/** A random proof about all vertices of a graph; weights are about `scale`. */
export function randomCases(random: Random, graph: Graph, scale: number): CasesProof {
  const joined = Array.from({ length: graph.n }, () => new Set<number>());
  for (let e = 0; e < graph.m; e++) {
    joined[graph.tails[e]].add(graph.heads[e]);
    joined[graph.heads[e]].add(graph.tails[e]);
  }
  const cliques = Array.from({ length: random.below(8) }, () => {
    const clique: number[] = [];
    for (const v of random.shuffle(Array.from({ length: graph.n }, (_, i) => i))) {
      if (clique.every((u) => joined[u].has(v))) clique.push(v);
    }
    return clique;
  });
  const oddCycles = [randomOddCycle(random, joined)].filter((cycle) => cycle.length > 0);
  const terms = cliques.length + oddCycles.length;
  const nodes: CaseNode[] = [];
  const grow = (inPlay: number[], depth: number): void => {
    const set: number[] = [];
    for (let t = 0; t < terms; t++) {
      if (random.below(3) === 0) set.push(t, random.below(2 * scale));
    }
    const kind = inPlay.length === 0 || depth === 0 ? 0 : random.below(5);
    if (kind <= 1) {
      nodes.push({ set });
    } else if (kind <= 3) {
      const on = inPlay[random.below(inPlay.length)];
      nodes.push({ set, on });
      grow(inPlay.filter((v) => v !== on && !joined[on].has(v)), depth - 1);
      grow(inPlay.filter((v) => v !== on), depth - 1);
    } else {
      const split: number[][] = Array.from({ length: 1 + random.below(3) }, () => []);
      for (const v of inPlay) split[random.below(split.length)].push(v);
      nodes.push({ set, split });
      for (const part of split) grow(part, depth - 1);
    }
  };
  grow(Array.from({ length: graph.n }, (_, v) => v), 4);
  const denominator = 1 + random.below(4);
  return { rule: "cases", cliques, oddCycles, nodes, ...(denominator !== 2 && { denominator }) };
}

/** Walks at random until a path closes on itself in an odd cycle; empty when it seldom does. */
function randomOddCycle(random: Random, joined: readonly ReadonlySet<number>[]): number[] {
  for (let attempt = 0; attempt < 20; attempt++) {
    const path = [random.below(joined.length)];
    while (path.length <= joined.length) {
      const next = [...joined[path[path.length - 1]]].filter((v) => v !== path[path.length - 2]);
      if (next.length === 0) break;
      const v = next[random.below(next.length)];
      const seen = path.indexOf(v);
      if (seen < 0) {
        path.push(v);
        continue;
      }
      if ((path.length - seen) % 2 === 1) return path.slice(seen);
      break;
    }
  }
  return [];
}
