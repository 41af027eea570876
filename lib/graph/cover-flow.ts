/**
 * A maximum flow on the bipartite double cover of a graph that is kept maximum while vertices are
 * taken out, and put back by undoing. Each vertex v has a left copy, supplied with its capacity, and
 * a right copy, which takes as much; each edge uv carries flow from left u to right v and from left v
 * to right u without limit. With weights as capacities half the flow is the value of the half-integral
 * relaxation's dual: Σ c over the edges, 2c(uv) being the sum of both flows on uv.
 *
 * A first maximum flow costs as Dinic's algorithm does; taking a vertex out and raising the flow
 * again costs a few searches of O(n + m). Undoing costs what was changed.
 */
import type { Meter } from "../run/meter.ts";
import type { Graph } from "./graph.ts";

export class CoverFlow {
  readonly #graph: Graph;
  readonly #meter: Meter;
  /**
   * Length 2m + 3n: on edge e the flow from the tail's left copy at 2e and from the head's at 2e + 1;
   * then for each vertex the flow out of its left copy, into its right copy, and its capacity.
   */
  readonly #state: Float64Array;
  readonly #left: number;
  readonly #right: number;
  readonly #capacity: number;
  /** Length 2m: for each arc position the place of the flow from its start's left copy. */
  readonly #place: Int32Array;
  #total = 0;
  // Log of (place, value before), once for each place and level.
  readonly #places: number[] = [];
  readonly #before: number[] = [];
  readonly #loggedAt: Int32Array;
  #level = 0;
  // Scratch of the searches.
  readonly #leftLevel: Int32Array;
  readonly #rightLevel: Int32Array;
  readonly #leftNext: Int32Array;
  readonly #rightNext: Int32Array;
  readonly #queue: Int32Array;
  readonly #path: Int32Array;
  readonly #stops: Int32Array;

  /**
   * @param graph any graph; parallel edges do no harm
   * @param capacities length n, integers >= 0 with a sum below 2^53
   */
  constructor(graph: Graph, capacities: ArrayLike<number>, meter: Meter) {
    const { n, m, offsets, edgeOf, tails } = graph;
    this.#graph = graph;
    this.#meter = meter;
    this.#state = new Float64Array(2 * m + 3 * n);
    this.#left = 2 * m;
    this.#right = 2 * m + n;
    this.#capacity = 2 * m + 2 * n;
    for (let v = 0; v < n; v++) this.#state[this.#capacity + v] = capacities[v];
    this.#place = new Int32Array(2 * m);
    for (let v = 0; v < n; v++) {
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        this.#place[a] = 2 * edgeOf[a] + (tails[edgeOf[a]] === v ? 0 : 1);
      }
    }
    this.#loggedAt = new Int32Array(this.#state.length).fill(-1);
    this.#leftLevel = new Int32Array(n);
    this.#rightLevel = new Int32Array(n);
    this.#leftNext = new Int32Array(n);
    this.#rightNext = new Int32Array(n);
    this.#queue = new Int32Array(n);
    this.#path = new Int32Array(2 * n + 2);
    this.#stops = new Int32Array(n + 1);
  }

  /** The flow from left to right, at most the sum of the capacities. */
  get total(): number {
    return this.#total;
  }

  /** The doubled multiplier of an edge: the flow on it in both directions. */
  doubledCost(edge: number): number {
    return this.#state[2 * edge] + this.#state[2 * edge + 1];
  }

  /** What is left of a vertex's capacity; 0 for those taken out. */
  capacity(v: number): number {
    return this.#state[this.#capacity + v];
  }

  /** Opens a level: `undo` with the result brings back the state as it is now. */
  mark(): number {
    this.#level++;
    return this.#places.length;
  }

  /** Puts the state back to what it was at a mark. */
  undo(mark: number): void {
    const places = this.#places, before = this.#before, state = this.#state;
    while (places.length > mark) {
      const at = places.pop() as number, value = before.pop() as number;
      if (at < 0) this.#total = value;
      else state[at] = value;
    }
    this.#level++;
  }

  /** The edges whose doubled multiplier is not what it was at a mark. */
  changedSince(mark: number): number[] {
    const change = new Map<number, number>(), seen = new Set<number>();
    for (let i = mark; i < this.#places.length; i++) {
      const at = this.#places[i];
      if (at < 0 || at >= this.#left || seen.has(at)) continue;
      seen.add(at);
      const edge = at >> 1;
      change.set(edge, (change.get(edge) ?? 0) + this.#state[at] - this.#before[i]);
    }
    const edges: number[] = [];
    for (const [edge, by] of change) if (by !== 0) edges.push(edge);
    return edges;
  }

  /** Takes a vertex out: its capacity and all flow at it become 0. Takes out nothing twice. */
  takeOut(v: number): void {
    const { offsets, targets } = this.#graph;
    const state = this.#state;
    if (state[this.#capacity + v] === 0) return;
    this.#set(this.#capacity + v, 0);
    this.#meter.tick(offsets[v + 1] - offsets[v]);
    let lost = 0;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const out = this.#place[a], into = out ^ 1, u = targets[a];
      if (state[out] > 0) {
        lost += state[out];
        this.#set(this.#right + u, state[this.#right + u] - state[out]);
        this.#set(out, 0);
      }
      if (state[into] > 0) {
        lost += state[into];
        this.#set(this.#left + u, state[this.#left + u] - state[into]);
        this.#set(into, 0);
      }
    }
    this.#set(this.#left + v, 0);
    this.#set(this.#right + v, 0);
    this.#setTotal(this.#total - lost);
  }

  /**
   * Raises the flow to a maximum one, or until it is at least `enough` (Dinic, "Algorithm for
   * solution of a problem of maximum flow in networks with power estimation", 1970).
   */
  maximise(enough = Infinity): void {
    while (this.#total < enough && this.#layers()) this.#block(enough);
  }

  /**
   * Reads the relaxation's optimum off a maximum flow.
   *
   * @returns length n: 2 where every optimum chooses the vertex, 0 where every optimum leaves it or
   *   it was taken out, 1 where all-half is as good as anything. O(n + m) time.
   */
  values(): Uint8Array {
    const { n } = this.#graph;
    this.#layers();
    const value = new Uint8Array(n);
    for (let v = 0; v < n; v++) {
      if (this.#state[this.#capacity + v] === 0) continue;
      value[v] = this.#leftLevel[v] >= 0 ? 2 : this.#rightLevel[v] >= 0 ? 0 : 1;
    }
    return value;
  }

  #set(at: number, value: number): void {
    if (this.#loggedAt[at] !== this.#level) {
      this.#loggedAt[at] = this.#level;
      this.#places.push(at);
      this.#before.push(this.#state[at]);
    }
    this.#state[at] = value;
  }

  #setTotal(value: number): void {
    this.#places.push(-1);
    this.#before.push(this.#total);
    this.#total = value;
  }

  /** Breadth-first layers from the left copies with supply left; whether demand can be met. */
  #layers(): boolean {
    const { n, offsets, targets } = this.#graph;
    const state = this.#state, place = this.#place, queue = this.#queue;
    const leftLevel = this.#leftLevel.fill(-1), rightLevel = this.#rightLevel.fill(-1);
    const left = this.#left, right = this.#right, capacity = this.#capacity;
    let head = 0, tail = 0, found = false;
    for (let v = 0; v < n; v++) {
      if (state[left + v] < state[capacity + v]) {
        leftLevel[v] = 0;
        queue[tail++] = v;
      }
    }
    while (head < tail && !found) {
      for (const end = tail; head < end; head++) {
        const v = queue[head], level = leftLevel[v];
        let work = offsets[v + 1] - offsets[v];
        for (let a = offsets[v]; a < offsets[v + 1]; a++) {
          const u = targets[a];
          if (rightLevel[u] >= 0 || state[capacity + u] === 0) continue;
          rightLevel[u] = level + 1;
          if (state[right + u] < state[capacity + u]) found = true;
          work += offsets[u + 1] - offsets[u];
          for (let b = offsets[u]; b < offsets[u + 1]; b++) {
            const w = targets[b];
            // Flow from left w into right u stands where the arc b, seen from u, comes in.
            if (leftLevel[w] < 0 && state[place[b] ^ 1] > 0) {
              leftLevel[w] = level + 2;
              queue[tail++] = w;
            }
          }
        }
        this.#meter.tick(work);
      }
    }
    this.#meter.tick(n);
    return found;
  }

  /** A blocking flow in the layers, depth first with current arcs. */
  #block(enough: number): void {
    const { n, offsets, targets } = this.#graph;
    const state = this.#state, place = this.#place, path = this.#path, stops = this.#stops;
    const leftLevel = this.#leftLevel, rightLevel = this.#rightLevel;
    const leftNext = this.#leftNext, rightNext = this.#rightNext;
    const left = this.#left, right = this.#right, capacity = this.#capacity;
    leftNext.set(offsets.subarray(0, n));
    rightNext.set(offsets.subarray(0, n));
    for (let root = 0; root < n && this.#total < enough; root++) {
      if (leftLevel[root] !== 0) continue;
      // path[2i]: flow place raised on the way right, path[2i + 1]: place lowered on the way back;
      // stops[i]: the left vertex after i steps.
      let depth = 0, v = root;
      stops[0] = root;
      while (state[left + root] < state[capacity + root]) {
        let a = leftNext[v];
        const start = a, end = offsets[v + 1], want = leftLevel[v] + 1;
        while (a < end && rightLevel[targets[a]] !== want) a++;
        leftNext[v] = a;
        this.#meter.tick(1 + a - start);
        if (a === end) {
          if (depth === 0) break;
          depth--;
          v = stops[depth];
          // The way over that right vertex's flow is exhausted; its next arc is tried.
          rightNext[targets[leftNext[v]]]++;
          continue;
        }
        const u = targets[a];
        const room = state[capacity + u] - state[right + u];
        if (room > 0) {
          let by = Math.min(room, state[capacity + root] - state[left + root]);
          for (let i = 0; i < depth; i++) by = Math.min(by, state[path[2 * i + 1]]);
          this.#set(left + root, state[left + root] + by);
          this.#set(right + u, state[right + u] + by);
          this.#set(place[a], state[place[a]] + by);
          let back = depth;
          for (let i = depth - 1; i >= 0; i--) {
            this.#set(path[2 * i], state[path[2 * i]] + by);
            this.#set(path[2 * i + 1], state[path[2 * i + 1]] - by);
            if (state[path[2 * i + 1]] === 0) back = i;
          }
          this.#setTotal(this.#total + by);
          this.#meter.tick(2 * depth + 1);
          if (this.#total >= enough) return;
          depth = back;
          v = stops[depth];
          continue;
        }
        let b = rightNext[u];
        const first = b, last = offsets[u + 1];
        while (b < last && !(leftLevel[targets[b]] === want + 1 && state[place[b] ^ 1] > 0)) b++;
        rightNext[u] = b;
        this.#meter.tick(1 + b - first);
        if (b === last) {
          leftNext[v] = a + 1;
          continue;
        }
        path[2 * depth] = place[a];
        path[2 * depth + 1] = place[b] ^ 1;
        depth++;
        v = targets[b];
        stops[depth] = v;
      }
    }
  }
}
