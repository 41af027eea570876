/**
 * Two disjoint odd cycles as a witness. First a quick look (parity/odd-cycle-glimpse.ts); where that
 * finds none although two exist, edges are deleted as long as two still exist
 * (parity/disjoint-odd-cycles.ts), and what remains is two cycles.
 */
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";
import { twoDisjointOddCycles } from "./disjoint-odd-cycles.ts";
import { glimpseOddCyclePair, type OddCyclePair } from "./odd-cycle-glimpse.ts";

/**
 * Finds two disjoint odd cycles in a graph that has them.
 *
 * @param graph a graph for which `twoDisjointOddCycles` answers yes
 * @param hints vertices to look at first
 * @returns two disjoint odd cycles. Beyond the quick look, O(k log m) decisions for cycles of k
 *   edges together.
 * @throws {Interrupted} when the meter runs out
 */
export function oddCyclePair(
  graph: Graph,
  meter: Meter,
  hints: ArrayLike<number> = [],
): OddCyclePair {
  let edges = Int32Array.from({ length: graph.m }, (_, e) => e);
  let pair = glimpseOddCyclePair(graph, meter, hints);
  for (let chunk = Math.ceil(edges.length / 2); pair === undefined; chunk = Math.ceil(chunk / 2)) {
    for (let at = 0; pair === undefined && at < edges.length;) {
      const fewer = new Int32Array(edges.length - Math.min(chunk, edges.length - at));
      fewer.set(edges.subarray(0, at));
      fewer.set(edges.subarray(Math.min(edges.length, at + chunk)), at);
      const part = withEdges(graph, fewer);
      if (twoDisjointOddCycles(part, meter).exist === true) {
        edges = fewer;
        pair = glimpseOddCyclePair(part, meter, hints);
      } else at += chunk;
    }
    if (chunk === 1 && pair === undefined) {
      throw new Error("no two disjoint odd cycles are left, although no edge could be deleted");
    }
  }
  return pair;
}

function withEdges(graph: Graph, edges: Int32Array): Graph {
  return graphFromEdges(
    graph.n,
    edges.map((e) => graph.tails[e]),
    edges.map((e) => graph.heads[e]),
  );
}
