/**
 * Decides whether a graph has two vertex-disjoint odd cycles, whatever its size. With its odd kernel
 * connected and k the size of a least odd cycle transversal X of it:
 *
 * - k = 0 and k = 1: no.
 * - k = 2, 3: two disjoint odd cycles through X are two disjoint paths between colour classes of the
 *   rest (parity/linkage.ts). With k = 3 each of the two cycles has, in any colouring of the rest and
 *   of the vertex of X that is no end of the question, exactly one vertex whose two neighbours on it
 *   do not agree; so it suffices to colour one vertex of X, in each of the two ways, without its
 *   edges to its own colour.
 * - k >= 4: no, exactly if there is an even-face embedding in the projective plane once every side
 *   that at most three vertices cut off is replaced by an edge between them, or a star, with edges
 *   of the right parity (two disjoint odd cycles theorem, attributed to Lovász; K. Kawarabayashi and K. Ozeki, "A simpler proof for
 *   the two disjoint odd cycles theorem", J. Combin. Theory B 103, 2013).
 *
 * Near-linear in practice.
 */
import { componentSubgraphs } from "../graph/components.ts";
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import { type Separations, separations } from "../graph/separations.ts";
import type { Meter } from "../run/meter.ts";
import { balance } from "./balance.ts";
import { evenFaceEmbedding } from "./even-face.ts";
import type { EvenFaceEmbedding } from "./even-face-result.ts";
import { linked } from "./linkage.ts";
import { glimpseOddCyclePair, LOOK_SCANS } from "./odd-cycle-glimpse.ts";
import { allOdd, type OddKernel, oddKernel } from "./odd-kernel.ts";
import { withoutSides } from "./replace-sides.ts";
import { transversalWithin } from "./transversal.ts";

/** The answer and what settled it. */
export interface TwoDisjoint {
  /** Whether there are two disjoint odd cycles; undefined where a search ended undecided. */
  readonly exist: boolean | undefined;
  /** Completes "…, because". */
  readonly because: string;
  /**
   * Where an even-face embedding settled it: no transversal has fewer vertices than a least one of
   * this graph.
   */
  readonly embedded?: EvenFaceEmbedding;
}

/** What the decision may be told. */
export interface TwoDisjointOptions {
  /** Whether to look for two such cycles before the theorem is called upon (default true). */
  readonly look?: boolean;
}

/**
 * Decides whether two odd cycles without a common vertex exist.
 *
 * @param graph any graph, all edges odd
 * @param meter counts about one unit for each arc scanned
 * @param options whether to look for two before anything is proved
 * @returns the answer; undecided only where graph/separations.ts ends at its own limit of work again
 *   and again without a step forward, which no graph met so far has done
 * @throws {Interrupted} when the meter runs out
 */
export function twoDisjointOddCycles(
  graph: Graph,
  meter: Meter,
  options: TwoDisjointOptions = {},
): TwoDisjoint {
  const kernel = oddKernel(graph, meter);
  const parts = componentSubgraphs(kernel.graph);
  const odd = parts.filter(({ graph, edges }) => {
    meter.tick(graph.n + 2 * graph.m);
    return balance(graph, evenOf(kernel, edges)).side === undefined;
  });
  if (kernel.forced.length + odd.length >= 2) {
    return { exist: true, because: "odd cycles lie in separate parts" };
  }
  if (odd.length === 0) {
    const because = kernel.forced.length === 0
      ? "there is no odd cycle"
      : "one item meets all odd cycles";
    return { exist: false, because };
  }
  return inKernel(odd[0].graph, evenOf(kernel, odd[0].edges), options.look ?? true, meter);
}

function evenOf(kernel: OddKernel, edges: Int32Array): Uint8Array {
  return Uint8Array.from(edges, (e) => kernel.even[e]);
}

/** The same in a component of an odd kernel that has an odd cycle. */
function inKernel(graph: Graph, even: Uint8Array, look: boolean, meter: Meter): TwoDisjoint {
  const { lower, best, cycles } = transversalWithin(graph, even, 3, meter);
  if (look && cycles.length >= 2) return { exist: true, because: "two were found" };
  if (best.length === 1) return { exist: false, because: "one item meets all odd cycles" };
  if (lower > 3) return beyondThree(graph, even, look, meter);
  const exist = throughTransversal(graph, even, best, meter);
  const because = `${best.length} items meet all odd cycles, and ` +
    `${exist ? "" : "no "}two disjoint paths join the colour classes of the rest in the right way`;
  return { exist, because };
}

/** The question for a transversal of two or three vertices. */
function throughTransversal(
  graph: Graph,
  even: Uint8Array,
  X: readonly number[],
  meter: Meter,
): boolean {
  const keep = new Uint8Array(graph.n).fill(1);
  for (const x of X) keep[x] = 0;
  const { side } = balance(graph, even, keep);
  if (side === undefined) throw new Error("expected a transversal");
  if (X.length === 2) return throughTwo(graph, even, side, X[0], X[1], meter);
  for (const y of X) {
    const [x, z] = X.filter((v) => v !== y);
    for (const colour of [0, 1]) {
      side[y] = colour;
      if (throughTwo(graph, even, side, x, z, meter)) return true;
    }
    side[y] = 2;
  }
  return false;
}

/**
 * Whether an odd cycle through x and one through z are disjoint, using only edges that agree with
 * the sides of their ends beside those at x and z.
 *
 * @param side length n: 0 or 1; anything at x and z
 */
function throughTwo(
  graph: Graph,
  even: Uint8Array,
  side: Uint8Array,
  x: number,
  z: number,
  meter: Meter,
): boolean {
  const { n, m } = graph;
  meter.tick(m);
  const tails: number[] = [], heads: number[] = [];
  // x is cut in two, x itself and n: an odd cycle through x is a path between the halves.
  for (let e = 0; e < m; e++) {
    const u = graph.tails[e], v = graph.heads[e], odd = even[e] === 0 ? 1 : 0;
    const cut = u === x || u === z ? u : v === x || v === z ? v : -1;
    const other = cut === u ? v : u;
    if (cut < 0) {
      if ((side[u] ^ side[v]) !== odd) continue;
      tails.push(u);
      heads.push(v);
    } else if (other !== x && other !== z) {
      const half = (side[other] ^ odd) === 0 ? cut : cut === x ? n : n + 1;
      tails.push(half);
      heads.push(other);
    }
  }
  const halved = graphFromEdges(n + 2, Int32Array.from(tails), Int32Array.from(heads));
  return linked(halved, [x, n, z, n + 1], meter);
}

/** The question for graphs that need four vertices or more to be made bipartite. */
function beyondThree(
  start: Graph,
  startEven: Uint8Array,
  look: boolean,
  meter: Meter,
): TwoDisjoint {
  let graph = allOdd(start, startEven);
  for (let replaced = false;; replaced = true) {
    const embedding = evenFaceEmbedding(graph, meter, { witness: false });
    if (embedding.kind === "embedded") {
      const because = replaced
        ? "it has an even-face embedding in the projective plane once its blocks are replaced"
        : "it has an even-face embedding in the projective plane";
      return { exist: false, because, embedded: embedding };
    }
    if (look && !replaced && glimpseOddCyclePair(graph, meter, [], LOOK_SCANS / 10) !== undefined) {
      return { exist: true, because: "two were found" };
    }
    const found = allSides(graph, meter);
    if (found.twisted > 0) {
      return { exist: true, because: "three items leave two parts with odd cycles" };
    }
    const next = withoutSides(graph, found, meter);
    if (next === "apart") return { exist: true, because: "odd cycles lie in separate parts" };
    if (next === "none") {
      if (found.complete) break;
      return { exist: undefined, because: "the search for sides ended before all were found" };
    }
    graph = next;
  }
  return {
    exist: true,
    because: "four items or more meet all odd cycles, and there is no even-face embedding",
  };
}

/** The sides of a graph; where one search ends early, the next goes on from what it proved. */
function allSides(graph: Graph, meter: Meter): Separations {
  let found = separations(graph, meter);
  for (let before = -1; !found.complete && found.sides.length === 0 && found.twisted === 0;) {
    const proven = found.proven.reduce((sum, v) => sum + v, 0);
    if (proven <= before) break;
    before = proven;
    found = separations(graph, meter, { known: found.proven });
  }
  return found;
}
