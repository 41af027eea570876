/** What the recognition of even-face embeddings answers: the embedding, or why there is none. */
import type { Graph } from "../graph/graph.ts";
import type { Kuratowski } from "../graph/kuratowski.ts";

/**
 * An embedding of H in the projective plane with all faces even. Its edge signature is "every edge
 * twisted": a cycle is one-sided exactly if it is odd. Verified when it is returned. Its lift to the
 * sphere, `liftedEmbedding` of parity/double-cover.ts, embeds the double cover.
 */
export interface EvenFaceEmbedding {
  readonly kind: "embedded";
  /** H itself. */
  readonly graph: Graph;
  /** Length 2m: the rotation system of H, counterclockwise on sheet 0 (see graph/embedding.ts). */
  readonly next: Int32Array;
}

/** Why there is no even-face embedding. Every reason is a proof. */
export type NoEvenFaceReason =
  /** H is not connected. */
  | "not connected"
  /** H is bipartite. */
  | "bipartite"
  /** Two blocks hold odd cycles, and no vertex meets all of them: two odd cycles are disjoint. */
  | "odd cycles in separate blocks"
  /** The cover is not planar; `kuratowski` is a subdivision in it. */
  | "cover not planar"
  /**
   * The cover is planar, no vertex meets all odd cycles, and swapping the sheets keeps orientation
   * on the 3-connected piece in the middle, whose embedding is unique up to reflection.
   */
  | "orientation kept";

/** The answer "no", always proved. */
export interface NoEvenFace {
  readonly kind: "no";
  readonly reason: NoEvenFaceReason;
  /** A Kuratowski subdivision in the double cover, when the cover is not planar and it was asked. */
  readonly kuratowski?: Kuratowski;
}

/** The embedding, or the proof that there is none. */
export type EvenFaceResult = EvenFaceEmbedding | NoEvenFace;
