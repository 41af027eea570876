/** The chains of a graph: longest paths whose inner vertices have degree two. O(n + m) time. */
import type { Meter } from "../run/meter.ts";
import { degree, type Graph } from "./graph.ts";

/** A path between two different vertices that are not of degree two. */
export interface Chain {
  /** The two ends, the lesser first. */
  readonly ends: readonly [number, number];
  /** The inner vertices, from the first end to the second; all of degree two. */
  readonly inside: Int32Array;
}

/**
 * Lists the chains with at least one inner vertex.
 *
 * @param graph any simple graph
 * @returns the chains; cycles with at most one vertex of another degree are not chains
 */
export function chains(graph: Graph, meter: Meter): Chain[] {
  const { n, offsets, targets } = graph;
  const visited = new Uint8Array(n);
  const list: Chain[] = [];
  for (let root = 0; root < n; root++) {
    meter.tick(1);
    if (degree(graph, root) === 2) continue;
    for (let a = offsets[root]; a < offsets[root + 1]; a++) {
      let before = root, v = targets[a];
      if (degree(graph, v) !== 2 || visited[v] !== 0) continue;
      const inside: number[] = [];
      while (degree(graph, v) === 2) {
        visited[v] = 1;
        inside.push(v);
        const next = targets[offsets[v]] === before ? targets[offsets[v] + 1] : targets[offsets[v]];
        before = v;
        v = next;
      }
      meter.tick(inside.length);
      if (v === root) continue;
      if (v < root) list.push({ ends: [v, root], inside: Int32Array.from(inside.reverse()) });
      else list.push({ ends: [root, v], inside: Int32Array.from(inside) });
    }
  }
  return list;
}
