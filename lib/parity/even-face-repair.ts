/**
 * Makes a planar embedding of a double cover antipodal where that is possible: parts behind two
 * vertices can be turned over, and an arbitrary embedding may have turned them the wrong way. Each
 * such part gets the mirror image of the embedding of its twin.
 *
 * Why this is enough. Let B be 2-connected and not bipartite, no vertex meeting all its odd cycles,
 * its cover embedded in the plane. Swapping the sheets permutes the pieces of the cover's tree of
 * 3-connected components. Were a pair {x, y} of separating vertices mapped to itself, then y would be
 * the twin of x and x's vertex would meet all odd cycles. So exactly one piece is its own twin, it is
 * 3-connected, and all that hangs on it comes in twins without common edges, each with less than half
 * of the edges. The piece in the middle has one embedding up to reflection; the rest may be chosen
 * freely on one side and mirrored on the other. Near-linear time.
 */
import {
  dartStart,
  eulerGenus,
  type Faces,
  isRotationSystem,
  mirrored,
  traceFaces,
} from "../graph/embedding.ts";
import type { Graph } from "../graph/graph.ts";
import { type CutOff, cutOffParts } from "../graph/planarity-separators.ts";
import type { Meter } from "../run/meter.ts";

/** Whether swapping the sheets (dart d ^ 2) mirrors the rotation system. Linear time. */
export function isAntipodal(coverNext: Int32Array): boolean {
  for (let d = 0; d < coverNext.length; d++) {
    if (coverNext[coverNext[d] ^ 2] !== (d ^ 2)) return false;
  }
  return true;
}

/**
 * A vertex of the base graph both of whose lifts lie on two common faces, if there is one. In a
 * 2-connected graph that is not bipartite these are the vertices that meet all odd cycles.
 *
 * @param cover the double cover, numbered as in double-cover.ts, 2-connected
 * @param faces the faces of a planar embedding of it
 * @returns a vertex of the base graph, or -1
 */
export function vertexOfAllOddCycles(cover: Graph, faces: Faces): number {
  // Darts in rows by face.
  const row = new Int32Array(faces.count + 1);
  for (let d = 0; d < 2 * cover.m; d++) row[faces.of[d] + 1]++;
  for (let f = 0; f < faces.count; f++) row[f + 1] += row[f];
  const darts = new Int32Array(2 * cover.m), fill = row.slice(0, faces.count);
  for (let d = 0; d < 2 * cover.m; d++) darts[fill[faces.of[d]]++] = d;
  const seen = new Int32Array(cover.n).fill(-1), common = new Uint8Array(cover.n >> 1);
  for (let f = 0; f < faces.count; f++) {
    for (let i = row[f]; i < row[f + 1]; i++) {
      const x = dartStart(cover, darts[i]);
      seen[x] = f;
      if (seen[x ^ 1] === f && ++common[x >> 1] === 2) return x >> 1;
    }
  }
  return -1;
}

/**
 * Mirrors what hangs behind two vertices so that it is embedded as its twin is.
 *
 * @param cover the double cover of a 2-connected graph that is not bipartite and in which no vertex
 *   meets all odd cycles
 * @param coverNext length 4m, a planar rotation system of it
 * @param meter counts about twenty units for each edge of the cover
 * @returns an antipodal planar rotation system; undefined if there is none
 */
export function mirrorTwins(
  cover: Graph,
  coverNext: Int32Array,
  meter: Meter,
): Int32Array | undefined {
  const faces = traceFaces(coverNext);
  const suspect = suspectFaces(coverNext, faces);
  // Where the embedding is antipodal already nothing has to be turned; so look at the other faces
  // first. What decides in the end is the search through all faces.
  for (const among of suspect.indexOf(0) < 0 ? [undefined] : [suspect, undefined]) {
    const parts = cutOffParts(cover, coverNext, faces, meter, among);
    const next = turned(cover, coverNext, parts, meter);
    if (isAntipodal(next) && isRotationSystem(cover, next) && eulerGenus(cover, next) === 0) {
      return next;
    }
  }
  return undefined;
}

/** Length faces.count: 1 for faces whose image under the swap is not the mirror image of a face. */
function suspectFaces(coverNext: Int32Array, faces: Faces): Uint8Array {
  const suspect = new Uint8Array(faces.count);
  for (let d = 0; d < coverNext.length; d++) {
    const c = coverNext[d];
    if (coverNext[c ^ 2] === (d ^ 2)) continue;
    suspect[faces.of[d]] = suspect[faces.of[c ^ 2]] = 1; // the corners d, c and their images
  }
  return suspect;
}

/** The rotation system with all largest parts mirrored; nonsense if parts and twins overlap. */
function turned(
  cover: Graph,
  coverNext: Int32Array,
  parts: CutOff,
  meter: Meter,
): Int32Array {
  const next = coverNext.slice(), prev = mirrored(coverNext);
  const claimed = new Uint8Array(cover.m); // edges of parts dealt with, and of their twins
  const entered = new Uint8Array(cover.n);
  const inBlock = new Int32Array(2 * cover.m).fill(-1); // the last part a dart was in at a pole
  const stack: number[] = []; // darts inside the part at hand
  for (let p = 0; p < parts.count; p++) {
    const ends = parts.ends.subarray(4 * p, 4 * p + 4);
    if (claimed[ends[1] >> 1] !== 0) continue; // inside a larger part
    const poles = [dartStart(cover, ends[1]), dartStart(cover, ends[3])];
    for (let i = 0; i < 4; i += 2) {
      for (let d = coverNext[ends[i]];; d = coverNext[d]) {
        stack.push(d);
        if (d === ends[i + 1]) break;
      }
      mirrorBlock(ends[i], ends[i + 1], p);
    }
    // Inside, every vertex gets the mirror image of its twin.
    while (stack.length > 0) {
      const d = stack.pop()!;
      claimed[d >> 1] = claimed[(d >> 1) ^ 1] = 1;
      const v = dartStart(cover, d ^ 1);
      if (entered[v] !== 0 || poles.includes(v)) continue;
      entered[v] = 1;
      let out = d ^ 1;
      do {
        next[coverNext[out] ^ 2] = out ^ 2;
        prev[out ^ 2] = coverNext[out] ^ 2;
        stack.push(out);
        out = coverNext[out];
        meter.tick(1);
      } while (out !== (d ^ 1));
    }
  }
  return next;

  /** Replaces the block of twins at the twin of a pole by the mirror image of the pole's block. */
  function mirrorBlock(after: number, last: number, part: number): void {
    const block: number[] = [];
    for (let d = coverNext[after];; d = coverNext[d]) {
      block.push(d ^ 2);
      inBlock[d ^ 2] = part;
      if (d === last) break;
    }
    // The darts before and behind the block, around the twin of the pole.
    let before = -1, behind = -1;
    for (const d of block) {
      if (inBlock[prev[d]] !== part) before = prev[d];
      if (inBlock[next[d]] !== part) behind = next[d];
    }
    if (before < 0) [before, behind] = [block[0], block[block.length - 1]]; // nothing else there
    for (const d of [...block.reverse(), behind]) {
      next[before] = d;
      prev[d] = before;
      before = d;
    }
  }
}
