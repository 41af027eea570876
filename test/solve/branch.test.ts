import { describe, expect, it } from "vitest";
import type { Graph } from "../../lib/graph/graph.ts";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { edgeCliqueCover } from "../../lib/polytope/clique-rows.ts";
import { loadHighs } from "../../lib/polytope/highs.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { branch } from "../../lib/solve/branch.ts";
import { CaseTree } from "../../lib/solve/branch/case-tree.ts";
import { coverSearch } from "../../lib/solve/branch/cover-search.ts";
import { RelaxationSearch, relaxationSearch } from "../../lib/solve/branch/relaxation-search.ts";
import type { Piece } from "../../lib/solve/engine.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import { leastDelayMs, PROMISED_MS } from "../support/effort.ts";
import { boundProved } from "../oracle/cases.ts";
import { checkedBound } from "../support/proofs.ts";
import {
  randomConnectedGraph,
  randomGraph,
  randomRegularGraph,
  randomWeights,
} from "../support/random-graphs.ts";

const identity = (n: number): Int32Array => Int32Array.from({ length: n }, (_, v) => v);
const nothing = (n: number) => ({ chosen: new Uint8Array(n), weight: 0 });
const ones = (n: number): Float64Array => new Float64Array(n).fill(1);

/** Ranges of weights: equal, small, usual, and near the largest whose sum stays exact. */
const HEAVIEST = [1, 4, 1000, 2 ** 46];

function pieceOf(graph: Graph, weights: Float64Array, labels = identity(graph.n)): Piece {
  return { graph, weights, labels };
}

describe("branch and bound against brute force", () => {
  it("solves 1,500 random graphs of all densities, every proof accepted by both checkers", async () => {
    const random = new Random(1);
    for (let round = 0; round < 1500; round++) {
      const n = 1 + random.below(15);
      const graph = round % 2 === 0
        ? randomGraph(random, n, random.unit())
        : randomConnectedGraph(random, n, random.below(2 * n));
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 4]);
      const labels = random.shuffle(identity(n));
      const best = bruteForce(graph, weights);
      const solved = await branch(pieceOf(graph, weights, labels), new Meter());
      expect(solved.status).toBe("optimal");
      expect(solved.weight).toBe(best.weight);
      expect(solved.upperBound).toBe(best.weight);
      expect(isStable(graph, solved.chosen)).toBe(true);
      expect(weightOf(weights, solved.chosen)).toBe(best.weight);
      expect(checkedBound(graph, weights, labels, solved.proof!)).toBe(best.weight);
    }
  });

  it("covers alone: 1,500 graphs, with and without a start", () => {
    const random = new Random(2);
    for (let round = 0; round < 1500; round++) {
      const n = 1 + random.below(16);
      const graph = randomGraph(random, n, random.unit());
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 4]);
      const best = bruteForce(graph, weights);
      const tree = new CaseTree();
      const start = round % 3 === 0 ? best : nothing(n);
      const result = coverSearch(graph, weights, start, tree, new Meter());
      expect(result.weight).toBe(best.weight);
      expect(weightOf(weights, result.chosen)).toBe(best.weight);
      const proof = tree.toProof(result.root!, result.denominator, identity(n));
      expect(boundProved(graph, weights, proof)).toBe(best.weight);
      expect(checkedBound(graph, weights, identity(n), proof)).toBe(best.weight);
    }
  });

  it("relaxations alone: 300 graphs, with and without a start", async () => {
    const highs = await loadHighs();
    const random = new Random(3);
    for (let round = 0; round < 300; round++) {
      const n = 1 + random.below(16);
      const graph = randomGraph(random, n, random.unit());
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 4]);
      const best = bruteForce(graph, weights);
      const tree = new CaseTree();
      const start = round % 3 === 0 ? best : nothing(n);
      const cliques = edgeCliqueCover(graph);
      const result = relaxationSearch(graph, weights, cliques, start, tree, highs, new Meter());
      expect(result.weight).toBe(best.weight);
      expect(weightOf(weights, result.chosen)).toBe(best.weight);
      const proof = tree.toProof(result.root!, result.denominator, identity(n));
      expect(boundProved(graph, weights, proof)).toBe(best.weight);
      expect(checkedBound(graph, weights, identity(n), proof)).toBe(best.weight);
    }
  });

  it("both searches agree on graphs of 40 to 60 vertices", async () => {
    const highs = await loadHighs();
    const random = new Random(4);
    for (let round = 0; round < 25; round++) {
      const n = 40 + random.below(21);
      const graph = randomConnectedGraph(random, n, random.below(3 * n));
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 3]);
      const one = coverSearch(graph, weights, nothing(n), new CaseTree(), new Meter());
      const tree = new CaseTree();
      const two = relaxationSearch(
        graph,
        weights,
        edgeCliqueCover(graph),
        nothing(n),
        tree,
        highs,
        new Meter(),
      );
      expect(two.weight).toBe(one.weight);
      const proof = tree.toProof(two.root!, two.denominator, identity(n));
      expect(checkedBound(graph, weights, identity(n), proof)).toBe(one.weight);
    }
  });
});

describe("branch and bound on larger pieces", () => {
  const cases: [string, Graph, (random: Random, n: number) => Float64Array][] = [
    ["cubic, 150 vertices", randomRegularGraph(new Random(5), 150, 3), (_, n) => ones(n)],
    [
      "degree 4, 200 vertices, weighted",
      randomRegularGraph(new Random(6), 200, 4),
      (random, n) => randomWeights(random, n, 1, 1000),
    ],
    [
      "degree 6, 150 vertices, weighted",
      randomRegularGraph(new Random(7), 150, 6),
      (random, n) => randomWeights(random, n, 1, 1000),
    ],
    ["half of all edges, 200 vertices", randomGraph(new Random(8), 200, 0.5), (_, n) => ones(n)],
    [
      "a fifth of all edges, 120 vertices, weighted",
      randomGraph(new Random(9), 120, 0.2),
      (random, n) => randomWeights(random, n, 1, 1000),
    ],
  ];
  for (const [name, graph, weigh] of cases) {
    it(`proves ${name}`, async () => {
      const weights = weigh(new Random(10), graph.n);
      const solved = await branch(pieceOf(graph, weights), new Meter());
      expect(solved.status).toBe("optimal");
      expect(isStable(graph, solved.chosen)).toBe(true);
      expect(weightOf(weights, solved.chosen)).toBe(solved.weight);
      expect(checkedBound(graph, weights, identity(graph.n), solved.proof!)).toBe(solved.weight);
    });
  }

  it("takes the same path again, seed for seed", async () => {
    const graph = randomRegularGraph(new Random(11), 100, 4);
    const weights = randomWeights(new Random(12), 100, 1, 9);
    const runs = [];
    for (const seed of [0, 0, 5]) {
      runs.push(await branch(pieceOf(graph, weights), new Meter({ seed })));
    }
    expect(JSON.stringify(runs[0])).toBe(JSON.stringify(runs[1]));
    expect(runs[2].weight).toBe(runs[0].weight);
  });

  it("keeps a start that is handed in", async () => {
    const graph = randomGraph(new Random(13), 22, 0.3);
    const weights = randomWeights(new Random(14), 22, 1, 9);
    const best = bruteForce(graph, weights);
    const stopped = await branch(pieceOf(graph, weights), new Meter({ timeLimitMs: 0 }), best);
    expect(stopped.weight).toBe(best.weight);
    expect(stopped.upperBound >= best.weight).toBe(true);
  });

  it("hands the piece's own costs back when half the weight is reached", async () => {
    const graph = graphFromPairs(4, [[0, 1], [1, 2], [2, 3], [3, 0]]);
    const piece = { ...pieceOf(graph, ones(4)), doubledCosts: ones(4) };
    const solved = await branch(piece, new Meter());
    expect(solved.status).toBe("optimal");
    expect(solved.proof?.rule).toBe("packing");
    expect(checkedBound(graph, ones(4), identity(4), solved.proof!)).toBe(2);
  });
});

describe("branch and bound when it is stopped", () => {
  it("leaves honest bounds at any budget of work", async () => {
    const random = new Random(15);
    let open = 0;
    for (let round = 0; round < 150; round++) {
      const n = 14 + random.below(9);
      const graph = randomConnectedGraph(random, n, random.below(3 * n));
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 4]);
      const best = bruteForce(graph, weights);
      const meter = new Meter().within(Math.floor(1000 * 1.06 ** round));
      const solved = await branch(pieceOf(graph, weights), meter);
      expect(isStable(graph, solved.chosen)).toBe(true);
      expect(weightOf(weights, solved.chosen)).toBe(solved.weight);
      expect(solved.weight <= best.weight).toBe(true);
      expect(solved.upperBound >= best.weight).toBe(true);
      expect(solved.status === "optimal").toBe(solved.proof !== undefined);
      if (solved.status !== "optimal") open++;
    }
    expect(open > 20).toBe(true);
  });

  it("covers and relaxations alone leave honest bounds, too", async () => {
    const highs = await loadHighs();
    const random = new Random(16);
    let open = 0;
    for (let round = 0; round < 200; round++) {
      const n = 16 + random.below(9);
      const graph = randomGraph(random, n, 0.1 + random.unit() / 2);
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 4]);
      const best = bruteForce(graph, weights);
      const results = [
        coverSearch(
          graph,
          weights,
          nothing(n),
          new CaseTree(),
          new Meter().within(100 + 50 * round),
        ),
        relaxationSearch(
          graph,
          weights,
          edgeCliqueCover(graph),
          nothing(n),
          new CaseTree(),
          highs,
          new Meter().within(100_000 * (1 + round)),
        ),
      ];
      for (const result of results) {
        expect(isStable(graph, result.chosen)).toBe(true);
        expect(weightOf(weights, result.chosen)).toBe(result.weight);
        expect(result.weight <= best.weight).toBe(true);
        expect(result.upperBound >= best.weight).toBe(true);
        if (result.root === undefined) open++;
      }
    }
    expect(open > 50).toBe(true);
  });

  it("relaxations go on from where they were stopped, however often", async () => {
    const highs = await loadHighs();
    const random = new Random(19);
    let turns = 0;
    for (let round = 0; round < 60; round++) {
      const n = 16 + random.below(9);
      const graph = randomGraph(random, n, 0.1 + random.unit() / 2);
      const weights = randomWeights(random, n, 1, HEAVIEST[round % 4]);
      const best = bruteForce(graph, weights);
      const tree = new CaseTree();
      const cliques = edgeCliqueCover(graph);
      const search = new RelaxationSearch(graph, weights, cliques, nothing(n), tree, highs);
      let result = search.turn(new Meter().within(10_000));
      for (let budget = 10_000; result.root === undefined; budget *= 1.1) {
        expect(result.weight <= best.weight && result.upperBound >= best.weight).toBe(true);
        if (turns++ % 3 === 0) search.offer(best);
        result = search.turn(new Meter().within(Math.floor(budget)));
      }
      search.dispose();
      expect(result.weight).toBe(best.weight);
      const proof = tree.toProof(result.root, result.denominator, identity(n));
      expect(checkedBound(graph, weights, identity(n), proof)).toBe(best.weight);
    }
    expect(turns > 100).toBe(true);
  });

  it("ends within 200 ms of a time limit, with a bound better than half the weight", async () => {
    const graph = randomRegularGraph(new Random(17), 240, 6);
    const delay = await leastDelayMs(async () => {
      const began = performance.now();
      const solved = await branch(pieceOf(graph, ones(240)), new Meter({ timeLimitMs: 2500 }));
      const took = performance.now() - began;
      expect(solved.status).toBe("feasible");
      expect(solved.upperBound < 120).toBe(true);
      expect(solved.weight > 70).toBe(true);
      return took - 2500;
    });
    expect(delay <= PROMISED_MS).toBe(true);
  });

  it("gives a search up when its proof grows too large", () => {
    const graph = randomGraph(new Random(18), 60, 0.2);
    const start = nothing(60);
    const result = coverSearch(graph, ones(60), start, new CaseTree(), new Meter(), 100);
    expect(result.outgrown).toBe(true);
    expect(result.root).toBe(undefined);
    expect(result.upperBound >= result.weight).toBe(true);
  });
});
