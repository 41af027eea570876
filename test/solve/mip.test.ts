import { describe, expect, it } from "vitest";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import type { Piece } from "../../lib/solve/engine.ts";
import { type Incumbent, localSearch } from "../../lib/solve/incumbent.ts";
import { mip } from "../../lib/solve/mip.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import { checkedBound } from "../support/proofs.ts";
import { randomConnectedGraph, randomGraph, randomWeights } from "../support/random-graphs.ts";

function pieceOf(random: Random, n: number, extra: number, heaviest: number): Piece {
  return {
    graph: randomConnectedGraph(random, n, extra),
    weights: randomWeights(random, n, 1, heaviest),
    labels: Int32Array.from({ length: n }, (_, v) => v),
  };
}

describe("the mixed-integer solver", () => {
  it("finds the optimum of small pieces and calls it feasible unless a packing proves it", async () => {
    const random = new Random(1);
    let proved = 0;
    for (let round = 0; round < 12; round++) {
      const piece = pieceOf(
        random,
        2 + random.below(18),
        random.below(30),
        [3, 100, 2 ** 44][round % 3],
      );
      const { graph, weights, labels } = piece;
      const best = bruteForce(graph, weights);
      const solved = await mip(piece, new Meter());
      expect(isStable(graph, solved.chosen)).toBe(true);
      expect(weightOf(weights, solved.chosen)).toBe(solved.weight);
      expect(solved.weight).toBe(best.weight);
      expect(solved.upperBound >= best.weight).toBe(true);
      if (solved.status === "optimal") {
        proved++;
        expect(checkedBound(graph, weights, labels, solved.proof!)).toBe(best.weight);
      } else {
        expect(solved.proof).toBe(undefined);
        expect((solved.floatingBound ?? 0) >= best.weight).toBe(true);
      }
    }
    expect(proved < 12).toBe(true);
  });

  it("keeps a start that is better than what it finds, and reports each better set", async () => {
    const random = new Random(2);
    const piece = pieceOf(random, 22, 40, 9);
    const best = bruteForce(piece.graph, piece.weights);
    const kept = await mip(piece, new Meter({ timeLimitMs: 0 }), { start: best });
    expect(kept.weight).toBe(best.weight);
    const heard: Incumbent[] = [];
    const empty = { chosen: new Uint8Array(22), weight: 0 };
    const solved = await mip(piece, new Meter(), {
      start: empty,
      onIncumbent: (i) => heard.push(i),
    });
    expect(heard.length > 0).toBe(true);
    expect(heard[heard.length - 1].weight).toBe(solved.weight);
    for (const { chosen, weight } of heard) {
      expect(isStable(piece.graph, chosen)).toBe(true);
      expect(weightOf(piece.weights, chosen)).toBe(weight);
    }
  });
});

describe("local search", () => {
  it("gives maximal stable sets with exact weights, mostly the heaviest, seed for seed", () => {
    const random = new Random(3);
    let hits = 0;
    for (let round = 0; round < 1000; round++) {
      const n = 1 + random.below(18);
      const graph = randomGraph(random, n, random.unit());
      const weights = randomWeights(random, n, 1, [1, 5, 1000, 2 ** 47][round % 4]);
      const found = localSearch(graph, weights, new Meter({ seed: round }), 20_000);
      expect(isStable(graph, found.chosen)).toBe(true);
      expect(weightOf(weights, found.chosen)).toBe(found.weight);
      for (let v = 0; v < n; v++) {
        const more = found.chosen.slice();
        more[v] = 1;
        if (found.chosen[v] === 0) expect(isStable(graph, more)).toBe(false);
      }
      const again = localSearch(graph, weights, new Meter({ seed: round }), 20_000);
      expect(Array.from(again.chosen)).toEqual(Array.from(found.chosen));
      if (found.weight === bruteForce(graph, weights).weight) hits++;
    }
    expect(hits > 980).toBe(true);
  });

  it("begins with the start it is given and never ends below it", () => {
    const random = new Random(4);
    for (let round = 0; round < 200; round++) {
      const n = 10 + random.below(10);
      const graph = randomGraph(random, n, 0.3);
      const weights = randomWeights(random, n, 1, 9);
      const best = bruteForce(graph, weights);
      const found = localSearch(graph, weights, new Meter(), 1, best.chosen);
      expect(found.weight).toBe(best.weight);
    }
  });

  it("returns a stable set when it is stopped at once", () => {
    const graph = randomGraph(new Random(5), 300, 0.05);
    const weights = randomWeights(new Random(6), 300, 1, 9);
    const found = localSearch(graph, weights, new Meter().within(0), 2 ** 30);
    expect(isStable(graph, found.chosen)).toBe(true);
    expect(weightOf(weights, found.chosen)).toBe(found.weight);
    expect(found.weight > 0).toBe(true);
  });
});
