/**
 * The sources of a proof: a closed one-sided walk from face to face. Checking it takes time linear in
 * the lengths of its faces.
 *
 * Every one-sided cycle of the dual passes a face of the walk: two one-sided closed curves in the
 * projective plane cross an odd number of times where they are in general position, and curves of the
 * dual can only meet in faces.
 */
import type { ProjectiveProof } from "./certificate.ts";
import type { InnerGraph } from "./projective-graph.ts";
import type { SphereDual } from "./projective-dual.ts";
import { Rejected } from "./rejected.ts";

/** The walk on the sphere. */
export interface Walk {
  /** The faces passed, no two of them equal or antipodes; from the last a step leads to the first's. */
  readonly faces: Int32Array;
  /** As long as `faces`: no less than the distance to each from the face before; 0 for the first. */
  readonly there: Float64Array;
  /** As long as `faces`: no less than the distance from each to the face before. */
  readonly back: Float64Array;
}

/**
 * Checks the walk.
 *
 * @param costs length m, edges as in `dual`
 * @param load length n, the costs at each vertex added up
 * @throws {Rejected} when consecutive faces share no edge, or a face comes twice
 */
export function requireWalk(
  { targets, reverse }: InnerGraph,
  dual: SphereDual,
  { sources }: ProjectiveProof,
  costs: Float64Array,
  load: Float64Array,
): Walk {
  const { pairs, left, right, edgeOf, next, previous } = dual;
  const count = sources.length;
  const faces = new Int32Array(count);
  const there = new Float64Array(count), back = new Float64Array(count);
  const met = new Uint8Array(pairs);
  for (let i = 0; i < count; i++) {
    const dart = sources[i];
    if (!Number.isInteger(dart) || dart < 0 || dart >= left.length) {
      throw new Rejected(
        `projective, source ${i}: expected a dart from 0 to ${left.length - 1}, got ${dart}`,
      );
    }
    faces[i] = left[dart];
    if (met[faces[i] >> 1] !== 0) {
      throw new Rejected(`projective, source ${i}: its face or the antipode comes twice`);
    }
    met[faces[i] >> 1] = 1;
  }
  if (count === 0) throw new Rejected("projective: expected at least one source");
  for (let i = 0; i < count; i++) {
    const [to, fro] = across(sources[i], i + 1 < count ? faces[i + 1] : faces[0] ^ 1);
    if (to === Infinity) {
      throw new Rejected(
        i + 1 < count
          ? `projective, source ${i + 1}: its face shares no edge with the one before`
          : "projective: the last source shares no edge with the antipode of the first",
      );
    }
    if (i + 1 < count) [there[i + 1], back[i + 1]] = [to, fro];
  }
  return { faces, there, back };

  /** Bounds for the ways from the face left of a dart to another one and back; or infinite. */
  function across(start: number, face: number): [number, number] {
    let to = Infinity, fro = Infinity, d = start;
    do {
      // The edges around the face in turn: one whose arc leads in, then one whose arc leads out.
      const f = reverse[next[reverse[d]]];
      if (right[d] === face) [to, fro] = [Math.min(to, around(d)), Math.min(fro, costs[edgeOf[d]])];
      if (left[f] === face) [to, fro] = [Math.min(to, costs[edgeOf[f]]), Math.min(fro, around(f))];
      d = previous[f];
    } while (d !== start);
    return [to, fro];
  }

  /** What it costs to get from the head of an arc to its tail around an end of the edge it crosses. */
  function around(d: number): number {
    return Math.min(load[targets[d]], load[targets[reverse[d]]]) - costs[edgeOf[d]];
  }
}
