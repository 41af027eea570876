/** Figures as people read them. The same on every machine: nothing here asks for a locale. */

/** An integer or decimal with its whole part in groups of three: 12480.5 gives "12,480.5". */
export function numberText(value: number): string {
  return groupDigits(String(value));
}

/** A number without its decimals where they do not matter: bounds in a line of progress, counts. */
export function integerText(value: number): string {
  return Number.isFinite(value) ? groupDigits(String(Math.round(value))) : String(value);
}

/** Groups the whole digits of a decimal in threes; text that is no plain decimal stays as it is. */
export function groupDigits(decimal: string): string {
  const match = /^(-?)(\d+)(\.\d+)?$/.exec(decimal);
  if (match === null) return decimal;
  const [, sign, whole, rest = ""] = match;
  return `${sign}${whole.replace(/\B(?=(\d{3})+$)/g, ",")}${rest}`;
}

/** A number of things: `counted(1, "item")` is "1 item", `counted(3, "copy", "copies")` "3 copies". */
export function counted(count: number, one: string, many: string = `${one}s`): string {
  return `${numberText(count)} ${count === 1 ? one : many}`;
}

/** A duration: milliseconds below a second, then seconds, then minutes. */
export function secondsText(ms: number): string {
  if (ms < 10) return `${Math.max(0, ms).toFixed(1)} ms`;
  if (ms < 1000) return `${Math.round(ms)} ms`;
  if (ms < 99_950) return `${(ms / 1000).toFixed(1)} s`;
  const seconds = Math.round(ms / 1000);
  return `${Math.floor(seconds / 60)} min ${seconds % 60} s`;
}

/** A share of one as a percentage, rounded up so that a gap never reads as zero. */
export function percentText(share: number): string {
  return `${Math.ceil(share * 1e4) / 100}%`;
}

/** A list in a sentence: "a", "a and b", "a, b and c". Beyond `most` entries the rest is counted. */
export function listText(entries: readonly string[], most: number = Infinity): string {
  if (entries.length > most) {
    const rest = entries.length - most;
    return `${entries.slice(0, most).join(", ")} and ${numberText(rest)} more`;
  }
  if (entries.length <= 1) return entries.join("");
  return `${entries.slice(0, -1).join(", ")} and ${entries[entries.length - 1]}`;
}

/** A cell of a table as text: nothing for null and undefined, dates in ISO form. */
export function cellText(value: unknown): string {
  if (value === undefined || value === null) return "";
  if (typeof value === "number") return numberText(value);
  if (value instanceof Date) return Number.isNaN(value.getTime()) ? "" : value.toISOString();
  if (typeof value === "object") {
    return JSON.stringify(value, (_key, v) => typeof v === "bigint" ? String(v) : v) ?? "";
  }
  return String(value);
}
