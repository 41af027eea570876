/**
 * The distances between the sources of a proof and their antipodes: those that matter come from a tree
 * of paths that is rehung from source to source, see projective-tree.ts.
 */
import type { InnerGraph } from "./projective-graph.ts";
import type { SphereDual } from "./projective-dual.ts";
import { RehungTree } from "./projective-tree.ts";
import type { Walk } from "./projective-walk.ts";
import { Rejected } from "./rejected.ts";

/** No sum of loads may be larger, so that every sum below is exact. */
const MOST_LOAD = 2 ** 51;

/**
 * Lower bounds for the distances between the faces of the walk and their antipodes.
 *
 * @param inner H
 * @param dual the sphere
 * @param costs length m, costs of edges
 * @param load length n, the costs at each vertex added up
 * @param walk the sources
 * @param wanted bounds that reach this need not be exact
 * @returns as long as the walk
 * @throws {Rejected} when costs are too large to be added exactly
 */
export function provenDistances(
  inner: InnerGraph,
  dual: SphereDual,
  costs: Float64Array,
  load: Float64Array,
  walk: Walk,
  wanted: number,
): Float64Array {
  const { faces, there, back } = walk;
  const sum = (list: Float64Array) => list.reduce((total, x) => total + x, 0);
  if (!(sum(load) <= MOST_LOAD)) {
    throw new Rejected(`projective: the costs add up to ${sum(load)}, more than ${MOST_LOAD}`);
  }
  const proven = new Float64Array(faces.length);
  const tree = new RehungTree(inner, dual, costs, faces[0], sum(there) + sum(back));
  let exact = -Infinity, round = 0, wayBack = 0;
  for (let i = 0; i < faces.length; i++) {
    wayBack += back[i];
    round += there[i] + back[i];
    // From the root to this face, on to its antipode, and from there as from the face back to the root:
    // a way to the antipode of the root.
    proven[i] = exact - round;
    if (proven[i] >= wanted) continue;
    proven[i] = tree.apart(faces[i]);
    if (proven[i] >= wanted) continue;
    tree.rehang(faces[i], wayBack);
    proven[i] = exact = tree.apart(faces[i]);
    round = wayBack = 0;
  }
  tree.requireSums(load);
  return proven;
}
