/**
 * Least odd cycle transversals of graphs with an even-face embedding in the projective plane. There
 * the odd cycles are the one-sided ones, and a set of vertices meets them all exactly if a one-sided
 * closed curve through faces and through vertices of the set can be drawn that touches the graph
 * nowhere else. So a shortest such curve is sought: in the cover, a shortest way from (v,0) to (v,1)
 * that alternates between vertices and faces. It crosses every odd cycle, so the vertices of a short
 * one will do as starts: O(length of the cycle · (n + m)) time. Where that is too much, one start
 * gives an upper bound, and short searches from the others tell whether a small number will do.
 */
import { traceFaces } from "../graph/embedding.ts";
import type { Graph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import { liftedEmbedding } from "./double-cover.ts";
import type { EvenFaceEmbedding } from "./even-face-result.ts";
import { EXACT_UP_TO, type Transversal } from "./transversal.ts";

/** Arcs that the full searches from all starts may scan together. */
const FULL_SCANS = 300_000_000;

/**
 * Finds a least odd cycle transversal on an embedding.
 *
 * @param embedding a graph H with its even-face embedding
 * @param meter counts about one unit for each arc; when it runs out the bounds so far return
 * @returns a transversal, with one odd cycle: there are no two disjoint ones. Least if it has at most
 *   twelve vertices, or if the graph is of moderate size (about 10,000 vertices).
 */
export function embeddedTransversal(
  embedding: EvenFaceEmbedding,
  meter: Meter,
): Transversal {
  const { graph } = embedding;
  const { oddCycle } = twoColouring(graph);
  if (oddCycle === undefined) throw new RangeError("expected a graph that is not bipartite");
  const search = new CurveSearch(embedding);
  const full = oddCycle.length * 4 * (graph.n + graph.m) <= FULL_SCANS;
  // The odd cycle itself meets all odd cycles: no two are disjoint.
  let best: ArrayLike<number> = oddCycle;
  let lower = 1;
  let stopped: Transversal["stopped"];
  try {
    for (const [i, v] of oddCycle.entries()) {
      const most = full || i === 0 ? best.length - 1 : Math.min(best.length - 1, EXACT_UP_TO);
      best = search.from(v, most, meter) ?? best;
    }
    lower = full ? best.length : Math.min(best.length, EXACT_UP_TO + 1);
    if (lower < best.length) stopped = "limit";
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    stopped = error.reason;
  }
  const vertices = Int32Array.from(best).sort();
  const found = { lower, upper: vertices.length, vertices, cycles: [oddCycle] };
  return stopped === undefined ? found : { ...found, stopped };
}

class CurveSearch {
  readonly #cover: Graph;
  /** Length 2·edges of the cover: the face on the left of each dart. */
  readonly #faceOf: Int32Array;
  // The darts of each face, in compressed sparse rows.
  readonly #faceStart: Int32Array;
  readonly #faceDarts: Int32Array;
  /** For each vertex and each face of the cover: where it was reached from, stamped. */
  readonly #vertexFrom: Int32Array;
  readonly #vertexStamp: Int32Array;
  readonly #faceStamp: Int32Array;
  readonly #queue: Int32Array;
  readonly #depth: Int32Array;
  #now = 0;

  constructor(embedding: EvenFaceEmbedding) {
    const { cover, coverNext } = liftedEmbedding(embedding);
    const { count, of } = traceFaces(coverNext);
    this.#cover = cover;
    this.#faceOf = of;
    this.#faceStart = new Int32Array(count + 1);
    for (const f of of) this.#faceStart[f + 1]++;
    for (let f = 0; f < count; f++) this.#faceStart[f + 1] += this.#faceStart[f];
    const next = this.#faceStart.slice(0, count);
    this.#faceDarts = new Int32Array(of.length);
    for (let d = 0; d < of.length; d++) this.#faceDarts[next[of[d]]++] = d;
    this.#vertexFrom = new Int32Array(cover.n);
    this.#vertexStamp = new Int32Array(cover.n);
    this.#faceStamp = new Int32Array(count);
    this.#queue = new Int32Array(cover.n);
    this.#depth = new Int32Array(cover.n);
  }

  /** The vertices of H on a shortest curve from (v,0) to (v,1), if there are at most `most`. */
  from(v: number, most: number, meter: Meter): number[] | undefined {
    const { offsets, edgeOf, tails, heads } = this.#cover;
    const stamp = ++this.#now, queue = this.#queue, depth = this.#depth;
    const start = 2 * v, goal = start ^ 1;
    let head = 0, tail = 0;
    queue[tail++] = start;
    this.#vertexStamp[start] = stamp;
    depth[start] = 0;
    while (head < tail) {
      const x = queue[head++];
      if (depth[x] === most) return undefined;
      let work = offsets[x + 1] - offsets[x];
      for (let a = offsets[x]; a < offsets[x + 1]; a++) {
        const face = this.#faceOf[2 * edgeOf[a] + (tails[edgeOf[a]] === x ? 0 : 1)];
        if (this.#faceStamp[face] === stamp) continue;
        this.#faceStamp[face] = stamp;
        work += this.#faceStart[face + 1] - this.#faceStart[face];
        for (let i = this.#faceStart[face]; i < this.#faceStart[face + 1]; i++) {
          const d = this.#faceDarts[i];
          const y = (d & 1) === 0 ? tails[d >> 1] : heads[d >> 1];
          if (this.#vertexStamp[y] === stamp) continue;
          this.#vertexStamp[y] = stamp;
          this.#vertexFrom[y] = x;
          depth[y] = depth[x] + 1;
          queue[tail++] = y;
        }
      }
      meter.tick(work);
      if (this.#vertexStamp[goal] === stamp) return this.#walk(start, goal);
    }
    return undefined;
  }

  #walk(start: number, goal: number): number[] {
    const vertices = new Set<number>();
    for (let x = goal; x !== start; x = this.#vertexFrom[x]) vertices.add(x >> 1);
    return [...vertices];
  }
}
