/**
 * The code graphs of N. J. A. Sloane, "Challenge problems: independent sets in graphs" (OEIS
 * A265032), built from their definitions. Vertices are the binary words of length k as numbers from
 * 0 to 2^k - 1; two words are joined when one error each can make them equal, so a stable set is a
 * code that corrects the error.
 */
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";

/** Joins all words that one error can turn into the same word. */
function confusion(k: number, outcomes: (word: number) => Iterable<number>): Graph {
  const n = 2 ** k;
  const sources = new Map<number, number[]>();
  for (let word = 0; word < n; word++) {
    for (const result of new Set(outcomes(word))) {
      const list = sources.get(result);
      if (list === undefined) sources.set(result, [word]);
      else list.push(word);
    }
  }
  const pairs = new Set<number>();
  for (const list of sources.values()) {
    for (let i = 0; i < list.length; i++) {
      for (let j = i + 1; j < list.length; j++) pairs.add(list[i] * n + list[j]);
    }
  }
  const sorted = [...pairs].sort((a, b) => a - b);
  return graphFromPairs(n, sorted.map((key) => [Math.floor(key / n), key % n] as const));
}

/** 1dc.2^k: one letter is deleted. */
export function singleDeletion(k: number): Graph {
  return confusion(k, function* (word) {
    for (let i = 0; i < k; i++) {
      yield (word & ((1 << i) - 1)) | ((word >> (i + 1)) << i);
    }
  });
}

/** 2dc.2^k: two letters are deleted. */
export function doubleDeletion(k: number): Graph {
  const without = (word: number, i: number): number =>
    (word & ((1 << i) - 1)) | ((word >> (i + 1)) << i);
  return confusion(k, function* (word) {
    for (let i = 0; i < k; i++) {
      for (let j = 0; j < k - 1; j++) yield without(without(word, i), j);
    }
  });
}

/** 1tc.2^k: two letters side by side change places, or nothing happens. */
export function transposition(k: number): Graph {
  return confusion(k, function* (word) {
    yield word;
    for (let i = 0; i + 1 < k; i++) yield swapped(word, i, i + 1);
  });
}

/** 1et.2^k: as 1tc, and the first and the last letter may change places as well. */
export function endAroundTransposition(k: number): Graph {
  return confusion(k, function* (word) {
    yield word;
    for (let i = 0; i < k; i++) yield swapped(word, i, (i + 1) % k);
  });
}

/** 1zc.2^k: a 1 turns into a 0 (the Z-channel), or nothing happens. */
export function zChannel(k: number): Graph {
  return confusion(k, function* (word) {
    yield word;
    for (let i = 0; i < k; i++) yield word & ~(1 << i);
  });
}

/** The Kneser graph K(n, k): k-subsets of n things, joined when disjoint. */
export function kneser(n: number, k: number): Graph {
  const subsets: number[] = [];
  for (let set = 0; set < 2 ** n; set++) {
    let size = 0;
    for (let rest = set; rest !== 0; rest &= rest - 1) size++;
    if (size === k) subsets.push(set);
  }
  const pairs: [number, number][] = [];
  for (let i = 0; i < subsets.length; i++) {
    for (let j = i + 1; j < subsets.length; j++) {
      if ((subsets[i] & subsets[j]) === 0) pairs.push([i, j]);
    }
  }
  return graphFromPairs(subsets.length, pairs);
}

function swapped(word: number, i: number, j: number): number {
  const a = (word >> i) & 1, b = (word >> j) & 1;
  return a === b ? word : word ^ (1 << i) ^ (1 << j);
}
