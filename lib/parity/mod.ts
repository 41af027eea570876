/**
 * Odd and even: what the odd cycles of a graph look like. The signed double cover, least odd cycles,
 * transversals and packings of odd cycles, and the even-face embeddings in the projective plane that
 * graphs without two disjoint odd cycles have once they are far from bipartite.
 *
 * @example
 * ```ts
 * import { evenFaceEmbedding } from "./mod.ts";
 * import { graphFromPairs } from "../graph/mod.ts";
 * import { Meter } from "../run/mod.ts";
 * const triangle = graphFromPairs(3, [[0, 1], [1, 2], [2, 0]]);
 * console.assert(evenFaceEmbedding(triangle, new Meter()).kind === "embedded");
 * ```
 * @module
 */
export { doubleCover, liftDart, liftRotation } from "./double-cover.ts";
export {
  type CheapOddCycle,
  type OddCycleOptions,
  shortestOddCycle,
} from "./shortest-odd-cycle.ts";
export { evenFaceEmbedding, type EvenFaceOptions } from "./even-face.ts";
export {
  type EvenFaceEmbedding,
  type EvenFaceResult,
  type NoEvenFace,
  type NoEvenFaceReason,
} from "./even-face-result.ts";
export { leastTransversal, type Transversal, type TransversalOptions } from "./transversal.ts";
export {
  type TwoDisjoint,
  twoDisjointOddCycles,
  type TwoDisjointOptions,
} from "./disjoint-odd-cycles.ts";
export { classifyGraph, type GraphClass, type GraphKind } from "./classify-graph.ts";
export { type OddCyclePacking, oddCyclePacking } from "./odd-cycle-packing.ts";
