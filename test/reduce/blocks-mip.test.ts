/**
 * Outside check: HiGHS (npm `highs`) on the edge formulation, before and after block replacement, on
 * instances too large for brute force.
 */
import { describe, expect, it } from "vitest";
import type { Graph } from "../../lib/graph/graph.ts";
import { runHighs } from "../../lib/polytope/highs.ts";
import { stableSetModel } from "../../lib/polytope/model.ts";
import { reducePiece } from "../../lib/reduce/blocks-piece.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { isStable, weightOf } from "../oracle/brute-force.ts";
import { kernelPieces } from "../support/kernel-pieces.ts";
import { randomGraph } from "../support/random-graphs.ts";
import { randomCosts, weightsOfCosts, withBlocks } from "../support/with-blocks.ts";

async function byMip(graph: Graph, weights: Float64Array): Promise<Uint8Array> {
  const edges = Array.from(graph.tails, (u, e) => [u, graph.heads[e]]);
  const { status, x } = await runHighs(stableSetModel(weights, edges, true), {
    absoluteGap: 0.5,
  });
  expect(status).toBe("optimal");
  const chosen = Uint8Array.from(x!, Math.round);
  expect(isStable(graph, chosen)).toBe(true);
  return chosen;
}

describe("block replacement against a MIP solver", () => {
  it("has the same optimum with 1 to 6 blocks of 1 to 12 vertices, 300 cases", async () => {
    const random = new Random(1);
    let reduced = 0;
    for (let run = 0; run < 300; run++) {
      const core = randomGraph(random, 8, 0.7);
      const { graph } = withBlocks(random, core, {
        blocks: 1 + run % 6,
        size: 12,
        nested: run % 3 === 0,
        connected: run % 5 !== 0,
      });
      const weights = run % 2 === 0
        ? weightsOfCosts(graph, randomCosts(random, graph.m, 9, run % 4 === 0))
        : Float64Array.from({ length: graph.n }, () => 1 + random.below(20));
      for (const piece of kernelPieces(graph, weights.map((w) => Math.max(w, 1)))) {
        const smaller = reducePiece(piece, new Meter());
        if (smaller === undefined) continue;
        reduced++;
        const answers = [];
        for (const { graph, weights } of smaller.pieces) {
          const chosen = await byMip(graph, weights);
          answers.push({ chosen, upperBound: weightOf(weights, chosen) });
        }
        const { chosen, weight, upperBound } = smaller.combine(answers, new Meter());
        const best = weightOf(piece.weights, await byMip(piece.graph, piece.weights));
        expect([weight, upperBound]).toEqual([best, best]);
        expect(isStable(piece.graph, chosen)).toBe(true);
      }
    }
    expect(reduced).toBeGreaterThan(150);
  });
});
