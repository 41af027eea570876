/**
 * Recognition of even-face embeddings: decides for every graph whether it can be drawn in the
 * projective plane so that every face is a closed walk of even length, and draws it. Near-linear
 * time; a million vertices take seconds.
 *
 * The odd cycles of an embedded graph are its one-sided ones, so any two of them meet. The lift to the
 * sphere is a planar embedding of the double cover H × K₂ which swapping the sheets turns into its
 * mirror image. This is found in steps, each exact:
 *
 * 1. One block B holds all odd cycles, or all odd blocks share a vertex that meets all odd cycles.
 *    The rest hangs on B by single vertices and only has to be planar.
 * 2. The cover of B is planar. If the embedding that the planarity test gives is not antipodal:
 * 3. if one vertex meets all odd cycles, even-face-split.ts decides by one planarity test;
 * 4. otherwise the cover has a piece in the middle with a unique embedding, and even-face-repair.ts
 *    turns over what hangs on it. Still not antipodal means that swapping keeps orientation in the
 *    middle, and there is no even-face embedding.
 *
 * An embedding is verified on the whole cover before it is returned, whatever the path to it.
 */
import { isRotationSystem, signedEulerGenus, traceFaces } from "../graph/embedding.ts";
import { type Graph, graphFromEdges, type Subgraph } from "../graph/graph.ts";
import type { Kuratowski } from "../graph/kuratowski.ts";
import { extractKuratowski } from "../graph/kuratowski-extract.ts";
import { planarRotation } from "../graph/planarity.ts";
import { breadthFirst, isScattered } from "../graph/relabel.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import type { Meter } from "../run/meter.ts";
import { doubleCover, liftDart } from "./double-cover.ts";
import { oddBlocks } from "./even-face-blocks.ts";
import { isAntipodal, mirrorTwins, vertexOfAllOddCycles } from "./even-face-repair.ts";
import type { EvenFaceResult, NoEvenFaceReason } from "./even-face-result.ts";
import { embedThroughVertex } from "./even-face-split.ts";

/** What the recognition can be asked to leave out. */
export interface EvenFaceOptions {
  /** Find a Kuratowski subdivision when the cover is not planar (default true); it can take long. */
  readonly witness?: boolean;
}

/**
 * Decides whether a graph has an even-face embedding in the projective plane.
 *
 * @param graph any graph
 * @param meter counts about thirty units for each edge
 * @param options whether a "no" for lack of planarity comes with its witness
 * @returns the embedding, verified, or the reason why there is none
 * @throws {Interrupted} when the meter runs out
 *
 * @example
 * ```ts
 * import { graphFromPairs } from "../graph/graph.ts";
 * import { evenFaceEmbedding } from "./even-face.ts";
 * import { Meter } from "../run/meter.ts";
 * const k4 = graphFromPairs(4, [[0, 1], [0, 2], [0, 3], [1, 2], [1, 3], [2, 3]]);
 * console.assert(evenFaceEmbedding(k4, new Meter()).kind === "embedded");
 * ```
 */
export function evenFaceEmbedding(
  graph: Graph,
  meter: Meter,
  options: EvenFaceOptions = {},
): EvenFaceResult {
  // Work where neighbours are near in memory; the answer is in the caller's numbers.
  const local = isScattered(graph) ? breadthFirst(graph) : whole(graph);
  const answer = embed(local.graph, meter);
  if (answer.kind === "embedded") {
    // The signature says that the cover is this rotation and its mirror image; so the cover lies in
    // the sphere exactly if H lies in the projective plane.
    const twisted = new Uint8Array(graph.m).fill(1);
    const { next } = answer;
    meter.tick(4 * graph.m);
    const isRotation = isRotationSystem(local.graph, next);
    meter.tick(4 * graph.m);
    if (!isRotation || signedEulerGenus(local.graph, { next, twisted }) !== 1) {
      throw new Error("the embedding found is not an even-face embedding");
    }
    const moved = local.graph === graph ? next : translatedRotation(next, local);
    return { kind: "embedded", graph, next: moved };
  }
  const { reason, culprit } = answer;
  if (culprit === undefined || options.witness === false) return { kind: "no", reason };
  const found = extractKuratowski(doubleCover(culprit.graph), meter);
  return { kind: "no", reason, kuratowski: translated(translated(found, culprit), local) };
}

/** A rotation system of the graph; or the reason, with a part whose cover is not planar. */
type Found =
  | { readonly kind: "embedded"; readonly next: Int32Array }
  | { readonly kind: "no"; readonly reason: NoEvenFaceReason; readonly culprit?: Subgraph };

function embed(graph: Graph, meter: Meter): Found {
  const blocks = oddBlocks(graph, meter);
  if (blocks.components !== 1) return { kind: "no", reason: "not connected" };
  if (blocks.odd.length === 0) return { kind: "no", reason: "bipartite" };
  if (blocks.odd.length > 1) {
    const v = blocks.shared;
    const side = v < 0 ? undefined : sidesWithout(graph, v);
    if (side === undefined) return { kind: "no", reason: "odd cycles in separate blocks" };
    return orCulprit(embedThroughVertex(graph, v, side, meter), whole(graph));
  }
  const inCore = new Uint8Array(graph.m);
  for (let e = 0; e < graph.m; e++) inCore[e] = blocks.blockOf[e] === blocks.odd[0] ? 1 : 0;
  if (inCore.indexOf(0) < 0) return embedCore(whole(graph), meter);
  const core = edgeSubgraph(graph, inCore, 1);
  const found = embedCore(core, meter);
  if (found.kind === "no") return found;
  const rest = edgeSubgraph(graph, inCore, 0);
  const restNext = planarRotation(rest.graph, meter);
  if (restNext === undefined) return orCulprit(undefined, rest);
  return { kind: "embedded", next: hangOn(graph, core, found.next, rest, restNext) };
}

/** Embeds a 2-connected graph that is not bipartite, or says why not. */
function embedCore(core: Subgraph, meter: Meter): Found {
  const { graph } = core;
  const cover = doubleCover(graph);
  let coverNext = planarRotation(cover, meter);
  if (coverNext === undefined) return orCulprit(undefined, core);
  if (!isAntipodal(coverNext)) {
    const v = vertexOfAllOddCycles(cover, traceFaces(coverNext));
    const side = v < 0 ? undefined : sidesWithout(graph, v);
    if (side !== undefined) {
      return orCulprit(embedThroughVertex(graph, v, side, meter), core);
    }
    coverNext = mirrorTwins(cover, coverNext, meter);
    if (coverNext === undefined) return { kind: "no", reason: "orientation kept" };
  }
  const next = new Int32Array(2 * graph.m);
  for (let d = 0; d < next.length; d++) {
    const c = coverNext[liftDart(d, 0)];
    next[d] = ((c >> 2) << 1) | (c & 1);
  }
  return { kind: "embedded", next };
}

function orCulprit(next: Int32Array | undefined, culprit: Subgraph): Found {
  if (next === undefined) return { kind: "no", reason: "cover not planar", culprit };
  return { kind: "embedded", next };
}

/** A two-colouring of the graph without v, or undefined. */
function sidesWithout(graph: Graph, v: number): Uint8Array | undefined {
  const keep = new Uint8Array(graph.n).fill(1);
  keep[v] = 0;
  return twoColouring(graph, keep).side;
}

/** The graph as a part of itself. */
function whole(graph: Graph): Subgraph {
  return { graph, vertices: counted(graph.n), edges: counted(graph.m) };
}

function counted(length: number): Int32Array {
  const numbers = new Int32Array(length);
  for (let i = 0; i < length; i++) numbers[i] = i;
  return numbers;
}

/** The edges marked with `mark`, and their ends. */
function edgeSubgraph(graph: Graph, marks: Uint8Array, mark: number): Subgraph {
  const index = new Int32Array(graph.n).fill(-1);
  let m = 0, n = 0;
  for (let e = 0; e < graph.m; e++) {
    if (marks[e] !== mark) continue;
    m++;
    index[graph.tails[e]] = index[graph.heads[e]] = 0;
  }
  for (let v = 0; v < graph.n; v++) if (index[v] === 0) index[v] = n++;
  const vertices = new Int32Array(n), edges = new Int32Array(m);
  for (let v = 0; v < graph.n; v++) if (index[v] >= 0) vertices[index[v]] = v;
  for (let e = 0, at = 0; e < graph.m; e++) if (marks[e] === mark) edges[at++] = e;
  return {
    graph: graphFromEdges(
      n,
      edges.map((e) => index[graph.tails[e]]),
      edges.map((e) => index[graph.heads[e]]),
    ),
    vertices,
    edges,
  };
}

/** A rotation system of a part with all edges, in the numbers of the whole. */
function translatedRotation(next: Int32Array, part: Subgraph): Int32Array {
  const { edges } = part;
  const moved = new Int32Array(next.length);
  for (let d = 0; d < next.length; d++) {
    moved[2 * edges[d >> 1] + (d & 1)] = 2 * edges[next[d] >> 1] + (next[d] & 1);
  }
  return moved;
}

/** A subdivision in the cover of a part, in the cover of the whole. */
function translated(found: Kuratowski, part: Subgraph): Kuratowski {
  return {
    kind: found.kind,
    branches: found.branches.map((x) => 2 * part.vertices[x >> 1] + (x & 1)),
    paths: found.paths.map((path) => path.map((c) => 2 * part.edges[c >> 1] + (c & 1))),
  };
}

/** Draws planar bipartite parts beside the vertices of the core on which they hang. */
function hangOn(
  graph: Graph,
  core: Subgraph,
  coreNext: Int32Array,
  rest: Subgraph,
  restNext: Int32Array,
): Int32Array {
  const next = new Int32Array(2 * graph.m);
  const wholeDart = (part: Subgraph, d: number) => 2 * part.edges[d >> 1] + (d & 1);
  const coreDart = new Int32Array(graph.n).fill(-1); // a dart of the core at each of its vertices
  for (let d = 0; d < coreNext.length; d++) {
    next[wholeDart(core, d)] = wholeDart(core, coreNext[d]);
    const ends = (d & 1) === 0 ? core.graph.tails : core.graph.heads;
    coreDart[core.vertices[ends[d >> 1]]] = wholeDart(core, d);
  }
  // Sheets of the rest: the core's vertices on sheet 0, and from there by parity. Sheet 1 is mirrored.
  const { n, offsets, targets } = rest.graph;
  const sheet = new Uint8Array(n).fill(2), queue: number[] = [];
  for (let v = 0; v < n; v++) {
    if (coreDart[rest.vertices[v]] < 0) continue;
    sheet[v] = 0;
    queue.push(v);
  }
  for (let head = 0; head < queue.length; head++) {
    const v = queue[head];
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (sheet[targets[a]] !== 2) continue;
      sheet[targets[a]] = 1 - sheet[v];
      queue.push(targets[a]);
    }
  }
  const restDart = new Int32Array(n).fill(-1);
  for (let d = 0; d < restNext.length; d++) {
    const v = (d & 1) === 0 ? rest.graph.tails[d >> 1] : rest.graph.heads[d >> 1];
    const [from, to] = sheet[v] === 0 ? [d, restNext[d]] : [restNext[d], d];
    next[wholeDart(rest, from)] = wholeDart(rest, to);
    restDart[v] = wholeDart(rest, d);
  }
  // Where both meet, one cycle of darts is spliced into the other.
  for (let v = 0; v < n; v++) {
    const a = coreDart[rest.vertices[v]], b = restDart[v];
    if (a < 0) continue;
    [next[a], next[b]] = [next[b], next[a]];
  }
  return next;
}
