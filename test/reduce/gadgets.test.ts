import { describe, expect, it } from "vitest";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import type { Block, CostGraph } from "../../lib/reduce/blocks-costs.ts";
import { gadgetFor, gadgetSize } from "../../lib/reduce/gadgets.ts";
import { liftThrough, replaceByGadgets, type Replacing } from "../../lib/reduce/gadgets-apply.ts";
import { BlockCut } from "../../lib/reduce/gadgets-table.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import { randomGraph } from "../support/random-graphs.ts";
import {
  type BlockOptions,
  type PlantedBlock,
  randomCosts,
  weightsOfCosts,
  withBlocks,
} from "../support/with-blocks.ts";

const asBlock = (b: PlantedBlock): Block => ({
  inside: Int32Array.from(b.inside),
  insideSide: Uint8Array.from(b.insideSide),
  attachments: Int32Array.from(b.attachments),
  attachmentSide: Uint8Array.from(b.attachmentSide),
});

const costGraph = (graph: CostGraph["graph"], costs: Float64Array): CostGraph => ({
  graph,
  costs,
  ids: Int32Array.from({ length: graph.n }, (_, v) => v),
  nextId: graph.n,
});

const sum = (values: Float64Array) => values.reduce((a, b) => a + b, 0);

/** Least c·y over all stable sets, and one that reaches it. */
function leastSlack(on: CostGraph): { cost: number; chosen: Uint8Array } {
  const weights = weightsOfCosts(on.graph, on.costs);
  const best = bruteForce(on.graph, weights);
  return { cost: sum(on.costs) - best.weight, chosen: best.chosen };
}

/** The cost of the slack a choice leaves. */
function slackCost(on: CostGraph, chosen: Uint8Array): number {
  return sum(on.costs) - weightOf(weightsOfCosts(on.graph, on.costs), chosen);
}

function lifted(round: Replacing, chosenAfter: Uint8Array): Uint8Array {
  const byId = new Uint8Array(round.after.nextId);
  round.after.ids.forEach((id, v) => byId[id] = chosenAfter[v]);
  liftThrough(round, byId, new Meter());
  return byId.slice(0, round.before.graph.n);
}

describe("gadgets", () => {
  const families: [string, number, number, BlockOptions & { core: number; zeros: boolean }][] = [
    ["of one vertex", 400, 1, { blocks: 3, size: 1, core: 6, zeros: false }],
    ["small, several", 700, 2, { blocks: 4, size: 4, core: 6, zeros: false }],
    ["small with costs of zero", 700, 3, { blocks: 4, size: 4, core: 6, zeros: true }],
    ["large, dense", 150, 4, { blocks: 2, size: 9, core: 6, zeros: false, density: 0.6 }],
    ["sparse with zeros", 300, 5, { blocks: 2, size: 9, core: 6, zeros: true, density: 0.1 }],
    ["all on the same three", 500, 6, {
      blocks: 4,
      size: 4,
      core: 3,
      attachments: 3,
      zeros: false,
    }],
    ["on pairs", 500, 7, { blocks: 4, size: 4, core: 4, attachments: 2, zeros: true }],
    ["not connected", 500, 8, { blocks: 3, size: 5, core: 6, connected: false, zeros: false }],
  ];
  for (const [name, count, seed, options] of families) {
    it(`keep the optimum and lift it: blocks ${name}, ${count} cases`, () => {
      const random = new Random(seed);
      for (let run = 0; run < count; run++) {
        const core = randomGraph(random, options.core, 0.6);
        const { graph, blocks } = withBlocks(random, core, options);
        const before = costGraph(graph, randomCosts(random, graph.m, 9, options.zeros));
        const round = replaceByGadgets(before, blocks.map(asBlock), new Meter());
        const left = leastSlack(before), right = leastSlack(round.after);
        expect(right.cost).toBe(left.cost);
        const back = lifted(round, right.chosen);
        expect(isStable(graph, back)).toBe(true);
        expect(slackCost(before, back)).toBe(left.cost);
        // Any other choice lifts to one that costs no more.
        const any = bruteForce(
          round.after.graph,
          Float64Array.from({ length: round.after.graph.n }, () => random.below(9) - 3),
        ).chosen;
        const anyBack = lifted(round, any);
        expect(isStable(graph, anyBack)).toBe(true);
        expect(slackCost(before, anyBack)).toBeLessThanOrEqual(slackCost(round.after, any));
      }
    });
  }

  it("have tables that brute force confirms in every state", () => {
    const random = new Random(11);
    for (let run = 0; run < 300; run++) {
      const core = graphFromPairs(3, []);
      const { graph, blocks: [planted] } = withBlocks(random, core, {
        blocks: 1,
        size: 8,
        connected: random.below(2) === 0,
      });
      const before = costGraph(graph, randomCosts(random, graph.m, 9, true));
      const block = asBlock(planted), k = planted.attachments.length;
      const cut = new BlockCut(before, block, new Int32Array(graph.n), new Meter());
      const table = cut.table();
      expect(table.length).toBe(1 << k);
      for (let mask = 0; mask < 1 << k; mask++) {
        let least = Infinity;
        const inside = planted.inside, chosen = new Uint8Array(graph.n);
        planted.attachments.forEach((v, i) => {
          const p = (mask >> i) & 1;
          chosen[v] = planted.attachmentSide[i] === 0 ? p : 1 - p;
        });
        for (let x = 0; x < 1 << inside.length; x++) {
          inside.forEach((v, i) => chosen[v] = (x >> i) & 1);
          if (isStable(graph, chosen)) least = Math.min(least, slackCost(before, chosen));
        }
        expect(table[mask]).toBe(least);
      }
    }
  });

  it("have the stated sizes and kinds", () => {
    const never = () => false, always = () => true;
    const star = [0, 2, 3, 5, 4, 3, 2, 0]; // f({0}) = 2, f({1}) = 3, f({2}) = 4, …
    expect(gadgetFor(star, [0, 0, 0], never)).toMatchObject({ kind: "star", vertices: 4 });
    expect(gadgetFor(star, [0, 1, 0], never)).toMatchObject({ kind: "star", vertices: 5 });
    expect(gadgetFor([0, 2, 3, 0], [1, 1], always)).toMatchObject({ kind: "path", vertices: 1 });
    expect(gadgetFor([0, 2, 3, 0], [0, 1], never)).toMatchObject({ kind: "path", vertices: 2 });
    expect(gadgetFor([0, 2, 3, 0], [0, 1], always)).toMatchObject({ kind: "edge", costs: [3] });
    expect(gadgetFor([0, 0, 0, 0], [0, 1], never)).toMatchObject({ kind: "nothing" });
    expect(gadgetFor([0, 0], [0], never)).toMatchObject({ kind: "nothing" });
    // Attachment 2 is free: what is left is a path between the other two.
    expect(gadgetFor([0, 2, 3, 0, 0, 2, 3, 0], [0, 0, 1], never)).toMatchObject({
      kind: "path",
      ends: [0, 1],
    });
    for (const side of [[0, 0, 0], [0, 1, 0], [1, 1, 0], [1, 1, 1]]) {
      expect(gadgetFor(star, side, never).vertices).toBe(gadgetSize(side));
    }
  });

  it("refuse costs whose sum leaves the exact range", () => {
    const graph = graphFromPairs(4, [[0, 3], [1, 3], [2, 3]]);
    const before = costGraph(graph, new Float64Array(3).fill(2 ** 51));
    const block = asBlock({
      inside: [3],
      insideSide: [1],
      attachments: [0, 1, 2],
      attachmentSide: [0, 0, 0],
    });
    expect(() => replaceByGadgets(before, [block], new Meter())).toThrow(RangeError);
  });
});
