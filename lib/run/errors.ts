/** Problems the message spells out; `problems` holds all of them. */
const SPELT_OUT = 20;

/**
 * Bad input, with every problem found and not just the first.
 *
 * @example
 * ```ts
 * import { InstanceError } from "./errors.ts";
 * const error = new InstanceError(["item 3: weight missing", "item 7: id used twice (also item 2)"]);
 * console.assert(error.problems.length === 2);
 * ```
 */
export class InstanceError extends Error {
  override readonly name = "InstanceError";
  /** One sentence for each problem, naming the row or id and what was expected. */
  readonly problems: readonly string[];

  /** Collects the problems. @param problems at least one sentence */
  constructor(problems: readonly string[]) {
    super(
      problems.length === 1
        ? problems[0]
        : `${problems.length} problems:\n- ${problems.slice(0, SPELT_OUT).join("\n- ")}` +
          (problems.length > SPELT_OUT ? `\n… and ${problems.length - SPELT_OUT} more` : ""),
    );
    this.problems = problems;
  }
}
