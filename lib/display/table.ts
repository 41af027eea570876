/**
 * Tables as HTML with styles in attributes, and as text in columns. Columns of numbers stand to the
 * right, all others to the left.
 */
import { escapeHtml } from "./html.ts";

/** A cell: text, or several lines of it. */
export type Cell = string | readonly string[];

/** A table of texts. */
export interface Table {
  /** Heads of the columns. */
  readonly columns: readonly string[];
  /** Each row as long as `columns`. */
  readonly rows: readonly (readonly Cell[])[];
  /** Per column: whether it stands to the right. Unset: where every cell is a number. */
  readonly right?: readonly boolean[];
  /** One sentence that says what the table holds. */
  readonly caption?: string;
}

const NUMBER = /^[-+]?[\d,]+(\.\d+)?(e[-+]?\d+)?%?$/;

/** Which columns stand to the right. O(cells) time. */
export function rightColumns(table: Table): boolean[] {
  return table.columns.map((_, c) =>
    table.right?.[c] ?? (table.rows.some((row) => row[c] !== "") &&
      table.rows.every((row) => row[c] === "" || NUMBER.test(oneLine(row[c]))))
  );
}

/** A cell as one line of text. */
export function oneLine(cell: Cell): string {
  return typeof cell === "string" ? cell : cell.join("; ");
}

/** A cell as HTML, its lines below each other. */
export function cellHtml(cell: Cell): string {
  return typeof cell === "string" ? escapeHtml(cell) : cell.map(escapeHtml).join("<br>");
}

/** A table for a notebook. */
export function tableHtml(table: Table): string {
  const right = rightColumns(table);
  const align = (c: number) => right[c] ? "right" : "left";
  const cell = (c: number) =>
    `padding:.18em .9em .18em 0;text-align:${align(c)};vertical-align:top;` +
    (right[c] ? "font-variant-numeric:tabular-nums;white-space:nowrap" : "max-width:32em");
  const head = table.columns.map((name, c) =>
    `<th scope="col" style="${cell(c)};border-bottom:1px solid currentColor;font-weight:600">` +
    `${escapeHtml(name)}</th>`
  ).join("");
  const body = table.rows.map((row) =>
    `<tr>${row.map((one, c) => `<td style="${cell(c)}">${cellHtml(one)}</td>`).join("")}</tr>`
  ).join("");
  return `<table style="border-collapse:collapse;margin:.4em 0;font-size:92%">${
    captionHtml(table)
  }<thead><tr>${head}</tr></thead><tbody>${body}</tbody></table>`;
}

function captionHtml({ caption }: Table): string {
  if (caption === undefined) return "";
  return `<caption style="text-align:left;caption-side:top;padding-bottom:.3em">${
    escapeHtml(caption)
  }</caption>`;
}

/** A table as text, columns two blanks apart. */
export function tableText(table: Table): string {
  const right = rightColumns(table);
  const all = [table.columns, ...table.rows.map((row) => row.map(oneLine))];
  const width = table.columns.map((_, c) => Math.max(...all.map((row) => [...row[c]].length)));
  const lines = all.map((row) =>
    row.map((text, c) => {
      const blanks = " ".repeat(width[c] - [...text].length);
      return right[c] ? blanks + text : text + blanks;
    }).join("  ").trimEnd()
  );
  if (table.caption !== undefined) lines.unshift(table.caption);
  return lines.join("\n");
}
