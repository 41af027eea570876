/**
 * Even-face embeddings by trying every rotation system, each edge twisted: the slow obvious version
 * of lib/parity/even-face.ts.
 */
import { signedEulerGenus } from "../../lib/graph/embedding.ts";
import type { Graph } from "../../lib/graph/graph.ts";

/** Number of rotation systems of a graph: the product of (degree - 1)!. */
export function rotationSystemCount(graph: Graph): number {
  let count = 1;
  for (let v = 0; v < graph.n; v++) {
    for (let k = graph.offsets[v + 1] - graph.offsets[v] - 1; k > 1; k--) count *= k;
  }
  return count;
}

/**
 * Whether a connected graph has an embedding in the projective plane in which exactly the odd cycles
 * are one-sided.
 *
 * @param graph a connected graph with few rotation systems
 */
export function hasEvenFaceEmbedding(graph: Graph): boolean {
  const { n, m } = graph;
  const twisted = new Uint8Array(m).fill(1);
  const next = new Int32Array(2 * m);
  const around: number[][] = Array.from({ length: n }, () => []);
  for (let e = 0; e < m; e++) {
    around[graph.tails[e]].push(2 * e);
    around[graph.heads[e]].push(2 * e + 1);
  }
  const place = (v: number): boolean => {
    if (v === n) return signedEulerGenus(graph, { next, twisted }) === 1;
    const [first, ...others] = around[v];
    if (first === undefined) return place(v + 1);
    const order = [first];
    const extend = (left: number[]): boolean => {
      if (left.length === 0) {
        order.forEach((d, i) => next[d] = order[(i + 1) % order.length]);
        return place(v + 1);
      }
      for (const d of left) {
        order.push(d);
        if (extend(left.filter((x) => x !== d))) return true;
        order.pop();
      }
      return false;
    };
    return extend(others);
  };
  return place(0);
}
