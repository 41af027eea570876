/** From a graphology graph to an instance; `Instance.toGraph` is the way back. O(n + m) time. */
import type { AbstractGraph } from "graphology-types";
import { InstanceError } from "../run/errors.ts";
import { assemble } from "./assemble.ts";
import { Instance } from "./instance.ts";
import { type Conflict, shown } from "./item.ts";

/** What `readGraph` takes beside the graph. */
export interface GraphOptions {
  /** Node attribute that holds the weight, "weight" if unset; or a number, the weight of all. */
  readonly weight?: string | number;
  /** Shown in titles. */
  readonly name?: string;
  /** Unit of the weights. */
  readonly unit?: string;
}

/**
 * Reads a graphology graph, directed or not: a node is an item with its key as id, an edge is a
 * conflict whichever way it points, with its attribute `reason` (a text) or `reasons` (a list).
 *
 * @param graph any graphology graph
 * @param options where the weights stand
 * @returns the instance; its rows are the nodes' attributes with `id` set, and `weight` where the
 *   weight is a number for all
 * @throws {InstanceError} listing all problems: a loop, a weight that is missing or not a number
 */
export function readGraph(graph: AbstractGraph, options: GraphOptions = {}): Instance {
  const { weight = "weight", name, unit } = options;
  if (typeof graph?.forEachNode !== "function") {
    throw new InstanceError([`expected a graphology graph, got ${shown(graph)}`]);
  }
  const items: Record<string, unknown>[] = [];
  graph.forEachNode((key, attributes) => {
    items.push({ ...attributes, id: key, ...typeof weight === "number" ? { weight } : {} });
  });
  const conflicts: Conflict[] = [], keys: string[] = [];
  graph.forEachEdge((key, attributes, source, target) => {
    const reason = attributes.reasons ?? attributes.reason;
    conflicts.push({ between: [source, target], reason });
    keys.push(key);
  });
  return new Instance(assemble(
    { name, unit, items, conflicts, weight: typeof weight === "number" ? "weight" : weight },
    {
      places: {
        item: (i) => `node ${shown(items[i].id)}`,
        conflict: (c) => `edge ${shown(keys[c])}`,
      },
    },
  ));
}
