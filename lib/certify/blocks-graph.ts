/**
 * A graph with edge costs that loses vertices and gains gadgets while a blocks proof is checked.
 * Linked lists of arcs; an arc and its mate are a and a ^ 1.
 */
import { type Play, requireMultiplier } from "./play.ts";
import { Rejected } from "./rejected.ts";

export class CostedGraph {
  /** Length n: 1 while the vertex is there. */
  readonly alive: Uint8Array;
  /** Length n: the first arc out of each vertex, or -1. */
  readonly first: Int32Array;
  /** The next arc out of the same vertex, or -1. */
  readonly next: Int32Array;
  /** Where each arc leads. */
  readonly target: Int32Array;
  /** The cost of each arc's edge; the same for an arc and its mate. */
  readonly cost: Float64Array;
  readonly #degree: Int32Array;
  #arcs = 0;
  #vertices = 0;

  /**
   * @param vertices the most vertices there will be
   * @param edges the most edges there will be
   */
  constructor(vertices: number, edges: number) {
    this.alive = new Uint8Array(vertices);
    this.first = new Int32Array(vertices).fill(-1);
    this.#degree = new Int32Array(vertices);
    this.next = new Int32Array(2 * edges);
    this.target = new Int32Array(2 * edges);
    this.cost = new Float64Array(2 * edges);
  }

  /** How many vertices there have been. */
  get vertices(): number {
    return this.#vertices;
  }

  addVertex(): number {
    this.alive[this.#vertices] = 1;
    return this.#vertices++;
  }

  addEdge(u: number, v: number, cost: number): void {
    this.#addArc(u, v, cost);
    this.#addArc(v, u, cost);
  }

  #addArc(from: number, to: number, cost: number): void {
    const a = this.#arcs++;
    this.target[a] = to;
    this.cost[a] = cost;
    this.next[a] = this.first[from];
    this.first[from] = a;
    this.#degree[from]++;
  }

  /** An arc from u to v or back, or -1; looks through the shorter list. */
  arcBetween(u: number, v: number): number {
    if (this.#degree[u] > this.#degree[v]) [u, v] = [v, u];
    for (let a = this.first[u]; a >= 0; a = this.next[a]) if (this.target[a] === v) return a;
    return -1;
  }

  /** Adds to the cost of an edge that is there. @throws {Rejected} */
  addCost(u: number, v: number, cost: number, where: string): void {
    const a = this.arcBetween(u, v);
    if (a < 0) throw new Rejected(`${where}: no edge between vertices ${u} and ${v}`);
    const sum = requireMultiplier(this.cost[a] + cost, where);
    this.cost[a] = this.cost[a ^ 1] = sum;
  }

  /** The edges between vertices that are there: ends and costs. */
  edges(): { tails: number[]; heads: number[]; costs: number[] } {
    const tails: number[] = [], heads: number[] = [], costs: number[] = [];
    for (let v = 0; v < this.#vertices; v++) {
      if (this.alive[v] === 0) continue;
      for (let a = this.first[v]; a >= 0; a = this.next[a]) {
        const u = this.target[a];
        if (u < v || this.alive[u] === 0) continue;
        tails.push(v);
        heads.push(u);
        costs.push(this.cost[a]);
      }
    }
    return { tails, heads, costs };
  }
}

/**
 * The graph of the vertices in play, renumbered 0, 1, … in increasing order, all costs 0.
 *
 * @param moreVertices room for vertices that come later
 * @param moreEdges room for edges that come later
 */
export function graphInPlay(
  play: Play,
  moreVertices: number,
  moreEdges: number,
): { graph: CostedGraph; vertices: Int32Array } {
  const vertices = Int32Array.from(play.vertices).sort();
  const index = new Map<number, number>();
  vertices.forEach((v, i) => index.set(v, i));
  let arcs = 0;
  for (const v of vertices) arcs += play.offsets[v + 1] - play.offsets[v];
  const graph = new CostedGraph(vertices.length + moreVertices, arcs + moreEdges);
  for (let i = 0; i < vertices.length; i++) graph.addVertex();
  vertices.forEach((v, i) => {
    for (let a = play.offsets[v]; a < play.offsets[v + 1]; a++) {
      const j = index.get(play.neighbours[a]);
      if (j !== undefined && j > i) graph.addEdge(i, j, 0);
    }
  });
  return { graph, vertices };
}
