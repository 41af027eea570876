/**
 * Exact weights. Decimals are scaled to integers once, by the least power of ten that makes all of
 * them whole; from then on every sum is a sum of integers, below 2^53 in size. O(n) time.
 */
import { shown } from "./item.ts";

/** Most decimals a scale may have: 10^22 is the largest power of ten a number holds exactly. */
const MOST_DECIMALS = 22;

/** A decimal number: mantissa · 10^exponent. */
interface Decimal {
  /** Integer without trailing zeros; infinite where it is not below 2^53 in size. */
  readonly mantissa: number;
  readonly exponent: number;
}

/** Weights as integers, or what is wrong with them. */
export interface ScaledWeights {
  /** Length n: weight times scale, integers; 0 where a weight could not be read. */
  readonly weights: Float64Array;
  /** A power of ten from 1 to 10^22, the least that makes all weights whole. */
  readonly scale: number;
  /** One sentence for each weight that could not be read, and one if the sum is too large. */
  readonly problems: readonly string[];
}

const DECIMAL = /^([+-]?)(?:(\d+)(?:\.(\d*))?|\.(\d+))(?:[eE]([+-]?\d+))?$/;

/**
 * Scales weights to integers.
 *
 * @param values length n: numbers, bigints, or decimals as text ("12.50", "1e-3", blanks around)
 * @param place names the row of a value in a message, such as `items row 3 (id "a")`
 * @returns the integers with their scale, and all problems
 */
export function scaleWeights(
  values: readonly unknown[],
  place: (i: number) => string,
): ScaledWeights {
  const n = values.length;
  const problems: string[] = [];
  const mantissas = new Float64Array(n), exponents = new Float64Array(n);
  let decimals = 0;
  for (let i = 0; i < n; i++) {
    const decimal = readDecimal(values[i]);
    if (decimal === undefined) {
      problems.push(`${place(i)}: ${complaint(values[i])}`);
      continue;
    }
    mantissas[i] = decimal.mantissa;
    exponents[i] = decimal.exponent;
    if (-decimal.exponent > decimals) decimals = -decimal.exponent;
  }
  const weights = new Float64Array(n);
  let sum = 0;
  for (let i = 0; i < n; i++) {
    // Exact: the power is exact up to 10^22, and a product of integers below 2^53 is not rounded.
    if (mantissas[i] !== 0) weights[i] = mantissas[i] * power(decimals + exponents[i]);
    sum += Math.abs(weights[i]);
  }
  if (decimals > MOST_DECIMALS || !(sum <= Number.MAX_SAFE_INTEGER)) {
    problems.push(tooLarge(values, decimals));
    return { weights: new Float64Array(n), scale: 1, problems };
  }
  return { weights, scale: power(decimals), problems };
}

/**
 * The exact decimal form of a scaled integer, without trailing zeros: 1250 at scale 100 is "12.5".
 *
 * @param value an integer below 2^53 in size
 * @param scale a power of ten from 1 to 10^22
 */
export function formatScaled(value: number, scale: number): string {
  if (scale === 1) return String(value === 0 ? 0 : value);
  const decimals = Math.round(Math.log10(scale));
  const digits = String(Math.abs(value)).padStart(decimals + 1, "0");
  const whole = digits.slice(0, -decimals);
  const rest = digits.slice(-decimals).replace(/0+$/, "");
  return `${value < 0 ? "-" : ""}${whole}${rest === "" ? "" : `.${rest}`}`;
}

/** Length 23: the powers of ten that a number holds exactly. */
const POWERS = Float64Array.from({ length: MOST_DECIMALS + 1 }, (_, k) => Number(`1e${k}`));

/** 10^k, exact for k <= 22; larger powers only ever meet the refusal. */
function power(k: number): number {
  return k <= MOST_DECIMALS ? POWERS[k] : Number(`1e${k}`);
}

function readDecimal(value: unknown): Decimal | undefined {
  if (typeof value === "number") {
    if (Number.isSafeInteger(value)) return { mantissa: value, exponent: 0 };
    if (!Number.isFinite(value)) return undefined;
    return shortDecimal(value) ?? parseDecimal(String(value));
  }
  if (typeof value === "string") return plainDecimal(value) ?? parseDecimal(value);
  return typeof value === "bigint" ? parseDecimal(String(value)) : undefined;
}

/**
 * The shortest decimal form of a number where it has few decimals, without going through text: at
 * most one decimal of up to 15 digits rounds to a given number, so the first found is the shortest.
 */
function shortDecimal(value: number): Decimal | undefined {
  for (let k = 1; k <= 6; k++) {
    const mantissa = Math.round(value * POWERS[k]);
    if (!(Math.abs(mantissa) < 1e15)) return undefined;
    if (mantissa / POWERS[k] === value) return { mantissa, exponent: -k };
  }
  return undefined;
}

/** Digits with at most one point among them, up to 15 digits; other forms are left to the pattern. */
function plainDecimal(text: string): Decimal | undefined {
  if (text.length === 0 || text.length > 16) return undefined;
  let mantissa = 0, point = -1;
  for (let at = 0; at < text.length; at++) {
    const digit = text.charCodeAt(at) - 48;
    if (digit >= 0 && digit <= 9) mantissa = mantissa * 10 + digit;
    else if (digit === -2 && point < 0 && at > 0) point = at;
    else return undefined;
  }
  if (mantissa > 1e15) return undefined;
  let exponent = point < 0 ? 0 : point + 1 - text.length;
  while (exponent < 0 && mantissa % 10 === 0) {
    mantissa /= 10;
    exponent++;
  }
  return { mantissa, exponent };
}

function parseDecimal(text: string): Decimal | undefined {
  const parts = digitsOf(text);
  if (parts === undefined) return undefined;
  const size = Number(parts.digits);
  const mantissa = Number.isSafeInteger(size) ? size : Infinity;
  return { mantissa: parts.negative ? -mantissa : mantissa, exponent: parts.exponent };
}

/** Sign, digits without zeros at either end, and exponent; "0" with exponent 0 for zero. */
function digitsOf(text: string) {
  const match = DECIMAL.exec(text.trim());
  if (match === null) return undefined;
  const fraction = match[3] ?? match[4] ?? "";
  const all = ((match[2] ?? "") + fraction).replace(/^0+/, "");
  const digits = all.replace(/0+$/, "");
  if (digits === "") return { negative: false, digits: "0", exponent: 0 };
  const exponent = Number(match[5] ?? 0) - fraction.length + all.length - digits.length;
  return { negative: match[1] === "-", digits, exponent };
}

/** What is wrong with a value that is not a weight. */
function complaint(value: unknown): string {
  if (value === undefined || value === null || (typeof value === "string" && !value.trim())) {
    return "weight missing; expected a number";
  }
  if (typeof value === "number") return `weight ${value}; expected a finite number`;
  if (typeof value === "string" && /^\s*[+-]?\d+,\d+\s*$/.test(value)) {
    return `weight ${shown(value)}; expected a number with a decimal point, not a comma`;
  }
  return `weight ${shown(value)}; expected a number`;
}

/** The refusal of a sum that passes 2^53, with the largest scale that fits. */
function tooLarge(values: readonly unknown[], decimals: number): string {
  const parts: { digits: string; exponent: number }[] = [];
  for (const value of values) {
    const isNumber = typeof value === "number" || typeof value === "bigint";
    const text = isNumber ? String(value) : value;
    const one = typeof text === "string" ? digitsOf(text) : undefined;
    if (one !== undefined && one.digits !== "0") parts.push(one);
  }
  let fits = Math.min(decimals - 1, MOST_DECIMALS, decimalsNear(parts) + 1);
  while (roundedSum(parts, fits) > BigInt(Number.MAX_SAFE_INTEGER)) fits--;
  const needed = decimals === 0 ? "in whole units" : `at ${count(decimals)}`;
  const advice = fits > 0
    ? `the largest scale that fits is 10^${fits}: round the weights to ${count(fits)}`
    : fits === 0
    ? "the largest scale that fits is 1: round the weights to whole units"
    : `not even whole units fit; the largest scale that fits is 10^${fits}: state the weights in ` +
      `a unit 10^${-fits} times larger`;
  const why = decimals > MOST_DECIMALS && fits === MOST_DECIMALS
    ? `weights have more than ${MOST_DECIMALS} decimals, too many to keep exact`
    : `the sum of the weights passes 2^53 ${needed}, too large to stay exact`;
  return `weights: ${why}; ${advice}`;
}

function count(decimals: number): string {
  return decimals === 1 ? "1 decimal" : `${decimals} decimals`;
}

/** About the largest k for which Σ |w| · 10^k stays below 2^53, from leading digits. */
function decimalsNear(parts: readonly { digits: string; exponent: number }[]): number {
  let longest = -Infinity;
  for (const p of parts) longest = Math.max(longest, p.digits.length + p.exponent);
  let sum = 0;
  for (const p of parts) {
    const size = p.digits.length + p.exponent;
    sum += Number(`0.${p.digits.slice(0, 17)}`) * Number(`1e${size - longest}`);
  }
  return Math.floor(Math.log10(2 ** 53) - longest - Math.log10(sum));
}

/** Σ of |w| · 10^decimals, each rounded to an integer, halves up. */
function roundedSum(
  parts: readonly { digits: string; exponent: number }[],
  decimals: number,
): bigint {
  let sum = 0n;
  for (const { digits, exponent } of parts) {
    const shift = exponent + decimals;
    if (shift >= 0) {
      sum += BigInt(digits + "0".repeat(shift));
    } else if (digits.length + shift >= 0) {
      const keep = digits.length + shift;
      sum += BigInt(digits.slice(0, keep) || "0") + (digits.charCodeAt(keep) >= 53 ? 1n : 0n);
    }
  }
  return sum;
}
