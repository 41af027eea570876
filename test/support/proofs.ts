/** Runs a proof about all vertices of a graph through the library's checker. */
import type { Proof } from "../../lib/certify/certificate.ts";
import { neighbourLists, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import type { Graph } from "../../lib/graph/graph.ts";

/**
 * @param labels length n: the number the proof gives each vertex; a permutation of 0 … n-1
 * @returns the bound the checker accepts
 * @throws what the checker throws
 */
export function checkedBound(
  graph: Graph,
  weights: Float64Array,
  labels: Int32Array,
  proof: Proof,
): number {
  const renamed = (ends: Int32Array): Int32Array => ends.map((v) => labels[v]);
  const byLabel = new Float64Array(graph.n);
  labels.forEach((label, v) => byLabel[label] = weights[v]);
  const play = {
    n: graph.n,
    ...neighbourLists(graph.n, renamed(graph.tails), renamed(graph.heads)),
    weights: byLabel,
    vertices: Int32Array.from({ length: graph.n }, (_, v) => v),
    nameOf: (v: number) => `vertex ${v}`,
    scratch: scratchFor(graph.n),
  };
  return Number(provenBound(play, JSON.parse(JSON.stringify(proof, typedAsLists))));
}

function typedAsLists(_key: string, value: unknown): unknown {
  return ArrayBuffer.isView(value) ? Array.from(value as Float64Array) : value;
}
