/**
 * A small market in the manner of the bundled scenario, with ids and reasons that would do harm in a
 * page that did not escape them.
 */
import { Instance } from "../../lib/instance/instance.ts";
import { Random } from "../../lib/run/random.ts";

/** An id, name and reason that must never reach a page as they are. */
export const EVIL = `<script>alert("x")</script>&'`;

/**
 * A grid of pitches by evenings whose neighbours are in conflict.
 *
 * @param pitches @param evenings size of the grid, each at least 1
 * @param seed seed of the offers
 */
export function smallMarket(pitches: number, evenings: number, seed: number): Instance {
  const random = new Random(seed);
  const items: Record<string, unknown>[] = [];
  const conflicts: { between: [string, string]; reason: string }[] = [];
  const id = (p: number, e: number) => p === 0 && e === 0 ? EVIL : `p${p}-e${e}`;
  for (let p = 0; p < pitches; p++) {
    for (let e = 0; e < evenings; e++) {
      items.push({ id: id(p, e), pitch: p, trade: EVIL, weight: `${5 + random.below(90)}.25` });
      if (p > 0) {
        conflicts.push({ between: [id(p - 1, e), id(p, e)], reason: `generator ${p} ${EVIL}` });
      }
      if (e > 0) conflicts.push({ between: [id(p, e - 1), id(p, e)], reason: "rests" });
    }
  }
  return Instance.from({ name: `Market ${EVIL}`, unit: "euros", items, conflicts });
}
