/**
 * Gadgets: nothing, an edge, a path or a star that costs exactly what a bipartite block costs in
 * every state of its attachments. O(1) time for a table.
 *
 * Rules, with f the table of the block (gadgets-table.ts):
 *
 * - An attachment i with f({i}) = f(S - i) = 0 is free: by submodularity f does not depend on it,
 *   and it is left out.
 * - Nothing is put where at most one attachment is left.
 * - Two attachments are joined by a path of length 2 (same side) or 3 (opposite sides), with
 *   directed costs f({a}) and f({b}). Where they are joined by an edge already and on opposite
 *   sides, the state "both chosen" cannot occur and the other cost is added to that edge.
 * - Three attachments are joined by a star with a centre and three legs, each a path of length 2 or
 *   3; leg i costs f({i}) when p is 1 at i and 0 at the centre, and f(S - i) when it is the other
 *   way round. By submodularity one slack leg always suffices.
 */

/** A gadget on the attachments of a block. */
export interface Gadget {
  readonly kind: "nothing" | "edge" | "path" | "star";
  /** Positions of the attachments it is joined to, in the block's list. */
  readonly ends: readonly number[];
  /** Number of new vertices: at most 5. */
  readonly vertices: number;
  /**
   * Ends of its edges, one pair after another: i < k is the block's i-th attachment, k + j the j-th
   * new vertex, k being the number of attachments.
   */
  readonly edges: readonly number[];
  /** Cost of each edge; zero costs keep their edge, which is still a conflict. */
  readonly costs: readonly number[];
}

const NOTHING: Gadget = { kind: "nothing", ends: [], vertices: 0, edges: [], costs: [] };

/**
 * The gadget for a table.
 *
 * @param table length 2^k, f by the bit mask of the attachments with p = 1
 * @param side the sides of the k attachments
 * @param joined whether two attachments, by position, are joined by an edge
 */
export function gadgetFor(
  table: ArrayLike<number>,
  side: ArrayLike<number>,
  joined: (i: number, j: number) => boolean,
): Gadget {
  const k = side.length, all = (1 << k) - 1;
  const ends: number[] = [];
  for (let i = 0; i < k; i++) {
    if (table[1 << i] !== 0 || table[all ^ (1 << i)] !== 0) ends.push(i);
  }
  if (ends.length < 2) return NOTHING;
  // With one attachment free, f({a}) may be read off with the free one at either value.
  const first = ends.map((i) => table[1 << i]);
  if (ends.length === 2) {
    const [a, b] = ends;
    if (side[a] !== side[b] && joined(a, b)) {
      // p = 1 at the end on side 1 and 0 at the end on side 0 means that neither is chosen.
      const cost = side[a] === 1 ? first[0] : first[1];
      if (cost === 0) return NOTHING;
      return { kind: "edge", ends, vertices: 0, edges: [a, b], costs: [cost] };
    }
    const builder = new Builder(k);
    builder.leg(a, side[a], b, side[b], first[0], first[1]);
    return builder.gadget("path", ends);
  }
  const builder = new Builder(k);
  const centreSide = side[0] + side[1] + side[2] >= 2 ? 1 : 0;
  const centre = builder.vertex();
  for (let i = 0; i < 3; i++) {
    builder.leg(i, side[i], centre, centreSide, first[i], table[all ^ (1 << i)]);
  }
  return builder.gadget("star", ends);
}

/** How many vertices the full gadget on attachments with these sides has. */
export function gadgetSize(side: ArrayLike<number>): number {
  if (side.length < 2) return 0;
  if (side.length === 2) return side[0] === side[1] ? 1 : 2;
  return side[0] === side[1] && side[1] === side[2] ? 4 : 5;
}

class Builder {
  #vertices = 0;
  readonly #edges: number[] = [];
  readonly #costs: number[] = [];
  constructor(readonly attachments: number) {}

  vertex(): number {
    return this.attachments + this.#vertices++;
  }

  /** A path from t to m that costs `up` when p(t) = 1, p(m) = 0 and `down` the other way round. */
  leg(t: number, sideT: number, m: number, sideM: number, up: number, down: number): void {
    // Seen from side 0, an edge u-v has slack p(v) - p(u): it pays when p is 1 at its end on side 1.
    const [near, far] = sideT === 0 ? [down, up] : [up, down];
    if (sideT === sideM) {
      const s = this.vertex();
      this.#edge(t, s, near);
      this.#edge(s, m, far);
    } else {
      const s = this.vertex(), r = this.vertex();
      this.#edge(t, s, near);
      this.#edge(s, r, far);
      this.#edge(r, m, near);
    }
  }

  gadget(kind: Gadget["kind"], ends: readonly number[]): Gadget {
    return { kind, ends, vertices: this.#vertices, edges: this.#edges, costs: this.#costs };
  }

  #edge(u: number, v: number, cost: number): void {
    this.#edges.push(u, v);
    this.#costs.push(cost);
  }
}
