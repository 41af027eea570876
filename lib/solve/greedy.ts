/** A first choice and a first bound in one pass each: what is left when a run stops at once. */
import type { PackingProof } from "../certify/certificate.ts";
import type { Graph } from "../graph/graph.ts";

/** Classes of worth: eighths of a power of two, from 2^-64 to 2^64. */
const CLASSES = 1024;

/**
 * A maximal stable set, built by weight per closed neighbourhood, greatest first, up to the eighth
 * root of two; within that, and on ties, in order of number.
 *
 * @param graph any graph
 * @param weights length n, positive
 * @returns length n, entries 0 and 1. O(n + m) time: even a run that stops at once can afford it.
 */
export function greedyStableSet(graph: Graph, weights: Float64Array): Uint8Array {
  const { n, offsets, targets } = graph;
  const start = new Int32Array(CLASSES + 1), classOf = new Int16Array(n);
  for (let v = 0; v < n; v++) {
    const worth = weights[v] / (offsets[v + 1] - offsets[v] + 1);
    classOf[v] = CLASSES / 2 - Math.floor(8 * Math.log2(worth));
    start[classOf[v] + 1]++;
  }
  for (let c = 0; c < CLASSES; c++) start[c + 1] += start[c];
  const order = new Int32Array(n);
  for (let v = 0; v < n; v++) order[start[classOf[v]]++] = v;
  const chosen = new Uint8Array(n), blocked = new Uint8Array(n);
  for (const v of order) {
    if (blocked[v] !== 0) continue;
    chosen[v] = 1;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) blocked[targets[a]] = 1;
  }
  return chosen;
}

/**
 * A maximal packing of edges with its bound w(V) - c(E): each edge in turn takes what its ends have
 * left.
 *
 * @param graph any graph
 * @param weights length n, positive integers with a sum below 2^53
 * @param labels length n, the number of each vertex in the certificate
 * @returns the bound and its proof. O(n + m) time.
 */
export function greedyPacking(
  graph: Graph,
  weights: Float64Array,
  labels: Int32Array,
): { upperBound: number; proof: PackingProof } {
  const left = weights.slice();
  const ends: number[] = [], doubled: number[] = [];
  let upperBound = 0;
  for (let v = 0; v < graph.n; v++) upperBound += weights[v];
  for (let e = 0; e < graph.m; e++) {
    const u = graph.tails[e], v = graph.heads[e];
    const taken = Math.min(left[u], left[v]);
    if (taken === 0) continue;
    left[u] -= taken;
    left[v] -= taken;
    upperBound -= taken;
    ends.push(labels[u], labels[v]);
    doubled.push(2 * taken);
  }
  return { upperBound, proof: { rule: "packing", ends, doubled } };
}
