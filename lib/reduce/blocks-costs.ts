/** A graph whose slack has a price, and a bipartite block of it: what block replacement works on. */
import type { Graph } from "../graph/graph.ts";

/**
 * The edge space of a kernel component: among the stable sets, with slack y = 1 - Mx >= 0, one of
 * least cost c·y is wanted.
 */
export interface CostGraph {
  /** Simple. */
  readonly graph: Graph;
  /** Length m: integers >= 0, their sum below 2^53. Doubled costs where they come from a kernel. */
  readonly costs: Float64Array;
  /** Length n: a number for each vertex that it keeps through all replacements. */
  readonly ids: Int32Array;
  /** What the next new vertex is called; larger than all ids ever used. */
  readonly nextId: number;
}

/**
 * A bipartite block: vertices whose neighbours outside are at most three attachments, such that the
 * block with its attachments, but without the edges between them, is bipartite.
 */
export interface Block {
  /** Vertices inside; need not be connected. */
  readonly inside: Int32Array;
  /** Sides 0 and 1 of the inside. */
  readonly insideSide: Uint8Array;
  /** The neighbours outside, at most three. */
  readonly attachments: Int32Array;
  /** Sides of the attachments. */
  readonly attachmentSide: Uint8Array;
}
