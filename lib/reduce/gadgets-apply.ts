/**
 * Replaces bipartite blocks by their gadgets, many at once, and lifts choices back. Building the new
 * graph takes O(n + m) beside the tables; lifting takes one minimum cut for each block.
 */
import { graphFromEdges } from "../graph/graph.ts";
import { exactSum } from "../run/exact.ts";
import type { Meter } from "../run/meter.ts";
import type { Block, CostGraph } from "./blocks-costs.ts";
import { type Gadget, gadgetFor } from "./gadgets.ts";
import { BlockCut } from "./gadgets-table.ts";

/** A block with what stands for it. */
export interface ReplacedBlock {
  readonly block: Block;
  /** f by mask of the attachments with p = 1; length 2^attachments. */
  readonly table: Float64Array;
  readonly gadget: Gadget;
  /** Ids of the gadget's new vertices: firstId, firstId + 1, … */
  readonly firstId: number;
}

/** One round: blocks that do not touch each other, replaced at once. */
export interface Replacing {
  readonly before: CostGraph;
  readonly blocks: readonly ReplacedBlock[];
  readonly after: CostGraph;
}

/**
 * Replaces blocks by gadgets. The least cost of slack stays what it was.
 *
 * @param before the graph and its costs
 * @param blocks blocks whose insides are disjoint and hold no attachment of another block
 * @returns the round; new vertices take the ids from before.nextId on, block after block
 * @throws {RangeError} when the new costs add up to 2^53 or more
 */
export function replaceByGadgets(
  before: CostGraph,
  blocks: readonly Block[],
  meter: Meter,
): Replacing {
  const { graph, costs } = before;
  const { n, m, tails, heads } = graph;
  const index = new Int32Array(n);
  const replaced: ReplacedBlock[] = [];
  let nextId = before.nextId, added = 0;
  for (const block of blocks) {
    const table = new BlockCut(before, block, index, meter).table();
    const joined = (i: number, j: number) =>
      edgeBetween(before, block.attachments[i], block.attachments[j]) >= 0;
    const gadget = gadgetFor(table, block.attachmentSide, joined);
    replaced.push({ block, table, gadget, firstId: nextId });
    nextId += gadget.vertices;
    added += gadget.costs.length;
  }
  // What stays, renumbered in order, and then the gadgets.
  index.fill(0);
  for (const { inside } of blocks) for (const v of inside) index[v] = -1;
  let kept = 0;
  for (let v = 0; v < n; v++) if (index[v] === 0) index[v] = kept++;
  const total = kept + nextId - before.nextId;
  const ids = new Int32Array(total);
  for (let v = 0; v < n; v++) if (index[v] >= 0) ids[index[v]] = before.ids[v];
  for (let i = kept; i < total; i++) ids[i] = before.nextId + i - kept;
  const newTails = new Int32Array(m + added), newHeads = new Int32Array(m + added);
  const newCosts = new Float64Array(m + added);
  const edgeAt = new Int32Array(m);
  let at = 0;
  for (let e = 0; e < m; e++) {
    const u = index[tails[e]], v = index[heads[e]];
    if (u < 0 || v < 0) continue;
    edgeAt[e] = at;
    newTails[at] = u;
    newHeads[at] = v;
    newCosts[at++] = costs[e];
  }
  meter.tick(n + m);
  for (const { block: { attachments }, gadget, firstId } of replaced) {
    const k = attachments.length, first = kept + firstId - before.nextId;
    const nodeOf = (i: number) => i < k ? index[attachments[i]] : first + i - k;
    if (gadget.kind === "edge") {
      const [a, b] = gadget.ends;
      newCosts[edgeAt[edgeBetween(before, attachments[a], attachments[b])]] += gadget.costs[0];
      continue;
    }
    for (let e = 0; e < gadget.costs.length; e++) {
      newTails[at] = nodeOf(gadget.edges[2 * e]);
      newHeads[at] = nodeOf(gadget.edges[2 * e + 1]);
      newCosts[at++] = gadget.costs[e];
    }
  }
  exactSum(newCosts);
  const after = {
    graph: graphFromEdges(total, newTails.slice(0, at), newHeads.slice(0, at)),
    costs: newCosts.slice(0, at),
    ids,
    nextId,
  };
  return { before, blocks: replaced, after };
}

/**
 * Lifts a choice through a round: what is chosen outside the blocks stays, and inside each block the
 * choice of least slack cost for its attachments is taken.
 *
 * @param chosen by id, length >= after.nextId: a stable set of `round.after`; entries of the
 *   blocks' insides are written. The lifted choice costs at most what the given one costs, so an
 *   optimal choice lifts to an optimal one.
 */
export function liftThrough(round: Replacing, chosen: Uint8Array, meter: Meter): void {
  const { before, blocks } = round;
  const { ids } = before;
  const index = new Int32Array(before.graph.n);
  for (const { block } of blocks) {
    const state = Array.from(block.attachments, (v) => chosen[ids[v]] !== 0);
    const inside = new BlockCut(before, block, index, meter).insideFor(state);
    for (let i = 0; i < inside.length; i++) chosen[ids[block.inside[i]]] = inside[i];
  }
}

/** The edge between two vertices, or -1; O(least degree). */
function edgeBetween({ graph }: CostGraph, u: number, v: number): number {
  const { offsets, targets, edgeOf } = graph;
  if (offsets[u + 1] - offsets[u] > offsets[v + 1] - offsets[v]) [u, v] = [v, u];
  for (let a = offsets[u]; a < offsets[u + 1]; a++) if (targets[a] === v) return edgeOf[a];
  return -1;
}
