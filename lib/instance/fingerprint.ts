/**
 * The fingerprint of an instance: SHA-256 of a canonical form, so that a certificate names exactly
 * the data it speaks of. It does not depend on the order of rows, on how a decimal is written
 * ("1.50" or 1.5), or on names, units, reasons and further columns. O((n + m) log(n + m)) time; the
 * form is streamed through a small buffer and never held.
 *
 * The form is UTF-8 text; every line ends in "\n":
 *
 *     evenface instance 1
 *     items N
 *     ID WEIGHT          N lines, ids by UTF-16 code units; ID as a JSON string (lone surrogates
 *                        escaped), WEIGHT as a decimal without superfluous zeros ("-12.5", "0")
 *     conflicts M
 *     A B                M lines, A < B are places in that order from 0; lines by A, then B
 */
import { createHash } from "node:crypto";
import type { Graph } from "../graph/graph.ts";
import { sortPairs } from "./pairs.ts";
import { formatScaled } from "./weights.ts";

/** The order of items that fingerprints and certificates number them by. */
export interface CanonicalOrder {
  /** Length n: the item at each rank. */
  readonly order: Int32Array;
  /** Length n: the rank of each item. */
  readonly rank: Int32Array;
}

/**
 * Ranks items by their ids, compared by UTF-16 code units. O(n log n) time.
 *
 * @param ids distinct ids
 * @param indexOf the index of an id
 */
export function canonicalOrder(
  ids: readonly string[],
  indexOf: (id: string) => number,
): CanonicalOrder {
  const order = Int32Array.from(ids.slice().sort(), indexOf);
  const rank = new Int32Array(order.length);
  for (let r = 0; r < order.length; r++) rank[order[r]] = r;
  return { order, rank };
}

/** Characters gathered before they go to the hash. */
const CHUNK = 1 << 16;

/**
 * @param ids length n
 * @param weights length n, scaled integers
 * @param scale power of ten
 * @param graph n vertices, simple
 * @param canonical the order of the ids
 * @returns 64 hexadecimal digits
 */
export function fingerprintOf(
  ids: readonly string[],
  weights: Float64Array,
  scale: number,
  graph: Graph,
  canonical: CanonicalOrder,
): string {
  const hash = createHash("sha256");
  const { order, rank } = canonical;
  let text = `evenface instance 1\nitems ${order.length}\n`;
  const add = (line: string) => {
    text += line;
    if (text.length < CHUNK) return;
    hash.update(text, "utf8");
    text = "";
  };
  for (const i of order) add(`${JSON.stringify(ids[i])} ${formatScaled(weights[i], scale)}\n`);
  add(`conflicts ${graph.m}\n`);
  const low = new Int32Array(graph.m), high = new Int32Array(graph.m);
  for (let e = 0; e < graph.m; e++) {
    const a = rank[graph.tails[e]], b = rank[graph.heads[e]];
    low[e] = Math.min(a, b);
    high[e] = Math.max(a, b);
  }
  for (const e of sortPairs(graph.n, low, high)) add(`${low[e]} ${high[e]}\n`);
  return hash.update(text, "utf8").digest("hex");
}
