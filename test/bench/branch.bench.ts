/**
 * Branch and bound on pieces too heavy for the test run. Results are compared with the sizes stated in
 * OEIS A265032 where there are any; times and sizes of proofs are printed.
 */
import type { Graph } from "../../lib/graph/graph.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { branch } from "../../lib/solve/branch.ts";
import { endAroundTransposition, singleDeletion, zChannel } from "../support/code-graphs.ts";
import { checkedBound } from "../support/proofs.ts";
import {
  randomConnectedGraph,
  randomGraph,
  randomRegularGraph,
  randomWeights,
} from "../support/random-graphs.ts";

/** One line of the result. */
export interface BranchRow {
  readonly name: string;
  readonly vertices: number;
  readonly edges: number;
  readonly status: string;
  readonly weight: number;
  readonly upperBound: number;
  /** What is known from elsewhere. */
  readonly known?: number;
  readonly milliseconds: number;
  readonly search: string | number;
  readonly nodes: string | number;
  /** Length of the proof as JSON; 0 without one. */
  readonly proofBytes: number;
}

/**
 * Runs all cases, one after another.
 *
 * @param timeLimitMs limit of each
 * @param onRow called with each line as it is ready
 * @throws {Error} when an optimum differs from the published size, or a proof is rejected
 */
export async function branchBench(
  timeLimitMs = 60_000,
  onRow: (row: BranchRow) => void = (row) => console.log(JSON.stringify(row)),
): Promise<BranchRow[]> {
  const cases: [string, Graph, number | undefined, boolean][] = [
    ["1dc.256", singleDeletion(8), 30, false],
    ["1dc.512", singleDeletion(9), 52, false],
    ["1et.128", endAroundTransposition(7), 28, false],
    ["1et.256", endAroundTransposition(8), 50, false],
    ["1zc.128", zChannel(7), 18, false],
    ["1zc.256", zChannel(8), 36, false],
  ];
  for (const [n, d] of [[200, 3], [300, 3], [150, 4], [150, 5]]) {
    const graph = randomRegularGraph(new Random(n + d), n, d);
    cases.push([`degree ${d}`, graph, undefined, false], [`degree ${d}`, graph, undefined, true]);
  }
  for (const [n, m] of [[300, 450], [300, 600], [150, 450], [300, 900]]) {
    const graph = randomConnectedGraph(new Random(n + m), n, m - n);
    cases.push([`connected`, graph, undefined, false], [`connected`, graph, undefined, true]);
  }
  for (const [n, p] of [[200, 0.5], [150, 0.1], [200, 0.2], [300, 0.3]]) {
    const graph = randomGraph(new Random(n), n, p);
    cases.push([`density ${p}`, graph, undefined, false], [`density ${p}`, graph, undefined, true]);
  }
  const rows: BranchRow[] = [];
  for (const [name, graph, known, weighted] of cases) {
    const { n } = graph;
    const weights = weighted
      ? randomWeights(new Random(n), n, 1, 100)
      : new Float64Array(n).fill(1);
    const labels = Int32Array.from({ length: n }, (_, v) => v);
    const began = performance.now();
    const solved = await branch({ graph, weights, labels }, new Meter({ timeLimitMs }));
    const milliseconds = Math.round(performance.now() - began);
    if (known !== undefined && (solved.weight > known || solved.upperBound < known)) {
      throw new Error(`${name}: ${solved.weight} to ${solved.upperBound}, but ${known} is known`);
    }
    const { proof } = solved;
    if (proof !== undefined && checkedBound(graph, weights, labels, proof) !== solved.weight) {
      throw new Error(`${name}: the proof proves another bound`);
    }
    const row: BranchRow = {
      name: weighted ? `${name}, weighted` : name,
      vertices: n,
      edges: graph.m,
      status: solved.status,
      weight: solved.weight,
      upperBound: solved.upperBound,
      ...(known === undefined ? {} : { known }),
      milliseconds,
      search: solved.figures.search,
      nodes: solved.figures.nodes,
      proofBytes: proof === undefined ? 0 : JSON.stringify(proof).length,
    };
    rows.push(row);
    onRow(row);
  }
  return rows;
}
