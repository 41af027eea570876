/**
 * Even-face embeddings of a graph that becomes bipartite when one vertex v is deleted.
 *
 * Deleting the two lifts of v leaves two copies X and Y of the rest. Give v two stand-ins, one for
 * its neighbours on each side of the rest, and join them by an edge: the result is planar exactly if
 * there is an even-face embedding. One way, X with the two lifts of v is this graph, its edge running
 * through Y. The other way, X and the mirror image of X are glued at the two lifts. Linear time.
 */
import { mirrored } from "../graph/embedding.ts";
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import { planarRotation } from "../graph/planarity.ts";
import type { TwoColouring } from "../graph/two-colouring.ts";
import type { Meter } from "../run/meter.ts";

/**
 * Embeds a graph whose odd cycles all pass through one vertex.
 *
 * @param graph a connected graph that is not bipartite
 * @param v a vertex that meets all odd cycles
 * @param side length n: a two-colouring of the graph without v (the entry of v is not read)
 * @param meter counts about four units for each edge
 * @returns length 2m: a rotation system of the graph, every edge twisted, with all faces even, in the
 *   projective plane; or undefined: there is none
 */
export function embedThroughVertex(
  graph: Graph,
  v: number,
  side: NonNullable<TwoColouring["side"]>,
  meter: Meter,
): Int32Array | undefined {
  const { n, m } = graph;
  const tails = new Int32Array(m + 1), heads = new Int32Array(m + 1);
  const standIn = (u: number) => side[u] === 0 ? v : n;
  for (let e = 0; e < m; e++) {
    const a = graph.tails[e], b = graph.heads[e];
    tails[e] = a === v ? standIn(b) : a;
    heads[e] = b === v ? standIn(a) : b;
  }
  tails[m] = v;
  heads[m] = n;
  const planar = planarRotation(graphFromEdges(n + 1, tails, heads), meter);
  if (planar === undefined) return undefined;

  // X holds (v,0) with its neighbours of side 0, so side 0 lies on sheet 1 there and side 1 on
  // sheet 0; the rotation of H is that of sheet 0.
  const next = mirrored(planar).subarray(0, 2 * m);
  for (let d = 0; d < 2 * m; d++) {
    const u = (d & 1) === 0 ? tails[d >> 1] : heads[d >> 1];
    if (u !== v && u !== n && side[u] === 1) next[d] = planar[d];
  }
  // Around (v,0): the neighbours in X, then the mirror image of what (v,1) sees in X.
  const around: number[] = [];
  for (let d = planar[2 * m]; d !== 2 * m; d = planar[d]) around.push(d);
  const behind: number[] = [];
  for (let d = planar[2 * m + 1]; d !== 2 * m + 1; d = planar[d]) behind.push(d);
  around.push(...behind.reverse());
  for (let i = 0; i < around.length; i++) next[around[i]] = around[(i + 1) % around.length];
  return next;
}
