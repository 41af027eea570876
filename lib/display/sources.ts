/**
 * Which instance a result speaks of. A solution holds ids only; its tables and pictures want the
 * rows as well. Whoever makes a result notes the instance here, and the note goes when the result
 * does.
 */
import type { Instance } from "../instance/instance.ts";

const sources = new WeakMap<object, Instance>();

/**
 * Notes the instance of a result.
 *
 * @returns the result, so that the call can stand where the result is returned
 */
export function withSource<T extends object>(result: T, instance: Instance): T {
  sources.set(result, instance);
  return result;
}

/** The instance a result was made from, if it was noted. */
export function sourceOf(result: object): Instance | undefined {
  return sources.get(result);
}
