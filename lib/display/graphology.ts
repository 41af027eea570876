/**
 * Graphology graphs as drawings. Only the shape of a graphology graph is used, so graphs of any
 * release and any copy of that library can be drawn.
 */
import { graphFromEdges } from "../graph/graph.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { headingHtml } from "./html.ts";
import { drawGraph } from "./graph-picture.ts";
import { type Layout, LAYOUT_LIMIT } from "./layout.ts";
import { PALETTE } from "./palette.ts";
import { figureHtml, Picture } from "./picture.ts";
import { counted } from "./text.ts";

/** What is used of a graphology graph. */
export interface GraphLike {
  readonly order: number;
  readonly size: number;
  nodes(): string[];
  getNodeAttributes(node: string): Record<string, unknown>;
  forEachEdge(
    callback: (edge: string, attributes: unknown, source: string, target: string) => void,
  ): void;
}

/** Whether a value is a graphology graph, of whatever copy of that library. */
export function isGraphLike(value: unknown): value is GraphLike {
  if (typeof value !== "object" || value === null) return false;
  const graph = value as Record<string, unknown>;
  return ["nodes", "getNodeAttributes", "forEachEdge"].every((name) =>
    typeof graph[name] === "function"
  ) && typeof graph.order === "number" && typeof graph.size === "number";
}

/**
 * The bundle of a graphology graph: a drawing with nodes sized by their attribute `weight`, placed
 * by `x` and `y` where all nodes have them (y upwards) and by a layout otherwise. A graph too large
 * to draw is described in words.
 */
export function renderGraphology(source: GraphLike): MimeBundle {
  const words = `graph with ${counted(source.order, "node")} and ${counted(source.size, "edge")}`;
  if (source.order === 0 || source.order > LAYOUT_LIMIT) {
    const reason = source.order === 0 ? "" : `; too large to draw (limit ${LAYOUT_LIMIT} nodes)`;
    return { "text/html": headingHtml(words + reason), "text/plain": words + reason };
  }
  const nodes = source.nodes();
  const index = new Map(nodes.map((node, i) => [node, i]));
  const tails: number[] = [], heads: number[] = [];
  source.forEachEdge((_edge, _attributes, from, to) => {
    if (from === to) return;
    tails.push(index.get(from)!);
    heads.push(index.get(to)!);
  });
  const attributes = nodes.map((node) => source.getNodeAttributes(node));
  const svg = drawGraph({
    graph: graphFromEdges(nodes.length, Int32Array.from(tails), Int32Array.from(heads)),
    labels: nodes,
    weights: columnOf(attributes, "weight"),
    layout: placesOf(attributes),
    styles: [{ fill: PALETTE.plain, name: "" }],
    styleOf: new Uint8Array(nodes.length),
  }, words);
  return {
    "text/html": figureHtml(new Picture(svg, words)),
    "text/plain": words,
  };
}

/** A column of numbers, if every row has one. */
function columnOf(
  rows: readonly Readonly<Record<string, unknown>>[],
  name: string,
): Float64Array | undefined {
  const column = new Float64Array(rows.length);
  for (let i = 0; i < rows.length; i++) {
    const value = rows[i][name];
    const number = typeof value === "string" && value.trim() !== "" ? Number(value) : value;
    if (typeof number !== "number" || !Number.isFinite(number)) return undefined;
    column[i] = number;
  }
  return column;
}

/** Positions from the columns `x` and `y`, if every row has both and not all are on one spot. */
export function placesOf(
  rows: readonly Readonly<Record<string, unknown>>[],
): Layout | undefined {
  const x = columnOf(rows, "x"), y = columnOf(rows, "y");
  if (x === undefined || y === undefined) return undefined;
  if (x.every((v) => v === x[0]) && y.every((v) => v === y[0])) return undefined;
  return { x, y: y.map((v) => -v) };
}
