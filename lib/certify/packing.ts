/** Checks a packing of edges, in O(n + k log d) time for k edges and degrees up to d. */
import type { PackingProof } from "./certificate.ts";
import { type Play, requireEdge, requireMultiplier, requireVertex } from "./play.ts";
import { Rejected } from "./rejected.ts";
import { SlackLedger } from "./slack-ledger.ts";

/**
 * The bound a packing proves.
 *
 * @param play the graph and the vertices in play
 * @param proof edges with doubled multipliers
 * @returns floor of half of Σ λ + Σ_v max(0, 2w(v) - load(v)), in scaled units
 * @throws {Rejected} naming the first edge or multiplier that is wrong
 */
export function packingBound(play: Play, proof: PackingProof): bigint {
  const { ends, doubled } = proof;
  if (ends.length !== 2 * doubled.length) {
    throw new Rejected(
      `packing: expected two ends for each of ${doubled.length} multipliers, got ${ends.length} ends`,
    );
  }
  const ledger = new SlackLedger(play, 2);
  const edge = [0, 0];
  for (let k = 0; k < doubled.length; k++) {
    const where = `packing, edge ${k}`;
    edge[0] = requireVertex(play, ends[2 * k], where);
    edge[1] = requireVertex(play, ends[2 * k + 1], where);
    requireEdge(play, edge[0], edge[1], where);
    ledger.changeTerm(edge, 1, requireMultiplier(doubled[k], where));
  }
  const bound = ledger.bound;
  ledger.release();
  return bound;
}
