/**
 * Mirrored grids: the plain example of a graph without two disjoint odd cycles that is far from
 * bipartite. A band of squares is closed after a half turn, so it lies in the projective plane with
 * every face even and exactly the one-sided cycles odd.
 */
import { type Graph, graphFromEdges } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";

/**
 * The grid of `rows` × `columns` vertices, (i, j) being number i·columns + j, with (i, j) joined to
 * (i, j+1) and (i+1, j), and the last row to the first mirrored: (rows-1, j) to (0, columns-1-j).
 *
 * @param rows at least 2
 * @param columns at least 1, even exactly if `rows` is (otherwise the graph would be bipartite)
 * @returns a simple graph with rows·columns vertices and rows·(2·columns - 1) edges; for each row
 *   first its horizontal edges, then those to the next row
 */
export function mirroredGrid(rows: number, columns: number): Graph {
  if (rows < 2 || columns < 1 || (rows + columns) % 2 !== 0) {
    throw new RangeError(
      `expected rows >= 2 and columns >= 1, both even or both odd, got ${rows} and ${columns}`,
    );
  }
  const m = rows * (2 * columns - 1);
  const tails = new Int32Array(m), heads = new Int32Array(m);
  let e = 0;
  for (let i = 0; i < rows; i++) {
    const row = i * columns;
    for (let j = 0; j + 1 < columns; j++, e++) {
      tails[e] = row + j;
      heads[e] = row + j + 1;
    }
    for (let j = 0; j < columns; j++, e++) {
      tails[e] = row + j;
      heads[e] = i + 1 < rows ? row + columns + j : columns - 1 - j;
    }
  }
  return graphFromEdges(rows * columns, tails, heads);
}

/**
 * A square mirrored grid with a fifth of its edges taken out, where both ends keep two, and a tenth drawn
 * out to paths of three; vertices and edges in random order. Faces stay even. O(n) time.
 *
 * @param side as `rows` and `columns` of `mirroredGrid`
 * @returns a simple graph; a few vertices may be cut off from the rest
 */
export function thinnedGrid(side: number, random: Random): Graph {
  const grid = mirroredGrid(side, side);
  const left = new Int32Array(grid.n);
  for (let v = 0; v < grid.n; v++) left[v] = grid.offsets[v + 1] - grid.offsets[v];
  const pairs: (readonly [number, number])[] = [];
  let n = grid.n;
  for (let e = 0; e < grid.m; e++) {
    const u = grid.tails[e], v = grid.heads[e];
    if (left[u] > 2 && left[v] > 2 && random.below(5) === 0) {
      left[u]--;
      left[v]--;
    } else if (random.below(10) === 0) {
      pairs.push([u, n], [n, n + 1], [n + 1, v]);
      n += 2;
    } else pairs.push([u, v]);
  }
  const name = random.shuffle(Int32Array.from({ length: n }, (_, v) => v));
  random.shuffle(pairs);
  return graphFromEdges(
    n,
    Int32Array.from(pairs, ([u]) => name[u]),
    Int32Array.from(pairs, ([, v]) => name[v]),
  );
}

/**
 * Weights that make all-half optimal for the relaxation: w = Mᵀc for random edge costs c.
 *
 * @param graph a graph without isolated vertices
 * @param below costs are integers from 0 to below - 1; 10 where nothing else is wanted
 * @returns length n; where all costs at a vertex came out 0, one of its edges costs 1 instead
 */
export function hardWeights(graph: Graph, random: Random, below = 10): Float64Array {
  const weights = new Float64Array(graph.n);
  for (let e = 0; e < graph.m; e++) {
    const cost = random.below(below);
    weights[graph.tails[e]] += cost;
    weights[graph.heads[e]] += cost;
  }
  for (let v = 0; v < graph.n; v++) {
    if (weights[v] !== 0) continue;
    weights[v]++;
    weights[graph.targets[graph.offsets[v]]]++;
  }
  return weights;
}

/** Independent weights, integers from 1 to `top`, each equally likely. */
export function uniformWeights(n: number, random: Random, top = 100): Float64Array {
  return Float64Array.from({ length: n }, () => 1 + random.below(top));
}
