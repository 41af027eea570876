/**
 * An even-face embedding in the projective plane, drawn as a disc: a line that leaves through the
 * rim comes back at the opposite point. Arrows on the rim say so.
 */
import type { EvenFaceEmbedding } from "../parity/even-face-result.ts";
import { type DiscLayout, layoutDisc } from "./disc-layout.ts";
import { drawLegend, type VertexStyle } from "./graph-picture.ts";
import { PALETTE } from "./palette.ts";
import { Canvas } from "./svg.ts";

/** What to draw. H is the embedded graph. */
export interface DiscPicture {
  readonly embedding: EvenFaceEmbedding;
  /** Length n of H: tooltips. */
  readonly labels: readonly string[];
  /** Length n of H, >= 0: the area of a dot grows with it. */
  readonly weights?: ArrayLike<number>;
  readonly styles: readonly VertexStyle[];
  /** Length n of H: index into `styles`. */
  readonly styleOf: ArrayLike<number>;
  /** Length m of H: 1 where the edge is drawn strong, such as edges with no end chosen. */
  readonly strong?: ArrayLike<number>;
  /** What the legend calls strong edges. */
  readonly strongName?: string;
}

const SIZE = 720;
const RADIUS = 322;

/** Draws the disc. @returns an SVG document */
export function drawDisc(picture: DiscPicture, title: string): string {
  const { embedding, labels, weights, styles, styleOf, strong } = picture;
  const disc = layoutDisc(embedding);
  const { cover } = disc;
  const px = (v: number) => SIZE / 2 + RADIUS * disc.x[v];
  const py = (v: number) => SIZE / 2 + RADIUS * disc.y[v];
  const canvas = new Canvas(SIZE, SIZE + 30);
  drawRim(canvas);

  const line = (e: number) => ({
    x1: px(cover.tails[e]),
    y1: py(cover.tails[e]),
    x2: px(cover.heads[e]),
    y2: py(cover.heads[e]),
  });
  const isStrong = (e: number) => strong !== undefined && strong[e >> 1] !== 0;
  canvas.group({ stroke: PALETTE.line, "stroke-width": 1 });
  for (const e of disc.edges) if (!isStrong(e)) canvas.add("line", line(e));
  canvas.end();
  drawCrossing(canvas, disc, isStrong, (e) => {
    const { x1, y1, x2, y2 } = line(e);
    return [(x1 + x2) / 2, (y1 + y2) / 2];
  }, (f) => [px(cover.n + f), py(cover.n + f)]);
  canvas.group({ stroke: PALETTE.accent, "stroke-width": 2.4, "stroke-linecap": "round" });
  for (const e of disc.edges) if (isStrong(e)) canvas.add("line", line(e));
  canvas.end();

  const reach = nearest(disc.edges, cover.tails, cover.heads, px, py, cover.n);
  let heaviest = 0;
  for (let v = 0; v < labels.length; v++) heaviest = Math.max(heaviest, weights?.[v] ?? 0);
  canvas.group({ stroke: PALETTE.ink, "stroke-width": 0.7 });
  for (const v of disc.vertices) {
    const h = v >> 1;
    const share = weights === undefined || heaviest === 0
      ? 0.5
      : Math.max(0, weights[h]) / heaviest;
    const r = Math.max(1.4, Math.min(9, 0.42 * reach[v]) * Math.sqrt(Math.max(0.12, share)));
    canvas.add("circle", { cx: px(v), cy: py(v), r, fill: styles[styleOf[h]].fill }, labels[h]);
  }
  canvas.end();
  drawLegend(canvas, [
    ...styles.filter((_, s) => Array.prototype.some.call(styleOf, (of) => of === s)),
    ...(strong !== undefined && picture.strongName !== undefined
      ? [{ fill: PALETTE.accent, name: picture.strongName }]
      : []),
  ], SIZE + 4);
  return canvas.toSvg(title);
}

/**
 * The curve that crosses the strong edges, from the middle of one to the middle of the next through
 * each face. Where more than two meet in a face they meet in its centre.
 */
function drawCrossing(
  canvas: Canvas,
  disc: DiscLayout,
  isStrong: (e: number) => boolean,
  middle: (e: number) => [number, number],
  centre: (f: number) => [number, number],
): void {
  const around = new Map<number, [number, number][]>();
  for (const e of disc.edges) {
    if (!isStrong(e)) continue;
    for (const f of [disc.faceOf[2 * e], disc.faceOf[2 * e + 1]]) {
      if (disc.inside[f] !== 0) around.set(f, [...around.get(f) ?? [], middle(e)]);
    }
  }
  canvas.group({
    stroke: PALETTE.accent,
    "stroke-width": 8,
    "stroke-opacity": 0.25,
    "stroke-linecap": "round",
  });
  for (const [f, middles] of around) {
    const ends = middles.length === 2
      ? [[middles[0], middles[1]]]
      : middles.map((one) => [one, centre(f)]);
    for (const [[x1, y1], [x2, y2]] of ends) canvas.add("line", { x1, y1, x2, y2 });
  }
  canvas.end();
}

/** The rim, with two arrows at opposite points that run the same way round. */
function drawRim(canvas: Canvas): void {
  const c = SIZE / 2;
  canvas.add("circle", { cx: c, cy: c, r: RADIUS, fill: "#ffffff", stroke: "none" });
  canvas.add("circle", {
    cx: c,
    cy: c,
    r: RADIUS + 12,
    fill: "none",
    stroke: PALETTE.faint,
    "stroke-width": 1.6,
    "stroke-dasharray": "2 5",
    "stroke-linecap": "round",
  });
  for (const turn of [45, 225, 135, 315]) {
    const sign = turn % 180 === 45 ? 0 : 1;
    canvas.group({ transform: `translate(${c} ${c}) rotate(${turn}) translate(${RADIUS + 12} 0)` });
    canvas.add("path", {
      d: sign === 0 ? "M-6 -6 L0 6 L6 -6" : "M-6 -9 L0 3 L6 -9 M-6 -1 L0 11 L6 -1",
      fill: "none",
      stroke: PALETTE.ink,
      "stroke-width": 2,
      "stroke-linejoin": "round",
    });
    canvas.end();
  }
}

/** For each vertex the length of its shortest edge in px, so that dots never cover each other. */
function nearest(
  edges: readonly number[],
  tails: Int32Array,
  heads: Int32Array,
  px: (v: number) => number,
  py: (v: number) => number,
  n: number,
): Float64Array {
  const reach = new Float64Array(n).fill(40);
  for (const e of edges) {
    const u = tails[e], v = heads[e];
    const length = Math.hypot(px(u) - px(v), py(u) - py(v));
    reach[u] = Math.min(reach[u], length);
    reach[v] = Math.min(reach[v], length);
  }
  return reach;
}
