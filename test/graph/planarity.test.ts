import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type Graph, graphFromEdges, graphFromPairs } from "../../lib/graph/graph.ts";
import { kuratowskiProblem } from "../../lib/graph/kuratowski.ts";
import { extractKuratowski } from "../../lib/graph/kuratowski-extract.ts";
import { planarity, planarRotation } from "../../lib/graph/planarity.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { planarProblem, subdivisionProblem } from "../oracle/planarity.ts";
import { graphFromGraph6 } from "../support/graph6.ts";
import { randomGraphWithEdges } from "../support/random-graphs.ts";

/** Runs the test and checks its witness by independent code. */
function decide(graph: Graph): boolean {
  const answer = planarity(graph, new Meter());
  if (answer.planar) expect(planarProblem(graph, answer.next)).toBe(undefined);
  else {
    expect(subdivisionProblem(graph, answer.kuratowski)).toBe(undefined);
    expect(kuratowskiProblem(graph, answer.kuratowski)).toBe(undefined);
  }
  return answer.planar;
}

function complete(n: number): [number, number][] {
  const pairs: [number, number][] = [];
  for (let v = 0; v < n; v++) for (let u = 0; u < v; u++) pairs.push([u, v]);
  return pairs;
}

function grid(rows: number, columns: number, closed: boolean): Graph {
  const pairs: [number, number][] = [];
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) {
      if (closed || j + 1 < columns) pairs.push([i * columns + j, i * columns + (j + 1) % columns]);
      if (closed || i + 1 < rows) pairs.push([i * columns + j, (i + 1) % rows * columns + j]);
    }
  }
  return graphFromPairs(rows * columns, pairs);
}

describe("planarity", () => {
  // Source: networkx, check_planarity, through test/fixtures/planarity.py.
  const file = new URL("../fixtures/planarity.json", import.meta.url);
  const recorded = JSON.parse(readFileSync(file, "utf8")) as Record<string, string[]>;

  it("agrees with networkx on its atlas and on random graphs: planar ones", () => {
    expect(recorded.planar.length).toBeGreaterThan(3000);
    for (const text of recorded.planar) expect(decide(graphFromGraph6(text))).toBe(true);
  });

  it("agrees with networkx on its atlas and on random graphs: those that are not", () => {
    expect(recorded.notPlanar.length).toBeGreaterThan(1500);
    for (const text of recorded.notPlanar) expect(decide(graphFromGraph6(text))).toBe(false);
  });

  it("gives witnesses for random graphs with parallel edges, in several components", () => {
    const random = new Random(11);
    const seen = [0, 0];
    for (let t = 0; t < 1500; t++) {
      const n = 1 + random.below(16), m = n < 2 ? 0 : random.below(3 * n);
      const pairs = Array.from({ length: m }, (): [number, number] => {
        const u = random.below(n);
        return [u, (u + 1 + random.below(n - 1)) % n];
      });
      const graph = graphFromPairs(n, pairs);
      const planar = decide(graph);
      seen[planar ? 1 : 0]++;
      // Parallel edges change nothing.
      const simple = new Map(pairs.map(([u, v]) => [Math.min(u, v) * n + Math.max(u, v), [u, v]]));
      const once = graphFromPairs(n, [...simple.values()] as [number, number][]);
      expect(planarRotation(once, new Meter()) !== undefined).toBe(planar);
    }
    expect(Math.min(...seen)).toBeGreaterThan(200);
  });

  it("keeps its answer under deletion of edges, and finds an edge too many", () => {
    const random = new Random(12);
    for (let t = 0; t < 100; t++) {
      const graph = randomGraphWithEdges(random, 8 + random.below(10), 30);
      if (decide(graph)) continue;
      const witness = extractKuratowski(graph, new Meter());
      const inside = new Set(witness.paths.flatMap((path) => [...path]));
      // A subdivision without one of its edges is planar; that makes it minimal.
      const [gone, ...rest] = inside;
      expect(gone).toBeGreaterThan(-1);
      const pairs = rest.map((e): [number, number] => [graph.tails[e], graph.heads[e]]);
      expect(decide(graphFromPairs(graph.n, pairs))).toBe(true);
    }
  });

  it("answers for no vertices, one vertex, and no edges", () => {
    for (const n of [0, 1, 2, 5]) expect(decide(graphFromPairs(n, []))).toBe(true);
    expect(decide(graphFromPairs(2, [[0, 1], [1, 0], [0, 1]]))).toBe(true);
  });

  it("finds K5 and K3,3 in grids on the torus and in a plane grid with a crossing", () => {
    expect(decide(grid(40, 50, false))).toBe(true);
    expect(decide(grid(40, 50, true))).toBe(false);
    const plane = grid(40, 50, false);
    const crossed = graphFromEdges(
      plane.n,
      Int32Array.from([...plane.tails, 1020, 1021]),
      Int32Array.from([...plane.heads, 1071, 1070]),
    );
    expect(decide(crossed)).toBe(false);
  });

  it("sorts long rows by counting: a double star with its leaves joined in order", () => {
    const leaves = 500;
    const pairs: [number, number][] = [];
    for (let i = 0; i < leaves; i++) {
      pairs.push([0, 2 + i], [1, 2 + i]);
      if (i > 0) pairs.push([1 + i, 2 + i]);
    }
    new Random(5).shuffle(pairs);
    expect(decide(graphFromPairs(leaves + 2, pairs))).toBe(true);
    pairs.push([2, 2 + leaves / 2]);
    expect(decide(graphFromPairs(leaves + 2, pairs))).toBe(false);
  });

  it("follows a path of a million vertices in place of an edge of K5, and of K5 less an edge", () => {
    const n = 1_000_000;
    const short = complete(5).filter(([u, v]) => u !== 3 || v !== 4);
    for (const missing of [0, 1]) {
      const m = short.length - missing + n - 4;
      const tails = new Int32Array(m), heads = new Int32Array(m);
      short.slice(missing).forEach(([u, v], e) => {
        tails[e] = u;
        heads[e] = v;
      });
      for (let i = 0; i < n - 4; i++) {
        const e = short.length - missing + i;
        tails[e] = i === 0 ? 3 : 4 + i;
        heads[e] = i === n - 5 ? 4 : 5 + i;
      }
      const graph = graphFromEdges(n, tails, heads);
      const answer = planarity(graph, new Meter());
      expect(answer.planar).toBe(missing === 1);
      if (!answer.planar) expect(kuratowskiProblem(graph, answer.kuratowski)).toBe(undefined);
    }
  });

  it("stops when the meter has run out", () => {
    const graph = grid(200, 200, false);
    expect(() => planarity(graph, new Meter().within(1000))).toThrow(Interrupted);
  });

  it("refuses to look for a subdivision in a planar graph", () => {
    expect(() => extractKuratowski(graphFromPairs(3, complete(3)), new Meter())).toThrow(
      RangeError,
    );
  });
});

describe("kuratowskiProblem", () => {
  it("names what is wrong with a forged subdivision", () => {
    const graph = graphFromPairs(5, complete(5));
    const right = extractKuratowski(graph, new Meter());
    const with_ = (change: object) => kuratowskiProblem(graph, { ...right, ...change });
    expect(with_({})).toBe(undefined);
    expect(with_({ kind: "K3,3" })).toMatch(/expected 6 branch vertices/);
    expect(with_({ branches: Int32Array.of(0, 1, 2, 3, 3) })).toMatch(/occurs twice/);
    expect(with_({ branches: Int32Array.of(0, 1, 2, 3, 9) })).toMatch(/does not exist/);
    expect(with_({ paths: right.paths.slice(1) })).toMatch(/path|edge/);
    expect(with_({ paths: [...right.paths, right.paths[0]] })).toMatch(/expected 10 paths/);
    expect(with_({ paths: right.paths.map(() => right.paths[0]) })).toMatch(/path|edge|vertex/);
    expect(with_({ paths: right.paths.map(() => Int32Array.of(99)) })).toMatch(/edge 99/);
  });
});
