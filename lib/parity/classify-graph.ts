/**
 * The class of a connected graph by its odd cycles: what it is, the numbers, and the witnesses. The
 * cheap answers come first: two sides, an even-face embedding, two disjoint odd cycles; then the odd
 * cycle transversal, which can take long where it is large and no packing proves it.
 */
import type { Graph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import { embeddedTransversal } from "./embedded-transversal.ts";
import { evenFaceEmbedding } from "./even-face.ts";
import type { EvenFaceEmbedding } from "./even-face-result.ts";
import { type OddCyclePacking, oddCyclePacking } from "./odd-cycle-packing.ts";
import { EXACT_UP_TO, leastTransversal, type Transversal } from "./transversal.ts";

/**
 * - `bipartite`: no odd cycle.
 * - `projective`: no two disjoint odd cycles, and so far from bipartite that only an even-face
 *   embedding in the projective plane can explain it: the graph has one and needs at least three
 *   vertices to be made bipartite, or it has one once its bipartite blocks are replaced and needs at
 *   least four.
 * - `near-bipartite`: otherwise, a transversal of at most twelve vertices.
 * - `general`: everything else, and whatever the run did not settle.
 */
export type GraphKind = "bipartite" | "near-bipartite" | "projective" | "general";

/** What is known of a connected graph. */
export interface GraphClass {
  readonly kind: GraphKind;
  /** Length n, entries 0 and 1: the sides, if it is bipartite. */
  readonly side?: Uint8Array;
  readonly transversal: Transversal;
  readonly packing: OddCyclePacking;
  /** Whether the graph as it is has an even-face embedding in the projective plane. */
  readonly evenFace: "yes" | "no" | "unknown";
  /** The embedding, if there is one. */
  readonly embedding?: EvenFaceEmbedding;
}

/** Work spent on a transversal when it is not known whether it has at most twelve vertices. */
const UNSURE_WORK = 5e8;

/**
 * Classifies a connected graph.
 *
 * @param graph a connected graph, all edges odd
 * @param meter counts about one unit for each arc scanned; when it runs out, what is known returns
 * @returns the class with its witnesses. Where it is not clear that the transversal has at most
 *   twelve vertices, at most 5·10^8 units of work are spent on it.
 */
export function classifyGraph(graph: Graph, meter: Meter): GraphClass {
  const { side } = twoColouring(graph);
  const none = { lower: 0, upper: 0, cycles: [] };
  if (side !== undefined) {
    return {
      kind: "bipartite",
      side,
      transversal: { ...none, vertices: new Int32Array(0) },
      packing: { ...none, because: "there is no odd cycle" },
      evenFace: "no",
    };
  }
  let evenFace: GraphClass["evenFace"] = "unknown";
  try {
    const found = evenFaceEmbedding(graph, meter, { witness: false });
    evenFace = found.kind === "embedded" ? "yes" : "no";
    if (found.kind === "embedded") {
      const transversal = embeddedTransversal(found, meter);
      return {
        kind: transversal.lower >= 3 ? "projective" : kindOf(transversal, undefined),
        transversal,
        packing: {
          lower: 1,
          upper: 1,
          cycles: transversal.cycles,
          because: "it has an even-face embedding in the projective plane",
        },
        evenFace,
        embedding: found,
      };
    }
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
  }
  const quick = leastTransversal(graph, meter, { limit: 3 });
  const packing = oddCyclePacking(graph, meter, quick);
  const transversal = closer(graph, raised(quick, packing, meter), meter);
  return {
    kind: kindOf(transversal, packing),
    transversal,
    packing: tightened(packing, transversal),
    evenFace,
  };
}

/** The packing's bounds with what a later transversal adds. */
function tightened(found: OddCyclePacking, transversal: Transversal): OddCyclePacking {
  const { embedded: _, ...packing } = found;
  const { cycles, upper } = transversal;
  const better = packing.lower < cycles.length
    ? { ...packing, lower: cycles.length, cycles }
    : packing;
  if (better.lower < upper) return { ...better, upper: Math.min(better.upper, upper) };
  return {
    ...better,
    upper,
    because: "as many items meet all odd cycles as there are disjoint ones",
  };
}

function kindOf(transversal: Transversal, packing: OddCyclePacking | undefined): GraphKind {
  if (packing?.upper === 1 && transversal.lower > 3) return "projective";
  return transversal.upper <= EXACT_UP_TO ? "near-bipartite" : "general";
}

/** The transversal with the lower bound that an embedding after the replacement of blocks gives. */
function raised(quick: Transversal, packing: OddCyclePacking, meter: Meter): Transversal {
  if (packing.embedded === undefined) return quick;
  const { lower } = embeddedTransversal(packing.embedded, meter);
  const { stopped, ...bounds } = { ...quick, lower: Math.max(quick.lower, lower) };
  return stopped === undefined || bounds.lower === bounds.upper ? bounds : { ...bounds, stopped };
}

/** The transversal, exact where it has at most twelve vertices. */
function closer(graph: Graph, quick: Transversal, meter: Meter): Transversal {
  if (quick.lower === quick.upper || quick.lower > EXACT_UP_TO) return quick;
  const purse = quick.upper <= EXACT_UP_TO ? meter : meter.within(UNSURE_WORK);
  const exact = leastTransversal(graph, purse);
  if (quick.upper < exact.upper) return { ...quick, lower: Math.max(quick.lower, exact.lower) };
  return exact.lower < quick.lower ? { ...exact, lower: quick.lower } : exact;
}
