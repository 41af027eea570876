import { describe, expect, it } from "vitest";
import { degree, type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { separations, type Side } from "../../lib/graph/separations.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { allSides, isSide, type SmallSide } from "../oracle/sides.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { randomConnectedGraph, randomGraph, randomRegularGraph } from "../support/random-graphs.ts";
import { withBlocks } from "../support/with-blocks.ts";

function expectValid(graph: Graph, side: Side): void {
  expect(isSide(graph, side.inside, side.attachments)).toBe(true);
  const colour = new Map<number, number>();
  side.inside.forEach((v, i) => colour.set(v, side.insideSide[i]));
  for (let e = 0; e < graph.m; e++) {
    const u = graph.tails[e], v = graph.heads[e];
    if (colour.has(u) && colour.has(v)) expect(colour.get(u)).not.toBe(colour.get(v));
    for (const [a, b] of [[u, v], [v, u]]) {
      const at = side.attachments.indexOf(a);
      if (at >= 0 && colour.has(b)) expect(side.attachmentSide[at]).not.toBe(colour.get(b));
    }
  }
}

function isSmall(graph: Graph, side: SmallSide): boolean {
  if (side.attachments.length < 3) return false;
  return side.inside.length <= 5 && side.inside.filter((v) => degree(graph, v) >= 3).length < 2;
}

/** All that is promised, against the list of all sides. */
function expectComplete(graph: Graph): void {
  const found = separations(graph, new Meter());
  expect(found.complete).toBe(true);
  const role = new Int8Array(graph.n);
  for (const side of found.sides) {
    expectValid(graph, side);
    for (const v of side.inside) {
      expect(role[v]).toBe(0);
      role[v] = 1;
    }
  }
  for (const side of found.sides) for (const v of side.attachments) expect(role[v]).toBe(0);
  for (const side of found.small) expectValid(graph, side);
  role.forEach((r, v) => expect(found.core[v]).toBe(1 - r));
  if (found.twisted > 0 || found.crossing > 0) return;
  const all = allSides(graph);
  for (const side of found.sides) {
    const inside = new Set(side.inside);
    const wider = all.filter((other) =>
      !isSmall(graph, other) && other.inside.length > inside.size &&
      [...inside].every((v) => other.inside.includes(v))
    );
    expect(wider).toEqual([]);
  }
  for (const side of all) {
    if (isSmall(graph, side)) continue;
    for (const v of side.inside) if (degree(graph, v) !== 2) expect(found.core[v]).toBe(0);
  }
}

describe("separations", () => {
  it("finds every side of small graphs, 1200 cases", () => {
    const random = new Random(1);
    for (let run = 0; run < 400; run++) {
      expectComplete(randomGraph(random, 4 + random.below(7), 0.25 + 0.5 * random.unit()));
      expectComplete(randomConnectedGraph(random, 6 + random.below(6), 2 + random.below(14)));
    }
    for (let run = 0; run < 400; run++) {
      const core = randomGraph(random, 6, 0.8);
      const options = { blocks: 1 + random.below(3), size: 4, nested: true };
      expectComplete(withBlocks(random, core, options).graph);
    }
  });

  it("finds blocks planted on a mirrored grid exactly", () => {
    const random = new Random(2);
    for (let run = 0; run < 30; run++) {
      const grid = mirroredGrid(8 + 2 * random.below(4), 8 + 2 * random.below(4));
      const { graph, blocks } = withBlocks(random, grid, { blocks: 12, size: 12 });
      const { sides, twisted, complete } = separations(graph, new Meter());
      expect([twisted, complete]).toEqual([0, true]);
      for (const side of sides) expectValid(graph, side);
      const inSide = new Uint8Array(graph.n);
      for (const side of sides) for (const v of side.inside) inSide[v] = 1;
      for (const { inside } of blocks) {
        for (const v of inside) {
          if (inside.length > 1 && degree(graph, v) > 2 && inSide[v] === 0) {
            // Not taken as a whole only where it is no larger than a star.
            expect(inside.filter((u) => degree(graph, u) > 2).length).toBe(1);
          }
        }
      }
    }
  });

  it("has no sides to find in well connected graphs", () => {
    for (const graph of [mirroredGrid(9, 9), mirroredGrid(3, 31), complete(7)]) {
      const found = separations(graph, new Meter());
      expect(found.sides).toEqual([]);
      expect(found.core.every((c) => c === 1)).toBe(true);
    }
    const random = new Random(3);
    const regular = randomRegularGraph(random, 60, 5);
    expect(separations(regular, new Meter()).sides).toEqual([]);
  });

  it("takes a bipartite component as one side without attachments", () => {
    const graph = graphFromPairs(8, [[0, 1], [1, 2], [2, 0], [3, 4], [4, 5], [5, 6], [6, 3]]);
    const { sides } = separations(graph, new Meter());
    const free = sides.filter((side) => side.attachments.length === 0);
    expect(free.map((side) => side.inside.length)).toEqual([1]);
    // The square has no vertex of degree three; one is added.
    const tadpole = graphFromPairs(5, [[0, 1], [1, 2], [2, 3], [3, 0], [0, 4]]);
    expect(separations(tadpole, new Meter()).sides.map((s) => s.inside.length)).toEqual([5]);
  });

  it("tells of twisted sets", () => {
    // An apex joined to everything: the grid without it is bipartite, but meets it on both sides.
    const pairs: [number, number][] = [];
    for (let i = 0; i < 5; i++) {
      for (let j = 0; j < 5; j++) {
        pairs.push([5 * i + j, 25]);
        if (j < 4) pairs.push([5 * i + j, 5 * i + j + 1]);
        if (i < 4) pairs.push([5 * i + j, 5 * i + j + 5]);
      }
    }
    const found = separations(graphFromPairs(26, pairs), new Meter());
    expect(found.twisted).toBeGreaterThan(0);
  });
});

function complete(n: number): Graph {
  const pairs: [number, number][] = [];
  for (let u = 0; u < n; u++) for (let v = 0; v < u; v++) pairs.push([v, u]);
  return graphFromPairs(n, pairs);
}
