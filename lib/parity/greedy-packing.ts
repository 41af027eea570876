/**
 * Vertex-disjoint odd cycles, picked greedily, short ones first: a lower bound on the odd cycle
 * packing number and on every transversal. The work is bounded by a small multiple of the size, so
 * the packing need not be maximal on very large graphs; it is always valid.
 */
import type { Graph } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";
import { closeCycle, type OddCycle } from "./balance.ts";

/** Arcs scanned in each of the two phases, for each arc of the graph, before the phase ends. */
const BALL_SCANS_PER_ARC = 8;
const WHOLE_SCANS_PER_ARC = 40;
/** Arcs that each phase may scan whatever the size of the graph. */
const SCANS_AT_LEAST = 5_000_000;

/**
 * Picks disjoint odd cycles.
 *
 * Phase 1 looks in balls of growing radius around each vertex and takes the first odd cycle a ball
 * holds; phase 2 takes the first odd cycle that a search without bound closes. Either ends when no
 * odd cycle is left or its work is spent.
 *
 * @param graph any graph
 * @param even length m, nonzero where an edge is even; absent: every edge is odd
 * @param keep length n; vertices with 0 are left out (default: none)
 * @returns simple odd cycles, no two with a common vertex. O(n + m) time with a constant near 50.
 */
export function greedyOddCycles(
  graph: Graph,
  meter: Meter,
  even?: Uint8Array,
  keep?: Uint8Array,
): OddCycle[] {
  const { n, m } = graph;
  const free = keep === undefined ? new Uint8Array(n).fill(1) : Uint8Array.from(keep);
  const cycles: OddCycle[] = [];
  const take = (cycle: OddCycle): void => {
    for (const v of cycle.vertices) free[v] = 0;
    cycles.push(cycle);
  };
  const allowance = (perArc: number): number => Math.max(perArc * 2 * m, SCANS_AT_LEAST);
  const balls = new Balls(graph, even, free);
  for (let radius = 1, left = allowance(BALL_SCANS_PER_ARC); radius < n && left > 0;) {
    let whole = true;
    for (let root = 0; root < n && left > 0; root++) {
      if (free[root] === 0) continue;
      const cycle = balls.search(root, radius);
      left -= balls.scanned;
      meter.tick(1 + balls.scanned);
      if (cycle !== undefined) take(cycle);
      if (balls.exhausted) balls.setAside();
      else whole = false;
    }
    if (whole && left > 0) return cycles;
    radius = Math.ceil(radius * 1.5);
  }
  for (let root = 0, left = allowance(WHOLE_SCANS_PER_ARC); root < n && left > 0;) {
    if (free[root] === 0) {
      root++;
      continue;
    }
    const cycle = balls.search(root, n);
    left -= balls.scanned;
    meter.tick(1 + balls.scanned);
    if (cycle === undefined) balls.setAside();
    else take(cycle);
  }
  return cycles;
}

/** Breadth-first search in balls; scratch is shared, each search costs only what it sees. */
class Balls {
  /** Arcs scanned by the last search. */
  scanned = 0;
  /** Whether the last search saw all that can be reached and found it balanced. */
  exhausted = false;
  readonly #stamp: Int32Array;
  readonly #side: Uint8Array;
  readonly #depth: Int32Array;
  readonly #parentEdge: Int32Array;
  readonly #queue: Int32Array;
  #now = 0;
  /** How many entries of the queue the last search filled, if it found no odd cycle. */
  #seen = 0;

  constructor(
    readonly graph: Graph,
    readonly even: Uint8Array | undefined,
    readonly free: Uint8Array,
  ) {
    this.#stamp = new Int32Array(graph.n);
    this.#side = new Uint8Array(graph.n);
    this.#depth = new Int32Array(graph.n);
    this.#parentEdge = new Int32Array(graph.n);
    this.#queue = new Int32Array(graph.n);
  }

  /** Takes what the last search saw, all of a balanced component, out of the search. */
  setAside(): void {
    for (let i = 0; i < this.#seen; i++) this.free[this.#queue[i]] = 0;
  }

  /** The odd cycle closed first within `radius` steps of the root. */
  search(root: number, radius: number): OddCycle | undefined {
    const { offsets, targets, edgeOf } = this.graph;
    const stamp = this.#stamp, side = this.#side, depth = this.#depth, queue = this.#queue;
    const now = ++this.#now;
    let head = 0, tail = 0;
    queue[tail++] = root;
    stamp[root] = now;
    side[root] = 0;
    depth[root] = 0;
    this.scanned = 0;
    this.exhausted = true;
    this.#seen = 0;
    while (head < tail) {
      const v = queue[head++];
      this.scanned += offsets[v + 1] - offsets[v];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a], e = edgeOf[a];
        if (this.free[u] === 0) continue;
        const want = side[v] ^ (this.even !== undefined && this.even[e] !== 0 ? 0 : 1);
        if (stamp[u] !== now) {
          if (depth[v] === radius) {
            this.exhausted = false;
            continue;
          }
          stamp[u] = now;
          side[u] = want;
          depth[u] = depth[v] + 1;
          this.#parentEdge[u] = e;
          queue[tail++] = u;
        } else if (side[u] !== want) {
          this.exhausted = false;
          return closeCycle(this.graph, this.#parentEdge, depth, e);
        }
      }
    }
    this.#seen = tail;
    return undefined;
  }
}
