/**
 * The compression step for odd cycle transversals (Reed, Smith and Vetta, "Finding odd cycle
 * transversals", Oper. Res. Letters 32, 2004): given a transversal X, find one with fewer vertices
 * or prove that there is none. Each vertex of X is deleted, or kept on one of two sides; what the
 * kept ones ask of the rest is a minimum vertex cut. Instead of solving each of the 3^|X| cases, a
 * tree of partial cases keeps a family of disjoint paths that only grows on the way down, and a
 * branch ends as soon as
 *
 *     deleted + disjoint paths + odd cycles clear of both >= |X|.
 */
import type { Graph } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";
import type { OddCycle } from "./balance.ts";

const NONE = -1;
/** In `succ`: the path ends here. In `pred`: it starts here. */
const END = -2;

/** What one search saw. */
export interface Compressed {
  /** A smaller transversal of the vertices in play, or undefined: there is none. */
  readonly smaller?: number[];
  /** Cases visited. */
  readonly cases: number;
}

/**
 * The search on one graph; scratch of length O(n + m) is kept from call to call. Vertices in play
 * may change between calls.
 */
export class Compressor {
  readonly #graph: Graph;
  readonly #odd: Uint8Array;
  readonly #meter: Meter;
  /** Length n: 1 for the vertices in play outside X, where paths may run. */
  readonly #open: Uint8Array;
  /** Length n: the side of each open vertex in a two-colouring of them. */
  readonly #side: Uint8Array;
  readonly #queue: Int32Array;
  // Demands of the kept vertices of X: how many ask the vertex to stay on its side, or to change it.
  readonly #stay: Int32Array;
  readonly #change: Int32Array;
  readonly #sources: number[] = [];
  // Disjoint paths from the first kind to the second: neighbours on the path, NONE off the paths.
  readonly #succ: Int32Array;
  readonly #pred: Int32Array;
  #paths = 0;
  /** Entries (vertex, succ before, pred before), to be undone in reverse. */
  readonly #journal: number[] = [];
  // Search for an augmenting path in the graph with each vertex split in two.
  readonly #seenIn: Int32Array;
  readonly #seenOut: Int32Array;
  readonly #fromIn: Int32Array;
  readonly #fromOut: Int32Array;
  #stamp = 0;

  /** @param even length m, nonzero where an edge is even */
  constructor(graph: Graph, even: Uint8Array, meter: Meter) {
    const { n } = graph;
    this.#graph = graph;
    this.#odd = Uint8Array.from(even, (x) => x === 0 ? 1 : 0);
    this.#meter = meter;
    this.#open = new Uint8Array(n);
    this.#side = new Uint8Array(n);
    this.#queue = new Int32Array(2 * n);
    this.#stay = new Int32Array(n);
    this.#change = new Int32Array(n);
    this.#succ = new Int32Array(n).fill(NONE);
    this.#pred = new Int32Array(n).fill(NONE);
    this.#seenIn = new Int32Array(n);
    this.#seenOut = new Int32Array(n);
    this.#fromIn = new Int32Array(n);
    this.#fromOut = new Int32Array(n);
  }

  /**
   * Looks for a transversal of fewer than |X| vertices.
   *
   * @param inPlay length n, nonzero for the vertices in play
   * @param X a transversal of the subgraph in play
   * @param cycles disjoint odd cycles; those with all vertices in play help to end branches
   * @returns a smaller transversal if there is one
   * @throws {Interrupted} when the meter runs out; the object may be used again
   */
  smallerThan(inPlay: Uint8Array, X: readonly number[], cycles: readonly OddCycle[]): Compressed {
    this.#begin(inPlay, X);
    const packing = cycles.filter((c) => c.vertices.every((v) => inPlay[v] !== 0));
    return this.#search(this.#order(X), packing);
  }

  /** Colours the open vertices and forgets all paths. */
  #begin(inPlay: Uint8Array, X: readonly number[]): void {
    const { n, m, offsets, targets, edgeOf } = this.#graph;
    const open = this.#open, side = this.#side, queue = this.#queue;
    open.set(inPlay);
    for (const x of X) open[x] = 0;
    this.#stay.fill(0);
    this.#change.fill(0);
    this.#succ.fill(NONE);
    this.#pred.fill(NONE);
    this.#sources.length = 0;
    this.#journal.length = 0;
    this.#paths = 0;
    side.fill(2);
    for (let root = 0; root < n; root++) {
      if (open[root] === 0 || side[root] !== 2) continue;
      let head = 0, tail = 0;
      queue[tail++] = root;
      side[root] = 0;
      while (head < tail) {
        const v = queue[head++];
        for (let a = offsets[v]; a < offsets[v + 1]; a++) {
          const u = targets[a];
          if (open[u] === 0) continue;
          const want = side[v] ^ this.#odd[edgeOf[a]];
          if (side[u] === 2) {
            side[u] = want;
            queue[tail++] = u;
          } else if (side[u] !== want) throw new RangeError("expected a transversal");
        }
      }
    }
    this.#meter.tick(n + 2 * m);
  }

  /** X with those first that cost most to keep; those beyond |X| are bound to be deleted. */
  #order(X: readonly number[]): number[] {
    const cost = new Map<number, number>();
    for (const x of X) {
      this.#ask(x, 0, 1);
      this.#augment(X.length);
      cost.set(x, this.#paths);
      this.#undo(0, 0);
      this.#ask(x, 0, -1);
    }
    return [...X].sort((a, b) => (cost.get(b) as number) - (cost.get(a) as number) || a - b);
  }

  #search(X: readonly number[], packing: readonly OddCycle[]): Compressed {
    const s = X.length;
    const DELETED = 2;
    // choice[i]: 0 or 1, the side X[i] is kept on; DELETED; -1 before the first case.
    const choice = new Int32Array(s).fill(-1);
    const where = new Map<number, number>();
    X.forEach((x, i) => where.set(x, i));
    const deleted = new Uint8Array(this.#graph.n);
    const journalAt = new Int32Array(s), pathsAt = new Int32Array(s);
    let depth = 0, deletions = 0, kept = 0, cases = 0;
    const leave = (i: number): void => {
      if (choice[i] === DELETED) {
        deletions--;
        deleted[X[i]] = 0;
      } else if (choice[i] >= 0) {
        kept--;
        this.#undo(journalAt[i], pathsAt[i]);
        this.#ask(X[i], choice[i], -1);
      }
    };
    while (depth >= 0) {
      if (depth === s) {
        return { smaller: [...X.filter((_, i) => choice[i] === DELETED), ...this.#cut()], cases };
      }
      leave(depth);
      // Cases in the order: deleted, side 0, side 1; the first one kept needs one side only.
      const next = choice[depth] === -1 ? DELETED : choice[depth] === DELETED ? 0 : 1;
      if (choice[depth] === 1 || (next === 1 && kept === 0)) {
        choice[depth--] = -1;
        continue;
      }
      choice[depth] = next;
      cases++;
      this.#meter.tick();
      const x = X[depth];
      if (next === DELETED) {
        deletions++;
        deleted[x] = 1;
      } else {
        kept++;
        journalAt[depth] = this.#journal.length;
        pathsAt[depth] = this.#paths;
        this.#ask(x, next, 1);
        if (!this.#agrees(x, depth, choice, where)) continue;
        this.#augment(s - deletions);
      }
      const sure = deletions + this.#paths;
      if (sure >= s) continue;
      if (sure + packing.length >= s && sure + this.#clear(packing, deleted) >= s) continue;
      depth++;
    }
    return { cases };
  }

  /** Whether x, kept, agrees with its kept neighbours in X. */
  #agrees(x: number, depth: number, choice: Int32Array, where: Map<number, number>): boolean {
    const { offsets, targets, edgeOf } = this.#graph;
    for (let a = offsets[x]; a < offsets[x + 1]; a++) {
      const i = where.get(targets[a]);
      if (i === undefined || i >= depth || choice[i] > 1) continue;
      if ((choice[i] ^ choice[depth]) !== this.#odd[edgeOf[a]]) return false;
    }
    return true;
  }

  /** Adds (by = 1) or withdraws (by = -1) what x, kept on a side, asks of its open neighbours. */
  #ask(x: number, colour: number, by: 1 | -1): void {
    const { offsets, targets, edgeOf } = this.#graph;
    this.#meter.tick(offsets[x + 1] - offsets[x]);
    for (let a = offsets[x]; a < offsets[x + 1]; a++) {
      const v = targets[a];
      if (this.#open[v] === 0) continue;
      if ((colour ^ this.#odd[edgeOf[a]] ^ this.#side[v]) === 1) {
        this.#change[v] += by;
      } else {
        this.#stay[v] += by;
        if (by === 1) this.#sources.push(v);
        else this.#sources.pop();
      }
    }
  }

  #undo(journal: number, paths: number): void {
    const log = this.#journal;
    while (log.length > journal) {
      const pred = log.pop() as number, succ = log.pop() as number, v = log.pop() as number;
      this.#succ[v] = succ;
      this.#pred[v] = pred;
    }
    this.#paths = paths;
  }

  /** Adds disjoint paths until there are no more or as many as asked for. */
  #augment(most: number): void {
    while (this.#paths < most) {
      const end = this.#reach();
      if (end < 0) return;
      this.#shift(end);
      this.#paths++;
    }
  }

  /**
   * Breadth-first search from the sources in the residual graph. Entry v of the queue is "v
   * entered", entry -1 - v is "v left"; on a path these are the two ends of its saturated middle.
   *
   * @returns a vertex asked to change side that can be left, or -1: the paths are a largest family
   */
  #reach(): number {
    const { offsets, targets } = this.#graph;
    const stamp = ++this.#stamp;
    const into = this.#seenIn, out = this.#seenOut;
    const queue = this.#queue, succ = this.#succ, pred = this.#pred;
    let head = 0, tail = 0, work = 0;
    for (const v of this.#sources) {
      if (into[v] === stamp) continue;
      into[v] = stamp;
      this.#fromIn[v] = END;
      queue[tail++] = v;
    }
    while (head < tail) {
      const entry = queue[head++];
      if (entry >= 0) {
        const v = entry;
        const back = succ[v] === NONE ? v : pred[v];
        if (back < 0 || out[back] === stamp) continue;
        out[back] = stamp;
        this.#fromOut[back] = v;
        if (this.#change[back] > 0) {
          this.#meter.tick(work);
          return back;
        }
        queue[tail++] = -1 - back;
        continue;
      }
      const v = -1 - entry;
      if (succ[v] !== NONE && into[v] !== stamp) {
        into[v] = stamp;
        this.#fromIn[v] = v;
        queue[tail++] = v;
      }
      work += offsets[v + 1] - offsets[v];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (this.#open[u] === 0 || into[u] === stamp) continue;
        into[u] = stamp;
        this.#fromIn[u] = v;
        queue[tail++] = u;
      }
    }
    this.#meter.tick(work);
    return -1;
  }

  /** Augments along the search tree's path that leaves at `end`. */
  #shift(end: number): void {
    const added: number[] = [], removed: number[] = [];
    // Walk back: v is left; u is where it was entered from.
    for (let v = end;;) {
      let u = this.#fromOut[v];
      // u === v: an unused vertex is passed. Else the path's edge from v to u is given back.
      if (u !== v) removed.push(v, u);
      let from = this.#fromIn[u];
      while (from === u) {
        // u was entered from its own far half: the path's edge from u to its successor is given back.
        const w = this.#fromOut[u];
        removed.push(u, w);
        u = w;
        from = this.#fromIn[u];
      }
      added.push(from, u);
      if (from === END) break;
      v = from;
    }
    const log = (v: number): void => {
      this.#journal.push(v, this.#succ[v], this.#pred[v]);
    };
    for (let i = 0; i < removed.length; i += 2) {
      const v = removed[i], u = removed[i + 1];
      log(v);
      this.#succ[v] = NONE;
      log(u);
      this.#pred[u] = NONE;
    }
    for (let i = 0; i < added.length; i += 2) {
      const v = added[i], u = added[i + 1];
      if (v !== END) {
        log(v);
        this.#succ[v] = u;
      }
      log(u);
      this.#pred[u] = v;
    }
    log(end);
    this.#succ[end] = END;
  }

  /** A least vertex cut, read off the last search: entered but not left. */
  #cut(): number[] {
    this.#reach();
    const cut: number[] = [];
    for (let v = 0; v < this.#graph.n; v++) {
      if (this.#seenIn[v] === this.#stamp && this.#seenOut[v] !== this.#stamp) cut.push(v);
    }
    return cut;
  }

  /** How many of the odd cycles avoid the deleted vertices and the paths. */
  #clear(packing: readonly OddCycle[], deleted: Uint8Array): number {
    let count = 0;
    for (const { vertices } of packing) {
      let clear = true;
      for (let i = 0; clear && i < vertices.length; i++) {
        clear = deleted[vertices[i]] === 0 && this.#succ[vertices[i]] === NONE;
      }
      if (clear) count++;
      this.#meter.tick(vertices.length);
    }
    return count;
  }
}
