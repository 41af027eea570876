import { describe, expect, it } from "vitest";
import type { ProjectiveProof } from "../../lib/certify/certificate.ts";
import { neighbourLists, type Play, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import { Rejected } from "../../lib/certify/rejected.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { solveEmbedded } from "../../lib/solve/projective.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import {
  type EmbeddedGraph,
  embeddedGrid,
  irregular,
  smallEvenFace,
} from "../support/even-face.ts";

/** A proof as JSON gives it, open to change. */
type Draft = { -readonly [K in keyof ProjectiveProof]: K extends "rule" ? "projective" : Loose<K> };
type Loose<K extends keyof ProjectiveProof> = ProjectiveProof[K] extends number ? number : number[];

interface Case {
  readonly graph: Graph;
  readonly weights: Float64Array;
  readonly proof: Draft;
  readonly weight: number;
}

/** Weights from random costs, the optimum and its proof. */
function proved({ graph, next }: EmbeddedGraph, random: Random): Case {
  const doubledCosts = Float64Array.from({ length: graph.m }, () => 2 * random.below(9));
  const weights = new Float64Array(graph.n);
  for (let v = 0; v < graph.n; v++) {
    const rows = graph.edgeOf.subarray(graph.offsets[v], graph.offsets[v + 1]);
    if (rows.every((e) => doubledCosts[e] === 0)) doubledCosts[rows[0]] = 2;
  }
  for (let e = 0; e < graph.m; e++) {
    weights[graph.tails[e]] += doubledCosts[e] / 2;
    weights[graph.heads[e]] += doubledCosts[e] / 2;
  }
  const labels = Int32Array.from({ length: graph.n }, (_, v) => v);
  const piece = { graph, weights, labels, doubledCosts };
  const { weight, proof } = solveEmbedded(piece, doubledCosts, next, new Meter());
  const asLists = (_: string, value: unknown) =>
    ArrayBuffer.isView(value) ? Array.from(value as Float64Array) : value;
  return { graph, weights, weight, proof: JSON.parse(JSON.stringify(proof, asLists)) };
}

function playOf(graph: Graph, weights: Float64Array, vertices?: number[]): Play {
  return {
    n: graph.n,
    ...neighbourLists(graph.n, graph.tails, graph.heads),
    weights,
    vertices: vertices ?? Int32Array.from({ length: graph.n }, (_, v) => v),
    nameOf: (v) => `"${v}"`,
    scratch: scratchFor(graph.n),
  };
}

/** What the checker says to a changed proof: the bound, or the reason for rejecting it. */
function verdict({ graph, weights, proof }: Case, change: (proof: Draft) => void): string | number {
  const changed = structuredClone(proof);
  change(changed);
  try {
    return Number(provenBound(playOf(graph, weights), changed));
  } catch (error) {
    if (error instanceof Rejected) return error.message;
    throw error;
  }
}

describe("projectiveBound", () => {
  const base = proved(irregular(embeddedGrid(7, 7), new Random(41), 30), new Random(42));
  const { graph, weights, proof, weight } = base;
  const step = 2 / proof.unit;
  const darts = (v: number) => [graph.offsets[v], graph.offsets[v + 1]];

  it("accepts the proof, also with the vertices of the part in another order", () => {
    expect(verdict(base, () => {})).toBe(weight);
    const vertices = new Random(43).shuffle(Array.from({ length: graph.n }, (_, v) => v));
    expect(Number(provenBound(playOf(graph, weights, vertices), proof))).toBe(weight);
  });

  it("rejects an embedding with two darts swapped", () => {
    const v = Array.from({ length: graph.n }, (_, v) => v).find((v) => {
      const [begin, end] = darts(v);
      return end - begin === 4;
    })!;
    const [at] = darts(v);
    const swap = (p: Draft) => {
      [p.rotation[at], p.rotation[at + 1]] = [p.rotation[at + 1], p.rotation[at]];
    };
    expect(verdict(base, swap)).toMatch(
      /^projective: the cover is not drawn on a sphere, vertices - edges \+ faces is -?\d+, not 2$/,
    );
  });

  it("rejects a rotation that is none", () => {
    const [at] = darts(3);
    expect(verdict(base, (p) => p.rotation[at] = p.rotation[at + 1])).toMatch(
      /^projective, rotation at vertex 3: expected each number from 0 to \d once, got \d$/,
    );
    expect(verdict(base, (p) => p.rotation[at] = 99)).toMatch(
      /^projective, rotation at vertex 3: expected each number from 0 to \d once, got 99$/,
    );
    expect(verdict(base, (p) => p.rotation.pop())).toBe(
      `projective: expected a rotation of ${2 * graph.m} darts, got ${2 * graph.m - 1}`,
    );
  });

  it("rejects costs that are not the weights, not integers, or not one for each conflict", () => {
    expect(verdict(base, (p) => p.costs[0]++)).toMatch(
      /^projective: the costs at "0" add up to \d+, expected twice its weight, \d+$/,
    );
    expect(verdict(base, (p) => p.unit++)).toMatch(/^projective: the costs at "0" add up to/);
    expect(verdict(base, (p) => p.unit = 0)).toBe(
      "projective, unit: expected an integer >= 1, got 0",
    );
    expect(verdict(base, (p) => p.costs[5] = -1)).toBe(
      "projective, cost 5: expected an integer >= 0 below 2^53, got -1",
    );
    expect(verdict(base, (p) => p.costs[5] += 0.5)).toMatch(
      /^projective, cost 5: expected an integer >= 0 below 2\^53, got \d+\.5$/,
    );
    expect(verdict(base, (p) => p.costs.push(0))).toBe(
      `projective: expected a cost for each of ${graph.m} conflicts inside the part, ` +
        `got ${graph.m + 1}`,
    );
  });

  it("rejects costs whose sums might be rounded", () => {
    const heavy = (scale: number): Case => ({
      ...base,
      weights: weights.map((weight) => weight * scale),
      proof: { ...proof, costs: proof.costs.map((cost) => cost * scale), distance: 0 },
    });
    const total = weights.reduce((sum, weight) => sum + 2 * weight / proof.unit, 0);
    const scale = 2 ** Math.floor(Math.log2(2 ** 51 / total));
    expect(typeof verdict(heavy(scale), () => {})).toBe("number");
    expect(verdict(heavy(2 * scale), () => {})).toMatch(
      /^projective: the costs add up to \d+, more than 2251799813685248$/,
    );
  });

  it("rejects a distance that is too large, and proves less from one too small", () => {
    expect(verdict(base, (p) => p.distance += step)).toMatch(
      /^projective: the distance \d+ is not proved at source \d+, where the tree of paths proves \d+$/,
    );
    expect(verdict(base, (p) => p.distance -= step)).toBe(weight + 1);
    expect(verdict(base, (p) => p.distance = -step)).toMatch(
      /^projective, distance: expected an integer >= 0/,
    );
  });

  it("rejects sources that are no one-sided walk, whichever is left out or in another place", () => {
    const broken = /^projective: the last source shares no edge with the antipode of the first$/;
    const count = proof.sources.length;
    expect(count).toBeGreaterThan(3);
    for (let i = 0; i < count; i++) {
      expect(verdict(base, (p) => p.sources[i] = p.sources[(i + 1) % count])).toMatch(
        /^projective, source \d+: its face or the antipode comes twice$/,
      );
      expect(verdict(base, (p) => p.sources.splice(i, 1))).toMatch(
        i > 0 && i < count - 1 ? /^projective, source \d+: its face shares no edge/ : broken,
      );
    }
    expect(verdict(base, (p) => p.sources.push(p.sources.shift()!))).toMatch(
      /^projective, source \d+: its face shares no edge with the one before$/,
    );
    expect(verdict(base, (p) => p.sources.reverse())).toBe(weight);
    expect(verdict(base, (p) => p.sources.splice(0))).toBe(
      "projective: expected at least one source",
    );
    expect(verdict(base, (p) => p.sources[0] = 2 * graph.m)).toBe(
      `projective, source 0: expected a dart from 0 to ${2 * graph.m - 1}, got ${2 * graph.m}`,
    );
  });

  it("rejects parts that are empty, in pieces, bipartite, or name a vertex twice or wrongly", () => {
    const reason = (vertices: number[]) => {
      try {
        return provenBound(playOf(graph, weights, vertices), proof);
      } catch (error) {
        return (error as Rejected).message;
      }
    };
    const far = Array.from({ length: graph.n }, (_, v) => v).find((v) =>
      v !== 0 && !graph.targets.subarray(...darts(0)).includes(v)
    )!;
    expect(reason([])).toBe("projective: the part has no vertices");
    expect(reason([0, far])).toBe("projective: the part is not connected");
    expect(reason([0, graph.targets[graph.offsets[0]]])).toBe(
      "projective: the part has no odd cycle",
    );
    expect(reason([0, 1, 0])).toBe('projective: "0" stands twice in the part');
    expect(reason([0, graph.n])).toBe(
      `projective: expected a vertex from 0 to ${graph.n - 1}, got ${graph.n}`,
    );
  });

  it("never proves less than the optimum, however a proof is changed", () => {
    const random = new Random(44);
    let accepted = 0, rejected = 0;
    for (let i = 0; i < 400; i++) {
      const small = proved(smallEvenFace(random, 16), random);
      const optimum = bruteForce(small.graph, small.weights).weight;
      for (let j = 0; j < 10; j++) {
        const answer = verdict(small, (p) => {
          for (let k = random.below(3); k >= 0; k--) mutate(p, random);
        });
        if (typeof answer === "string") rejected++;
        else {
          accepted++;
          expect(answer >= optimum).toBe(true);
        }
      }
    }
    expect(accepted).toBeGreaterThan(100);
    expect(rejected).toBeGreaterThan(1000);
  });
});

/** One small change anywhere. */
function mutate(p: Draft, random: Random): void {
  const nudge = (list: number[]) => {
    if (list.length > 0) list[random.below(list.length)] += random.below(5) - 2;
  };
  switch (random.below(6)) {
    case 0:
      return nudge(p.costs);
    case 1:
      return nudge(p.rotation);
    case 2:
      return nudge(p.sources);
    case 3:
      p.distance += random.below(7) - 3;
      return;
    case 4: {
      const at = random.below(p.rotation.length - 1);
      [p.rotation[at], p.rotation[at + 1]] = [p.rotation[at + 1], p.rotation[at]];
      return;
    }
    default: {
      const at = random.below(p.sources.length);
      p.sources.splice(at, 1);
      return;
    }
  }
}
