/** Seeded graphs with bipartite blocks hung on at most three vertices each, for the tests. */
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";
import { Edges } from "./with-blocks-edges.ts";

/** A block as it was planted. */
export interface PlantedBlock {
  readonly inside: number[];
  readonly insideSide: number[];
  readonly attachments: number[];
  readonly attachmentSide: number[];
}

export interface WithBlocks {
  readonly graph: Graph;
  readonly blocks: PlantedBlock[];
}

export interface BlockOptions {
  /** Number of blocks. */
  readonly blocks: number;
  /** Vertices inside each block, at most. */
  readonly size: number;
  /** Attachments of each block: a number, or "any" for 0 to 3 at random. */
  readonly attachments?: number | "any";
  /** Whether blocks may hang on vertices of earlier blocks too. Default: only on the core. */
  readonly nested?: boolean;
  /** Whether the inside must be connected and joined to each attachment. Default true. */
  readonly connected?: boolean;
  /** How likely a further edge inside a block is. Default 0.3. */
  readonly density?: number;
}

/**
 * Hangs random bipartite blocks on a graph.
 *
 * @param core any graph with at least three vertices; its vertices keep their numbers
 * @returns the graph, and the blocks with the sides they were drawn with. Without `nested` the
 *   insides are disjoint and all attachments lie in the core; several blocks may share attachments.
 */
export function withBlocks(random: Random, core: Graph, options: BlockOptions): WithBlocks {
  const edges = new Edges(core);
  const connected = options.connected ?? true, density = options.density ?? 0.3;
  const blocks: PlantedBlock[] = [];
  let n = core.n;
  for (let b = 0; b < options.blocks; b++) {
    const size = 1 + random.below(options.size);
    const wanted = options.attachments ?? "any";
    const count = wanted === "any" ? random.below(4) : wanted;
    const attachments: number[] = [];
    while (attachments.length < count) {
      const v = random.below(options.nested === true ? n : core.n);
      if (!attachments.includes(v)) attachments.push(v);
    }
    const inside = Array.from({ length: size }, (_, i) => n + i);
    const insideSide = inside.map(() => random.below(2));
    // A single vertex needs all attachments opposite to it.
    const attachmentSide = attachments.map(() => {
      const side = random.below(2);
      return insideSide.includes(1 - side) ? side : 1 - side;
    });
    if (connected) {
      // A random tree between the sides: each vertex joins an earlier one of the other side.
      insideSide[0] = random.below(2);
      for (let i = 1; i < size; i++) {
        const to = random.below(i);
        insideSide[i] = 1 - insideSide[to];
        edges.add(inside[i], inside[to]);
      }
      for (let i = 0; i < count; i++) {
        if (!insideSide.includes(1 - attachmentSide[i])) attachmentSide[i] = 1 - attachmentSide[i];
        const across = inside.filter((_, j) => insideSide[j] !== attachmentSide[i]);
        edges.add(attachments[i], across[random.below(across.length)]);
      }
    }
    for (let i = 0; i < size; i++) {
      for (let j = 0; j < i; j++) {
        if (insideSide[i] !== insideSide[j] && random.unit() < density) {
          edges.add(inside[i], inside[j]);
        }
      }
      for (let j = 0; j < count; j++) {
        if (insideSide[i] !== attachmentSide[j] && random.unit() < density) {
          edges.add(inside[i], attachments[j]);
        }
      }
    }
    blocks.push({ inside, insideSide, attachments, attachmentSide });
    n += size;
  }
  return { graph: graphFromPairs(n, edges.pairs), blocks };
}

/** Random integer costs from 0 to top; about a third of them 0 when `zeros` is set. */
export function randomCosts(random: Random, m: number, top: number, zeros = false): Float64Array {
  return Float64Array.from(
    { length: m },
    () => zeros && random.below(3) === 0 ? 0 : (zeros ? 0 : 1) + random.below(top),
  );
}

/** Mᵀc: for each vertex the sum of the costs at it. */
export function weightsOfCosts(graph: Graph, costs: Float64Array): Float64Array {
  const weights = new Float64Array(graph.n);
  for (let e = 0; e < graph.m; e++) {
    weights[graph.tails[e]] += costs[e];
    weights[graph.heads[e]] += costs[e];
  }
  return weights;
}
