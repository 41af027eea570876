/** Even-face graphs whose independence number or colouring is known from outside this project. */
import { describe, expect, it } from "vitest";
import { traceSignedFaces } from "../../lib/graph/embedding.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { evenFaceEmbedding } from "../../lib/parity/even-face.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { solveProjective } from "../../lib/solve/projective.ts";
import { embeddedGrid, irregular } from "../support/even-face.ts";
import { kernelPieces } from "../support/kernel-pieces.ts";
import { checkedBound } from "../support/proofs.ts";

/** The independence number, by the projective engine alone; the whole graph must be its kernel. */
function independenceNumber(graph: Graph): number {
  const weights = new Float64Array(graph.n).fill(1);
  const pieces = kernelPieces(graph, weights);
  expect(pieces.length).toBe(1);
  expect(pieces[0].graph.n).toBe(graph.n);
  const answer = solveProjective(pieces[0], new Meter());
  if (answer.status === "declined") throw new Error(answer.reason);
  expect(answer.status).toBe("optimal");
  expect(checkedBound(graph, weights, pieces[0].labels, answer.proof!)).toBe(answer.weight);
  return answer.weight;
}

/** A cycle of 2k vertices with all k long diagonals. */
function moebiusLadder(k: number): Graph {
  const pairs: [number, number][] = [];
  for (let v = 0; v < 2 * k; v++) pairs.push([v, (v + 1) % (2 * k)]);
  for (let v = 0; v < k; v++) pairs.push([v, v + k]);
  return graphFromPairs(2 * k, pairs);
}

/**
 * The generalised Mycielski graph of the odd cycle of length k: `levels` further copies of the cycle's
 * vertices, each joined to the neighbours of its original one level below, and a last vertex joined to
 * the whole top level. One level is Mycielski's construction; of C5 it gives the Grötzsch graph.
 */
function generalisedMycielski(k: number, levels: number): Graph {
  const pairs: [number, number][] = [];
  for (let v = 0; v < k; v++) pairs.push([v, (v + 1) % k]);
  for (let level = 1; level <= levels; level++) {
    for (let v = 0; v < k; v++) {
      pairs.push([level * k + v, (level - 1) * k + (v + 1) % k]);
      pairs.push([level * k + v, (level - 1) * k + (v + k - 1) % k]);
    }
  }
  for (let v = 0; v < k; v++) pairs.push([(levels + 1) * k, levels * k + v]);
  return graphFromPairs((levels + 1) * k + 1, pairs);
}

/** Whether the vertices can be properly coloured with k colours, by backtracking on the tightest. */
function colourable(graph: Graph, k: number): boolean {
  const colour = new Int8Array(graph.n).fill(-1);
  const allowed = (v: number): number[] => {
    const taken = new Set<number>();
    for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
      taken.add(colour[graph.targets[a]]);
    }
    return Array.from({ length: k }, (_, c) => c).filter((c) => !taken.has(c));
  };
  const extend = (): boolean => {
    let tightest = -1, choices: number[] = [];
    for (let v = 0; v < graph.n; v++) {
      if (colour[v] >= 0) continue;
      const open = allowed(v);
      if (tightest < 0 || open.length < choices.length) [tightest, choices] = [v, open];
    }
    if (tightest < 0) return true;
    for (const c of choices) {
      colour[tightest] = c;
      if (extend()) return true;
    }
    colour[tightest] = -1;
    return false;
  };
  return extend();
}

describe("independence numbers known from outside", () => {
  it("of odd cycles: (n - 1) / 2", () => {
    for (const n of [3, 5, 7, 101, 1001]) {
      const pairs = Array.from({ length: n }, (_, v): [number, number] => [v, (v + 1) % n]);
      expect(independenceNumber(graphFromPairs(n, pairs))).toBe((n - 1) / 2);
    }
  });

  it("of Möbius ladders on 2k vertices, k even: k - 1", () => {
    // The rim has only two sets of k vertices without a rim edge, and for k even a rung joins
    // vertices of the same one. Wagner's graph (k = 4): 3, as in every table of cubic graphs.
    for (const k of [2, 4, 6, 20, 100, 500]) {
      expect(independenceNumber(moebiusLadder(k))).toBe(k - 1);
    }
  });

  it("of the Grötzsch graph: 5", () => {
    // Tabulated among its standard invariants together with chromatic number 4 (for instance in the
    // MathWorld article on it; written from memory).
    expect(independenceNumber(generalisedMycielski(5, 1))).toBe(5);
  });
});

describe("projective quadrangulations", () => {
  // D. A. Youngs, "4-chromatic projective graphs", J. Graph Theory 21 (1996): a quadrangulation of the
  // projective plane has chromatic number 2 or 4.
  it("that are not bipartite have no proper colouring with three colours", () => {
    const random = new Random(51);
    let tried = 0;
    while (tried < 12) {
      const k = 3 + random.below(4);
      const made = irregular(embeddedGrid(k, k), random, 10 + random.below(15));
      const { graph, next } = irregular(made, random, 400, ["chord"]);
      const twisted = new Uint8Array(graph.m).fill(1);
      if (traceSignedFaces({ next, twisted }).lengths.some((length) => length !== 4)) continue;
      tried++;
      expect(colourable(graph, 3)).toBe(false);
      expect(colourable(graph, 4)).toBe(true);
      expect(evenFaceEmbedding(graph, new Meter()).kind).toBe("embedded");
    }
  });

  it("include the generalised Mycielski graphs of odd cycles, which are recognised", () => {
    for (const [k, levels] of [[3, 1], [3, 2], [5, 1], [5, 2], [5, 3], [7, 2], [9, 4]]) {
      const graph = generalisedMycielski(k, levels);
      expect(graph.m).toBe(2 * graph.n - 2);
      const answer = evenFaceEmbedding(graph, new Meter());
      if (answer.kind !== "embedded") throw new Error(answer.reason);
      const twisted = new Uint8Array(graph.m).fill(1);
      const { lengths } = traceSignedFaces({ next: answer.next, twisted });
      expect(lengths.every((length) => length === 4)).toBe(true);
      if (graph.n <= 30) expect(colourable(graph, 3)).toBe(false);
    }
  });
});
