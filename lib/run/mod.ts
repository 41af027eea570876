/**
 * What every floor stands on: options and progress of long runs, the meter that ends them, errors,
 * seeded random numbers, exact sums, and the way a result shows itself.
 *
 * @example
 * ```ts
 * import { Meter } from "./mod.ts";
 * const meter = new Meter({ timeLimitMs: 1000 });
 * for (let arc = 0; arc < 100; arc++) meter.tick();
 * ```
 * @module
 */
export { type Progress, type RunOptions } from "./options.ts";
export { Interrupted, Meter, type StopReason } from "./meter.ts";
export { InstanceError } from "./errors.ts";
export { Random } from "./random.ts";
export { exactAdd, exactSum } from "./exact.ts";
export { Displayable, type MimeBundle, render } from "./displayable.ts";
