/** An instance in a notebook: how large it is, its first rows, and its conflicts by reason. */
import type { Instance } from "../instance/instance.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { headingHtml, smallHtml } from "./html.ts";
import { rowsTable } from "./rows.ts";
import { type Table, tableHtml, tableText } from "./table.ts";
import { counted, groupDigits, numberText } from "./text.ts";

/** Rows of items shown. */
const FIRST_ITEMS = 6;
/** Reasons listed by themselves; the others are added up. */
const FIRST_REASONS = 8;

/** The bundle of an instance. */
export function renderInstance(instance: Instance): MimeBundle {
  const heading = `${instance.name}: ${counted(instance.size, "item")}, ${
    counted(instance.conflictCount, "conflict")
  }, ${worthInAll(instance)} in all`;
  const { table, rest } = rowsTable(instance.items, FIRST_ITEMS);
  const reasons = reasonsTable(instance);
  const tables = [table, ...(reasons.rows.length > 0 ? [reasons] : [])];
  const small = [
    ...(rest === "" ? [] : [rest]),
    ...instance.notes,
    `data ${instance.fingerprint.slice(0, 16)}`,
  ];
  return {
    "text/html": headingHtml(heading) + tables.map(tableHtml).join("") +
      small.map(smallHtml).join(""),
    "text/plain": [heading, ...tables.map(tableText), ...small].join("\n"),
  };
}

/** The sum of all positive worths, with its unit. */
export function worthInAll(instance: Instance): string {
  let total = 0;
  for (const w of instance.weights) if (w > 0) total += w;
  const amount = groupDigits(instance.decimal(total));
  return instance.unit === "" ? amount : `${amount} ${instance.unit}`;
}

/**
 * Conflicts counted by reason, the most frequent first. Figures inside a reason are taken out, so
 * that "share generator 4" and "share generator 5" count together. O(conflicts) time.
 */
export function reasonsTable(instance: Instance): Table {
  const counts = new Map<string, number>();
  let none = 0;
  for (let e = 0; e < instance.conflictCount; e++) {
    const reasons = instance.reasonsOf(e);
    if (reasons.length === 0) none++;
    for (const kind of new Set(reasons.map(withoutFigures))) {
      counts.set(kind, (counts.get(kind) ?? 0) + 1);
    }
  }
  const sorted = [...counts].sort((a, b) => b[1] - a[1] || (a[0] < b[0] ? -1 : 1));
  const rows = sorted.slice(0, FIRST_REASONS).map(([kind, n]) => [kind, numberText(n)]);
  if (sorted.length > FIRST_REASONS) {
    const others = sorted.slice(FIRST_REASONS);
    const sum = others.reduce((total, [, n]) => total + n, 0);
    rows.push([`${counted(others.length, "other reason")}`, numberText(sum)]);
  }
  if (none > 0 && counts.size > 0) rows.push(["no reason given", numberText(none)]);
  return { columns: ["reason", "conflicts"], right: [false, true], rows };
}

function withoutFigures(reason: string): string {
  return reason.replace(/\d+([.,:/-]\d+)*/g, "…");
}
