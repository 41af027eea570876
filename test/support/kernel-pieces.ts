/** The components of a half-integral kernel as pieces, for the tests. */
import { componentSubgraphs } from "../../lib/graph/components.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import type { KernelPiece } from "../../lib/reduce/blocks-piece.ts";
import { halfIntegralKernel } from "../../lib/reduce/kernel.ts";
import { Meter } from "../../lib/run/meter.ts";

/** @param weights positive integers; labels of the pieces are vertex numbers of `graph` */
export function kernelPieces(graph: Graph, weights: Float64Array): KernelPiece[] {
  const { value, doubledCosts } = halfIntegralKernel(graph, weights, new Meter());
  const half = value.map((x) => x === 1 ? 1 : 0);
  return componentSubgraphs(graph, half).map(({ graph, vertices, edges }) => ({
    graph,
    weights: Float64Array.from(vertices, (v) => weights[v]),
    labels: vertices,
    doubledCosts: Float64Array.from(edges, (e) => doubledCosts[e]),
  }));
}
