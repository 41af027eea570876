/**
 * The engine for pieces that a few vertices make bipartite. With an odd cycle transversal X it
 * branches on the vertices of X alone: chosen, or left. The maximum flow of the half-integral
 * relaxation is kept up to date all the way down and undone on the way up; where no vertex of X is
 * at a half any more, the relaxation is exact. At most 2^|X| leaves, far fewer where the bound
 * prunes; each node costs a few searches of O(n + m).
 *
 * The proof is the tree of cases with the flow as multipliers: at the root all of them, below only
 * those that changed.
 */
import type { CaseNode } from "../certify/certificate.ts";
import { CoverFlow } from "../graph/cover-flow.ts";
import type { Graph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { leastTransversal } from "../parity/transversal.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import type { Declined, Piece, Solved } from "./engine.ts";
import { greedyStableSet } from "./greedy.ts";

/** Largest product of cases, 2^|X|, and arcs plus vertices that the engine takes on. */
const LARGEST_ESTIMATE = 2 ** 33;
/** A greedy transversal so many times larger than the limit is not worth a search. */
const HOPELESS = 4;
/** Units of work spent on making X smaller where it is small enough already. */
const POLISHING_WORK = 50_000_000;
/** Units of work spent on making X small: at least, and for each arc and vertex. */
const TRANSVERSAL_WORK = 200_000_000;
const TRANSVERSAL_WORK_PER_ARC = 400;

/**
 * Solves a piece by its odd cycle transversal.
 *
 * @param piece a connected piece
 * @param meter counts the work; when it runs out, what is best so far comes back with its bound
 * @returns the optimum with its tree of cases; declined where the transversal found is too
 *   large
 * @throws {Interrupted} when the meter runs out before a transversal is known
 */
export function solveByTransversal(piece: Piece, meter: Meter): Solved | Declined {
  const { graph } = piece;
  const size = graph.n + 2 * graph.m;
  const limit = Math.max(0, Math.floor(Math.log2(LARGEST_ESTIMATE / Math.max(1, size))));
  const budget = Math.max(TRANSVERSAL_WORK, TRANSVERSAL_WORK_PER_ARC * size);
  let found = leastTransversal(graph, meter.within(budget), { limit: 0 });
  if (found.upper <= HOPELESS * limit) {
    const purse = found.upper <= limit ? POLISHING_WORK : budget;
    const closer = leastTransversal(graph, meter.within(purse), { limit });
    if (closer.upper <= found.upper) found = closer;
  }
  meter.look();
  const { lower, upper, vertices } = found;
  if (upper > limit) {
    const known = lower === upper ? `${upper}` : `${lower} to ${upper}`;
    return {
      status: "declined",
      reason: `its odd cycle transversal has ${known} items; up to ${limit} are taken at this size`,
    };
  }
  return new CaseSearch(piece, vertices, meter).run();
}

/** A node with its second child still to come. */
interface Frame {
  readonly vertex: number;
  /** The bound at the node, in scaled units. */
  readonly bound: number;
  readonly mark: number;
  /** Sum of the weights chosen above, and of those still in play. */
  readonly taken: number;
  readonly open: number;
  secondBegun: boolean;
}

class CaseSearch {
  readonly #piece: Piece;
  readonly #graph: Graph;
  readonly #meter: Meter;
  readonly #X: Int32Array;
  readonly #flow: CoverFlow;
  // Vertices of X decided on the way down.
  readonly #chosen: number[] = [];
  readonly #nodes: CaseNode[] = [];
  readonly #cliques: Int32Array[] = [];
  /** Length m: the term of each edge, -1 before it is first used. */
  readonly #term: Int32Array;
  #best: Uint8Array;
  #weight: number;
  #total = 0;
  #cases = 0;

  constructor(piece: Piece, X: Int32Array, meter: Meter) {
    const { graph, weights } = piece;
    this.#piece = piece;
    this.#graph = graph;
    this.#meter = meter;
    this.#X = X;
    this.#flow = new CoverFlow(graph, weights, meter);
    this.#term = new Int32Array(graph.m).fill(-1);
    this.#best = greedyStableSet(graph, weights);
    this.#weight = this.#weightOf(this.#best);
    for (let v = 0; v < graph.n; v++) this.#total += weights[v];
  }

  run(): Solved {
    const figures = (): Record<string, number> => ({
      transversal: this.#X.length,
      cases: this.#cases,
    });
    const stack: Frame[] = [];
    let relaxed = this.#piece.doubledCosts === undefined
      ? this.#total
      : Math.floor(this.#total / 2);
    try {
      this.#flow.maximise();
      relaxed = this.#total - Math.ceil(this.#flow.total / 2);
      this.#walk(stack);
    } catch (error) {
      if (!(error instanceof Interrupted)) throw error;
      // Open: the second cases that have not begun, and what lies below the last frame.
      const open = stack.filter((f, i) => !f.secondBegun || i === stack.length - 1);
      const upperBound = stack.length === 0
        ? relaxed
        : Math.max(this.#weight, ...open.map((f) => f.bound));
      return {
        status: "feasible",
        chosen: this.#best,
        weight: this.#weight,
        upperBound,
        figures: figures(),
      };
    }
    return {
      status: "optimal",
      chosen: this.#best,
      weight: this.#weight,
      upperBound: this.#weight,
      proof: { rule: "cases", cliques: this.#cliques, oddCycles: [], nodes: this.#nodes },
      figures: figures(),
    };
  }

  #walk(stack: Frame[]): void {
    let descending = this.#enter(stack, 0, 0, this.#total);
    while (stack.length > 0) {
      const frame = stack[stack.length - 1];
      if (!descending) {
        this.#flow.undo(frame.mark);
        if (!frame.secondBegun) this.#chosen.pop();
        else {
          stack.pop();
          continue;
        }
        frame.secondBegun = true;
      }
      const v = frame.vertex;
      const { offsets, targets } = this.#graph;
      const mark = this.#flow.mark();
      let { taken, open } = frame;
      const drop = (u: number): void => {
        open -= this.#flow.capacity(u);
        this.#flow.takeOut(u);
      };
      if (!frame.secondBegun) {
        taken += this.#piece.weights[v];
        this.#chosen.push(v);
        for (let a = offsets[v]; a < offsets[v + 1]; a++) drop(targets[a]);
      }
      drop(v);
      descending = this.#enter(stack, mark, taken, open);
    }
  }

  /**
   * Bounds the case at hand and writes its node down; pushes a frame if it has to be split.
   *
   * @param mark the flow's mark before the decision that led here
   * @param taken weight of the vertices chosen so far
   * @param open weight of the vertices in play
   * @returns whether a frame was pushed
   */
  #enter(stack: Frame[], mark: number, taken: number, open: number): boolean {
    const flow = this.#flow;
    this.#cases++;
    flow.maximise(2 * (taken + open - this.#weight) - 1);
    const bound = taken + open - Math.ceil(flow.total / 2);
    const set = this.#changes(mark);
    const leaf: CaseNode = set.length === 0 ? {} : { set };
    if (bound <= this.#weight) {
      this.#nodes.push(leaf);
      return false;
    }
    const value = flow.values();
    const on = this.#heaviestHalf(value);
    if (on < 0) {
      this.#record(value, bound);
      this.#nodes.push(leaf);
      return false;
    }
    this.#nodes.push({ ...leaf, on: this.#piece.labels[on] });
    stack.push({ vertex: on, bound, mark: this.#flow.mark(), taken, open, secondBegun: false });
    const lower = this.#weight;
    this.#meter.report("cases of the transversal", {
      done: this.#cases,
      total: 2 ** (this.#X.length + 1) - 1,
      lower,
      upper: Math.max(lower, stack[0].bound),
    });
    return true;
  }

  /** The multipliers that changed since a mark, as pairs (term, doubled multiplier). */
  #changes(mark: number): Float64Array {
    const { tails, heads } = this.#graph;
    const { labels } = this.#piece;
    const pairs: number[] = [];
    for (const edge of this.#flow.changedSince(mark)) {
      if (this.#term[edge] < 0) {
        this.#term[edge] = this.#cliques.length;
        this.#cliques.push(Int32Array.of(labels[tails[edge]], labels[heads[edge]]));
      }
      pairs.push(this.#term[edge], this.#flow.doubledCost(edge));
    }
    return Float64Array.from(pairs);
  }

  #heaviestHalf(value: Uint8Array): number {
    let on = -1;
    for (const x of this.#X) {
      if (value[x] !== 1 || this.#flow.capacity(x) === 0) continue;
      if (on < 0 || this.#piece.weights[x] > this.#piece.weights[on]) on = x;
    }
    return on;
  }

  /** Completes an optimum of the relaxation whose halves are bipartite: one side of them. */
  #record(value: Uint8Array, bound: number): void {
    const { n } = this.#graph;
    const half = new Uint8Array(n);
    for (let v = 0; v < n; v++) half[v] = value[v] === 1 && this.#flow.capacity(v) > 0 ? 1 : 0;
    const { side } = twoColouring(this.#graph, half);
    if (side === undefined) throw new Error("the set branched on is no odd cycle transversal");
    const chosen = new Uint8Array(n);
    for (const v of this.#chosen) chosen[v] = 1;
    for (let v = 0; v < n; v++) {
      if (value[v] === 2 || (half[v] !== 0 && side[v] === 0)) chosen[v] = 1;
    }
    const weight = this.#weightOf(chosen);
    if (weight !== bound) throw new Error(`a case of weight ${weight} is bounded by ${bound}`);
    this.#best = chosen;
    this.#weight = weight;
  }

  #weightOf(chosen: Uint8Array): number {
    let sum = 0;
    for (let v = 0; v < chosen.length; v++) if (chosen[v] !== 0) sum += this.#piece.weights[v];
    return sum;
  }
}
