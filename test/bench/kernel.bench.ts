/**
 * The half-integral kernel on graphs of 10^5 and 10^6 vertices, each answer checked against its own
 * dual, with the growth between the two sizes; and the bipartite engine on 200,000 items.
 */
import process from "node:process";
import { type Graph, graphFromEdges } from "../../lib/graph/graph.ts";
import { halfIntegralKernel } from "../../lib/reduce/kernel.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { solveBipartite } from "../../lib/solve/bipartite.ts";
import { validateKernel } from "../oracle/half-integral.ts";
import { hardWeights, mirroredGrid, uniformWeights } from "../support/mirrored-grid.ts";

/** One line of the result. */
export interface KernelRow {
  readonly name: string;
  readonly vertices: number;
  readonly edges: number;
  readonly milliseconds: number;
  /** Vertices of value 1/2; for the bipartite engine none. */
  readonly halves: number;
  /** Exponent of the growth in time since the same case at a smaller size. */
  readonly growth?: number;
  /** Resident memory after the case, in MB; the largest so far. */
  readonly megabytes: number;
}

/** Edges drawn with repetition between two ranges of vertices. */
function randomEdges(
  n: number,
  m: number,
  end: (first: boolean) => number,
): Graph {
  const tails = new Int32Array(m), heads = new Int32Array(m);
  for (let e = 0; e < m; e++) {
    tails[e] = end(true);
    do heads[e] = end(false); while (heads[e] === tails[e]);
  }
  return graphFromEdges(n, tails, heads);
}

function renumbered(graph: Graph, random: Random): Graph {
  const name = random.shuffle(Int32Array.from({ length: graph.n }, (_, v) => v));
  return graphFromEdges(
    graph.n,
    graph.tails.map((v) => name[v]),
    graph.heads.map((v) => name[v]),
  );
}

function starOrPath(n: number, star: boolean): Graph {
  return graphFromEdges(
    n,
    Int32Array.from({ length: n - 1 }, (_, e) => star ? 0 : e),
    Int32Array.from({ length: n - 1 }, (_, e) => e + 1),
  );
}

type Case = readonly [string, (n: number) => Graph, "hard" | "uniform" | "unit"];

const grid = (n: number): Graph => {
  const side = 2 * Math.round(Math.sqrt(n) / 2);
  return mirroredGrid(side, side);
};
const sparse = (degree: number) => (n: number): Graph => {
  const random = new Random(degree);
  return randomEdges(n, (n * degree) / 2, () => random.below(n));
};

const cases: readonly Case[] = [
  ["mirrored grid, w = Mᵀc", grid, "hard"],
  ["mirrored grid, 1 to 100", grid, "uniform"],
  ["mirrored grid, unit", grid, "unit"],
  ["mirrored grid renumbered, w = Mᵀc", (n) => renumbered(grid(n), new Random(1)), "hard"],
  ["strip of width 10, w = Mᵀc", (n) => mirroredGrid(n / 10, 10), "hard"],
  ["degree 3, unit", sparse(3), "unit"],
  ["degree 3, 1 to 100", sparse(3), "uniform"],
  ["degree 5, unit", sparse(5), "unit"],
  ["degree 10, unit", sparse(10), "unit"],
  ["path, 1 to 100", (n) => starOrPath(n, false), "uniform"],
  ["star, 1 to 100", (n) => starOrPath(n, true), "uniform"],
];

/**
 * Runs all cases, one after another.
 *
 * @param sizes numbers of vertices, multiples of 20, rising
 * @param onRow called with each line as it is ready
 * @throws {Error} when an answer is not optimal
 */
export function kernelBench(
  sizes: readonly number[] = [100_000, 1_000_000],
  onRow: (row: KernelRow) => void = (row) => console.log(JSON.stringify(row)),
): KernelRow[] {
  const rows: KernelRow[] = [];
  const add = (row: Omit<KernelRow, "growth" | "megabytes">): void => {
    const before = rows.findLast((r) => r.name === row.name);
    const growth = before === undefined ? undefined : Math.round(
      (100 * Math.log(row.milliseconds / before.milliseconds)) /
        Math.log(row.vertices / before.vertices),
    ) / 100;
    const megabytes = Math.round(process.resourceUsage().maxRSS / 1024);
    const full = { ...row, growth, megabytes };
    rows.push(full);
    onRow(full);
  };
  for (const [name, make, kind] of cases) {
    for (const n of sizes) {
      const graph = make(n);
      const weights = kind === "hard"
        ? hardWeights(graph, new Random(5))
        : kind === "uniform"
        ? uniformWeights(graph.n, new Random(6))
        : new Float64Array(graph.n).fill(1);
      const started = performance.now();
      const kernel = halfIntegralKernel(graph, weights, new Meter());
      const milliseconds = Math.round(performance.now() - started);
      validateKernel(graph, weights, kernel);
      const halves = kernel.value.reduce((count, x) => count + (x === 1 ? 1 : 0), 0);
      add({ name, vertices: graph.n, edges: graph.m, milliseconds, halves });
    }
  }
  for (const [name, left, n, m] of bipartiteCases) {
    const random = new Random(7);
    const graph = randomEdges(
      n,
      m,
      (first) => first ? random.below(left) : left + random.below(n - left),
    );
    const weights = uniformWeights(n, random);
    const labels = Int32Array.from({ length: n }, (_, v) => v);
    const started = performance.now();
    const result = solveBipartite({ graph, weights, labels }, new Meter());
    const milliseconds = Math.round(performance.now() - started);
    if (result.status !== "optimal") throw new Error(`${name}: ${result.status}`);
    add({ name, vertices: n, edges: m, milliseconds, halves: 0 });
  }
  return rows;
}

const bipartiteCases: readonly (readonly [string, number, number, number])[] = [
  ["bipartite engine, sparse", 100_000, 200_000, 600_000],
  ["bipartite engine, dense", 1000, 2000, 1_000_000],
];
