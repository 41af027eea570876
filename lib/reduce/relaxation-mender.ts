/**
 * Short alternating paths in a packing that is being built: a vertex that cannot give all it has to
 * its neighbours is helped at once, while there is still room nearby. Each search scans a bounded
 * number of arcs; what it misses is left to the maximum flow.
 */
import type { Relaxation } from "./relaxation.ts";

/** Arcs scanned by one search at most. */
const MEND_SCANS = 8192;

/**
 * Finds room for what a vertex has left: a path v, u, x, u', … along which the packing can be raised
 * and lowered in turn, ending at a vertex that has something left too. Searched breadth first, each
 * vertex in one role only, so that the path is simple and serves both copies at once.
 */
export class Mender {
  /** Arcs scanned by the last call. */
  scans = 0;
  readonly #relaxation: Relaxation;
  readonly #rest: Float64Array;
  /** Length n: 2k when vertex met in role "raise from" by search k, 2k + 1 in role "raise into". */
  readonly #seen: Int32Array;
  /** Length n: the arc over which a vertex was met, in the row of the vertex before. */
  readonly #over: Int32Array;
  readonly #queue: Int32Array;
  readonly #into: Int32Array;
  /** Length n: 1 at vertices met by a search that ended nowhere; no later one ends there either. */
  readonly #closed: Uint8Array;
  #search = 0;

  constructor(relaxation: Relaxation, rest: Float64Array) {
    const { n } = relaxation.network;
    this.#relaxation = relaxation;
    this.#rest = rest;
    this.#seen = new Int32Array(n);
    this.#over = new Int32Array(n);
    this.#queue = new Int32Array(n);
    this.#into = new Int32Array(n);
    this.#closed = new Uint8Array(n);
  }

  /**
   * Sends what it can from v along one path.
   *
   * @param v a vertex with something left, none of its neighbours having anything
   * @returns the vertex at the other end, or -1 when none was found
   */
  mend(v: number): number {
    const { network: { offsets, targets, twin }, state: { flow } } = this.#relaxation;
    const rest = this.#rest, seen = this.#seen, over = this.#over, queue = this.#queue;
    const into = this.#into, closed = this.#closed;
    const from = 2 * ++this.#search, to = from + 1;
    let head = 0, tail = 0, met = 0, scans = 0, end = -1;
    let sure = true; // whether finding nothing means that there is nothing
    queue[tail++] = v;
    seen[v] = from;
    while (head < tail && end < 0) {
      const x = queue[head++], rowEnd = offsets[x + 1];
      for (let p = offsets[x]; p < rowEnd; p++) {
        const u = targets[p];
        if (closed[u] !== 0 || seen[u] === to) continue;
        if (seen[u] === from) {
          sure = false;
          continue;
        }
        seen[u] = to;
        over[u] = p;
        if (rest[u] > 0) {
          end = u;
          break;
        }
        into[met++] = u;
        const last = offsets[u + 1];
        for (let q = offsets[u]; q < last; q++) {
          if (flow[q] === 0) continue;
          const y = targets[q];
          if (seen[y] === from) continue;
          if (seen[y] === to) {
            sure = false;
            continue;
          }
          seen[y] = from;
          over[y] = q;
          queue[tail++] = y;
        }
        scans += last - offsets[u];
      }
      scans += rowEnd - offsets[x];
      if (scans > MEND_SCANS && head < tail) {
        sure = false;
        break;
      }
    }
    this.scans = scans;
    if (end < 0) {
      if (sure) { for (let k = 0; k < met; k++) closed[into[k]] = 1; }
      return -1;
    }
    let by = Math.min(rest[v], rest[end]);
    for (let u = end;;) {
      const x = targets[twin[over[u]]];
      if (x === v) break;
      const q = over[x];
      if (flow[q] < by) by = flow[q];
      u = targets[twin[q]];
    }
    rest[v] -= by;
    rest[end] -= by;
    for (let u = end;;) {
      const p = over[u], x = targets[twin[p]];
      flow[p] += by;
      flow[twin[p]] += by;
      if (x === v) break;
      const q = over[x];
      flow[q] -= by;
      flow[twin[q]] -= by;
      u = targets[twin[q]];
    }
    return end;
  }
}
