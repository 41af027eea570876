/**
 * A graph as a picture: vertices as dots whose area grows with their weight, conflicts as lines,
 * a legend that names the colours in use. O(n + m) elements.
 */
import type { Graph } from "../graph/graph.ts";
import { type Layout, layoutGraph } from "./layout.ts";
import { PALETTE } from "./palette.ts";
import { Canvas } from "./svg.ts";

/** How one group of vertices looks, and what the legend calls it. */
export interface VertexStyle {
  readonly fill: string;
  readonly name: string;
}

/** What to draw, and how. */
export interface GraphPicture {
  readonly graph: Graph;
  /** Length n: tooltips of vertices, also their labels where the picture is small enough. */
  readonly labels: readonly string[];
  /** Length n, >= 0: the area of a dot grows with it. Unset: all alike. */
  readonly weights?: ArrayLike<number>;
  /** Positions; unset: the layout is found. y grows downwards. */
  readonly layout?: Layout;
  readonly styles: readonly VertexStyle[];
  /** Length n: index into `styles`. */
  readonly styleOf: ArrayLike<number>;
  /** Edges drawn strong, one colour and legend name for each list of edge numbers. */
  readonly strong?: readonly { edges: readonly number[]; colour: string; name: string }[];
}

const WIDTH = 760;
const MARGIN = 24;
/** Most vertices whose labels are written beside them. */
const LABELLED = 40;

/** Draws a graph. @returns an SVG document */
export function drawGraph(picture: GraphPicture, title: string): string {
  const { graph } = picture;
  const place = fitted(picture.layout ?? layoutGraph(graph), graph.n);
  const legend = [
    ...picture.styles.filter((_, s) => some(picture.styleOf, graph.n, s)),
    ...(picture.strong ?? []).map((s) => ({ fill: s.colour, name: s.name })),
  ].filter((entry) => entry.name !== "");
  const canvas = new Canvas(WIDTH, place.height + (legend.length > 0 ? 30 : 0));
  drawEdges(canvas, picture, place);
  drawVertices(canvas, picture, place);
  drawLegend(canvas, legend, place.height + 8);
  return canvas.toSvg(title);
}

interface Placed extends Layout {
  readonly height: number;
  /** Length of a typical edge in px. */
  readonly unit: number;
}

/** Scales positions to the width of the picture, with at most four fifths of it as height. */
function fitted(layout: Layout, n: number): Placed {
  let left = layout.x[0] ?? 0, right = left, top = layout.y[0] ?? 0, bottom = top;
  for (let v = 0; v < n; v++) {
    left = Math.min(left, layout.x[v]);
    right = Math.max(right, layout.x[v]);
    top = Math.min(top, layout.y[v]);
    bottom = Math.max(bottom, layout.y[v]);
  }
  const inner = WIDTH - 2 * MARGIN;
  const wide = right > left ? inner / (right - left) : Infinity;
  const high = bottom > top ? (0.8 * inner) / (bottom - top) : Infinity;
  const scale = Number.isFinite(Math.min(wide, high)) ? Math.min(wide, high, 90) : 1;
  const shift = MARGIN + (inner - scale * (right - left)) / 2;
  const x = new Float64Array(n), y = new Float64Array(n);
  for (let v = 0; v < n; v++) {
    x[v] = shift + scale * (layout.x[v] - left);
    y[v] = MARGIN + scale * (layout.y[v] - top);
  }
  return {
    x,
    y,
    height: 2 * MARGIN + scale * (bottom - top),
    unit: Math.sqrt(area(x, y) / Math.max(1, n)),
  };
}

function area(x: Float64Array, y: Float64Array): number {
  if (x.length === 0) return 1;
  const width = Math.max(...x) - Math.min(...x), height = Math.max(...y) - Math.min(...y);
  return Math.max(width, 30) * Math.max(height, 30);
}

function some(styleOf: ArrayLike<number>, n: number, style: number): boolean {
  for (let v = 0; v < n; v++) if (styleOf[v] === style) return true;
  return false;
}

function drawEdges(canvas: Canvas, { graph, strong = [] }: GraphPicture, { x, y }: Placed): void {
  const colours = new Map<number, string>();
  for (const { edges, colour } of strong) for (const e of edges) colours.set(e, colour);
  const line = (e: number) => ({
    x1: x[graph.tails[e]],
    y1: y[graph.tails[e]],
    x2: x[graph.heads[e]],
    y2: y[graph.heads[e]],
  });
  canvas.group({ stroke: PALETTE.line, "stroke-width": graph.m > 600 ? 0.7 : 1.1 });
  for (let e = 0; e < graph.m; e++) if (!colours.has(e)) canvas.add("line", line(e));
  canvas.end();
  for (const [e, stroke] of colours) {
    canvas.add("line", { ...line(e), stroke, "stroke-width": 2.6, "stroke-linecap": "round" });
  }
}

function drawVertices(canvas: Canvas, picture: GraphPicture, { x, y, unit }: Placed): void {
  const { graph, labels, weights, styles, styleOf } = picture;
  const largest = Math.min(14, Math.max(2.5, unit * 0.3)), least = Math.max(1.5, largest * 0.35);
  let heaviest = 0;
  for (let v = 0; v < graph.n; v++) heaviest = Math.max(heaviest, weights?.[v] ?? 0);
  canvas.group({ stroke: PALETTE.ink, "stroke-width": 0.8 });
  for (let v = 0; v < graph.n; v++) {
    const share = weights === undefined || heaviest === 0
      ? 0.4
      : Math.max(0, weights[v]) / heaviest;
    const r = Math.max(least, largest * Math.sqrt(share));
    canvas.add("circle", { cx: x[v], cy: y[v], r, fill: styles[styleOf[v]].fill }, labels[v]);
  }
  canvas.end();
  if (graph.n > LABELLED) return;
  canvas.group({ fill: PALETTE.ink, "font-size": 11, "text-anchor": "middle" });
  for (let v = 0; v < graph.n; v++) canvas.text(x[v], y[v] - largest - 3, shortLabel(labels[v]));
  canvas.end();
}

/** The first line of a label, cut to what fits beside a dot. */
function shortLabel(label: string): string {
  const line = label.split("\n", 1)[0];
  return [...line].length > 14 ? `${[...line].slice(0, 13).join("")}…` : line;
}

/** Draws one row of named dots; also used below other pictures. */
export function drawLegend(canvas: Canvas, entries: readonly VertexStyle[], y: number): void {
  let x = MARGIN;
  for (const { fill, name } of entries) {
    canvas.add("circle", {
      cx: x + 5,
      cy: y + 4,
      r: 5,
      fill,
      stroke: PALETTE.ink,
      "stroke-width": 0.6,
    });
    canvas.text(x + 15, y + 8, name, { fill: PALETTE.ink, "font-size": 12 });
    x += 34 + 6.4 * name.length;
  }
}
