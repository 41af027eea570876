/**
 * Checks a proof by an even-face embedding, in O(m) time and what the distances of its sources take,
 * see projective-sources.ts.
 *
 * Why it proves a bound. Let x be a stable set of H and y(e) = 1 - x(u) - x(v) >= 0 the slack of each
 * edge. As Mᵀc = 2w, twice the weight of x is c(E) - c·y, and c(E) = w(V).
 *
 * 1. Draw the double cover on the sphere and lift y to both copies of each edge. Around a face, a
 *    closed walk of the bipartite cover, the slacks with alternating signs add up to 0. Direct the
 *    dual arc across each edge with the end (v,0) on its left: arcs in and out of a face alternate,
 *    so y is a circulation. Swapping the sheets keeps the directions of dual arcs, and y; so y is a
 *    circulation of the dual of H in the projective plane, a sum of directed cycles.
 * 2. On an odd closed walk of H the slacks add up to its length less an even number: an odd number.
 *    So one of the cycles, Z, crosses this walk an odd number of times. Z is one-sided, that is, it
 *    lifts to a path from a face to its antipode, the image under the swap: if it lifted to a closed
 *    curve, that would cross the lift of the walk, a closed curve through both copies of each of its
 *    edges, an odd number of times, and on the sphere two closed curves cross an even number of times.
 * 3. Z passes a source f, so c·y >= d(f, f̄), the distance from a lift of f to its antipode. With D the
 *    least of these distances, x weighs at most (w(V) - D) / 2; it weighs a multiple of the greatest
 *    common divisor of all weights, so round down to one.
 */
import type { ProjectiveProof } from "./certificate.ts";
import { type Play, requireMultiplier } from "./play.ts";
import { type InnerGraph, innerGraph } from "./projective-graph.ts";
import { sphereDual } from "./projective-dual.ts";
import { provenDistances } from "./projective-sources.ts";
import { requireWalk } from "./projective-walk.ts";
import { Rejected } from "./rejected.ts";

/**
 * The bound a proof by an even-face embedding proves.
 *
 * @param play the graph and the vertices in play
 * @param proof costs, embedding, sources and distance
 * @returns the bound above, in scaled units
 * @throws {Rejected} naming the first thing that is wrong
 */
export function projectiveBound(play: Play, proof: ProjectiveProof): bigint {
  const inner = innerGraph(play);
  const unit = requireMultiplier(proof.unit, "projective, unit");
  if (unit < 1) throw new Rejected("projective, unit: expected an integer >= 1, got 0");
  const { costs, load } = requireCosts(play, inner, proof, unit);
  const dual = sphereDual(inner, proof.rotation);
  const walk = requireWalk(inner, dual, proof, costs, load);
  const claimed = requireMultiplier(proof.distance, "projective, distance");
  const proven = provenDistances(inner, dual, costs, load, walk, claimed);

  const distance = BigInt(claimed);
  let total = 0n, divisor = 0;
  for (let v = 0; v < inner.vertices.length; v++) {
    const weight = play.weights[inner.vertices[v]];
    total += BigInt(weight);
    if (divisor !== 1) divisor = greatestCommonDivisor(weight, divisor);
  }
  if (divisor === 0) return 0n;
  const G = 2n * BigInt(divisor);
  const boundFrom = (d: bigint) => (total - BigInt(unit) * d) / G * BigInt(divisor);
  const bound = boundFrom(distance);
  let weakest = 0;
  for (let i = 0; i < proven.length; i++) if (proven[i] < proven[weakest]) weakest = i;
  if (boundFrom(BigInt(proven[weakest])) > bound) {
    throw new Rejected(
      `projective: the distance ${distance} is not proved at source ${weakest}, ` +
        `where the tree of paths proves ${proven[weakest]}`,
    );
  }
  return bound;
}

function requireCosts(
  play: Play,
  inner: InnerGraph,
  proof: ProjectiveProof,
  unit: number,
): { costs: Float64Array; load: Float64Array } {
  const { vertices, offsets, targets } = inner;
  const m = targets.length / 2;
  if (proof.costs.length !== m) {
    throw new Rejected(
      `projective: expected a cost for each of ${m} conflicts inside the part, ` +
        `got ${proof.costs.length}`,
    );
  }
  const costs = new Float64Array(m), load = new Float64Array(vertices.length);
  let e = 0;
  for (let v = 0; v < vertices.length; v++) {
    for (let d = offsets[v]; d < offsets[v + 1]; d++) {
      if (targets[d] < v) continue;
      costs[e] = requireMultiplier(proof.costs[e], `projective, cost ${e}`);
      load[v] += costs[e];
      load[targets[d]] += costs[e];
      e++;
    }
  }
  for (let v = 0; v < vertices.length; v++) {
    const weight = play.weights[vertices[v]];
    // A rounded sum is not safe; a rounded product is 2^53 at least.
    const isDouble = 2 * weight <= Number.MAX_SAFE_INTEGER
      ? load[v] * unit === 2 * weight
      : BigInt(load[v]) * BigInt(unit) === 2n * BigInt(weight);
    if (!isDouble || !Number.isSafeInteger(load[v])) {
      throw new Rejected(
        `projective: the costs at ${play.nameOf(vertices[v])} add up to ${load[v] * unit}, ` +
          `expected twice its weight, ${2 * weight}`,
      );
    }
  }
  return { costs, load };
}

function greatestCommonDivisor(a: number, b: number): number {
  while (b !== 0) {
    const rest = a % b;
    a = b;
    b = rest;
  }
  return a;
}
