/**
 * The least-cost one-sided directed cycle of the dual, with the plan of searches that proves it.
 *
 * For every face x of a one-sided curve the distance d(x, x̄) to its antipode is bounded from below by
 * a potential. The searches form a tree: the first one looks at the whole sphere, each further one
 * serves the middle of the sources that are still open on one side of its parent, and improves the
 * parent's potential. Near the parent that is good already, so a search deep in the tree looks at
 * a small part of the sphere. In practice the work grows little faster than the sphere; at worst it is
 * one Dijkstra search, O(m log m), for each source.
 */
import { HeapQueue } from "../../graph/heap.ts";
import { Interrupted, type Meter } from "../../run/meter.ts";
import type { DirectedDual } from "./directed-dual.ts";
import { NARROW_LIMIT, Potential, TooWide } from "./potential.ts";
import { queueFor, type SourceCurve } from "./source-curve.ts";

/** The answer and how to check it. */
export interface LeastCycle {
  /** The cost of a least one-sided directed cycle; of the best found, where the run was interrupted. */
  readonly cost: number;
  /** No one-sided cycle costs less; equal to `cost` when the run was completed. */
  readonly atLeast: number;
  /** The edges of H it crosses, with repetitions. */
  readonly crossed: number[];
  /** The searches in preorder of their tree. */
  readonly plan: SearchPlan;
}

/** Parallel arrays, one entry for each search. */
export interface SearchPlan {
  /** Which source (index into the curve's faces) the search serves. */
  readonly sources: number[];
  /** Depth in the tree: 0 for a root; what is below stands after it. */
  readonly depths: number[];
  /** Largest reduced distance settled. */
  readonly limits: number[];
}

/**
 * How far beyond what its own source needs a search goes, so that its children stay inside what it
 * settled: a fraction of the bound on the way to them and back. Measured on mirrored grids.
 */
const REACH = 0.4;

/**
 * Finds a least one-sided cycle.
 *
 * @param dual the directed dual of H
 * @param curve sources that every one-sided cycle passes
 * @param step all costs of one-sided cycles are equal modulo this
 * @param meter counts about one unit for each arc scanned
 * @returns the cycle; when the meter runs out, the best one found and a bound
 * @throws {Interrupted} when the meter runs out before any cycle was found
 */
export function leastOneSidedCycle(
  dual: DirectedDual,
  curve: SourceCurve,
  step: number,
  meter: Meter,
): LeastCycle {
  let dearest = 0;
  for (let a = 0; a < dual.out.costs.length; a++) {
    if (dual.out.costs[a] > dearest) dearest = dual.out.costs[a];
  }
  if (dearest < NARROW_LIMIT) {
    try {
      const queue = queueFor(dearest, dual.pairs);
      return runSearches(new Potential(dual, queue, false), curve, step, meter);
    } catch (error) {
      if (!(error instanceof TooWide)) throw error;
    }
  }
  return runSearches(new Potential(dual, new HeapQueue(), true), curve, step, meter);
}

function runSearches(
  potential: Potential,
  curve: SourceCurve,
  step: number,
  meter: Meter,
): LeastCycle {
  const { faces, positions } = curve;
  const plan: SearchPlan = { sources: [], depths: [], limits: [] };
  const proven = new Uint8Array(faces.length);
  /** For each source the best bound so far. */
  const bounds = new Float64Array(faces.length);
  let cost = Infinity, crossed: number[] = [], done = 0;
  try {
    prove(0, faces.length);
  } catch (error) {
    if (!(error instanceof Interrupted) || cost === Infinity) throw error;
    return { cost, atLeast: bounds.reduce((a, b) => Math.min(a, b), cost), crossed, plan };
  }
  const open = bounds.findIndex((bound) => !(bound > cost - step));
  if (open >= 0) throw new Error(`internal: source ${open} is proved to ${bounds[open]} only`);
  return { cost, atLeast: cost, crossed, plan };

  /** Proves the sources from low to high - 1. The depth of the recursion is logarithmic. */
  function prove(low: number, high: number): void {
    noteProven(low, high);
    const open: number[] = [];
    for (let i = low; i < high; i++) if (proven[i] === 0) open.push(i);
    if (open.length === 0) return;
    const middle = open[open.length >> 1];
    const left = open[open.length >> 2], right = open[(3 * open.length) >> 2];
    const away = Math.max(
      positions[middle] - positions[left],
      positions[right] - positions[middle],
    );
    const beyond = Math.floor(REACH * away);
    // At a limit with beyond = 0 the potential proves a distance just above cost - step.
    const limit = cost - step + 1 - potential.bound(faces[middle]) + beyond;
    const found = potential.search(faces[middle], limit, beyond, meter);
    if (found < cost) {
      cost = found;
      crossed = potential.path();
    }
    plan.sources.push(middle);
    plan.depths.push(potential.depth);
    plan.limits.push(potential.limit);
    potential.advance();
    noteProven(middle, middle + 1);
    prove(low, middle);
    prove(middle + 1, high);
    potential.retreat();
  }

  /** Marks the sources that the potential, with the least cost known by now, proves. */
  function noteProven(low: number, high: number): void {
    for (let i = low; i < high; i++) {
      bounds[i] = Math.max(bounds[i], potential.bound(faces[i]));
      if (proven[i] !== 0 || bounds[i] <= cost - step) continue;
      proven[i] = 1;
      done++;
    }
    meter.report("shortest one-sided cycle", { done, total: faces.length });
  }
}
