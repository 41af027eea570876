import { describe, expect, it } from "vitest";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { liftBlocks, reduceBlocks } from "../../lib/reduce/blocks.ts";
import { chooseBlocks } from "../../lib/reduce/blocks-choose.ts";
import type { CostGraph } from "../../lib/reduce/blocks-costs.ts";
import { type KernelPiece, reducePiece } from "../../lib/reduce/blocks-piece.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import { kernelPieces } from "../support/kernel-pieces.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { randomConnectedGraph, randomGraph } from "../support/random-graphs.ts";
import {
  type BlockOptions,
  randomCosts,
  weightsOfCosts,
  withBlocks,
} from "../support/with-blocks.ts";

const costGraph = (graph: Graph, costs: Float64Array): CostGraph => ({
  graph,
  costs,
  ids: Int32Array.from({ length: graph.n }, (_, v) => v),
  nextId: graph.n,
});

const sum = (values: Float64Array) => values.reduce((a, b) => a + b, 0);
const branching = ({ n, offsets }: Graph) =>
  Array.from({ length: n }, (_, v) => offsets[v + 1] - offsets[v]).filter((d) => d > 2).length;

/** Reduces, checks progress, the optimum by brute force on both sides, and the lift. */
function expectSameOptimum(before: CostGraph): number {
  const reduction = reduceBlocks(before, new Meter());
  const { after, rounds } = reduction;
  for (const { before, after } of rounds) {
    const [a, b] = [branching(before.graph), branching(after.graph)];
    expect(b < a || (b === a && after.graph.n < before.graph.n)).toBe(true);
  }
  // What is left is stable also for a look from scratch.
  const again = chooseBlocks(after.graph, new Meter());
  if (again.separations?.twisted === 0) expect(again.blocks).toEqual([]);
  const best = (on: CostGraph) => bruteForce(on.graph, weightsOfCosts(on.graph, on.costs));
  const left = best(before), right = best(after);
  expect(sum(after.costs) - right.weight).toBe(sum(before.costs) - left.weight);
  const byId = new Uint8Array(after.nextId);
  after.ids.forEach((id, v) => byId[id] = right.chosen[v]);
  liftBlocks(reduction, byId, new Meter());
  const lifted = byId.slice(0, before.graph.n);
  expect(isStable(before.graph, lifted)).toBe(true);
  expect(weightOf(weightsOfCosts(before.graph, before.costs), lifted)).toBe(left.weight);
  return rounds.length;
}

/** Reduces a piece and solves what is left by brute force; the answer must be the optimum. */
function expectSolvedByParts(piece: KernelPiece): boolean {
  const reduced = reducePiece(piece, new Meter());
  if (reduced === undefined) return false;
  for (const { graph, weights, doubledCosts } of reduced.pieces) {
    expect(weightsOfCosts(graph, doubledCosts)).toEqual(weights.map((w) => 2 * w));
    expect(weights.every((w) => w > 0)).toBe(true);
  }
  const answers = reduced.pieces.map(({ graph, weights }) => {
    const { chosen, weight } = bruteForce(graph, weights);
    return { chosen, upperBound: weight };
  });
  const { chosen, weight, upperBound } = reduced.combine(answers, new Meter());
  const best = bruteForce(piece.graph, piece.weights).weight;
  expect([weight, upperBound]).toEqual([best, best]);
  expect(isStable(piece.graph, chosen)).toBe(true);
  expect(weightOf(piece.weights, chosen)).toBe(best);
  // Poor answers lift to something no poorer, and the bound still holds.
  const poor = reduced.combine(
    reduced.pieces.map(({ graph }, i) => ({
      chosen: new Uint8Array(graph.n),
      upperBound: answers[i].upperBound + 5,
    })),
    new Meter(),
  );
  expect(isStable(piece.graph, poor.chosen)).toBe(true);
  expect(poor.weight).toBe(weightOf(piece.weights, poor.chosen));
  expect(poor.upperBound).toBeGreaterThanOrEqual(best);
  expect(poor.proof).toBe(undefined);
  return true;
}

describe("block replacement", () => {
  const families: [string, number, number, BlockOptions & { core: number; zeros: boolean }][] = [
    ["1 to 3 blocks", 500, 1, { blocks: 3, size: 6, core: 7, zeros: false }],
    ["nested blocks", 600, 2, { blocks: 5, size: 4, core: 6, zeros: false, nested: true }],
    ["nested, costs of zero", 600, 3, { blocks: 5, size: 4, core: 6, zeros: true, nested: true }],
    ["one of up to 12", 200, 4, { blocks: 1, size: 12, core: 7, zeros: false }],
    ["on the same three", 400, 5, {
      blocks: 4,
      size: 4,
      core: 3,
      attachments: 3,
      zeros: true,
    }],
    ["not connected", 400, 6, { blocks: 3, size: 5, core: 6, zeros: true, connected: false }],
  ];
  for (const [name, count, seed, options] of families) {
    it(`keeps the optimum: ${name}, ${count} cases`, () => {
      const random = new Random(seed);
      let reduced = 0;
      for (let run = 0; run < count; run++) {
        const core = randomGraph(random, options.core, 0.7);
        const blocks = 1 + random.below(options.blocks);
        const { graph } = withBlocks(random, core, { ...options, blocks });
        const costs = randomCosts(random, graph.m, 9, options.zeros);
        if (expectSameOptimum(costGraph(graph, costs)) > 0) reduced++;
      }
      expect(reduced).toBeGreaterThan(count / 4);
    });
  }

  it("keeps the optimum of any sparse graph, 700 cases", () => {
    const random = new Random(7);
    for (let run = 0; run < 700; run++) {
      const n = 5 + random.below(14);
      const graph = randomConnectedGraph(random, n, random.below(n));
      expectSameOptimum(costGraph(graph, randomCosts(random, graph.m, 9, run % 2 === 0)));
    }
  });

  it("takes kernel pieces apart and puts their answers together, 1200 cases", () => {
    const random = new Random(8);
    let reduced = 0;
    for (let run = 0; run < 1200; run++) {
      const core = randomGraph(random, 6, 0.8);
      const options = { blocks: 1 + random.below(5), size: 4, nested: run % 2 === 0 };
      const { graph } = withBlocks(random, core, options);
      const weights = run % 3 === 0
        ? weightsOfCosts(graph, randomCosts(random, graph.m, 9)).map((w) => Math.max(w, 1))
        : Float64Array.from({ length: graph.n }, () => 1 + random.below(run % 3 === 1 ? 3 : 30));
      for (const piece of kernelPieces(graph, weights)) if (expectSolvedByParts(piece)) reduced++;
    }
    expect(reduced).toBeGreaterThan(400);
  });

  it("leaves exactly the core and its gadgets of a mirrored grid with blocks", () => {
    const random = new Random(9);
    const grid = mirroredGrid(12, 12);
    const { graph } = withBlocks(random, grid, { blocks: 30, size: 12, attachments: 3 });
    const { after } = reduceBlocks(
      costGraph(graph, new Float64Array(graph.m).fill(1)),
      new Meter(),
    );
    expect(chooseBlocks(after.graph, new Meter()).blocks).toEqual([]);
    // At most one star of five vertices for each block, and all of the grid.
    expect(after.graph.n).toBeLessThanOrEqual(144 + 30 * 5);
    expect(after.ids.filter((id) => id < 144).length).toBe(144);
  });

  it("merges parallel chains and shortens long ones", () => {
    // Two even chains and an odd one between 0 and 1 of a complete graph on five vertices.
    const pairs: [number, number][] = [];
    for (let u = 0; u < 5; u++) for (let v = 0; v < u; v++) pairs.push([v, u]);
    let n = 5;
    for (const length of [2, 4, 5]) {
      let before = 0;
      for (let i = 1; i < length; i++) {
        pairs.push([before, n]);
        before = n++;
      }
      pairs.push([before, 1]);
    }
    const graph = graphFromPairs(n, pairs);
    const { after } = reduceBlocks(
      costGraph(graph, new Float64Array(graph.m).fill(1)),
      new Meter(),
    );
    // One even chain of length two; the odd one went into the edge.
    expect([after.graph.n, after.graph.m]).toEqual([6, 12]);
  });

  it("does not take pieces too heavy for exact sums", () => {
    const graph = graphFromPairs(3, [[0, 1], [1, 2], [2, 0]]);
    const piece = {
      graph,
      weights: new Float64Array(3).fill(2 ** 50),
      labels: Int32Array.of(0, 1, 2),
      doubledCosts: new Float64Array(3).fill(2 ** 50),
    };
    expect(reducePiece(piece, new Meter())).toBe(undefined);
  });
});
