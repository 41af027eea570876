/**
 * Irregular graphs with an even-face embedding in the projective plane, together with the embedding:
 * mirrored grids whose faces are split, edges removed or drawn out, vertices split, and paths hung in.
 */
import { type Graph, graphFromEdges } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";
import { mirroredGrid } from "./mirrored-grid.ts";

/** A graph and the rotation system of its embedding, every edge twisted. */
export interface EmbeddedGraph {
  readonly graph: Graph;
  /** Length 2m, as in lib/graph/embedding.ts. */
  readonly next: Int32Array;
}

/** The mirrored grid of `mirroredGrid` on the projective plane. */
export function embeddedGrid(rows: number, columns: number): EmbeddedGraph {
  const graph = mirroredGrid(rows, columns);
  const per = 2 * columns - 1;
  const next = new Int32Array(2 * graph.m);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) {
      const right = 2 * (i * per + j), down = 2 * (i * per + columns - 1 + j);
      const up = i > 0
        ? 2 * ((i - 1) * per + columns - 1 + j) + 1
        : 2 * ((rows - 1) * per + columns - 1 + (columns - 1 - j)) + 1;
      const around = [down, up];
      if (j + 1 < columns) around.unshift(right);
      if (j > 0) around.splice(around.length - 1, 0, right - 1);
      // Neighbours turn in opposite senses; the seam closes with that, as rows + columns is even.
      if ((i + j) % 2 === 1) around.reverse();
      around.forEach((d, k) => next[d] = around[(k + 1) % around.length]);
    }
  }
  return { graph, next };
}

/** The kinds of change `irregular` makes; each keeps all faces even and the graph simple. */
export type Change = "remove" | "chord" | "path" | "stretch" | "split" | "pendant";
const CHANGES: readonly Change[] = ["remove", "chord", "path", "stretch", "split", "pendant"];

/**
 * Changes an embedded graph at random.
 *
 * @param start a simple graph with an even-face embedding
 * @param changes how many changes to try; those that do not fit are left out
 * @param kinds what to choose from
 * @returns a simple connected graph that is not bipartite, and its embedding. O(changes · m) time.
 */
export function irregular(
  start: EmbeddedGraph,
  random: Random,
  changes: number,
  kinds: readonly Change[] = CHANGES,
): EmbeddedGraph {
  const draft = new Draft(start);
  for (let i = 0; i < changes; i++) draft.change(kinds[random.below(kinds.length)], random);
  return draft.finished();
}

/** A small irregular graph, at most `most` vertices. */
export function smallEvenFace(random: Random, most: number): EmbeddedGraph {
  for (;;) {
    const rows = 2 + random.below(4), columns = 1 + random.below(5);
    if ((rows + columns) % 2 !== 0 || rows * columns > most || rows * columns < 3) continue;
    if (rows === 2 && columns < 4) continue; // parallel edges at the seam
    const made = irregular(embeddedGrid(rows, columns), random, random.below(12));
    if (made.graph.n <= most) return made;
  }
}

/** An embedding under construction; darts as in lib/graph/embedding.ts. */
class Draft {
  #n: number;
  /** The vertex where each dart starts; -1 once its edge is removed. */
  #start: number[] = [];
  #next: number[];
  #prev: number[] = [];

  constructor({ graph, next }: EmbeddedGraph) {
    this.#n = graph.n;
    for (let e = 0; e < graph.m; e++) this.#start.push(graph.tails[e], graph.heads[e]);
    this.#next = Array.from(next);
    this.#next.forEach((d2, d) => this.#prev[d2] = d);
  }

  change(kind: Change, random: Random): void {
    const alive = [...this.#start.keys()].filter((d) => this.#start[d] >= 0);
    const d = alive[random.below(alive.length)];
    switch (kind) {
      case "remove":
        return this.#remove(d);
      case "chord":
        return this.#join(d, random, 1);
      case "path":
        return this.#join(d, random, 2 + random.below(2));
      case "stretch":
        return this.#stretch(d);
      case "split":
        return this.#splitVertex(d, random);
      case "pendant":
        return this.#pendant(d);
    }
  }

  finished(): EmbeddedGraph {
    const alive = [...this.#start.keys()].filter((d) => this.#start[d] >= 0);
    const name = new Map(alive.map((d, i) => [d, i]));
    const graph = graphFromEdges(
      this.#n,
      Int32Array.from(alive.filter((d) => d % 2 === 0), (d) => this.#start[d]),
      Int32Array.from(alive.filter((d) => d % 2 === 0), (d) => this.#start[d + 1]),
    );
    return { graph, next: Int32Array.from(alive, (d) => name.get(this.#next[d])!) };
  }

  /**
   * The corners of the face at the corner after dart d, in order, each named by the dart it comes
   * after. Entries at even places turn with the rotation, those at odd places against it.
   */
  #corners(d: number): number[] {
    const corners: number[] = [];
    let at = d;
    do {
      corners.push(at, at ^ 1);
      at = this.#prev[this.#next[at ^ 1] ^ 1];
    } while (at !== d);
    return corners;
  }

  /** Puts dart d between dart `after` and the one that followed it. */
  #insert(d: number, after: number): void {
    const before = this.#next[after];
    this.#next[after] = this.#prev[before] = d;
    this.#next[d] = before;
    this.#prev[d] = after;
    this.#start[d] = this.#start[after];
  }

  /** A new vertex with a dart. */
  #fresh(d: number): void {
    this.#start[d] = this.#n++;
    this.#next[d] = this.#prev[d] = d;
  }

  #joined(u: number, v: number): boolean {
    return u === v || this.#start.some((s, d) => s === u && this.#start[d ^ 1] === v);
  }

  /** Removes the edge of d if two different faces meet there and no vertex is left alone. */
  #remove(d: number): void {
    // The face on the other side holds, of one lift or the other, the corner after prev[d].
    const corners = this.#corners(d);
    if (corners.includes(this.#prev[d]) || corners.includes(this.#prev[d ^ 1])) return;
    for (const e of [d, d ^ 1]) {
      this.#next[this.#prev[e]] = this.#next[e];
      this.#prev[this.#next[e]] = this.#prev[e];
      this.#start[e] = -1;
    }
  }

  /** Joins two corners of the face after d by a path of `length` edges through the face. */
  #join(d: number, random: Random, length: number): void {
    const corners = this.#corners(d);
    const i = random.below(corners.length), j = random.below(corners.length);
    const u = this.#start[corners[i]], v = this.#start[corners[j]];
    if (i === j || u === v || (i - j + length) % 2 !== 0) return;
    if (length === 1 && this.#joined(u, v)) return;
    let after = corners[i];
    for (let k = 1; k <= length; k++) {
      const a = this.#start.length;
      this.#insert(a, after);
      if (k < length) this.#fresh(a + 1);
      else this.#insert(a + 1, corners[j]);
      after = a + 1;
    }
  }

  /** Draws an edge out into a path of three. */
  #stretch(d: number): void {
    const far = this.#start[d ^ 1];
    const x = this.#start.length;
    // d: u → p, x: p → q, then d ^ 1 stays at the far end as the reverse of the last edge.
    const [p, q] = [this.#n++, this.#n++];
    this.#start.push(p, q, q, far);
    this.#replace(d ^ 1, x + 3);
    this.#start[d ^ 1] = p;
    this.#circle([d ^ 1, x]);
    this.#circle([x + 1, x + 2]);
  }

  /** Puts dart `by` in the place of dart d. */
  #replace(d: number, by: number): void {
    if (this.#next[d] === d) {
      this.#next[by] = this.#prev[by] = by;
      return;
    }
    this.#next[by] = this.#next[d];
    this.#prev[by] = this.#prev[d];
    this.#next[this.#prev[d]] = this.#prev[this.#next[d]] = by;
  }

  #circle(darts: number[]): void {
    darts.forEach((d, i) => {
      const e = darts[(i + 1) % darts.length];
      this.#next[d] = e;
      this.#prev[e] = d;
    });
  }

  /** Takes a run of darts away from a vertex to a new one, and joins both by a path of two edges. */
  #splitVertex(d: number, random: Random): void {
    const around = [d];
    for (let e = this.#next[d]; e !== d; e = this.#next[e]) around.push(e);
    if (around.length < 3) return;
    const taken = 1 + random.below(around.length - 2);
    const a = this.#start.length;
    const other = this.#n++, between = this.#n++;
    this.#start.push(this.#start[d], between, other, between);
    for (let i = 0; i < taken; i++) this.#start[around[i]] = other;
    this.#circle([...around.slice(taken), a]);
    this.#circle([...around.slice(0, taken), a + 2]);
    this.#circle([a + 1, a + 3]);
  }

  /** Hangs a new vertex into the face after d. */
  #pendant(d: number): void {
    const a = this.#start.length;
    this.#insert(a, d);
    this.#fresh(a + 1);
  }
}
