/**
 * Embeddings of graphs in surfaces as rotation systems on darts: faces, Euler genus, and signatures
 * for surfaces that are not orientable. Everything here is linear in the number of edges.
 *
 * Dart 2e runs from tails[e] to heads[e], dart 2e + 1 the other way, so `d ^ 1` is the reverse of d
 * and `d >> 1` its edge. A *rotation system* is an array `next` of length 2m: next[d] is the dart
 * that follows d counterclockwise around the vertex where d starts. The face on the left of d goes
 * on, at the far end of d, with the dart that comes before the reverse of d: prev[d ^ 1]. So a face
 * is walked with its inside on the left.
 */
import { components } from "./components.ts";
import type { Graph } from "./graph.ts";

/** The vertex where dart d starts. */
export function dartStart(graph: Graph, d: number): number {
  return (d & 1) === 0 ? graph.tails[d >> 1] : graph.heads[d >> 1];
}

/** The vertex where dart d ends. */
export function dartEnd(graph: Graph, d: number): number {
  return (d & 1) === 0 ? graph.heads[d >> 1] : graph.tails[d >> 1];
}

/**
 * The inverse permutation of a rotation system: the dart before d, that is next clockwise.
 *
 * @param next length 2m, a permutation of the darts
 * @returns `prev`, length 2m, with prev[next[d]] = d; it is also the mirror image of `next`
 */
export function mirrored(next: Int32Array): Int32Array {
  const prev = new Int32Array(next.length);
  for (let d = 0; d < next.length; d++) prev[next[d]] = d;
  return prev;
}

/**
 * Whether `next` is a rotation system of the graph: its cycles are exactly the darts around each
 * vertex that has any.
 *
 * @param graph any graph
 * @param next expected to have length 2m; anything is answered
 * @returns whether it is a rotation system. O(n + m) time.
 */
export function isRotationSystem(graph: Graph, next: Int32Array): boolean {
  const { n, m } = graph;
  if (next.length !== 2 * m) return false;
  const first = new Int32Array(n).fill(-1);
  for (let d = 0; d < 2 * m; d++) {
    if (!(next[d] >= 0 && next[d] < 2 * m)) return false;
    first[dartStart(graph, d)] = d;
  }
  for (let v = 0; v < n; v++) {
    if (first[v] < 0) continue;
    // The right number of steps back to the first dart, never sooner, all at v: one cycle.
    const steps = graph.offsets[v + 1] - graph.offsets[v];
    let d = first[v];
    for (let i = 1; i <= steps; i++) {
      d = next[d];
      if (dartStart(graph, d) !== v || (d === first[v]) !== (i === steps)) return false;
    }
  }
  return true;
}

/** The faces of an embedding. */
export interface Faces {
  /** Number of faces with at least one edge; an isolated vertex has none here. */
  readonly count: number;
  /** Length 2m: the face on the left of each dart, numbered by their least dart. */
  readonly of: Int32Array;
}

/**
 * Traces the faces of an embedding in an orientable surface.
 *
 * @param next length 2m, a rotation system
 * @param prev its inverse, if it is at hand
 * @returns the face on the left of each dart. O(m) time.
 */
export function traceFaces(next: Int32Array, prev: Int32Array = mirrored(next)): Faces {
  const of = new Int32Array(next.length).fill(-1);
  let count = 0;
  for (let start = 0; start < of.length; start++) {
    if (of[start] >= 0) continue;
    let d = start;
    do {
      of[d] = count;
      d = prev[d ^ 1];
    } while (d !== start);
    count++;
  }
  return { count, of };
}

/**
 * The Euler genus of the embedding: 2 - (vertices - edges + faces), added up over the components,
 * each in a surface of its own. It is 0 exactly if every component lies in the sphere.
 *
 * @param graph any graph
 * @param next length 2m, a rotation system of it
 * @returns the sum of the Euler genera, an even integer >= 0. O(n + m) time.
 */
export function eulerGenus(graph: Graph, next: Int32Array): number {
  return genusFromFaces(graph, traceFaces(next).count);
}

function genusFromFaces(graph: Graph, faceCount: number): number {
  let isolated = 0;
  for (let v = 0; v < graph.n; v++) if (graph.offsets[v] === graph.offsets[v + 1]) isolated++;
  return 2 * components(graph).count - (graph.n - graph.m + faceCount + isolated);
}

/**
 * An embedding in a surface that need not be orientable: a rotation at each vertex, counterclockwise
 * in the vertex's own sense of rotation, and for each edge whether the senses at its ends disagree
 * along it. A cycle is one-sided exactly if its number of twisted edges is odd.
 */
export interface SignedEmbedding {
  /** Length 2m, a rotation system. */
  readonly next: Int32Array;
  /** Length m, entries 0 and 1: 1 where the edge reverses the sense of rotation. */
  readonly twisted: Uint8Array;
}

/** The faces of a signed embedding: each is a closed walk, here as its length in edges. */
export interface SignedFaces {
  /** Number of faces with at least one edge. */
  readonly count: number;
  /** Length `count`: number of edges on the walk around each face. */
  readonly lengths: Int32Array;
}

/**
 * Traces the faces of a signed embedding.
 *
 * @param embedding a rotation system with signatures
 * @returns each face once, in order of its least dart. O(m) time.
 */
export function traceSignedFaces({ next, twisted }: SignedEmbedding): SignedFaces {
  const prev = mirrored(next);
  // State 2d + s: dart d is walked with the face on the left in the sense s of its start (1: mirrored).
  const seen = new Uint8Array(2 * next.length);
  const lengths: number[] = [];
  for (let start = 0; start < seen.length; start++) {
    if (seen[start] !== 0) continue;
    let state = start, length = 0;
    do {
      seen[state] = 1;
      length++;
      const d = state >> 1, s = (state & 1) ^ twisted[d >> 1];
      // The same corner, walked the other way round in the mirrored sense, is the same face.
      seen[((d ^ 1) << 1) | (s ^ 1)] = 1;
      state = ((s === 0 ? prev[d ^ 1] : next[d ^ 1]) << 1) | s;
    } while (state !== start);
    lengths.push(length);
  }
  return { count: lengths.length, lengths: Int32Array.from(lengths) };
}

/**
 * The Euler genus of a signed embedding, added up over the components: 0 for spheres, 1 for one
 * projective plane.
 *
 * @param graph any graph
 * @param embedding a rotation system of it with signatures
 * @returns the sum of the Euler genera, an integer >= 0. O(n + m) time.
 */
export function signedEulerGenus(graph: Graph, embedding: SignedEmbedding): number {
  return genusFromFaces(graph, traceSignedFaces(embedding).count);
}
