/** Grids with two more vertices tied to their rims: transversals of two whose odd cycles cross. */
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";

/**
 * A square grid with a vertex x joined to one colour class of the top row and the other class of the
 * bottom row, and a vertex z in the same way to the left and right columns. An odd cycle through x
 * runs from top to bottom and one through z from left to right, so no two are disjoint.
 *
 * @param side even, at least 4
 * @param open whether z is also joined to a vertex in the middle, which lets two be disjoint
 * @returns side·side + 2 vertices, x and z last
 */
export function bandGraph(side: number, open: boolean): Graph {
  const at = (i: number, j: number): number => i * side + j;
  const x = side * side, z = x + 1, last = side - 1;
  const pairs: [number, number][] = [];
  for (let i = 0; i < side; i++) {
    for (let j = 0; j < side; j++) {
      if (j < last) pairs.push([at(i, j), at(i, j + 1)]);
      if (i < last) pairs.push([at(i, j), at(i + 1, j)]);
    }
  }
  for (let j = 0; j < side; j++) {
    if (j % 2 === 0) pairs.push([x, at(0, j)]);
    if ((last + j) % 2 === 1) pairs.push([x, at(last, j)]);
  }
  for (let i = 1; i < last; i++) {
    if (i % 2 === 0) pairs.push([z, at(i, 0)]);
    if ((i + last) % 2 === 1) pairs.push([z, at(i, last)]);
  }
  if (open) pairs.push([z, at(side / 2, side / 2)]);
  return graphFromPairs(side * side + 2, pairs);
}
