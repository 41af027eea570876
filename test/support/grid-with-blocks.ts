/**
 * Mirrored grids with bipartite blocks on their squares: real-looking instances without two disjoint
 * odd cycles. A block hangs on up to three corners of one square, on the sides that the square gives
 * them, so a gadget for it can be drawn in the square; the block itself need not be planar.
 */
import type { Graph } from "../../lib/graph/graph.ts";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";
import { mirroredGrid } from "./mirrored-grid.ts";
import { Edges } from "./with-blocks-edges.ts";

export interface GridBlockOptions {
  /** Number of blocks, at most one for each square. */
  readonly blocks: number;
  /** Vertices of each block, at most. */
  readonly size: number;
  /** Whether a second block hangs on up to three vertices of each block. Default false. */
  readonly nested?: boolean;
}

/**
 * @param rows at least 2
 * @param columns at least 2, even exactly if `rows` is
 * @returns the graph; vertices of the grid first, numbered as in `mirroredGrid`
 */
export function gridWithBlocks(
  random: Random,
  rows: number,
  columns: number,
  { blocks, size, nested = false }: GridBlockOptions,
): Graph {
  const grid = mirroredGrid(rows, columns);
  const edges = new Edges(grid);
  const squares = Int32Array.from({ length: rows * (columns - 1) }, (_, s) => s);
  random.shuffle(squares);
  let n = grid.n;
  for (const square of squares.subarray(0, blocks)) {
    const i = Math.floor(square / (columns - 1)), j = square % (columns - 1);
    const below = (c: number) => i + 1 < rows ? (i + 1) * columns + c : columns - 1 - c;
    const corners = [i * columns + j, i * columns + j + 1, below(j + 1), below(j)];
    const places = corners.map((v, at) => ({ v, side: at % 2 }));
    random.shuffle(places);
    const inside = hang(places.slice(0, 1 + random.below(3)));
    if (nested) hang(random.shuffle([...inside]).slice(0, 1 + random.below(3)));
  }
  return graphFromPairs(n, edges.pairs);

  /** A connected block on some vertices with given sides. */
  function hang(on: readonly { v: number; side: number }[]): { v: number; side: number }[] {
    const inside = [{ v: n++, side: random.below(2) }];
    const count = 2 + random.below(size - 1);
    while (inside.length < count) {
      const to = inside[random.below(inside.length)];
      edges.add(n, to.v);
      inside.push({ v: n++, side: 1 - to.side });
    }
    for (let k = 0; k < count; k++) {
      const a = inside[random.below(count)], b = inside[random.below(count)];
      if (a.side !== b.side) edges.add(a.v, b.v);
    }
    for (const { v, side } of on) {
      const across = inside.filter((x) => x.side !== side);
      for (let k = 1 + random.below(2); k > 0; k--) {
        edges.add(v, across[random.below(across.length)].v);
      }
    }
    return inside;
  }
}
