/**
 * Replaces what at most three vertices cut off, where only odd cycles matter: a side with at most
 * one attachment by nothing, one with two by an edge, sides with the same three attachments together by a star, each with edges
 * of the right parity. Meant for graphs whose odd cycle transversals have at least four vertices: the
 * rest of such a graph keeps an odd cycle whatever three vertices are left out.
 *
 * Two disjoint odd cycles exist before exactly if they do after, since one cycle at most can use a
 * side. Transversals do not become larger: one with a single vertex inside the sides may take the
 * middle of the star instead, one with more two of the attachments. O(n + m) time.
 */
import { componentSubgraphs } from "../graph/components.ts";
import { type Graph, graphFromEdges, inducedSubgraph } from "../graph/graph.ts";
import type { Separations, Side } from "../graph/separations.ts";
import type { Meter } from "../run/meter.ts";
import { balance } from "./balance.ts";
import { allOdd, oddKernel } from "./odd-kernel.ts";

/**
 * Replaces the sides of one round.
 *
 * @param graph a graph that needs at least four vertices to be made bipartite, all edges odd
 * @param found its sides; small ones are replaced only where several have the same attachments
 * @returns the odd kernel of what is left, written out with all edges odd; "none" if there is nothing
 *   to replace; "apart" if two disjoint odd cycles came to light
 */
export function withoutSides(
  graph: Graph,
  found: Pick<Separations, "sides" | "small">,
  meter: Meter,
): Graph | "none" | "apart" {
  const groups = groupsOf(graph.n, found);
  if (groups === "apart") return "apart";
  if (groups.length === 0) return "none";
  const keep = new Uint8Array(graph.n).fill(1), middles = new Uint8Array(graph.n);
  const tails: number[] = [], heads: number[] = [], even: number[] = [];
  for (const group of groups) {
    for (const { inside } of group) for (const v of inside) keep[v] = 0;
    const { inside, attachments, attachmentSide } = group[0];
    // The first inner vertex stays as the middle of the star, on the side of the first attachment.
    const star = attachments.length === 3;
    const middle = star ? inside[0] : attachments[0];
    if (star) keep[middle] = middles[middle] = 1;
    for (let i = star ? 0 : 1; i < attachments.length; i++) {
      tails.push(middle);
      heads.push(attachments[i]);
      even.push(attachmentSide[i] === attachmentSide[0] ? 1 : 0);
    }
  }
  const rest = inducedSubgraph(graph, keep);
  const index = new Int32Array(graph.n).fill(-1);
  rest.vertices.forEach((v, i) => index[v] = i);
  const own = rest.edges.filter((e) => {
    return middles[graph.tails[e]] === 0 && middles[graph.heads[e]] === 0;
  });
  const joined = graphFromEdges(
    rest.graph.n,
    Int32Array.from([...own.map((e) => graph.tails[e]), ...tails], (v) => index[v]),
    Int32Array.from([...own.map((e) => graph.heads[e]), ...heads], (v) => index[v]),
  );
  const kernel = oddKernel(
    joined,
    meter,
    undefined,
    Uint8Array.from([
      ...new Uint8Array(own.length),
      ...even,
    ]),
  );
  const parts = componentSubgraphs(kernel.graph).map(({ graph, edges }) => {
    return { graph, even: Uint8Array.from(edges, (e) => kernel.even[e]) };
  }).filter(({ graph, even }) => balance(graph, even).side === undefined);
  // Four vertices or more were needed, so beside a forced one there is another odd cycle.
  if (kernel.forced.length > 0 || parts.length !== 1) return "apart";
  return allOdd(parts[0].graph, parts[0].even);
}

/**
 * Sides to be replaced together: the large ones, each with the small ones on its attachments, and
 * small ones that share their attachments with other small ones. No vertex inside one group is
 * inside another or an attachment of it.
 *
 * @returns "apart" where two on the same attachments do not agree: they close an odd cycle, and the
 *   rest of the graph has another
 */
function groupsOf(
  n: number,
  { sides, small }: Pick<Separations, "sides" | "small">,
): Side[][] | "apart" {
  const byAttachments = new Map<string, Side[]>();
  for (const side of [...sides, ...small]) {
    const key = side.attachments.join(" ");
    const group = byAttachments.get(key);
    if (group === undefined) byAttachments.set(key, [side]);
    else if (agree(group[0], side)) group.push(side);
    else return "apart";
  }
  // 1: inside a group that goes; 2: an attachment of one.
  const role = new Uint8Array(n);
  const isFree = ({ inside, attachments }: Side): boolean => {
    return inside.every((v) => role[v] === 0) && attachments.every((v) => role[v] !== 1);
  };
  const isLarge = new Set(sides);
  const groups: Side[][] = [];
  for (const large of [true, false]) {
    for (const members of byAttachments.values()) {
      if (isLarge.has(members[0]) !== large) continue;
      const group = members.filter(isFree);
      if (group.length === 0 || (group.length === 1 && !isLarge.has(group[0]))) continue;
      for (const { inside, attachments } of group) {
        for (const v of inside) role[v] = 1;
        for (const v of attachments) role[v] = 2;
      }
      groups.push(group);
    }
  }
  return groups;
}

/** Whether two sides with the same attachments give these the same parities. */
function agree(a: Side, b: Side): boolean {
  const turned = a.attachmentSide[0] ^ b.attachmentSide[0];
  return a.attachmentSide.every((side, i) => (side ^ b.attachmentSide[i]) === turned);
}
