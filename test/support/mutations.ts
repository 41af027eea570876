/**
 * Honest solutions of small random instances, as JSON data, and small random changes to them: what a
 * forger would try who knows the format but has no plan.
 */
import type { Certificate, Proof } from "../../lib/certify/certificate.ts";
import { check } from "../../lib/certify/check.ts";
import { toJson } from "../../lib/certify/json.ts";
import type { Solution } from "../../lib/certify/solution.ts";
import { type Graph, inducedSubgraph } from "../../lib/graph/graph.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { reducePiece } from "../../lib/reduce/blocks-piece.ts";
import { decompose } from "../../lib/reduce/decompose.ts";
import { replaceBlocks } from "../../lib/reduce/replace-blocks.ts";
import { Meter } from "../../lib/run/meter.ts";
import type { Random } from "../../lib/run/random.ts";
import { solve, type SolveOptions } from "../../lib/solve/solve.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { smallEvenFace } from "./even-face.ts";
import { gridWithBlocks } from "./grid-with-blocks.ts";
import { kernelPieces } from "./kernel-pieces.ts";
import { hardWeights } from "./mirrored-grid.ts";
import { proveByCases } from "./prove.ts";
import { randomCases } from "./random-cases.ts";
import { randomGraph, randomWeights } from "./random-graphs.ts";
import { firstFit } from "./solutions.ts";
import { withBlocks } from "./with-blocks.ts";

/** JSON data that may be bent in any way. */
// deno-lint-ignore no-explicit-any
export type Bendable = any;

/** An honest solution of a small instance. */
export interface Honest {
  readonly instance: Instance;
  readonly text: string;
}

/** Items named so that certificates number them as the graph does; at most 100. */
export function instanceOf(graph: Graph, weights: ArrayLike<number>): Instance {
  const name = (v: number) => `v${String(v).padStart(2, "0")}`;
  return Instance.from({
    items: Array.from(weights, (weight, v) => ({ id: name(v), weight })),
    conflicts: Array.from(graph.tails, (u, e) => [name(u), name(graph.heads[e])] as const),
  });
}

/** The kinds of honest solutions, by where their proofs come from. */
export const KINDS = [
  "branch",
  "transversal",
  "cases",
  "blocks",
  "replaced",
  "projective",
  "lifted",
] as const;

/** An honest solution of this kind; the proof of a small random instance may still be a plain one. */
export async function honest(kind: typeof KINDS[number], random: Random): Promise<Honest> {
  switch (kind) {
    case "branch":
    case "transversal":
      return await askedOf(
        randomGraph(random, 1 + random.below(13), random.unit()),
        random,
        kind,
      );
    case "cases":
      return byRandomCases(random);
    case "blocks": {
      const { graph } = withBlocks(random, randomGraph(random, 5, 0.9), {
        blocks: 2 + random.below(2),
        size: 5,
        nested: random.below(2) === 0,
      });
      return await solved(instanceOf(graph, hardOrPlain(graph, random)));
    }
    case "replaced": {
      const { piece, chosen, proof } = replacedBlocks(random);
      return withProof(instanceOf(piece.graph, piece.weights), chosen, proof);
    }
    case "projective": {
      const { graph } = smallEvenFace(random, 16);
      const weights = hardWeights(graph, random);
      return await solved(instanceOf(graph, weights), { engine: "projective" });
    }
    case "lifted": {
      const [rows, columns] = random.below(2) === 0 ? [3, 3] : [4, 2];
      // Blocks on any vertices keep what is left from being drawn at once: it is replaced in turn.
      const core = gridWithBlocks(random, rows, columns, { blocks: 2, size: 5 });
      const graph = random.below(2) === 0
        ? core
        : withBlocks(random, core, { blocks: 2, size: 5, nested: true }).graph;
      const instance = instanceOf(graph, hardOrPlain(graph, random));
      const replaced = await replaceBlocks(await decompose(instance, { workers: 0 }));
      const small = await solve(replaced.instance, { workers: 0 });
      return { instance, text: toJson(replaced.lift(small)) };
    }
  }
}

function hardOrPlain(graph: Graph, random: Random): Float64Array {
  const joined = Float64Array.from(
    { length: graph.n },
    (_, v) => graph.offsets[v + 1] > graph.offsets[v] ? 1 : 0,
  );
  return random.below(3) === 0 || joined.includes(0)
    ? randomWeights(random, graph.n, 1, 9)
    : hardWeights(graph, random);
}

/** Weights of any sign, and items required and ruled out. */
async function askedOf(
  graph: Graph,
  random: Random,
  engine: "branch" | "transversal",
): Promise<Honest> {
  const instance = instanceOf(graph, randomWeights(random, graph.n, -2, 9));
  const ids = random.shuffle([...instance.ids]);
  const choose = ids.slice(0, random.below(2)), leave = ids.slice(2, 2 + random.below(2));
  return await solved(instance, { engine, choose, leave });
}

async function solved(instance: Instance, options: SolveOptions = {}): Promise<Honest> {
  const solution: Solution = await solve(instance, { ...options, workers: 0 });
  return { instance, text: toJson(solution) };
}

/** A proof with every feature of the rule, which seldom proves enough. */
function byRandomCases(random: Random): Honest {
  const graph = randomGraph(random, 1 + random.below(10), 0.2 + 0.8 * random.unit());
  const instance = instanceOf(graph, randomWeights(random, graph.n, -2, 9));
  const { chosen } = bruteForce(graph, instance.weights);
  return withProof(instance, chosen, randomCases(random, graph, 9));
}

/**
 * Blocks replaced, and what is left proved by cases alone: such a proof goes on proving the optimum of
 * what is left when that changes a little.
 */
export function replacedBlocks(random: Random) {
  for (;;) {
    const core = randomGraph(random, 5 + random.below(2), 0.4 + 0.5 * random.unit());
    const { graph } = withBlocks(random, core, {
      blocks: 1 + random.below(2),
      size: 5,
      nested: random.below(2) === 0,
    });
    for (const piece of kernelPieces(graph, randomWeights(random, graph.n, 1, 4))) {
      const labels = Int32Array.from(piece.labels.keys());
      const reduced = reducePiece({ ...piece, labels }, new Meter());
      const answer = reduced?.combine(
        reduced.pieces.map(({ graph, weights, labels }) => {
          const { chosen, weight } = bruteForce(graph, weights);
          return { chosen, upperBound: weight, proof: proveByCases(graph, labels) };
        }),
        new Meter(),
      );
      if (answer?.proof === undefined) continue;
      return { piece, chosen: answer.chosen, proof: answer.proof };
    }
  }
}

function withProof(instance: Instance, chosen: Uint8Array, proof: Proof): Honest {
  let bound = 0;
  chosen.forEach((x, v) => bound += x * instance.weights[v]);
  const certificate: Certificate = {
    kind: "certificate",
    version: 1,
    fingerprint: instance.fingerprint,
    choose: [],
    leave: [],
    bound,
    parts: [{ vertices: Array.from(instance.ids.keys()), bound, proof }],
  };
  const ids = instance.ids.filter((_, v) => chosen[v] !== 0);
  return {
    instance,
    text: toJson(firstFit(instance, {
      chosen: ids,
      weight: bound,
      upperBound: bound,
      certificate,
    })),
  };
}

/** The weight of the best choice that meets what the solution says was asked; ids may repeat. */
export function optimumAsAsked(instance: Instance, data: Bendable): number {
  const { graph, weights } = instance;
  const open = new Uint8Array(instance.size).fill(1);
  let given = 0;
  for (const id of data.leave) open[instance.indexOf(id)] = 0;
  for (const id of new Set<string>(data.choose)) {
    const v = instance.indexOf(id);
    given += weights[v];
    open[v] = 0;
    for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) open[graph.targets[a]] = 0;
  }
  const { graph: rest, vertices } = inducedSubgraph(graph, open);
  return given + bruteForce(rest, Array.from(vertices, (v) => weights[v])).weight;
}

/**
 * What a forger gets who states for each part, and for the whole, whatever the proofs now prove.
 *
 * @returns the bound that the checker finds proved, or its reason for rejecting the data
 */
export function restated(instance: Instance, data: Bendable): number | string {
  for (let turn = 0; turn < 40; turn++) {
    const { valid, reason } = check(instance, data);
    if (valid) return data.certificate.bound;
    const whole = /^the proofs add up to (-?\d+), but the choice/.exec(reason);
    if (whole !== null) return Number(whole[1]);
    const sum = /^the bounds of the parts add up to (-?\d+), the certificate/.exec(reason);
    const part = /^((?:(?:blocks, )?part \d+: )+)the proof proves (-?\d+), the/.exec(reason);
    if (sum !== null) data.certificate.bound = Number(sum[1]);
    else if (part !== null) {
      let holder = data.certificate;
      for (const [, p] of part[1].matchAll(/part (\d+)/g)) {
        holder = (holder.proof ?? holder).parts[Number(p)];
      }
      holder.bound = Number(part[2]);
    } else return reason;
  }
  return "stated again and again";
}

/** Values that hardly any place in a certificate expects. */
export const STRANGE: readonly unknown[] = [
  -1,
  -0,
  0.5,
  1e300,
  2 ** 31,
  2 ** 53 - 1,
  2 ** 53,
  -(2 ** 53),
  undefined,
  null,
  true,
  "1",
  "length",
  "__proto__",
  [],
  [0],
  {},
  { length: 3 },
  { length: 2.5, 0: 0, 1: 1, 2: 2 },
  { length: -2 },
  { rule: "packing", ends: [], doubled: [] },
  { toString: 1, valueOf: 1 },
];

/** Every place in some data as its holder and key, of each list only the first few and the last. */
export function* everyPlace(holder: Bendable, most: number): Generator<[Bendable, string]> {
  const keys = Object.keys(holder);
  if (Array.isArray(holder) && keys.length > most) keys.splice(most, keys.length - most - 1);
  for (const key of keys) {
    yield [holder, key];
    const inside = holder[key];
    if (typeof inside === "object" && inside !== null) yield* everyPlace(inside, most);
  }
}

/** Makes one small change somewhere in a solution's certificate, or to what was asked. */
export function mutate(random: Random, data: Bendable): void {
  if (typeof data.certificate !== "object" || data.certificate === null) return;
  if (random.below(30) === 0) return askOtherwise(random, data);
  // A random walk down the data, so that each field is met about as often, however long its lists.
  const { parts } = data.certificate;
  let holder: Bendable = random.below(12) === 0 ? undefined : parts?.[random.below(parts.length)];
  let key = "proof";
  if (holder?.proof === undefined) [holder, key] = [data, "certificate"];
  for (;;) {
    const inside = holder[key];
    const keys = typeof inside === "object" && inside !== null ? Object.keys(inside) : [];
    if (keys.length === 0 || (holder !== data && random.below(10) === 0)) break;
    holder = inside;
    key = keys[random.below(keys.length)];
  }
  const value = holder[key];
  const list: Bendable[] | undefined = Array.isArray(holder) ? holder : undefined;
  const other = list?.[random.below(list.length)];
  switch (random.below(typeof value === "number" ? 12 : 5)) {
    case 0:
      if (list !== undefined) list.splice(Number(key), 1);
      else delete holder[key];
      return;
    case 1:
      if (list !== undefined) list.splice(random.below(list.length + 1), 0, value);
      return;
    case 2:
      if (list === undefined) return;
      list[list.indexOf(other)] = value;
      list[Number(key)] = other;
      return;
    case 3:
      if (random.below(4) > 0) return;
      holder[key] = structuredClone(STRANGE[random.below(STRANGE.length)]);
      return;
    case 4:
      if (other !== undefined) holder[key] = structuredClone(other);
      return;
    case 5: {
      // What one number loses another gains, and sums stay.
      const by = 1 + random.below(3);
      if (typeof other !== "number" || list === undefined) return;
      list[Number(key)] = value - by;
      list[list.indexOf(other)] += by;
      return;
    }
    case 6:
      holder[key] = 2 * value;
      return;
    case 7:
      holder[key] = random.below(20);
      return;
    default:
      holder[key] = value + [-2, -1, 1, 2][random.below(4)];
  }
}

/** Asks for one more item, or one more time for the same, in the solution and its certificate. */
function askOtherwise(random: Random, data: Bendable): void {
  const { parts } = data.certificate;
  const part = parts?.[random.below(parts.length)]?.vertices;
  if (!Array.isArray(part) || part.length === 0) return;
  const rank = part[random.below(part.length)];
  const id = `v${String(rank).padStart(2, "0")}`;
  const name = data.chosen.includes(id) ? "choose" : "leave";
  if (random.below(3) > 0) data.certificate[name]?.push?.(rank);
  data[name].push(id);
  if (random.below(2) === 0) data[name].push(data[name][0]);
  if (random.below(3) === 0) part.splice(part.indexOf(rank), 1);
}
