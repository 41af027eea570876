import { describe, expect, it } from "vitest";
import { neighbourLists, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import type { Piece, Solved } from "../../lib/solve/engine.ts";
import { solveByTransversal } from "../../lib/solve/transversal.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import { hardWeights, mirroredGrid, uniformWeights } from "../support/mirrored-grid.ts";
import { nearBipartite } from "../support/near-bipartite.ts";
import {
  randomConnectedGraph,
  randomGraph,
  randomRegularGraph,
  randomWeights,
} from "../support/random-graphs.ts";

/** A piece whose labels are a random renumbering. */
function pieceOf(graph: Graph, weights: Float64Array, random: Random): Piece {
  const labels = random.shuffle(Int32Array.from({ length: graph.n }, (_, v) => v));
  return { graph, weights, labels };
}

/** What the checker makes of a proof. */
function checked(piece: Piece, solved: Solved): number {
  const { graph, labels, weights } = piece;
  const labelled = new Float64Array(graph.n);
  for (let v = 0; v < graph.n; v++) labelled[labels[v]] = weights[v];
  const bound = provenBound({
    n: graph.n,
    ...neighbourLists(
      graph.n,
      graph.tails.map((v) => labels[v]),
      graph.heads.map((v) => labels[v]),
    ),
    weights: labelled,
    vertices: labels,
    nameOf: (v) => `${v}`,
    scratch: scratchFor(graph.n),
  }, solved.proof!);
  return Number(bound);
}

function expectOptimal(piece: Piece, weight?: number): Solved {
  const solved = solveByTransversal(piece, new Meter());
  if (solved.status !== "optimal") throw new Error(`expected optimal, got ${solved.status}`);
  expect(isStable(piece.graph, solved.chosen)).toBe(true);
  expect(weightOf(piece.weights, solved.chosen)).toBe(solved.weight);
  expect(solved.upperBound).toBe(solved.weight);
  expect(checked(piece, solved)).toBe(solved.weight);
  if (weight !== undefined) expect(solved.weight).toBe(weight);
  return solved;
}

describe("solveByTransversal", () => {
  it("agrees with brute force and proves it, on random graphs with random weights", () => {
    const random = new Random(40);
    for (let i = 0; i < 2000; i++) {
      const n = 1 + random.below(16);
      const graph = i % 2 === 0
        ? randomGraph(random, n, 0.1 + 0.6 * random.unit())
        : randomConnectedGraph(random, n, random.below(14));
      const weights = randomWeights(random, n, 1, i % 3 === 0 ? 3 : 1000);
      expectOptimal(pieceOf(graph, weights, random), bruteForce(graph, weights).weight);
    }
  });

  it("agrees with brute force where all-half is optimal for the relaxation", () => {
    const random = new Random(41);
    for (let i = 0; i < 500; i++) {
      const graph = randomConnectedGraph(random, 6 + random.below(14), 3 + random.below(12));
      const weights = hardWeights(graph, random);
      expectOptimal(pieceOf(graph, weights, random), bruteForce(graph, weights).weight);
    }
  });

  it("is exact for weights near 2^52", () => {
    const random = new Random(42);
    for (let i = 0; i < 200; i++) {
      const graph = randomConnectedGraph(random, 9, random.below(9));
      const weights = Float64Array.from(
        { length: 9 },
        () => 2 ** 49 - 1 - random.below(1 << 20),
      );
      expectOptimal(pieceOf(graph, weights, random), bruteForce(graph, weights).weight);
    }
  });

  it("solves 10,000 items with a transversal of 12, with a proof of moderate size", () => {
    const random = new Random(43);
    const graph = nearBipartite(random, 10_000, 30_000, 12, 20);
    const solved = expectOptimal(pieceOf(graph, uniformWeights(graph.n, random), random));
    expect(solved.figures.transversal).toBe(12);
  });

  it("solves mirrored grids of width 6 with weights that settle nothing", () => {
    const random = new Random(44);
    const graph = mirroredGrid(40, 6);
    const solved = expectOptimal(pieceOf(graph, hardWeights(graph, random), random));
    expect(solved.figures.transversal).toBe(6);
  });

  it("declines pieces whose transversal is large", () => {
    const random = new Random(45);
    const graph = randomRegularGraph(random, 300, 4);
    const answer = solveByTransversal(
      pieceOf(graph, uniformWeights(300, random), random),
      new Meter(),
    );
    expect(answer.status).toBe("declined");
  });

  it("stops anywhere with an honest bound", () => {
    const random = new Random(46);
    const graph = mirroredGrid(20, 6);
    const weights = hardWeights(graph, random);
    const { weight } = expectOptimal(pieceOf(graph, weights, random));
    let interrupted = 0;
    for (let units = 10_000; units < 20_000_000; units = Math.ceil(units * 1.04)) {
      try {
        const answer = solveByTransversal(
          pieceOf(graph, weights, random),
          new Meter().within(units),
        );
        if (answer.status === "declined") throw new Error(answer.reason);
        expect(isStable(graph, answer.chosen)).toBe(true);
        expect(answer.weight).toBeLessThanOrEqual(weight);
        expect(answer.upperBound).toBeGreaterThanOrEqual(weight);
        if (answer.status === "feasible") interrupted++;
      } catch (error) {
        if (!(error instanceof Error && error.name === "Interrupted")) throw error;
      }
    }
    expect(interrupted).toBeGreaterThan(2);
  });
});
