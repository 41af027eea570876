/**
 * The signed double cover: each vertex v becomes (v,0) and (v,1); an odd edge joins opposite sheets
 * and an even edge stays on its sheet. With all edges odd this is the bipartite double cover H × K₂.
 * A closed walk lifts to a closed walk exactly if its number of odd edges is even. Linear time.
 *
 * Numbering: vertex (v,s) is 2v + s. Edge e has the copies 2e + s, s its sheet at tails[e]; copy
 * 2e + s runs from (tails[e], s) to (heads[e], s) if e is even and to (heads[e], 1 - s) if it is
 * odd. Swapping the sheets therefore maps vertex x to x ^ 1, edge c to c ^ 1 and dart d to d ^ 2.
 */
import { type Graph, graphFromEdges } from "../graph/graph.ts";

/**
 * Builds the double cover.
 *
 * @param graph the graph H with n vertices and m edges
 * @param even length m, nonzero where an edge keeps the sheet; absent: every edge is odd
 * @returns the cover, 2n vertices and 2m edges, numbered as said at the top of this file
 */
export function doubleCover(graph: Graph, even?: Uint8Array): Graph {
  const { n, m } = graph;
  const tails = new Int32Array(2 * m), heads = new Int32Array(2 * m);
  for (let e = 0; e < m; e++) {
    const odd = even !== undefined && even[e] !== 0 ? 0 : 1;
    tails[2 * e] = 2 * graph.tails[e];
    tails[2 * e + 1] = 2 * graph.tails[e] + 1;
    heads[2 * e] = 2 * graph.heads[e] + odd;
    heads[2 * e + 1] = 2 * graph.heads[e] + (1 - odd);
  }
  return graphFromEdges(2 * n, tails, heads);
}

/**
 * The lift of a dart to the sheet where it starts.
 *
 * @param d a dart of H
 * @param sheet 0 or 1: the sheet of the vertex where the lift starts
 * @param odd 1 if the edge of d is odd, 0 if it is even
 * @returns the dart of the cover
 */
export function liftDart(d: number, sheet: number, odd: number = 1): number {
  const back = d & 1;
  return ((d >> 1) << 2) | ((sheet ^ (back & odd)) << 1) | back;
}

/**
 * The rotation system of the cover on which swapping the sheets reverses orientation: around (v,0)
 * as around v, around (v,1) the mirror image.
 *
 * @param next length 2m, a rotation system of H
 * @param even length m as in `doubleCover`
 * @returns `coverNext`, length 4m, a rotation system of the cover
 */
export function liftRotation(next: Int32Array, even?: Uint8Array): Int32Array {
  const lifted = new Int32Array(2 * next.length);
  for (let d = 0; d < next.length; d++) {
    const e = next[d];
    const oddD = even !== undefined && even[d >> 1] !== 0 ? 0 : 1;
    const oddE = even !== undefined && even[e >> 1] !== 0 ? 0 : 1;
    lifted[liftDart(d, 0, oddD)] = liftDart(e, 0, oddE);
    lifted[liftDart(e, 1, oddE)] = liftDart(d, 1, oddD);
  }
  return lifted;
}

/**
 * The lift of an embedding in which every edge is twisted: for an even-face embedding in the projective
 * plane, the double cover in the sphere. Swapping the sheets (vertex x ^ 1, edge c ^ 1, dart d ^ 2)
 * reverses it.
 *
 * @param embedding H and its rotation system, length 2m
 * @returns the bipartite double cover of H and its rotation system, length 4m. O(n + m) time.
 */
export function liftedEmbedding(
  { graph, next }: { readonly graph: Graph; readonly next: Int32Array },
): { cover: Graph; coverNext: Int32Array } {
  return { cover: doubleCover(graph), coverNext: liftRotation(next) };
}
