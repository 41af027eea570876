import { describe, expect, it } from "vitest";
import { layoutDisc } from "../../lib/display/disc-layout.ts";
import { drawDisc } from "../../lib/display/disc-picture.ts";
import { drawEmbedding } from "../../lib/display/disc.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { evenFaceEmbedding } from "../../lib/parity/even-face.ts";
import type { EvenFaceEmbedding } from "../../lib/parity/even-face-result.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { markupProblem } from "../support/markup.ts";
import { hardWeights, mirroredGrid } from "../support/mirrored-grid.ts";

const k4 = graphFromPairs(4, [[0, 1], [0, 2], [0, 3], [1, 2], [1, 3], [2, 3]]);

function embedded(graph: Graph): EvenFaceEmbedding {
  const result = evenFaceEmbedding(graph, new Meter());
  if (result.kind !== "embedded") throw new Error(`expected an embedding, got ${result.reason}`);
  return result;
}

/** A mirrored grid with a few edges taken out: faces of several sizes. */
function holed(rows: number, columns: number, seed: number): Graph {
  const grid = mirroredGrid(rows, columns);
  const random = new Random(seed);
  const pairs: [number, number][] = [];
  for (let e = 0; e < grid.m; e++) {
    if (random.below(12) > 0) pairs.push([grid.tails[e], grid.heads[e]]);
  }
  return graphFromPairs(grid.n, pairs);
}

/** Whether two open segments cross properly. */
function cross(a: number[], b: number[], c: number[], d: number[]): boolean {
  const side = (p: number[], q: number[], r: number[]) =>
    (q[0] - p[0]) * (r[1] - p[1]) - (q[1] - p[1]) * (r[0] - p[0]);
  return side(a, b, c) * side(a, b, d) < -1e-18 && side(c, d, a) * side(c, d, b) < -1e-18;
}

describe("layoutDisc", () => {
  const graphs: [string, Graph][] = [
    ["the complete graph on four vertices", k4],
    ["a 3 x 5 mirrored grid", mirroredGrid(3, 5)],
    ["a 7 x 9 mirrored grid", mirroredGrid(7, 9)],
    ["an 8 x 6 mirrored grid", mirroredGrid(8, 6)],
  ];
  for (const [name, graph] of graphs) {
    it(`shows each vertex and edge of ${name}, those on the rim twice and opposite`, () => {
      const embedding = embedded(graph);
      const disc = layoutDisc(embedding);
      const half = disc.rim.length / 2;
      expect(half % 2).toBe(1);
      for (let i = 0; i < half; i++) {
        const v = disc.rim[i], w = disc.rim[i + half];
        expect(w).toBe(v ^ 1);
        expect(Math.hypot(disc.x[v] + disc.x[w], disc.y[v] + disc.y[w])).toBeLessThan(1e-9);
        expect(Math.hypot(disc.x[v], disc.y[v])).toBeCloseTo(1, 9);
      }
      expect(disc.vertices.length).toBe(graph.n + half);
      expect(new Set(disc.vertices.map((v) => v >> 1)).size).toBe(graph.n);
      expect(disc.edges.length).toBe(graph.m + half);
      expect(new Set(disc.edges.map((e) => e >> 1)).size).toBe(graph.m);
    });

    it(`draws ${name} without crossings`, () => {
      const embedding = embedded(graph);
      const { cover: { tails, heads }, edges, x, y } = layoutDisc(embedding);
      const at = (v: number) => [x[v], y[v]];
      for (let i = 0; i < edges.length; i++) {
        for (let j = 0; j < i; j++) {
          const [a, b, c, d] = [tails[edges[i]], heads[edges[i]], tails[edges[j]], heads[edges[j]]];
          if (a === c || a === d || b === c || b === d) continue;
          expect(cross(at(a), at(b), at(c), at(d))).toBe(false);
        }
      }
      for (const e of edges) {
        expect(Math.hypot(x[tails[e]] - x[heads[e]], y[tails[e]] - y[heads[e]])).toBeGreaterThan(
          1e-3,
        );
      }
    });
  }

  it("keeps every point of irregular embeddings inside the disc", () => {
    let seen = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const result = evenFaceEmbedding(holed(5, 7, seed), new Meter());
      if (result.kind !== "embedded") continue;
      seen++;
      const { vertices, x, y } = layoutDisc(result);
      for (const v of vertices) expect(Math.hypot(x[v], y[v])).toBeLessThan(1 + 1e-9);
    }
    expect(seen).toBeGreaterThan(5);
  });
});

describe("drawDisc", () => {
  it("is well formed and has a dot for each vertex of the disc", () => {
    const graph = mirroredGrid(5, 7);
    const svg = drawDisc({
      embedding: embedded(graph),
      labels: Array.from({ length: graph.n }, (_, i) => `<${i}>`),
      styles: [{ fill: "#111111", name: "all" }],
      styleOf: new Uint8Array(graph.n),
    }, "a disc");
    expect(markupProblem(svg)).toBe(undefined);
    expect(/NaN|Infinity/.test(svg)).toBe(false);
    expect(svg.match(/<circle [^>]*><title>/g)?.length).toBe(35 + 5);
  });
});

describe("the curve across strong edges", () => {
  it("runs from rim to rim through the faces of a cut", () => {
    // Two rows of the grid: the edges between them are crossed by one closed curve.
    const graph = mirroredGrid(5, 7);
    const between = Uint8Array.from(
      graph.tails,
      (u, e) => Math.floor(u / 7) === 1 && Math.floor(graph.heads[e] / 7) === 2 ? 1 : 0,
    );
    const svg = drawDisc({
      embedding: embedded(graph),
      labels: Array.from({ length: graph.n }, () => ""),
      styles: [{ fill: "#111111", name: "all" }],
      styleOf: new Uint8Array(graph.n),
      strong: between,
    }, "a cut");
    const curve = /stroke-opacity="0.25"[^>]*>((?:<line [^>]*>)*)/.exec(svg)?.[1] ?? "";
    // Six squares between seven edges, and the outer face: each of them is in the disc once.
    const pieces = curve.match(/<line /g)?.length ?? 0;
    expect(pieces).toBe(7);
  });
});

describe("drawEmbedding", () => {
  const gridInstance = (rows: number, columns: number) => asInstance(mirroredGrid(rows, columns));
  const asInstance = (graph: Graph) => {
    const weights = hardWeights(graph, new Random(4));
    return Instance.from({
      items: Array.from(weights, (weight, i) => ({ id: `v${i}`, weight })),
      conflicts: Array.from(graph.tails, (u, e) => [`v${u}`, `v${graph.heads[e]}`] as const),
    });
  };

  it("finds the projective part of an instance and draws all of it", async () => {
    const picture = await drawEmbedding(gridInstance(7, 9));
    expect(picture.title).toContain("63 items and 119 conflicts");
    expect(markupProblem(picture.svg)).toBe(undefined);
  });

  it("lets gadgets stand for blocks that cannot be drawn", async () => {
    // Four and four, all joined across, hung across a square of the grid: not planar.
    const grid = mirroredGrid(7, 9);
    const pairs = Array.from(grid.tails, (u, e): [number, number] => [u, grid.heads[e]]);
    for (let a = 63; a < 67; a++) for (let b = 67; b < 71; b++) pairs.push([a, b]);
    pairs.push([10, 63], [20, 64]);
    const picture = await drawEmbedding(asInstance(graphFromPairs(71, pairs)));
    expect(picture.title).toContain("63 items and ");
    expect(picture.svg).toContain("stands for a block");
    const plain = await drawEmbedding(asInstance(grid));
    expect(plain.svg).not.toContain("stands for a block");
  });

  it("says so where there is no such part", async () => {
    const instance = Instance.from({
      items: [{ id: "a", weight: 1 }, { id: "b", weight: 1 }],
      conflicts: [["a", "b"]],
    });
    let message = "";
    await drawEmbedding(instance).catch((error) => message = error.message);
    expect(message).toContain("no part of this instance");
  });
});
