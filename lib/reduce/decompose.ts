/** Core and blocks of an instance: its anatomy, for people to read and for `replaceBlocks`. */
import { componentSubgraphs } from "../graph/components.ts";
import type { Graph, Subgraph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import type { Instance } from "../instance/instance.ts";
import { evenFaceEmbedding } from "../parity/even-face.ts";
import { leastTransversal } from "../parity/transversal.ts";
import { Interrupted, Meter } from "../run/meter.ts";
import type { RunOptions } from "../run/options.ts";
import type { Block } from "./blocks-costs.ts";
import { blocksOf } from "./decompose-blocks.ts";
import { count, type DecomposedComponent, Decomposition, type ItemBlock } from "./decomposition.ts";

/**
 * Splits each component of an instance into its core and the bipartite blocks that hang on at most
 * three items each.
 *
 * @param instance any instance
 * @param run limits and progress; after a limit the blocks found so far come back, and the components
 *   that were not finished say so
 * @returns core, blocks with their attachments and sides, and whether what the core is can be drawn
 *   in the projective plane with even faces. Near-linear in practice; seconds for 100,000 items.
 *   Every block listed is one. That none is missed is proved for components that have a big side and
 *   no two disjoint odd cycles (see graph/separations.ts).
 * @throws {RangeError} for run options that mean nothing
 *
 * @example
 * ```ts
 * import { Instance } from "../instance/mod.ts";
 * import { decompose } from "./mod.ts";
 * // Five speakers who all know each other, and a path that hangs on two of them.
 * const ids = ["a", "b", "c", "d", "e", "p", "q", "r"];
 * const core = ids.slice(0, 5).flatMap((u, i) => ids.slice(0, i).map((v) => [u, v] as const));
 * const instance = Instance.from({
 *   items: ids.map((id) => ({ id, weight: 1 })),
 *   conflicts: [...core, ["a", "p"], ["p", "q"], ["q", "r"], ["r", "b"]],
 * });
 * const { components } = await decompose(instance);
 * console.assert(components[0].blocks[0].items.join() === "p,q,r");
 * console.assert(components[0].core.length === 5);
 * ```
 */
export async function decompose(
  instance: Instance,
  run: RunOptions = {},
): Promise<Decomposition> {
  const meter = new Meter(run);
  const components: DecomposedComponent[] = [];
  const parts = componentSubgraphs(instance.graph);
  let done = 0;
  for (const part of parts) {
    meter.report("core and blocks", { done, total: instance.size });
    await meter.breathe();
    components.push(component(instance, part, meter));
    done += part.graph.n;
  }
  meter.report("core and blocks", { done, total: instance.size }, true);
  components.sort((a, b) => b.items.length - a.items.length);
  return new Decomposition({
    components,
    elapsedMs: meter.elapsedMs,
    instance: {
      name: instance.name,
      items: instance.size,
      conflicts: instance.conflictCount,
      fingerprint: instance.fingerprint,
    },
  }, instance);
}

function component(
  instance: Instance,
  { graph, vertices }: Subgraph,
  meter: Meter,
): DecomposedComponent {
  const nameOf = (v: number) => instance.ids[vertices[v]];
  const items = Array.from(vertices, (v) => instance.ids[v]);
  const { side } = twoColouring(graph);
  if (side !== undefined) {
    const whole = itemBlock({
      inside: Int32Array.from({ length: graph.n }, (_, v) => v),
      insideSide: side,
      attachments: new Int32Array(0),
      attachmentSide: new Uint8Array(0),
    }, nameOf);
    return {
      items,
      core: [],
      blocks: [whole],
      bigSide: false,
      evenFace: "no",
      complete: true,
      note: `${count(graph.n, "item")}: no odd cycle, so there is no core; all is one block`,
    };
  }
  const { blocks, reduced, complete } = blocksOf(graph, meter);
  const inBlock = new Uint8Array(graph.n);
  for (const { inside } of blocks) for (const v of inside) inBlock[v] = 1;
  const core = items.filter((_, v) => inBlock[v] === 0);
  // Gadgets change no transversal number, and the graph with gadgets is smaller.
  const needed = transversalUpTo(reduced, 4, meter);
  const evenFace = complete ? evenFaceOf(reduced, meter) : "unknown";
  const bigSide = needed.lower >= 4 ? true : needed.exact ? false : undefined;
  const parts = [
    `${count(graph.n, "item")}: a core of ${core.length} and ${count(blocks.length, "block")}`,
  ];
  if (!complete) parts.push("the search was stopped, so blocks may be missing");
  if (bigSide === false) {
    parts.push(
      `${count(needed.lower, "item")} ${needed.lower === 1 ? "meets" : "meet"} all odd cycles, ` +
        "so no side is big whatever is taken out",
    );
  }
  if (evenFace === "yes") {
    parts.push("the core with gadgets has an even-face embedding in the projective plane");
  }
  return {
    items,
    core,
    blocks: blocks.map((block) => itemBlock(block, nameOf)),
    bigSide,
    evenFace,
    complete,
    note: parts.join("; "),
  };
}

function itemBlock(block: Block, nameOf: (v: number) => string): ItemBlock {
  const sides: [string[], string[]] = [[], []];
  block.inside.forEach((v, i) => sides[block.insideSide[i]].push(nameOf(v)));
  block.attachments.forEach((v, i) => sides[block.attachmentSide[i]].push(nameOf(v)));
  return {
    items: Array.from(block.inside, nameOf),
    attachments: Array.from(block.attachments, nameOf),
    sides,
  };
}

function transversalUpTo(
  graph: Graph,
  enough: number,
  meter: Meter,
): { lower: number; exact: boolean } {
  const { lower, upper } = leastTransversal(graph, meter, { limit: enough - 1 });
  return { lower, exact: lower === upper };
}

function evenFaceOf(graph: Graph, meter: Meter): DecomposedComponent["evenFace"] {
  try {
    const found = evenFaceEmbedding(graph, meter, { witness: false });
    if (found.kind === "embedded") return "yes";
    return "no";
  } catch (error) {
    if (error instanceof Interrupted) return "unknown";
    throw error;
  }
}
