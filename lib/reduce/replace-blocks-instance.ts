/** Writes a kernel with gadgets as an instance, and the gadgets as tables a person can read. */
import { Instance } from "../instance/instance.ts";
import type { Conflict } from "../instance/item.ts";
import type { ReplacedBlock, Replacing } from "./gadgets-apply.ts";
import type { InstanceKernel } from "./replace-blocks-kernel.ts";
import type { GadgetInfo, GadgetState } from "./replacement.ts";

/** The gadget instance and the names of its vertices. */
export interface GadgetInstance {
  readonly instance: Instance;
  /** The item's id by vertex id of the round; "" for vertices that were replaced. */
  readonly nameOf: readonly string[];
  /** The vertex id by canonical rank of the gadget instance. */
  readonly order: Int32Array;
  readonly gadgets: readonly GadgetInfo[];
}

/**
 * @param original the instance whose kernel it is
 * @param round the replacement of the kernel's blocks
 * @returns the instance; its weights are the sums of doubled costs, so they are integers
 */
export function gadgetInstance(
  original: Instance,
  kernel: InstanceKernel,
  round: Replacing,
): GadgetInstance {
  const { before, after, blocks } = round;
  const nameOf: string[] = new Array(after.nextId).fill("");
  after.ids.forEach((id) => {
    if (id >= before.nextId) nameOf[id] = "gadget";
  });
  before.ids.forEach((id, v) => nameOf[id] = original.ids[kernel.items[v]]);
  blocks.forEach(({ gadget, firstId }, b) => {
    for (let j = 0; j < gadget.vertices; j++) {
      nameOf[firstId + j] = freeId(original, `gadget ${b + 1}.${j + 1}`);
    }
  });
  const { graph: { n, m, tails, heads }, costs, ids } = after;
  const weights = new Float64Array(n);
  const conflicts: Conflict[] = [];
  const gone = new Uint8Array(before.graph.n);
  for (const { block } of blocks) for (const v of block.inside) gone[v] = 1;
  // Edges that stay come first, in their order; gadget edges follow.
  let kept = 0;
  const nextKept = () => {
    while (
      kept < before.graph.m && gone[before.graph.tails[kept]] + gone[before.graph.heads[kept]] > 0
    ) kept++;
    return kept < before.graph.m ? kernel.edges[kept++] : -1;
  };
  for (let e = 0; e < m; e++) {
    weights[tails[e]] += costs[e];
    weights[heads[e]] += costs[e];
    const between = [nameOf[ids[tails[e]]], nameOf[ids[heads[e]]]] as const;
    const edge = nextKept();
    conflicts.push({ between, reason: edge < 0 ? ["gadget"] : original.reasonsOf(edge) });
  }
  const items = Array.from(ids, (id, v) => ({ id: nameOf[id], weight: weights[v] }));
  // An instance has at least one item; one worth nothing changes nothing.
  if (items.length === 0) items.push({ id: "nothing left", weight: 0 });
  const unitsPer = 2 * original.scale;
  const instance = Instance.from({
    name: `${original.name} with gadgets`,
    unit: original.unit === "" ? `1/${unitsPer}` : `1/${unitsPer} ${original.unit}`,
    items,
    conflicts,
  });
  const vertexId = new Map<string, number>();
  for (const id of ids) vertexId.set(nameOf[id], id);
  return {
    instance,
    nameOf,
    order: Int32Array.from(instance.canonical.order, (i) => vertexId.get(instance.ids[i]) ?? -1),
    gadgets: blocks.map((replaced) => infoOf(round, replaced, nameOf, unitsPer)),
  };
}

/** An id that no item has. */
function freeId(original: Instance, wanted: string): string {
  let id = wanted;
  while (original.indexOf(id) >= 0) id += "'";
  return id;
}

function infoOf(
  { before }: Replacing,
  { block, table, gadget, firstId }: ReplacedBlock,
  nameOf: readonly string[],
  unitsPer: number,
): GadgetInfo {
  const { offsets, targets } = before.graph;
  const at = block.attachments, k = at.length;
  const attachments = Array.from(at, (v) => nameOf[before.ids[v]]);
  const joined = (u: number, v: number) => targets.subarray(offsets[u], offsets[u + 1]).includes(v);
  const states: GadgetState[] = [];
  for (let mask = 0; mask < 1 << k; mask++) {
    const chosen = Array.from(at.keys()).filter((i) => (mask >> i & 1) !== 0);
    if (chosen.some((i) => chosen.some((j) => i < j && joined(at[i], at[j])))) continue;
    // p is x on side 0 and 1 - x on side 1.
    let P = 0;
    for (let i = 0; i < k; i++) if ((mask >> i & 1) !== block.attachmentSide[i]) P |= 1 << i;
    states.push({ chosen: chosen.map((i) => attachments[i]), cost: table[P] / unitsPer });
  }
  const nameAt = (i: number) => i < k ? attachments[i] : nameOf[firstId + i - k];
  return {
    kind: gadget.kind,
    block: { items: Array.from(block.inside, (v) => nameOf[before.ids[v]]), attachments },
    items: Array.from({ length: gadget.vertices }, (_, j) => nameOf[firstId + j]),
    conflicts: gadget.costs.map((cost, e) => ({
      between: [nameAt(gadget.edges[2 * e]), nameAt(gadget.edges[2 * e + 1])] as const,
      cost: cost / unitsPer,
    })),
    table: states,
  };
}
