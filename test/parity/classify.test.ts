import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { classifyGraph } from "../../lib/parity/classify-graph.ts";
import { embeddedTransversal } from "../../lib/parity/embedded-transversal.ts";
import { evenFaceEmbedding } from "../../lib/parity/even-face.ts";
import { leastTransversal } from "../../lib/parity/transversal.ts";
import { classify } from "../../lib/reduce/classify.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteOcp } from "../oracle/ocp.ts";
import { bruteOct } from "../oracle/oct.ts";
import { largestSubdeterminant } from "../oracle/subdeterminants.ts";
import { smallEvenFace } from "../support/even-face.ts";
import { graphFromGraph6 } from "../support/graph6.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { changedGrid } from "../support/odd-cycle-cases.ts";
import { faultOfOddCycles, isTransversal } from "../support/odd-cycles.ts";
import { randomGraph, randomRegularGraph } from "../support/random-graphs.ts";

/** The graph as an instance with ids v0, v1, … */
function instanceOf(graph: Graph): Instance {
  return Instance.from({
    items: Array.from({ length: graph.n }, (_, v) => ({ id: `v${v}`, weight: 1 })),
    conflicts: Array.from(graph.tails, (u, e) => [`v${u}`, `v${graph.heads[e]}`] as const),
  });
}

const indices = (ids: readonly string[]): number[] => ids.map((id) => Number(id.slice(1)));

describe("classify", () => {
  it("adds up brute-force numbers over components, with witnesses", async () => {
    const random = new Random(60);
    for (let i = 0; i < 300; i++) {
      const graph = randomGraph(random, 2 + random.below(11), 0.1 + 0.3 * random.unit());
      const found = await classify(instanceOf(graph), { workers: 0 });
      const oct = bruteOct(graph), ocp = bruteOcp(graph);
      expect(found.oddCycleTransversal).toEqual({ lower: oct, upper: oct });
      expect(found.oddCyclePacking.lower).toBeLessThanOrEqual(ocp);
      expect(found.oddCyclePacking.upper).toBeGreaterThanOrEqual(ocp);
      expect(found.maxSubdeterminant.lower).toBe(2 ** found.oddCyclePacking.lower);
      const transversal = found.components.flatMap((c) => indices(c.oddCycleTransversal.items));
      expect(isTransversal(graph, transversal)).toBe(true);
      const cycles = found.components.flatMap((c) => c.oddCyclePacking.cycles.map(indices));
      expect(faultOfOddCycles(graph, cycles)).toBe("");
      expect(cycles.length).toBe(found.oddCyclePacking.lower);
      const items = found.components.flatMap((c) => c.items);
      expect([...items].sort()).toEqual(Array.from({ length: graph.n }, (_, v) => `v${v}`).sort());
      for (const c of found.components) {
        expect(c.kind === "bipartite").toBe(c.sides !== undefined);
        if (c.sides === undefined) continue;
        const side = new Set(c.sides[0]);
        expect([...c.sides[0], ...c.sides[1]].length).toBe(c.items.length);
        for (let e = 0; e < graph.m; e++) {
          const u = `v${graph.tails[e]}`, v = `v${graph.heads[e]}`;
          if (c.items.includes(u)) expect(side.has(u)).not.toBe(side.has(v));
        }
      }
    }
  });

  it("gives the largest subdeterminant of the conflict matrix, on small graphs", () => {
    // Source: Grossman, Kulkarni and Schochetman, Linear Algebra Appl. 218, 1995: it is 2^OCP.
    const file = new URL("../fixtures/connected-graphs-to-8.g6", import.meta.url);
    const graphs = readFileSync(file, "utf8").trim().split("\n").map(graphFromGraph6);
    const seen = new Set<number>();
    const check = (graph: Graph): void => {
      const rows = Array.from(graph.tails, (u, e) => {
        return Array.from({ length: graph.n }, (_, v) => v === u || v === graph.heads[e] ? 1 : 0);
      });
      const largest = largestSubdeterminant(rows);
      const { packing } = classifyGraph(graph, new Meter());
      seen.add(largest);
      expect(largest).toBe(graph.m === 0 ? 0 : 2 ** bruteOcp(graph));
      expect(2 ** packing.lower).toBeLessThanOrEqual(largest);
      expect(2 ** packing.upper).toBeGreaterThanOrEqual(largest);
      if (packing.lower === packing.upper) expect(2 ** packing.upper).toBe(largest);
    };
    for (const graph of graphs) if (graph.n <= 6 && graph.m <= 7) check(graph);
    for (const graph of graphs) {
      if (graph.n === 7 && graph.m <= 8 && bruteOcp(graph) === 2) check(graph);
    }
    const triangles = [0, 3, 6].flatMap((t) => [[t, t + 1], [t + 1, t + 2], [t, t + 2]]);
    expect(largestSubdeterminant(triangles.map((ends) => {
      return Array.from({ length: 9 }, (_, v) => ends.includes(v) ? 1 : 0);
    }))).toBe(8);
    expect([...seen].sort()).toEqual([1, 2, 4]);
  });

  it("calls mirrored grids projective, with packing number 1 and the embedding at hand", async () => {
    const found = await classify(instanceOf(mirroredGrid(21, 13)), { workers: 0 });
    expect(found.components.length).toBe(1);
    const [{ kind, evenFace, oddCycleTransversal }] = found.components;
    expect([kind, evenFace]).toEqual(["projective", "yes"]);
    expect([oddCycleTransversal.lower, oddCycleTransversal.upper]).toEqual([13, 13]);
    expect(found.oddCyclePacking).toEqual({ lower: 1, upper: 1 });
    expect(found.maxSubdeterminant).toEqual({ lower: 2, upper: 2 });
    expect(found.embeddingOf(0)?.embedding.kind).toBe("embedded");
    expect(found.sentence).toContain("No two odd rings");
  });

  it("calls mirrored grids with blocks that are not planar projective too", () => {
    const grid = mirroredGrid(9, 9);
    const pairs = Array.from(grid.tails, (u, e): [number, number] => [u, grid.heads[e]]);
    let n = grid.n;
    for (const corner of [0, 12, 40, 70]) {
      // Behind three corners of a square: K(3,4), its colour classes following those of the square.
      for (let p = 0; p < 3; p++) for (let q = 3; q < 7; q++) pairs.push([n + p, n + q]);
      pairs.push([corner, n], [corner + 1, n + 3], [corner + 9, n + 4]);
      n += 7;
    }
    const graph = graphFromPairs(n, pairs);
    const { kind, packing, evenFace, transversal } = classifyGraph(graph, new Meter());
    expect([kind, evenFace, packing.lower, packing.upper]).toEqual(["projective", "no", 1, 1]);
    expect([transversal.lower, transversal.upper]).toEqual([9, 9]);
    // One of them tied to the far end of the grid as well: four attachments, and two odd cycles.
    const far = graphFromPairs(n, [...pairs, [n - 7, 4]]);
    const other = classifyGraph(far, new Meter());
    expect(other.packing.lower).toBe(2);
    expect(faultOfOddCycles(far, other.packing.cycles)).toBe("");
  });

  it("tells kinds apart", async () => {
    const kindOf = async (graph: Graph) => {
      return (await classify(instanceOf(graph), { workers: 0 })).components.map((c) => c.kind);
    };
    expect(await kindOf(graphFromPairs(3, [[0, 1]]))).toEqual(["bipartite", "bipartite"]);
    expect(await kindOf(graphFromPairs(3, [[0, 1], [1, 2], [2, 0]]))).toEqual(["near-bipartite"]);
    expect(await kindOf(randomRegularGraph(new Random(62), 300, 4))).toEqual(["general"]);
  });

  it("names two disjoint odd cycles in its text", async () => {
    const pairs: [number, number][] = [[0, 1], [1, 2], [2, 0], [2, 3], [3, 4], [4, 5], [5, 3]];
    const found = await classify(instanceOf(graphFromPairs(6, pairs)), { workers: 0 });
    expect(found.toString()).toContain("two disjoint odd cycles: ");
    expect(found.maxSubdeterminant).toEqual({ lower: 4, upper: 4 });
    expect(JSON.parse(JSON.stringify(found)).oddCyclePacking).toEqual({ lower: 2, upper: 2 });
  });

  it("leaves open what a limit does not allow to settle, and says so", async () => {
    const graph = mirroredGrid(150, 150);
    const found = await classify(instanceOf(graph), { workers: 0, timeLimitMs: 0 });
    const [{ evenFace, kind }] = found.components;
    expect([evenFace, kind]).toEqual(["unknown", "general"]);
    expect(found.oddCyclePacking.lower).toBeLessThanOrEqual(1);
    expect(found.oddCyclePacking.upper).toBeGreaterThanOrEqual(1);
    expect(found.oddCycleTransversal.upper).toBeGreaterThanOrEqual(150);
    expect(found.oddCycleTransversal.lower).toBeLessThanOrEqual(150);
  });
});

describe("embeddedTransversal", () => {
  it("is as small as the search finds, on irregular even-face graphs", () => {
    const random = new Random(63);
    const counts = new Map<number, number>();
    const check = (graph: Graph): void => {
      const embedding = evenFaceEmbedding(graph, new Meter(), { witness: false });
      if (embedding.kind !== "embedded") return;
      const found = embeddedTransversal(embedding, new Meter());
      const { lower, upper } = leastTransversal(graph, new Meter());
      expect([found.lower, found.upper]).toEqual([lower, upper]);
      expect(isTransversal(graph, found.vertices)).toBe(true);
      counts.set(upper, (counts.get(upper) ?? 0) + 1);
    };
    for (let i = 0; i < 300; i++) check(smallEvenFace(random, 30).graph);
    for (let i = 0; i < 300; i++) check(changedGrid(random));
    for (const oct of [1, 2, 3, 4]) expect(counts.get(oct) ?? 0).toBeGreaterThan(5);
  });
});
