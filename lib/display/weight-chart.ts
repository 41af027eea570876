/**
 * How the worth of the items is spread, chosen beside refused: a stacked histogram as SVG for paper,
 * and the same data as a Vega-Lite chart for JupyterLab.
 */
import type { Solution } from "../certify/solution.ts";
import type { Instance } from "../instance/instance.ts";
import { Displayable, type MimeBundle } from "../run/displayable.ts";
import { drawLegend } from "./graph-picture.ts";
import { PALETTE } from "./palette.ts";
import { Canvas } from "./svg.ts";
import { counted, numberText } from "./text.ts";

/** A chart that JupyterLab shows with tooltips and everything else as a picture. */
export class WeightChart extends Displayable {
  /** Names the renderer. */
  readonly kind = "weight-chart";
  /** One bar for each range of worth, in ascending order; all ranges are equally wide. */
  readonly bars: readonly Bar[];
  /** The figures in one sentence. */
  readonly title: string;
  /** Unit of the worth; may be empty. */
  readonly unit: string;

  /** Takes the bars as they are; `chartWeights` counts them. */
  constructor(bars: readonly Bar[], title: string, unit: string) {
    super();
    this.bars = bars;
    this.title = title;
    this.unit = unit;
  }

  /** The figures in one sentence. */
  override toString(): string {
    return this.title;
  }
}

/** How many items have a worth from `from` up to `to`. */
export interface Bar {
  /** Least worth in the range. */
  readonly from: number;
  /** Worth at which the next range begins. */
  readonly to: number;
  /** Number of chosen items. */
  readonly chosen: number;
  /** Number of items that are not chosen. */
  readonly refused: number;
}

/** Ranges aimed at; round borders make it a few more or less. */
const RANGES = 20;

/**
 * Counts the items by worth.
 *
 * @param instance the items; those worth nothing are left out
 * @param solution says which are chosen
 * @returns the chart. O(n) time.
 */
export function chartWeights(instance: Instance, solution: Solution): WeightChart {
  const taken = new Uint8Array(instance.size);
  for (const id of solution.chosen) {
    const i = instance.indexOf(id);
    if (i >= 0) taken[i] = 1;
  }
  const worth = Array.from(instance.weights, (w) => w / instance.scale);
  let least = Infinity, most = -Infinity;
  for (const w of worth) {
    if (w <= 0) continue;
    least = Math.min(least, w);
    most = Math.max(most, w);
  }
  const bars: { from: number; to: number; chosen: number; refused: number }[] = [];
  if (least <= most) {
    const step = roundStep((most - least) / RANGES || most);
    const first = Math.floor(least / step), last = Math.floor(most / step);
    for (let k = first; k <= last; k++) {
      bars.push({ from: tidy(k * step), to: tidy((k + 1) * step), chosen: 0, refused: 0 });
    }
    worth.forEach((w, i) => {
      if (w <= 0) return;
      const bar = bars[Math.floor(w / step) - first];
      if (taken[i] !== 0) bar.chosen++;
      else bar.refused++;
    });
  }
  const refused = bars.reduce((sum, bar) => sum + bar.refused, 0);
  const title = `Items by worth: ${counted(solution.chosen.length, "item")} chosen, ` +
    `${numberText(refused)} refused`;
  return new WeightChart(bars, title, instance.unit);
}

/** The round number (1, 2 or 5 times a power of ten) that is next at or above. */
function roundStep(x: number): number {
  const power = 10 ** Math.floor(Math.log10(x));
  for (const f of [1, 2, 5]) if (f * power >= x * (1 - 1e-12)) return tidy(f * power);
  return tidy(10 * power);
}

function tidy(x: number): number {
  return Number(x.toPrecision(12));
}

/** The bundle of a chart: Vega-Lite 5 for JupyterLab, else the picture, else the words. */
export function renderWeightChart(chart: WeightChart): MimeBundle {
  return {
    "application/vnd.vegalite.v5+json": vegaLiteSpec(chart),
    "image/svg+xml": drawChart(chart),
    "text/plain": chart.title,
  };
}

/** The chart as a Vega-Lite specification with its data inside. */
export function vegaLiteSpec(chart: WeightChart): Record<string, unknown> {
  const worth = chart.unit === "" ? "worth" : `worth (${chart.unit})`;
  const values = chart.bars.flatMap(({ from, to, chosen, refused }) => [
    { from, to, items: chosen, standing: "chosen" },
    { from, to, items: refused, standing: "refused" },
  ]);
  return {
    $schema: "https://vega.github.io/schema/vega-lite/v5.json",
    title: { text: chart.title, anchor: "start" },
    width: 560,
    height: 220,
    background: PALETTE.ground,
    data: { values },
    mark: { type: "bar", tooltip: true, stroke: PALETTE.ink, strokeWidth: 0.5 },
    encoding: {
      x: { field: "from", type: "quantitative", bin: { binned: true }, title: worth },
      x2: { field: "to" },
      y: { field: "items", type: "quantitative", title: "items" },
      color: {
        field: "standing",
        type: "nominal",
        title: null,
        scale: { domain: ["chosen", "refused"], range: [PALETTE.chosen, PALETTE.refused] },
      },
      order: { field: "standing" },
    },
  };
}

const WIDTH = 680;
const HEIGHT = 250;
const LEFT = 50;
const BASE = 205;
const TOP = 20;

/** The chart as an SVG document. */
export function drawChart(chart: WeightChart): string {
  const { bars, unit } = chart;
  const canvas = new Canvas(WIDTH, HEIGHT + 14);
  const tallest = bars.reduce((most, bar) => Math.max(most, bar.chosen + bar.refused), 1);
  const wide = (WIDTH - LEFT - 20) / Math.max(1, bars.length);
  const high = (BASE - TOP) / tallest;
  const step = Math.max(1, roundStep(tallest / 6));
  canvas.group({ stroke: PALETTE.line, "stroke-width": 0.6 });
  for (let tick = 0; tick <= tallest; tick += step) {
    canvas.add("line", {
      x1: LEFT,
      y1: BASE - tick * high,
      x2: WIDTH - 20,
      y2: BASE - tick * high,
    });
  }
  canvas.end();
  canvas.group({ fill: PALETTE.faint, "font-size": 12, "text-anchor": "end" });
  for (let tick = 0; tick <= tallest; tick += step) {
    canvas.text(LEFT - 7, BASE - tick * high + 4, numberText(tick));
  }
  canvas.end();
  canvas.group({ stroke: PALETTE.ink, "stroke-width": 0.5 });
  bars.forEach(({ from, to, chosen, refused }, i) => {
    const x = LEFT + i * wide + 1, width = wide - 2;
    const range = `from ${numberText(from)} to ${numberText(to)}`;
    const parts: [number, number, string, string][] = [
      [0, chosen, PALETTE.chosen, "chosen"],
      [chosen, refused, PALETTE.refused, "refused"],
    ];
    for (const [below, count, fill, name] of parts) {
      if (count === 0) continue;
      const y = BASE - (below + count) * high;
      canvas.add("rect", { x, y, width, height: count * high, fill }, `${range}: ${count} ${name}`);
    }
  });
  canvas.end();
  canvas.group({ fill: PALETTE.faint, "font-size": 12, "text-anchor": "middle" });
  const every = Math.ceil(bars.length / 10);
  bars.forEach(({ from }, i) => {
    if (i % every === 0) canvas.text(LEFT + i * wide, BASE + 16, numberText(from));
  });
  canvas.end();
  canvas.text(WIDTH - 20, BASE + 34, unit === "" ? "worth" : `worth (${unit})`, {
    fill: PALETTE.faint,
    "font-size": 12,
    "text-anchor": "end",
  });
  drawLegend(canvas, [
    { fill: PALETTE.chosen, name: "chosen" },
    { fill: PALETTE.refused, name: "refused" },
  ], HEIGHT - 6);
  return canvas.toSvg(chart.title);
}
