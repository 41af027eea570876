import { describe, expect, it } from "vitest";
import { drawGraph } from "../../lib/display/graph-picture.ts";
import { layoutGraph } from "../../lib/display/layout.ts";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { markupProblem } from "../support/markup.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";

const path = (n: number): [number, number][] => Array.from({ length: n - 1 }, (_, i) => [i, i + 1]);

describe("layoutGraph", () => {
  it("lays a path out as long as it is", () => {
    const { x, y } = layoutGraph(graphFromPairs(20, path(20)));
    const length = Math.hypot(x[0] - x[19], y[0] - y[19]);
    expect(length).toBeGreaterThan(17);
    expect(length).toBeLessThan(21);
  });

  it("brings drawn distances close to distances in the graph on a plain grid", () => {
    const pairs: [number, number][] = [];
    const id = (i: number, j: number) => 8 * i + j;
    for (let i = 0; i < 8; i++) {
      for (let j = 0; j < 8; j++) {
        if (i > 0) pairs.push([id(i - 1, j), id(i, j)]);
        if (j > 0) pairs.push([id(i, j - 1), id(i, j)]);
      }
    }
    const { x, y } = layoutGraph(graphFromPairs(64, pairs));
    for (const [u, v] of pairs) {
      const d = Math.hypot(x[u] - x[v], y[u] - y[v]);
      expect(d).toBeGreaterThan(0.3);
      expect(d).toBeLessThan(1.7);
    }
  });

  it("is the same for the same seed, and keeps components apart", () => {
    const graph = graphFromPairs(30, path(12).concat(path(10).map(([a, b]) => [a + 12, b + 12])));
    const a = layoutGraph(graph, 5), b = layoutGraph(graph, 5);
    expect([...a.x]).toEqual([...b.x]);
    for (let u = 0; u < 12; u++) {
      for (let v = 12; v < 30; v++) {
        expect(Math.hypot(a.x[u] - a.x[v], a.y[u] - a.y[v])).toBeGreaterThan(0.9);
      }
    }
  });

  it("lays out no vertex, one vertex, and many lone ones", () => {
    expect(layoutGraph(graphFromPairs(0, [])).x.length).toBe(0);
    expect([...layoutGraph(graphFromPairs(1, [])).x]).toEqual([0]);
    const { x, y } = layoutGraph(graphFromPairs(50, []));
    expect(new Set(Array.from(x, (value, i) => `${value} ${y[i]}`)).size).toBe(50);
  });

  it("refuses what is too large to draw", () => {
    expect(() => layoutGraph(graphFromPairs(2001, path(2001)))).toThrow(/at most 2000/);
  });
});

describe("drawGraph", () => {
  const draw = (n: number, pairs: [number, number][]) =>
    drawGraph({
      graph: graphFromPairs(n, pairs),
      labels: Array.from({ length: n }, (_, i) => `<${i}>`),
      styles: [{ fill: "#123456", name: "item <&>" }],
      styleOf: new Uint8Array(n),
      strong: [{ edges: pairs.length > 0 ? [0] : [], colour: "#ff0000", name: "first" }],
    }, `picture of ${n} & more`);

  it("draws each vertex and each edge once, well formed and without broken numbers", () => {
    for (const n of [1, 2, 5, 60]) {
      const svg = draw(n, path(n));
      expect(svg.match(/<line /g)?.length ?? 0).toBe(n - 1);
      expect(markupProblem(svg)).toBe(undefined);
      expect(/NaN|Infinity/.test(svg)).toBe(false);
    }
  });

  it("draws the empty graph", () => {
    expect(/NaN|Infinity/.test(draw(0, []))).toBe(false);
  });

  it("draws the same text for the same graph", () => {
    const { n, tails, heads } = mirroredGrid(5, 7);
    const pairs = Array.from(tails, (u, e): [number, number] => [u, heads[e]]);
    expect(draw(n, pairs)).toBe(draw(n, pairs));
  });
});
