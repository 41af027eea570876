import { describe, expect, it } from "vitest";
import { blocksBound } from "../../lib/certify/blocks.ts";
import type { BlocksProof } from "../../lib/certify/certificate.ts";
import { neighbourLists, type Play, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import { Rejected } from "../../lib/certify/rejected.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { type KernelPiece, reducePiece } from "../../lib/reduce/blocks-piece.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { kernelPieces } from "../support/kernel-pieces.ts";
import { proveByCases } from "../support/prove.ts";
import { randomGraph } from "../support/random-graphs.ts";
import {
  type BlockOptions,
  randomCosts,
  weightsOfCosts,
  withBlocks,
} from "../support/with-blocks.ts";

/** What can be changed in a proof that came from JSON. */
type Forged = {
  ends: number[];
  doubled: number[];
  blocks: {
    inside: number[];
    attachments: number[];
    vertices: number;
    ends: number[];
    doubled: number[];
  }[];
  parts: { vertices: number[]; bound: number; proof: unknown }[];
};

const plain = (proof: BlocksProof): Forged =>
  JSON.parse(
    JSON.stringify(
      proof,
      (_, v) => ArrayBuffer.isView(v) ? Array.from(v as unknown as ArrayLike<number>) : v,
    ),
  );

function playOf(graph: Graph, weights: Float64Array, vertices: Int32Array): Play {
  return {
    n: graph.n,
    ...neighbourLists(graph.n, graph.tails, graph.heads),
    weights,
    vertices,
    nameOf: (v) => `item ${v}`,
    scratch: scratchFor(graph.n),
  };
}

interface Case {
  graph: Graph;
  play: Play;
  proof: BlocksProof;
  optimum: number;
}

/** A kernel piece of a random graph with blocks, its optimum, and the proof of it. */
function* cases(seed: number, count: number, options: BlockOptions): Generator<Case> {
  const random = new Random(seed);
  for (let run = 0; run < count; run++) {
    const { graph } = withBlocks(random, randomGraph(random, 6, 0.8), options);
    const weights = run % 2 === 0
      ? weightsOfCosts(graph, randomCosts(random, graph.m, 9)).map((w) => Math.max(w, 1))
      : Float64Array.from({ length: graph.n }, () => 1 + random.below(5));
    for (const piece of kernelPieces(graph, weights)) {
      const proof = proofFor(piece);
      if (proof === undefined) continue;
      const optimum = bruteForce(piece.graph, piece.weights).weight;
      yield { graph, play: playOf(graph, weights, piece.labels), proof, optimum };
    }
  }
}

function proofFor(piece: KernelPiece): BlocksProof | undefined {
  const reduced = reducePiece(piece, new Meter());
  return reduced?.combine(
    reduced.pieces.map(({ graph, weights, labels }) => {
      const { chosen, weight } = bruteForce(graph, weights);
      return { chosen, upperBound: weight, proof: proveByCases(graph, labels) };
    }),
    new Meter(),
  ).proof;
}

/** What a forger gets who states for each part whatever its proof now proves; NaN if rejected. */
function restated(play: Play, data: Forged): number {
  for (;;) {
    try {
      const fresh = { ...play, scratch: scratchFor(play.n) };
      return Number(provenBound(fresh, data as unknown as BlocksProof));
    } catch (error) {
      if (!(error instanceof Rejected)) throw error;
      const told = /part (\d+): the proof proves (\d+)/.exec(error.message);
      if (told === null) return NaN;
      data.parts[Number(told[1])].bound = Number(told[2]);
    }
  }
}

const provenOrRejected = (play: Play, proof: unknown): number => {
  try {
    return Number(provenBound({ ...play, scratch: scratchFor(play.n) }, proof as BlocksProof));
  } catch (error) {
    if (error instanceof Rejected) return NaN;
    throw error;
  }
};

describe("blocks proofs", () => {
  it("prove the optimum, as arrays and as JSON, several hundred cases", () => {
    let seen = 0;
    for (const nested of [false, true]) {
      for (
        const { play, proof, optimum } of cases(1, 250, {
          blocks: 4,
          size: 4,
          nested,
        })
      ) {
        expect(blocksBound(play, proof, provenBound)).toBe(BigInt(optimum));
        expect(provenOrRejected(play, plain(proof))).toBe(optimum);
        seen++;
      }
    }
    expect(seen).toBeGreaterThan(200);
  });

  it("never prove less than the optimum, however a number is changed", () => {
    const random = new Random(2);
    let rejected = 0, accepted = 0;
    for (const { play, proof, optimum } of cases(3, 300, { blocks: 3, size: 4 })) {
      for (let forge = 0; forge < 40; forge++) {
        const data = plain(proof);
        forgeOne(random, data);
        const bound = restated(play, data);
        if (Number.isNaN(bound)) rejected++;
        else {
          accepted++;
          expect(bound).toBeGreaterThanOrEqual(optimum);
        }
      }
    }
    expect(Math.min(rejected, accepted)).toBeGreaterThan(500);
  });

  const options: BlockOptions = { blocks: 1, size: 8, attachments: 3 };
  const starCase = () => {
    for (const one of cases(5, 200, options)) {
      if (one.proof.blocks.some((block) => block.vertices >= 4)) return one;
    }
    throw new Error("no star among the cases");
  };

  it("reject a gadget that costs more than its block, with the state it fails in", () => {
    const { play, proof } = starCase();
    const star = proof.blocks.findIndex((block) => block.vertices >= 4);
    const from = plain(proof);
    let rejections = 0;
    for (let e = 0; e < from.blocks[star].doubled.length; e++) {
      const data = plain(proof);
      for (const other of data.blocks[star].doubled.keys()) data.blocks[star].doubled[other] += 1;
      data.blocks[star].doubled[e] += 1;
      expect(() => provenBound(play, data as unknown as BlocksProof)).toThrow(/the gadget costs/);
      play.scratch.state.fill(0);
      rejections++;
    }
    expect(rejections).toBeGreaterThanOrEqual(6);
  });

  it("reject what is malformed or hides an edge", () => {
    const { play, proof } = starCase();
    const star = proof.blocks.findIndex((block) => block.vertices >= 4);
    const forgeries: [RegExp, (data: Forged) => void][] = [
      [/outside/, (d) => d.blocks[star].inside.pop()],
      [/outside/, (d) => d.blocks[star].attachments.pop()],
      [/named twice/, (d) => d.blocks[star].inside.push(d.blocks[star].inside[0])],
      [/named twice/, (d) => d.blocks[star].attachments[0] = d.blocks[star].inside[0]],
      [/no vertex/, (d) => d.blocks[star].inside[0] = -1],
      [/no vertex/, (d) => d.blocks[star].inside[0] = 0.5],
      [/at most 3 attachments/, (d) => d.blocks[star].attachments.push(0)],
      [/at most 5 new vertices/, (d) => d.blocks[star].vertices = 6],
      [/two ends/, (d) => d.blocks[star].ends.pop()],
      [/two ends/, (d) => d.ends.pop()],
      [/integer >= 0/, (d) => d.doubled[0] = -1],
      [/integer >= 0/, (d) => d.blocks[star].doubled[0] = 0.5],
      [/no edge/, (d) => d.ends[1] = d.ends[0]],
      [/neither an attachment nor/, (d) => d.blocks[star].ends[0] = d.blocks[star].inside[0]],
      [/in no part/, (d) => d.parts.pop()],
      [/in two parts/, (d) => d.parts[0].vertices.push(d.parts[0].vertices[0])],
      [/the certificate states/, (d) => d.parts[0].bound -= 1],
      [/unknown rule/, (d) => d.parts[0].proof = { rule: "trust me" }],
    ];
    for (const [reason, forge] of forgeries) {
      const data = plain(proof);
      forge(data);
      const fresh = { ...play, scratch: scratchFor(play.n) };
      expect(() => provenBound(fresh, data as unknown as BlocksProof)).toThrow(reason);
    }
  });
});

/** Changes one number of the proof, outside the proofs of its parts. */
function forgeOne(random: Random, data: Forged): void {
  const pick = <T>(list: T[]): T => list[random.below(list.length)];
  const nudge = (list: number[]) => {
    if (list.length > 0) list[random.below(list.length)] += random.below(2) === 0 ? 1 : -1;
  };
  switch (random.below(6)) {
    case 0:
      return nudge(data.doubled);
    case 1:
      return nudge(pick(data.blocks).doubled);
    case 2:
      return nudge(pick(data.blocks).ends);
    case 3:
      return nudge(pick(data.blocks).inside);
    case 4:
      return nudge(pick(data.blocks).attachments);
    default:
      return nudge(data.ends);
  }
}
