/** The sides of a block whose inside and attachments are known, by breadth-first search. */
import type { Graph } from "../graph/graph.ts";
import type { Block } from "./blocks-costs.ts";

/**
 * A block with its sides.
 *
 * @param list the inside
 * @param attachments all its neighbours outside, at most three
 * @param role scratch of length n; is set to `mark` at the inside and must differ elsewhere
 * @returns the block, vertices increasing. O(its size) beside sorting.
 * @throws {RangeError} when inside and attachments, less the edges between these, are not bipartite
 */
export function colouredBlock(
  { offsets, targets }: Graph,
  list: readonly number[],
  attachments: readonly number[],
  role: Int32Array,
  mark: number,
): Block {
  const inside = Int32Array.from(list).sort();
  const side = new Map<number, number>();
  for (const v of inside) role[v] = mark;
  const queue: number[] = [];
  for (const root of inside) {
    if (side.has(root)) continue;
    side.set(root, 0);
    queue.push(root);
    for (let head = queue.length - 1; head < queue.length; head++) {
      const v = queue[head];
      const isInside = role[v] === mark;
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (!isInside && role[u] !== mark) continue;
        if (!side.has(u)) {
          side.set(u, 1 - side.get(v)!);
          queue.push(u);
        } else if (side.get(u) === side.get(v)) {
          throw new RangeError(`expected a bipartite block; ${u} and ${v} are on one side`);
        }
      }
    }
  }
  const at = Int32Array.from(attachments).sort();
  return {
    inside,
    insideSide: Uint8Array.from(inside, (v) => side.get(v)!),
    attachments: at,
    attachmentSide: Uint8Array.from(at, (v) => side.get(v)!),
  };
}
