/**
 * Checks the replacement of blocks by gadgets: for each block, a flow for each state of its
 * attachments bounds its slack cost from below, and the gadget, tried out in every way, must cost no
 * more. Takes at most eight flows through each block; all plain algorithms of this floor.
 */
import type { BlockReplacement, BlocksProof, Numbers, Proof } from "./certificate.ts";
import { type CostedGraph, graphInPlay } from "./blocks-graph.ts";
import { BlockSlack } from "./blocks-slack.ts";
import { neighbourLists, type Play, requireBound, requireMultiplier, scratchFor } from "./play.ts";
import { Rejected, within } from "./rejected.ts";
import { requireList } from "./shape.ts";

/** As `provenBound` in proof.ts, which calls this file. */
type Prover = (play: Play, proof: Proof) => bigint;

/** More would make trying a gadget out too slow. */
const MOST_ATTACHMENTS = 3, MOST_VERTICES = 5;
/** Each proof that stands in another holds a graph of its own. */
const MOST_NESTING = 16;

/**
 * The bound a blocks proof proves.
 *
 * @param play the graph and the vertices in play
 * @param proof costs, blocks with their gadgets, and proofs for what is left
 * @param provenBound the bound that a proof of any rule proves; for what is left
 * @returns the bound of certificate.ts, rounded down, in scaled units
 * @throws {Rejected} naming the first thing that is wrong
 */
export function blocksBound(play: Play, proof: BlocksProof, provenBound: Prover): bigint {
  const { blocks } = proof;
  if ((play.nesting ?? 0) >= MOST_NESTING) {
    throw new Rejected(
      `blocks: more than ${MOST_NESTING} proofs, each in a part of the one before`,
    );
  }
  let moreVertices = 0, moreEdges = 0;
  blocks.forEach((block, b) => {
    const where = `block ${b}`;
    const { vertices, doubled, ends, attachments } = block;
    if (!Number.isInteger(vertices) || vertices < 0 || vertices > MOST_VERTICES) {
      throw new Rejected(`${where}: expected at most ${MOST_VERTICES} new vertices`);
    }
    if (attachments.length > MOST_ATTACHMENTS) {
      throw new Rejected(`${where}: expected at most ${MOST_ATTACHMENTS} attachments`);
    }
    if (ends.length !== 2 * doubled.length) {
      throw new Rejected(`${where}: expected two ends for each of ${doubled.length} costs`);
    }
    moreVertices += vertices;
    moreEdges += doubled.length;
  });
  const { graph, vertices } = graphInPlay(play, moreVertices, moreEdges);
  if (proof.ends.length !== 2 * proof.doubled.length) {
    throw new Rejected(`blocks: expected two ends for each of ${proof.doubled.length} costs`);
  }
  for (let e = 0; e < proof.doubled.length; e++) {
    const where = `blocks, edge ${e}`;
    const u = requireThere(graph, proof.ends[2 * e], where);
    const v = requireThere(graph, proof.ends[2 * e + 1], where);
    graph.addCost(u, v, requireMultiplier(proof.doubled[e], where), where);
  }
  let bound = totalOf(graph);
  costsAt(graph).forEach((cost, i) => {
    const weight = play.weights[vertices[i]];
    const room = weight > 0 ? 2n * BigInt(weight) - BigInt(cost) : 0n;
    if (room > 0n) bound += room;
  });
  const slack = new BlockSlack(graph, vertices.length + moreVertices);
  const seen = new Uint8Array(vertices.length + moreVertices);
  blocks.forEach((block, b) => replace(graph, slack, seen, block, `block ${b}`));
  bound += boundOfRest(play, graph, vertices, proof, provenBound) - totalOf(graph);
  // Rounded down, also below zero.
  return bound >= 0n ? bound / 2n : (bound - 1n) / 2n;
}

/** Checks one block and puts its gadget in its place. */
function replace(
  graph: CostedGraph,
  slack: BlockSlack,
  seen: Uint8Array,
  block: BlockReplacement,
  where: string,
): void {
  const inside = Array.from(block.inside, (v) => requireThere(graph, v, where));
  const attachments = Array.from(block.attachments, (v) => requireThere(graph, v, where));
  for (const v of [...inside, ...attachments]) {
    if (seen[v] !== 0) throw new Rejected(`${where}: vertex ${v} is named twice`);
    seen[v] = 1;
  }
  for (const v of inside) seen[v] = 0;
  for (const v of attachments) seen[v] = 0;
  const k = attachments.length;
  // Two attachments that are joined are never both chosen.
  const conflicts: number[] = [];
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < i; j++) {
      if (graph.arcBetween(attachments[i], attachments[j]) >= 0) conflicts.push(1 << i | 1 << j);
    }
  }
  const occurs = (mask: number) => conflicts.every((pair) => (mask & pair) !== pair);
  const bounds = slack.bounds(inside, attachments, occurs, where);

  // The gadget, its ends as positions: attachments first, then new vertices.
  const start = graph.vertices;
  const positions = Array.from(block.ends, (v: unknown): number => {
    const i = attachments.indexOf(v as number);
    if (i >= 0) return i;
    const j = (v as number) - start;
    if (typeof v === "number" && Number.isInteger(j) && j >= 0 && j < block.vertices) return k + j;
    throw new Rejected(`${where}: ${v} is neither an attachment nor a vertex of the gadget`);
  });
  const costs = Array.from(block.doubled, (cost) => requireMultiplier(cost, where));
  for (let mask = 0; mask < 1 << k; mask++) {
    if (!occurs(mask)) continue;
    const least = leastGadgetCost(k, block.vertices, positions, costs, mask);
    if (least > bounds[mask]) {
      throw new Rejected(
        `${where}: with ${
          stateText(block.attachments, mask)
        } the gadget costs at least ${least}, ` +
          `but the block only ${bounds[mask]}`,
      );
    }
  }
  for (const v of inside) graph.alive[v] = 0;
  for (let j = 0; j < block.vertices; j++) graph.addVertex();
  for (let e = 0; e < costs.length; e++) {
    const [i, j] = [positions[2 * e], positions[2 * e + 1]];
    const [u, v] = [block.ends[2 * e], block.ends[2 * e + 1]];
    if (i === j) throw new Rejected(`${where}: a loop at vertex ${u}`);
    if (i < k && j < k) graph.addCost(u, v, costs[e], where);
    else graph.addEdge(u, v, costs[e]);
  }
}

/** The gadget's least slack cost in one state, over all choices of its new vertices. */
function leastGadgetCost(
  k: number,
  vertices: number,
  positions: readonly number[],
  costs: readonly number[],
  mask: number,
): number {
  let least = Infinity;
  for (let x = mask; x < 1 << k + vertices; x += 1 << k) {
    let cost = 0;
    for (let e = 0; e < costs.length; e++) {
      const taken = (x >> positions[2 * e] & 1) + (x >> positions[2 * e + 1] & 1);
      cost += taken === 2 ? Infinity : taken === 1 ? 0 : costs[e];
    }
    if (cost < least) least = cost;
  }
  return least;
}

/** What the parts prove for the end graph, each vertex weighing the costs at it. */
function boundOfRest(
  play: Play,
  graph: CostedGraph,
  vertices: Int32Array,
  proof: BlocksProof,
  provenBound: Prover,
): bigint {
  const weights = costsAt(graph);
  // place[v] is v's number in the parts, or -1.
  const order = proof.order === undefined
    ? Array.from(weights, (_, v) => v)
    : Array.from(proof.order, (v) => requireThere(graph, v, "blocks, order"));
  const place = new Int32Array(graph.vertices).fill(-1);
  order.forEach((v, i) => {
    if (place[v] >= 0) throw new Rejected(`blocks, order: vertex ${v} is named twice`);
    place[v] = i;
  });
  const nameOf = (v: number) =>
    v < vertices.length ? play.nameOf(vertices[v]) : `vertex ${v} of a gadget`;
  const tails: number[] = [], heads: number[] = [];
  const edges = graph.edges();
  for (let e = 0; e < edges.costs.length; e++) {
    const u = place[edges.tails[e]], v = place[edges.heads[e]];
    if (u < 0 || v < 0) continue;
    tails.push(u);
    heads.push(v);
  }
  const n = order.length;
  const inner = {
    n,
    ...neighbourLists(n, tails, heads),
    weights: Float64Array.from(order, (v) => weights[v]),
    nameOf: (i: number) => nameOf(order[i]),
    scratch: scratchFor(n),
    nesting: (play.nesting ?? 0) + 1,
  };
  const seen = new Uint8Array(graph.vertices);
  let sum = 0n;
  proof.parts.forEach((part, p) => {
    requireList(part.vertices, `blocks, part ${p}, "vertices"`);
    for (let i = 0; i < part.vertices.length; i++) {
      const at: unknown = part.vertices[i];
      const v = typeof at === "number" && Number.isInteger(at) && at >= 0 && at < n
        ? order[at]
        : -1;
      requireThere(graph, v, `blocks, part ${p}`);
      if (seen[v] !== 0) throw new Rejected(`blocks, part ${p}: ${nameOf(v)} is in two parts`);
      seen[v] = 1;
    }
    const where = `blocks, part ${p}`;
    const proved = within(
      where,
      () => provenBound({ ...inner, vertices: part.vertices }, part.proof),
    );
    requireBound(part.bound, proved, where);
    sum += proved;
  });
  for (let v = 0; v < graph.vertices; v++) {
    if (seen[v] === 0 && weights[v] > 0) {
      throw new Rejected(`blocks: ${nameOf(v)} is in no part of what is left`);
    }
  }
  return sum;
}

/** For each vertex, the costs at it; 0 where it is gone. @throws {Rejected} beyond 2^53 */
function costsAt(graph: CostedGraph): Float64Array {
  const { tails, heads, costs } = graph.edges();
  const at = new Float64Array(graph.vertices);
  for (let e = 0; e < costs.length; e++) {
    at[tails[e]] = requireMultiplier(at[tails[e]] + costs[e], "blocks, costs at a vertex");
    at[heads[e]] = requireMultiplier(at[heads[e]] + costs[e], "blocks, costs at a vertex");
  }
  return at;
}

function totalOf(graph: CostedGraph): bigint {
  let total = 0n;
  for (const cost of graph.edges().costs) total += BigInt(cost);
  return total;
}

function requireThere(graph: CostedGraph, v: unknown, where: string): number {
  if (
    typeof v !== "number" || !Number.isInteger(v) || v < 0 || v >= graph.vertices ||
    graph.alive[v] === 0
  ) {
    throw new Rejected(`${where}: ${v} is no vertex of what is left`);
  }
  return v;
}

function stateText(attachments: Numbers, mask: number): string {
  const chosen = Array.from(attachments).filter((_, i) => (mask >> i & 1) !== 0);
  return chosen.length === 0 ? "no attachment chosen" : `attachments ${chosen.join(", ")} chosen`;
}
