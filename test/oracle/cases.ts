/**
 * A slow recursive checker of proofs by cases, straight from the notation of certificate.ts: every
 * bound is computed anew at every leaf with big integers.
 */
import type { CasesProof, PackingProof } from "../../lib/certify/certificate.ts";
import type { Graph } from "../../lib/graph/graph.ts";

/**
 * @param graph numbered as the proof numbers vertices
 * @param weights length n, integers
 * @param proof by cases or by a packing, about all vertices of the graph
 * @returns the bound it proves
 * @throws {Error} for the first thing that is wrong
 */
export function boundProved(
  graph: Graph,
  weights: ArrayLike<number>,
  proof: CasesProof | PackingProof,
): number {
  const { n } = graph;
  const joined = Array.from({ length: n }, () => new Set<number>());
  for (let e = 0; e < graph.m; e++) {
    joined[graph.tails[e]].add(graph.heads[e]);
    joined[graph.heads[e]].add(graph.tails[e]);
  }
  const cases: CasesProof = proof.rule === "cases" ? proof : {
    rule: "cases",
    cliques: Array.from(proof.doubled, (_, k) => [proof.ends[2 * k], proof.ends[2 * k + 1]]),
    oddCycles: [],
    nodes: [{ set: Array.from(proof.doubled).flatMap((value, k) => [k, value]) }],
  };
  const terms = [...cases.cliques, ...cases.oddCycles].map((t) => Array.from(t));
  terms.forEach((term, t) => {
    if (new Set(term).size !== term.length) throw new Error(`term ${t} repeats a vertex`);
    for (let i = 0; i < term.length; i++) {
      const far = t < cases.cliques.length ? term.slice(i + 1) : [term[(i + 1) % term.length]];
      for (const u of far) {
        if (!joined[term[i]].has(u)) throw new Error(`term ${t}: ${term[i]} and ${u} not joined`);
      }
    }
    if (t >= cases.cliques.length && (term.length < 3 || term.length % 2 === 0)) {
      throw new Error(`term ${t} is no odd cycle`);
    }
  });
  const denominator = cases.denominator ?? 2;
  if (!Number.isInteger(denominator) || denominator < 1) throw new Error("bad denominator");

  let at = 0;
  const visit = (
    inPlay: Set<number>,
    chosen: Set<number>,
    inherited: Map<number, number>,
  ): bigint => {
    const node = cases.nodes[at++];
    if (node === undefined) throw new Error("a case is missing");
    const multipliers = new Map(inherited);
    const set = node.set ?? [];
    for (let i = 0; i < set.length; i += 2) {
      if (terms[set[i]] === undefined) throw new Error(`no term ${set[i]}`);
      if (!(Number.isSafeInteger(set[i + 1]) && set[i + 1] >= 0)) throw new Error("bad multiplier");
      multipliers.set(set[i], set[i + 1]);
    }
    if (node.on !== undefined) {
      const v = node.on;
      if (!inPlay.has(v)) throw new Error(`vertex ${v} is not in play`);
      const after = new Set([...inPlay].filter((u) => u !== v && !joined[v].has(u)));
      const with_ = BigInt(weights[v]) + visit(after, new Set([...chosen, v]), multipliers);
      const without = visit(new Set([...inPlay].filter((u) => u !== v)), chosen, multipliers);
      return with_ > without ? with_ : without;
    }
    if (node.split !== undefined) {
      const parts = node.split.map((part) => new Set(Array.from(part)));
      const all = parts.flatMap((part) => [...part]);
      if (all.length !== inPlay.size || all.some((v) => !inPlay.has(v))) {
        throw new Error("a split does not part what is in play");
      }
      return parts.reduce((sum, part) => sum + visit(part, chosen, new Map()), 0n);
    }
    let sum = 0n;
    const load = new Map<number, bigint>();
    for (const [t, value] of multipliers) {
      const rhs = t < cases.cliques.length ? 1 : (terms[t].length - 1) / 2;
      sum += BigInt(value) * BigInt(rhs - terms[t].filter((v) => chosen.has(v)).length);
      for (const v of terms[t]) load.set(v, (load.get(v) ?? 0n) + BigInt(value));
    }
    for (const v of inPlay) {
      const room = BigInt(weights[v]) * BigInt(denominator) - (load.get(v) ?? 0n);
      if (room > 0n) sum += room;
    }
    return sum / BigInt(denominator);
  };
  const bound = visit(new Set(Array.from({ length: n }, (_, v) => v)), new Set(), new Map());
  if (at !== cases.nodes.length) throw new Error("nodes left over");
  return Number(bound);
}
