import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { components, componentSubgraphs } from "../../lib/graph/components.ts";
import { traceSignedFaces } from "../../lib/graph/embedding.ts";
import { type Graph, graphFromEdges, graphFromPairs } from "../../lib/graph/graph.ts";
import { planarRotation } from "../../lib/graph/planarity.ts";
import { twoColouring } from "../../lib/graph/two-colouring.ts";
import { doubleCover, liftedEmbedding } from "../../lib/parity/double-cover.ts";
import { evenFaceEmbedding } from "../../lib/parity/even-face.ts";
import { isAntipodal } from "../../lib/parity/even-face-repair.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { hasEvenFaceEmbedding, rotationSystemCount } from "../oracle/even-face.ts";
import { bruteOcp } from "../oracle/ocp.ts";
import { planarProblem, subdivisionProblem } from "../oracle/planarity.ts";
import { graphFromGraph6 } from "../support/graph6.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { patchedGrid } from "../support/patched-grid.ts";
import { randomConnectedGraph } from "../support/random-graphs.ts";

type Pairs = (readonly [number, number])[];

/** Recognises, checks the witness by independent code, and says what came out. */
function recognise(graph: Graph): string {
  const answer = evenFaceEmbedding(graph, new Meter());
  const cover = doubleCover(graph);
  if (answer.kind === "embedded") {
    const { next } = answer;
    expect(answer.graph).toBe(graph);
    const { coverNext } = liftedEmbedding(answer);
    expect(planarProblem(cover, coverNext)).toBe(undefined);
    expect(components(cover).count).toBe(1);
    expect(coverNext.every((e, d) => coverNext[e ^ 2] === (d ^ 2))).toBe(true);
    const { lengths } = traceSignedFaces({ next, twisted: new Uint8Array(graph.m).fill(1) });
    expect(lengths.every((length) => length % 2 === 0)).toBe(true);
    return "embedded";
  }
  expect(answer.kuratowski !== undefined).toBe(answer.reason === "cover not planar");
  if (answer.kuratowski) expect(subdivisionProblem(cover, answer.kuratowski)).toBe(undefined);
  return answer.reason;
}

function pairsOf(graph: Graph): [number, number][] {
  return Array.from(graph.tails, (u, e) => [u, graph.heads[e]]);
}

/** Vertices and edges in random order. */
function shuffled(graph: Graph, random: Random): Graph {
  const order = random.shuffle(Int32Array.from({ length: graph.n }, (_, v) => v));
  const pairs = random.shuffle(pairsOf(graph));
  return graphFromPairs(graph.n, pairs.map(([u, v]) => [order[u], order[v]] as const));
}

describe("evenFaceEmbedding against all rotation systems", () => {
  it("agrees on random connected graphs, whatever their cut vertices and pairs", () => {
    const random = new Random(31);
    const seen = new Map<string, number>();
    for (let t = 0; t < 2500; t++) {
      const n = 3 + random.below(7);
      const graph = randomConnectedGraph(random, n, 1 + random.below(n));
      if (twoColouring(graph).side !== undefined || rotationSystemCount(graph) > 5000) continue;
      const found = recognise(graph);
      seen.set(found, (seen.get(found) ?? 0) + 1);
      expect(found === "embedded").toBe(hasEvenFaceEmbedding(graph));
    }
    expect([...seen.keys()].sort()).toEqual([
      "cover not planar",
      "embedded",
      "odd cycles in separate blocks",
      "orientation kept",
    ]);
    expect(Math.min(...seen.values())).toBeGreaterThan(10);
  });

  it("agrees on the networkx atlas, and embeds only graphs without two disjoint odd cycles", () => {
    // Source of the graphs: the atlas of graphs up to seven vertices in networkx.
    const file = new URL("../fixtures/planarity.json", import.meta.url);
    const recorded = JSON.parse(readFileSync(file, "utf8")) as Record<string, string[]>;
    let embedded = 0, compared = 0;
    for (const text of [...recorded.planar, ...recorded.notPlanar]) {
      const graph = graphFromGraph6(text);
      if (graph.n > 7) continue;
      const found = recognise(graph);
      if (found === "embedded") {
        embedded++;
        expect(bruteOcp(graph)).toBe(1);
      } else if (found === "odd cycles in separate blocks") {
        expect(bruteOcp(graph)).toBeGreaterThan(1);
      }
      expect(found === "bipartite" || found === "not connected").toBe(
        twoColouring(graph).side !== undefined || components(graph).count !== 1,
      );
      if (found === "bipartite" || found === "not connected") continue;
      if (rotationSystemCount(graph) > 3000) continue;
      compared++;
      expect(found === "embedded").toBe(hasEvenFaceEmbedding(graph));
    }
    expect(embedded).toBeGreaterThan(200);
    expect(compared).toBeGreaterThan(400);
  });
});

describe("evenFaceEmbedding on families", () => {
  it("embeds mirrored grids of every shape, in any order of vertices and edges", () => {
    const random = new Random(32);
    for (let rows = 2; rows <= 9; rows++) {
      for (let columns = 1 + (rows + 1) % 2; columns <= 9; columns += 2) {
        expect(recognise(mirroredGrid(rows, columns))).toBe("embedded");
        expect(recognise(shuffled(mirroredGrid(rows, columns), random))).toBe("embedded");
      }
    }
  });

  it("embeds what is left of a mirrored grid when vertices and edges are missing", () => {
    const random = new Random(37);
    let turned = 0, pieces = 0;
    for (let t = 0; t < 400; t++) {
      const rows = 3 + random.below(10), columns = rows % 2 + 2 * (1 + random.below(5));
      const grid = mirroredGrid(rows, columns), missing = random.unit() / 3;
      const kept = pairsOf(grid).filter(() => random.unit() >= missing);
      const keep = Uint8Array.from({ length: grid.n }, () => random.unit() >= missing / 4 ? 1 : 0);
      for (const { graph } of componentSubgraphs(graphFromPairs(grid.n, kept), keep)) {
        if (twoColouring(graph).side !== undefined) continue;
        pieces++;
        expect(recognise(graph)).toBe("embedded");
        const coverNext = planarRotation(doubleCover(graph), new Meter());
        if (coverNext !== undefined && !isAntipodal(coverNext)) turned++;
      }
    }
    expect(pieces).toBeGreaterThan(200);
    expect(turned).toBeGreaterThan(50);
  });

  it("turns patches behind two vertices the right way, where the planarity test did not", () => {
    const random = new Random(33);
    const shapes = [[3, 3], [2, 4], [4, 2], [3, 5], [5, 3], [4, 4], [2, 2], [6, 6]];
    let turned = 0, total = 0;
    for (let t = 0; t < 500; t++) {
      const [rows, columns] = shapes[random.below(shapes.length)];
      const graph = patchedGrid(random, rows, columns, 1 + random.below(8));
      if (twoColouring(graph).side !== undefined) continue;
      total++;
      expect(recognise(graph)).toBe("embedded");
      const coverNext = planarRotation(doubleCover(graph), new Meter());
      if (coverNext !== undefined && !isAntipodal(coverNext)) turned++;
    }
    expect(total).toBeGreaterThan(400);
    expect(turned).toBeGreaterThan(total / 2);
  });

  it("embeds no graph with two disjoint odd cycles: grids with edges added at random", () => {
    const random = new Random(34);
    const seen = [0, 0];
    for (let t = 0; t < 150; t++) {
      const [rows, columns] = [[4, 4], [3, 5], [2, 6]][random.below(3)];
      const grid = mirroredGrid(rows, columns);
      const pairs: Pairs = pairsOf(grid);
      for (let i = 1 + random.below(2); i > 0; i--) {
        const u = random.below(grid.n), v = (u + 1 + random.below(grid.n - 1)) % grid.n;
        pairs.push([u, v]);
      }
      const graph = graphFromPairs(grid.n, pairs);
      const embedded = recognise(graph) === "embedded";
      seen[embedded ? 1 : 0]++;
      if (embedded) expect(bruteOcp(graph)).toBe(1);
    }
    expect(Math.min(...seen)).toBeGreaterThan(10);
  });

  it("sees that swapping keeps orientation: cylinders of odd rings, planar with two odd faces", () => {
    for (const [ring, height] of [[3, 3], [5, 2], [5, 4], [7, 3]]) {
      const pairs: Pairs = [];
      for (let i = 0; i < height; i++) {
        for (let j = 0; j < ring; j++) {
          pairs.push([i * ring + j, i * ring + (j + 1) % ring]);
          if (i + 1 < height) pairs.push([i * ring + j, (i + 1) * ring + j]);
        }
      }
      expect(recognise(graphFromPairs(ring * height, pairs))).toBe("orientation kept");
    }
  });

  it("sees covers that are not planar: torus grids with an odd side, with their subdivisions", () => {
    for (const [rows, columns] of [[3, 4], [5, 5], [5, 6]]) {
      const pairs: Pairs = [];
      for (let i = 0; i < rows; i++) {
        for (let j = 0; j < columns; j++) {
          pairs.push([i * columns + j, i * columns + (j + 1) % columns]);
          pairs.push([i * columns + j, (i + 1) % rows * columns + j]);
        }
      }
      expect(recognise(graphFromPairs(rows * columns, pairs))).toBe("cover not planar");
    }
  });

  it("knows complete graphs, Möbius ladders and generalised Petersen graphs", () => {
    const complete = (n: number) =>
      graphFromPairs(
        n,
        Array.from({ length: n * n }, (_, i): [number, number] => [Math.floor(i / n), i % n])
          .filter(([u, v]) => u < v),
      );
    expect(recognise(complete(3))).toBe("embedded");
    expect(recognise(complete(4))).toBe("embedded");
    expect(hasEvenFaceEmbedding(complete(5))).toBe(recognise(complete(5)) === "embedded");
    expect(recognise(complete(6))).not.toBe("embedded"); // two disjoint triangles
    for (const rungs of [4, 6, 10]) {
      const pairs: Pairs = [];
      for (let i = 0; i < 2 * rungs; i++) {
        pairs.push([i, (i + 1) % (2 * rungs)]);
        if (i < rungs) pairs.push([i, i + rungs]);
      }
      expect(recognise(graphFromPairs(2 * rungs, pairs))).toBe("embedded");
    }
    // The Petersen graph lies in the projective plane with six pentagons, but its odd cycles pack.
    const petersen: Pairs = [];
    for (let i = 0; i < 5; i++) {
      petersen.push([i, (i + 1) % 5], [i, i + 5], [5 + i, 5 + (i + 2) % 5]);
    }
    const graph = graphFromPairs(10, petersen);
    expect(bruteOcp(graph)).toBe(2);
    expect(recognise(graph)).not.toBe("embedded");
    expect(hasEvenFaceEmbedding(graph)).toBe(false);
  });
});

describe("evenFaceEmbedding on blocks and tiny inputs", () => {
  const triangle: Pairs = [[0, 1], [1, 2], [2, 0]];
  const shifted = (pairs: Pairs, by: number): Pairs => pairs.map(([u, v]) => [u + by, v + by]);
  const k33: Pairs = [0, 1, 2].flatMap((u) => [3, 4, 5].map((v) => [u, v] as const));

  it("answers for no vertices, one, an edge, and several components", () => {
    expect(recognise(graphFromPairs(0, []))).toBe("not connected");
    expect(recognise(graphFromPairs(1, []))).toBe("bipartite");
    expect(recognise(graphFromPairs(2, [[0, 1]]))).toBe("bipartite");
    expect(recognise(graphFromPairs(4, triangle))).toBe("not connected");
    expect(recognise(graphFromPairs(3, triangle))).toBe("embedded");
  });

  it("crosses odd blocks at a shared vertex and refuses those apart", () => {
    const flower: Pairs = [0, 1, 2, 3].flatMap((i): Pairs => [
      [0, 2 * i + 1],
      [2 * i + 1, 2 * i + 2],
      [2 * i + 2, 0],
    ]);
    expect(recognise(graphFromPairs(9, flower))).toBe("embedded");
    const chain: Pairs = [...triangle, [2, 3], ...shifted(triangle, 3)];
    expect(recognise(graphFromPairs(6, chain))).toBe("odd cycles in separate blocks");
    const grid = mirroredGrid(4, 4);
    const both: Pairs = [...pairsOf(grid), [0, 16], [16, 17], [17, 0]];
    expect(recognise(graphFromPairs(18, both))).toBe("odd cycles in separate blocks");
  });

  it("hangs planar bipartite blocks beside their vertices, however deep they nest", () => {
    const grid = mirroredGrid(4, 4);
    const pairs: Pairs = [...pairsOf(grid)];
    let n = 16;
    const random = new Random(35);
    for (let i = 0; i < 40; i++) {
      const at = random.below(n); // a cube less a vertex, hung on by one of the others
      const name = (x: number) => x === 0 ? at : n + x - 1;
      for (
        const [u, v] of [[0, 1], [0, 2], [1, 3], [2, 3], [1, 4], [4, 5], [3, 5], [2, 6], [6, 5]]
      ) {
        pairs.push([name(u), name(v)]);
      }
      n += 6;
    }
    expect(recognise(shuffled(graphFromPairs(n, pairs), random))).toBe("embedded");
    pairs.push(...k33.map(([u, v]) => [u === 0 ? 7 : n + u - 1, n + v - 1] as const));
    expect(recognise(shuffled(graphFromPairs(n + 5, pairs), random))).toBe("cover not planar");
  });

  it("follows long chains without recursion, in a grid and in a ladder", () => {
    const grid = mirroredGrid(4, 4), length = 300_000;
    const path: Pairs = Array.from({ length: length - 1 }, (_, i) => [16 + i, 17 + i] as const);
    const pairs: Pairs = [...pairsOf(grid).slice(1), ...path, [16 + length - 1, grid.heads[0]]];
    pairs.push([grid.tails[0], 16]);
    const long = graphFromPairs(16 + length, pairs);
    expect(evenFaceEmbedding(long, new Meter()).kind).toBe("embedded");
    const rungs = 100_000;
    const ladder: Pairs = Array.from(
      { length: 3 * rungs },
      (_, i) => i < 2 * rungs ? [i, (i + 1) % (2 * rungs)] : [i - 2 * rungs, i - rungs],
    );
    const graph = graphFromPairs(2 * rungs, ladder);
    expect(evenFaceEmbedding(graph, new Meter()).kind).toBe("embedded");
  });

  it("answers in the caller's numbers when it has renumbered a large scattered graph", () => {
    const random = new Random(36);
    const grid = shuffled(mirroredGrid(200, 200), random);
    const answer = evenFaceEmbedding(grid, new Meter());
    if (answer.kind !== "embedded") throw new Error(answer.reason);
    const { cover, coverNext } = liftedEmbedding(answer);
    expect(planarProblem(cover, coverNext)).toBe(undefined);
    expect(isAntipodal(coverNext)).toBe(true);
    const more = graphFromEdges(
      grid.n,
      Int32Array.from([...grid.tails, 0, 1]),
      Int32Array.from([...grid.heads, grid.n - 1, grid.n - 2]),
    );
    const no = evenFaceEmbedding(more, new Meter());
    if (no.kind !== "no" || no.kuratowski === undefined) throw new Error("expected a witness");
    expect(subdivisionProblem(doubleCover(more), no.kuratowski)).toBe(undefined);
    const plain = evenFaceEmbedding(more, new Meter(), { witness: false });
    expect(plain).toEqual({ kind: "no", reason: "cover not planar" });
  });

  it("stops when the meter has run out", () => {
    expect(() => evenFaceEmbedding(mirroredGrid(50, 50), new Meter().within(5000)))
      .toThrow(Interrupted);
  });
});
