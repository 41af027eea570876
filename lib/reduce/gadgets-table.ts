/**
 * The table of a bipartite block: for each state of its attachments, the least cost of slack inside.
 *
 * In *p-coordinates* p = x on side 0 and p = 1 - x on side 1, so that an edge from u on side 0 to v
 * on side 1 has slack p(v) - p(u) >= 0. For a set P of attachments, f(P) is the least cost of slack
 * when p is 1 on P and 0 on the other attachments: a minimum cut. f is submodular, f of nothing and
 * of everything is 0, and f is always finite: x = 0 on the inside fits every state. Edges between
 * attachments do not belong to the block.
 *
 * Minimum cuts by shortest augmenting paths in phases (E. A. Dinic, 1970), all amounts exact
 * integers. For a block with k edges a table takes at most six flows.
 */
import type { CostGraph } from "./blocks-costs.ts";
import type { Block } from "./blocks-costs.ts";
import type { Meter } from "../run/meter.ts";

/** The network of one block. Nodes are the attachments in order and then the inside in order. */
export class BlockCut {
  readonly #attachments: number;
  readonly #side: Uint8Array;
  /** Arc 2e goes from side 1 to side 0 and holds the cost, arc 2e + 1 goes back without limit. */
  readonly #capacity: Float64Array;
  readonly #full: Float64Array;
  readonly #offsets: Int32Array;
  /** Arcs out of each node, in rows of `#offsets`; arc a ends where arc a ^ 1 begins. */
  readonly #arcs: Int32Array;
  readonly #from: Int32Array;
  readonly #level: Int32Array;
  readonly #next: Int32Array;
  readonly #queue: Int32Array;
  readonly #meter: Meter;

  /**
   * @param on the graph the block lies in, with its costs
   * @param block inside, attachments and sides
   * @param index scratch of length on.graph.n; read and written only at the block's vertices
   */
  constructor(on: CostGraph, block: Block, index: Int32Array, meter: Meter) {
    const { graph: { offsets, targets, edgeOf, tails }, costs } = on;
    const { inside, attachments } = block;
    const nodes = attachments.length + inside.length;
    this.#meter = meter;
    this.#attachments = attachments.length;
    this.#side = new Uint8Array(nodes);
    this.#side.set(block.attachmentSide);
    this.#side.set(block.insideSide, attachments.length);
    for (let i = 0; i < attachments.length; i++) index[attachments[i]] = i;
    let total = 0;
    for (let i = 0; i < inside.length; i++) index[inside[i]] = attachments.length + i;
    let m = 0;
    for (const v of inside) {
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        if (tails[edgeOf[a]] === v || index[targets[a]] < attachments.length) {
          m++;
          total += costs[edgeOf[a]];
        }
      }
    }
    this.#full = new Float64Array(2 * m);
    this.#from = new Int32Array(2 * m);
    let at = 0;
    for (const v of inside) {
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const e = edgeOf[a], u = index[targets[a]], i = index[v];
        if (tails[e] !== v && u >= attachments.length) continue;
        this.#from[at] = this.#side[i] === 1 ? i : u;
        this.#from[at + 1] = this.#side[i] === 1 ? u : i;
        this.#full[at] = costs[e];
        // More than every cut without such an arc.
        this.#full[at + 1] = total + 1;
        at += 2;
      }
    }
    this.#capacity = new Float64Array(2 * m);
    this.#offsets = new Int32Array(nodes + 1);
    for (let a = 0; a < 2 * m; a++) this.#offsets[this.#from[a] + 1]++;
    for (let i = 0; i < nodes; i++) this.#offsets[i + 1] += this.#offsets[i];
    this.#next = this.#offsets.slice(0, nodes);
    this.#arcs = new Int32Array(2 * m);
    for (let a = 0; a < 2 * m; a++) this.#arcs[this.#next[this.#from[a]]++] = a;
    this.#level = new Int32Array(nodes);
    this.#queue = new Int32Array(nodes);
  }

  /** f(P) for the attachments whose bit is set in `mask`. Leaves the cut for `insideChosen`. */
  value(mask: number): number {
    this.#capacity.set(this.#full);
    let flow = 0;
    while (this.#raiseLevels(mask)) flow += this.#block(mask);
    return flow;
  }

  /** The table: f by mask, length 2^attachments. */
  table(): Float64Array {
    const k = this.#attachments;
    const table = new Float64Array(1 << k);
    for (let mask = 1; mask + 1 < 1 << k; mask++) table[mask] = this.value(mask);
    return table;
  }

  /**
   * A choice inside of least slack cost for the state of the attachments.
   *
   * @param attachmentsChosen whether each attachment is chosen
   * @returns x on the inside, in its order
   */
  insideFor(attachmentsChosen: readonly boolean[]): Uint8Array {
    const k = this.#attachments;
    let mask = 0;
    for (let i = 0; i < k; i++) {
      if (attachmentsChosen[i] === (this.#side[i] === 0)) mask |= 1 << i;
    }
    this.value(mask);
    // The last phase reached exactly the source side of a least cut: p is 1 there.
    const chosen = new Uint8Array(this.#side.length - k);
    for (let i = 0; i < chosen.length; i++) {
      const p = this.#level[k + i] >= 0 ? 1 : 0;
      chosen[i] = this.#side[k + i] === 0 ? p : 1 - p;
    }
    return chosen;
  }

  #isSink(node: number, mask: number): boolean {
    return node < this.#attachments && (mask & (1 << node)) === 0;
  }

  /** Distances from the attachments in P; false when no other attachment is reached. */
  #raiseLevels(mask: number): boolean {
    const level = this.#level, queue = this.#queue;
    level.fill(-1);
    let tail = 0, found = false;
    for (let i = 0; i < this.#attachments; i++) {
      if ((mask & (1 << i)) === 0) continue;
      level[i] = 0;
      queue[tail++] = i;
    }
    for (let head = 0; head < tail; head++) {
      const v = queue[head];
      for (let k = this.#offsets[v]; k < this.#offsets[v + 1]; k++) {
        const a = this.#arcs[k];
        if (this.#capacity[a] === 0) continue;
        const u = this.#from[a ^ 1];
        if (level[u] >= 0) continue;
        level[u] = level[v] + 1;
        if (this.#isSink(u, mask)) found = true;
        else queue[tail++] = u;
      }
    }
    this.#meter.tick(this.#arcs.length + 1);
    return found;
  }

  /** A blocking flow along the levels, depth first with current arcs. */
  #block(mask: number): number {
    const level = this.#level, next = this.#next, path = this.#queue;
    next.set(this.#offsets.subarray(0, next.length));
    let flow = 0;
    for (let root = 0; root < this.#attachments; root++) {
      if ((mask & (1 << root)) === 0) continue;
      let depth = 0, v = root;
      for (;;) {
        if (this.#isSink(v, mask)) {
          let by = Infinity, cut = 0;
          for (let d = 0; d < depth; d++) {
            if (this.#capacity[path[d]] < by) {
              by = this.#capacity[path[d]];
              cut = d;
            }
          }
          for (let d = 0; d < depth; d++) {
            this.#capacity[path[d]] -= by;
            this.#capacity[path[d] ^ 1] += by;
          }
          flow += by;
          depth = cut;
          v = this.#from[path[cut]];
          this.#meter.tick(depth + 1);
          continue;
        }
        const end = this.#offsets[v + 1];
        while (next[v] < end) {
          const a = this.#arcs[next[v]];
          if (this.#capacity[a] > 0 && level[this.#from[a ^ 1]] === level[v] + 1) break;
          next[v]++;
        }
        if (next[v] < end) {
          const a = this.#arcs[next[v]];
          path[depth++] = a;
          v = this.#from[a ^ 1];
        } else {
          if (depth === 0) break;
          v = this.#from[path[--depth]];
          next[v]++;
        }
      }
    }
    return flow;
  }
}
