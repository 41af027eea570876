/**
 * From tables to an instance: CSV files, addresses, text, or rows of any table library. A million
 * rows take seconds; see `csv.ts` for what text costs.
 */
import { readFile } from "node:fs/promises";
import { InstanceError } from "../run/errors.ts";
import { assemble } from "./assemble.ts";
import { parseCsv } from "./csv.ts";
import { Instance } from "./instance.ts";
import { type Conflict, type Row, shown } from "./item.ts";

/**
 * Where a table comes from: CSV text (a string with a line break in it), the path of a CSV file, an
 * http, https or file URL as text or object, text with a name for messages, or row objects.
 */
export type TableSource =
  | string
  | URL
  | { readonly text: string; readonly name: string }
  | Iterable<object>;

/** What `readTables` takes. */
export interface Tables {
  /** Table of items: one row each, with an id and a weight. */
  readonly items: TableSource;
  /**
   * Table of conflicts: the ids stand in columns `a` and `b`, or else in the first two; a column
   * `reason` is optional. Conflicts from builders, or pairs of ids, are taken too.
   */
  readonly conflicts: TableSource;
  /** Column that holds the id; "id" if unset. */
  readonly id?: string;
  /** Column that holds the weight; "weight" if unset. */
  readonly weight?: string;
  /** Shown in titles. */
  readonly name?: string;
  /** Unit of the weights. */
  readonly unit?: string;
}

/** Rows with what messages call them. */
interface Loaded {
  readonly rows: readonly unknown[];
  /** Column names, where the source states them. */
  readonly columns?: readonly string[];
  place(row: number): string;
  readonly problems: readonly string[];
}

/**
 * Reads both tables.
 *
 * @param tables sources and column names
 * @returns the instance; `items` holds the rows, from CSV as text by column
 * @throws {InstanceError} listing all problems of both tables, each with its line or row: a file
 *   that does not exist, malformed CSV, a missing column, and all that `Instance.from` refuses
 */
export async function readTables(tables: Tables): Promise<Instance> {
  const [items, conflicts] = await Promise.all([
    load(tables.items, "items"),
    load(tables.conflicts, "conflicts"),
  ]);
  const problems = [...items.problems, ...conflicts.problems];
  const pairs = conflictsOf(conflicts, problems);
  const { name, unit, id, weight } = tables;
  return new Instance(assemble(
    { name, unit, id, weight, items: items.rows as object[], conflicts: pairs },
    {
      places: { item: items.place, conflict: conflicts.place },
      problems,
      partial: items.problems.length > 0,
    },
  ));
}

/**
 * Reads one table, for the conflict builders or for looking at.
 *
 * @param source as `readTables` takes it
 * @returns its rows; from CSV, text by column
 * @throws {InstanceError} listing all problems of form
 */
export async function readRows(source: TableSource): Promise<Row[]> {
  const { rows, problems } = await load(source, "table");
  if (problems.length > 0) throw new InstanceError(problems);
  return rows as Row[];
}

async function load(source: TableSource, what: string): Promise<Loaded> {
  const failed = (problem: string): Loaded => ({
    rows: [],
    place: (row) => `${what} row ${row + 1}`,
    problems: [`${what}: ${problem}`],
  });
  if (typeof source === "string" && /[\r\n]/.test(source)) return loadText(source, what);
  if (typeof source === "string" || source instanceof URL) {
    const address = String(source);
    if (address === "") return failed("expected a path, an address or CSV text, got an empty text");
    let bytes: Uint8Array;
    try {
      bytes = await fetchBytes(address);
    } catch (error) {
      return failed(unreadable(address, error));
    }
    try {
      const text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
      return loadText(text, address.split(/[\\/]/).pop() || address);
    } catch {
      return failed(`${shown(address)} is not UTF-8 text; expected a CSV file saved as UTF-8`);
    }
  }
  if (typeof source === "object" && source !== null && "text" in source && "name" in source) {
    return loadText(source.text, source.name);
  }
  if (typeof source === "object" && source !== null && Symbol.iterator in source) {
    return { rows: [...source], place: (row) => `${what} row ${row + 1}`, problems: [] };
  }
  return failed(`expected a path, an address, CSV text or rows, got ${shown(source)}`);
}

function loadText(text: string, name: string): Loaded {
  const { rows, columns, lineOf, problems } = parseCsv(text, name);
  return { rows, columns, problems, place: (row) => `${name} line ${lineOf(row)}` };
}

async function fetchBytes(address: string): Promise<Uint8Array> {
  if (!/^https?:/i.test(address)) {
    return await readFile(/^file:/i.test(address) ? new URL(address) : address);
  }
  const response = await fetch(address);
  if (!response.ok) throw new Error(`the server answered ${response.status}`);
  return new Uint8Array(await response.arrayBuffer());
}

function unreadable(address: string, error: unknown): string {
  const code = (error as { code?: string }).code;
  if (code === "ENOENT") return `the file ${shown(address)} does not exist`;
  return `cannot read ${shown(address)}: ${error instanceof Error ? error.message : error}`;
}

/** Rows of a conflict table as conflicts. */
function conflictsOf(table: Loaded, problems: string[]): Conflict[] {
  const rows = table.rows as Conflict[];
  const sample: unknown = rows.find(isNamed);
  const columns = table.columns ?? (sample === undefined ? undefined : Object.keys(sample as Row));
  if (columns === undefined || (table.problems.length > 0 && columns.length === 0)) return rows;
  const [a, b] = columns.includes("a") && columns.includes("b") ? ["a", "b"] : columns;
  if (b === undefined) {
    const there = columns.map((column) => shown(column)).join(", ");
    problems.push(
      `conflicts: expected two columns of ids ("a" and "b", or the first two); the columns are ` +
        (there === "" ? "none" : there),
    );
    return [];
  }
  const withReason = columns.includes("reason") && a !== "reason" && b !== "reason";
  return rows.map((row: unknown) => {
    if (!isNamed(row)) return row as Conflict;
    const between = [row[a], row[b]] as [string, string];
    return withReason ? { between, reason: row.reason as string } : between;
  });
}

/** A row with named columns, as against a pair or a conflict from a builder. */
function isNamed(row: unknown): row is Row {
  return typeof row === "object" && row !== null && !Array.isArray(row) && !("between" in row);
}
