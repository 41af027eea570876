/** Writes the solver's embedding and sources down in the numbering of certificates. O(n + m) time. */
import type { ProjectiveProof } from "../../certify/certificate.ts";
import type { Piece } from "../engine.ts";
import type { DirectedDual } from "./directed-dual.ts";

/**
 * The proof that no stable set of the piece is heavier than the cycle allows.
 *
 * @param piece simple; `labels` number its vertices in the certificate
 * @param next length 2m, its rotation system
 * @param unit what `costs` are multiplied by
 * @param costs length m, doubled costs in units
 * @param sources faces of a one-sided walk
 * @param distance the least distance between a face and its antipode
 */
export function proofOf(
  piece: Piece,
  next: Int32Array,
  unit: number,
  costs: Int32Array | Float64Array,
  dual: DirectedDual,
  sources: Int32Array,
  distance: number,
): ProjectiveProof {
  const { graph, labels } = piece;
  const { n, m, offsets } = graph;
  // Darts in certificate order: by the label where they start, then by the label where they end.
  const byLabel = new Int32Array(n);
  for (let v = 0; v < n; v++) byLabel[v] = v;
  if (labels.some((label, v) => v > 0 && label < labels[v - 1])) {
    byLabel.sort((u, v) => labels[u] - labels[v]);
  }
  const begin = new Int32Array(n);
  for (let i = 0, at = 0; i < n; i++) {
    begin[byLabel[i]] = at;
    at += offsets[byLabel[i] + 1] - offsets[byLabel[i]];
  }
  const dartAt = new Int32Array(2 * m), placeOf = new Int32Array(2 * m);
  const fill = begin.slice();
  for (let i = 0; i < n; i++) {
    // Going through the ends in order leaves the darts into them in order.
    const u = byLabel[i];
    for (let a = offsets[u]; a < offsets[u + 1]; a++) {
      const e = graph.edgeOf[a], v = graph.targets[a];
      const dart = graph.tails[e] === v ? 2 * e : 2 * e + 1;
      placeOf[dart] = fill[v];
      dartAt[fill[v]++] = dart;
    }
  }
  const orderedCosts = costs instanceof Int32Array ? new Int32Array(m) : new Float64Array(m);
  for (let p = 0, k = 0; p < 2 * m; p++) {
    if (placeOf[dartAt[p] ^ 1] > p) orderedCosts[k++] = costs[dartAt[p] >> 1];
  }
  const rotation = new Int32Array(2 * m);
  for (let v = 0; v < n; v++) {
    const degree = offsets[v + 1] - offsets[v];
    for (let i = 0, d = dartAt[begin[v]]; i < degree; i++, d = next[d]) {
      rotation[begin[v] + i] = placeOf[d] - begin[v];
    }
  }
  const dartOf = new Int32Array(2 * dual.pairs);
  for (let p = 2 * m - 1; p >= 0; p--) dartOf[dual.sides[2 * dartAt[p]]] = p;
  return {
    rule: "projective",
    unit,
    costs: orderedCosts,
    rotation,
    sources: Int32Array.from(sources, (x) => dartOf[x]),
    distance,
  };
}
