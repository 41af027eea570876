/** A proof by cases for any small graph: branches until no edge is left, without any multiplier. */
import type { CaseNode, CasesProof } from "../../lib/certify/certificate.ts";
import type { Graph } from "../../lib/graph/graph.ts";

/**
 * @param labels the number of each vertex in the proof
 * @returns a proof of exactly the heaviest stable set's weight, weights being >= 0. Exponential size.
 */
export function proveByCases(graph: Graph, labels: ArrayLike<number>): CasesProof {
  const nodes: CaseNode[] = [];
  const visit = (inPlay: ReadonlySet<number>): void => {
    let on = -1, most = 0;
    for (const v of inPlay) {
      const d = neighboursOf(graph, v).filter((u) => inPlay.has(u)).length;
      if (d > most) [on, most] = [v, d];
    }
    if (on < 0) {
      nodes.push({});
      return;
    }
    nodes.push({ on: labels[on] });
    const near = new Set([on, ...neighboursOf(graph, on)]);
    visit(new Set([...inPlay].filter((u) => !near.has(u))));
    visit(new Set([...inPlay].filter((u) => u !== on)));
  };
  visit(new Set(Array.from({ length: graph.n }, (_, v) => v)));
  return { rule: "cases", cliques: [], oddCycles: [], nodes };
}

function neighboursOf({ offsets, targets }: Graph, v: number): number[] {
  return Array.from(targets.subarray(offsets[v], offsets[v + 1]));
}
