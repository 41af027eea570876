/** Solutions made by hand, for what is shown of them: no solver is asked. */
import { Solution, type SolutionData } from "../../lib/certify/solution.ts";
import type { Instance } from "../../lib/instance/instance.ts";

/**
 * A solution that takes items in input order as long as they fit.
 *
 * @param instance any instance
 * @param change fields that differ from a solution with one optimal part
 */
export function firstFit(instance: Instance, change: Partial<SolutionData> = {}): Solution {
  const { graph, ids, weights, scale } = instance;
  const taken = new Uint8Array(instance.size);
  let weight = 0;
  for (let v = 0; v < instance.size; v++) {
    let free = true;
    for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
      free &&= taken[graph.targets[a]] === 0;
    }
    if (!free) continue;
    taken[v] = 1;
    weight += weights[v];
  }
  return new Solution({
    status: "optimal",
    chosen: ids.filter((_, v) => taken[v] !== 0),
    weight: weight / scale,
    upperBound: weight / scale,
    parts: [{
      items: instance.size,
      conflicts: instance.conflictCount,
      engine: "bipartite",
      why: [],
      weight: weight / scale,
      upperBound: weight / scale,
      optimal: true,
      figures: {},
      elapsedMs: 12.5,
    }],
    elapsedMs: 34.5,
    choose: [],
    leave: [],
    instance: {
      name: instance.name,
      unit: instance.unit,
      items: instance.size,
      conflicts: instance.conflictCount,
      fingerprint: instance.fingerprint,
    },
    ...change,
  });
}
