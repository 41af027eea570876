/** What the conflict builders share: reading columns of rows, and saying what is wrong with them. */
import { type Conflict, idText, type Row, shown } from "./item.ts";

/** A column by its name, or a function of the row. */
export type Column = string | ((row: Row) => unknown);

/** What every builder takes beside its own fields. */
export interface RuleOptions {
  /** Column that holds the id; "id" if unset. */
  readonly id?: string;
  /** The reason of each conflict, or a function of the two rows; if unset the builder words it. */
  readonly reason?: string | ((a: Row, b: Row) => string);
}

/** The value of a column. */
export function cell(row: Row, column: Column): unknown {
  return typeof column === "string" ? row[column] : column(row);
}

/** How a message calls a column. */
export function columnName(column: Column, what: string): string {
  return typeof column === "string" ? column : what;
}

/**
 * Rows with their ids.
 *
 * @param rows row objects
 * @param options names the id column
 * @param columns the named columns the rule reads
 * @param problems receives: rows that are no objects, ids that are missing, columns no row has
 */
export function ruleRows(
  rows: readonly object[],
  options: RuleOptions,
  columns: readonly (Column | undefined)[],
  problems: string[],
): { list: readonly Row[]; ids: readonly string[]; absent: ReadonlySet<string> } {
  const list: Row[] = [];
  const isRow = (row: unknown) => typeof row === "object" && row !== null;
  if (!Array.isArray(rows)) problems.push(`expected an array of rows, got ${shown(rows)}`);
  for (const [i, row] of (Array.isArray(rows) ? rows : []).entries()) {
    if (!isRow(row)) problems.push(`row ${i + 1}: expected an object, got ${shown(row)}`);
    list.push(isRow(row) ? row as Row : {});
  }
  const id = options.id ?? "id";
  const absent = new Set<string>();
  for (const column of [id, ...columns]) {
    if (typeof column !== "string" || list.length === 0 || absent.has(column)) continue;
    if (list.some((row) => column in row)) continue;
    absent.add(column);
    const there = Object.keys(list[0]).map((name) => shown(name)).join(", ");
    problems.push(`no column ${shown(column)}; the columns are ${there === "" ? "none" : there}`);
  }
  const ids = list.map((row, i) => {
    const text = idText(row[id]);
    if (text === undefined && !absent.has(id)) {
      problems.push(`row ${i + 1}: id ${shown(row[id])}; expected a non-empty text`);
    }
    return text ?? "";
  });
  return { list, ids, absent };
}

/** A conflict between rows i and j, with the caller's reason or the builder's. */
export function ruleConflict(
  list: readonly Row[],
  ids: readonly string[],
  i: number,
  j: number,
  options: RuleOptions,
  own: () => string,
): Conflict {
  const { reason } = options;
  const text = reason === undefined
    ? own()
    : typeof reason === "string"
    ? reason
    : reason(list[i], list[j]);
  return { between: [ids[i], ids[j]], reason: text };
}
