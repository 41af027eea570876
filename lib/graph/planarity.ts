/**
 * Planarity by the left-right test: a rotation system, or a Kuratowski subdivision. Deciding and
 * embedding take O(n + m) time and about 60 bytes an edge; no recursion, so deep graphs are fine.
 */
import type { Graph } from "./graph.ts";
import type { Kuratowski } from "./kuratowski.ts";
import { extractKuratowski } from "./kuratowski-extract.ts";
import { rotationFromSides } from "./planarity-embedding.ts";
import { orient } from "./planarity-orientation.ts";
import { decideSides } from "./planarity-test.ts";
import type { Meter } from "../run/meter.ts";

/** A planar embedding, or the reason why there is none. */
export type Planarity =
  | { readonly planar: true; readonly next: Int32Array }
  | { readonly planar: false; readonly kuratowski: Kuratowski };

/**
 * Embeds a graph in the plane, or answers that it is not planar without saying why.
 *
 * @param graph any graph, in any number of components, parallel edges allowed
 * @param meter counts about four units for each edge
 * @returns the rotation system `next` of graph/embedding.ts, length 2m; undefined if not planar
 * @throws {Interrupted} when the meter runs out
 *
 * O(n + m) time. Source: U. Brandes, "The left-right planarity test" (manuscript, 2009), after
 * H. de Fraysseix, P. Ossona de Mendez and P. Rosenstiehl, "Trémaux trees and planarity" (Int. J.
 * Found. Comput. Sci. 17, 2006); written from memory.
 */
export function planarRotation(graph: Graph, meter: Meter): Int32Array | undefined {
  const orientation = orient(graph, meter);
  const sides = decideSides(orientation, meter);
  return "met" in sides ? undefined : rotationFromSides(orientation, sides, meter);
}

/**
 * Embeds a graph in the plane, or shows a subdivision of K₅ or K₃,₃ in it.
 *
 * @param graph any graph, in any number of components, parallel edges allowed
 * @param meter counts about four units for each edge and run of the test
 * @returns the rotation system `next` of graph/embedding.ts, length 2m; or the subdivision, which
 *   `kuratowskiProblem` checks
 * @throws {Interrupted} when the meter runs out
 *
 * O(n + m) time for planar graphs. The subdivision is found by repeated tests of ever smaller
 * graphs: see `extractKuratowski`.
 *
 * @example
 * ```ts
 * import { graphFromPairs } from "./graph.ts";
 * import { planarity } from "./planarity.ts";
 * import { Meter } from "../run/meter.ts";
 * const square = graphFromPairs(4, [[0, 1], [1, 2], [2, 3], [3, 0]]);
 * console.assert(planarity(square, new Meter()).planar);
 * ```
 */
export function planarity(graph: Graph, meter: Meter): Planarity {
  const next = planarRotation(graph, meter);
  if (next !== undefined) return { planar: true, next };
  return { planar: false, kuratowski: extractKuratowski(graph, meter) };
}
