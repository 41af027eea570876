import { describe, expect, it } from "vitest";
import { compile, type TopLevelSpec } from "vega-lite";
import * as vega from "vega";
import { Verdict } from "../../lib/certify/verdict.ts";
import { registerRenderers } from "../../lib/display/register.ts";
import { withSource } from "../../lib/display/sources.ts";
import { chartWeights, drawChart, vegaLiteSpec } from "../../lib/display/weight-chart.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { type Displayable, render } from "../../lib/run/displayable.ts";
import { markupProblem } from "../support/markup.ts";
import { smallMarket } from "../support/quay.ts";
import { firstFit } from "../support/solutions.ts";

registerRenderers();

/** HTML and text of a result, after checking what must hold for every bundle. */
async function bundle(result: Displayable): Promise<{ html: string; text: string }> {
  const { "text/html": html, "text/plain": text } = await render(result);
  expect(typeof html).toBe("string");
  expect(typeof text).toBe("string");
  expect(markupProblem(String(html))).toBe(undefined);
  // Notebooks strip these from outputs they do not trust.
  expect(/<(script|style|svg)\b/.test(String(html))).toBe(false);
  return { html: String(html), text: String(text) };
}

describe("an instance", () => {
  it("shows its size, first rows, conflicts by reason, and notes", async () => {
    const { text } = await bundle(smallMarket(5, 4, 1));
    expect(text).toContain("20 items, 31 conflicts");
    expect(text).toContain("rests");
    expect(text).toContain("the first 6 of 20 rows");
    const noted = Instance.from({ items: [{ id: "a", weight: 0 }], conflicts: [] });
    expect((await bundle(noted)).text).toContain(noted.notes[0]);
  });
});

describe("a solution", () => {
  const instance = smallMarket(5, 4, 1);

  it("puts the answer first, then the chosen items with their rows, then the methods", async () => {
    const solution = withSource(firstFit(instance), instance);
    const { text } = await bundle(solution);
    expect(text.startsWith(`${solution.chosen.length} of 20 items chosen, worth`)).toBe(true);
    expect(text.indexOf("Proved optimal")).toBeLessThan(text.indexOf("Chosen"));
    expect(text.indexOf("Chosen")).toBeLessThan(text.indexOf("How it was solved"));
    expect(text).toContain("trade");
  });

  it("lists ids where the rows are not at hand", async () => {
    expect((await bundle(firstFit(instance))).text).toContain("Chosen: ");
  });

  it("says what is not proved", async () => {
    const { html } = await bundle(firstFit(instance, {
      status: "feasible",
      upperBound: 5000,
      floatingBound: 4000.5,
      reason: "stopped",
      choose: ["p1-e1"],
      leave: ["p2-e2", "p2-e3"],
    }));
    for (
      const phrase of [
        "Not proved optimal",
        "None is worth more than 5,000 euros",
        "The run ended early: stopped.",
        "A floating-point solver puts the bound at 4,000.5 euros; that is no proof.",
        "1 item was required.",
        "2 items were ruled out.",
      ]
    ) expect(html).toContain(phrase);
  });

  it("tells the figures of an engine in words", async () => {
    const [part] = firstFit(instance).parts;
    const parts = [{ ...part, engine: "new", figures: { verticesLeft: 1277, mode: "dense" } }];
    expect((await bundle(firstFit(instance, { parts }))).text)
      .toContain("new (vertices left 1,277, mode dense)");
  });

  it("adds many parts solved alike up in one row", async () => {
    const [part] = firstFit(instance).parts;
    const parts = Array.from(
      { length: 500 },
      (_, i) => ({ ...part, engine: i < 3 ? "branch" : "bipartite" }),
    );
    const { html } = await bundle(firstFit(instance, { parts }));
    expect(html.match(/<tr>/g)?.length).toBeLessThan(10);
    expect(html).toContain(">497<");
  });
});

describe("a verdict", () => {
  it("is one line", async () => {
    expect((await bundle(new Verdict(true, "all parts hold"))).html).toContain("✓ Proved");
    expect((await bundle(new Verdict(false, "part 3: <bad>"))).html).toContain("✗ Not proved");
  });
});

describe("the chart of worths", () => {
  const instance = smallMarket(12, 9, 3), solution = firstFit(instance);
  const chart = chartWeights(instance, solution);

  it("counts every item of positive worth once, in ranges without gaps", () => {
    let chosen = 0, all = 0;
    chart.bars.forEach((bar, i) => {
      chosen += bar.chosen;
      all += bar.chosen + bar.refused;
      if (i > 0) expect(bar.from).toBe(chart.bars[i - 1].to);
    });
    expect([chosen, all]).toEqual([solution.chosen.length, 108]);
    expect(chart.bars.length).toBeLessThan(45);
  });

  it("draws one box for each count above zero", () => {
    const svg = drawChart(chart);
    const boxes = chart.bars.flatMap((bar) => [bar.chosen, bar.refused]).filter((n) => n > 0);
    expect(svg.match(/<rect [^>]*><title>/g)?.length).toBe(boxes.length);
    expect(markupProblem(svg)).toBe(undefined);
  });

  it("draws instances of one item, of equal worths, and worth nothing", () => {
    for (const weights of [[3], [2, 2, 2], [0, -1], [1e-7, 1e8]]) {
      const one = Instance.from({
        items: weights.map((weight, i) => ({ id: `${i}`, weight })),
        conflicts: [],
      });
      const drawn = drawChart(chartWeights(one, firstFit(one)));
      expect(/NaN|Infinity/.test(drawn)).toBe(false);
    }
  });

  it("is a Vega-Lite specification that renders the same bars", async () => {
    const spec = compile(vegaLiteSpec(chart) as unknown as TopLevelSpec).spec;
    const svg = await new vega.View(vega.parse(spec), { renderer: "none" }).toSVG();
    const drawn = svg.match(/aria-roledescription="bar"/g)?.length;
    expect(drawn).toBe(2 * chart.bars.length);
  });

  it("comes as Vega-Lite and SVG without HTML, which JupyterLab would prefer", async () => {
    const shown = await render(chart);
    expect(Object.keys(shown).sort())
      .toEqual(["application/vnd.vegalite.v5+json", "image/svg+xml", "text/plain"]);
  });
});
