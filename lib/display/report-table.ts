/** Tables in the report: plain elements and classes, a scroll box around them for small screens. */
import { escapeHtml } from "./html.ts";
import { rightColumns, type Table } from "./table.ts";

/** A table as the report shows it. */
export function reportTable(table: Table): string {
  const right = rightColumns(table).map((r) => r ? ' class="right"' : "");
  const head = table.columns.map((name, c) => `<th scope="col"${right[c]}>${escapeHtml(name)}</th>`)
    .join("");
  const body = table.rows.map((row) =>
    `<tr>${row.map((text, c) => `<td${right[c]}>${escapeHtml(text)}</td>`).join("")}</tr>\n`
  ).join("");
  const caption = table.caption === undefined
    ? ""
    : `<caption>${escapeHtml(table.caption)}</caption>`;
  const label = escapeHtml(table.caption ?? "table");
  return `<div class="scroll" role="region" aria-label="${label}" tabindex="0"><table>${caption}` +
    `<thead><tr>${head}</tr></thead>\n<tbody>\n${body}</tbody></table></div>\n`;
}
