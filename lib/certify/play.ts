/**
 * What a proof is checked against: a weighted graph in certificate numbering and the set of vertices
 * the proof speaks of. Built with plain counting sorts, in O(n + m) time.
 */
import type { Numbers } from "./certificate.ts";
import { Rejected } from "./rejected.ts";

export interface Play {
  /** Number of vertices of the whole graph. */
  readonly n: number;
  /** Length n + 1: where each vertex's neighbours begin in `neighbours`. */
  readonly offsets: Int32Array;
  /** Length 2m: neighbours, increasing within each vertex. */
  readonly neighbours: Int32Array;
  /** Length n: integer weights. */
  readonly weights: Float64Array;
  /** The vertices in play, each once. */
  readonly vertices: Numbers;
  /** What to call a vertex in a message. */
  readonly nameOf: (v: number) => string;
  /** Room to work in, shared by the proofs of all parts and all zero between them. */
  readonly scratch: Scratch;
  /** How many blocks proofs this one stands in; 0 if absent. */
  readonly nesting?: number;
}

/** Arrays of length n, all zero while no proof is being checked. */
export interface Scratch {
  /** What `SlackLedger` notes of each vertex: whether it is in play, and has had a load. */
  readonly state: Uint8Array;
  readonly load: Float64Array;
  /** Places of vertices in a smaller graph, from 1. */
  readonly place: Int32Array;
}

/** Fresh scratch for graphs with n vertices. */
export function scratchFor(n: number): Scratch {
  return { state: new Uint8Array(n), load: new Float64Array(n), place: new Int32Array(n) };
}

/**
 * Sorted neighbour lists from an edge list.
 *
 * @param n number of vertices
 * @param tails length m, one end of each edge, from 0 to n-1
 * @param heads length m, the other end
 */
export function neighbourLists(
  n: number,
  tails: ArrayLike<number>,
  heads: ArrayLike<number>,
): { offsets: Int32Array; neighbours: Int32Array } {
  const m = tails.length;
  const offsets = new Int32Array(n + 1);
  for (let e = 0; e < m; e++) {
    offsets[tails[e] + 1]++;
    offsets[heads[e] + 1]++;
  }
  for (let v = 0; v < n; v++) offsets[v + 1] += offsets[v];
  // Two passes of a counting sort: listing by far end first leaves every list increasing.
  const far = new Int32Array(2 * m);
  const next = offsets.slice(0, n);
  for (let e = 0; e < m; e++) {
    far[next[tails[e]]++] = heads[e];
    far[next[heads[e]]++] = tails[e];
  }
  const neighbours = new Int32Array(2 * m);
  next.set(offsets.subarray(0, n));
  for (let v = 0; v < n; v++) {
    for (let a = offsets[v]; a < offsets[v + 1]; a++) neighbours[next[far[a]]++] = v;
  }
  return { offsets, neighbours };
}

/** Whether u and v are joined, by binary search in the shorter list. */
export function adjacent(play: Play, u: number, v: number): boolean {
  const { offsets, neighbours } = play;
  if (offsets[u + 1] - offsets[u] > offsets[v + 1] - offsets[v]) {
    const kept = u;
    u = v;
    v = kept;
  }
  let low = offsets[u], high = offsets[u + 1];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (neighbours[middle] < v) low = middle + 1;
    else high = middle;
  }
  return low < offsets[u + 1] && neighbours[low] === v;
}

/** Refuses anything but a vertex number of the graph. @throws {Rejected} */
export function requireVertex(play: Play, v: unknown, where: string): number {
  if (typeof v !== "number" || !Number.isInteger(v) || v < 0 || v >= play.n) {
    throw new Rejected(`${where}: expected a vertex from 0 to ${play.n - 1}, got ${v}`);
  }
  return v;
}

/** Refuses two vertices that are not joined. @throws {Rejected} */
export function requireEdge(play: Play, u: number, v: number, where: string): void {
  if (u === v || !adjacent(play, u, v)) {
    throw new Rejected(
      `${where}: ${play.nameOf(u)} and ${play.nameOf(v)} are not in conflict in these tables`,
    );
  }
}

/** Refuses a stated bound that is not the proven one. @throws {Rejected} */
export function requireBound(stated: unknown, proved: bigint, where: string): void {
  if (typeof stated !== "number" || !Number.isInteger(stated) || BigInt(stated) !== proved) {
    throw new Rejected(`${where}: the proof proves ${proved}, the certificate states ${stated}`);
  }
}

/** Refuses anything but an integer from 0 to 2^53 - 1. @throws {Rejected} */
export function requireMultiplier(value: unknown, where: string): number {
  if (typeof value !== "number" || !Number.isSafeInteger(value) || value < 0) {
    throw new Rejected(`${where}: expected an integer >= 0 below 2^53, got ${value}`);
  }
  return value;
}
