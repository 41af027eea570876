/** What a caller hands over: items with a worth, conflicts between two of them. */

/** A worth. Decimals are read exactly: a string as written, a number by its shortest decimal form. */
export type Weight = number | string | bigint;

/** One row of the items table; further columns are kept and never looked at. */
export type Item = { id: string; weight: Weight } & Record<string, unknown>;

/** A row as table libraries give it. */
export type Row = Readonly<Record<string, unknown>>;

/** Two items that cannot both be chosen, with the reasons later explanations quote. */
export type Conflict = readonly [string, string] | {
  readonly between: readonly [string, string];
  readonly reason?: string | readonly string[];
};

/** What `Instance.from` takes. */
export interface InstanceInput {
  /** Shown in titles; "instance" if unset. */
  readonly name?: string;
  /** Unit of the weights, such as "euros"; empty if unset. */
  readonly unit?: string;
  /** Rows with an id and a weight, at least one; kept as they are. */
  readonly items: readonly object[];
  /** Pairs of ids. */
  readonly conflicts: readonly Conflict[];
  /** Column that holds the id; "id" if unset. */
  readonly id?: string;
  /** Column that holds the weight; "weight" if unset. */
  readonly weight?: string;
}

/**
 * The text of an id: a non-empty string as it is, a finite number or a bigint by its decimal form.
 *
 * @param value whatever stands where an id is expected
 * @returns the id, or `undefined` if it cannot be one
 */
export function idText(value: unknown): string | undefined {
  if (typeof value === "string") return value === "" ? undefined : value;
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : undefined;
  return typeof value === "bigint" ? String(value) : undefined;
}

/** A value as an error message shows it: short, on one line, strings in quotes. */
export function shown(value: unknown): string {
  if (value === undefined) return "nothing";
  let text: string | undefined;
  if (typeof value === "string" || (typeof value === "object" && value !== null)) {
    try {
      text = JSON.stringify(value);
    } catch {
      text = undefined;
    }
  }
  text ??= String(value);
  return text.length > 60 ? `${text.slice(0, 57)}…` : text;
}
