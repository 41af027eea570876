/** Reads the graph6 format of B. D. McKay's nauty, for graphs of at most 62 vertices. */
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";

/** The graph that a graph6 string describes. */
export function graphFromGraph6(text: string): Graph {
  const n = text.charCodeAt(0) - 63;
  const pairs: [number, number][] = [];
  let bit = 0;
  for (let v = 1; v < n; v++) {
    for (let u = 0; u < v; u++, bit++) {
      const six = text.charCodeAt(1 + Math.floor(bit / 6)) - 63;
      if ((six >> (5 - (bit % 6))) & 1) pairs.push([u, v]);
    }
  }
  return graphFromPairs(n, pairs);
}
