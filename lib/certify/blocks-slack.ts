/**
 * The least slack cost of a block in a given state of its attachments. With the attachments fixed,
 * what is left of the inside is a bipartite graph, each vertex weighing the costs at it; least slack
 * is total cost less the heaviest stable set, and a flow bounds that from above: for any flow from
 * side 0 to side 1 that fits through the vertices, it is at most the weight less the flow.
 */
import type { CostedGraph } from "./blocks-graph.ts";
import { Rejected } from "./rejected.ts";

/** Works on one block after another; arrays are as long as the graph has vertices. */
export class BlockSlack {
  readonly #graph: CostedGraph;
  /** For each vertex: 0 elsewhere, 1 and 2 inside by side, 3 attachment. */
  readonly #role: Uint8Array;
  /** For each inside vertex, what of its weight no flow has used. */
  readonly #rest: Float64Array;
  readonly #open: Uint8Array;
  readonly #level: Int32Array;
  readonly #arc: Int32Array;
  /** Flow on each arc out of side 1. */
  readonly #flow: Float64Array;

  constructor(graph: CostedGraph, capacity: number) {
    this.#graph = graph;
    this.#role = new Uint8Array(capacity);
    this.#rest = new Float64Array(capacity);
    this.#open = new Uint8Array(capacity);
    this.#level = new Int32Array(capacity);
    this.#arc = new Int32Array(capacity);
    this.#flow = new Float64Array(graph.target.length);
  }

  /**
   * Lower bounds for the slack cost of a block, one for each state of its attachments.
   *
   * @param inside distinct vertices that are there
   * @param attachments distinct vertices that are there, none inside
   * @param occurs whether a state, a bit mask of the attachments chosen, can occur
   * @returns length 2^attachments; the least cost in each state that can occur
   * @throws {Rejected} when the inside is not bipartite or has other neighbours
   */
  bounds(
    inside: readonly number[],
    attachments: readonly number[],
    occurs: (mask: number) => boolean,
    where: string,
  ): number[] {
    for (const v of inside) this.#role[v] = 1;
    for (const v of attachments) this.#role[v] = 3;
    this.#colour(inside, where);
    const bounds: number[] = [];
    for (let mask = 0; mask < 1 << attachments.length; mask++) {
      bounds.push(occurs(mask) ? this.#bound(inside, attachments, mask, where) : 0);
    }
    for (const v of inside) this.#role[v] = 0;
    for (const v of attachments) this.#role[v] = 0;
    return bounds;
  }

  /** Gives the inside its sides. */
  #colour(inside: readonly number[], where: string): void {
    const { first, next, target, alive } = this.#graph;
    const role = this.#role, coloured = this.#open;
    for (const v of inside) coloured[v] = 0;
    const queue: number[] = [];
    for (const root of inside) {
      if (coloured[root] !== 0) continue;
      coloured[root] = 1;
      queue.push(root);
      for (let head = queue.length - 1; head < queue.length; head++) {
        const v = queue[head];
        for (let a = first[v]; a >= 0; a = next[a]) {
          const u = target[a];
          if (alive[u] === 0 || role[u] === 3) continue;
          if (role[u] === 0) {
            throw new Rejected(`${where}: vertex ${v} inside has neighbour ${u} outside`);
          }
          if (coloured[u] === 0) {
            coloured[u] = 1;
            role[u] = 3 - role[v];
            queue.push(u);
          } else if (role[u] === role[v]) {
            throw new Rejected(`${where}: the inside is not bipartite`);
          }
        }
      }
    }
  }

  /** Total cost - costs at chosen attachments - weight of the open inside + flow. */
  #bound(
    inside: readonly number[],
    attachments: readonly number[],
    mask: number,
    where: string,
  ): number {
    const { first, next, target, alive, cost } = this.#graph;
    const role = this.#role, rest = this.#rest, open = this.#open;
    for (const v of inside) open[v] = 1;
    attachments.forEach((s, i) => open[s] = mask >> i & 1 ? 0 : 1);
    let bound = 0;
    for (const v of inside) {
      rest[v] = 0;
      for (let a = first[v]; a >= 0; a = next[a]) {
        const u = target[a];
        if (alive[u] === 0) continue;
        if (role[u] === 3 && open[u] === 0) open[v] = 0;
        else if (role[u] === 3 || v < u) bound += cost[a];
        rest[v] += cost[a];
        if (role[v] === 1) this.#flow[a] = 0;
      }
    }
    // Each cost is taken away at most twice, so nothing is rounded below either.
    if (!Number.isSafeInteger(bound)) throw new Rejected(`${where}: costs beyond 2^53`);
    for (const v of inside) if (open[v] !== 0) bound -= rest[v];
    const left = inside.filter((v) => role[v] === 1 && open[v] !== 0);
    while (this.#raiseLevels(left)) for (const v of left) bound += this.#send(v);
    return bound;
  }

  /** Distances from what side 1 could still send; false when nothing can arrive. */
  #raiseLevels(left: readonly number[]): boolean {
    const { first, next, target, alive } = this.#graph;
    const role = this.#role, open = this.#open, level = this.#level;
    const queue: number[] = [];
    let arrived = false;
    for (const v of left) {
      level[v] = this.#rest[v] > 0 ? 1 : 0;
      this.#arc[v] = first[v];
      // Side 0 is entered anew; what else neighbours the inside is never read.
      if (level[v] !== 0) queue.push(v);
      for (let a = first[v]; a >= 0; a = next[a]) {
        level[target[a]] = 0;
        this.#arc[target[a]] = first[target[a]];
      }
    }
    for (let head = 0; head < queue.length; head++) {
      const v = queue[head];
      for (let a = first[v]; a >= 0; a = next[a]) {
        const u = target[a];
        if (alive[u] === 0 || open[u] === 0 || role[u] !== 3 - role[v] || level[u] !== 0) continue;
        if (role[v] === 2 && this.#flow[a ^ 1] === 0) continue;
        level[u] = level[v] + 1;
        if (role[u] === 2 && this.#rest[u] > 0) arrived = true;
        queue.push(u);
      }
    }
    return arrived;
  }

  /** Sends what it can from one vertex along rising levels. */
  #send(root: number): number {
    const { next, target, alive } = this.#graph;
    const role = this.#role, open = this.#open, level = this.#level, rest = this.#rest;
    const flow = this.#flow, current = this.#arc;
    let sent = 0;
    const path: number[] = [];
    let v = root;
    while (rest[root] > 0) {
      if (role[v] === 2 && rest[v] > 0) {
        let by = Math.min(rest[root], rest[v]);
        for (const a of path) if (role[target[a]] === 1) by = Math.min(by, flow[a ^ 1]);
        rest[root] -= by;
        rest[v] -= by;
        sent += by;
        for (const a of path) {
          if (role[target[a]] === 2) flow[a] += by;
          else flow[a ^ 1] -= by;
        }
        path.length = 0;
        v = root;
        continue;
      }
      let a = current[v];
      for (; a >= 0; a = next[a]) {
        const u = target[a];
        if (alive[u] === 0 || open[u] === 0 || role[u] !== 3 - role[v]) continue;
        if (level[u] === level[v] + 1 && (role[v] === 1 || flow[a ^ 1] > 0)) break;
      }
      current[v] = a;
      if (a >= 0) {
        path.push(a);
        v = target[a];
      } else {
        const back = path.pop();
        if (back === undefined) break;
        v = target[back ^ 1];
        current[v] = next[current[v]];
      }
    }
    return sent;
  }
}
