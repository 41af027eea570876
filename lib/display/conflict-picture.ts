/**
 * The conflict graph of an instance as a picture: what is chosen, which odd cycles witness its class,
 * which items form blocks beside the core.
 */
import type { Solution } from "../certify/solution.ts";
import { type Graph, inducedSubgraph } from "../graph/graph.ts";
import type { Instance } from "../instance/instance.ts";
import type { Classification } from "../reduce/classify.ts";
import type { Decomposition } from "../reduce/decomposition.ts";
import { drawGraph, type VertexStyle } from "./graph-picture.ts";
import { placesOf } from "./graphology.ts";
import { PALETTE } from "./palette.ts";
import { Picture } from "./picture.ts";
import { counted } from "./text.ts";

/** What to point out in the picture. */
export interface ConflictPictureOptions {
  /** Fills chosen and refused items. Used where `blocks` is not given. */
  readonly solution?: Solution;
  /** Cycles to draw strong: ids in order; the last is joined to the first. */
  readonly cycles?: readonly (readonly string[])[];
  /** Groups of items to fill alike, such as the blocks of a decomposition; all others are the core. */
  readonly blocks?: readonly (readonly string[])[];
  /** Draws the witness cycles of its components strong, at most two of each; see `cycles`. */
  readonly classification?: Classification;
  /** Fills its blocks; see `blocks`. */
  readonly decomposition?: Decomposition;
  /** Draw these items only, with the conflicts among them; all if unset. */
  readonly items?: readonly string[];
}

/**
 * Draws the conflict graph. Items go where the columns `x` and `y` say if all of them have these,
 * otherwise where a layout puts them.
 *
 * @param instance items and conflicts
 * @param options what to point out
 * @returns the picture
 * @throws {RangeError} for unknown ids, and for a component above 2,000 items without places
 */
export function drawConflicts(
  instance: Instance,
  options: ConflictPictureOptions = {},
): Picture {
  const { solution } = options;
  const cycles = options.cycles ??
    options.classification?.components.flatMap((c) => c.oddCyclePacking.cycles.slice(0, 2)) ?? [];
  const blocks = options.blocks ??
    options.decomposition?.components.flatMap((c) => c.blocks.map(({ items }) => items));
  const keep = new Uint8Array(instance.size).fill(options.items === undefined ? 1 : 0);
  for (const id of options.items ?? []) keep[indexOf(instance, id)] = 1;
  const { graph, vertices } = inducedSubgraph(instance.graph, keep);
  const place = new Int32Array(instance.size).fill(-1);
  vertices.forEach((i, v) => place[i] = v);

  const { styles, styleOf } = blocks !== undefined
    ? blockStyles(instance, vertices, blocks)
    : choiceStyles(instance, vertices, solution);
  const strong = cycles.map((cycle, k) => ({
    edges: cycleEdges(graph, cycle.map((id) => place[indexOf(instance, id)])),
    colour: k % 2 === 0 ? PALETTE.accent : PALETTE.second,
    name: cycles.length === 1 ? "odd cycle" : `odd cycle ${k + 1}`,
  }));
  const title = `${counted(graph.n, "item")} and ${counted(graph.m, "conflict")}` +
    (blocks === undefined ? "" : `; ${counted(blocks.length, "block")} beside the core`) +
    (cycles.length === 0 ? "" : `; ${counted(cycles.length, "odd cycle")} drawn strong`) + ".";
  const layout = placesOf(Array.from(vertices, (i) => instance.items[i]));
  const svg = drawGraph({
    graph,
    labels: Array.from(
      vertices,
      (i) => `${instance.ids[i]}\n${instance.amount(instance.weights[i])}`,
    ),
    weights: Float64Array.from(vertices, (i) => Math.max(0, instance.weights[i])),
    styles,
    styleOf,
    strong,
    ...(layout !== undefined && { layout }),
  }, title);
  return new Picture(svg, title);
}

function indexOf(instance: Instance, id: string): number {
  const i = instance.indexOf(id);
  if (i < 0) throw new RangeError(`drawConflicts: there is no item ${JSON.stringify(id)}`);
  return i;
}

interface Styled {
  readonly styles: VertexStyle[];
  readonly styleOf: Uint8Array;
}

function choiceStyles(
  instance: Instance,
  vertices: Int32Array,
  solution: Solution | undefined,
): Styled {
  const chosen = new Set(solution?.chosen);
  return {
    styles: [
      { fill: PALETTE.chosen, name: "chosen" },
      { fill: PALETTE.refused, name: "refused" },
      { fill: PALETTE.plain, name: "item" },
    ],
    styleOf: Uint8Array.from(
      vertices,
      (i) => solution === undefined ? 2 : chosen.has(instance.ids[i]) ? 0 : 1,
    ),
  };
}

/** Blocks up to which the legend names each. */
const FEW_BLOCKS = 4;

/** Style 0 is the core; blocks take the colours by turns. */
function blockStyles(
  instance: Instance,
  vertices: Int32Array,
  blocks: readonly (readonly string[])[],
): Styled {
  const blockOf = new Int32Array(instance.size).fill(-1);
  blocks.forEach((ids, b) => ids.forEach((id) => blockOf[indexOf(instance, id)] = b));
  const colours = PALETTE.blocks;
  const styles: VertexStyle[] = [{ fill: PALETTE.plain, name: "core" }];
  for (let k = 0; k < Math.min(colours.length, blocks.length); k++) {
    const few = `block ${k + 1}`, many = k === 0 ? "blocks, colours by turns" : "";
    styles.push({ fill: colours[k], name: blocks.length <= FEW_BLOCKS ? few : many });
  }
  return {
    styles,
    styleOf: Uint8Array.from(
      vertices,
      (i) => blockOf[i] < 0 ? 0 : 1 + blockOf[i] % colours.length,
    ),
  };
}

/** The edges of a closed walk; a vertex outside the picture (-1) takes its two edges with it. */
function cycleEdges(graph: Graph, cycle: readonly number[]): number[] {
  const edges: number[] = [];
  cycle.forEach((v, k) => {
    const w = cycle[(k + 1) % cycle.length];
    if (v < 0 || w < 0) return;
    for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
      if (graph.targets[a] === w) {
        edges.push(graph.edgeOf[a]);
        return;
      }
    }
    throw new RangeError(
      "drawConflicts: two items that follow each other on a cycle have no conflict",
    );
  });
  return edges;
}
