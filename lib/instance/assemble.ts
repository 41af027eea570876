/**
 * From rows and pairs to the fields of an instance, with every problem found on the way. O(n + m)
 * time beside hashing the ids.
 */
import type { Graph } from "../graph/graph.ts";
import { InstanceError } from "../run/errors.ts";
import {
  type Ends,
  mergeConflicts,
  type Merged,
  type Places,
  readConflicts,
  type Reasons,
} from "./conflicts.ts";
import { idText, type InstanceInput, type Row, shown } from "./item.ts";
import { scaleWeights } from "./weights.ts";

const ROWS: Places = {
  item: (i) => `items row ${i + 1}`,
  conflict: (i) => `conflicts row ${i + 1}`,
};

/** The fields of an instance, all checked. */
export interface InstanceParts {
  readonly name: string;
  readonly unit: string;
  readonly columns: { readonly id: string; readonly weight: string };
  readonly items: readonly Row[];
  readonly ids: readonly string[];
  readonly index: ReadonlyMap<string, number>;
  readonly weights: Float64Array;
  readonly scale: number;
  readonly graph: Graph;
  readonly reasons: Reasons;
  readonly notes: readonly string[];
}

/** Most items: what one `Map` of ids holds. */
export const MOST_ITEMS = 2 ** 24;

/** Most examples a note shows; it says how many more there are. */
const EXAMPLES = 10;

/** What a reader knows about the rows it hands over. */
export interface Origin {
  /** Names rows in messages. */
  readonly places?: Places;
  /** Problems found before, to be reported with the rest. */
  readonly problems?: readonly string[];
  /** Items are missing because of those problems: an unknown id is then no problem of its own. */
  readonly partial?: boolean;
  /** Notes to begin with. */
  readonly notes?: readonly string[];
}

/**
 * Checks and assembles.
 *
 * @param input rows and conflicts
 * @param origin where they come from
 * @throws {InstanceError} with all problems
 */
export function assemble(input: InstanceInput, origin: Origin = {}): InstanceParts {
  const { places = ROWS, partial = false } = origin;
  const problems = [...origin.problems ?? []];
  const columns = { id: input.id ?? "id", weight: input.weight ?? "weight" };
  const rows = rowsOf(input.items, places, partial, problems);
  const absent = absentColumns(rows, columns, problems);

  const ids: string[] = new Array(rows.length);
  const index = new Map<string, number>();
  for (let i = 0; i < rows.length; i++) {
    const raw = rows[i][columns.id];
    const id = idText(raw);
    ids[i] = id ?? "";
    if (absent.has(columns.id)) continue;
    if (id === undefined) {
      problems.push(
        raw === undefined || raw === null || raw === ""
          ? `${places.item(i)}: id missing; expected a non-empty text`
          : `${places.item(i)}: id ${shown(raw)}; expected a non-empty text or a number`,
      );
      continue;
    }
    const first = index.get(id);
    if (first === undefined) index.set(id, i);
    else problems.push(`${places.item(i)}: id ${shown(id)} used before (${places.item(first)})`);
  }

  const named = (i: number) => ids[i] === "" ? places.item(i) : `${places.item(i)} (${ids[i]})`;
  const scaled = absent.has(columns.weight)
    ? { weights: new Float64Array(rows.length), scale: 1, problems: [] }
    : scaleWeights(rows.map((row) => row[columns.weight]), named);
  for (const problem of scaled.problems) problems.push(problem);

  const known = partial || absent.has(columns.id) ? undefined : index;
  const ends = readConflicts(input.conflicts, known, places, problems);
  if (problems.length > 0) throw new InstanceError(problems);

  const merged = mergeConflicts(rows.length, ends);
  const notes = [...origin.notes ?? []];
  noteDuplicates(merged, ids, ends, places, notes);
  noteWorthless(scaled.weights, named, notes);
  return {
    name: input.name ?? "instance",
    unit: input.unit ?? "",
    columns,
    items: rows,
    ids,
    index,
    weights: scaled.weights,
    scale: scaled.scale,
    graph: merged.graph,
    reasons: merged.reasons,
    notes,
  };
}

function rowsOf(
  items: readonly object[],
  places: Places,
  partial: boolean,
  problems: string[],
): Row[] {
  if (!Array.isArray(items)) {
    problems.push(`items: expected an array of rows, got ${shown(items)}`);
    return [];
  }
  if (items.length === 0 && !partial) {
    problems.push("items: the table is empty; expected at least one row");
  }
  if (items.length > MOST_ITEMS) {
    problems.push(`items: expected at most ${MOST_ITEMS} rows, got ${items.length}`);
    return [];
  }
  const rows: Row[] = [];
  for (let i = 0; i < items.length; i++) {
    const row: unknown = items[i];
    if (typeof row === "object" && row !== null) {
      rows.push(row as Row);
    } else {
      problems.push(`${places.item(i)}: expected an object with named columns, got ${shown(row)}`);
      rows.push({});
    }
  }
  return rows;
}

/** Columns that no row has, each reported once. */
function absentColumns(
  rows: readonly Row[],
  columns: { id: string; weight: string },
  problems: string[],
): Set<string> {
  const absent = new Set<string>();
  if (rows.length === 0) return absent;
  for (const [what, column] of Object.entries(columns)) {
    if (rows.some((row) => column in row)) continue;
    absent.add(column);
    const there = Object.keys(rows[0]);
    problems.push(
      `items: no column ${shown(column)} for the ${what}; the columns are ` +
        (there.length === 0 ? "none" : there.map((name) => shown(name)).join(", ")),
    );
  }
  return absent;
}

function noteDuplicates(
  { graph, order, first }: Merged,
  ids: readonly string[],
  ends: Ends,
  places: Places,
  notes: string[],
): void {
  const merged = ends.low.length - graph.m;
  if (merged === 0) return;
  const examples: string[] = [];
  let pairs = 0;
  for (let e = 0; e < graph.m; e++) {
    if (first[e + 1] - first[e] < 2 || pairs++ >= EXAMPLES) continue;
    const rows = Array.from(order.subarray(first[e], first[e + 1]), (c) => places.conflict(c));
    const all = rows.length > EXAMPLES
      ? `${rows.slice(0, EXAMPLES).join(", ")} and ${rows.length - EXAMPLES} more`
      : rows.join(", ");
    examples.push(`${ids[graph.tails[e]]} and ${ids[graph.heads[e]]} (${all})`);
  }
  const more = pairs > EXAMPLES ? `; and ${pairs - EXAMPLES} more pairs` : "";
  notes.push(
    `${merged} duplicate ${merged === 1 ? "conflict" : "conflicts"} merged, reasons kept: ` +
      `${examples.join("; ")}${more}`,
  );
}

function noteWorthless(weights: Float64Array, named: (i: number) => string, notes: string[]): void {
  const examples: string[] = [];
  let count = 0;
  for (let i = 0; i < weights.length; i++) {
    if (weights[i] <= 0 && count++ < EXAMPLES) examples.push(named(i));
  }
  if (count === 0) return;
  const more = count > EXAMPLES ? ` and ${count - EXAMPLES} more` : "";
  notes.push(
    `${count} ${count === 1 ? "item has" : "items have"} a weight of zero or less and ` +
      `${count === 1 ? "is" : "are"} never chosen: ${examples.join(", ")}${more}`,
  );
}
