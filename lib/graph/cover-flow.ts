/**
 * A maximum flow on the bipartite double cover of a graph that is kept maximum while vertices are
 * taken out, and put back by undoing. Each vertex v has a left copy, supplied with its capacity, and
 * a right copy, which takes as much; each edge uv carries flow from left u to right v and from left v
 * to right u without limit. With weights as capacities half the flow is the value of the half-integral
 * relaxation's dual: Σ c over the edges, 2c(uv) being the sum of both flows on uv.
 *
 * The first maximum flow is found along shortest augmenting paths; taking a vertex out and raising the
 * flow again costs one search of O(n + m) and repairs of distance labels near what changed. Undoing costs what was changed.
 */
import type { Meter } from "../run/meter.ts";
import type { Graph } from "./graph.ts";

/** The flow, its graph, and the log that takes changes back. All its fields are private. */
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
  readonly #leftLabel: Int32Array;
  readonly #rightLabel: Int32Array;
  /** How many copies have each label. */
  readonly #count: Int32Array;
  /** The label of copies from which no demand can be reached. */
  readonly #far: number;
  readonly #leftNext: Int32Array;
  readonly #rightNext: Int32Array;
  readonly #queue: Int32Array;
  readonly #path: Int32Array;
  readonly #stops: Int32Array;

  /**
   * Starts with no flow at all.
   *
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
    this.#leftLabel = new Int32Array(n);
    this.#rightLabel = new Int32Array(n);
    this.#far = 2 * n + 2;
    this.#count = new Int32Array(2 * n + 3);
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
   * Raises the flow to a maximum one, or until it is at least `enough`, along shortest paths with
   * distance labels that are repaired where they change (R. Ahuja and J. Orlin, "Distance-directed
   * augmenting path algorithms", Naval Research Logistics 38, 1991; written from memory).
   */
  maximise(enough = Infinity): void {
    if (this.#total >= enough) return;
    this.#label();
    const { n } = this.#graph;
    for (let root = 0; root < n && this.#total < enough; root++) {
      if (this.#state[this.#left + root] < this.#state[this.#capacity + root]) {
        this.#saturate(root, enough);
      }
    }
  }

  /**
   * Reads the relaxation's optimum off a maximum flow.
   *
   * @returns length n: 2 where every optimum chooses the vertex, 0 where every optimum leaves it or
   *   it was taken out, 1 where all-half is as good as anything. O(n + m) time.
   */
  values(): Uint8Array {
    const { n } = this.#graph;
    this.#reach();
    const value = new Uint8Array(n);
    for (let v = 0; v < n; v++) {
      if (this.#state[this.#capacity + v] === 0) continue;
      value[v] = this.#leftLabel[v] > 0 ? 2 : this.#rightLabel[v] > 0 ? 0 : 1;
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

  /** Marks with 1 what the left copies with supply left reach in the residual network. */
  #reach(): void {
    const { n, offsets, targets } = this.#graph;
    const state = this.#state, place = this.#place, queue = this.#queue;
    const left = this.#leftLabel.fill(0), right = this.#rightLabel.fill(0);
    let tail = 0;
    for (let v = 0; v < n; v++) {
      if (state[this.#left + v] < state[this.#capacity + v]) {
        left[v] = 1;
        queue[tail++] = v;
      }
    }
    for (let head = 0; head < tail; head++) {
      const v = queue[head];
      let work = 1 + offsets[v + 1] - offsets[v];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (right[u] !== 0 || state[this.#capacity + u] === 0) continue;
        right[u] = 1;
        work += offsets[u + 1] - offsets[u];
        for (let b = offsets[u]; b < offsets[u + 1]; b++) {
          const w = targets[b];
          // Flow from left w into right u stands where the arc b, seen from u, comes in.
          if (left[w] === 0 && state[place[b] ^ 1] > 0) {
            left[w] = 1;
            queue[tail++] = w;
          }
        }
      }
      this.#meter.tick(work);
    }
    this.#meter.tick(n);
  }

  /** Exact distances to unmet demand, by breadth-first search backwards; `#far` where there is none. */
  #label(): void {
    const { n, offsets, targets } = this.#graph;
    const state = this.#state, place = this.#place, queue = this.#queue;
    const left = this.#leftLabel.fill(this.#far), right = this.#rightLabel.fill(this.#far);
    this.#leftNext.set(offsets.subarray(0, n));
    this.#rightNext.set(offsets.subarray(0, n));
    const count = this.#count.fill(0);
    let tail = 0;
    for (let u = 0; u < n; u++) {
      if (state[this.#right + u] < state[this.#capacity + u]) {
        right[u] = 1;
        count[1]++;
        queue[tail++] = u;
      }
    }
    // The queue holds right copies only; between two of them there is one left copy.
    for (let head = 0; head < tail; head++) {
      const u = queue[head], distance = right[u];
      let work = 1 + offsets[u + 1] - offsets[u];
      for (let b = offsets[u]; b < offsets[u + 1]; b++) {
        const v = targets[b];
        if (left[v] < this.#far || state[this.#capacity + v] === 0) continue;
        left[v] = distance + 1;
        count[distance + 1]++;
        work += offsets[v + 1] - offsets[v];
        for (let a = offsets[v]; a < offsets[v + 1]; a++) {
          const w = targets[a];
          if (right[w] === this.#far && state[place[a]] > 0) {
            right[w] = distance + 2;
            count[distance + 2]++;
            queue[tail++] = w;
          }
        }
      }
      this.#meter.tick(work);
    }
    this.#meter.tick(n);
  }

  /** Sends what it can from one left copy. */
  #saturate(root: number, enough: number): void {
    const { offsets, targets } = this.#graph;
    const state = this.#state, place = this.#place, path = this.#path, stops = this.#stops;
    const left = this.#leftLabel, right = this.#rightLabel;
    const leftNext = this.#leftNext, rightNext = this.#rightNext;
    const supplied = this.#left + root, most = this.#capacity + root;
    // path[2i]: flow place raised on the way right, path[2i + 1]: place lowered on the way back;
    // stops[i]: the left vertex after i steps.
    let depth = 0, v = root;
    stops[0] = root;
    while (left[root] < this.#far && state[supplied] < state[most]) {
      let a = leftNext[v];
      const start = a, end = offsets[v + 1], want = left[v] - 1;
      while (a < end && right[targets[a]] !== want) a++;
      leftNext[v] = a;
      this.#meter.tick(1 + a - start);
      if (a === end) {
        this.#relabelLeft(v);
        if (depth > 0) v = stops[--depth];
        continue;
      }
      const u = targets[a];
      const room = state[this.#capacity + u] - state[this.#right + u];
      if (room > 0) {
        let by = Math.min(room, state[most] - state[supplied]);
        for (let i = 0; i < depth; i++) by = Math.min(by, state[path[2 * i + 1]]);
        this.#set(supplied, state[supplied] + by);
        this.#set(this.#right + u, state[this.#right + u] + by);
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
      const first = b, last = offsets[u + 1], next = want - 1;
      while (b < last && !(left[targets[b]] === next && state[place[b] ^ 1] > 0)) b++;
      rightNext[u] = b;
      this.#meter.tick(1 + b - first);
      if (b === last) {
        this.#relabelRight(u);
        continue;
      }
      path[2 * depth] = place[a];
      path[2 * depth + 1] = place[b] ^ 1;
      v = targets[b];
      stops[++depth] = v;
    }
  }

  #relabelLeft(v: number): void {
    const { offsets, targets } = this.#graph;
    let least = this.#far;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (this.#state[this.#capacity + u] !== 0) least = Math.min(least, this.#rightLabel[u] + 1);
    }
    this.#leftNext[v] = offsets[v];
    this.#meter.tick(offsets[v + 1] - offsets[v]);
    this.#move(this.#leftLabel, v, least);
  }

  #relabelRight(u: number): void {
    const { offsets, targets } = this.#graph;
    let least = this.#far;
    for (let b = offsets[u]; b < offsets[u + 1]; b++) {
      if (this.#state[this.#place[b] ^ 1] > 0) {
        least = Math.min(least, this.#leftLabel[targets[b]] + 1);
      }
    }
    this.#rightNext[u] = offsets[u];
    this.#meter.tick(offsets[u + 1] - offsets[u]);
    this.#move(this.#rightLabel, u, least);
  }

  /** Raises a label; where no label of the old size is left, all larger ones are out of reach. */
  #move(labels: Int32Array, v: number, to: number): void {
    const from = labels[v], far = this.#far, count = this.#count;
    if (from === far) return;
    labels[v] = to;
    if (to < far) count[to]++;
    if (--count[from] > 0) return;
    const { n } = this.#graph;
    for (let w = 0; w < n; w++) {
      for (const side of [this.#leftLabel, this.#rightLabel]) {
        if (side[w] <= from || side[w] >= far) continue;
        count[side[w]]--;
        side[w] = far;
      }
    }
    this.#meter.tick(n);
  }
}
