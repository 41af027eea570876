/** The gadget instance of a decomposition as plain data, and the way back to the original. */
import type { Solution } from "../certify/solution.ts";
import type { Instance } from "../instance/instance.ts";
import { Displayable } from "../run/displayable.ts";
import { count } from "./decomposition.ts";

/** What one state of a block's attachments costs inside the block. */
export interface GadgetState {
  /** The attachments chosen in this state; all others are left. */
  readonly chosen: readonly string[];
  /** What the block then falls short of its share of the relaxation's bound by, at least. */
  readonly cost: number;
}

/** A block and what stands for it. */
export interface GadgetInfo {
  /** What was put in the place of the block. */
  readonly kind: "nothing" | "edge" | "path" | "star";
  /** The items of the block that the half-integral kernel leaves, and their attachments there. */
  readonly block: { readonly items: readonly string[]; readonly attachments: readonly string[] };
  /** The new items in the gadget instance. */
  readonly items: readonly string[];
  /** The new conflicts, each with its cost in the unit of the original instance. */
  readonly conflicts: readonly { readonly between: readonly [string, string]; cost: number }[];
  /** One row for each state of the attachments that no conflict between them rules out. */
  readonly table: readonly GadgetState[];
}

/** The data of a replacement. */
export interface ReplacementData {
  /**
   * What is left: the half-integral kernel with gadgets. Its weights are whole multiples of one half
   * of the original's smallest step, so that all are integers.
   */
  readonly instance: Instance;
  /** How many of the gadget instance's units make one of the original's: 2 · its scale. */
  readonly unitsPer: number;
  /**
   * In the original's unit: the optimum of the original is this plus the optimum of the gadget
   * instance divided by `unitsPer`.
   */
  readonly offset: number;
  readonly gadgets: readonly GadgetInfo[];
  /** How many items the half-integral kernel settles beforehand. */
  readonly settled: number;
  readonly elapsedMs: number;
}

/** A gadget instance. */
export class Replacement extends Displayable implements ReplacementData {
  readonly kind = "replacement";
  readonly instance: Instance;
  readonly unitsPer: number;
  readonly offset: number;
  readonly gadgets: readonly GadgetInfo[];
  readonly settled: number;
  readonly elapsedMs: number;
  readonly #lift: (solution: Solution) => Solution;

  /**
   * Ties a gadget instance to the way back.
   *
   * @param data plain data, as JSON holds it
   * @param lift turns a solution of the gadget instance into one of the original
   */
  constructor(data: ReplacementData, lift: (solution: Solution) => Solution) {
    super();
    this.instance = data.instance;
    this.unitsPer = data.unitsPer;
    this.offset = data.offset;
    this.gadgets = data.gadgets;
    this.settled = data.settled;
    this.elapsedMs = data.elapsedMs;
    this.#lift = lift;
  }

  /**
   * Turns a solution of the gadget instance into one of the original.
   *
   * @param solution a solution of `instance` without required or ruled-out items
   * @returns a solution of the original that is worth no less than the given one stands for; optimal,
   *   with a certificate about the original, when the given one is optimal. One minimum cut for each
   *   block.
   * @throws {RangeError} for a solution of another instance or of another question, or an infeasible
   *   one
   */
  lift(solution: Solution): Solution {
    return this.#lift(solution);
  }

  override toString(): string {
    const { instance, gadgets, settled } = this;
    const before = gadgets.reduce((sum, { block }) => sum + block.items.length, 0);
    const after = gadgets.reduce((sum, { items }) => sum + items.length, 0);
    const lines = [
      `${count(settled, "item")} settled by the half-integral kernel; ` +
      `${count(gadgets.length, "block")} of ${count(before, "item")} replaced by ` +
      `${count(after, "gadget item")}; ${count(instance.size, "item")} left`,
    ];
    const SHOWN = 3;
    for (const gadget of gadgets.slice(0, SHOWN)) lines.push(gadgetText(gadget));
    if (gadgets.length > SHOWN) {
      lines.push(`and ${count(gadgets.length - SHOWN, "further gadget")}`);
    }
    return lines.join("\n");
  }
}

/** A gadget and its table in a few lines. */
export function gadgetText({ kind, block, table }: GadgetInfo): string {
  const { items, attachments } = block;
  const place = attachments.length === 0 ? "on its own" : `on ${attachments.join(", ")}`;
  const lines = [
    `${kind} for a block of ${count(items.length, "item")} ${place}; what the block loses:`,
  ];
  for (const { chosen, cost } of table) {
    const state = attachments.length === 0
      ? "always"
      : chosen.length === 0
      ? "none chosen"
      : `${chosen.join(", ")} chosen`;
    lines.push(`  ${state}: ${cost}`);
  }
  return lines.join("\n");
}
