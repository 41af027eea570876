/** Lifts a solution of a gadget instance to the original, with its certificate. */
import type { BlocksProof, Certificate } from "../certify/certificate.ts";
import { Solution, type SolutionPart } from "../certify/solution.ts";
import type { Instance } from "../instance/instance.ts";
import { exactSum } from "../run/exact.ts";
import { Meter } from "../run/meter.ts";
import { blockReplacements } from "./blocks-piece.ts";
import { liftThrough, type Replacing } from "./gadgets-apply.ts";
import type { GadgetInstance } from "./replace-blocks-instance.ts";
import type { InstanceKernel } from "./replace-blocks-kernel.ts";

/**
 * @param solution of the gadget instance, without required or ruled-out items
 * @returns the solution of the original that it stands for, worth no less
 * @throws {RangeError} for a solution that speaks of something else
 */
export function liftSolution(
  original: Instance,
  kernel: InstanceKernel,
  round: Replacing,
  small: GadgetInstance,
  solution: Solution,
): Solution {
  if (solution.instance.fingerprint !== small.instance.fingerprint) {
    throw new RangeError(
      `expected a solution of the gadget instance ${small.instance.fingerprint}, ` +
        `got one of ${solution.instance.fingerprint}`,
    );
  }
  if (solution.choose.length + solution.leave.length > 0 || solution.status === "infeasible") {
    throw new RangeError("expected a solution without required or ruled-out items");
  }
  const meter = new Meter();
  const { start, items, chosen: settled } = kernel;
  const { scale } = original;

  // The choice.
  const taken = new Set(solution.chosen);
  const byId = new Uint8Array(round.after.nextId);
  for (const id of round.after.ids) byId[id] = taken.has(small.nameOf[id]) ? 1 : 0;
  liftThrough(round, byId, meter);
  const chosen = settled.slice();
  start.ids.forEach((id, v) => chosen[items[v]] = byId[id]);
  let settledWeight = 0, weight = 0;
  for (let i = 0; i < chosen.length; i++) {
    if (settled[i] !== 0) settledWeight += original.weights[i];
    if (chosen[i] !== 0) weight += original.weights[i];
  }

  // The bound, in half scaled units: the gadget instance has scale 1.
  const doubled = exactSum(start.costs) - exactSum(round.after.costs) + solution.upperBound;
  const kernelBound = Math.floor(doubled / 2);
  const upperBound = settledWeight + kernelBound;
  const optimal = solution.status === "optimal";
  if (optimal && weight !== upperBound) {
    throw new Error(`an optimal solution lifts to ${weight}, but its bound to ${upperBound}`);
  }
  return new Solution({
    status: solution.status,
    ...(solution.reason !== undefined && { reason: solution.reason }),
    chosen: original.ids.filter((_, i) => chosen[i] !== 0),
    weight: weight / scale,
    upperBound: upperBound / scale,
    parts: partsOf(),
    ...(solution.certificate !== undefined && { certificate: certificateOf(solution.certificate) }),
    elapsedMs: solution.elapsedMs,
    choose: [],
    leave: [],
    instance: {
      name: original.name,
      unit: original.unit,
      items: original.size,
      conflicts: original.conflictCount,
      fingerprint: original.fingerprint,
    },
  });

  function partsOf(): SolutionPart[] {
    const parts: SolutionPart[] = [];
    if (items.length < original.size) {
      parts.push({
        items: original.size - items.length,
        conflicts: kernel.packing.edges.length,
        engine: "relaxation",
        why: ["the half-integral relaxation settles these items"],
        weight: settledWeight / scale,
        upperBound: settledWeight / scale,
        optimal: true,
        figures: {},
        elapsedMs: 0,
      });
    }
    if (items.length > 0) {
      parts.push({
        items: items.length,
        conflicts: start.graph.m,
        engine: "blocks",
        why: solution.parts.map((part) => `what is left: ${part.items} items by ${part.engine}`),
        weight: (weight - settledWeight) / scale,
        upperBound: kernelBound / scale,
        optimal,
        figures: { blocks: round.blocks.length, verticesLeft: round.after.graph.n },
        elapsedMs: solution.elapsedMs,
      });
    }
    return parts;
  }

  function certificateOf(inner: Certificate): Certificate {
    const { rank } = original.canonical;
    const inKernel = new Uint8Array(original.size);
    for (const item of items) inKernel[item] = 1;
    const outside = Array.from(inKernel.keys()).filter((i) => inKernel[i] === 0);
    const { tails, heads } = original.graph;
    const parts: Certificate["parts"][number][] = [];
    if (outside.length > 0) {
      parts.push({
        vertices: outside.map((i) => rank[i]),
        bound: settledWeight,
        proof: {
          rule: "packing",
          ends: kernel.packing.edges.flatMap((e) => [rank[tails[e]], rank[heads[e]]]),
          doubled: kernel.packing.doubled,
        },
      });
    }
    if (items.length > 0) {
      const proof: BlocksProof = {
        ...blockReplacements(start, [round]),
        order: small.order,
        parts: inner.parts,
      };
      parts.push({ vertices: Array.from(items, (i) => rank[i]), bound: kernelBound, proof });
    }
    return {
      kind: "certificate",
      version: 1,
      fingerprint: original.fingerprint,
      choose: [],
      leave: [],
      bound: upperBound,
      parts,
    };
  }
}
