/** The anatomy of an instance as plain data: core and blocks of each component. */
import type { Instance } from "../instance/instance.ts";
import { Displayable } from "../run/displayable.ts";

/** A bipartite block: items that hang on at most three others. */
export interface ItemBlock {
  /** The items inside, in the order of the instance. */
  readonly items: readonly string[];
  /** The at most three items outside that are in conflict with some inside. */
  readonly attachments: readonly string[];
  /**
   * Items and attachments in two groups: no conflict inside a group, except between attachments,
   * whose conflicts do not belong to the block.
   */
  readonly sides: readonly [readonly string[], readonly string[]];
}

/** A connected component. */
export interface DecomposedComponent {
  /** All items of the component. */
  readonly items: readonly string[];
  /**
   * The items in no block. No three others separate such an item from the odd part, except where
   * what they separate is no more than one item with its chains.
   */
  readonly core: readonly string[];
  readonly blocks: readonly ItemBlock[];
  /**
   * Whether there is a big side: whichever three items are taken out, an odd cycle is left. Undefined
   * when a limit came first.
   */
  readonly bigSide: boolean | undefined;
  /** Whether the core with a gadget for each block has an even-face embedding. */
  readonly evenFace: "yes" | "no" | "unknown";
  /** False when a limit stopped the search; every block listed is one nevertheless. */
  readonly complete: boolean;
  /** One sentence on what was found. */
  readonly note: string;
}

/** The data of a decomposition. */
export interface DecompositionData {
  /** In the order of their first item. */
  readonly components: readonly DecomposedComponent[];
  readonly elapsedMs: number;
  /** The instance: its name, sizes and fingerprint. */
  readonly instance: {
    readonly name: string;
    readonly items: number;
    readonly conflicts: number;
    readonly fingerprint: string;
  };
}

/** Core and blocks of all components of an instance. */
export class Decomposition extends Displayable implements DecompositionData {
  readonly kind = "decomposition";
  readonly components: readonly DecomposedComponent[];
  readonly elapsedMs: number;
  readonly instance: DecompositionData["instance"];
  readonly #source: Instance;

  /**
   * Ties core and blocks to their instance.
   *
   * @param data plain data, as JSON holds it
   * @param source the instance decomposed; it is not part of the data
   */
  constructor(data: DecompositionData, source: Instance) {
    super();
    this.components = data.components;
    this.elapsedMs = data.elapsedMs;
    this.instance = data.instance;
    this.#source = source;
  }

  /** The instance that was decomposed. */
  get source(): Instance {
    return this.#source;
  }

  /** False when a limit stopped the search in some component. */
  get complete(): boolean {
    return this.components.every((component) => component.complete);
  }

  override toString(): string {
    const { instance, components } = this;
    const blocks = components.flatMap((component) => component.blocks);
    const inBlocks = blocks.reduce((sum, block) => sum + block.items.length, 0);
    const lines = [
      `${instance.name}: ${count(instance.items, "item")}, ${
        count(components.length, "component")
      }; ${count(blocks.length, "block")} with ${count(inBlocks, "item")} inside`,
    ];
    const SHOWN = 5;
    const bySize = [...components].sort((a, b) => b.items.length - a.items.length);
    for (const component of bySize.slice(0, SHOWN)) lines.push(component.note);
    if (components.length > SHOWN) {
      lines.push(`and ${count(components.length - SHOWN, "smaller component")}`);
    }
    return lines.join("\n");
  }
}

/** "1 item", "2 items". */
export function count(n: number, noun: string): string {
  return `${n} ${noun}${n === 1 ? "" : "s"}`;
}
