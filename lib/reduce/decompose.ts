/** Core and blocks of an instance: its anatomy, for people to read and for `replaceBlocks`. */
import { graphFromEdges } from "../graph/graph.ts";
import type { Instance } from "../instance/instance.ts";
import { hereOrAside, type Job } from "../run/aside.ts";
import { checkRunOptions, type RunOptions } from "../run/options.ts";
import type { Block } from "./blocks-costs.ts";
import { type Anatomy, anatomy } from "./decompose-graph.ts";
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
  checkRunOptions(run);
  const began = performance.now();
  const { graph } = instance;
  const { n, m, tails, heads } = graph;
  const components = await hereOrAside(
    "decompose",
    n + m,
    run,
    (meter) => anatomy(graph, meter),
    (): Posted => ({ n, tails, heads }),
  );
  return new Decomposition({
    components: components.map((component) => named(instance, component)),
    elapsedMs: performance.now() - began,
    instance: {
      name: instance.name,
      items: instance.size,
      conflicts: instance.conflictCount,
      fingerprint: instance.fingerprint,
    },
  }, instance);
}

/** What is posted to the worker for the job "decompose". */
interface Posted {
  readonly n: number;
  readonly tails: Int32Array;
  readonly heads: Int32Array;
}

/** The worker's side of `decompose`. */
export const decomposeJob: Job = async (input, meter) => {
  const { n, tails, heads } = input as Posted;
  return await anatomy(graphFromEdges(n, tails, heads), meter);
};

/** A component in ids. */
function named(
  instance: Instance,
  { vertices, blocks, transversal, evenFace, complete }: Anatomy,
): DecomposedComponent {
  const nameOf = (v: number) => instance.ids[vertices[v]];
  const inBlock = new Uint8Array(vertices.length);
  for (const { inside } of blocks) for (const v of inside) inBlock[v] = 1;
  const items = Array.from(vertices, (v) => instance.ids[v]);
  const core = items.filter((_, v) => inBlock[v] === 0);
  return {
    items,
    core,
    blocks: blocks.map((block) => itemBlock(block, nameOf)),
    bigSide: transversal === undefined ? undefined : transversal >= 4,
    evenFace,
    complete,
    note: noteOf(items.length, core.length, blocks.length, transversal, evenFace, complete),
  };
}

function noteOf(
  items: number,
  core: number,
  blocks: number,
  transversal: number | undefined,
  evenFace: Anatomy["evenFace"],
  complete: boolean,
): string {
  const size = count(items, "item");
  if (transversal === 0) return `${size}: no odd cycle, so there is no core; all is one block`;
  const parts = [`${size}: a core of ${core} and ${count(blocks, "block")}`];
  if (!complete) parts.push("the search was stopped, so blocks may be missing");
  if (transversal !== undefined && transversal < 4) {
    parts.push(
      `${count(transversal, "item")} ${transversal === 1 ? "meets" : "meet"} all odd cycles, ` +
        "so no side is big whatever is taken out",
    );
  }
  if (evenFace === "yes") {
    parts.push("the core with gadgets has an even-face embedding in the projective plane");
  }
  return parts.join("; ");
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
