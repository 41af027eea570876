/**
 * Odd cycles C with x(C) > (|C| - 1) / 2, found exactly: with slack s(uv) = 1 - x(u) - x(v) on the
 * edges, these are the odd cycles of slack below 1, and a shortest odd closed walk is a shortest path
 * in the double cover (Grötschel, Lovász and Schrijver, "Geometric algorithms and combinatorial
 * optimization", 1988, chapter 9; written from memory).
 */
import type { Graph } from "../graph/graph.ts";
import { HeapQueue } from "../graph/heap.ts";
import type { Meter } from "../run/meter.ts";

/** Arcs scanned in one separation, at most so many times n + m. */
const PATIENCE = 200;

/**
 * Violated odd cycles: from every fractional vertex not yet on one a search for the odd closed walk of
 * least slack, until the arcs scanned pass 200·(n + m); so on large graphs some may be missed.
 *
 * @param graph a simple graph
 * @param x length n, edge rows satisfied up to rounding
 * @param limit most cycles to return; the most violated are
 * @param meter counts the arcs scanned
 * @param epsilon least violation worth a row
 * @returns simple odd cycles of at least five vertices, vertices in order
 * @throws {Interrupted} when the meter runs out
 */
export function violatedOddCycles(
  graph: Graph,
  x: Float64Array,
  limit: number,
  meter: Meter,
  epsilon = 0.02,
): number[][] {
  const { n, m, offsets, targets } = graph;
  let patience = PATIENCE * (n + m);
  // A cycle of slack below 1 - 2ε; the slack of a cycle is 1 - 2·violation.
  const bound = 1 - 2 * epsilon;
  const dist = new Float64Array(2 * n).fill(Infinity);
  const parent = new Int32Array(2 * n).fill(-1);
  const covered = new Uint8Array(n);
  const found: { cycle: number[]; slack: number }[] = [];
  const touched: number[] = [];
  const queue = new HeapQueue();
  const fractional = (v: number): boolean => x[v] > 1e-6 && x[v] < 1 - 1e-6;
  for (let root = 0; root < n && patience > 0; root++) {
    if (covered[root] !== 0 || !fractional(root)) continue;
    // Nodes of the cover: v and n + v. The walk from root to its copy.
    queue.clear();
    dist[root] = 0;
    touched.push(root);
    queue.push(0, root);
    let reached = false, scanned = 1;
    for (let at = queue.pop(); at >= 0; at = queue.pop()) {
      if (queue.key > dist[at]) continue;
      if (at === n + root) {
        reached = true;
        break;
      }
      const v = at % n, flip = at < n ? n : 0;
      scanned += offsets[v + 1] - offsets[v];
      if (scanned > 65536) {
        meter.tick(5 * scanned);
        patience -= scanned;
        scanned = 0;
      }
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (!fractional(u)) continue;
        const next = dist[at] + Math.max(0, 1 - x[u] - x[v]);
        const to = u + flip;
        if (next >= bound || next >= dist[to]) continue;
        if (dist[to] === Infinity) touched.push(to);
        dist[to] = next;
        parent[to] = at;
        queue.push(next, to);
      }
    }
    meter.tick(5 * scanned);
    patience -= scanned;
    if (reached) {
      const walk: number[] = [];
      for (let at = n + root; at !== root; at = parent[at]) walk.push(at % n);
      const cycle = simpleOddCycle(walk);
      if (cycle.length >= 5) {
        let slack = 0;
        for (let i = 0; i < cycle.length; i++) {
          slack += 1 - x[cycle[i]] - x[cycle[(i + 1) % cycle.length]];
          covered[cycle[i]] = 1;
        }
        found.push({ cycle, slack });
      }
    }
    for (const at of touched) {
      dist[at] = Infinity;
      parent[at] = -1;
    }
    touched.length = 0;
  }
  return found.sort((a, b) => a.slack - b.slack).slice(0, limit).map((f) => f.cycle);
}

/** A simple odd cycle within a closed walk of odd length, given by its vertices in order. */
export function simpleOddCycle(walk: readonly number[]): number[] {
  const stack: number[] = [];
  const place = new Map<number, number>();
  for (const v of [...walk, walk[0]]) {
    const at = place.get(v);
    if (at === undefined) {
      place.set(v, stack.length);
      stack.push(v);
      continue;
    }
    const length = stack.length - at;
    if (length % 2 === 1) return stack.slice(at);
    while (stack.length > at + 1) place.delete(stack.pop() as number);
  }
  throw new Error("a closed walk of odd length contains an odd cycle");
}
