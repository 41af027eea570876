/**
 * A good first flow for the relaxation: a symmetric one, the same on both halves of the cover, found
 * on the graph itself in about O(n + m) time. On most graphs it leaves next to nothing for the
 * maximum flow to do. Symmetry matters: what is left over is then balanced in every region, while a
 * lopsided start leaves amounts that have to cross the whole graph.
 */
import type { Meter } from "../run/meter.ts";
import { LEFT_ONLY, type Relaxation, RIGHT_ONLY } from "./relaxation.ts";
import { Mender } from "./relaxation-mender.ts";

/** Degrees from here on share a list. */
const TOP = 63;
/** Up to so many neighbours are served in order of degree; where there are more it hardly matters. */
const SORTED = 16;
/** Arcs scanned for all mends together, for each arc of the graph. */
const MEND_SCANS_PER_ARC = 24;
/** The meter is told after so many scans. */
const BATCH = 1 << 13;

/**
 * Packs edges greedily, after R. M. Karp and M. Sipser, "Maximum matching in sparse random graphs"
 * (FOCS 1981), with weights: the vertex of least remaining degree gives what it has left to its
 * neighbours, those of least degree first, and leaves; so does every vertex that has nothing left.
 * On trees this is optimal, since a vertex of degree one loses nothing by it. A vertex that cannot
 * give all away is mended at once, while there is still room nearby (see `Mender`).
 *
 * @param relaxation with no flow yet; flow, supply and demand are changed in place
 * @throws {Interrupted} when the meter runs out; the state is a flow all the same
 */
export function startSymmetric(relaxation: Relaxation, meter: Meter): void {
  const { network: { n, offsets, targets, twin }, state, copies } = relaxation;
  const { supply, demand, flow } = state;
  // What each vertex has left; a vertex of a bipartite component is one copy, the other has 0.
  const rest = new Float64Array(n);
  const degree = new Int32Array(n);
  const gone = new Uint8Array(n);
  // Doubly linked lists of the vertices of each degree; the last one to enter is the first to go.
  const first = new Int32Array(TOP + 1).fill(-1);
  const after = new Int32Array(n), before = new Int32Array(n);
  const enter = (v: number, list: number): void => {
    const next = first[list];
    first[list] = v;
    after[v] = next;
    before[v] = -1;
    if (next >= 0) before[next] = v;
  };
  const leave = (v: number, list: number): void => {
    const next = after[v], previous = before[v];
    if (previous >= 0) after[previous] = next;
    else first[list] = next;
    if (next >= 0) before[next] = previous;
  };
  let scans = n, least = 0;
  // Takes a vertex out; its neighbours have one neighbour less.
  const remove = (v: number): void => {
    gone[v] = 1;
    leave(v, degree[v] < TOP ? degree[v] : TOP);
    const end = offsets[v + 1];
    for (let p = offsets[v]; p < end; p++) {
      const u = targets[p];
      if (gone[u] !== 0) continue;
      const d = degree[u]--;
      if (d > TOP) continue;
      leave(u, d);
      enter(u, d - 1);
      if (d - 1 < least) least = d - 1;
    }
    scans += 1 + end - offsets[v];
  };
  for (let v = n - 1; v >= 0; v--) {
    rest[v] = Math.max(supply[v], demand[v]);
    degree[v] = offsets[v + 1] - offsets[v];
    enter(v, Math.min(degree[v], TOP));
  }
  const mender = new Mender(relaxation, rest);
  let allowance = MEND_SCANS_PER_ARC * targets.length;
  const served = new Int32Array(SORTED);
  // Until the end, the flow stands on both copies of every edge.
  try {
    while (least <= TOP) {
      const v = first[least];
      if (v < 0) {
        least++;
        continue;
      }
      const from = offsets[v], end = offsets[v + 1];
      const sorted = degree[v] <= SORTED;
      let choices = end - from;
      if (sorted) {
        choices = 0;
        for (let p = from; p < end; p++) {
          const u = targets[p];
          if (gone[u] !== 0) continue;
          let at = choices++;
          for (; at > 0 && degree[targets[served[at - 1]]] > degree[u]; at--) {
            served[at] = served[at - 1];
          }
          served[at] = p;
        }
      }
      for (let at = 0; at < choices && rest[v] > 0; at++) {
        const p = sorted ? served[at] : from + at;
        const u = targets[p];
        if (gone[u] !== 0) continue;
        const by = Math.min(rest[v], rest[u]);
        rest[v] -= by;
        rest[u] -= by;
        flow[p] += by;
        flow[twin[p]] += by;
        if (rest[u] === 0) remove(u);
      }
      while (rest[v] > 0 && allowance > 0) {
        const filled = mender.mend(v);
        allowance -= mender.scans;
        scans += mender.scans;
        if (filled < 0) break;
        if (rest[filled] === 0 && gone[filled] === 0) remove(filled);
      }
      remove(v);
      scans += end - from;
      if (scans >= BATCH) {
        meter.tick(scans);
        scans = 0;
      }
    }
  } finally {
    for (let v = 0; v < n; v++) {
      if (copies[v] !== RIGHT_ONLY) supply[v] = rest[v];
      if (copies[v] !== LEFT_ONLY) demand[v] = rest[v];
      else flow.fill(0, offsets[v], offsets[v + 1]);
    }
  }
}
