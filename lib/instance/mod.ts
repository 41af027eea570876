/**
 * Items with exact weights and conflicts with reasons: checked once, at the door, with every problem
 * named; arrays from then on. Knows nothing of how an instance is solved.
 *
 * @example
 * ```ts
 * import { Instance } from "./mod.ts";
 * const instance = Instance.from({
 *   items: [{ id: "a", weight: 3 }, { id: "b", weight: 2 }, { id: "c", weight: 2 }],
 *   conflicts: [["a", "b"], ["a", "c"]],
 * });
 * console.assert(instance.size === 3 && instance.conflictCount === 2);
 * ```
 * @module
 */
export type { UndirectedGraph } from "graphology";
export type { AbstractGraph } from "graphology-types";
export { type EdgeAttributes, Instance, type NodeAttributes } from "./instance.ts";
export { type Conflict, type InstanceInput, type Item, type Row, type Weight } from "./item.ts";
export { type CanonicalOrder } from "./fingerprint.ts";
export { formatScaled } from "./weights.ts";
export { readRows, readTables, type Tables, type TableSource } from "./tables.ts";
export { toCsv } from "./csv.ts";
export { readDimacs, toDimacs } from "./dimacs.ts";
export { type GraphOptions, readGraph } from "./graphology.ts";
export { type Column, type RuleOptions } from "./rule.ts";
export { overlapConflicts, type OverlapOptions } from "./overlap.ts";
export { distanceConflicts, type DistanceOptions, EARTH_RADIUS_METRES } from "./distance.ts";
export { sharedConflicts, type SharedOptions } from "./shared.ts";
