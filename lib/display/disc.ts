/**
 * The projective part of an instance as a picture: what the half-integral relaxation leaves of it,
 * drawn in a disc with opposite boundary points identified. As in solving, blocks are replaced only
 * where the part cannot be drawn as it stands.
 */
import type { Solution } from "../certify/solution.ts";
import { componentSubgraphs } from "../graph/components.ts";
import { type Graph, inducedSubgraph } from "../graph/graph.ts";
import type { Instance } from "../instance/instance.ts";
import { evenFaceEmbedding } from "../parity/even-face.ts";
import type { EvenFaceEmbedding } from "../parity/even-face-result.ts";
import { reducePiece } from "../reduce/blocks-piece.ts";
import { halfIntegralKernel } from "../reduce/kernel.ts";
import { Meter } from "../run/meter.ts";
import { checkRunOptions, type RunOptions } from "../run/options.ts";
import { drawDisc } from "./disc-picture.ts";
import { PALETTE } from "./palette.ts";
import { Picture } from "./picture.ts";
import { counted } from "./text.ts";

/** Most vertices that are drawn; finding the cycle to cut along takes quadratic time. */
const LIMIT = 3000;

/** What can be said about the picture. */
export interface DiscOptions extends RunOptions {
  /** Fills the chosen items, and marks the conflicts with neither end chosen. */
  readonly solution?: Solution;
}

/**
 * Draws the largest part of an instance that lies in the projective plane with every face even.
 *
 * @param instance items and conflicts
 * @param options a solution to show in the picture; limits of the run
 * @returns the picture
 * @throws {RangeError} when no part has such an embedding, or the part is too large to draw
 * @throws {Interrupted} when a limit or a stop comes first: there is no half of a picture
 *
 * Complexity: one maximum flow, block replacement and planarity; then quadratic in what is drawn.
 */
export async function drawEmbedding(
  instance: Instance,
  options: DiscOptions = {},
): Promise<Picture> {
  checkRunOptions(options);
  const meter = new Meter(options);
  await meter.breathe();
  const part = largestProjectivePart(instance, meter);
  if (part === undefined) {
    throw new RangeError(
      "drawEmbedding: no part of this instance lies in the projective plane with every face even",
    );
  }
  const { graph, embedding, itemOf } = part;
  if (graph.n > LIMIT) {
    throw new RangeError(`drawEmbedding: the part has ${graph.n} vertices; the limit is ${LIMIT}`);
  }
  const { solution } = options;
  const chosen = new Set(solution?.chosen);
  // Styles: 0 chosen, 1 refused, 2 undecided, 3 stand-in of a block.
  const styleOf = Uint8Array.from(itemOf, (i) => {
    if (i < 0) return 3;
    return solution === undefined ? 2 : chosen.has(instance.ids[i]) ? 0 : 1;
  });
  const items = itemOf.reduce((sum, i) => sum + (i >= 0 ? 1 : 0), 0);
  const title = `${counted(items, "item")} and ${counted(graph.m, "conflict")} in the projective ` +
    `plane, every face even: a line that leaves the disc through the rim comes back at the ` +
    `opposite point, and items on the rim are drawn twice.` +
    (solution === undefined
      ? ""
      : " The broad curve crosses the conflicts with neither end chosen.");
  const svg = drawDisc({
    embedding,
    labels: Array.from(itemOf, (i) => labelOf(instance, i)),
    weights: Float64Array.from(itemOf, (i) => i < 0 ? 0 : instance.weights[i]),
    styles: [
      { fill: PALETTE.chosen, name: "chosen" },
      { fill: PALETTE.refused, name: "refused" },
      { fill: PALETTE.plain, name: "item" },
      { fill: PALETTE.blocks[0], name: "stands for a block" },
    ],
    styleOf,
    ...(solution !== undefined && {
      strong: Uint8Array.from(
        graph.tails,
        (u, e) => styleOf[u] === 1 && styleOf[graph.heads[e]] === 1 ? 1 : 0,
      ),
      strongName: "conflict with neither end chosen",
    }),
  }, title);
  return new Picture(svg, title);
}

function labelOf(instance: Instance, i: number): string {
  return i < 0
    ? "stands for a block"
    : `${instance.ids[i]}\n${instance.amount(instance.weights[i])}`;
}

/** A graph with an even-face embedding; vertices that stand for a block have no item (-1). */
interface ProjectivePart {
  readonly graph: Graph;
  readonly embedding: EvenFaceEmbedding;
  /** Length n: index of the item, or -1. */
  readonly itemOf: Int32Array;
}

function largestProjectivePart(instance: Instance, meter: Meter): ProjectivePart | undefined {
  const positive = inducedSubgraph(
    instance.graph,
    Uint8Array.from(instance.weights, (w) => w > 0 ? 1 : 0),
  );
  const weights = Float64Array.from(positive.vertices, (i) => instance.weights[i]);
  const { value, doubledCosts } = halfIntegralKernel(positive.graph, weights, meter);
  const half = Uint8Array.from(value, (x) => x === 1 ? 1 : 0);
  let best: ProjectivePart | undefined;
  for (const { graph, vertices, edges } of componentSubgraphs(positive.graph, half)) {
    if (graph.n <= (best?.graph.n ?? 0)) continue;
    const whole = {
      graph,
      weights: Float64Array.from(vertices, (v) => weights[v]),
      labels: Int32Array.from(vertices.keys()),
      doubledCosts: Float64Array.from(edges, (e) => doubledCosts[e]),
    };
    const itemOf = (labels: Int32Array) =>
      labels.map((id) => id < vertices.length ? positive.vertices[vertices[id]] : -1);
    const embedding = evenFaceEmbedding(graph, meter, { witness: false });
    if (embedding.kind === "embedded") {
      best = { graph, embedding, itemOf: itemOf(whole.labels) };
      continue;
    }
    for (const { graph, labels } of reducePiece(whole, meter)?.pieces ?? []) {
      if (graph.n <= (best?.graph.n ?? 0)) continue;
      const embedding = evenFaceEmbedding(graph, meter, { witness: false });
      if (embedding.kind === "embedded") best = { graph, embedding, itemOf: itemOf(labels) };
    }
  }
  return best;
}
