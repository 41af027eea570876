/**
 * Which blocks of a connected graph hold odd cycles: an even-face embedding needs all odd cycles to
 * meet, so either one block holds them all, or one cut vertex does. O(n + m) time.
 */
import type { Graph } from "../graph/graph.ts";
import { orient } from "../graph/planarity-orientation.ts";
import type { Meter } from "../run/meter.ts";

/** The blocks of a graph, and which of them are odd. */
export interface OddBlocks {
  /** Number of components. */
  readonly components: number;
  /** Length m: the block of each edge. */
  readonly blockOf: Int32Array;
  /** The blocks that hold an odd cycle. */
  readonly odd: readonly number[];
  /** The vertex that all odd blocks share, when there are two or more and they share one; or -1. */
  readonly shared: number;
}

/**
 * Finds the blocks and the odd ones among them.
 *
 * @param graph any graph
 * @param meter counts about four units for each edge
 * @returns the blocks, in depth-first order
 */
export function oddBlocks(graph: Graph, meter: Meter): OddBlocks {
  const { n, m } = graph;
  const { parent, start, target, dart, low } = orient(graph, meter);
  // A tree edge opens a new block unless something below it returns above its start.
  const block = new Int32Array(n).fill(-1), colour = new Uint8Array(n), isOdd: number[] = [];
  let count = 0, roots = 0;
  for (let v = 0; v < n; v++) {
    if (parent[v] < 0) {
      roots++;
      continue;
    }
    colour[v] = 1 - colour[parent[v]];
    block[v] = low[v] >= parent[v] ? count++ : block[parent[v]];
  }
  const blockOf = new Int32Array(m);
  for (let b = 0; b < count; b++) isOdd.push(0);
  for (let v = 0; v < n; v++) {
    for (let k = start[v]; k < start[v + 1]; k++) {
      const w = target[k];
      blockOf[dart[k] >> 1] = w > v ? block[w] : block[v];
      if (w < v && colour[v] === colour[w]) isOdd[block[v]] = 1;
    }
  }
  meter.tick(m);
  const odd: number[] = [];
  for (let b = 0; b < count; b++) if (isOdd[b] !== 0) odd.push(b);
  return { components: roots, blockOf, odd, shared: sharedVertex(graph, blockOf, odd) };
}

/** The vertex in all of the given blocks, two or more; or -1. */
function sharedVertex(graph: Graph, blockOf: Int32Array, blocks: number[]): number {
  if (blocks.length < 2) return -1;
  const size = new Int32Array(graph.n), last = new Int32Array(graph.n).fill(-1);
  // Edges in order of their blocks, so that each vertex is counted once for each block.
  const wanted = new Set(blocks);
  const edges: number[] = [];
  for (let e = 0; e < graph.m; e++) if (wanted.has(blockOf[e])) edges.push(e);
  edges.sort((e, f) => blockOf[e] - blockOf[f]);
  for (const e of edges) {
    for (const v of [graph.tails[e], graph.heads[e]]) {
      if (last[v] === blockOf[e]) continue;
      last[v] = blockOf[e];
      if (++size[v] === blocks.length) return v;
    }
  }
  return -1;
}
