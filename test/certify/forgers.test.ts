import { describe, expect, it } from "vitest";
import type { Proof } from "../../lib/certify/certificate.ts";
import { neighbourLists, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import { Rejected } from "../../lib/certify/rejected.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { replacedBlocks } from "../support/mutations.ts";
import { proveByCases } from "../support/prove.ts";
import { randomConnectedGraph, randomGraph, randomWeights } from "../support/random-graphs.ts";

/** A proof under construction. */
// deno-lint-ignore no-explicit-any
type Draft = any;

/** What the checker finds proved about all vertices of a graph, or why it rejects the proof. */
function prove(graph: Graph, weights: Float64Array, proof: Draft): number | string {
  const play = {
    n: graph.n,
    ...neighbourLists(graph.n, graph.tails, graph.heads),
    weights,
    vertices: Array.from(weights.keys()),
    nameOf: String,
    scratch: scratchFor(graph.n),
  };
  try {
    return Number(provenBound(play, proof as Proof));
  } catch (error) {
    if (error instanceof Rejected) return error.message;
    throw error;
  }
}

/** As `prove`, each part of a blocks proof stating what it now proves. */
function restated(graph: Graph, weights: Float64Array, proof: Draft): number | string {
  for (;;) {
    const answer = prove(graph, weights, proof);
    const told = /^blocks, part (\d+): the proof proves (\d+)/.exec(String(answer));
    if (told === null) return answer;
    proof.parts[Number(told[1])].bound = Number(told[2]);
  }
}

/**
 * A forger with a plan: keeps each change after which the checker still finds something proved, and
 * no more than before. However many changes it makes, that must not fall below the optimum.
 *
 * @returns whether it came down to the optimum; undefined where it did not even get started
 */
function forge(
  graph: Graph,
  weights: Float64Array,
  start: Draft,
  steps: number,
  change: (proof: Draft) => void,
  bound: (proof: Draft) => number | string = (proof) => prove(graph, weights, proof),
): boolean | undefined {
  let proof = start, least = bound(start);
  if (typeof least === "string") return undefined;
  const optimum = bruteForce(graph, weights).weight;
  for (let step = 0; step <= steps; step++) {
    if (least < optimum) throw new Error(`${least} for ${optimum}: ${JSON.stringify(proof)}`);
    const changed = structuredClone(proof);
    change(changed);
    const now = bound(changed);
    if (typeof now === "number" && now <= least) [proof, least] = [changed, now];
  }
  return least === optimum;
}

const pick = <T>(random: Random, list: readonly T[]): T => list[random.below(list.length)];

/** Adds a little to a number of a list, or takes it away. */
function nudge(random: Random, list: number[]): void {
  if (list.length > 0) list[random.below(list.length)] += pick(random, [-2, -1, 1, 1, 2, 2]);
}

describe("a forger with a plan never gets below the optimum", () => {
  const tally = () => ({ started: 0, tight: 0 });
  const count = (sums: { started: number; tight: number }, tight: boolean | undefined) => {
    if (tight !== undefined) sums.started++;
    if (tight === true) sums.tight++;
  };

  it("by cases: random terms and trees, all sorts of slips, multipliers improved", () => {
    const random = new Random(201), sums = tally();
    for (let run = 0; run < 450; run++) {
      const graph = randomGraph(random, 3 + random.below(4), 0.3 + 0.7 * random.unit());
      const weights = randomWeights(random, graph.n, -1, 5);
      const some = () => random.shuffle(Array.from(weights.keys()));
      const terms = (most: number, of: (length: number) => number[]) =>
        Array.from({ length: random.below(most) }, () => of(2 + random.below(4))).filter((term) => {
          const alone = { rule: "cases", cliques: [], oddCycles: [], nodes: [{}] };
          const field = term.length % 2 === 0 || random.below(2) === 0 ? "cliques" : "oddCycles";
          return typeof prove(graph, weights, { ...alone, [field]: [term] }) === "number";
        });
      const edges = Array.from(graph.tails, (u, e) => [u, graph.heads[e]]);
      const cliques = [...edges, ...terms(30, (length) => some().slice(0, length))];
      const proof: Draft = { rule: "cases", cliques, oddCycles: [], nodes: [] };
      for (let i = 0; i < 30; i++) {
        const cycle = some().slice(0, 3 + random.below(3));
        const more = { ...proof, oddCycles: [...proof.oddCycles, cycle], nodes: [{}] };
        if (typeof prove(graph, weights, more) === "number") proof.oddCycles.push(cycle);
      }
      const all = proof.cliques.length + proof.oddCycles.length;
      const grow = (open: number[], depth: number): void => {
        const set: number[] = [];
        for (let t = 0; t < all; t++) if (random.below(2) === 0) set.push(t, random.below(6));
        const kind = depth === 0 || open.length === 0 ? 0 : random.below(3);
        if (kind === 0) proof.nodes.push({ set });
        else if (kind === 1) {
          const on = random.below(8) === 0 ? random.below(graph.n) : pick(random, open);
          const near = (u: number) =>
            u === on || edges.some((e) => e.includes(u) && e.includes(on));
          proof.nodes.push({ set, on });
          grow(open.filter((u) => !near(u)), depth - 1);
          grow(open.filter((u) => u !== on), depth - 1);
        } else {
          const split: number[][] = [[], []];
          for (const v of open) if (random.below(9) > 0) pick(random, split).push(v);
          proof.nodes.push({ set, split });
          for (const part of split) grow(part, depth - 1);
        }
      };
      grow(some(), 2);
      proof.denominator = 1 + random.below(3);
      count(
        sums,
        forge(graph, weights, proof, 60, (p) => {
          const { set } = pick<Draft>(random, p.nodes);
          if (set.length > 0) set[2 * random.below(set.length / 2) + 1] += pick(random, [-1, 1, 2]);
        }),
      );
    }

    expect(sums.started).toBeGreaterThan(200);
    expect(sums.tight).toBeGreaterThan(50);
  });

  it("by blocks: any set with any attachments, any gadget, costs improved", () => {
    const random = new Random(202), sums = tally();
    for (let run = 0; run < 350; run++) {
      const graph = randomConnectedGraph(random, 3 + random.below(5), random.below(6));
      const weights = randomWeights(random, graph.n, 0, 5);
      const edges = Array.from(graph.tails, (u, e) => [u, graph.heads[e]]);
      const inside = [random.below(graph.n)];
      const around = () =>
        Array.from(weights.keys()).filter((v) =>
          !inside.includes(v) &&
          edges.some((e) => e.includes(v) && e.some((u) => inside.includes(u)))
        );
      for (let more = random.below(4); more > 0 && around().length > 0; more--) {
        inside.push(pick(random, around()));
      }
      const attachments = random.shuffle(around()).slice(0, random.below(6) === 0 ? 2 : 3);
      const vertices = random.below(4), ends: number[] = [];
      const places = [...attachments, ...Array.from({ length: vertices }, (_, j) => graph.n + j)];
      for (let e = random.below(7); e > 0; e--) {
        const [u, v] = random.shuffle([...places]);
        const old = u < graph.n && v < graph.n;
        if (v !== undefined && (!old || edges.some((e) => e.includes(u) && e.includes(v)))) {
          ends.push(u, v);
        }
      }
      const left: [number, number][] = edges.filter((e) =>
        !e.some((v) => inside.includes(v))
      ) as [];
      for (let e = 0; e < ends.length; e += 2) {
        if (Math.max(ends[e], ends[e + 1]) >= graph.n) left.push([ends[e], ends[e + 1]]);
      }
      const end = graphFromPairs(graph.n + vertices, left);
      const there = Array.from({ length: end.n }, (_, v) => v).filter((v) => !inside.includes(v));
      const whole = proveByCases(end, Int32Array.from({ length: end.n }, (_, v) => v));
      const inPlay = { ...whole, nodes: [{ split: [there] }, ...whole.nodes] };
      const start = {
        rule: "blocks",
        ends: edges.flat(),
        doubled: edges.map(() => random.below(7)),
        blocks: [{ inside, attachments, vertices, ends, doubled: ends.slice(ends.length / 2) }],
        parts: [{ vertices: there, bound: 0, proof: inPlay }],
      };
      start.blocks[0].doubled.fill(0);
      const change = (p: Draft) =>
        nudge(random, random.below(2) === 0 ? p.doubled : p.blocks[0].doubled);
      count(sums, forge(graph, weights, start, 50, change, (p) => restated(graph, weights, p)));
    }

    expect(sums.started).toBeGreaterThan(200);
    expect(sums.tight).toBeGreaterThan(70);
  });

  it("by blocks, from honest proofs: what the gadgets cost raised as far as it is let", () => {
    const random = new Random(204), sums = tally();
    for (let run = 0; run < 150; run++) {
      const { piece: { graph, weights }, proof } = replacedBlocks(random);
      const start = JSON.parse(
        JSON.stringify(
          proof,
          (_, value) => ArrayBuffer.isView(value) ? Array.from(value as Float64Array) : value,
        ),
      );
      const change = (p: Draft) => {
        const { doubled } = pick<Draft>(random, p.blocks);
        for (let e = 0; e < doubled.length; e++) {
          if (random.below(2) === 0) doubled[e] += 1 + random.below(3);
        }
      };
      count(sums, forge(graph, weights, start, 30, change, (p) => restated(graph, weights, p)));
    }
    expect(sums).toEqual({ started: 150, tight: 150 });
  });

  it("by embeddings: any rotations, any walks of sources, the distance raised", () => {
    const random = new Random(203), sums = tally();
    for (let run = 0; run < 600; run++) {
      const graph = randomConnectedGraph(random, 3 + random.below(4), 1 + random.below(4));
      const costs = Array.from(graph.tails, () => random.below(3) * (1 + random.below(3)));
      const weights = new Float64Array(graph.n);
      const darts: [number, number][] = [];
      for (let v = 0; v < graph.n; v++) {
        for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
          darts.push([v, graph.targets[a]]);
          weights[v] += costs[graph.edgeOf[a]];
        }
      }
      darts.sort(([a, b], [c, d]) => a - c || b - d);
      const costOf = new Map(costs.map((c, e) => [`${graph.tails[e]} ${graph.heads[e]}`, c]));
      const costAt = (u: number, v: number) => costOf.get(`${u} ${v}`) ?? costOf.get(`${v} ${u}`)!;
      const rotations = () =>
        Array.from(weights.keys()).flatMap((v) =>
          random.shuffle(
            Array.from({ length: darts.filter((d) => d[0] === v).length }, (_, i) => i),
          )
        );
      const start: Draft = {
        rule: "projective",
        unit: 1,
        costs: darts.filter(([u, v]) => u < v).map(([u, v]) => 2 * costAt(u, v)),
        rotation: rotations(),
        sources: [],
        distance: 0,
      };
      // A closed walk, found by what the checker objects to: it names the first step that is none.
      const walk = (rotation: number[]): number[] => {
        const open = Array.from(darts.keys(), (d) => [d]);
        for (let tries = 0; open.length > 0 && tries < 60; tries++) {
          const [sources] = open.splice(random.below(open.length), 1);
          const said = prove(graph, weights, { ...start, rotation, sources });
          if (typeof said === "number") return sources;
          if (!said.startsWith("projective: the last source shares no edge")) continue;
          for (const d of darts.keys()) open.push([...sources, d]);
        }
        return [];
      };
      const drawn = () => {
        start.sources = walk(start.rotation);
        return start.sources.length > 0;
      };
      for (let turn = 0; turn < 40 && !drawn(); turn++) start.rotation = rotations();
      count(
        sums,
        forge(graph, weights, start, 40, (p) => {
          switch (random.below(6)) {
            case 0:
              return void (p.sources = walk(p.rotation));
            case 1:
              return random.below(2) === 0
                ? void p.sources.splice(random.below(p.sources.length), 1)
                : nudge(random, p.sources);
            case 2:
              return nudge(random, p.costs);
            case 3:
              return void (p.rotation = random.below(8) === 0 ? rotations() : p.rotation);
            default:
              p.distance += 1 + random.below(2);
          }
        }),
      );
    }

    expect(sums.started).toBeGreaterThan(100);
    expect(sums.tight).toBeGreaterThan(40);
  });
});
