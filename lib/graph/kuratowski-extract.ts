/**
 * Finds a Kuratowski subdivision in a graph that is not planar, by testing smaller and smaller
 * subgraphs.
 *
 * A spanning forest and a few other edges are often enough to be non-planar, and then shrink to a
 * handful of edges once chains and parallels are merged. So each round tries, in this order: the
 * forest with the back edges the failed test had met; with the last 8, 64, 512, … of them (a local
 * obstruction); with so many random ones (an obstruction of the whole surface); and if nothing helps,
 * leaving out chunks, down to single edges. When no edge can be left out, K₅ or K₃,₃ is left. Every
 * step is one linear-time test; their number is about log m in practice, and O(m) at worst.
 */
import type { Graph } from "./graph.ts";
import { degree } from "./graph.ts";
import type { Kuratowski } from "./kuratowski.ts";
import { compress, type Skeleton, trivialSkeleton } from "./kuratowski-shrink.ts";
import { orient } from "./planarity-orientation.ts";
import { decideSides } from "./planarity-test.ts";
import type { Meter } from "../run/meter.ts";
import { Random } from "../run/random.ts";

/** A trial must drop this share of the edges, or chunks are tried instead. */
const WORTHWHILE = 0.8;
/** How fast the numbers of back edges tried grow. */
const GROWTH = 8;

/**
 * Finds a Kuratowski subdivision.
 *
 * @param graph a graph that is not planar
 * @param meter counts the work of all tests
 * @returns a subdivision that `kuratowskiProblem` accepts
 * @throws {RangeError} when the graph is planar
 * @throws {Interrupted} when the meter runs out
 */
export function extractKuratowski(graph: Graph, meter: Meter): Kuratowski {
  const random = new Random(graph.m);
  if (isPlanar(graph, meter)) throw new RangeError("expected a graph that is not planar");
  let skeleton = trivialSkeleton(graph);
  while (true) {
    const smaller = shrink(skeleton, random, meter);
    if (smaller === undefined) return classify(skeleton);
    skeleton = smaller;
  }
}

function isPlanar(graph: Graph, meter: Meter): boolean {
  return !("met" in decideSides(orient(graph, meter), meter));
}

/** A smaller skeleton that is still not planar; undefined when every edge is needed. */
function shrink(skeleton: Skeleton, random: Random, meter: Meter): Skeleton | undefined {
  const { m } = skeleton.graph;
  const attempt = (keep: Uint8Array): Skeleton | undefined => {
    const smaller = compress(skeleton, keep);
    return isPlanar(smaller.graph, meter) ? undefined : smaller;
  };
  const whole = compress(skeleton, new Uint8Array(m).fill(1));
  if (whole.graph.m < m || whole.graph.n < skeleton.graph.n) return whole;

  const orientation = orient(skeleton.graph, meter);
  const sides = decideSides(orientation, meter);
  if (!("met" in sides)) throw new RangeError("expected a graph that is not planar");
  const { target, dart, start, n } = orientation;
  const tree = new Uint8Array(m);
  for (let v = 0; v < n; v++) {
    for (let k = start[v]; k < start[v + 1]; k++) if (target[k] > v) tree[dart[k] >> 1] = 1;
  }
  const met = Int32Array.from(sides.met, (k) => dart[k] >> 1);
  if (m > 64) {
    const recent = met.slice().reverse();
    for (const order of [recent, random.shuffle(met.slice())]) {
      for (let size = 8; size < GROWTH * order.length; size *= GROWTH) {
        const keep = tree.slice();
        const count = Math.min(size, order.length);
        for (let i = 0; i < count; i++) keep[order[i]] = 1;
        const smaller = attempt(keep);
        if (smaller === undefined) continue;
        if (smaller.graph.m <= WORTHWHILE * m) return smaller;
        break;
      }
    }
  }

  // Leave out one chunk after another, in the order of the search, chunks getting smaller.
  const keep = new Uint8Array(m).fill(1);
  let left = m;
  for (let chunk = Math.ceil(m / 4);; chunk = Math.ceil(chunk / 4)) {
    for (let from = 0; from < m; from += chunk) {
      const to = Math.min(m, from + chunk);
      for (let k = from; k < to; k++) keep[dart[k] >> 1] = 0;
      if (attempt(keep) !== undefined) left -= to - from;
      else for (let k = from; k < to; k++) keep[dart[k] >> 1] = 1;
    }
    if (left < m) return compress(skeleton, keep);
    if (chunk === 1) return undefined;
  }
}

/** Reads the subdivision off a skeleton that is K₅ or K₃,₃. */
function classify({ graph, vertices, pathStart, pathEdges }: Skeleton): Kuratowski {
  const order: number[] = [];
  const kind = graph.n === 5 ? "K5" : "K3,3";
  if (kind === "K5") order.push(0, 1, 2, 3, 4);
  else {
    const near = new Uint8Array(graph.n);
    for (let a = graph.offsets[0]; a < graph.offsets[1]; a++) near[graph.targets[a]] = 1;
    for (const side of [0, 1]) {
      for (let v = 0; v < graph.n; v++) if (near[v] === side) order.push(v);
    }
  }
  const wanted = kind === "K5" ? [5, 4, 10] : [6, 3, 9];
  if (graph.n !== wanted[0] || graph.m !== wanted[2] || degree(graph, 0) !== wanted[1]) {
    throw new RangeError(`a minimal non-planar graph has ${graph.n} vertices, ${graph.m} edges`);
  }
  const paths: Int32Array[] = [];
  for (let i = 0; i < graph.n; i++) {
    for (let j = i + 1; j < graph.n; j++) {
      if (kind === "K3,3" && (i < 3) === (j < 3)) continue;
      for (let a = graph.offsets[order[i]]; a < graph.offsets[order[i] + 1]; a++) {
        if (graph.targets[a] !== order[j]) continue;
        const e = graph.edgeOf[a];
        const path = pathEdges.slice(pathStart[e], pathStart[e + 1]);
        paths.push(graph.tails[e] === order[i] ? path : path.reverse());
      }
    }
  }
  return { kind, branches: Int32Array.from(order, (v) => vertices[v]), paths };
}
