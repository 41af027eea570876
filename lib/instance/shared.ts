/** At most one row of each group: a conflict for each two rows that share a value. */
import { InstanceError } from "../run/errors.ts";
import type { Conflict } from "./item.ts";
import { cell, type Column, columnName, ruleConflict, type RuleOptions, ruleRows } from "./rule.ts";

/** What `sharedConflicts` takes beside the rows. */
export interface SharedOptions extends RuleOptions {
  /**
   * Column of the group: a text or a number; a list puts the row into several groups; empty text,
   * null or undefined into none.
   */
  readonly by: Column;
}

/**
 * One conflict for each two rows of one group; two rows with several groups in common get one for
 * each, which an instance merges, reasons kept.
 *
 * @param rows row objects
 * @param options the group column
 * @returns conflicts with reasons such as "share customer 12", groups in order of appearance
 * @throws {InstanceError} listing all problems. A group of k rows is k(k-1)/2 conflicts: O(n +
 *   conflicts) time.
 */
export function sharedConflicts(rows: readonly object[], options: SharedOptions): Conflict[] {
  const { by } = options;
  const problems: string[] = [];
  const { list, ids } = ruleRows(rows, options, [by], problems);
  if (problems.length > 0) throw new InstanceError(problems);
  const groups = new Map<string, number[]>();
  for (let i = 0; i < list.length; i++) {
    const value = cell(list[i], by);
    for (
      const one of new Set((Array.isArray(value) ? value : [value]).map((v) => String(v ?? "")))
    ) {
      if (one === "") continue;
      const group = groups.get(one);
      if (group === undefined) groups.set(one, [i]);
      else group.push(i);
    }
  }
  const named = columnName(by, "");
  const conflicts: Conflict[] = [];
  for (const [value, group] of groups) {
    const own = named === "" ? `share ${value}` : `share ${named} ${value}`;
    for (let q = 1; q < group.length; q++) {
      for (let p = 0; p < q; p++) {
        conflicts.push(ruleConflict(list, ids, group[p], group[q], options, () => own));
      }
    }
  }
  return conflicts;
}
