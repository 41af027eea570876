/**
 * Turns a graph with weights into a smaller one whose heaviest stable set gives the whole's.
 *
 * @example
 * ```ts
 * import { graphFromPairs } from "../graph/mod.ts";
 * import { Meter } from "../run/mod.ts";
 * import { halfIntegralKernel } from "./mod.ts";
 * const star = graphFromPairs(4, [[0, 1], [0, 2], [0, 3]]);
 * const { value } = halfIntegralKernel(star, Float64Array.of(2, 1, 1, 1), new Meter());
 * console.assert(value.join() === "0,2,2,2"); // the three leaves, without any search
 * ```
 * @module
 */
export { type HalfIntegralKernel, halfIntegralKernel } from "./kernel.ts";
export { liftBlocks, reduceBlocks, type Reduction } from "./blocks.ts";
export type { Block, CostGraph } from "./blocks-costs.ts";
export type { Gadget } from "./gadgets.ts";
export type { ReplacedBlock, Replacing } from "./gadgets-apply.ts";
export {
  type CombinedAnswer,
  type KernelPiece,
  type PieceAnswer,
  type ReducedPiece,
  reducePiece,
} from "./blocks-piece.ts";
export { decompose } from "./decompose.ts";
export {
  type DecomposedComponent,
  Decomposition,
  type DecompositionData,
  type ItemBlock,
} from "./decomposition.ts";
export { replaceBlocks } from "./replace-blocks.ts";
export {
  type GadgetInfo,
  type GadgetState,
  gadgetText,
  Replacement,
  type ReplacementData,
} from "./replacement.ts";
export {
  Classification,
  type ClassificationData,
  type ClassifiedComponent,
  classify,
  type ComponentEmbedding,
  type Interval,
} from "./classify.ts";
export type { GraphKind } from "../parity/classify-graph.ts";
export type { EvenFaceEmbedding } from "../parity/even-face-result.ts";
