/**
 * The largest bipartite blocks of a connected graph, by vertices of the graph itself. Blocks are
 * found in rounds as for a reduction, with all costs 1, so that no gadget vanishes; a block that
 * contains gadgets is read as containing what they stand for. No block may hang on a vertex inside a
 * gadget, since that is no vertex of the graph.
 */
import type { Graph } from "../graph/graph.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import { type Choice, chooseBlocks } from "./blocks-choose.ts";
import type { Block, CostGraph } from "./blocks-costs.ts";
import { stillKnown } from "./blocks.ts";
import { colouredBlock } from "./blocks-colour.ts";
import { replaceByGadgets } from "./gadgets-apply.ts";

export interface BlockList {
  /** Disjoint blocks, none with an attachment inside another, in vertices of the graph. */
  readonly blocks: readonly Block[];
  /** The graph with a gadget for each block. */
  readonly reduced: Graph;
  /** Whether every vertex was looked at; otherwise some blocks may be missing or smaller. */
  readonly complete: boolean;
}

/**
 * @param graph a connected, simple graph
 * @returns the blocks; what was found so far when the meter runs out. Near-linear in practice.
 */
export function blocksOf(graph: Graph, meter: Meter): BlockList {
  const { n } = graph;
  let now: CostGraph = {
    graph,
    costs: new Float64Array(graph.m).fill(1),
    ids: Int32Array.from({ length: n }, (_, v) => v),
    nextId: n,
  };
  // For each gadget vertex, by id - n, the block it stands for.
  const blockOf: number[] = [];
  const insides: (number[] | undefined)[] = [];
  const attachments: number[][] = [];
  // For each vertex, the blocks that hang on it. Not all have gadgets with vertices.
  const hanging = new Map<number, number[]>();
  let complete = true;
  let known: Uint8Array | undefined;
  try {
    for (;;) {
      const { ids }: CostGraph = now;
      const isItem = Uint8Array.from(ids, (id) => id < n ? 1 : 0);
      const { blocks, separations }: Choice = chooseBlocks(now.graph, meter, {
        mayAttach: isItem,
        known,
      });
      complete &&= separations?.complete ?? true;
      if (blocks.length === 0) break;
      const round = replaceByGadgets(now, blocks, meter);
      for (const { block, gadget } of round.blocks) {
        const absorbed = new Set<number>();
        const inside: number[] = [];
        for (const v of block.inside) {
          if (ids[v] >= n) absorbed.add(blockOf[ids[v] - n]);
          else {
            inside.push(ids[v]);
            for (const b of hanging.get(ids[v]) ?? []) absorbed.add(b);
          }
        }
        for (const b of absorbed) {
          for (const v of insides[b] ?? []) inside.push(v);
          insides[b] = undefined;
        }
        for (let j = 0; j < gadget.vertices; j++) blockOf.push(insides.length);
        const at = Array.from(block.attachments, (v) => ids[v]);
        for (const v of at) {
          const list = hanging.get(v);
          if (list === undefined) hanging.set(v, [insides.length]);
          else list.push(insides.length);
        }
        insides.push(inside);
        attachments.push(at);
      }
      known = separations && stillKnown(round, separations.proven);
      now = round.after;
    }
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    complete = false;
  }
  const role = new Int32Array(n).fill(-1);
  const blocks: Block[] = [];
  insides.forEach((inside, b) => {
    if (inside !== undefined) blocks.push(colouredBlock(graph, inside, attachments[b], role, b));
  });
  return { blocks, reduced: now.graph, complete };
}
