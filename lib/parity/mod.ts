/**
 * Odd cycles: transversals that meet them all, packings of disjoint ones, and embeddings in the
 * projective plane with all faces even, which explain why a graph far from bipartite has no two
 * disjoint odd cycles. Graphs only; nothing here knows items or weights.
 *
 * @example
 * ```ts
 * import { graphFromPairs } from "../graph/mod.ts";
 * import { Meter } from "../run/mod.ts";
 * import { leastTransversal } from "./mod.ts";
 * const k5 = graphFromPairs(5, [0, 1, 2, 3].flatMap((u) =>
 *   Array.from({ length: 4 - u }, (_, i) => [u, u + 1 + i] as const)
 * ));
 * console.assert(leastTransversal(k5, new Meter()).upper === 3);
 * ```
 * @module
 */
export { classifyGraph, type GraphClass, type GraphKind } from "./classify-graph.ts";
export { doubleCover } from "./double-cover.ts";
export { evenFaceEmbedding, type EvenFaceOptions } from "./even-face.ts";
export type { EvenFaceEmbedding, EvenFaceResult, NoEvenFace } from "./even-face-result.ts";
export { type OddCyclePacking, oddCyclePacking } from "./odd-cycle-packing.ts";
export { leastTransversal, type Transversal, type TransversalOptions } from "./transversal.ts";
