/**
 * CSV text to rows and back. The delimiter (comma, semicolon or tab) is taken from the header; a
 * byte order mark, any of the three line endings, blank lines and quoted fields are understood;
 * blanks around fields are dropped.
 *
 * Text without a quote character has nothing that a library would be needed for: it is split, a
 * million rows a second or so. All else goes through csv-parse, at some 5 MB/s.
 */
import { parse } from "csv-parse/sync";
import { type Row, shown } from "./item.ts";

/** Rows of a table with their lines. */
export interface CsvTable {
  /** Column names, distinct unless empty. */
  readonly columns: readonly string[];
  /** One object for each row; every value is text. */
  readonly rows: Row[];
  /** The line a row begins on, counted from 1. */
  lineOf(row: number): number;
  /** What is wrong with the form, each with its line; the rows named are left out. */
  readonly problems: readonly string[];
}

/** Records as lists of fields, blank lines left out; the first holds the column names. */
interface Records {
  readonly records: Iterable<string[]>;
  /** Valid for a record once it has been taken from `records`. */
  lineOf(record: number): number;
  readonly problems: readonly string[];
}

/**
 * Reads CSV text whose first line names the columns.
 *
 * @param text the whole text
 * @param name names the table in problems, such as "offers.csv"
 * @returns rows and all problems of form: quotes out of place, wrong number of fields, no header,
 *   a column name used twice. O(length) time.
 */
export function parseCsv(text: string, name: string): CsvTable {
  const body = text.charCodeAt(0) === 0xfeff ? text.slice(1) : text;
  const delimiter = delimiterOf(body);
  const { records, lineOf, problems: malformed } = body.includes('"')
    ? parseRecords(body, delimiter, name)
    : splitRecords(body, delimiter);
  const problems = [...malformed];
  let columns: string[] | undefined;
  const rows: Row[] = [], recordOf: number[] = [];
  let at = -1;
  for (const fields of records) {
    at++;
    if (columns === undefined) {
      columns = fields.map((column) => column.trim());
      continue;
    }
    if (fields.length !== columns.length) {
      problems.push(
        `${name} line ${lineOf(at)}: expected ${columns.length} fields, got ${fields.length}`,
      );
      continue;
    }
    const row: Record<string, string> = {};
    for (let c = 0; c < columns.length; c++) row[columns[c]] = fields[c].trim();
    rows.push(row);
    recordOf.push(at);
  }
  if (columns === undefined) {
    if (problems.length === 0) {
      problems.push(`${name}: the table is empty; expected a line of column names`);
    }
    return { columns: [], rows, lineOf: () => 1, problems };
  }
  const names = columns;
  for (const twice of new Set(names.filter((c, i) => c !== "" && names.indexOf(c) < i))) {
    problems.push(`${name} line ${lineOf(0)}: column ${shown(twice)} stands twice`);
  }
  return { columns, rows, lineOf: (row) => lineOf(recordOf[row]), problems };
}

/**
 * Writes rows as CSV: commas, "\n" after each line, quotes only where they are needed.
 *
 * @param columns names of the columns, in order
 * @param rows values by column; a missing value is an empty field
 * @returns the text, header first
 */
export function toCsv(columns: readonly string[], rows: Iterable<Row>): string {
  const lines = [columns.map(field).join(",")];
  for (const row of rows) lines.push(columns.map((column) => field(row[column])).join(","));
  return lines.join("\n") + "\n";
}

function field(value: unknown): string {
  const text = value === undefined || value === null ? "" : String(value);
  return /[",;\t\r\n]|^\s|\s$/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** The most frequent candidate in the header, outside quotes; a comma if there is none. */
function delimiterOf(text: string): string {
  const count = new Map([[",", 0], [";", 0], ["\t", 0]]);
  let quoted = false, begun = false;
  for (let at = 0; at < text.length; at++) {
    const char = text[at];
    if (char === '"') quoted = !quoted;
    else if (!quoted && (char === "\n" || char === "\r") && begun) break;
    else if (!quoted && count.has(char)) count.set(char, count.get(char)! + 1);
    if (char !== "\n" && char !== "\r") begun = true;
  }
  let best = ",";
  for (const [char, times] of count) if (times > count.get(best)!) best = char;
  return best;
}

function isBlank(record: readonly string[]): boolean {
  return record.length === 1 && record[0].trim() === "";
}

/** Splits text without quotes, record by record, so that only one is held at a time. */
function splitRecords(text: string, delimiter: string): Records {
  const lines: number[] = [];
  function* records(): Generator<string[]> {
    let line = 0;
    for (let from = 0; from < text.length;) {
      const found = text.indexOf("\n", from);
      const end = found < 0 ? text.length : found;
      const body = text.slice(from, text[end - 1] === "\r" && end > from ? end - 1 : end);
      from = end + 1;
      // Lone carriage returns end lines too.
      for (const one of body.includes("\r") ? body.split("\r") : [body]) {
        line++;
        const record = one.split(delimiter);
        if (isBlank(record)) continue;
        lines.push(line);
        yield record;
      }
    }
  }
  return { records: records(), lineOf: (record) => lines[record], problems: [] };
}

function parseRecords(text: string, delimiter: string, name: string): Records {
  const problems: string[] = [];
  const options = {
    delimiter,
    record_delimiter: ["\r\n", "\n", "\r"],
    relax_column_count: true,
    skip_records_with_error: true,
  };
  const records = (parse(text, {
    ...options,
    on_skip: (error?: { message: string; lines?: number }) => {
      problems.push(`${name} line ${error?.lines ?? "unknown"}: malformed: ${error?.message}`);
      return undefined;
    },
  }) as string[][]).filter((record) => !isBlank(record));
  let lines: number[] | undefined;
  return {
    records,
    problems,
    // Only messages ask for lines, and keeping them makes parsing half as slow again.
    lineOf: (record) => (lines ??= linesOf(text, options))[record],
  };
}

/** The first line of each record that is not blank. */
function linesOf(text: string, options: object): number[] {
  const parsed = parse(text, { ...options, info: true }) as unknown as {
    record: string[];
    info: { lines: number };
  }[];
  const lines: number[] = [];
  for (const { record, info } of parsed) {
    if (isBlank(record)) continue;
    let breaks = 0;
    for (const value of record) breaks += value.match(/\r\n|\n|\r/g)?.length ?? 0;
    lines.push(info.lines - breaks);
  }
  return lines;
}
