/**
 * The least-cost one-sided directed cycle of the dual: for every face x of a one-sided walk the
 * distance d(x, x̄) to its antipode, by a source that moves along the walk. Faces that are proved by
 * the tree at hand are passed over.
 *
 * On mirrored grids each face changes its place in the tree about once, so that all sources together
 * take near-linear time; at worst it is O(m) time for each.
 */
import type { Graph } from "../../graph/graph.ts";
import { Interrupted, type Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";
import { MovingSource } from "./moving-source.ts";
import { edgesTo, shortestPaths } from "./shortest-paths.ts";
import type { SourceWalk } from "./source-walk.ts";

/** The answer. */
export interface LeastCycle {
  /** The cost of a least one-sided directed cycle; of the best found, where the run was interrupted. */
  readonly cost: number;
  /** No one-sided cycle costs less; equal to `cost` when the run was completed. */
  readonly atLeast: number;
  /** The edges of H it crosses, with repetitions. */
  readonly crossed: number[];
  /** How often the source was moved. */
  readonly moves: number;
}

/**
 * Finds a least one-sided cycle.
 *
 * @param graph H
 * @param dual the directed dual of H
 * @param costs length m, for each edge of H what the arcs across its lifts cost, integers >= 0
 * @param walk sources that every one-sided cycle passes
 * @param step all costs of one-sided cycles are equal modulo this
 * @param meter counts about one unit for each arc scanned
 * @returns the cycle; when the meter runs out, the best one found and a bound
 * @throws {Interrupted} when the meter runs out before any cycle was found
 */
export function leastOneSidedCycle(
  graph: Graph,
  dual: DirectedDual,
  costs: Int32Array | Float64Array,
  walk: SourceWalk,
  step: number,
  meter: Meter,
): LeastCycle {
  const { faces, there, back } = walk;
  const paths = shortestPaths(dual, costs, faces[0], meter);
  let boundOf = (x: number) => Math.abs(paths.tree[2 * x] - paths.tree[2 * (x ^ 1)]);
  let cost = paths.tree[2 * (faces[0] ^ 1)], crossed = edgesTo(faces[0] ^ 1, paths, dual);
  let moves = 0, next = 1;
  try {
    let range = 0;
    for (let i = 0; i < faces.length; i++) range += there[i] + back[i];
    const source = new MovingSource(graph, dual, costs, paths, faces[0], range, meter);
    boundOf = (x) => source.bound(x);
    let exact = cost, round = 0, wayBack = 0;
    for (; next < faces.length; next++) {
      const x = faces[next];
      wayBack += back[next];
      round += there[next] + back[next];
      // From the source to x, on to x̄, and from there as from x back: a way to the source's antipode.
      if (exact - round > cost - step || source.bound(x) > cost - step) continue;
      source.move(x, wayBack);
      moves++;
      round = wayBack = 0;
      exact = source.distance(x ^ 1);
      if (exact < cost) {
        cost = exact;
        crossed = source.path(x ^ 1);
      }
      meter.report("shortest one-sided cycle", { done: next, total: faces.length });
    }
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    let atLeast = cost;
    for (; next < faces.length; next++) atLeast = Math.min(atLeast, boundOf(faces[next]));
    return { cost, atLeast, crossed, moves };
  }
  return { cost, atLeast: cost, crossed, moves };
}
