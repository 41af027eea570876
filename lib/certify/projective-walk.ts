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
  /**
   * As long as `faces`: what going from the face before to this one and back costs at most, that is once
   * around an end of an edge between them. 0 for the first.
   */
  readonly returns: Float64Array;
}

/**
 * Checks the walk.
 *
 * @param load length n, the costs at each vertex added up
 * @throws {Rejected} when consecutive faces share no edge, or a face comes twice
 */
export function requireWalk(
  { targets, reverse }: InnerGraph,
  dual: SphereDual,
  { sources }: ProjectiveProof,
  load: Float64Array,
): Walk {
  const { pairs, left, right, next, previous } = dual;
  const count = sources.length;
  const faces = new Int32Array(count), returns = new Float64Array(count);
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
    const cost = across(sources[i], i + 1 < count ? faces[i + 1] : faces[0] ^ 1);
    if (cost === Infinity) {
      throw new Rejected(
        i + 1 < count
          ? `projective, source ${i + 1}: its face shares no edge with the one before`
          : "projective: the last source shares no edge with the antipode of the first",
      );
    }
    if (i + 1 < count) returns[i + 1] = cost;
  }
  return { faces, returns };

  /** The least load at an edge between the face left of a dart and another one. */
  function across(start: number, face: number): number {
    let least = Infinity, d = start;
    do {
      // The edges around the face in turn: the dart d starts on sheet 0, and after it another ends there.
      const f = reverse[next[reverse[d]]];
      if (right[d] === face) least = Math.min(least, load[targets[d]], load[targets[reverse[d]]]);
      if (left[f] === face) least = Math.min(least, load[targets[f]], load[targets[reverse[f]]]);
      d = previous[f];
    } while (d !== start);
    return least;
  }
}
