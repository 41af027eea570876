/**
 * With all costs positive and every block connected and joined to each of its attachments, gadgets
 * change neither the odd cycle packing number nor the least odd cycle transversal.
 */
import { describe, expect, it } from "vitest";
import type { Graph } from "../../lib/graph/graph.ts";
import { reduceBlocks } from "../../lib/reduce/blocks.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteOcp } from "../oracle/ocp.ts";
import { bruteOct } from "../oracle/oct.ts";
import { randomConnectedGraph, randomGraph } from "../support/random-graphs.ts";
import { withBlocks } from "../support/with-blocks.ts";

function expectSameParity(graph: Graph): boolean {
  const { after, rounds } = reduceBlocks(
    {
      graph,
      costs: new Float64Array(graph.m).fill(1),
      ids: Int32Array.from({ length: graph.n }, (_, v) => v),
      nextId: graph.n,
    },
    new Meter(),
  );
  if (rounds.length === 0 || after.graph.n > 15) return false;
  expect(bruteOct(after.graph)).toBe(bruteOct(graph));
  expect(bruteOcp(after.graph)).toBe(bruteOcp(graph));
  return true;
}

describe("block replacement and odd cycles", () => {
  it("keeps packing and transversal numbers of graphs with blocks", () => {
    const random = new Random(1);
    let seen = 0;
    for (let run = 0; run < 500; run++) {
      const core = randomGraph(random, 5 + random.below(3), 0.8);
      const options = { blocks: 1 + random.below(2), size: 4, nested: true };
      if (expectSameParity(withBlocks(random, core, options).graph)) seen++;
    }
    expect(seen).toBeGreaterThan(200);
  });

  it("keeps them for sparse graphs of any kind", () => {
    const random = new Random(2);
    let seen = 0;
    for (let run = 0; run < 600; run++) {
      const n = 6 + random.below(8);
      if (expectSameParity(randomConnectedGraph(random, n, 1 + random.below(n)))) seen++;
    }
    expect(seen).toBeGreaterThan(300);
  });
});
