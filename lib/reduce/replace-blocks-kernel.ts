/**
 * What the half-integral kernel leaves of an instance and of its blocks. The kernel may take part of
 * a block away, leave its inside in pieces or an attachment missing; each piece left is a block of
 * its own, on the attachments that it still has.
 */
import { type Graph, inducedSubgraph } from "../graph/graph.ts";
import { Meter } from "../run/meter.ts";
import { colouredBlock } from "./blocks-colour.ts";
import type { Block, CostGraph } from "./blocks-costs.ts";
import { gadgetSize } from "./gadgets.ts";
import { halfIntegralKernel } from "./kernel.ts";

/** The kernel of an instance in the edge space. */
export interface InstanceKernel {
  /** Its ids number the kernel's vertices by canonical rank, 0, 1, … */
  readonly start: CostGraph;
  /** Length start.graph.n: the item each vertex is. */
  readonly items: Int32Array;
  /** Length start.graph.m: the edge of the instance's graph each edge is. */
  readonly edges: Int32Array;
  /** Length n of the instance: 1 for items that the relaxation chooses. */
  readonly chosen: Uint8Array;
  /** Edges with both ends outside the kernel that pack the settled items: instance's edge, cost. */
  readonly packing: { readonly edges: readonly number[]; readonly doubled: readonly number[] };
}

/**
 * The kernel; one maximum flow, which no limit interrupts.
 *
 * @param weights length n, scaled integers of any sign
 * @param rank length n, the canonical rank of each vertex
 */
export function kernelOf(graph: Graph, weights: Float64Array, rank: Int32Array): InstanceKernel {
  // Items worth nothing are never needed.
  const positive = inducedSubgraph(graph, Uint8Array.from(weights, (w) => w > 0 ? 1 : 0));
  const { value, doubledCosts } = halfIntegralKernel(
    positive.graph,
    Float64Array.from(positive.vertices, (v) => weights[v]),
    new Meter(),
  );
  const half = inducedSubgraph(positive.graph, Uint8Array.from(value, (x) => x === 1 ? 1 : 0));
  const items = Int32Array.from(half.vertices, (v) => positive.vertices[v]);
  const byRank = Array.from(items, (_, v) => v).sort((u, v) => rank[items[u]] - rank[items[v]]);
  const ids = new Int32Array(items.length);
  byRank.forEach((v, id) => ids[v] = id);
  const chosen = new Uint8Array(graph.n);
  value.forEach((x, v) => chosen[positive.vertices[v]] = x === 2 ? 1 : 0);
  const packing = { edges: [] as number[], doubled: [] as number[] };
  for (let e = 0; e < positive.graph.m; e++) {
    const { tails, heads } = positive.graph;
    if (doubledCosts[e] === 0 || value[tails[e]] === 1 || value[heads[e]] === 1) continue;
    packing.edges.push(positive.edges[e]);
    packing.doubled.push(doubledCosts[e]);
  }
  return {
    start: {
      graph: half.graph,
      costs: Float64Array.from(half.edges, (e) => doubledCosts[e]),
      ids,
      nextId: items.length,
    },
    items,
    edges: Int32Array.from(half.edges, (e) => positive.edges[e]),
    chosen,
    packing,
  };
}

/**
 * What of some blocks the kernel leaves, where it is larger than a gadget.
 *
 * @param n number of items
 * @param blocks the items inside each block
 * @returns disjoint blocks in vertices of `kernel.start.graph`. O(n + m) time.
 */
export function survivingBlocks(
  n: number,
  blocks: readonly Int32Array[],
  kernel: InstanceKernel,
): Block[] {
  const { start: { graph }, items } = kernel;
  const vertexOf = new Int32Array(n).fill(-1);
  items.forEach((item, v) => vertexOf[item] = v);
  const role = new Int32Array(graph.n).fill(-1);
  const unseen = new Uint8Array(graph.n);
  const found: Block[] = [];
  let mark = 0;
  for (const block of blocks) {
    const left = Array.from(block, (i) => vertexOf[i]).filter((v) => v >= 0);
    const within = new Set(left);
    for (const v of left) unseen[v] = 1;
    for (const root of left) {
      if (unseen[root] === 0) continue;
      const { inside, attachments } = pieceFrom(graph, root, unseen, within);
      const piece = colouredBlock(graph, inside, attachments, role, mark++);
      if (isWorthIt(graph, piece)) found.push(piece);
    }
  }
  return found;
}

/** The piece of a block around a vertex, and its neighbours outside the block. */
function pieceFrom(
  { offsets, targets }: Graph,
  root: number,
  unseen: Uint8Array,
  block: ReadonlySet<number>,
): { inside: number[]; attachments: number[] } {
  const inside = [root], attachments: number[] = [];
  unseen[root] = 0;
  for (const v of inside) {
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (!block.has(u)) {
        if (!attachments.includes(u)) attachments.push(u);
      } else if (unseen[u] !== 0) {
        unseen[u] = 0;
        inside.push(u);
      }
    }
  }
  return { inside, attachments };
}

/** Whether the gadget is smaller, counting vertices of degree three first. */
function isWorthIt({ offsets }: Graph, { inside, attachmentSide }: Block): boolean {
  let branching = 0;
  for (const v of inside) if (offsets[v + 1] - offsets[v] >= 3) branching++;
  const allowed = attachmentSide.length === 3 ? 1 : 0;
  return branching > allowed || inside.length > gadgetSize(attachmentSide);
}
