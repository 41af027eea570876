/**
 * The planarity test on 100,000 to 3,000,000 edges: time for each edge. Linear time shows as rows that
 * stay level, but for waiting for memory where neighbours are far apart in it (stacked triangulations).
 * Embeddings are checked by Euler's formula.
 */
import { eulerGenus } from "../../lib/graph/embedding.ts";
import { type Graph, graphFromEdges } from "../../lib/graph/graph.ts";
import { planarRotation } from "../../lib/graph/planarity.ts";
import { doubleCover } from "../../lib/parity/double-cover.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";

/** Edges aimed at. */
const SIZES = [100_000, 300_000, 1_000_000, 3_000_000];
/** Repetitions, the median counts; before them one more for the compiler. */
const REPEATED = 5;

interface Family {
  readonly name: string;
  readonly planar: boolean;
  readonly make: (edges: number) => Graph;
}

const FAMILIES: readonly Family[] = [
  {
    name: "double cover of a mirrored grid",
    planar: true,
    make: (edges) => {
      const side = 2 * Math.round(Math.sqrt(edges / 4) / 2);
      return doubleCover(mirroredGrid(side, side));
    },
  },
  {
    name: "grid with diagonals, all faces triangles",
    planar: true,
    make: (edges) => {
      const side = Math.round(Math.sqrt(edges / 3)), random = new Random(1);
      const pairs = gridPairs(side);
      for (let i = 0; i + 1 < side; i++) {
        for (let j = 0; j + 1 < side; j++) {
          const v = i * side + j, flip = random.below(2);
          pairs.push(v + flip, v + side + 1 - flip);
        }
      }
      return fromPairs(side * side, pairs);
    },
  },
  {
    name: "random stacked triangulation",
    planar: true,
    make: (edges) => {
      const random = new Random(2), faces = [0, 1, 2, 0, 1, 2], pairs = [0, 1, 1, 2, 0, 2];
      let n = 3;
      for (; pairs.length < 2 * edges; n++) {
        const f = 3 * random.below(faces.length / 3);
        const [a, b, c] = [faces[f], faces[f + 1], faces[f + 2]];
        pairs.push(n, a, n, b, n, c);
        faces[f + 2] = n;
        faces.push(a, n, c, n, b, c);
      }
      return fromPairs(n, pairs);
    },
  },
  {
    name: "grid with one edge across: not planar",
    planar: false,
    make: (edges) => {
      const side = Math.round(Math.sqrt(edges / 2)), pairs = gridPairs(side);
      pairs.push(side + 1, side * side - side - 2);
      return fromPairs(side * side, pairs);
    },
  },
];

/** One family: nanoseconds for each edge, by size. */
export interface PlanarityRow {
  readonly name: string;
  readonly edges: readonly number[];
  readonly nanoseconds: readonly number[];
}

/**
 * Runs the table.
 *
 * @throws {Error} when an answer is wrong
 */
export function planarityBench(): PlanarityRow[] {
  console.log("nanoseconds for each edge, and edges");
  return FAMILIES.map(({ name, planar, make }) => {
    const edges: number[] = [], nanoseconds: number[] = [];
    for (const size of SIZES) {
      const graph = make(size);
      const times: number[] = [];
      for (let i = 0; i <= REPEATED; i++) {
        const started = performance.now();
        const next = planarRotation(graph, new Meter());
        times.push(performance.now() - started);
        if ((next !== undefined) !== planar) throw new Error(`${name}: wrong for ${size} edges`);
        if (next !== undefined && i === 0 && eulerGenus(graph, next) !== 0) {
          throw new Error(`${name}: the embedding is not in the plane`);
        }
      }
      const median = times.slice(1).sort((a, b) => a - b)[REPEATED >> 1];
      edges.push(graph.m);
      nanoseconds.push(1e6 * median / graph.m);
    }
    const cells = edges.map((m, i) =>
      `${nanoseconds[i].toFixed(0).padStart(6)} (${m.toLocaleString("en")})`
    );
    console.log(`${name.padEnd(42)}${cells.join("")}`);
    return { name, edges, nanoseconds };
  });
}

/** The edges of a square grid, ends one after the other. */
function gridPairs(side: number): number[] {
  const pairs: number[] = [];
  for (let v = 0; v < side * side; v++) {
    if (v % side + 1 < side) pairs.push(v, v + 1);
    if (v + side < side * side) pairs.push(v, v + side);
  }
  return pairs;
}

function fromPairs(n: number, pairs: readonly number[]): Graph {
  const m = pairs.length / 2, tails = new Int32Array(m), heads = new Int32Array(m);
  for (let e = 0; e < m; e++) {
    tails[e] = pairs[2 * e];
    heads[e] = pairs[2 * e + 1];
  }
  return graphFromEdges(n, tails, heads);
}
