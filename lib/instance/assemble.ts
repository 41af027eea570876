/**
 * From rows and pairs to arrays, with every problem found on the way. O(n + m) time beside hashing
 * the ids.
 */
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import { InstanceError } from "../run/errors.ts";
import { type Conflict, idText, type InstanceInput, type Row, shown } from "./item.ts";
import { sortPairs } from "./pairs.ts";
import { scaleWeights } from "./weights.ts";

/** Names the rows of a source in messages: "items row 3", "offers.csv line 4". */
export interface Places {
  item(i: number): string;
  conflict(i: number): string;
}

const ROWS: Places = {
  item: (i) => `items row ${i + 1}`,
  conflict: (i) => `conflicts row ${i + 1}`,
};

/** The reasons of all edges, each text kept once. */
export interface Reasons {
  /** Length m + 1: the reasons of edge e stand at start[e] … start[e+1]-1. */
  readonly start: Int32Array;
  /** Places in `texts`; distinct within one edge, in order of the rows. */
  readonly index: Int32Array;
  readonly texts: readonly string[];
}

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

/** Most examples a note shows; it says how many more there are. */
const EXAMPLES = 10;

/**
 * Checks and assembles.
 *
 * @param input rows and conflicts
 * @param places names rows in messages
 * @param known problems found before, to be reported with the rest
 * @throws {InstanceError} with all problems
 */
export function assemble(
  input: InstanceInput,
  places: Places = ROWS,
  known: readonly string[] = [],
): InstanceParts {
  const problems = [...known];
  const columns = { id: input.id ?? "id", weight: input.weight ?? "weight" };
  const rows = rowsOf(input.items, places, problems);
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

  const ends = endsOf(
    input.conflicts,
    absent.has(columns.id) ? undefined : index,
    places,
    problems,
  );
  if (problems.length > 0) throw new InstanceError(problems);

  const merged = mergeConflicts(rows.length, ends);
  const notes: string[] = [];
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

function rowsOf(items: readonly object[], places: Places, problems: string[]): Row[] {
  if (!Array.isArray(items)) {
    problems.push(`items: expected an array of rows, got ${shown(items)}`);
    return [];
  }
  if (items.length === 0) problems.push("items: the table is empty; expected at least one row");
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

/** Conflicts as indices, in order of the rows. */
interface Ends {
  /** Length k: the lesser index of each conflict. */
  readonly low: Int32Array;
  /** Length k: the greater one. */
  readonly high: Int32Array;
  /** Length k: place in `texts`, -1 without a reason. */
  readonly reason: Int32Array;
  readonly texts: readonly string[];
}

function endsOf(
  conflicts: readonly Conflict[],
  index: ReadonlyMap<string, number> | undefined,
  places: Places,
  problems: string[],
): Ends {
  const list: readonly unknown[] = Array.isArray(conflicts) ? conflicts : [];
  if (!Array.isArray(conflicts)) {
    problems.push(`conflicts: expected an array of pairs of ids, got ${shown(conflicts)}`);
  }
  const k = list.length;
  const low = new Int32Array(k), high = new Int32Array(k), reason = new Int32Array(k).fill(-1);
  const texts: string[] = [];
  const placeOf = new Map<string, number>();
  for (let c = 0; c < k; c++) {
    const one = list[c];
    const pair: unknown = Array.isArray(one) ? one : (one as { between?: unknown } | null)?.between;
    if (!Array.isArray(pair) || pair.length !== 2) {
      problems.push(`${places.conflict(c)}: expected two ids, got ${shown(one)}`);
      continue;
    }
    const [a, b] = [idText(pair[0]), idText(pair[1])];
    if (a === undefined || b === undefined) {
      problems.push(`${places.conflict(c)}: expected two ids, got ${shown(pair)}`);
      continue;
    }
    const u = index?.get(a), v = index?.get(b);
    if (index !== undefined && u === undefined) {
      problems.push(`${places.conflict(c)}: unknown id ${shown(a)}; expected the id of an item`);
    }
    if (index !== undefined && v === undefined && a !== b) {
      problems.push(`${places.conflict(c)}: unknown id ${shown(b)}; expected the id of an item`);
    }
    if (a === b) {
      problems.push(`${places.conflict(c)}: item ${shown(a)} in conflict with itself`);
      continue;
    }
    if (u === undefined || v === undefined) continue;
    low[c] = Math.min(u, v);
    high[c] = Math.max(u, v);
    const text: unknown = Array.isArray(one) ? undefined : (one as { reason?: unknown }).reason;
    if (text === undefined || text === null || text === "") continue;
    const said = String(text);
    let at = placeOf.get(said);
    if (at === undefined) {
      at = texts.push(said) - 1;
      placeOf.set(said, at);
    }
    reason[c] = at;
  }
  return { low, high, reason, texts };
}

/** The simple graph, edges by (lesser, greater) index, with what was merged. */
interface Merged {
  readonly graph: Graph;
  readonly reasons: Reasons;
  /** Length k: conflicts by edge, in order of the rows within one. */
  readonly order: Int32Array;
  /** Length m + 1: the conflicts of edge e stand at first[e] … first[e+1]-1 of `order`. */
  readonly first: Int32Array;
}

function mergeConflicts(n: number, ends: Ends): Merged {
  const { low, high, reason, texts } = ends;
  const order = sortPairs(n, low, high);
  const k = order.length;
  const first = new Int32Array(k + 1);
  let m = 0;
  for (let at = 0; at < k; at++) {
    const c = order[at], before = order[at - 1];
    if (at === 0 || low[c] !== low[before] || high[c] !== high[before]) first[m++] = at;
  }
  first[m] = k;
  const tails = new Int32Array(m), heads = new Int32Array(m), start = new Int32Array(m + 1);
  const index = new Int32Array(k);
  let end = 0;
  for (let e = 0; e < m; e++) {
    tails[e] = low[order[first[e]]];
    heads[e] = high[order[first[e]]];
    const seen = first[e + 1] - first[e] > 8 ? new Set<number>() : undefined;
    for (let at = first[e]; at < first[e + 1]; at++) {
      const r = reason[order[at]];
      if (r < 0) continue;
      if (seen === undefined ? index.subarray(start[e], end).includes(r) : seen.has(r)) continue;
      seen?.add(r);
      index[end++] = r;
    }
    start[e + 1] = end;
  }
  return {
    graph: graphFromEdges(n, tails, heads),
    reasons: { start, index: index.slice(0, end), texts },
    order,
    first: first.slice(0, m + 1),
  };
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
