/** Tables in the report: plain elements and classes, a scroll box around them for small screens. */
import { escapeHtml } from "./html.ts";
import { cellHtml, oneLine, rightColumns, type Table } from "./table.ts";

/** Characters from which a column of text is kept from shrinking to a word a line. */
const LONG = 28;

/** A table as the report shows it. */
export function reportTable(table: Table): string {
  const right = rightColumns(table).map((isRight, c) => {
    if (isRight) return ' class="right"';
    return table.rows.some((row) => oneLine(row[c]).length > LONG) ? ' class="long"' : "";
  });
  const head = table.columns.map((name, c) => `<th scope="col"${right[c]}>${escapeHtml(name)}</th>`)
    .join("");
  const body = table.rows.map((row) =>
    `<tr>${row.map((cell, c) => `<td${right[c]}>${cellHtml(cell)}</td>`).join("")}</tr>\n`
  ).join("");
  const caption = table.caption === undefined
    ? ""
    : `<caption>${escapeHtml(table.caption)}</caption>`;
  const label = escapeHtml(table.caption ?? "table");
  return `<div class="scroll" role="region" aria-label="${label}" tabindex="0"><table class="own">${caption}` +
    `<thead><tr>${head}</tr></thead>\n<tbody>\n${body}</tbody></table></div>\n`;
}
