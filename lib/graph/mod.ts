/**
 * Graphs as typed arrays and the algorithms on them that know nothing of items or weights' units.
 *
 * @example
 * ```ts
 * import { components, graphFromPairs } from "./mod.ts";
 * const graph = graphFromPairs(4, [[0, 1], [2, 3]]);
 * console.assert(components(graph).count === 2);
 * ```
 * @module
 */
export {
  degree,
  type Graph,
  graphFromEdges,
  graphFromPairs,
  inducedSubgraph,
  otherEnd,
  type Subgraph,
} from "./graph.ts";
export { type Components, components, componentSubgraphs } from "./components.ts";
export { type TwoColouring, twoColouring } from "./two-colouring.ts";
export { type FlowNetwork, type MaxFlow, maxFlow } from "./max-flow.ts";
export {
  type Separations,
  separations,
  type SeparationsOptions,
  type Side,
} from "./separations.ts";
export { type Chain, chains } from "./separations-chains.ts";
export {
  dartEnd,
  dartStart,
  eulerGenus,
  type Faces,
  isRotationSystem,
  mirrored,
  type SignedEmbedding,
  signedEulerGenus,
  traceFaces,
} from "./embedding.ts";
export { type Planarity, planarity, planarRotation } from "./planarity.ts";
export { type Kuratowski, kuratowskiProblem } from "./kuratowski.ts";
export { CoverFlow } from "./cover-flow.ts";
