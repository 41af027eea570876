/**
 * The bipartite parts that hang on a single vertex, and bipartite components, by peeling two-connected
 * blocks off the block tree. O(n + m) time; what is left has an odd cycle in each end of its tree.
 */
import { components } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { oddBlocks } from "../parity/even-face-blocks.ts";
import type { Meter } from "../run/meter.ts";
import type { Block } from "./blocks-costs.ts";

/**
 * @param graph any simple graph
 * @returns one block with at most one attachment for each connected part that hangs on a vertex, and
 *   for each bipartite component
 */
export function hangingBlocks(graph: Graph, meter: Meter): Block[] {
  const { n, offsets, targets } = graph;
  const peeled = peel(graph, meter);
  if (!peeled.includes(1)) return [];
  const { count, of } = components(graph, peeled);
  const { side } = twoColouring(graph, peeled);
  const insides: number[][] = Array.from({ length: count }, () => []);
  for (let v = 0; v < n; v++) if (of[v] >= 0) insides[of[v]].push(v);
  meter.tick(2 * graph.m);
  return insides.map((inside): Block => {
    let attachment = -1, attachmentSide = 0;
    for (const v of inside) {
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        if (peeled[targets[a]] !== 0) continue;
        attachment = targets[a];
        attachmentSide = 1 - side![v];
      }
    }
    return {
      inside: Int32Array.from(inside),
      insideSide: Uint8Array.from(inside, (v) => side![v]),
      attachments: attachment < 0 ? new Int32Array(0) : Int32Array.of(attachment),
      attachmentSide: attachment < 0 ? new Uint8Array(0) : Uint8Array.of(attachmentSide),
    };
  });
}

/** Length n: 1 for vertices inside the parts that hang on a vertex, or on nothing. */
function peel(graph: Graph, meter: Meter): Uint8Array {
  const { n, m, tails, heads, offsets } = graph;
  const { blockOf, odd } = oddBlocks(graph, meter);
  let blocks = 0;
  for (let e = 0; e < m; e++) blocks = Math.max(blocks, blockOf[e] + 1);
  const { start, vertices } = verticesOfBlocks(graph, blockOf, blocks);
  // For each vertex the blocks it is in, and how many of them are still there.
  const live = new Int32Array(n), first = new Int32Array(n + 1);
  for (const v of vertices) live[v]++;
  for (let v = 0; v < n; v++) first[v + 1] = first[v] + live[v];
  const next = first.slice(0, n), list = new Int32Array(vertices.length);
  for (let b = 0; b < blocks; b++) {
    for (let i = start[b]; i < start[b + 1]; i++) list[next[vertices[i]]++] = b;
  }
  // How many vertices of a block hold it to others. Odd blocks stay.
  const holds = new Int32Array(blocks), gone = new Uint8Array(blocks);
  for (let b = 0; b < blocks; b++) {
    for (let i = start[b]; i < start[b + 1]; i++) if (live[vertices[i]] > 1) holds[b]++;
  }
  const isOdd = new Uint8Array(blocks);
  for (const b of odd) isOdd[b] = 1;
  const queue: number[] = [];
  for (let b = 0; b < blocks; b++) if (isOdd[b] === 0 && holds[b] <= 1) queue.push(b);
  const peeled = new Uint8Array(n);
  for (let v = 0; v < n; v++) if (offsets[v + 1] === offsets[v]) peeled[v] = 1;
  for (const b of queue) {
    if (gone[b] !== 0) continue;
    gone[b] = 1;
    for (let i = start[b]; i < start[b + 1]; i++) {
      const v = vertices[i];
      if (--live[v] === 0) peeled[v] = 1;
      if (live[v] !== 1) continue;
      // One block is left at v, which no longer holds it to another.
      for (let k = first[v]; k < first[v + 1]; k++) {
        const c = list[k];
        if (gone[c] === 0 && --holds[c] <= 1 && isOdd[c] === 0) queue.push(c);
      }
    }
  }
  meter.tick(m + tails.length + heads.length);
  return peeled;
}

/** The vertices of each block in rows, each once. */
function verticesOfBlocks(
  { m, n, tails, heads }: Graph,
  blockOf: Int32Array,
  blocks: number,
): { start: Int32Array; vertices: Int32Array } {
  const edgeStart = new Int32Array(blocks + 1);
  for (let e = 0; e < m; e++) edgeStart[blockOf[e] + 1]++;
  for (let b = 0; b < blocks; b++) edgeStart[b + 1] += edgeStart[b];
  const next = edgeStart.slice(0, blocks), edges = new Int32Array(m);
  for (let e = 0; e < m; e++) edges[next[blockOf[e]]++] = e;
  const seen = new Int32Array(n).fill(-1);
  const start = new Int32Array(blocks + 1);
  const vertices: number[] = [];
  for (let b = 0; b < blocks; b++) {
    for (let k = edgeStart[b]; k < edgeStart[b + 1]; k++) {
      for (const v of [tails[edges[k]], heads[edges[k]]]) {
        if (seen[v] === b) continue;
        seen[v] = b;
        vertices.push(v);
      }
    }
    start[b + 1] = vertices.length;
  }
  return { start, vertices: Int32Array.from(vertices) };
}
