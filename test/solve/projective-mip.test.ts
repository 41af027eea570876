/**
 * The projective engine beside a MIP solver, on sizes that are out of reach for brute force. Whatever
 * the solver says, its point is rounded and weighed here: it may be called optimal and not be so.
 */
import { describe, expect, it } from "vitest";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { runHighs } from "../../lib/polytope/highs.ts";
import { stableSetModel } from "../../lib/polytope/model.ts";
import { solveProjective } from "../../lib/solve/projective.ts";
import { isStable, weightOf } from "../oracle/brute-force.ts";
import { embeddedGrid, irregular } from "../support/even-face.ts";
import { kernelPieces } from "../support/kernel-pieces.ts";
import { hardWeights } from "../support/mirrored-grid.ts";
import { checkedBound } from "../support/proofs.ts";

describe("solveProjective beside HiGHS", () => {
  it("agrees on irregular graphs with 30 to 90 vertices", async () => {
    const random = new Random(61);
    let compared = 0, equal = 0;
    for (let i = 0; i < 60; i++) {
      const rows = 5 + random.below(3), columns = rows + 2 * (random.below(3) - 1);
      const { graph } = irregular(embeddedGrid(rows, columns), random, random.below(30));
      const weights = i % 4 === 0
        ? new Float64Array(graph.n).fill(1)
        : hardWeights(graph, random, 3 + random.below(10));
      for (const found of kernelPieces(graph, weights)) {
        const labels = Int32Array.from({ length: found.graph.n }, (_, v) => v);
        const piece = { ...found, labels };
        const answer = solveProjective(piece, new Meter());
        if (answer.status === "declined") continue;
        const rowsOf = Array.from(piece.graph.tails, (u, e) => [u, piece.graph.heads[e]]);
        const model = stableSetModel(piece.weights, rowsOf, true);
        const outcome = await runHighs(model, { absoluteGap: 0.5, timeLimitMs: 20_000 });
        if (outcome.x === undefined) continue;
        const rounded = Uint8Array.from(outcome.x, (x) => x > 0.5 ? 1 : 0);
        expect(isStable(piece.graph, rounded)).toBe(true);
        const theirs = weightOf(piece.weights, rounded);
        compared++;
        if (theirs === answer.weight) equal++;
        else {
          // Both are stable sets. Ours is the heavier, and the independent checker proves it.
          expect(theirs).toBeLessThan(answer.weight);
        }
        expect(checkedBound(piece.graph, piece.weights, labels, answer.proof!)).toBe(answer.weight);
      }
    }
    expect(compared).toBeGreaterThan(40);
    expect(equal / compared).toBeGreaterThan(0.95);
  });
});
