/**
 * Branch and bound with linear relaxations as bounds: cliques and odd cycles as rows, solved in
 * floating point by HiGHS and rounded to multipliers that prove an exact integer bound. For sparse
 * and for structured pieces, where few strong nodes beat many cheap ones.
 *
 * Depth first, the case with the vertex before the case without; the vertex is picked by pseudo-costs
 * that begin with trial solves (strong branching). No recursion.
 */
import type { Graph } from "../../graph/graph.ts";
import { violatedCliques } from "../../polytope/clique-rows.ts";
import type { Highs } from "../../polytope/highs.ts";
import { stableSetModel } from "../../polytope/model.ts";
import { violatedOddCycles } from "../../polytope/odd-cycle-rows.ts";
import { Relaxation, type RelaxedPoint } from "../../polytope/relaxation.ts";
import { Interrupted, type Meter } from "../../run/meter.ts";
import type { Case, CaseTree } from "./case-tree.ts";
import type { SearchResult } from "./cover-search.ts";
import { branchScore, PseudoCosts } from "./pseudo-costs.ts";
import { denominatorFor, FractionSum } from "./rounded-duals.ts";
import { TermRows } from "./term-rows.ts";

/** Trial solves of one vertex before its pseudo-costs are trusted. */
const TRIALS = 2;
/** Vertices tried at one node at most. */
const CANDIDATES = 5;
/** Rounds of new rows at the root, and at other nodes. */
const ROOT_ROUNDS = 40;
const NODE_ROUNDS = 1;
/** A row that was no use in so many solves is taken out. */
const IDLE_SOLVES = 3;
/** New rows in one round. */
const ROWS_PER_ROUND = 120;

/**
 * Finds a heaviest stable set and the cases that prove it.
 *
 * @param graph a simple graph
 * @param weights length n, positive integers with a sum below 2^53
 * @param cliques cliques that cover every edge; the first rows
 * @param start a stable set to beat, with its weight
 * @param tree where the terms of the proof are numbered
 * @param highs the loaded solver
 * @param meter an interruption ends the search; it is not passed on
 * @param mostNumbers ends the search, with `outgrown` set, when the proof holds more numbers
 */
export function relaxationSearch(
  graph: Graph,
  weights: Float64Array,
  cliques: readonly number[][],
  start: { chosen: Uint8Array; weight: number },
  tree: CaseTree,
  highs: Highs,
  meter: Meter,
  mostNumbers = Infinity,
): SearchResult {
  const search = new RelaxationSearch(graph, weights, cliques, start, tree, highs);
  try {
    return search.turn(meter, mostNumbers);
  } finally {
    search.dispose();
  }
}

/** A solved node: the relaxed point, and what its rounded multipliers prove. */
interface Evaluation {
  readonly point: RelaxedPoint | undefined;
  /** Exact bound for the whole case, chosen vertices included. */
  readonly bound: number;
  /** Pairs (term, multiplier). */
  readonly terms: number[];
}

/** A branching whose second case has not been closed. */
interface Frame {
  readonly node: Case;
  readonly trail: number;
  /** Proved for the whole node. */
  readonly bound: number;
}

const FREE = 0, CHOSEN = 1, OUT = 2;

/** The search as an object that can be stopped and taken up again; arguments as above. */
export class RelaxationSearch {
  #bestChosen: Uint8Array;
  #bestWeight: number;
  readonly #root: Case = {};
  readonly #denominator: number;
  #nodes = 0;
  #numbers = 0;
  /** The case being worked on, and the length of the trail where it begins. */
  #at: Case | undefined = this.#root;
  #atTrail = 0;
  readonly #graph: Graph;
  readonly #weights: Float64Array;
  readonly #relaxation: Relaxation;
  readonly #rows: TermRows;
  /** Weights handed to HiGHS are divided by this. */
  readonly #scale: number;
  /** Length n: FREE, CHOSEN or OUT; `#trail` lists what is not free, in order. */
  readonly #state: Uint8Array;
  readonly #trail: number[] = [];
  #chosenWeight = 0;
  readonly #lower: Float64Array;
  readonly #upper: Float64Array;
  readonly #load: Float64Array;
  readonly #frames: Frame[] = [];
  #currentBound = Infinity;
  readonly #costs: PseudoCosts;

  constructor(
    graph: Graph,
    weights: Float64Array,
    cliques: readonly number[][],
    start: { chosen: Uint8Array; weight: number },
    tree: CaseTree,
    highs: Highs,
  ) {
    const { n } = graph;
    this.#graph = graph;
    this.#weights = weights;
    this.#bestChosen = start.chosen.slice();
    this.#bestWeight = start.weight;
    let heaviest = 1;
    for (let v = 0; v < n; v++) heaviest = Math.max(heaviest, weights[v]);
    this.#denominator = denominatorFor(heaviest);
    let scale = 1;
    while (heaviest / scale > 4096) scale *= 2;
    this.#scale = scale;
    this.#rows = new TermRows(n, cliques, tree);
    this.#relaxation = new Relaxation(highs, {
      ...stableSetModel(weights.map((w) => w / scale), [], false),
      rows: this.#rows.asRows(),
    });
    this.#state = new Uint8Array(n);
    this.#lower = new Float64Array(n);
    this.#upper = new Float64Array(n);
    this.#load = new Float64Array(n);
    this.#costs = new PseudoCosts(n);
  }

  /** Frees what HiGHS holds. */
  dispose(): void {
    this.#relaxation.dispose();
  }

  /** A better stable set, found elsewhere. */
  offer(incumbent: { chosen: Uint8Array; weight: number }): void {
    if (incumbent.weight <= this.#bestWeight) return;
    this.#bestChosen = incumbent.chosen.slice();
    this.#bestWeight = incumbent.weight;
  }

  /**
   * Goes on from where the last turn ended.
   *
   * @param meter an interruption ends the turn; it is not passed on
   * @param mostNumbers ends the search, with `outgrown` set, when the proof holds more numbers
   * @returns where the search stands; `root` only when it is complete
   */
  turn(meter: Meter, mostNumbers = Infinity): SearchResult {
    const nodesBefore = this.#nodes;
    let complete = true, outgrown = false;
    try {
      outgrown = !this.#run(meter, mostNumbers);
      complete = !outgrown;
    } catch (error) {
      if (!(error instanceof Interrupted)) throw error;
      complete = false;
    }
    return {
      chosen: this.#bestChosen.slice(),
      weight: this.#bestWeight,
      upperBound: complete ? this.#bestWeight : Math.max(this.#bestWeight, this.#openBound()),
      root: complete ? this.#root : undefined,
      denominator: this.#denominator,
      nodes: this.#nodes - nodesBefore,
      outgrown,
    };
  }

  /** A bound for all cases not closed; before the root is solved, Infinity. */
  #openBound(): number {
    let bound = this.#currentBound;
    for (const frame of this.#frames) bound = Math.max(bound, frame.bound);
    return bound;
  }

  /** @returns false when the proof has outgrown its limit */
  #run(meter: Meter, mostNumbers: number): boolean {
    this.#undo(this.#atTrail);
    while (this.#at !== undefined) {
      if (this.#numbers > mostNumbers) return false;
      this.#nodes++;
      const branching = this.#close(meter);
      if (branching !== undefined) {
        const { vertex, bound } = branching;
        const node = this.#at;
        node.on = vertex;
        node.chosen = {};
        node.left = {};
        this.#frames.push({ node, trail: this.#trail.length, bound });
        this.#currentBound = bound;
        this.#choose(vertex);
        this.#goOnIn(node.chosen);
        continue;
      }
      const frame = this.#frames.pop();
      if (frame === undefined) {
        this.#at = undefined;
        return true;
      }
      this.#undo(frame.trail);
      this.#leave(frame.node.on as number);
      this.#currentBound = frame.bound;
      this.#goOnIn(frame.node.left as Case);
      meter.report("cases", {
        done: this.#nodes,
        lower: this.#bestWeight,
        upper: Math.max(this.#bestWeight, this.#openBound()),
      });
    }
    return true;
  }

  #goOnIn(node: Case): void {
    this.#at = node;
    this.#atTrail = this.#trail.length;
  }

  /**
   * Closes the current case, perhaps by way of one-sided branchings written below it, or returns what
   * to branch on in the case that is current then.
   */
  #close(meter: Meter): { vertex: number; bound: number } | undefined {
    for (;;) {
      const node = this.#at as Case;
      const evaluation = this.#tightened(meter, node === this.#root);
      node.terms = evaluation.terms;
      this.#numbers += evaluation.terms.length;
      if (evaluation.bound > this.#bestWeight && !this.#state.includes(FREE)) this.#takeState();
      if (evaluation.bound <= this.#bestWeight) return undefined;
      const pick = this.#pick(meter, evaluation);
      if (typeof pick === "number") return { vertex: pick, bound: evaluation.bound };
      // One case is closed already: write it, go on in the other.
      node.on = pick.on;
      const closed: Case = { terms: pick.terms };
      const open: Case = {};
      [node.chosen, node.left] = pick.closed === CHOSEN ? [closed, open] : [open, closed];
      if (pick.closed === CHOSEN) this.#leave(pick.on);
      else this.#choose(pick.on);
      this.#goOnIn(open);
    }
  }

  /** Solves the current node and adds violated rows while that helps. */
  #tightened(meter: Meter, isRoot: boolean): Evaluation {
    let evaluation = this.#evaluate(meter);
    this.#currentBound = Math.min(this.#currentBound, evaluation.bound);
    const rounds = isRoot ? ROOT_ROUNDS : NODE_ROUNDS;
    for (let round = 0; round < rounds; round++) {
      if (evaluation.bound <= this.#bestWeight || evaluation.point === undefined) break;
      const { x, value } = evaluation.point;
      if (this.#takeIfIntegral(x)) {
        if (evaluation.bound <= this.#bestWeight) break;
      }
      const cliques = violatedCliques(this.#graph, x, ROWS_PER_ROUND, meter);
      const cycles = cliques.length >= ROWS_PER_ROUND / 2
        ? []
        : violatedOddCycles(this.#graph, x, ROWS_PER_ROUND, meter);
      if (cliques.length + cycles.length === 0) break;
      const first = this.#rows.count;
      this.#rows.add(cliques, cycles, (v) => this.#state[v] === CHOSEN);
      this.#relaxation.add(this.#rows.asRows(first));
      evaluation = this.#evaluate(meter);
      this.#dropIdleRows(IDLE_SOLVES);
      this.#currentBound = Math.min(this.#currentBound, evaluation.bound);
      if (evaluation.point !== undefined) {
        if (value - evaluation.point.value < 1e-4 * Math.max(1, Math.abs(value)) && !isRoot) break;
        if (value - evaluation.point.value < 1e-5 * Math.max(1, Math.abs(value))) break;
      }
    }
    if (evaluation.bound > this.#bestWeight) this.#dropIdleRows(isRoot ? 0 : IDLE_SOLVES);
    return evaluation;
  }

  #dropIdleRows(patience: number): void {
    const dropped = this.#rows.dropIdle(patience);
    if (dropped !== undefined) this.#relaxation.remove(dropped.drop, dropped.entries);
  }

  /** Solves the relaxation as it stands and computes the exact bound of its rounded multipliers. */
  #evaluate(meter: Meter): Evaluation {
    const { n } = this.#graph;
    for (let v = 0; v < n; v++) {
      this.#lower[v] = this.#state[v] === CHOSEN ? 1 : 0;
      this.#upper[v] = this.#state[v] === OUT ? 0 : 1;
    }
    this.#relaxation.setBounds(this.#lower, this.#upper);
    const point = this.#relaxation.solve(meter);
    const D = this.#denominator, load = this.#load, sum = new FractionSum(D);
    const terms: number[] = [];
    load.fill(0);
    const rows = this.#rows;
    for (let row = 0; point !== undefined && row < rows.count; row++) {
      const multiplier = Math.round(point.multipliers[row] * this.#scale * D);
      rows.used(row, multiplier > 0);
      const vertices = rows.vertices(row);
      if (multiplier <= 0 || !vertices.some((v) => this.#state[v] === FREE)) continue;
      terms.push(rows.term(row), multiplier);
      sum.add(multiplier * rows.left(row));
      for (const v of vertices) load[v] += multiplier;
    }
    let exact = true;
    for (let v = 0; v < n; v++) {
      if (this.#state[v] !== FREE) continue;
      if (load[v] > Number.MAX_SAFE_INTEGER) exact = false;
      const room = D * this.#weights[v] - load[v];
      if (room > 0) sum.add(room);
    }
    return { point, bound: exact ? this.#chosenWeight + sum.floor : Infinity, terms };
  }

  /** The vertex to branch on, or one of whose cases a trial has closed. */
  #pick(
    meter: Meter,
    evaluation: Evaluation,
  ): number | { on: number; closed: number; terms: number[] } {
    const { n, offsets, targets } = this.#graph;
    const { point } = evaluation;
    const listed: { v: number; score: number }[] = [];
    for (let v = 0; v < n; v++) {
      if (this.#state[v] !== FREE) continue;
      const x = point === undefined ? 0.5 : point.x[v];
      if (x < 1e-6 || x > 1 - 1e-6) continue;
      let heft = 0;
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        if (this.#state[targets[a]] === FREE) heft += this.#weights[targets[a]];
      }
      const chosen = this.#costs.mean(0, v, heft / this.#scale / 4) * (1 - x);
      const left = this.#costs.mean(1, v, this.#weights[v] / this.#scale / 4) * x;
      listed.push({ v, score: branchScore(chosen, left) });
    }
    // The point is integral but the bound not closed (rounding, or HiGHS failed): take a free vertex, whichever.
    if (listed.length === 0) return this.#state.indexOf(FREE);
    listed.sort((a, b) => b.score - a.score || a.v - b.v);
    if (point === undefined) return listed[0].v;
    let best = -1, bestScore = -1, misses = 0;
    for (let i = 0; i < listed.length && i < CANDIDATES && misses < 4; i++) {
      const { v, score } = listed[i];
      let real = score;
      if (this.#costs.trials(v) < TRIALS) {
        const trail = this.#trail.length;
        this.#choose(v);
        const chosen = this.#evaluate(meter);
        this.#undo(trail);
        if (chosen.bound <= this.#bestWeight) return { on: v, closed: CHOSEN, terms: chosen.terms };
        this.#leave(v);
        const left = this.#evaluate(meter);
        this.#undo(trail);
        if (left.bound <= this.#bestWeight) return { on: v, closed: OUT, terms: left.terms };
        const losses = [chosen, left].map((e) =>
          Math.max(0, point.value - (e.point?.value ?? point.value))
        );
        this.#costs.learn(0, v, losses[0] / (1 - point.x[v]));
        this.#costs.learn(1, v, losses[1] / point.x[v]);
        real = branchScore(losses[0], losses[1]);
      }
      if (real > bestScore) {
        [best, bestScore] = [v, real];
        misses = 0;
      } else misses++;
    }
    return best;
  }

  /** Records a better stable set when the point is one; says whether it was integral. */
  #takeIfIntegral(x: Float64Array): boolean {
    const { n, offsets, targets } = this.#graph;
    let weight = 0;
    for (let v = 0; v < n; v++) {
      if (x[v] > 1e-6 && x[v] < 1 - 1e-6) return false;
      if (x[v] >= 0.5) weight += this.#weights[v];
    }
    if (weight <= this.#bestWeight) return true;
    for (let v = 0; v < n; v++) {
      if (x[v] < 0.5) continue;
      for (let a = offsets[v]; a < offsets[v + 1]; a++) if (x[targets[a]] >= 0.5) return false;
    }
    this.#bestWeight = weight;
    for (let v = 0; v < n; v++) this.#bestChosen[v] = x[v] >= 0.5 ? 1 : 0;
    return true;
  }

  /** Nothing is free: what is chosen is a stable set, and better than the best. */
  #takeState(): void {
    this.#bestWeight = this.#chosenWeight;
    for (let v = 0; v < this.#state.length; v++) {
      this.#bestChosen[v] = this.#state[v] === CHOSEN ? 1 : 0;
    }
  }

  #choose(v: number): void {
    const { offsets, targets } = this.#graph;
    this.#state[v] = CHOSEN;
    this.#trail.push(v);
    this.#chosenWeight += this.#weights[v];
    this.#rows.shift(v, -1);
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (this.#state[targets[a]] === FREE) this.#leave(targets[a]);
    }
  }

  #leave(v: number): void {
    this.#state[v] = OUT;
    this.#trail.push(v);
  }

  #undo(to: number): void {
    while (this.#trail.length > to) {
      const v = this.#trail.pop() as number;
      if (this.#state[v] === CHOSEN) {
        this.#chosenWeight -= this.#weights[v];
        this.#rows.shift(v, 1);
      }
      this.#state[v] = FREE;
    }
  }
}
