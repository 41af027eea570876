/**
 * Even-face graphs full of pairs of vertices that separate: mirrored grids whose edges are replaced
 * by patches, pieces of plane grids that hang between two of their own boundary vertices, and
 * patches in patches.
 */
import { componentSubgraphs } from "../../lib/graph/components.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";
import { mirroredGrid } from "./mirrored-grid.ts";

/**
 * A patched grid; by construction it has an even-face embedding, unless it came out bipartite
 * because edges were dropped.
 *
 * @param rows as for `mirroredGrid`
 * @param columns as for `mirroredGrid`
 * @param patches number of edges replaced, one after another
 * @returns one component, simple, vertices and edges in random order
 */
export function patchedGrid(
  random: Random,
  rows: number,
  columns: number,
  patches: number,
): Graph {
  const grid = mirroredGrid(rows, columns);
  let n = grid.n;
  const pairs = Array.from(grid.tails, (u, e): [number, number] => [u, grid.heads[e]]);
  for (let p = 0; p < patches; p++) {
    const at = random.below(pairs.length), [u, v] = pairs[at];
    if (random.below(3) > 0) pairs.splice(at, 1); // otherwise the edge stays beside the patch
    for (let copies = 1 + (random.below(3) === 0 ? 1 : 0); copies > 0; copies--) {
      n = addPatch(random, pairs, n, u, v);
    }
  }
  const order = random.shuffle(Int32Array.from({ length: n }, (_, v) => v));
  const simple = new Map<number, [number, number]>();
  for (const [u, v] of random.shuffle(pairs)) {
    const a = order[u], b = order[v];
    simple.set(Math.min(a, b) * n + Math.max(a, b), [a, b]);
  }
  return componentSubgraphs(graphFromPairs(n, simple.values()))
    .reduce((a, b) => b.graph.n > a.graph.n ? b : a).graph;
}

/** Adds a plane grid of 2 to 4 rows and columns, some edges missing; returns the new n. */
function addPatch(
  random: Random,
  pairs: [number, number][],
  n: number,
  u: number,
  v: number,
): number {
  const rows = 2 + random.below(3), columns = 2 + random.below(3);
  const boundary: number[] = [];
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) {
      if (i === 0 || j === 0 || i === rows - 1 || j === columns - 1) boundary.push(i * columns + j);
    }
  }
  const colour = (x: number) => (Math.floor(x / columns) + x % columns) % 2;
  const s = boundary[random.below(boundary.length)];
  const others = boundary.filter((x) => colour(x) !== colour(s));
  const t = others[random.below(others.length)];
  const name = (x: number) => x === s ? u : x === t ? v : n + x;
  for (let x = 0; x < rows * columns; x++) {
    if ((x + 1) % columns !== 0 && random.below(6) > 0) pairs.push([name(x), name(x + 1)]);
    if (x + columns < rows * columns && random.below(6) > 0) {
      pairs.push([name(x), name(x + columns)]);
    }
  }
  return n + rows * columns;
}
