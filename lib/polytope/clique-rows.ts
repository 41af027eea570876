/**
 * Cliques as rows x(K) <= 1: a cover of all edges by maximal cliques to begin with, and cliques that
 * a fractional point violates. Greedy; the exact separation problem is itself hard.
 */
import type { Graph } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";

/** Adjacency with constant-time questions where the graph is small, else by merging lists. */
export class Neighbours {
  readonly #graph: Graph;
  readonly #mark: Int32Array;
  #stamp = 0;

  constructor(graph: Graph) {
    this.#graph = graph;
    this.#mark = new Int32Array(graph.n);
  }

  /** Keeps the entries of `list` (its first `size`) that are joined to v; returns how many. */
  restrict(list: Int32Array, size: number, v: number): number {
    const { offsets, targets } = this.#graph;
    const mark = this.#mark, stamp = ++this.#stamp;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) mark[targets[a]] = stamp;
    let kept = 0;
    for (let i = 0; i < size; i++) if (mark[list[i]] === stamp) list[kept++] = list[i];
    return kept;
  }

  /**
   * Enlarges a clique until it is maximal, taking candidates in the order they stand in the list of
   * the vertex of least degree.
   *
   * @param clique pairwise adjacent, at least one vertex
   */
  maximal(clique: readonly number[]): number[] {
    const { offsets, targets } = this.#graph;
    let least = clique[0];
    for (const v of clique) {
      if (offsets[v + 1] - offsets[v] < offsets[least + 1] - offsets[least]) least = v;
    }
    const list = targets.slice(offsets[least], offsets[least + 1]);
    let size = list.length;
    for (const v of clique) if (v !== least) size = this.restrict(list, size, v);
    const grown = [...clique];
    while (size > 0) {
      const v = list[0];
      grown.push(v);
      size = this.restrict(list, size, v);
    }
    return grown;
  }
}

/**
 * Maximal cliques that cover every edge: for each edge not yet covered a clique grown by the vertices
 * that cover most new edges.
 *
 * @param graph a simple graph
 * @param meter counts the arcs scanned
 * @returns cliques of at least two vertices; isolated vertices are in none. About
 *   O(Σ over cliques of the degrees of their vertices) time.
 * @throws {Interrupted} when the meter runs out
 */
export function edgeCliqueCover(graph: Graph, meter?: Meter): number[][] {
  const { n, m, offsets, targets, edgeOf, tails, heads } = graph;
  const covered = new Uint8Array(m);
  const near = new Neighbours(graph);
  // How many uncovered edges join a candidate to the clique so far.
  const fresh = new Int32Array(n);
  const cliques: number[][] = [];
  for (let e = 0; e < m; e++) {
    if (covered[e] !== 0) continue;
    const clique = [tails[e], heads[e]];
    const [u, v] = clique;
    const list = targets.slice(offsets[u], offsets[u + 1]);
    let size = near.restrict(list, list.length, v);
    for (const c of clique) {
      for (let a = offsets[c]; a < offsets[c + 1]; a++) fresh[targets[a]] += 1 - covered[edgeOf[a]];
    }
    while (size > 0) {
      let best = 0;
      for (let i = 1; i < size; i++) if (fresh[list[i]] > fresh[list[best]]) best = i;
      const c = list[best];
      clique.push(c);
      for (let a = offsets[c]; a < offsets[c + 1]; a++) fresh[targets[a]] += 1 - covered[edgeOf[a]];
      size = near.restrict(list, size, c);
    }
    const inside = new Set(clique);
    let scanned = 0;
    for (const c of clique) {
      scanned += offsets[c + 1] - offsets[c];
      for (let a = offsets[c]; a < offsets[c + 1]; a++) {
        fresh[targets[a]] = 0;
        if (inside.has(targets[a])) covered[edgeOf[a]] = 1;
      }
    }
    cliques.push(clique);
    meter?.tick(3 * scanned);
  }
  return cliques;
}

/**
 * Cliques with x(K) > 1, grown greedily by x from every vertex with a positive value.
 *
 * @param graph a simple graph
 * @param x length n, the point to cut off
 * @param limit most rows to return; the most violated are
 * @param meter counts the arcs scanned
 * @param epsilon least violation worth a row
 * @returns maximal cliques
 * @throws {Interrupted} when the meter runs out
 */
export function violatedCliques(
  graph: Graph,
  x: Float64Array,
  limit: number,
  meter: Meter,
  epsilon = 0.02,
): number[][] {
  const { n, offsets, targets } = graph;
  const near = new Neighbours(graph);
  const found = new Map<string, { clique: number[]; violation: number }>();
  for (let v = 0; v < n; v++) {
    if (x[v] <= 1e-6 || x[v] >= 1 - 1e-6) continue;
    let list = targets.slice(offsets[v], offsets[v + 1]).filter((u) => x[u] > 1e-6);
    list = list.sort((a, b) => x[b] - x[a] || a - b);
    let scanned = offsets[v + 1] - offsets[v] + 4 * list.length;
    // The heaviest neighbour first, and once more with the second heaviest.
    for (let skip = 0; skip < 2 && skip < list.length; skip++) {
      const clique = [v];
      let sum = x[v];
      const rest = list.slice(skip);
      let size = rest.length;
      while (size > 0) {
        const u = rest[0];
        clique.push(u);
        sum += x[u];
        scanned += offsets[u + 1] - offsets[u] + size;
        size = near.restrict(rest, size, u);
      }
      meter.tick(2 * scanned);
      scanned = 0;
      if (sum < 1 + epsilon) continue;
      const key = clique.slice().sort((a, b) => a - b).join();
      if (!found.has(key)) found.set(key, { clique, violation: sum - 1 });
    }
  }
  return [...found.values()].sort((a, b) => b.violation - a.violation).slice(0, limit)
    .map((f) => near.maximal(f.clique));
}
