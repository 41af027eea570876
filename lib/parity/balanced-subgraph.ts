/** Large balanced induced subgraphs, greedily: what is left over is an odd cycle transversal. */
import type { Graph } from "../graph/graph.ts";
import type { Meter } from "../run/meter.ts";
import { Random } from "../run/random.ts";

/** Orders tried on every graph, and on graphs small enough for more. */
const ORDERS_AT_LEAST = 7;
const ORDERS_AT_MOST = 16;
/** Arcs that the orders beyond the least number may scan. */
const SCANS = 20_000_000;

/**
 * A small odd cycle transversal by taking vertices in, one after another, as long as they close no
 * odd cycle. Tries orders by degree, breadth-first orders from several roots, and orders that begin
 * with what the best one left over; the best result wins.
 *
 * @param graph any graph
 * @param even length m, nonzero where an edge is even
 * @param enough a result of so many vertices is not improved upon
 * @returns a transversal, minimal under inclusion, in the order in which its vertices were refused.
 *   O(m α) time times a constant from 7 to 16.
 */
export function greedyTransversal(
  graph: Graph,
  even: Uint8Array,
  enough: number,
  meter: Meter,
): number[] {
  const { n, m } = graph;
  const random = new Random(n);
  const inserter = new Inserter(graph, even);
  const order = Int32Array.from({ length: n }, (_, v) => v);
  const degree = (v: number): number => graph.offsets[v + 1] - graph.offsets[v];
  const byDegree = order.slice().sort((a, b) => degree(a) - degree(b) || a - b);
  let best = inserter.refused(byDegree);
  const pass = 2 * m + n;
  const orders = Math.max(ORDERS_AT_LEAST, Math.min(ORDERS_AT_MOST, Math.floor(SCANS / pass)));
  for (let attempt = 1; attempt < orders && best.length > enough; attempt++) {
    meter.tick(pass);
    let tried: Int32Array;
    if (attempt % 3 === 1) {
      tried = breadthFirst(graph, random.below(n));
    } else if (attempt % 3 === 2) {
      // What was refused comes first, then the rest, low degrees first.
      const first = random.shuffle(best.slice(0, 1 + random.below(best.length)));
      tried = leading(first, byDegree);
    } else {
      tried = leading(random.shuffle(best.slice(0, 1)), breadthFirst(graph, best[0]));
    }
    const refused = inserter.refused(tried);
    if (refused.length < best.length) best = refused;
  }
  return best;
}

function leading(first: readonly number[], rest: Int32Array): Int32Array {
  const seen = new Set(first);
  return Int32Array.from([...first, ...rest.filter((v) => !seen.has(v))]);
}

function breadthFirst(graph: Graph, root: number): Int32Array {
  const { n, offsets, targets } = graph;
  const order = new Int32Array(n), seen = new Uint8Array(n);
  let head = 0, tail = 0;
  for (let start = -1; start < n; start++) {
    const from = start < 0 ? root : start;
    if (seen[from] !== 0) continue;
    seen[from] = 1;
    order[tail++] = from;
    while (head < tail) {
      const v = order[head++];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        if (seen[targets[a]] !== 0) continue;
        seen[targets[a]] = 1;
        order[tail++] = targets[a];
      }
    }
  }
  return order;
}

/** Union-find with parities. */
class Inserter {
  readonly #graph: Graph;
  readonly #even: Uint8Array;
  readonly #parent: Int32Array;
  /** Parity of each vertex relative to its parent. */
  readonly #parity: Uint8Array;
  readonly #size: Int32Array;
  readonly #taken: Uint8Array;
  /** For each root met at the vertex at hand: the parity asked of the vertex, stamped. */
  readonly #asked: Uint8Array;
  readonly #stamp: Int32Array;
  #now = 0;

  constructor(graph: Graph, even: Uint8Array) {
    this.#graph = graph;
    this.#even = even;
    this.#parent = new Int32Array(graph.n);
    this.#parity = new Uint8Array(graph.n);
    this.#size = new Int32Array(graph.n);
    this.#taken = new Uint8Array(graph.n);
    this.#asked = new Uint8Array(graph.n);
    this.#stamp = new Int32Array(graph.n);
  }

  /** Takes vertices in this order where they close no odd cycle; returns the others. */
  refused(order: Int32Array): number[] {
    for (let v = 0; v < this.#graph.n; v++) this.#parent[v] = v;
    this.#parity.fill(0);
    this.#size.fill(1);
    this.#taken.fill(0);
    const out: number[] = [];
    for (const v of order) {
      if (this.#fits(v)) this.#take(v);
      else out.push(v);
    }
    return out;
  }

  #fits(v: number): boolean {
    const { offsets, targets, edgeOf } = this.#graph;
    const now = ++this.#now;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (this.#taken[u] === 0) continue;
      const root = this.#find(u);
      const want = this.#parity[u] ^ (this.#even[edgeOf[a]] !== 0 ? 0 : 1);
      if (this.#stamp[root] !== now) {
        this.#stamp[root] = now;
        this.#asked[root] = want;
      } else if (this.#asked[root] !== want) return false;
    }
    return true;
  }

  #take(v: number): void {
    const { offsets, targets, edgeOf } = this.#graph;
    this.#taken[v] = 1;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (this.#taken[u] === 0) continue;
      let r = this.#find(u), s = this.#find(v);
      if (r === s) continue;
      const relative = this.#parity[u] ^ this.#parity[v] ^ (this.#even[edgeOf[a]] !== 0 ? 0 : 1);
      if (this.#size[r] > this.#size[s]) [r, s] = [s, r];
      this.#parent[r] = s;
      this.#parity[r] = relative;
      this.#size[s] += this.#size[r];
    }
  }

  /** The root of v; afterwards v hangs on it directly, with its parity relative to it. */
  #find(v: number): number {
    const parent = this.#parent, parity = this.#parity;
    let root = v, sum = 0;
    while (parent[root] !== root) {
      sum ^= parity[root];
      root = parent[root];
    }
    while (parent[v] !== root && v !== root) {
      const next = parent[v], own = parity[v];
      parent[v] = root;
      parity[v] = sum;
      sum ^= own;
      v = next;
    }
    return root;
  }
}
