import { describe, expect, it } from "vitest";
import type { CasesProof, Proof } from "../../lib/certify/certificate.ts";
import { neighbourLists, type Play, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { boundProved } from "../oracle/cases.ts";
import { randomCases } from "../support/random-cases.ts";
import { randomGraph, randomWeights } from "../support/random-graphs.ts";

function playOf(graph: Graph, weights: Float64Array): Play {
  return {
    n: graph.n,
    ...neighbourLists(graph.n, graph.tails, graph.heads),
    weights,
    vertices: Int32Array.from({ length: graph.n }, (_, v) => v),
    nameOf: String,
    scratch: scratchFor(graph.n),
  };
}

/** A path a–b–c with weights 3, 5, 3: best is a and c. */
const path = graphFromPairs(3, [[0, 1], [1, 2]]);
const pathWeights = Float64Array.of(3, 5, 3);

function refusal(proof: unknown): string {
  try {
    provenBound(playOf(path, pathWeights), proof as Proof);
  } catch (error) {
    return (error as Error).message;
  }
  return "accepted";
}

describe("proofs by cases", () => {
  it("prove what the notation says, and never less than the optimum: 3,000 random proofs", () => {
    const random = new Random(1);
    for (let i = 0; i < 3000; i++) {
      const n = 1 + random.below(9);
      const graph = randomGraph(random, n, random.unit());
      const scale = i % 10 === 0 ? 2 ** 40 : 12;
      const weights = randomWeights(random, n, i % 3 === 0 ? -5 : 1, scale);
      const proof = randomCases(random, graph, scale);
      const play = playOf(graph, weights);
      const bound = provenBound(play, proof);
      expect(Number(bound)).toBe(boundProved(graph, weights, proof));
      expect(Number(bound)).toBeGreaterThanOrEqual(bruteForce(graph, weights).weight);
      // The scratch arrays come back clean, or the next part of a certificate would be misjudged.
      expect(play.scratch.state.some((x) => x !== 0)).toBe(false);
      expect(play.scratch.load.some((x) => x !== 0)).toBe(false);
    }
  });

  it("stay exact where doubled weights pass 2^53", () => {
    const heavy = Float64Array.of(2 ** 52 - 1, 2 ** 52 + 1);
    const edge = graphFromPairs(2, [[0, 1]]);
    const doubled = 2 ** 53 - 2;
    const bound = provenBound(playOf(edge, heavy), {
      rule: "packing",
      ends: [0, 1],
      doubled: [doubled],
    });
    expect(bound).toBe(2n ** 52n + 1n);
  });

  it("name the first thing that is wrong", () => {
    const cases = (patch: Partial<CasesProof>): CasesProof => ({
      rule: "cases",
      cliques: [[0, 1], [1, 2]],
      oddCycles: [],
      nodes: [{ on: 1 }, {}, {}],
      ...patch,
    });
    expect(refusal(cases({}))).toBe("accepted");
    expect(refusal(cases({ nodes: [{ on: 1 }, {}] }))).toContain("a case is missing");
    expect(refusal(cases({ nodes: [{ on: 1 }, {}, {}, {}] }))).toContain("left over");
    expect(refusal(cases({ nodes: [{ on: 0 }, { on: 1 }, {}, {}, {}] }))).toContain("not in play");
    expect(refusal(cases({ nodes: [{ on: 7 }, {}, {}] }))).toContain("expected a vertex");
    expect(refusal(cases({ nodes: [{ on: 1, split: [] }, {}, {}] }))).toContain("both");
    expect(refusal(cases({ nodes: [{ split: [[0], [1]] }, {}, {}] }))).toContain("2 of the 3");
    expect(refusal(cases({ nodes: [{ split: [[0, 1], [1, 2]] }, {}, {}] }))).toContain(
      "named twice",
    );
    expect(refusal(cases({ nodes: [{ set: [0, -1] }] }))).toContain("integer >= 0");
    expect(refusal(cases({ nodes: [{ set: [0, 0.5] }] }))).toContain("integer >= 0");
    expect(refusal(cases({ nodes: [{ set: [2, 1] }] }))).toContain("expected a term");
    expect(refusal(cases({ nodes: [{ set: [2] }] }))).toContain("odd length");
    expect(refusal(cases({ cliques: [[0, 2]] }))).toContain("not in conflict");
    expect(refusal(cases({ cliques: [[0, 0]] }))).toContain("not in conflict");
    expect(refusal(cases({ oddCycles: [[0, 1, 2]] }))).toContain("not in conflict");
    expect(refusal(cases({ oddCycles: [[0, 1]] }))).toContain("odd number");
    expect(refusal(cases({ denominator: 0 }))).toContain("denominator");
    expect(refusal({ rule: "magic" })).toContain("unknown rule");
    expect(refusal({ rule: "packing", ends: [0, 2], doubled: [1] })).toContain("not in conflict");
    expect(refusal({ rule: "packing", ends: [0], doubled: [1] })).toContain("two ends");
  });
});
