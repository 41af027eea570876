/**
 * Chooses the blocks of one round: sides larger than their gadget, sides on the same attachments that
 * one gadget can stand for together, and chains longer than a gadget; or, in a round of its own, what
 * hangs on single vertices. O(size of the graph) beside finding the sides.
 *
 * Progress is measured by the number of vertices of degree three or more, then by the number of
 * vertices: every block chosen makes the first smaller, or leaves it and makes the second smaller,
 * so rounds come to an end.
 */
import type { Graph } from "../graph/graph.ts";
import { type Separations, separations, type SeparationsOptions } from "../graph/separations.ts";
import { chains } from "../graph/separations-chains.ts";
import type { Meter } from "../run/meter.ts";
import type { Block } from "./blocks-costs.ts";
import { hangingBlocks } from "./blocks-peel.ts";
import { gadgetSize } from "./gadgets.ts";

/** The blocks of a round and what was found on the way. */
export interface Choice {
  /** Blocks that do not touch each other: insides disjoint, no attachment inside another. */
  readonly blocks: readonly Block[];
  /** Absent where a round takes off what hangs on single vertices, before any side is looked for. */
  readonly separations?: Separations;
}

/** What `chooseBlocks` may be told. */
export interface ChooseOptions extends SeparationsOptions {
  /**
   * Begin with a round for what hangs on single vertices. This is linear whatever the graph is like;
   * but what is left may then be no larger than a gadget, and no block is found there.
   */
  readonly peel?: boolean;
}

/**
 * @param graph a simple graph
 * @param options vertices that no block may have as attachments, and vertices known to be in none
 */
export function chooseBlocks(
  graph: Graph,
  meter: Meter,
  options: ChooseOptions = {},
): Choice {
  const hanging = options.peel === true ? hangingBlocks(graph, meter) : [];
  if (hanging.length > 0) return { blocks: hanging };
  const found = separations(graph, meter, options);
  const taken = new Taken(graph.n);
  const groups = new Map<string, Group>();
  const add = (block: Block, large: boolean): void => {
    const key = keyOf(block);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { members: [block], large });
    else {
      group.members.push(block);
      group.large ||= large;
    }
  };
  for (const side of found.sides) add(side, true);
  for (const side of found.small) add(side, false);
  for (const { ends, inside } of chains(graph, meter)) {
    if (ends.some((v) => options.mayAttach?.[v] === 0)) continue;
    add({
      inside,
      insideSide: Uint8Array.from(inside, (_, i) => 1 - (i & 1)),
      attachments: Int32Array.from(ends),
      attachmentSide: Uint8Array.of(0, 1 - (inside.length & 1)),
    }, false);
  }
  const blocks: Block[] = [];
  // Groups with a large side first: these are certain to go.
  for (const wanted of [true, false]) {
    for (const { members, large } of groups.values()) {
      if (large !== wanted) continue;
      const free = members.filter((block) => taken.isFree(block));
      const block = joined(free);
      if (block === undefined || !(large || free.length > 1 || isLongChain(graph, block))) continue;
      taken.take(block);
      blocks.push(block);
    }
  }
  return { blocks, separations: found };
}

interface Group {
  readonly members: Block[];
  large: boolean;
}

/** Attachments with their sides, seen from the first. Sides come with increasing attachments. */
function keyOf({ attachments, attachmentSide: side }: Block): string {
  return Array.from(attachments, (v, i) => 2 * v + (side[i] ^ side[0])).join(" ");
}

/** Blocks on the same attachments as one block. */
function joined(blocks: readonly Block[]): Block | undefined {
  if (blocks.length < 2) return blocks[0];
  const { attachments, attachmentSide } = blocks[0];
  if (attachments.length === 0) return concatenated(blocks, attachments, attachmentSide);
  // Turn the sides of the others over where theirs began the other way.
  const turned = blocks.map((block) =>
    block.attachmentSide[0] === attachmentSide[0]
      ? block
      : { ...block, insideSide: block.insideSide.map((s) => 1 - s) }
  );
  return concatenated(turned, attachments, attachmentSide);
}

function concatenated(
  blocks: readonly Block[],
  attachments: Int32Array,
  attachmentSide: Uint8Array,
): Block {
  const size = blocks.reduce((sum, block) => sum + block.inside.length, 0);
  const inside = new Int32Array(size), insideSide = new Uint8Array(size);
  let at = 0;
  for (const block of blocks) {
    inside.set(block.inside, at);
    insideSide.set(block.insideSide, at);
    at += block.inside.length;
  }
  return { inside, insideSide, attachments, attachmentSide };
}

/** Whether a chain has more inner vertices than its gadget. */
function isLongChain(graph: Graph, { inside, attachments, attachmentSide: side }: Block): boolean {
  if (attachments.length !== 2) return false;
  const [a, b] = attachments;
  const size = side[0] !== side[1] && isJoined(graph, a, b) ? 0 : gadgetSize(side);
  return inside.length > size;
}

function isJoined({ offsets, targets }: Graph, u: number, v: number): boolean {
  for (let a = offsets[u]; a < offsets[u + 1]; a++) if (targets[a] === v) return true;
  return false;
}

/** Which vertices are inside a chosen block (1) or its attachments (2). */
class Taken {
  readonly #role: Uint8Array;
  constructor(n: number) {
    this.#role = new Uint8Array(n);
  }

  isFree({ inside, attachments }: Block): boolean {
    return inside.every((v) => this.#role[v] === 0) &&
      attachments.every((v) => this.#role[v] !== 1);
  }

  take({ inside, attachments }: Block): void {
    for (const v of inside) this.#role[v] = 1;
    for (const v of attachments) this.#role[v] = 2;
  }
}
