/** The chosen items as a table: id, worth, and the columns their rows came with. */
import type { Instance } from "../instance/instance.ts";
import type { Table } from "./table.ts";
import { cellText, groupDigits } from "./text.ts";

/**
 * The table of some items, the worthiest first.
 *
 * @param instance holds the rows
 * @param ids the items; ids that are not in the instance are left out
 * @param most rows of the table
 */
export function itemTable(
  instance: Instance,
  ids: readonly string[],
  most: number = Infinity,
): Table {
  const { weights, items, columns } = instance;
  const list = ids.map((id) => instance.indexOf(id)).filter((i) => i >= 0)
    .sort((a, b) => weights[b] - weights[a] || a - b)
    .slice(0, most === Infinity ? undefined : most);
  const others = new Set<string>();
  for (const i of list) {
    for (const name of Object.keys(items[i])) {
      if (name !== columns.id && name !== columns.weight) others.add(name);
    }
  }
  const names = [...others];
  return {
    columns: [
      columns.id,
      columns.weight + (instance.unit === "" ? "" : ` (${instance.unit})`),
      ...names,
    ],
    right: [false, true, ...names.map((name) => list.every((i) => isNumber(items[i][name])))],
    rows: list.map((i) => [
      instance.ids[i],
      fixedText(instance, weights[i]),
      ...names.map((name) => cellText(items[i][name])),
    ]),
  };
}

/** A scaled worth with as many decimals as the instance has, so that columns line up. */
export function fixedText(instance: Instance, scaled: number): string {
  const [whole, rest = ""] = instance.decimal(scaled).split(".");
  const decimals = Math.round(Math.log10(instance.scale));
  return groupDigits(decimals === 0 ? whole : `${whole}.${rest.padEnd(decimals, "0")}`);
}

function isNumber(value: unknown): boolean {
  if (typeof value === "string") return value.trim() === "" || Number.isFinite(Number(value));
  return value === undefined || value === null || typeof value === "number" ||
    typeof value === "bigint";
}
