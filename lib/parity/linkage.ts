/**
 * Two disjoint paths with given ends: decides whether a graph has vertex-disjoint paths from s1 to
 * t1 and from s2 to t2.
 *
 * A set of at most three vertices that cuts a connected part without ends off may be given the
 * edges of a triangle instead of the part: one path at most can use it. Once no such part is left,
 * the paths exist unless the graph can be drawn in a disc with s1, s2, t1, t2 on its rim in this
 * order (P. Seymour, "Disjoint paths in graphs", Discrete Math. 29, 1980; C. Thomassen, "2-linked
 * graphs", European J. Combin. 1, 1980), that is, unless it stays planar when a wheel with this rim
 * is added.
 *
 * The parts are found as in graph/separations.ts: the vertices known to have four paths to the four
 * ends, disjoint but for their start, form a core; four such paths to the core will do as well, and
 * next to the core they are short. Near-linear in practice, O(n (n + m)) at worst.
 */
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import { planarRotation } from "../graph/planarity.ts";
import type { Meter } from "../run/meter.ts";

const NONE = -1;
/** In `succ`: the path ends here. In `pred`: it begins beside here, at the vertex searched from. */
const END = -2;

/**
 * Decides the question.
 *
 * @param graph any graph; parallel edges do no harm
 * @param ends s1, t1, s2, t2: four different vertices
 * @param meter counts about one unit for each arc scanned
 * @returns whether there are disjoint paths from s1 to t1 and from s2 to t2
 * @throws {Interrupted} when the meter runs out
 */
export function linked(
  graph: Graph,
  ends: readonly [number, number, number, number],
  meter: Meter,
): boolean {
  if (new Set(ends).size !== 4) throw new RangeError("expected four different ends");
  const [s1, t1, s2, t2] = ends;
  if (pathBeside(graph, s1, t1, [s2, t2], meter)) return true;
  if (pathBeside(graph, s2, t2, [s1, t1], meter)) return true;
  return !planarRotationWithWheel(new Web(graph, ends, meter).reduced(), meter);
}

/** Whether a shortest path from s to t that avoids two vertices leaves these connected. */
function pathBeside(
  graph: Graph,
  s: number,
  t: number,
  others: readonly [number, number],
  meter: Meter,
): boolean {
  const blocked = new Uint8Array(graph.n);
  blocked[others[0]] = blocked[others[1]] = 1;
  const path = shortestPath(graph, s, t, blocked, meter);
  if (path === undefined) return false;
  blocked.fill(0);
  for (const v of path) blocked[v] = 1;
  return shortestPath(graph, others[0], others[1], blocked, meter) !== undefined;
}

function shortestPath(
  graph: Graph,
  s: number,
  t: number,
  blocked: Uint8Array,
  meter: Meter,
): number[] | undefined {
  const { n, offsets, targets } = graph;
  const parent = new Int32Array(n).fill(NONE), queue = new Int32Array(n);
  let head = 0, tail = 0;
  queue[tail++] = s;
  parent[s] = s;
  while (head < tail && parent[t] === NONE) {
    const v = queue[head++];
    meter.tick(1 + offsets[v + 1] - offsets[v]);
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (blocked[u] !== 0 || parent[u] !== NONE) continue;
      parent[u] = v;
      queue[tail++] = u;
    }
  }
  if (parent[t] === NONE) return undefined;
  const path = [t];
  for (let v = t; v !== s; v = parent[v]) path.push(parent[v]);
  return path;
}

/** What is left of a graph whose ends are the vertices 0 to 3, in the order s1, s2, t1, t2. */
function planarRotationWithWheel(graph: Graph, meter: Meter): boolean {
  const hub = graph.n;
  const tails = [...graph.tails], heads = [...graph.heads];
  for (let i = 0; i < 4; i++) {
    tails.push(i, i);
    heads.push((i + 1) % 4, hub);
  }
  const withWheel = graphFromEdges(hub + 1, Int32Array.from(tails), Int32Array.from(heads));
  return planarRotation(withWheel, meter) !== undefined;
}

/** The graph while parts without ends are replaced. */
class Web {
  readonly #meter: Meter;
  readonly #ends: readonly [number, number, number, number];
  readonly #near: number[][];
  readonly #gone: Uint8Array;
  /** Length n: 1 for the ends and the vertices known to have four disjoint paths to them. */
  readonly #core: Uint8Array;
  // Disjoint paths of the search at hand, and the vertices to clear after it.
  readonly #succ: Int32Array;
  readonly #pred: Int32Array;
  readonly #touched: number[] = [];
  readonly #seenIn: Int32Array;
  readonly #seenOut: Int32Array;
  readonly #fromIn: Int32Array;
  readonly #fromOut: Int32Array;
  #stamp = 0;

  constructor(graph: Graph, ends: readonly [number, number, number, number], meter: Meter) {
    const { n, offsets, targets } = graph;
    this.#meter = meter;
    this.#ends = ends;
    this.#near = Array.from(
      { length: n },
      (_, v) => Array.from(targets.subarray(offsets[v], offsets[v + 1])),
    );
    this.#gone = new Uint8Array(n);
    this.#core = new Uint8Array(n);
    for (const v of ends) this.#core[v] = 1;
    this.#succ = new Int32Array(n).fill(NONE);
    this.#pred = new Int32Array(n).fill(NONE);
    this.#seenIn = new Int32Array(n);
    this.#seenOut = new Int32Array(n);
    this.#fromIn = new Int32Array(n);
    this.#fromOut = new Int32Array(n);
  }

  /** The graph without parts that at most three vertices cut off from the ends. */
  reduced(): Graph {
    // Vertices wait in the order in which the core comes near; those it never reaches come last.
    const n = this.#near.length;
    const waiting: number[] = [];
    const queued = new Uint8Array(n);
    const enqueue = (v: number): void => {
      if (queued[v] !== 0 || this.#core[v] !== 0 || this.#gone[v] !== 0) return;
      queued[v] = 1;
      waiting.push(v);
    };
    for (const v of this.#ends) for (const u of this.#near[v]) enqueue(u);
    let unreached = 0;
    for (let head = 0;; head++) {
      if (head === waiting.length) {
        while (unreached < n && queued[unreached] !== 0) unreached++;
        if (unreached === n) break;
        enqueue(unreached++);
        if (head === waiting.length) {
          head--;
          continue;
        }
      }
      const v = waiting[head];
      queued[v] = 0;
      if (this.#gone[v] !== 0 || this.#core[v] !== 0) continue;
      const cut = this.#fan(v);
      if (cut === undefined) {
        this.#core[v] = 1;
        for (const u of this.#near[v]) enqueue(u);
      } else {
        this.#replace(v, cut);
        for (const u of cut) enqueue(u);
      }
    }
    return this.#result();
  }

  /**
   * Looks for four paths from v to different vertices of the core, disjoint except at v.
   *
   * @returns undefined if there are; else at most three vertices that separate v from the core
   */
  #fan(v: number): number[] | undefined {
    let paths = 0;
    while (paths < 4 && this.#augment(v)) paths++;
    const cut: number[] = [];
    if (paths < 4) {
      for (const u of this.#seen) {
        if (this.#seenIn[u] === this.#stamp && this.#seenOut[u] !== this.#stamp) cut.push(u);
      }
    }
    for (const u of this.#touched) this.#succ[u] = this.#pred[u] = NONE;
    this.#touched.length = 0;
    return paths < 4 ? cut : undefined;
  }

  /** Vertices entered in the last search. */
  #seen: number[] = [];

  /** One more path from v to the core, by breadth-first search in the residual graph. */
  #augment(v: number): boolean {
    const stamp = ++this.#stamp;
    const into = this.#seenIn, out = this.#seenOut, succ = this.#succ, pred = this.#pred;
    const queue: number[] = [-1 - v];
    this.#seen = [];
    into[v] = out[v] = stamp;
    let work = 0;
    for (let head = 0; head < queue.length; head++) {
      const entry = queue[head];
      if (entry >= 0) {
        const u = entry;
        if (succ[u] === NONE && this.#core[u] !== 0) {
          this.#meter.tick(work);
          this.#shift(u);
          return true;
        }
        const back = succ[u] === NONE ? u : pred[u];
        if (back < 0 || out[back] === stamp) continue;
        out[back] = stamp;
        this.#fromOut[back] = u;
        queue.push(-1 - back);
        continue;
      }
      const u = -1 - entry;
      if (succ[u] !== NONE && into[u] !== stamp) {
        into[u] = stamp;
        this.#fromIn[u] = u;
        this.#seen.push(u);
        queue.push(u);
      }
      work += this.#near[u].length;
      for (const w of this.#near[u]) {
        if (this.#gone[w] !== 0 || into[w] === stamp) continue;
        into[w] = stamp;
        this.#fromIn[w] = u === v ? END : u;
        this.#seen.push(w);
        queue.push(w);
      }
    }
    this.#meter.tick(work);
    return false;
  }

  /** Augments along the search tree's path to an unused vertex of the core. */
  #shift(end: number): void {
    const added: number[] = [], removed: number[] = [];
    let u = end;
    for (;;) {
      let from = this.#fromIn[u];
      while (from === u) {
        const w = this.#fromOut[u];
        removed.push(u, w);
        u = w;
        from = this.#fromIn[u];
      }
      added.push(from, u);
      if (from === END) break;
      const next = this.#fromOut[from];
      if (next !== from) removed.push(from, next);
      u = next;
    }
    const { succ, pred } = { succ: this.#succ, pred: this.#pred };
    for (let i = 0; i < removed.length; i += 2) {
      succ[removed[i]] = NONE;
      pred[removed[i + 1]] = NONE;
    }
    for (let i = 0; i < added.length; i += 2) {
      const v = added[i], w = added[i + 1];
      if (v !== END) succ[v] = w;
      pred[w] = v;
      this.#touched.push(w);
    }
    succ[end] = END;
  }

  /** Takes out the part of v behind the cut and joins its neighbours to each other. */
  #replace(v: number, cut: readonly number[]): void {
    const wall = new Set(cut);
    const attachments = new Set<number>();
    const part = [v];
    this.#gone[v] = 1;
    for (let head = 0; head < part.length; head++) {
      const near = this.#near[part[head]];
      this.#meter.tick(near.length);
      for (const u of near) {
        if (this.#gone[u] !== 0) continue;
        if (wall.has(u)) {
          attachments.add(u);
        } else {
          this.#gone[u] = 1;
          part.push(u);
        }
      }
      this.#near[part[head]] = [];
    }
    const list = [...attachments];
    for (const a of list) {
      for (const b of list) if (a !== b) this.#near[a].push(b);
    }
  }

  #result(): Graph {
    const [s1, t1, s2, t2] = this.#ends;
    const n = this.#near.length;
    const index = new Int32Array(n).fill(-1);
    [s1, s2, t1, t2].forEach((v, i) => index[v] = i);
    let count = 4;
    for (let v = 0; v < n; v++) if (this.#gone[v] === 0 && index[v] < 0) index[v] = count++;
    const tails: number[] = [], heads: number[] = [];
    const joined = new Int32Array(n).fill(-1);
    for (let v = 0; v < n; v++) {
      if (this.#gone[v] !== 0) continue;
      for (const u of this.#near[v]) {
        if (u <= v || this.#gone[u] !== 0 || joined[u] === v) continue;
        joined[u] = v;
        tails.push(index[v]);
        heads.push(index[u]);
      }
    }
    return graphFromEdges(count, Int32Array.from(tails), Int32Array.from(heads));
  }
}
