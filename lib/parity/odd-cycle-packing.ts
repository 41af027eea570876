/**
 * Odd cycle packing numbers: how many vertex-disjoint odd cycles a graph has at most. Whether it is
 * 0, 1 or at least 2 is decided exactly for every graph; beyond, the answer is an interval between a
 * packing and a transversal.
 */
import { components } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import { type TwoDisjoint, twoDisjointOddCycles } from "./disjoint-odd-cycles.ts";
import { oddCyclePair } from "./odd-cycle-pair.ts";
import { leastTransversal, type Transversal } from "./transversal.ts";

/** The odd cycle packing number between two bounds. */
export interface OddCyclePacking {
  /** So many disjoint odd cycles exist. */
  readonly lower: number;
  /** No more exist. */
  readonly upper: number;
  /** Vertex-disjoint odd cycles, vertices in order; `lower` of them unless the run was ended early. */
  readonly cycles: readonly Int32Array[];
  /** What settled the bounds; completes "…, because". */
  readonly because: string;
  /**
   * Where an even-face embedding after the replacement of blocks settled it: no odd cycle transversal
   * has fewer vertices than a least one of this embedded graph.
   */
  readonly embedded?: TwoDisjoint["embedded"];
  /** Why the run ended before 0, 1 or at least 2 was decided, or before two cycles were found. */
  readonly stopped?: "time" | "stop" | "work";
}

/**
 * Bounds the odd cycle packing number of a connected graph; exact where it is 0 or 1.
 *
 * @param graph a connected graph, all edges odd
 * @param meter counts about one unit for each arc scanned; when it runs out the bounds so far return
 * @param transversal what is known of its odd cycle transversals; found here if absent
 * @returns bounds, disjoint odd cycles, and what settled them
 * @throws {RangeError} for a graph that is not connected
 *
 * @example
 * ```ts
 * import { graphFromPairs } from "../graph/graph.ts";
 * import { Meter } from "../run/meter.ts";
 * import { oddCyclePacking } from "./odd-cycle-packing.ts";
 * const k4 = graphFromPairs(4, [[0, 1], [0, 2], [0, 3], [1, 2], [1, 3], [2, 3]]);
 * console.assert(oddCyclePacking(k4, new Meter()).upper === 1);
 * ```
 */
export function oddCyclePacking(
  graph: Graph,
  meter: Meter,
  transversal: Transversal = leastTransversal(graph, meter, { limit: 3 }),
): OddCyclePacking {
  if (components(graph).count > 1) throw new RangeError("expected a connected graph");
  const { cycles, upper, lower } = transversal;
  const found = { lower: cycles.length, upper, cycles };
  if (cycles.length === upper) {
    const because = upper === 0
      ? "there is no odd cycle"
      : "as many items meet all odd cycles as there are disjoint ones";
    return { ...found, because };
  }
  if (cycles.length >= 2) return { ...found, because: "disjoint odd cycles were found" };
  let answer: TwoDisjoint | undefined;
  try {
    answer = twoDisjointOddCycles(graph, meter);
    if (answer.exist === undefined) return { ...found, because: answer.because };
    if (!answer.exist) {
      const { because, embedded } = answer;
      return { ...found, upper: 1, because, ...(embedded !== undefined && { embedded }) };
    }
    const pair = oddCyclePair(graph, meter, transversal.vertices);
    return { ...found, lower: 2, cycles: pair, because: answer.because };
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    const stopped = error.reason;
    if (answer?.exist === true) {
      return { ...found, lower: 2, because: answer.because, stopped };
    }
    const because =
      `the run ended (${stopped}) before two disjoint odd cycles were found or excluded`;
    return { ...found, lower: Math.min(1, lower), because, stopped };
  }
}
