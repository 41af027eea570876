/** The graph inside a part, with darts numbered as `ProjectiveProof` numbers them. O(n + m) time. */
import { type Play, requireVertex } from "./play.ts";
import { Rejected } from "./rejected.ts";

export interface InnerGraph {
  /** The vertices in play, increasing; below they are called by their position here. */
  readonly vertices: Int32Array;
  /** Length n + 1: the darts out of v are offsets[v] … offsets[v+1]-1. */
  readonly offsets: Int32Array;
  /** Length 2m: where each dart ends, increasing within each vertex. */
  readonly targets: Int32Array;
  /** Length 2m: the same edge the other way. */
  readonly reverse: Int32Array;
}

/**
 * The graph on the vertices in play with all conflicts between them.
 *
 * @throws {Rejected} when it has no vertex, or when it is bipartite or not connected: then its double
 *   cover is not connected
 */
export function innerGraph(play: Play): InnerGraph {
  const vertices = Int32Array.from(play.vertices, (v) => requireVertex(play, v, "projective"));
  vertices.sort();
  const n = vertices.length;
  if (n === 0) throw new Rejected("projective: the part has no vertices");
  const { place } = play.scratch;
  for (let v = 0; v < n; v++) {
    if (place[vertices[v]] !== 0) {
      throw new Rejected(`projective: ${play.nameOf(vertices[v])} stands twice in the part`);
    }
    place[vertices[v]] = v + 1;
  }
  const offsets = new Int32Array(n + 1);
  for (let v = 0; v < n; v++) {
    offsets[v + 1] = offsets[v];
    for (let a = play.offsets[vertices[v]]; a < play.offsets[vertices[v] + 1]; a++) {
      if (place[play.neighbours[a]] !== 0) offsets[v + 1]++;
    }
  }
  const targets = new Int32Array(offsets[n]), reverse = new Int32Array(offsets[n]);
  // Darts to smaller ends come first and in order, so each is met when its reverse is written.
  const met = offsets.slice(0, n);
  for (let v = 0, d = 0; v < n; v++) {
    for (let a = play.offsets[vertices[v]]; a < play.offsets[vertices[v] + 1]; a++) {
      const u = place[play.neighbours[a]] - 1;
      if (u < 0) continue;
      targets[d] = u;
      if (u > v) {
        const back = met[u]++;
        reverse[d] = back;
        reverse[back] = d;
      }
      d++;
    }
  }
  for (const v of vertices) place[v] = 0;
  const inner = { vertices, offsets, targets, reverse };
  requireConnectedOdd(inner);
  return inner;
}

/** @throws {Rejected} unless the double cover is connected */
function requireConnectedOdd({ offsets, targets }: InnerGraph): void {
  const n = offsets.length - 1;
  const side = new Uint8Array(n), queue = new Int32Array(n);
  let tail = 1, odd = false;
  side[0] = 1;
  for (let head = 0; head < tail; head++) {
    const v = queue[head];
    for (let d = offsets[v]; d < offsets[v + 1]; d++) {
      const u = targets[d];
      if (side[u] === 0) {
        side[u] = 3 - side[v];
        queue[tail++] = u;
      } else if (side[u] === side[v]) odd = true;
    }
  }
  if (tail < n) throw new Rejected("projective: the part is not connected");
  if (!odd) throw new Rejected("projective: the part has no odd cycle");
}
