/**
 * The shape of a proof, before anything in it is read: what should be a list is one. An object that
 * merely has a `length`, such as 3.5 or 10^9, would be read in one way here and in another there.
 */
import type { Numbers, Proof } from "./certificate.ts";
import { Rejected } from "./rejected.ts";

/** Refuses anything but a list. @throws {Rejected} */
export function requireList(value: unknown, where: string): void {
  if (!isList(value)) throw new Rejected(`${where}: expected a list`);
}

/**
 * Refuses a proof that has something else where a list should be. The parts of a blocks proof are
 * looked at when their turn comes. O(number of lists) time.
 *
 * @param proof of a known rule
 * @throws {Rejected} naming the first field that is no list
 * @throws {TypeError} where null stands for a node or a block
 */
export function requireShape(proof: Proof): void {
  switch (proof?.rule) {
    case "packing":
      return requireLists(proof, ["ends", "doubled"], "packing");
    case "cases":
      requireLists(proof, ["cliques", "oddCycles", "nodes"], "case tree");
      requireLists(proof.cliques, proof.cliques.keys(), "cliques");
      requireLists(proof.oddCycles, proof.oddCycles.keys(), "odd cycles");
      return proof.nodes.forEach(({ set, split }, i) => {
        if (set !== undefined && !isList(set)) requireList(set, `node ${i}, "set"`);
        if (split === undefined) return;
        requireList(split, `node ${i}, "split"`);
        requireLists(split, split.keys(), `node ${i}, "split"`);
      });
    case "blocks":
      requireLists(proof, ["ends", "doubled", "blocks", "parts"], "blocks");
      if (proof.order !== undefined) requireLists(proof, ["order"], "blocks");
      return proof.blocks.forEach((block, b) =>
        requireLists(block, ["inside", "attachments", "ends", "doubled"], `block ${b}`)
      );
    case "projective":
      return requireLists(proof, ["costs", "rotation", "sources"], "projective");
  }
}

function requireLists<T>(holder: T, fields: Iterable<keyof T>, where: string): void {
  for (const field of fields) {
    if (!isList(holder[field])) requireList(holder[field], `${where}, ${JSON.stringify(field)}`);
  }
}

function isList(value: unknown): value is Numbers {
  return Array.isArray(value) || value instanceof Int32Array || value instanceof Float64Array;
}
