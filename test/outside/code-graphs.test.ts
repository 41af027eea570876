import { describe, expect, it } from "vitest";
import { components, componentSubgraphs } from "../../lib/graph/components.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { Meter } from "../../lib/run/meter.ts";
import { branch } from "../../lib/solve/branch.ts";
import { isStable } from "../oracle/brute-force.ts";
import {
  doubleDeletion,
  endAroundTransposition,
  singleDeletion,
  transposition,
  zChannel,
} from "../support/code-graphs.ts";
import { checkedBound } from "../support/proofs.ts";

/**
 * Sizes of largest codes: N. J. A. Sloane, "Challenge problems: independent sets in graphs", OEIS
 * A265032 (https://oeis.org/A265032/a265032.html), seen there for 1dc, 1tc up to 64 and 1et.64; the
 * sizes of 2dc.128, 1tc.128, 1tc.256, 1et.128 and 1zc.128 come from public listings of best-known
 * values for the same graphs. Numbers of edges: 543 for 1dc.64 stands on the OEIS page as the example
 * of the file format; the others are written from memory.
 */
const CASES: [string, Graph, number, number][] = [
  ["1dc.64", singleDeletion(6), 543, 10],
  ["1dc.128", singleDeletion(7), 1471, 16],
  ["1dc.256", singleDeletion(8), 3839, 30],
  ["2dc.128", doubleDeletion(7), 5173, 5],
  ["1tc.8", transposition(3), 6, 4],
  ["1tc.16", transposition(4), 22, 8],
  ["1tc.32", transposition(5), 68, 12],
  ["1tc.64", transposition(6), 192, 20],
  ["1tc.128", transposition(7), 512, 38],
  ["1tc.256", transposition(8), 1312, 63],
  ["1et.64", endAroundTransposition(6), 264, 18],
  ["1et.128", endAroundTransposition(7), 672, 28],
  ["1zc.128", zChannel(7), 1120, 18],
];

/** Solves component by component and has every proof checked. */
async function largestStableSet(graph: Graph): Promise<number> {
  let size = 0;
  for (const { graph: part } of componentSubgraphs(graph)) {
    const weights = new Float64Array(part.n).fill(1);
    const labels = Int32Array.from({ length: part.n }, (_, v) => v);
    const solved = await branch({ graph: part, weights, labels }, new Meter());
    expect(solved.status).toBe("optimal");
    expect(isStable(part, solved.chosen)).toBe(true);
    expect(checkedBound(part, weights, labels, solved.proof!)).toBe(solved.weight);
    size += solved.weight;
  }
  return size;
}

describe("code graphs of OEIS A265032", () => {
  for (const [name, graph, edges, size] of CASES) {
    it(`${name}: ${edges} edges, a largest code of ${size} words`, async () => {
      expect(graph.m).toBe(edges);
      expect(await largestStableSet(graph)).toBe(size);
    });
  }

  it("1tc and 1et fall into k + 1 components, one for each number of ones", () => {
    for (let k = 3; k <= 8; k++) {
      expect(components(transposition(k)).count).toBe(k + 1);
      expect(components(endAroundTransposition(k)).count).toBe(k + 1);
    }
  });

  it("single deletion: the Varshamov–Tenengolts code is a stable set of the size stated", () => {
    for (const [k, size] of [[6, 10], [7, 16], [8, 30], [9, 52], [10, 94]]) {
      const graph = singleDeletion(k);
      const chosen = new Uint8Array(graph.n);
      let count = 0;
      for (let word = 0; word < graph.n; word++) {
        let sum = 0;
        for (let i = 0; i < k; i++) sum += ((word >> i) & 1) * (i + 1);
        if (sum % (k + 1) !== 0) continue;
        chosen[word] = 1;
        count++;
      }
      expect(count).toBe(size);
      expect(isStable(graph, chosen)).toBe(true);
    }
  });
});
