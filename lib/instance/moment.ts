/** Points in time or on any line, as numbers that can be compared. */

/** Scales a moment can be on; two moments compare only on one of them. */
export type MomentScale = "number" | "date" | "clock";

/** How a message calls each scale. */
export const SCALE_NAMES: Readonly<Record<MomentScale, string>> = {
  number: "a number",
  date: "a date",
  clock: "a time of day",
};

export interface Moment {
  /** The number itself; milliseconds since 1970 UTC; milliseconds since midnight. */
  readonly at: number;
  readonly scale: MomentScale;
  /** As a reason quotes it. */
  readonly text: string;
}

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;
const CLOCK = /^(\d{1,2}):(\d{2})(?::(\d{2})(?:\.(\d{1,3}))?)?$/;
const ISO =
  /^(\d{4})-(\d{2})-(\d{2})(?:[T ](\d{2}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)?\s*(Z|[+-]\d{2}(?::?\d{2})?)?)?$/i;

/**
 * Reads a moment: a finite number, a Date, or text with a number, a time of day ("18:00", "24:00")
 * or an ISO 8601 date with or without time. Without a zone a time counts as UTC, so that the same
 * table means the same everywhere.
 *
 * @returns the moment, or `undefined` if the value is none of these
 */
export function readMoment(value: unknown): Moment | undefined {
  if (typeof value === "number") {
    return Number.isFinite(value) ? { at: value, scale: "number", text: String(value) } : undefined;
  }
  if (typeof value === "bigint") return readMoment(Number(value));
  if (value instanceof Date) {
    const at = value.getTime();
    if (Number.isNaN(at)) return undefined;
    const text = value.toISOString().replace("T", " ").replace(/(:00)?\.000Z$/, "Z");
    return { at, scale: "date", text };
  }
  if (typeof value !== "string") return undefined;
  const text = value.trim();
  if (NUMBER.test(text)) {
    const at = Number(text);
    return Number.isFinite(at) ? { at, scale: "number", text } : undefined;
  }
  const clock = CLOCK.exec(text);
  if (clock !== null) {
    const at = clockMs(clock[1], clock[2], clock[3], clock[4]);
    return at === undefined ? undefined : { at, scale: "clock", text };
  }
  const iso = ISO.exec(text);
  return iso === null ? undefined : isoMoment(iso, text);
}

/** A stretch between two moments as a reason quotes it. */
export function stretch(length: number, scale: MomentScale): string {
  if (scale === "number") return String(length);
  const units: [number, string][] = [[3600000, "h"], [60000, "min"], [1000, "s"]];
  for (const [ms, unit] of units) if (length % ms === 0) return `${length / ms} ${unit}`;
  return `${length} ms`;
}

function clockMs(h: string, m: string, s = "0", fraction = "0"): number | undefined {
  const seconds = Number(h) * 3600 + Number(m) * 60 + Number(s);
  if (Number(m) > 59 || Number(s) > 59) return undefined;
  const at = seconds * 1000 + Math.floor(Number(`0.${fraction}`) * 1000);
  return at > 86400000 ? undefined : at;
}

function isoMoment(iso: RegExpExecArray, text: string): Moment | undefined {
  const [, year, month, day, h = "0", m = "0", s = "0", fraction = "0", zone = "Z"] = iso;
  const time = clockMs(h, m, s, fraction.slice(0, 3));
  if (time === undefined) return undefined;
  // Date.UTC takes years below 100 as 19xx, and rolls over days a month does not have.
  const midnight = new Date(0);
  midnight.setUTCFullYear(Number(year), Number(month) - 1, Number(day));
  if (midnight.getUTCMonth() !== Number(month) - 1 || midnight.getUTCDate() !== Number(day)) {
    return undefined;
  }
  const digits = zone.replace(":", "");
  const shift = /^z$/i.test(zone)
    ? 0
    : Number(digits.slice(1, 3)) * 60 + Number(digits.slice(3) || 0);
  const ahead = zone.startsWith("-") ? -shift : shift;
  return {
    at: midnight.getTime() + time - ahead * 60000,
    scale: "date",
    text: text.replace(/T/i, " "),
  };
}
