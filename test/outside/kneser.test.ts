import { describe, expect, it } from "vitest";
import { Meter } from "../../lib/run/meter.ts";
import { branch } from "../../lib/solve/branch.ts";
import { isStable } from "../oracle/brute-force.ts";
import { kneser } from "../support/code-graphs.ts";
import { checkedBound } from "../support/proofs.ts";

function choose(n: number, k: number): number {
  let value = 1;
  for (let i = 1; i <= k; i++) value = (value * (n - k + i)) / i;
  return value;
}

/**
 * P. Erdős, C. Ko and R. Rado, "Intersection theorems for systems of finite sets" (Quart. J. Math.
 * 12, 1961): pairwise intersecting k-subsets of n >= 2k things are at most C(n-1, k-1).
 */
describe("Kneser graphs, by the theorem of Erdős, Ko and Rado", () => {
  for (const [n, k] of [[4, 2], [5, 2], [7, 2], [11, 2], [7, 3], [8, 3], [9, 3], [10, 3], [9, 4]]) {
    it(`K(${n}, ${k}): ${choose(n, k)} vertices, at most ${choose(n - 1, k - 1)} chosen`, async () => {
      const graph = kneser(n, k);
      expect(graph.n).toBe(choose(n, k));
      const weights = new Float64Array(graph.n).fill(1);
      const labels = Int32Array.from({ length: graph.n }, (_, v) => v);
      const solved = await branch({ graph, weights, labels }, new Meter());
      expect(solved.status).toBe("optimal");
      expect(solved.weight).toBe(choose(n - 1, k - 1));
      expect(isStable(graph, solved.chosen)).toBe(true);
      expect(checkedBound(graph, weights, labels, solved.proof!)).toBe(solved.weight);
    });
  }
});
