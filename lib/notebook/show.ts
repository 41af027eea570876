/**
 * `show` puts a result, a list of results, a graph or a table of plain rows into the notebook, and
 * returns when the output has left the kernel. In a terminal it prints the text form.
 */
import { Displayable, type MimeBundle, render } from "../run/displayable.ts";
import { isGraphLike, renderGraphology } from "../display/graphology.ts";
import { renderRows } from "../display/rows.ts";
import { display, kernel } from "./kernel.ts";

/**
 * Shows a value in the notebook, or prints its text outside one.
 *
 * - a result of this library (instance, solution, classification, verdict …): its own picture
 * - a graphology graph: a drawing
 * - an array of results or graphs: each in turn
 * - an array of plain objects: a table of the first rows
 * - an object with a `Symbol.for("Jupyter.display")` method: what that returns
 * - anything else: its text
 *
 * @param value what to show
 * @returns when the output is out; nothing is lost afterwards
 *
 * @example
 * ```ts
 * import { show } from "./show.ts";
 * await show([{ pitch: 1, offer: 120 }, { pitch: 2, offer: 95.5 }]);
 * ```
 */
export async function show(value: unknown): Promise<void> {
  for (const bundle of await bundlesOf(value)) {
    const to = kernel();
    if (to === undefined) console.log(bundle["text/plain"]);
    else await display(to, bundle);
  }
}

async function bundlesOf(value: unknown): Promise<MimeBundle[]> {
  if (value instanceof Displayable) return [await render(value)];
  if (isGraphLike(value)) return [renderGraphology(value)];
  if (Array.isArray(value) && value.length > 0) {
    if (value.every(isShown)) return (await Promise.all(value.map(bundlesOf))).flat();
    if (value.every(isRow)) return [renderRows(value)];
  }
  const hook = hookOf(value);
  if (hook !== undefined) return [await hook()];
  return [{ "text/plain": typeof value === "string" ? value : textOf(value) }];
}

function isShown(value: unknown): boolean {
  return value instanceof Displayable || isGraphLike(value) || hookOf(value) !== undefined;
}

function isRow(value: unknown): value is Record<string, unknown> {
  if (typeof value !== "object" || value === null) return false;
  const prototype = Object.getPrototypeOf(value);
  return prototype === Object.prototype || prototype === null;
}

function hookOf(value: unknown): (() => MimeBundle | Promise<MimeBundle>) | undefined {
  if (typeof value !== "object" || value === null) return undefined;
  const hook = (value as Record<symbol, unknown>)[Symbol.for("Jupyter.display")];
  return typeof hook === "function" ? () => hook.call(value) : undefined;
}

/** The text of a value that has no picture: JSON where that says more than `String`. */
function textOf(value: unknown): string {
  if (typeof value !== "object" || value === null) return String(value);
  if (value instanceof Error) return `${value.name}: ${value.message}`;
  const own = (value as { toString?: unknown }).toString;
  if (typeof own === "function" && own !== Object.prototype.toString && !Array.isArray(value)) {
    return String(value);
  }
  return JSON.stringify(value, (_key, v) => typeof v === "bigint" ? v.toString() : v, 2);
}
