/**
 * Finds the bipartite side around a vertex by a few disjoint paths in the bipartite double cover.
 *
 * A *side* is a connected set D of vertices with at most three neighbours outside, its
 * *attachments*, such that D with them, but without the edges between them, is bipartite. In the
 * bipartite double cover G × K₂ (node 2v + s is v on sheet s; both ends of an edge lie on different
 * sheets) a side lifts to two disjoint copies, each with three neighbours, and conversely: a set
 * around (v, 0) with at most three neighbours that can be cut off from its own mirror image is the
 * copy of a side, unless both copies of one attachment are among the three (a *twisted* set: D is
 * bipartite, but not together with that attachment).
 *
 * Vertices of the *core* are known to lie in no side. With targets "the mirror image, and every copy
 * of a core vertex once", four paths from (v, 0), disjoint except at their start, prove that v lies
 * in no side; if there are fewer, what can still be reached is the least side around v (K. Menger,
 * "Zur allgemeinen Kurventheorie", Fund. Math. 10, 1927). That the least set cut off does not meet its mirror image follows from
 * posimodularity of the number of neighbours. Growing is exact too: a side that contains D and its
 * attachment t is found by searching from both, and if there is none there is none later.
 *
 * A search costs, up to its limit, what its at most four breadth-first searches touch, which is little where the core
 * is near; memory is 40 bytes a vertex.
 */
import type { Graph } from "./graph.ts";

/** A side as nodes of the cover. */
export interface CoverSide {
  /** One copy of each vertex inside. */
  readonly inside: number[];
  /** Its at most three neighbours, copies of different vertices. */
  readonly attachments: number[];
  /** Whether growing it ended at a twisted set, so that another order might have grown it further. */
  readonly twisted: boolean;
  /** Whether growing it ended at the limit of work. */
  readonly short: boolean;
}

/** Work that growing may take in all for each vertex already inside. */
const WORK_OF_SIZE = 300;

/** No path, and the start of a path. */
const NONE = -1, START = -2;

export class SideSearch {
  /** Length n: 1 for vertices known to lie in no side (or counted as such by the caller). */
  readonly core: Uint8Array;
  readonly #graph: Graph;
  readonly #tick: (units: number) => void;
  readonly #mayAttach: Uint8Array | undefined;
  /** Length 2n: the epoch in which a node was in the set searched from. */
  readonly #source: Int32Array;
  #sourceEpoch = 0;
  /** Length 4n: state 2x is node x entered, 2x + 1 node x left; the epoch it was reached in. */
  readonly #seen: Int32Array;
  #epoch = 0;
  /** Most work for one search. */
  #limit = 0;
  /** Work done since growing began. */
  #spent = 0;
  /** Length 4n: the state before, START for entries straight from the set. */
  readonly #parent: Int32Array;
  /** Length 2n: the node after and before on a path, NONE off the paths. */
  readonly #after: Int32Array;
  readonly #before: Int32Array;
  readonly #touched: number[] = [];
  readonly #queue: Int32Array;

  /**
   * @param graph any simple graph
   * @param tick called with the work done, about one unit for each arc scanned
   * @param mayAttach length n: 0 for vertices that no side returned may have as attachments
   */
  constructor(graph: Graph, tick: (units: number) => void, mayAttach?: Uint8Array) {
    const { n } = graph;
    this.#graph = graph;
    this.#tick = tick;
    this.#mayAttach = mayAttach;
    this.core = new Uint8Array(n);
    this.#source = new Int32Array(2 * n);
    this.#seen = new Int32Array(4 * n);
    this.#parent = new Int32Array(4 * n);
    this.#after = new Int32Array(2 * n).fill(NONE);
    this.#before = new Int32Array(2 * n).fill(NONE);
    this.#queue = new Int32Array(4 * n);
  }

  /**
   * The side around a vertex, grown as far as it goes.
   *
   * @param v a vertex outside the core
   * @param limit most work for one search from v
   * @param growing most work for all searches from more than v, beside what the size allows
   * @returns the side; "core" when v lies in no side, "barred" when the sides found around it hang on
   *   vertices that may not be attachments, "twisted" when the least set around v is, "dear" when
   *   the limit came first
   */
  around(
    v: number,
    limit: number,
    growing: number,
  ): CoverSide | "core" | "barred" | "twisted" | "dear" {
    this.#sourceEpoch++;
    this.#source[2 * v] = this.#sourceEpoch;
    this.#limit = limit;
    const inside = [2 * v];
    const first = this.#cut(this.#entries(2 * v, []), inside);
    if (first === undefined) return "core";
    if (first === "dear") return "dear";
    let attachments = first;
    if (isTwisted(attachments)) return "twisted";
    for (const x of inside) this.#source[x] = this.#sourceEpoch;
    const failed = new Set<number>();
    let twisted = false, short = false;
    // The largest so far whose attachments are allowed.
    let size = 0, best: number[] = [];
    const keep = (): void => {
      if (attachments.some((x) => this.#mayAttach?.[x >> 1] === 0)) return;
      size = inside.length;
      best = attachments;
    };
    keep();
    this.#spent = 0;
    for (let i = 0; i < attachments.length;) {
      const t = attachments[i];
      if (this.core[t >> 1] !== 0 || failed.has(t)) {
        i++;
        continue;
      }
      const grown = [t];
      this.#source[t] = this.#sourceEpoch;
      this.#limit = growing + WORK_OF_SIZE * inside.length - this.#spent;
      const wider = this.#cut(this.#entries(t, attachments), grown);
      if (wider === undefined || wider === "dear" || isTwisted(wider)) {
        this.#source[t] = 0;
        failed.add(t);
        if (wider === "dear") short = true;
        else if (wider !== undefined) twisted = true;
        i++;
        continue;
      }
      for (const x of grown) {
        this.#source[x] = this.#sourceEpoch;
        inside.push(x);
      }
      attachments = wider;
      keep();
      i = 0;
    }
    if (size === 0) return "barred";
    return { inside: inside.slice(0, size), attachments: best, twisted, short };
  }

  /** Where paths may start once t is in the set: its neighbours, and the other attachments. */
  #entries(t: number, attachments: readonly number[]): number[] {
    const { offsets, targets } = this.#graph;
    const entries = attachments.filter((x) => x !== t);
    const v = t >> 1, sheet = 1 - (t & 1);
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const x = 2 * targets[a] + sheet;
      if (this.#source[x] !== this.#sourceEpoch) entries.push(x);
    }
    return entries;
  }

  /**
   * The nodes that cut the set off from the targets, if at most three do.
   *
   * @param entries first nodes of the paths
   * @param grown the nodes cut off together with the set are added here
   */
  #cut(entries: readonly number[], grown: number[]): number[] | "dear" | undefined {
    // The set next to its own mirror image cannot be cut off.
    if (entries.some((x) => this.#source[x ^ 1] === this.#sourceEpoch)) return undefined;
    let paths = 0;
    while (paths < 4) {
      const reached = this.#search(entries);
      if (reached !== undefined) {
        this.#release();
        return reached < 0 ? "dear" : this.#collect(reached, entries, grown);
      }
      paths++;
    }
    this.#release();
    return undefined;
  }

  /** One more path; or the number of states reached when there is none, -1 beyond the limit. */
  #search(entries: readonly number[]): number | undefined {
    const { offsets, targets } = this.#graph;
    const seen = this.#seen, parent = this.#parent, queue = this.#queue;
    const before = this.#before, after = this.#after, core = this.core;
    const source = this.#source, sourceEpoch = this.#sourceEpoch;
    const epoch = ++this.#epoch, limit = this.#limit;
    let tail = 0, work = 0;
    // Enters node x from a state; true when a path ends there.
    const enter = (x: number, from: number): boolean => {
      if (seen[2 * x] === epoch) return false;
      seen[2 * x] = epoch;
      parent[2 * x] = from;
      const onPath = before[x] !== NONE;
      if (source[x ^ 1] === sourceEpoch || (core[x >> 1] !== 0 && !onPath)) {
        this.#trace(x);
        return true;
      }
      if (onPath) {
        queue[tail++] = 2 * x;
      } else {
        seen[2 * x + 1] = epoch;
        parent[2 * x + 1] = 2 * x;
        queue[tail++] = 2 * x + 1;
      }
      return false;
    };
    for (const x of entries) if (before[x] !== START && enter(x, START)) return undefined;
    // A path that starts at an entry uses it up; it can still be entered in passing.
    for (let head = 0; head < tail; head++) {
      const state = queue[head], x = state >> 1;
      if ((state & 1) === 0) {
        // Entered on a path: give back the step that led here.
        const p = before[x];
        if (p !== START && seen[2 * p + 1] !== epoch) {
          seen[2 * p + 1] = epoch;
          parent[2 * p + 1] = state;
          queue[tail++] = 2 * p + 1;
        }
        continue;
      }
      const v = x >> 1, sheet = 1 - (x & 1);
      if (before[x] !== NONE && seen[2 * x] !== epoch) {
        seen[2 * x] = epoch;
        parent[2 * x] = state;
        queue[tail++] = 2 * x;
      }
      work += 1 + offsets[v + 1] - offsets[v];
      if (work > limit) {
        this.#count(work);
        return -1;
      }
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const y = 2 * targets[a] + sheet;
        if (source[y] === sourceEpoch || after[x] === y) continue;
        if (enter(y, state)) {
          this.#count(work);
          return undefined;
        }
      }
    }
    this.#count(work + 1);
    return tail;
  }

  #count(work: number): void {
    this.#spent += work;
    this.#tick(work);
  }

  /** Turns the states that lead to an entered node into a change of the paths. */
  #trace(end: number): void {
    const parent = this.#parent, before = this.#before, after = this.#after;
    const steps: number[] = [];
    for (let state = 2 * end;;) {
      const from = parent[state];
      if ((state & 1) === 0) {
        // Entered: straight from the set, by a step, or back through the node itself.
        if (from === START || from >> 1 !== state >> 1) {
          steps.push(from === START ? START : from >> 1, state >> 1);
        }
      } else if (from >> 1 !== state >> 1) {
        // Left by giving back the step from here to the node entered.
        after[state >> 1] = NONE;
        before[from >> 1] = NONE;
      }
      if (from === START) break;
      state = from;
    }
    for (let i = 0; i < steps.length; i += 2) {
      const [x, y] = [steps[i], steps[i + 1]];
      before[y] = x;
      this.#touched.push(y);
      if (x !== START) {
        after[x] = y;
        this.#touched.push(x);
      }
    }
  }

  /** After the last search: the nodes left are cut off, those entered and not left cut. */
  #collect(states: number, entries: readonly number[], grown: number[]): number[] {
    const cut: number[] = [];
    for (let i = 0; i < states; i++) {
      const state = this.#queue[i], x = state >> 1;
      if ((state & 1) !== 0) grown.push(x);
      else if (this.#seen[2 * x + 1] !== this.#epoch) cut.push(x);
    }
    // An entry whose path starts there is not entered anew; it cuts unless it is cut off itself.
    for (const x of entries) {
      if (this.#seen[2 * x + 1] !== this.#epoch && !cut.includes(x)) cut.push(x);
    }
    return cut;
  }

  #release(): void {
    for (const x of this.#touched) this.#after[x] = this.#before[x] = NONE;
    this.#touched.length = 0;
  }
}

/** Whether two of the nodes are copies of one vertex. */
function isTwisted(nodes: readonly number[]): boolean {
  return nodes.some((x, i) => nodes.indexOf(x ^ 1) > i);
}
