/** Conflicts to edges: ids looked up, duplicates merged, reasons kept. O(n + k) time beside hashing. */
import { type Graph, graphFromEdges } from "../graph/graph.ts";
import { type Conflict, idText, shown } from "./item.ts";
import { sortPairs } from "./pairs.ts";

/** Names the rows of a source in messages: "items row 3", "offers.csv line 4". */
export interface Places {
  item(i: number): string;
  conflict(i: number): string;
}

/** The reasons of all edges, each text kept once. */
export interface Reasons {
  /** Length m + 1: the reasons of edge e stand at start[e] … start[e+1]-1. */
  readonly start: Int32Array;
  /** Places in `texts`; distinct within one edge, in order of the rows. */
  readonly index: Int32Array;
  readonly texts: readonly string[];
}

/** Conflicts as indices, in order of the rows. */
export interface Ends {
  /** Length k: the lesser index of each conflict. */
  readonly low: Int32Array;
  /** Length k: the greater one. */
  readonly high: Int32Array;
  /** Length k: place in `reasonSets`, -1 without a reason. */
  readonly reason: Int32Array;
  /** Places in `texts`. */
  readonly reasonSets: readonly (readonly number[])[];
  readonly texts: readonly string[];
}

/**
 * Looks ids up and gathers what is wrong.
 *
 * @param conflicts pairs of ids
 * @param index items by id; `undefined` where unknown ids are not to be complained about
 * @param places names rows in messages
 * @param problems receives one sentence for each problem
 */
export function readConflicts(
  conflicts: readonly Conflict[],
  index: ReadonlyMap<string, number> | undefined,
  places: Places,
  problems: string[],
): Ends {
  const list: readonly unknown[] = Array.isArray(conflicts) ? conflicts : [];
  if (!Array.isArray(conflicts)) {
    problems.push(`conflicts: expected an array of pairs of ids, got ${shown(conflicts)}`);
  }
  const k = list.length;
  const low = new Int32Array(k), high = new Int32Array(k), reason = new Int32Array(k).fill(-1);
  const said = new ReasonBook();
  for (let c = 0; c < k; c++) {
    const one = list[c];
    const pair: unknown = Array.isArray(one) ? one : (one as { between?: unknown } | null)?.between;
    if (!Array.isArray(pair) || pair.length !== 2) {
      problems.push(`${places.conflict(c)}: expected two ids, got ${shown(one)}`);
      continue;
    }
    const [a, b] = [idText(pair[0]), idText(pair[1])];
    if (a === undefined || b === undefined) {
      problems.push(`${places.conflict(c)}: expected two ids, got ${shown(pair)}`);
      continue;
    }
    const u = index?.get(a), v = index?.get(b);
    if (index !== undefined && u === undefined) {
      problems.push(`${places.conflict(c)}: unknown id ${shown(a)}; expected the id of an item`);
    }
    if (index !== undefined && v === undefined && a !== b) {
      problems.push(`${places.conflict(c)}: unknown id ${shown(b)}; expected the id of an item`);
    }
    if (a === b) {
      problems.push(`${places.conflict(c)}: item ${shown(a)} in conflict with itself`);
      continue;
    }
    if (u === undefined || v === undefined) continue;
    low[c] = Math.min(u, v);
    high[c] = Math.max(u, v);
    if (!Array.isArray(one)) reason[c] = said.enter((one as { reason?: unknown }).reason);
  }
  return { low, high, reason, reasonSets: said.sets, texts: said.texts };
}

/** Keeps each reason, and each list of reasons, once. */
class ReasonBook {
  readonly texts: string[] = [];
  readonly sets: number[][] = [];
  readonly #textAt = new Map<string, number>();
  readonly #setAt = new Map<string, number>();

  /** The set of a reason or list of reasons; -1 for none. */
  enter(reason: unknown): number {
    if (reason === undefined || reason === null || reason === "") return -1;
    const list = Array.isArray(reason) ? reason.map(String).filter((one) => one !== "") : undefined;
    if (list?.length === 0) return -1;
    const key = list === undefined || list.length === 1
      ? `"${list?.[0] ?? String(reason)}`
      : JSON.stringify(list);
    let at = this.#setAt.get(key);
    if (at === undefined) {
      at = this.sets.push([...new Set(list ?? [String(reason)])].map((text) => this.#place(text))) -
        1;
      this.#setAt.set(key, at);
    }
    return at;
  }

  #place(text: string): number {
    let at = this.#textAt.get(text);
    if (at === undefined) {
      at = this.texts.push(text) - 1;
      this.#textAt.set(text, at);
    }
    return at;
  }
}

/** The simple graph, edges by (lesser, greater) index, with what was merged. */
export interface Merged {
  readonly graph: Graph;
  readonly reasons: Reasons;
  /** Length k: conflicts by edge, in order of the rows within one. */
  readonly order: Int32Array;
  /** Length m + 1: the conflicts of edge e stand at first[e] … first[e+1]-1 of `order`. */
  readonly first: Int32Array;
}

/** Sorts conflicts into edges; those of one pair become one edge. O(n + k) time. */
export function mergeConflicts(n: number, ends: Ends): Merged {
  const { low, high, reason, reasonSets, texts } = ends;
  const order = sortPairs(n, low, high);
  const k = order.length;
  const first = new Int32Array(k + 1);
  let m = 0;
  for (let at = 0; at < k; at++) {
    const c = order[at], before = order[at - 1];
    if (at === 0 || low[c] !== low[before] || high[c] !== high[before]) first[m++] = at;
  }
  first[m] = k;
  const tails = new Int32Array(m), heads = new Int32Array(m), start = new Int32Array(m + 1);
  const index: number[] = [];
  for (let e = 0; e < m; e++) {
    tails[e] = low[order[first[e]]];
    heads[e] = high[order[first[e]]];
    if (first[e + 1] - first[e] === 1) {
      const set = reason[order[first[e]]];
      if (set >= 0) { for (const r of reasonSets[set]) index.push(r); }
    } else {
      const seen = new Set<number>();
      for (let at = first[e]; at < first[e + 1]; at++) {
        const set = reason[order[at]];
        if (set >= 0) { for (const r of reasonSets[set]) seen.add(r); }
      }
      for (const r of seen) index.push(r);
    }
    start[e + 1] = index.length;
  }
  return {
    graph: graphFromEdges(n, tails, heads),
    reasons: { start, index: Int32Array.from(index), texts },
    order,
    first: first.slice(0, m + 1),
  };
}
