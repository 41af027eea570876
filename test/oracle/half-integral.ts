/** The half-integral relaxation by enumeration, and what any answer to it must satisfy. */
import type { Graph } from "../../lib/graph/graph.ts";
import type { HalfIntegralKernel } from "../../lib/reduce/kernel.ts";

/** The doubled value of the relaxation and the fewest halves of an optimum. */
export interface RelaxationOptimum {
  readonly doubledValue: number;
  readonly fewestHalves: number;
}

/** Tries all 3^n vectors of 0, 1/2 and 1; meant for n <= 8. */
export function bestHalfIntegral(graph: Graph, weights: ArrayLike<number>): RelaxationOptimum {
  const doubled = new Uint8Array(graph.n);
  let doubledValue = -1, fewestHalves = 0;
  const visit = (v: number, value: number, halves: number): void => {
    if (v === graph.n) {
      if (value > doubledValue || (value === doubledValue && halves < fewestHalves)) {
        [doubledValue, fewestHalves] = [value, halves];
      }
      return;
    }
    let most = 2;
    for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
      const u = graph.targets[a];
      if (u < v) most = Math.min(most, 2 - doubled[u]);
    }
    for (let x = 0; x <= most; x++) {
      doubled[v] = x;
      visit(v + 1, value + x * weights[v], halves + (x === 1 ? 1 : 0));
    }
  };
  visit(0, 0, 0);
  return { doubledValue, fewestHalves };
}

/**
 * Everything a kernel promises but the fewest halves, for any size: values and costs are feasible,
 * complementary, and prove each other optimal. Sums in BigInt, so that no rounding can hide.
 *
 * @throws {Error} naming the first thing that is wrong
 */
export function validateKernel(
  graph: Graph,
  weights: Float64Array,
  { value, doubledCosts, packed }: HalfIntegralKernel,
): void {
  const { n, m, tails, heads } = graph;
  if (value.length !== n || doubledCosts.length !== m) throw new Error("wrong lengths");
  const load: bigint[] = new Array(n).fill(0n);
  let sum = 0n;
  for (let e = 0; e < m; e++) {
    const u = tails[e], v = heads[e], cost = doubledCosts[e];
    if (value[u] + value[v] > 2) throw new Error(`edge ${e}: values ${value[u]} and ${value[v]}`);
    if (!(Number.isSafeInteger(cost) && cost >= 0)) throw new Error(`edge ${e}: cost ${cost}`);
    if (cost > 0 && value[u] + value[v] !== 2) {
      throw new Error(`edge ${e}: slack, but cost ${cost}`);
    }
    load[u] += BigInt(cost);
    load[v] += BigInt(cost);
    sum += BigInt(cost);
  }
  let primal = 0n, total = 0n;
  for (let v = 0; v < n; v++) {
    const twice = 2n * BigInt(weights[v]);
    if (value[v] > 2) throw new Error(`vertex ${v}: value ${value[v]}`);
    if (load[v] > twice) throw new Error(`vertex ${v}: costs ${load[v]} above ${twice}`);
    if (value[v] < 2 && load[v] !== twice) {
      throw new Error(`vertex ${v}: value ${value[v]}, but costs ${load[v]} of ${twice}`);
    }
    primal += BigInt(value[v]) * BigInt(weights[v]);
    total += twice;
  }
  if (BigInt(packed) !== sum) throw new Error(`packed is ${packed}, the costs add up to ${sum}`);
  if (primal !== total - sum) throw new Error(`values prove ${primal}, costs ${total - sum}`);
}
