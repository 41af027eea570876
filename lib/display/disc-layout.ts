/**
 * A projective embedding laid out in a disc whose opposite boundary points are one point. The plane
 * is cut along a shortest odd cycle C: its lift to the double cover splits the sphere into two
 * antipodal halves, and one half, with its rim on a circle, is the disc. Each vertex of C stands
 * twice on the rim, at opposite points; every other vertex stands once, inside.
 *
 * The inside is a barycentric drawing (Tutte, "How to draw a graph", Proc. London Math. Soc. 13,
 * 1963), with a helper point in each face so that faces do not collapse; then it is evened out.
 * O(n·m) for the cycle and O(m) for each sweep: meant for up to some thousands of vertices.
 */
import { dartEnd, dartStart, traceFaces } from "../graph/embedding.ts";
import type { Graph } from "../graph/graph.ts";
import { evenOut } from "./disc-even.ts";
import { liftedEmbedding } from "../parity/double-cover.ts";
import type { EvenFaceEmbedding } from "../parity/even-face-result.ts";

/** The disc. Vertices and edges are those of the double cover that lie in one half. */
export interface DiscLayout {
  /** The double cover, numbered as in parity/double-cover.ts. */
  readonly cover: Graph;
  /** Cover vertices in the disc; vertex x of the cover is vertex x >> 1 of H. */
  readonly vertices: readonly number[];
  /** Cover edges in the disc; edge c of the cover is edge c >> 1 of H. */
  readonly edges: readonly number[];
  /**
   * By cover vertex (meaningful for `vertices`), then by face of the cover: face f at 2n + f
   * (meaningful for faces inside). The disc is the unit disc.
   */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Length 4m: the face of the cover on the left of each dart, and which faces are inside (1). */
  readonly faceOf: Int32Array;
  readonly inside: Uint8Array;
  /** Cover vertices on the rim in order; entry i and entry i + |C| are the same vertex of H. */
  readonly rim: readonly number[];
}

/** Most sweeps of the relaxation. */
const SWEEPS = 2000;
/** Movement below which a relaxation has settled, in radii of the disc. */
const SETTLED = 1e-7;

/**
 * Lays an even-face embedding out in a disc.
 *
 * @param embedding a verified even-face embedding of a connected, non-bipartite graph
 * @returns positions in the unit disc
 */
export function layoutDisc(embedding: EvenFaceEmbedding): DiscLayout {
  const { cover, coverNext } = liftedEmbedding(embedding);
  const rim = antipodalCycle(cover);
  const faces = traceFaces(coverNext);
  const inside = half(cover, rim, faces.of, faces.count);

  const edges: number[] = [], present = new Uint8Array(cover.n);
  for (let e = 0; e < cover.m; e++) {
    if (inside[faces.of[2 * e]] === 0 && inside[faces.of[2 * e + 1]] === 0) continue;
    edges.push(e);
    present[cover.tails[e]] = present[cover.heads[e]] = 1;
  }
  const vertices: number[] = [];
  for (let v = 0; v < cover.n; v++) if (present[v] !== 0) vertices.push(v);
  return {
    cover,
    vertices,
    edges,
    rim,
    faceOf: faces.of,
    inside,
    ...relax(cover, rim, edges, faces.of, inside),
  };
}

/**
 * A shortest odd cycle C of H, lifted: the closed walk of 2|C| cover vertices on which entry i + |C|
 * is the swap of entry i. Breadth-first search from each vertex to its swap.
 */
function antipodalCycle(cover: Graph): number[] {
  let best: number[] = [];
  const parent = new Int32Array(cover.n), queue = new Int32Array(cover.n);
  for (let source = 0; source < cover.n; source += 2) {
    parent.fill(-1);
    parent[source] = source;
    const depth = new Map([[source, 0]]);
    let head = 0, tail = 0;
    queue[tail++] = source;
    while (head < tail && parent[source ^ 1] < 0) {
      const v = queue[head++], next = depth.get(v)! + 1;
      if (best.length > 0 && next >= best.length) break;
      for (let a = cover.offsets[v]; a < cover.offsets[v + 1]; a++) {
        const w = cover.targets[a];
        if (parent[w] >= 0) continue;
        parent[w] = v;
        depth.set(w, next);
        queue[tail++] = w;
      }
    }
    if (parent[source ^ 1] < 0) continue;
    const path: number[] = [];
    for (let v = parent[source ^ 1]; v !== source; v = parent[v]) path.push(v);
    path.push(source);
    path.reverse();
    if (best.length === 0 || path.length < best.length) best = path;
  }
  return [...best, ...best.map((v) => v ^ 1)];
}

/** Faces on one side of the rim: 1, all others 0. */
function half(
  cover: Graph,
  rim: readonly number[],
  faceOf: Int32Array,
  faceCount: number,
): Uint8Array {
  const onRim = new Uint8Array(cover.m);
  let start = -1;
  for (let i = 0; i < rim.length; i++) {
    const v = rim[i], w = rim[(i + 1) % rim.length];
    for (let a = cover.offsets[v]; a < cover.offsets[v + 1]; a++) {
      const e = cover.edgeOf[a];
      if (cover.targets[a] !== w) continue;
      onRim[e] = 1;
      if (start < 0) start = faceOf[cover.tails[e] === v ? 2 * e : 2 * e + 1];
      break;
    }
  }
  // Faces by adjacency, without crossing the rim.
  const around: number[][] = Array.from({ length: faceCount }, () => []);
  for (let d = 0; d < faceOf.length; d++) {
    if (onRim[d >> 1] === 0) around[faceOf[d]].push(faceOf[d ^ 1]);
  }
  const inside = new Uint8Array(faceCount);
  inside[start] = 1;
  const stack = [start];
  for (let f = stack.pop(); f !== undefined; f = stack.pop()) {
    for (const g of around[f]) {
      if (inside[g] !== 0) continue;
      inside[g] = 1;
      stack.push(g);
    }
  }
  return inside;
}

/** Springs between points: cover vertices first, then one point for each face. */
interface Springs {
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** Positive. */
  readonly strength: Float64Array;
}

function relax(
  cover: Graph,
  rim: readonly number[],
  edges: readonly number[],
  faceOf: Int32Array,
  inside: Uint8Array,
): { x: Float64Array; y: Float64Array } {
  const points = cover.n + inside.length;
  const x = new Float64Array(points), y = new Float64Array(points);
  const fixed = new Uint8Array(points);
  rim.forEach((v, i) => {
    const angle = (2 * Math.PI * i) / rim.length;
    fixed[v] = 1;
    x[v] = Math.cos(angle);
    y[v] = Math.sin(angle);
  });
  settle(springsOf(cover, edges, faceOf, inside), fixed, x, y);
  evenOut({
    x,
    y,
    fixed,
    triangles: trianglesOf(cover, faceOf, inside, fixed),
    edges: edges.map((e) => [cover.tails[e], cover.heads[e]]),
  });
  return { x, y };
}

/** The stars of the inner faces. A face that meets a vertex twice is none; its corners stay. */
function trianglesOf(
  cover: Graph,
  faceOf: Int32Array,
  inside: Uint8Array,
  fixed: Uint8Array,
): [number, number, number][] {
  const simple = inside.slice();
  const met = new Set<number>();
  for (let d = 0; d < faceOf.length; d++) {
    const corner = faceOf[d] * cover.n + dartStart(cover, d);
    if (met.has(corner)) simple[faceOf[d]] = 0;
    met.add(corner);
  }
  const triangles: [number, number, number][] = [];
  for (let d = 0; d < faceOf.length; d++) {
    const f = faceOf[d], u = dartStart(cover, d);
    if (simple[f] !== 0) triangles.push([cover.n + f, u, dartEnd(cover, d)]);
    else if (inside[f] !== 0) fixed[u] = 1;
  }
  return triangles;
}

function springsOf(
  cover: Graph,
  edges: readonly number[],
  faceOf: Int32Array,
  inside: Uint8Array,
): Springs {
  const from: number[] = [], to: number[] = [];
  for (const e of edges) {
    from.push(cover.tails[e]);
    to.push(cover.heads[e]);
  }
  const length = new Int32Array(inside.length);
  for (let d = 0; d < faceOf.length; d++) length[faceOf[d]]++;
  const strength = new Array<number>(from.length).fill(1);
  for (let d = 0; d < faceOf.length; d++) {
    if (inside[faceOf[d]] === 0) continue;
    from.push(cover.n + faceOf[d]);
    to.push(dartStart(cover, d));
    strength.push(1 / length[faceOf[d]]);
  }
  return {
    from: Int32Array.from(from),
    to: Int32Array.from(to),
    strength: new Float64Array(strength),
  };
}

/** Moves every free point to the weighted mean of its neighbours until nothing moves much. */
function settle(springs: Springs, fixed: Uint8Array, x: Float64Array, y: Float64Array): void {
  const { from, to, strength } = springs;
  const points = fixed.length;
  const offsets = new Int32Array(points + 1);
  for (let s = 0; s < from.length; s++) {
    offsets[from[s] + 1]++;
    offsets[to[s] + 1]++;
  }
  for (let p = 0; p < points; p++) offsets[p + 1] += offsets[p];
  const next = offsets.slice(0, points);
  const far = new Int32Array(2 * from.length), pull = new Float64Array(2 * from.length);
  for (let s = 0; s < from.length; s++) {
    const a = next[from[s]]++, b = next[to[s]]++;
    far[a] = to[s];
    far[b] = from[s];
    pull[a] = pull[b] = strength[s];
  }
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    let moved = 0;
    for (let p = 0; p < points; p++) {
      if (fixed[p] !== 0 || offsets[p] === offsets[p + 1]) continue;
      let sx = 0, sy = 0, total = 0;
      for (let a = offsets[p]; a < offsets[p + 1]; a++) {
        sx += pull[a] * x[far[a]];
        sy += pull[a] * y[far[a]];
        total += pull[a];
      }
      // Over-relaxed: steps a good half longer than the mean asks for settle many times sooner.
      const dx = 1.7 * (sx / total - x[p]), dy = 1.7 * (sy / total - y[p]);
      x[p] += dx;
      y[p] += dy;
      moved = Math.max(moved, Math.abs(dx), Math.abs(dy));
    }
    if (moved < SETTLED) return;
  }
}
