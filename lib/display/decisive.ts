/**
 * The conflicts that decided: refused items of great worth, and what stood in their way. For each
 * refused item the chosen ones it conflicts with, with the reasons as the data give them.
 * O(n log n + m) time.
 */
import type { Instance } from "../instance/instance.ts";

/** A refused item and what blocks it. */
export interface Refusal {
  readonly id: string;
  /** Scaled worth of the item. */
  readonly weight: number;
  /** Chosen items in conflict with it, by worth, with their conflicts' reasons. */
  readonly blockers: readonly { id: string; weight: number; reasons: readonly string[] }[];
}

/**
 * The refused items of greatest worth that some chosen item blocks.
 *
 * @param instance the instance
 * @param chosen ids chosen, without conflicts among them
 * @param most how many to return; all of positive worth if unset
 */
export function refusals(
  instance: Instance,
  chosen: Iterable<string>,
  most: number = Infinity,
): Refusal[] {
  const { graph, ids, weights } = instance;
  const taken = new Uint8Array(instance.size);
  for (const id of chosen) {
    const i = instance.indexOf(id);
    if (i >= 0) taken[i] = 1;
  }
  const refused: number[] = [];
  for (let i = 0; i < instance.size; i++) if (taken[i] === 0 && weights[i] > 0) refused.push(i);
  refused.sort((a, b) => weights[b] - weights[a] || a - b);
  const found: Refusal[] = [];
  for (const i of refused) {
    if (found.length >= most) break;
    const blockers = [];
    for (let a = graph.offsets[i]; a < graph.offsets[i + 1]; a++) {
      const j = graph.targets[a];
      if (taken[j] === 0) continue;
      const reasons = instance.reasonsOf(graph.edgeOf[a]);
      blockers.push({ id: ids[j], weight: weights[j], reasons });
    }
    if (blockers.length === 0) continue;
    blockers.sort((a, b) => b.weight - a.weight || (a.id < b.id ? -1 : 1));
    found.push({ id: ids[i], weight: weights[i], blockers });
  }
  return found;
}
