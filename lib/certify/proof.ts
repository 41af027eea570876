/** Sends a proof to the checker of its rule. */
import { blocksBound } from "./blocks.ts";
import { casesBound } from "./cases.ts";
import type { Proof } from "./certificate.ts";
import { packingBound } from "./packing.ts";
import type { Play } from "./play.ts";
import { projectiveBound } from "./projective.ts";
import { Rejected } from "./rejected.ts";
import { requireShape } from "./shape.ts";

/**
 * The bound a proof proves for the vertices in play.
 *
 * @param play the graph, its weights and the vertices in play
 * @param proof any proof
 * @returns an upper bound for the weight of a stable set inside `play.vertices`, in scaled units
 * @throws {Rejected} naming the first thing that is wrong
 */
export function provenBound(play: Play, proof: Proof): bigint {
  requireShape(proof);
  switch (proof?.rule) {
    case "packing":
      return packingBound(play, proof);
    case "cases":
      return casesBound(play, proof);
    case "blocks":
      return blocksBound(play, proof, provenBound);
    case "projective":
      return projectiveBound(play, proof);
    default:
      throw new Rejected(`unknown rule ${JSON.stringify((proof as { rule?: unknown })?.rule)}`);
  }
}
