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
