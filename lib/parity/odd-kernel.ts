/**
 * The odd kernel of a graph: what is left for questions about odd cycles once trees, chains of
 * vertices of degree two and parallel ways of equal parity are out of the way. Near-linear time.
 *
 * Edges are *odd* or *even*; in the graph of an instance all are odd. Four steps, until none applies:
 * a vertex of degree at most one goes; a vertex of degree two is suppressed, its two edges becoming
 * one whose parity is their sum; of parallel edges with equal parity one stays; and where a
 * suppression would make an odd loop at a vertex, that vertex is *forced*: an odd cycle hangs on it
 * alone, so some least transversal contains it, some largest packing contains that cycle, and it
 * leaves the graph. Hence, for the graph G and its kernel K,
 *
 *     OCT(G) = OCT(K) + forced,    OCP(G) = OCP(K) + forced.
 */
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";

/** A vertex that an odd cycle hangs on. */
export interface Forced {
  /** The vertex, numbered as in the whole graph. */
  readonly vertex: number;
  /** Vertices of the odd cycle in order, the forced one first; numbered as in the whole graph. */
  readonly cycle: Int32Array;
}

export interface OddKernel {
  /** No loops; two parallel edges at most, of opposite parity; every degree is at least three. */
  readonly graph: Graph;
  /** Length graph.m, entries 0 and 1: 1 where the way along the edge has even length. */
  readonly even: Uint8Array;
  /** Length graph.n, increasing: the vertex of the whole graph that each vertex is. */
  readonly vertices: Int32Array;
  /** The forced vertices; their cycles share no vertex with each other or with the kernel. */
  readonly forced: readonly Forced[];
  /** The vertices strictly between the ends of an edge, from its tail to its head. */
  readonly inside: (edge: number) => Int32Array;
}

/**
 * Reduces a graph to its odd kernel.
 *
 * @param whole any graph
 * @param meter counts about one unit for each arc
 * @param keep length n; vertices with 0 are left out (default: none)
 * @param even length m, nonzero where an edge is even; absent: every edge is odd
 * @returns the kernel with the way back. O(n + m) expected time.
 */
export function oddKernel(
  whole: Graph,
  meter: Meter,
  keep?: Uint8Array,
  even?: Uint8Array,
): OddKernel {
  return new Reduction(whole, meter, keep, even).run();
}

/**
 * The graph with each even edge cut in two by a vertex of its own, so that all edges are odd.
 *
 * @param even length m, nonzero where an edge is even
 * @returns a graph whose first n vertices are those of `graph`; simple where no two parallel edges
 *   of `graph` have the same parity
 */
export function allOdd(graph: Graph, even: Uint8Array): Graph {
  const tails: number[] = [], heads: number[] = [];
  let n = graph.n;
  for (let e = 0; e < graph.m; e++) {
    if (even[e] === 0) {
      tails.push(graph.tails[e]);
      heads.push(graph.heads[e]);
    } else {
      tails.push(graph.tails[e], n);
      heads.push(n++, graph.heads[e]);
    }
  }
  return graphFromEdges(n, Int32Array.from(tails), Int32Array.from(heads));
}

/** The vertices of a closed walk along edges of the kernel, in the whole graph. */
export function expandCycle(
  kernel: OddKernel,
  vertices: ArrayLike<number>,
  edges: ArrayLike<number>,
): Int32Array {
  const walk: number[] = [];
  for (let i = 0; i < vertices.length; i++) {
    const v = vertices[i], e = edges[i];
    walk.push(kernel.vertices[v]);
    const inside = kernel.inside(e);
    if (kernel.graph.tails[e] !== v) inside.reverse();
    for (const u of inside) walk.push(u);
  }
  return Int32Array.from(walk);
}

class Reduction {
  readonly #n: number;
  readonly #meter: Meter;
  // Edges: the given ones first, then those that suppressions make, at most as many again.
  readonly #tail: Int32Array;
  readonly #head: Int32Array;
  readonly #odd: Uint8Array;
  readonly #live: Uint8Array;
  /** Number of edges of the whole graph along the edge. */
  readonly #length: Int32Array;
  /** The suppressed vertex and the edges to it from the tail and from the head; -1 if there is none. */
  readonly #middle: Int32Array;
  readonly #fromTail: Int32Array;
  readonly #fromHead: Int32Array;
  #edges = 0;
  // Arcs 2e (at the tail) and 2e + 1 (at the head) in one list for each vertex; dead ones stay until
  // the list is walked.
  readonly #first: Int32Array;
  readonly #next: Int32Array;
  readonly #degree: Int32Array;
  readonly #gone: Uint8Array;
  readonly #queue: number[] = [];
  readonly #forced: Forced[] = [];
  // Open addressing from (ends, parity) to the edge; slots of dead edges are taken over.
  readonly #mask: number;
  readonly #slot: Int32Array;

  constructor(
    whole: Graph,
    meter: Meter,
    keep: Uint8Array | undefined,
    even: Uint8Array | undefined,
  ) {
    const { n, m } = whole;
    const room = 2 * m;
    this.#n = n;
    this.#meter = meter;
    this.#tail = new Int32Array(room);
    this.#head = new Int32Array(room);
    this.#odd = new Uint8Array(room);
    this.#live = new Uint8Array(room);
    this.#length = new Int32Array(room);
    this.#middle = new Int32Array(room).fill(-1);
    this.#fromTail = new Int32Array(room);
    this.#fromHead = new Int32Array(room);
    this.#first = new Int32Array(n).fill(-1);
    this.#next = new Int32Array(2 * room);
    this.#degree = new Int32Array(n);
    this.#gone = new Uint8Array(n);
    let size = 16;
    while (size < 2 * room) size *= 2;
    this.#mask = size - 1;
    this.#slot = new Int32Array(size).fill(-1);
    if (keep !== undefined) { for (let v = 0; v < n; v++) if (keep[v] === 0) this.#gone[v] = 1; }
    for (let e = 0; e < m; e++) {
      if (this.#gone[whole.tails[e]] !== 0 || this.#gone[whole.heads[e]] !== 0) continue;
      const odd = even !== undefined && even[e] !== 0 ? 0 : 1;
      this.#join(whole.tails[e], whole.heads[e], odd, 1, -1, -1, -1);
    }
    meter.tick(2 * m);
    for (let v = n - 1; v >= 0; v--) if (this.#degree[v] <= 2) this.#queue.push(v);
  }

  run(): OddKernel {
    while (this.#queue.length > 0) {
      const v = this.#queue.pop() as number;
      if (this.#gone[v] !== 0 || this.#degree[v] > 2) continue;
      this.#reduce(v);
    }
    return this.#result();
  }

  #reduce(v: number): void {
    this.#gone[v] = 1;
    const arcs: number[] = [];
    for (let a = this.#first[v]; a >= 0; a = this.#next[a]) {
      this.#meter.tick();
      if (this.#live[a >> 1] !== 0) arcs.push(a);
    }
    for (const a of arcs) this.#kill(a >> 1);
    if (arcs.length < 2) return;
    const [e, f] = [arcs[0] >> 1, arcs[1] >> 1];
    const a = this.#far(arcs[0]), b = this.#far(arcs[1]);
    const odd = this.#odd[e] ^ this.#odd[f];
    if (a !== b) {
      this.#join(a, b, odd, this.#length[e] + this.#length[f], v, e, f);
    } else if (odd === 1) {
      const cycle = [a, ...this.#walk(e, a), v, ...this.#walk(f, v)];
      this.#forced.push({ vertex: a, cycle: Int32Array.from(cycle) });
      this.#remove(a);
    }
  }

  /** The far end of the arc at position 2e + side. */
  #far(arc: number): number {
    return (arc & 1) === 0 ? this.#head[arc >> 1] : this.#tail[arc >> 1];
  }

  #kill(e: number): void {
    this.#live[e] = 0;
    for (const v of [this.#tail[e], this.#head[e]]) {
      if (--this.#degree[v] <= 2 && this.#gone[v] === 0) this.#queue.push(v);
    }
  }

  #remove(v: number): void {
    this.#gone[v] = 1;
    for (let a = this.#first[v]; a >= 0; a = this.#next[a]) {
      this.#meter.tick();
      if (this.#live[a >> 1] !== 0) this.#kill(a >> 1);
    }
  }

  /** Adds an edge unless one with these ends and this parity is there; of the two the shorter way stays. */
  #join(
    a: number,
    b: number,
    odd: number,
    length: number,
    middle: number,
    fromTail: number,
    fromHead: number,
  ): void {
    const at = this.#find(a, b, odd);
    let e = this.#slot[at];
    const known = e >= 0 && this.#live[e] !== 0;
    if (known && this.#length[e] <= length) return;
    if (!known) {
      e = this.#edges++;
      this.#slot[at] = e;
      this.#live[e] = 1;
      this.#tail[e] = a;
      this.#head[e] = b;
      this.#odd[e] = odd;
      this.#next[2 * e] = this.#first[a];
      this.#first[a] = 2 * e;
      this.#next[2 * e + 1] = this.#first[b];
      this.#first[b] = 2 * e + 1;
      this.#degree[a]++;
      this.#degree[b]++;
    } else if (this.#tail[e] !== a) {
      [fromTail, fromHead] = [fromHead, fromTail];
    }
    this.#length[e] = length;
    this.#middle[e] = middle;
    this.#fromTail[e] = fromTail;
    this.#fromHead[e] = fromHead;
  }

  /** The slot of (ends, parity): that of an edge with them, dead or live, or an empty one. */
  #find(a: number, b: number, odd: number): number {
    const lo = Math.min(a, b), hi = Math.max(a, b);
    let at = Math.imul(lo, 0x9e3779b1) ^ (odd * 0x27d4eb2f);
    at = Math.imul(at ^ (at >>> 15), 0x85ebca6b) + hi;
    at = Math.imul(at ^ (at >>> 13), 0xc2b2ae35);
    at = (at ^ (at >>> 16)) & this.#mask;
    for (;;) {
      this.#meter.tick();
      const e = this.#slot[at];
      if (e < 0) return at;
      const s = this.#tail[e], t = this.#head[e];
      if (this.#odd[e] === odd && Math.min(s, t) === lo && Math.max(s, t) === hi) return at;
      at = (at + 1) & this.#mask;
    }
  }

  /** The vertices strictly inside an edge, walked from one of its ends. */
  #walk(edge: number, from: number): number[] {
    const inside: number[] = [];
    // Entries: an edge and where it is entered, or -1 and a vertex to write down.
    const stack: number[] = [edge, from];
    while (stack.length > 0) {
      const at = stack.pop() as number, e = stack.pop() as number;
      if (e < 0) {
        inside.push(at);
        continue;
      }
      const middle = this.#middle[e];
      if (middle < 0) continue;
      const [near, far] = this.#tail[e] === at
        ? [this.#fromTail[e], this.#fromHead[e]]
        : [this.#fromHead[e], this.#fromTail[e]];
      stack.push(far, middle, -1, middle, near, at);
    }
    return inside;
  }

  #result(): OddKernel {
    const index = new Int32Array(this.#n).fill(-1);
    let n = 0, m = 0;
    for (let v = 0; v < this.#n; v++) if (this.#gone[v] === 0) index[v] = n++;
    for (let e = 0; e < this.#edges; e++) m += this.#live[e];
    const vertices = new Int32Array(n), origin = new Int32Array(m);
    const tails = new Int32Array(m), heads = new Int32Array(m), even = new Uint8Array(m);
    for (let v = 0; v < this.#n; v++) if (index[v] >= 0) vertices[index[v]] = v;
    for (let e = 0, at = 0; e < this.#edges; e++) {
      if (this.#live[e] === 0) continue;
      tails[at] = index[this.#tail[e]];
      heads[at] = index[this.#head[e]];
      even[at] = 1 - this.#odd[e];
      origin[at++] = e;
    }
    return {
      graph: graphFromEdges(n, tails, heads),
      even,
      vertices,
      forced: this.#forced,
      inside: (edge) => Int32Array.from(this.#walk(origin[edge], this.#tail[origin[edge]])),
    };
  }
}
