/** Conflicts between uses of one resource that overlap in time, by a sweep over the starts. */
import { InstanceError } from "../run/errors.ts";
import { type Conflict, shown } from "./item.ts";
import { type MomentScale, readMoment, SCALE_NAMES, stretch } from "./moment.ts";
import { cell, type Column, columnName, ruleConflict, type RuleOptions, ruleRows } from "./rule.ts";

/** What `overlapConflicts` takes beside the rows. */
export interface OverlapOptions extends RuleOptions {
  /** Column of the start: a number, a Date, an ISO date or a time of day ("18:00"). */
  readonly start: Column;
  /** Column of the end, not part of the interval; not before the start. */
  readonly end: Column;
  /** Column of what is used; rows with another value never conflict. Unset: one for all. */
  readonly resource?: Column;
  /**
   * Least pause between two uses, 0 if unset: in the unit of the numbers, and in milliseconds for
   * dates and times of day.
   */
  readonly gap?: number;
}

/**
 * One conflict for each two rows with the same resource of which each begins before the other's end
 * plus the gap. Intervals are half-open: with no gap, one that ends at 19:00 leaves 19:00 free.
 *
 * @param rows row objects
 * @param options columns and gap
 * @returns conflicts with reasons such as "share pitch 7 between 18:00 and 19:00"
 * @throws {InstanceError} listing all problems: a moment that is missing or cannot be read, an end
 *   before its start, numbers mixed with dates. O(n log n + conflicts) time.
 */
export function overlapConflicts(rows: readonly object[], options: OverlapOptions): Conflict[] {
  const { start, end, resource, gap = 0 } = options;
  const problems: string[] = [];
  if (!(Number.isFinite(gap) && gap >= 0)) {
    problems.push(`gap: expected a number >= 0, got ${shown(gap)}`);
  }
  const { list, ids, absent } = ruleRows(rows, options, [start, end, resource], problems);
  const n = list.length;
  const starts = new Float64Array(n), ends = new Float64Array(n);
  let scale: MomentScale | undefined, scaleRow = 0;
  const read = (i: number, column: Column, what: string): number => {
    const name = columnName(column, what);
    if (absent.has(name) && typeof column === "string") return 0;
    const value = cell(list[i], column);
    if (scale === "number" && typeof value === "number" && Number.isFinite(value)) return value;
    const moment = readMoment(value);
    if (moment === undefined) {
      problems.push(
        `row ${i + 1} (${ids[i]}): ${name} ${shown(value)}; expected a number, a date or a time`,
      );
      return NaN;
    }
    if (scale === undefined) [scale, scaleRow] = [moment.scale, i];
    if (moment.scale === scale) return moment.at;
    problems.push(
      `row ${i + 1} (${ids[i]}): ${name} ${shown(value)} is ${SCALE_NAMES[moment.scale]}; ` +
        `expected ${SCALE_NAMES[scale]}, as in row ${scaleRow + 1}`,
    );
    return NaN;
  };
  for (let i = 0; i < n; i++) {
    starts[i] = read(i, start, "start");
    ends[i] = read(i, end, "end");
    if (ends[i] < starts[i]) {
      problems.push(
        `row ${i + 1} (${ids[i]}): ends at ${text(i, end)}, before it starts at ` +
          `${text(i, start)}; expected an end not before the start`,
      );
    }
  }
  if (problems.length > 0) throw new InstanceError(problems);

  const used = list.map((row) => resource === undefined ? "" : resourceKey(cell(row, resource)));
  const order = Int32Array.from(starts, (_, i) => i)
    .sort((i, j) => starts[i] - starts[j] || ends[i] - ends[j] || i - j);
  const conflicts: Conflict[] = [];
  /** Rows of each resource that were in use when the sweep last met it. */
  const open = new Map<string, number[]>();
  for (const j of order) {
    const rivals = open.get(used[j]);
    if (rivals === undefined) {
      open.set(used[j], [j]);
      continue;
    }
    let kept = 0;
    for (const i of rivals) {
      if (starts[j] >= ends[i] + gap) continue;
      rivals[kept++] = i;
      if (starts[i] >= ends[j] + gap) continue;
      conflicts.push(ruleConflict(list, ids, i, j, options, () => wording(i, j)));
    }
    rivals.length = kept;
    rivals.push(j);
  }
  return conflicts;

  function text(i: number, column: Column): string {
    return readMoment(cell(list[i], column))?.text ?? "";
  }

  function wording(i: number, j: number): string {
    const earlier = ends[i] <= ends[j] ? i : j;
    const from = text(j, start), to = text(earlier, end);
    const what = resource === undefined
      ? ""
      : ` ${typeof resource === "string" ? `${resource} ` : ""}${String(cell(list[i], resource))}`;
    if (starts[j] < ends[earlier]) {
      return what === ""
        ? `overlap between ${from} and ${to}`
        : `share${what} between ${from} and ${to}`;
    }
    return `less than ${stretch(gap, scale ?? "number")} between ${to} and ${from}` +
      (what === "" ? "" : ` on${what}`);
  }
}

/** Numbers and texts that look alike are the same resource. */
function resourceKey(value: unknown): string {
  return value instanceof Date ? value.toISOString() : String(value ?? "");
}
