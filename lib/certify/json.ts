/** Results as JSON text and back. Typed arrays are written as plain lists. */
import { Instance } from "../instance/instance.ts";
import type { Displayable } from "../run/displayable.ts";
import { Solution, type SolutionData } from "./solution.ts";
import { Verdict } from "./verdict.ts";

/**
 * A result as JSON text.
 *
 * @param result an instance, a solution, a verdict, or any other result (plain data with a `kind`)
 * @returns JSON; `fromJson` reads it back. O(size) time.
 * @throws {TypeError} for a result that holds a bigint
 */
export function toJson(result: Displayable): string {
  return JSON.stringify(result, (_key, value) => ArrayBuffer.isView(value) ? listOf(value) : value);
}

function listOf(view: ArrayBufferView): number[] {
  return Array.from(view as Float64Array | Int32Array | Uint8Array);
}

/**
 * Reads a result from JSON text.
 *
 * @param text what `toJson` wrote
 * @returns the instance, solution or verdict
 * @throws {SyntaxError} for text that is not JSON
 * @throws {TypeError} for a kind of result that is not read back, naming those that are
 * @throws {InstanceError} for an instance with problems
 */
export function fromJson(text: string): Instance | Solution | Verdict {
  const data = JSON.parse(text);
  switch (data?.kind) {
    case "instance":
      return Instance.from(data);
    case "solution":
      return new Solution(data as SolutionData);
    case "verdict":
      return new Verdict(data.valid, data.reason);
    default:
      throw new TypeError(
        `expected "kind" to be "instance", "solution" or "verdict", got ${
          JSON.stringify(data?.kind)
        }`,
      );
  }
}
