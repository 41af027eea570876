/**
 * Branch and bound on bit sets with weighted clique covers as bounds: for small or dense pieces,
 * where a node must be cheap. A cover is a list of cliques with multipliers whose sum bounds the
 * weight; vertices that the budget (what would not beat the incumbent) leaves uncovered are branched
 * on, the others need no case at all. The scheme is the classic one of Balas and Xue, "Weighted and
 * unweighted maximum clique algorithms with upper bounds from fractional coloring" (Algorithmica
 * 15, 1996) and Babel (Computing 52, 1994), in the complement; written from memory.
 *
 * Memory n²/8 bytes. Exact: all sums are integers below 2^53. Depth of recursion is at most the
 * size of a stable set.
 */
import type { Graph } from "../../graph/graph.ts";
import { Interrupted, type Meter } from "../../run/meter.ts";
import type { Case, CaseTree } from "./case-tree.ts";

/** What a search leaves behind; shared by all searches of this folder. */
export interface SearchResult {
  /** Length n: the heaviest stable set known, the one handed in included. */
  readonly chosen: Uint8Array;
  readonly weight: number;
  /** Exact integer >= the optimum; equal to `weight` when the search was completed. */
  readonly upperBound: number;
  /** The tree of cases when completed; multipliers are multiples of 1 / denominator. */
  readonly root?: Case;
  readonly denominator: number;
  readonly nodes: number;
  /** The search was given up because its proof had grown too large. */
  readonly outgrown?: boolean;
}

/**
 * Finds a heaviest stable set and the cases that prove it.
 *
 * @param graph a simple graph of at most a few thousand vertices
 * @param weights length n, positive integers with a sum below 2^53
 * @param start a stable set to beat, with its weight
 * @param tree where the terms of the proof are numbered
 * @param meter an interruption ends the search; it is not passed on
 * @param mostNumbers ends the search, with `outgrown` set, when the proof holds more numbers
 */
export function coverSearch(
  graph: Graph,
  weights: Float64Array,
  start: { chosen: Uint8Array; weight: number },
  tree: CaseTree,
  meter: Meter,
  mostNumbers = Infinity,
): SearchResult {
  const search = new CoverSearch(graph, weights, start, tree, meter, mostNumbers);
  const open = search.run();
  return {
    chosen: search.bestChosen,
    weight: search.bestWeight,
    upperBound: Math.max(search.bestWeight, open),
    root: search.stopped ? undefined : search.root,
    denominator: 1,
    nodes: search.nodes,
    outgrown: search.outgrown,
  };
}

/** Scratch of one depth of the recursion. */
interface Level {
  /** Bit sets of W words. */
  readonly inPlay: Int32Array;
  readonly uncovered: Int32Array;
  /** Length n: weight not yet covered. */
  readonly rest: Float64Array;
  /** Vertices to branch on, in the order found. */
  readonly branch: Int32Array;
}

class CoverSearch {
  bestWeight: number;
  readonly bestChosen: Uint8Array;
  nodes = 0;
  stopped = false;
  /** Stopped because the proof has grown too large to keep. */
  outgrown = false;
  root: Case = {};
  readonly #n: number;
  readonly #words: number;
  /** Position to vertex; positions are what the bit sets number. */
  readonly #order: Int32Array;
  /** By position. */
  readonly #weights: Float64Array;
  /** n rows of W words: neighbours by position. */
  readonly #near: Int32Array;
  readonly #levels: Level[] = [];
  readonly #path: number[] = [];
  readonly #tree: CaseTree;
  readonly #meter: Meter;
  /** The clique being built, by position and by vertex. */
  readonly #clique: Int32Array;
  readonly #named: Int32Array;
  readonly #candidates: Int32Array;
  readonly #mostNumbers: number;
  #numbers = 0;
  #work = 0;

  constructor(
    graph: Graph,
    weights: Float64Array,
    start: { chosen: Uint8Array; weight: number },
    tree: CaseTree,
    meter: Meter,
    mostNumbers: number,
  ) {
    const n = graph.n;
    this.#mostNumbers = mostNumbers;
    this.#n = n;
    this.#words = (n + 31) >>> 5;
    this.#tree = tree;
    this.#meter = meter;
    this.bestWeight = start.weight;
    this.bestChosen = start.chosen.slice();
    this.#order = coverOrder(graph);
    this.#weights = Float64Array.from(this.#order, (v) => weights[v]);
    this.#near = new Int32Array(n * this.#words);
    const position = new Int32Array(n);
    this.#order.forEach((v, p) => position[v] = p);
    for (let e = 0; e < graph.m; e++) {
      const p = position[graph.tails[e]], q = position[graph.heads[e]];
      this.#near[p * this.#words + (q >>> 5)] |= 1 << (q & 31);
      this.#near[q * this.#words + (p >>> 5)] |= 1 << (p & 31);
    }
    this.#clique = new Int32Array(n);
    this.#named = new Int32Array(n);
    this.#candidates = new Int32Array(this.#words);
  }

  /** @returns a bound for what was left open; -Infinity when nothing was */
  run(): number {
    const all = this.#level(0).inPlay;
    for (let p = 0; p < this.#n; p++) all[p >>> 5] |= 1 << (p & 31);
    return this.#expand(0, 0, this.root);
  }

  #level(depth: number): Level {
    return this.#levels[depth] ??= {
      inPlay: new Int32Array(this.#words),
      uncovered: new Int32Array(this.#words),
      rest: new Float64Array(this.#n),
      branch: new Int32Array(this.#n),
    };
  }

  /**
   * Closes the case in which the path is chosen and `levels[depth].inPlay` is still in play.
   *
   * @returns a bound for the part left open by an interruption; -Infinity when closed
   */
  #expand(depth: number, weight: number, node: Case): number {
    this.nodes++;
    const { inPlay, rest, branch } = this.#level(depth);
    if (weight > this.bestWeight) this.#record(weight);
    const terms: number[] = [];
    const { used, count } = this.#cover(depth, this.bestWeight - weight, terms);
    if (count === 0) {
      node.terms = terms;
      return -Infinity;
    }
    let surplus = 0;
    for (let i = 0; i < count; i++) surplus += rest[branch[i]];
    const words = this.#words, near = this.#near;
    const child = this.#level(depth + 1).inPlay;
    let at = node;
    for (let i = count - 1; i >= 0; i--) {
      this.stopped ||= this.#interrupted();
      if (depth < 3) {
        this.#meter.report("cases", { done: this.nodes, lower: this.bestWeight });
      }
      // Open now: this case and those not begun, all within the cover and the uncovered rest.
      if (this.stopped) return weight + used + surplus;
      const p = branch[i], row = p * words;
      at.on = this.#order[p];
      at.chosen = {};
      at.left = {};
      inPlay[p >>> 5] &= ~(1 << (p & 31));
      for (let k = 0; k < words; k++) child[k] = inPlay[k] & ~near[row + k];
      this.#path.push(p);
      const open = this.#expand(depth + 1, weight + this.#weights[p], at.chosen);
      this.#path.pop();
      surplus -= rest[p];
      if (this.stopped) return Math.max(open, weight + used + surplus);
      at = at.left;
    }
    at.terms = terms;
    return -Infinity;
  }

  /**
   * Covers as much as the budget allows. Afterwards `rest` is zero for vertices in play that are not
   * listed in `branch`.
   */
  #cover(depth: number, budget: number, terms: number[]): { used: number; count: number } {
    const { inPlay, uncovered, rest, branch } = this.#level(depth);
    const words = this.#words, near = this.#near, weights = this.#weights;
    const clique = this.#clique, named = this.#named, candidates = this.#candidates;
    let used = 0, count = 0, work = 0;
    for (let k = 0; k < words; k++) {
      uncovered[k] = inPlay[k];
      for (let bits = inPlay[k]; bits !== 0; bits &= bits - 1) {
        const p = (k << 5) + 31 - Math.clz32(bits & -bits);
        rest[p] = weights[p];
      }
    }
    for (let k = 0; k < words; k++) {
      while (uncovered[k] !== 0) {
        const p = (k << 5) + 31 - Math.clz32(uncovered[k] & -uncovered[k]);
        if (used >= budget) {
          uncovered[k] &= uncovered[k] - 1;
          branch[count++] = p;
          continue;
        }
        // A clique of uncovered vertices, greedily; everything before p is covered or to be branched.
        let size = 0, least = rest[p];
        clique[size++] = p;
        for (let j = k; j < words; j++) candidates[j] = uncovered[j] & near[p * words + j];
        for (let j = k; j < words; j++) {
          while (candidates[j] !== 0) {
            const q = (j << 5) + 31 - Math.clz32(candidates[j] & -candidates[j]);
            clique[size++] = q;
            if (rest[q] < least) least = rest[q];
            const row = q * words;
            for (let i = j; i < words; i++) candidates[i] &= near[row + i];
            work += words - j;
          }
        }
        if (used + least > budget) {
          // The whole of p does not fit. What the budget has left is spent on this clique all the
          // same, so that the uncovered rest of its vertices is less.
          least = budget - used;
        }
        used += least;
        for (let i = 0; i < size; i++) named[i] = this.#order[clique[i]];
        terms.push(this.#tree.clique(named, size), least);
        for (let i = 0; i < size; i++) {
          const q = clique[i];
          rest[q] -= least;
          if (rest[q] <= 0) uncovered[q >>> 5] &= ~(1 << (q & 31));
        }
        work += 2 * words + 4 * size;
      }
    }
    this.#work += work;
    this.#numbers += 2 + terms.length;
    return { used, count };
  }

  /** Passes the work done on to the meter. */
  #interrupted(): boolean {
    if (this.#numbers > this.#mostNumbers) return this.outgrown = true;
    try {
      this.#meter.tick(6 * this.#work + this.#words);
      this.#work = 0;
      return false;
    } catch (error) {
      if (!(error instanceof Interrupted)) throw error;
      return true;
    }
  }

  #record(weight: number): void {
    this.bestWeight = weight;
    this.bestChosen.fill(0);
    for (const p of this.#path) this.bestChosen[this.#order[p]] = 1;
  }
}

/**
 * The order in which vertices are covered: repeatedly the vertex with most neighbours among those
 * left goes to the end (degeneracy order of the complement).
 */
function coverOrder(graph: Graph): Int32Array {
  const { n, offsets, targets } = graph;
  const left = new Int32Array(n);
  for (let v = 0; v < n; v++) left[v] = offsets[v + 1] - offsets[v];
  const order = new Int32Array(n);
  const done = new Uint8Array(n);
  for (let at = n - 1; at >= 0; at--) {
    let pick = -1;
    for (let v = 0; v < n; v++) {
      if (done[v] === 0 && (pick < 0 || left[v] > left[pick])) pick = v;
    }
    done[pick] = 1;
    order[at] = pick;
    for (let a = offsets[pick]; a < offsets[pick + 1]; a++) left[targets[a]]--;
  }
  return order;
}
