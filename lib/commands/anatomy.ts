/** The anatomy of an instance for its report: class with witnesses, core and blocks, a drawing. */
import { drawConflicts } from "../display/conflict-picture.ts";
import type { Instance } from "../instance/instance.ts";
import { classify, decompose } from "../mod.ts";
import type { Displayable } from "../run/displayable.ts";
import type { RunOptions } from "../run/options.ts";

/** Items up to which the drawing can be read. */
const DRAWN_UP_TO = 600;

/**
 * @param instance items and conflicts
 * @param run limits
 * @returns the class and the decomposition, and where they fit on a page the conflicts drawn with
 *   blocks and witness cycles pointed out
 */
export async function anatomyOf(instance: Instance, run: RunOptions): Promise<Displayable[]> {
  const classification = await classify(instance, run);
  const decomposition = await decompose(instance, run);
  return [
    classification,
    decomposition,
    ...(instance.size <= DRAWN_UP_TO
      ? [drawConflicts(instance, { classification, decomposition })]
      : []),
  ];
}
