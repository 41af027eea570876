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

/** Proves that nothing better exists: parts whose bounds add up to the weight reached. */
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

/** Some of the vertices, with a bound for what can be chosen among them. */
export interface CertificatePart {
  readonly vertices: Numbers;
  /** What the proof proves for this part, in scaled units. */
  readonly bound: number;
  readonly proof: Proof;
}

/** A proof, told apart by its `rule`. */
export type Proof = PackingProof | CasesProof | BlocksProof | ProjectiveProof;

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

/**
 * Bipartite blocks replaced by gadgets, and proofs for what is left. With slack y = 1 - Mx >= 0 and
 * doubled edge costs c,
 *
 *     2·w(stable set within S) <= Σ_{v in S} max(0, 2w(v) - (Mᵀc)(v)) + c(E) - c·y.
 *
 * A block is a set of vertices whose neighbours outside are at most three attachments. A gadget may
 * stand for it if in each state of the attachments that can occur its least slack cost is at most
 * that of the block; then the least slack cost of the whole does not rise. In the end graph, with
 * edges E* and costs c*, each vertex weighs the sum of the costs at it, so that its heaviest stable
 * set weighs c*(E*) less the least slack cost; if the parts prove at most B for it, then
 *
 *     2·w(stable set within S) <= Σ_{v in S} max(0, 2w(v) - (Mᵀc)(v)) + c(E) - c*(E*) + B,
 *
 * and half of that is rounded down.
 *
 * Vertices are numbered anew: 0 … k-1 are the k vertices of S in increasing order, and k, k+1, … the
 * vertices of the gadgets, block after block. All edges inside S are edges, those not listed with
 * cost 0.
 */
export interface BlocksProof {
  readonly rule: "blocks";
  /** Length 2j: the ends of each edge with a cost, in the new numbers. */
  readonly ends: Numbers;
  /** Length j: the doubled costs, integers >= 0. */
  readonly doubled: Numbers;
  /** One after another, each in the graph that those before it leave. */
  readonly blocks: readonly BlockReplacement[];
  /**
   * Vertices of the end graph, at least all of positive weight, in the order in which the parts
   * number them 0, 1, …; absent where the parts use the numbers of this proof.
   */
  readonly order?: Numbers;
  /**
   * Disjoint parts of the end graph that hold all its vertices of positive weight, each with a bound
   * in the weights of the end graph, which are sums of doubled costs. At most 16 proofs of this rule
   * stand in one another.
   */
  readonly parts: readonly CertificatePart[];
}

/** One block and the gadget that stands for it; all vertices in the numbers of the proof. */
export interface BlockReplacement {
  /** The vertices that leave; they must induce a bipartite graph. */
  readonly inside: Numbers;
  /** At most three; all neighbours of the inside are inside or among them. */
  readonly attachments: Numbers;
  /** Number of new vertices, at most five. */
  readonly vertices: number;
  /**
   * Length 2j: the ends of the gadget's edges, each an attachment or one of its new vertices. An edge
   * between two attachments must be there already; its cost is added.
   */
  readonly ends: Numbers;
  /** Length j: their doubled costs, integers >= 0. */
  readonly doubled: Numbers;
}

/**
 * An embedding in the projective plane with all faces even, and a one-sided walk through its faces: how
 * far these are from their antipodes bounds the slack of every stable set. `certify/projective.ts` says
 * why this proves a bound.
 *
 * H is the graph on the vertices of the part. Its vertices are taken in increasing order, and the
 * *darts* out of each to its neighbours inside the part in increasing order: 2m darts in all.
 */
export interface ProjectiveProof {
  readonly rule: "projective";
  /** What `costs` and `distance` are multiplied by, an integer >= 1. */
  readonly unit: number;
  /**
   * Length m, edges in order of their first dart: doubled costs c in units, integers >= 0, with
   * unit·Mᵀc = 2w at every vertex.
   */
  readonly costs: Numbers;
  /**
   * Length 2m: for each vertex in turn, its darts counterclockwise, each as its number (from 0) among
   * the darts of this vertex. On the other sheet of the double cover the rotation is the mirror image.
   */
  readonly rotation: Numbers;
  /**
   * A closed one-sided walk from face to face: for each face a dart that has it on the left when lifted
   * to sheet 0. Consecutive faces share an edge, and so do the last one and the antipode of the first.
   */
  readonly sources: Numbers;
  /** The cost of a least one-sided directed cycle of the dual, in units. */
  readonly distance: number;
}
