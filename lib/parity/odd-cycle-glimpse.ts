/**
 * A quick look for two disjoint odd cycles: a shortest odd closed walk through each of many vertices,
 * and an odd cycle in what is left. Finds two in most graphs that have them; proves nothing where it
 * does not.
 */
import type { Graph } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";
import { balance, type OddCycle } from "./balance.ts";
import { expandCycle, oddKernel } from "./odd-kernel.ts";

/** Two odd cycles without a common vertex, each its vertices in order. */
export type OddCyclePair = readonly [Int32Array, Int32Array];

/** Arcs scanned before the look ends, unless asked otherwise. */
export const LOOK_SCANS = 50_000_000;

/**
 * A quick look for two disjoint odd cycles; finds them in most graphs that have them.
 *
 * @param graph any graph, all edges odd
 * @param hints vertices to look at first, such as a transversal: one of two disjoint odd cycles
 *   passes through some of them
 * @param scans arcs to scan at most; those of 20 searches are always allowed
 * @returns two of them, or undefined: none were seen
 * @throws {Interrupted} when the meter runs out
 */
export function glimpseOddCyclePair(
  graph: Graph,
  meter: Meter,
  hints: ArrayLike<number> = [],
  scans: number = LOOK_SCANS,
): OddCyclePair | undefined {
  const kernel = oddKernel(graph, meter);
  const { graph: small, even, forced } = kernel;
  const expanded = (c: OddCycle): Int32Array => expandCycle(kernel, c.vertices, c.edges);
  if (forced.length >= 2) return [forced[0].cycle, forced[1].cycle];
  if (forced.length === 1) {
    const { oddCycle } = balance(small, even);
    return oddCycle === undefined ? undefined : [forced[0].cycle, expanded(oddCycle)];
  }
  const keep = new Uint8Array(small.n).fill(1);
  const size = small.n + 2 * small.m;
  const count = Math.min(small.n, Math.max(20, Math.floor(scans / (4 * size + 1))));
  const hinted = new Set(Array.from(hints));
  const roots: number[] = [];
  for (let v = 0; v < small.n; v++) if (hinted.has(kernel.vertices[v])) roots.push(v);
  roots.length = Math.min(roots.length, count);
  // From a hint, the walk does not pass the other hints: these are left for the second cycle.
  const allowed = new Uint8Array(small.n).fill(1), all = allowed.slice();
  for (const v of roots) allowed[v] = 0;
  const ownHints = roots.length;
  for (let i = 0; i < count; i++) roots.push(Math.floor((i * small.n) / count));
  const walker = new ShortestOddWalk(small, even);
  for (const [i, root] of roots.entries()) {
    meter.tick(4 * size);
    const first = walker.through(root, i < ownHints ? allowed : all);
    if (first === undefined) continue;
    for (const v of first.vertices) keep[v] = 0;
    const { oddCycle } = balance(small, even, keep);
    for (const v of first.vertices) keep[v] = 1;
    if (oddCycle !== undefined) return [expanded(first), expanded(oddCycle)];
  }
  return undefined;
}

/** Breadth-first search in the signed double cover, whose vertex (v, s) is 2v + s. */
class ShortestOddWalk {
  readonly #parentEdge: Int32Array;
  readonly #queue: Int32Array;

  constructor(readonly graph: Graph, readonly even: Uint8Array) {
    this.#parentEdge = new Int32Array(2 * graph.n);
    this.#queue = new Int32Array(2 * graph.n);
  }

  /**
   * A simple odd cycle on a shortest odd closed walk through a vertex.
   *
   * @param allowed length n: 0 for vertices, other than the root, that the walk must not pass
   */
  through(root: number, allowed: Uint8Array): OddCycle | undefined {
    const { offsets, targets, edgeOf, tails, heads } = this.graph;
    const parentEdge = this.#parentEdge.fill(-1), queue = this.#queue;
    let head = 0, tail = 0;
    queue[tail++] = 2 * root;
    while (head < tail && parentEdge[2 * root + 1] < 0) {
      const x = queue[head++], v = x >> 1;
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const e = edgeOf[a];
        const y = 2 * targets[a] + ((x & 1) ^ (this.even[e] === 0 ? 1 : 0));
        if (y === 2 * root || parentEdge[y] >= 0) continue;
        if (allowed[targets[a]] === 0 && targets[a] !== root) continue;
        parentEdge[y] = e;
        queue[tail++] = y;
      }
    }
    if (parentEdge[2 * root + 1] < 0) return undefined;
    // Walk back from the root on sheet 1; where the walk meets itself, an odd part is the cycle, and
    // an even part is left out.
    const vertices: number[] = [], edges: number[] = [], sheets: number[] = [];
    const placeOf = new Map<number, number>();
    for (let x = 2 * root + 1;;) {
      const v = x >> 1;
      const place = placeOf.get(v);
      if (place !== undefined) {
        if (sheets[place] !== (x & 1)) {
          return {
            vertices: Int32Array.from(vertices.slice(place)),
            edges: Int32Array.from(edges.slice(place)),
          };
        }
        for (const u of vertices.splice(place)) placeOf.delete(u);
        edges.length = sheets.length = place;
      }
      placeOf.set(v, vertices.length);
      vertices.push(v);
      sheets.push(x & 1);
      const e = parentEdge[x];
      edges.push(e);
      x = 2 * (tails[e] ^ heads[e] ^ v) + ((x & 1) ^ (this.even[e] === 0 ? 1 : 0));
    }
  }
}
