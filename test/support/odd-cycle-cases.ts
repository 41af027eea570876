/** Small graphs near the boundary between one odd cycle and two disjoint ones. */
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import type { Random } from "../../lib/run/random.ts";
import { mirroredGrid } from "./mirrored-grid.ts";
import { withBlocks } from "./with-blocks.ts";

const SHAPES = [[3, 3], [5, 3], [3, 5], [4, 4], [2, 6], [6, 2], [5, 5], [4, 6], [6, 4], [7, 3]];

/**
 * A mirrored grid with a few random changes: edges removed, an edge or an even or odd chain added,
 * two vertices made one, bipartite blocks hung on.
 *
 * @returns a simple graph of at most 29 vertices, not always connected
 */
export function changedGrid(random: Random): Graph {
  const [rows, columns] = SHAPES[random.below(SHAPES.length)];
  const grid = mirroredGrid(rows, columns);
  let n = grid.n;
  let pairs = Array.from(grid.tails, (u, e): [number, number] => [u, grid.heads[e]]);
  for (let k = random.below(4); k > 0; k--) pairs.splice(random.below(pairs.length), 1);
  if (random.below(2) === 0) pairs.push([random.below(n), random.below(n)]);
  if (random.below(3) === 0) {
    const inner = 1 + random.below(2), to = random.below(n);
    let from = random.below(n);
    for (let k = 0; k < inner; k++, from = n++) pairs.push([from, n]);
    pairs.push([from, to]);
  }
  if (random.below(3) === 0) {
    const gone = random.below(grid.n), into = random.below(grid.n);
    pairs = pairs.map(([u, v]) => [u === gone ? into : u, v === gone ? into : v]);
  }
  const seen = new Set<number>();
  pairs = pairs.filter(([u, v]) => {
    const key = Math.min(u, v) * 100 + Math.max(u, v);
    if (u === v || seen.has(key)) return false;
    seen.add(key);
    return true;
  });
  const graph = graphFromPairs(n, pairs);
  if (n > 26 || random.below(2) === 0) return graph;
  return withBlocks(random, graph, {
    blocks: n > 20 ? 1 : 1 + random.below(3),
    size: 3,
    attachments: random.below(2) === 0 ? 3 : "any",
    nested: random.below(2) === 0,
    density: 0.5,
  }).graph;
}
