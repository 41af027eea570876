/**
 * Certificates as plain data. A certificate speaks of the original instance: its items are split
 * into parts, each with a proof of an upper bound for the worth of a conflict-free choice inside
 * that part; the bounds add up to the weight reached, so nothing better exists.
 *
 * Vertices are numbered by the instance's canonical order (ids sorted by UTF-16 code units), so a
 * certificate does not depend on the order of the rows. Weights and multipliers are integers: the
 * instance's scaled weights, and *doubled* multipliers, since the half-integral relaxation has halves.
 *
 * Notation of the proofs: S is the set of vertices still in play, w their weight. A *term* is an
 * inequality that holds for every stable set: a clique K (an edge is a clique of two) has
 * Σ x(K) <= 1, an odd cycle C has Σ x(C) <= (|C| - 1) / 2. Where vertices have already been chosen
 * by the cases above, what is left of a right-hand side is rhs' = rhs - (chosen vertices in the
 * term), since the chosen vertices and the rest are one stable set together. Multipliers λ >= 0
 * prove
 *
 *     w(stable set within S) <= Σ_terms λ·rhs' + Σ_{v in S} max(0, w(v) - Σ_{terms with v} λ).
 *
 * The weight of the chosen vertices is added on the way up. Below a `split` all multipliers begin at
 * zero, and rhs' still counts every vertex chosen above.
 */

/** A list of numbers: typed while it is computed, a plain array once read from JSON. */
export type Numbers = readonly number[] | Int32Array | Float64Array;

export interface Certificate {
  readonly kind: "certificate";
  readonly version: 1;
  /** Fingerprint of the instance the certificate speaks of. */
  readonly fingerprint: string;
  /** Vertices the question required to be chosen, and to be left. Mostly empty. */
  readonly choose: Numbers;
  readonly leave: Numbers;
  /** What the bounds add up to, in scaled units. */
  readonly bound: number;
  /**
   * A partition of the vertices that are neither chosen or left by the question nor in conflict with
   * a chosen one.
   */
  readonly parts: readonly CertificatePart[];
}

export interface CertificatePart {
  readonly vertices: Numbers;
  /** What the proof proves for this part, in scaled units. */
  readonly bound: number;
  readonly proof: Proof;
}

export type Proof = PackingProof | CasesProof;

/**
 * A fractional packing of edges: one sum, rounded down. Proves w(S) - c(S) for Mᵀc <= w, and more
 * generally the bound above with edges as the only terms.
 */
export interface PackingProof {
  readonly rule: "packing";
  /** Length 2k: the ends of each edge used, one pair after another. */
  readonly ends: Numbers;
  /** Length k: the doubled multiplier of each edge, an integer >= 0. */
  readonly doubled: Numbers;
}

/**
 * A tree of cases, each leaf closed by terms. The nodes stand in preorder. Multipliers are set at a
 * node and hold below it until they are set again; the bound of a leaf is rounded down.
 */
export interface CasesProof {
  readonly rule: "cases";
  /** What the integers in `set` are divided by, an integer >= 1; 2 (doubled multipliers) if absent. */
  readonly denominator?: number;
  /** Cliques used as terms; term t < cliques.length. */
  readonly cliques: readonly Numbers[];
  /** Odd cycles used as terms, vertices in order; term cliques.length + t. */
  readonly oddCycles: readonly Numbers[];
  readonly nodes: readonly CaseNode[];
}

/**
 * One node of a tree of cases. Without `on` and `split` it is a leaf.
 *
 * - `on: v`: two children. First v is chosen (v and its neighbours leave S, w(v) is added), then v
 *   is left (v leaves S). The bound is the larger of the two.
 * - `split: [A, B, …]`: a partition of S; one child for each set, in order, each beginning with all
 *   multipliers at zero. The bound is the sum.
 */
export interface CaseNode {
  /** Pairs (term, multiplier times the denominator), one after another: what changes here. */
  readonly set?: Numbers;
  readonly on?: number;
  readonly split?: readonly Numbers[];
}
