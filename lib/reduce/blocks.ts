/**
 * Block replacement until nothing is left to replace: bipartite blocks behind at most three
 * attachments give way to gadgets of at most five vertices, in rounds, since a gadget can be part of
 * the next block. It is valid for every graph. The source of the gadgets: "Extended formulations for
 * stable set polytopes of graphs without two disjoint odd cycles", Math. Programming 192 (2022),
 * doi:10.1007/s10107-021-01635-0.
 *
 * Each round is near-linear in practice (graph/separations.ts) beside six small minimum cuts for
 * each block; two or three rounds are the rule.
 */
import type { Meter } from "../run/meter.ts";
import type { CostGraph } from "./blocks-costs.ts";
import { chooseBlocks } from "./blocks-choose.ts";
import { liftThrough, replaceByGadgets, type Replacing } from "./gadgets-apply.ts";

/** All rounds of a block replacement. */
export interface Reduction {
  readonly rounds: readonly Replacing[];
  /** What is left after the last round. */
  readonly after: CostGraph;
}

/**
 * Replaces blocks until no block is larger than its gadget.
 *
 * @param start a graph with costs; its ids below start.nextId
 * @returns the rounds, possibly none; the least cost of slack is the same throughout
 * @throws {Interrupted} when the meter runs out
 * @throws {RangeError} when costs add up to 2^53 or more
 */
export function reduceBlocks(start: CostGraph, meter: Meter): Reduction {
  const rounds: Replacing[] = [];
  let now = start;
  let known: Uint8Array | undefined;
  for (;;) {
    const { blocks, separations } = chooseBlocks(now.graph, meter, { known, peel: true });
    if (blocks.length === 0) return { rounds, after: now };
    const round = replaceByGadgets(now, blocks, meter);
    rounds.push(round);
    known = separations && stillKnown(round, separations.proven);
    now = round.after;
  }
}

/**
 * Vertices known to lie in no side of what a round leaves. A side there that is none in the graph
 * before has a gadget's vertex among its attachments; moving that one to an end of the gadget shows
 * that the side consists of such ends, of gadgets and of what sides there were before. Where a gadget
 * leaves an attachment out, the graph has come apart and nothing is known.
 *
 * @param proven length before.graph.n: what was known before the round
 * @returns length after.graph.n, or undefined where nothing is known
 */
export function stillKnown(
  { before, after, blocks }: Replacing,
  proven: Uint8Array,
): Uint8Array | undefined {
  for (const { block: { attachments }, gadget } of blocks) {
    if (attachments.length > 1 && gadget.ends.length < attachments.length) return undefined;
  }
  const knownById = new Uint8Array(after.nextId);
  before.ids.forEach((id, v) => knownById[id] = proven[v]);
  for (const { block } of blocks) for (const v of block.attachments) knownById[before.ids[v]] = 0;
  return Uint8Array.from(after.ids, (id) => knownById[id]);
}

/**
 * Lifts a choice on what was left to the start.
 *
 * @param chosen by id, length >= after.nextId: a stable set of `reduction.after`; the ids of
 *   vertices that were replaced are written on the way
 */
export function liftBlocks(reduction: Reduction, chosen: Uint8Array, meter: Meter): void {
  for (let i = reduction.rounds.length - 1; i >= 0; i--) {
    liftThrough(reduction.rounds[i], chosen, meter);
  }
}
