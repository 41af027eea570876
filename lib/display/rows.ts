/** A list of plain objects as a table: what a CSV reader or a table library hands over. */
import type { MimeBundle } from "../run/displayable.ts";
import { smallHtml } from "./html.ts";
import { type Table, tableHtml, tableText } from "./table.ts";
import { cellText, numberText } from "./text.ts";

/** Rows shown before the rest is only counted. */
const FIRST_ROWS = 10;
/** Columns shown before the rest is only counted. */
const FIRST_COLUMNS = 12;

/** The first rows and columns of a list of objects, and what was left out, in words. */
export function rowsTable(
  rows: readonly Readonly<Record<string, unknown>>[],
  most: number = FIRST_ROWS,
): { table: Table; rest: string } {
  const names = new Set<string>();
  for (const row of rows.slice(0, 100)) for (const name of Object.keys(row)) names.add(name);
  const columns = [...names].slice(0, FIRST_COLUMNS);
  const table = {
    columns,
    rows: rows.slice(0, most).map((row) => columns.map((name) => cellText(row[name]))),
  };
  const hidden: string[] = [];
  if (rows.length > most) hidden.push(`the first ${most} of ${numberText(rows.length)} rows`);
  if (names.size > columns.length) {
    hidden.push(`the first ${columns.length} of ${names.size} columns`);
  }
  return { table, rest: hidden.join(", ") };
}

/** The bundle of a list of objects. */
export function renderRows(rows: readonly Readonly<Record<string, unknown>>[]): MimeBundle {
  const { table, rest } = rowsTable(rows);
  return {
    "text/html": tableHtml(table) + (rest === "" ? "" : smallHtml(rest)),
    "text/plain": tableText(table) + (rest === "" ? "" : `\n(${rest})`),
  };
}
