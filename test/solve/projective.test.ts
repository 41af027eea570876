import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { toJson } from "../../lib/certify/json.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import type { Piece, Solved } from "../../lib/solve/engine.ts";
import { solveEmbedded, solveProjective } from "../../lib/solve/projective.ts";
import { solve } from "../../lib/solve/solve.ts";
import { bruteForce, isStable, weightOf } from "../oracle/brute-force.ts";
import {
  type EmbeddedGraph,
  embeddedGrid,
  irregular,
  smallEvenFace,
} from "../support/even-face.ts";
import { kernelPieces } from "../support/kernel-pieces.ts";
import { mirroredGrid, uniformWeights } from "../support/mirrored-grid.ts";
import { checkedBound } from "../support/proofs.ts";

/** Weights w = Mᵀc with all-half optimal for the relaxation, and 2c; no weight is 0. */
function costed(graph: Graph, random: Random, below: number, factor = 1) {
  const doubledCosts = Float64Array.from(
    { length: graph.m },
    () => 2 * factor * Math.max(0, random.below(below) - random.below(2)),
  );
  for (let v = 0; v < graph.n; v++) {
    const rows = graph.edgeOf.subarray(graph.offsets[v], graph.offsets[v + 1]);
    if (rows.every((e) => doubledCosts[e] === 0)) doubledCosts[rows[0]] = 2 * factor;
  }
  const weights = new Float64Array(graph.n);
  for (let e = 0; e < graph.m; e++) {
    weights[graph.tails[e]] += doubledCosts[e] / 2;
    weights[graph.heads[e]] += doubledCosts[e] / 2;
  }
  return { weights, doubledCosts };
}

function labelled(graph: Graph, weights: Float64Array, doubledCosts: Float64Array, random: Random) {
  const labels = random.shuffle(Int32Array.from({ length: graph.n }, (_, v) => v));
  return { graph, weights, labels, doubledCosts } satisfies Piece;
}

/** The answer, once it is a stable set of the weight stated and the checker agrees. */
function proved(piece: Piece, solved: ReturnType<typeof solveProjective>): Solved {
  if (solved.status !== "optimal") throw new Error(`expected optimal, got ${solved.status}`);
  expect(isStable(piece.graph, solved.chosen)).toBe(true);
  expect(weightOf(piece.weights, solved.chosen)).toBe(solved.weight);
  expect(solved.upperBound).toBe(solved.weight);
  const bound = checkedBound(piece.graph, piece.weights, piece.labels, solved.proof!);
  expect(bound).toBe(solved.weight);
  return solved;
}

function randomEmbedded(random: Random): EmbeddedGraph {
  return smallEvenFace(random, 20);
}

describe("solveEmbedded", () => {
  it("agrees with brute force on irregular graphs with w = Mᵀc, and proves it", () => {
    const random = new Random(31);
    for (let i = 0; i < 2000; i++) {
      const { graph, next } = randomEmbedded(random);
      const { weights, doubledCosts } = costed(graph, random, 2 + random.below(9));
      const piece = labelled(graph, weights, doubledCosts, random);
      const solved = proved(piece, solveEmbedded(piece, doubledCosts, next, new Meter()));
      expect(solved.weight).toBe(bruteForce(graph, weights).weight);
    }
  });

  it("agrees with brute force where costs are large, common multiples, or span many sizes", () => {
    const random = new Random(32);
    const scales = [
      { below: 1_000_000, factor: 1 },
      { below: 5, factor: 1_000_003 },
      { below: 2 ** 28, factor: 1 },
      { below: 1000, factor: 2 ** 31 },
      { below: 2, factor: 2 ** 44 },
    ];
    for (let i = 0; i < 1000; i++) {
      const { graph, next } = randomEmbedded(random);
      const { below, factor } = scales[i % scales.length];
      const { weights, doubledCosts } = costed(graph, random, below, factor);
      const piece = labelled(graph, weights, doubledCosts, random);
      const solved = proved(piece, solveEmbedded(piece, doubledCosts, next, new Meter()));
      expect(solved.weight).toBe(bruteForce(graph, weights).weight);
    }
  });
});

describe("solveProjective", () => {
  it("agrees with brute force on the components of kernels, for all kinds of weights", () => {
    const random = new Random(33);
    let solvedHere = 0;
    for (let i = 0; i < 2000; i++) {
      const { graph } = randomEmbedded(random);
      const weights = i % 3 === 0
        ? costed(graph, random, 6).weights
        : i % 3 === 1
        ? uniformWeights(graph.n, random, 1 + random.below(12))
        : new Float64Array(graph.n).fill(1);
      for (const found of kernelPieces(graph, weights)) {
        const { doubledCosts } = found;
        const piece = labelled(found.graph, found.weights, doubledCosts, random);
        const answer = solveProjective(piece, new Meter());
        // A piece of the kernel may be embedded still, or have no odd cycle left.
        if (answer.status === "declined") {
          expect(answer.reason).toBe("it is bipartite");
          continue;
        }
        solvedHere++;
        expect(proved(piece, answer).weight).toBe(bruteForce(piece.graph, piece.weights).weight);
      }
    }
    expect(solvedHere).toBeGreaterThan(1000);
  });

  it("proves its answers on larger irregular graphs, recognised afresh", () => {
    const random = new Random(34);
    for (let i = 0; i < 60; i++) {
      const start = embeddedGrid(5 + 2 * random.below(8), 5 + 2 * random.below(8));
      const { graph } = irregular(start, random, random.below(150));
      const { weights, doubledCosts } = costed(graph, random, 10);
      const piece = labelled(graph, weights, doubledCosts, random);
      proved(piece, solveProjective(piece, new Meter()));
    }
  });

  it("finds the same weight from costs that differ", () => {
    // Any c with Mᵀc = 2w serves: those of the maximum flow and those the weights were made from.
    const random = new Random(35);
    for (let i = 0; i < 40; i++) {
      const { graph } = irregular(embeddedGrid(9, 11), random, random.below(40));
      const { weights, doubledCosts } = costed(graph, random, 10);
      const whole = labelled(graph, weights, doubledCosts, random);
      const answer = proved(whole, solveProjective(whole, new Meter()));
      const flow = kernelPieces(graph, weights);
      if (flow.length !== 1 || flow[0].graph.n !== graph.n) continue;
      const again = labelled(graph, weights, flow[0].doubledCosts, random);
      expect(proved(again, solveProjective(again, new Meter())).weight).toBe(answer.weight);
    }
  });

  it("declines, with the reason, what is not its own", () => {
    const random = new Random(36);
    const grid = mirroredGrid(6, 6);
    const { weights, doubledCosts } = costed(grid, random, 9);
    const piece = labelled(grid, weights, doubledCosts, random);
    const reasonFor = (change: Partial<Piece>) => {
      const answer = solveProjective({ ...piece, ...change }, new Meter());
      return answer.status === "declined" ? answer.reason : answer.status;
    };
    expect(reasonFor({ doubledCosts: undefined })).toBe(
      "it is not a component of a half-integral kernel",
    );
    expect(reasonFor({})).toBe("optimal");
    const heavy = doubledCosts.map((cost, e) => (e === 0 ? 1 : 0) + cost * 2 ** 46);
    const loads = new Float64Array(grid.n);
    for (let e = 0; e < grid.m; e++) {
      loads[grid.tails[e]] += heavy[e] / 2;
      loads[grid.heads[e]] += heavy[e] / 2;
    }
    expect(reasonFor({ weights: loads, doubledCosts: heavy })).toBe(
      "its costs are too large to add up distances exactly",
    );
    // Other graphs, with cost 1 on each edge.
    const onGraph = (n: number, pairs: [number, number][]) => {
      const graph = graphFromPairs(n, pairs);
      const degrees = Float64Array.from(
        { length: n },
        (_, v) => graph.offsets[v + 1] - graph.offsets[v],
      );
      const costs = new Float64Array(graph.m).fill(2);
      return reasonFor(labelled(graph, degrees, costs, random));
    };
    const triangles: [number, number][] = [[0, 1], [1, 2], [2, 0], [3, 4], [4, 5], [5, 3]];
    expect(onGraph(3, [[0, 1], [1, 2], [2, 0], [0, 1]])).toBe("it has parallel edges");
    expect(onGraph(4, [[0, 1], [1, 2], [2, 3], [3, 0]])).toBe("it is bipartite");
    expect(onGraph(6, triangles)).toBe("it is not connected");
    expect(onGraph(6, [...triangles, [0, 3]])).toBe(
      "it has no even-face embedding: the odd cycles lie in separate blocks",
    );
    expect(onGraph(6, [...triangles, [0, 3], [1, 4], [2, 5]])).toBe(
      "it has no even-face embedding: swapping the sheets of its cover keeps orientation",
    );
    const k5 = Array.from({ length: 25 }, (_, i): [number, number] => [Math.floor(i / 5), i % 5]);
    expect(onGraph(5, k5.filter(([u, v]) => u < v))).toBe(
      "it has no even-face embedding: its double cover is not planar",
    );
  });

  it("stops when the meter runs out, with what it has and a bound", () => {
    const random = new Random(37);
    const { graph, next } = embeddedGrid(40, 40);
    const { weights, doubledCosts } = costed(graph, random, 9);
    const piece = labelled(graph, weights, doubledCosts, random);
    const { weight } = proved(piece, solveEmbedded(piece, doubledCosts, next, new Meter()));
    let feasible = 0;
    for (let units = 1000; units < 200_000; units *= 1.05) {
      const meter = new Meter().within(Math.floor(units));
      let answer: Solved;
      try {
        answer = solveEmbedded(piece, doubledCosts, next, meter);
      } catch (error) {
        expect(error).toBeInstanceOf(Interrupted);
        continue;
      }
      expect(isStable(graph, answer.chosen)).toBe(true);
      expect(weightOf(weights, answer.chosen)).toBe(answer.weight);
      expect(answer.weight <= weight && weight <= answer.upperBound).toBe(true);
      if (answer.status === "feasible") feasible++;
    }
    expect(feasible).toBeGreaterThan(3);
  });
});

describe("the whole path", () => {
  it("goes from names and weights over kernel and engine to a certificate in JSON that checks", async () => {
    const random = new Random(52);
    const { graph } = irregular(embeddedGrid(9, 9), random, 20);
    const costs = Float64Array.from({ length: graph.m }, () => 1 + random.below(9));
    const weights = new Float64Array(graph.n);
    for (let e = 0; e < graph.m; e++) {
      weights[graph.tails[e]] += costs[e];
      weights[graph.heads[e]] += costs[e];
    }
    const instance = Instance.from({
      items: Array.from(weights, (weight, v) => ({ id: `i${(v * 7919) % 100_003}`, weight })),
      conflicts: Array.from(
        graph.tails,
        (u, e) => [`i${(u * 7919) % 100_003}`, `i${(graph.heads[e] * 7919) % 100_003}`] as const,
      ),
    });
    const solution = await solve(instance, { engine: "projective", workers: 0 });
    expect(solution.status).toBe("optimal");
    expect(solution.parts.map((part) => part.engine)).toContain("projective");
    expect(check(instance, toJson(solution))).toEqual(
      expect.objectContaining({ valid: true }),
    );
  });
});
