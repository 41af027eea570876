/**
 * A linear relaxation kept warm: columns are fixed and freed, rows are added, and each solve begins
 * from the last basis. Everything in floating point; `solve/branch/rounded-duals.ts` turns the
 * multipliers into exact bounds.
 */
import { Interrupted, type Meter } from "../run/meter.ts";
import { type Highs, highsData, type HighsModel } from "./highs.ts";
import type { LinearModel, Rows } from "./model.ts";

/** A relaxed optimum: point and row multipliers. */
export interface RelaxedPoint {
  readonly value: number;
  /** Length columns. */
  readonly x: Float64Array;
  /** Length rows: non-negative up to rounding. */
  readonly multipliers: Float64Array;
}

export class Relaxation {
  readonly #highs: Highs;
  readonly #native: HighsModel;
  #entries: number;
  #rows: number;
  readonly #columns: number;

  /** @param model `integer` is ignored. The caller must call `dispose` in the end. */
  constructor(highs: Highs, model: LinearModel) {
    this.#highs = highs;
    this.#native = highs.createModel(highsData(highs, { ...model, integer: false }));
    this.#native.options.set({
      output_flag: false,
      presolve: "off",
      primal_feasibility_tolerance: 1e-9,
      dual_feasibility_tolerance: 1e-9,
    });
    this.#columns = model.cost.length;
    this.#rows = model.rows.upper.length;
    this.#entries = model.rows.indices.length;
  }

  get rows(): number {
    return this.#rows;
  }

  /** Appends rows. */
  add(rows: Rows): void {
    const count = rows.upper.length;
    if (count === 0) return;
    this.#native.addRows({
      lower: new Float64Array(count).fill(-this.#highs.infinity),
      upper: rows.upper,
      matrix: {
        format: "csr",
        numRows: count,
        numCols: this.#columns,
        starts: rows.starts,
        indices: rows.indices,
        values: rows.values,
      },
    });
    this.#rows += count;
    this.#entries += rows.indices.length;
  }

  /**
   * Takes rows out; the others keep their order.
   *
   * @param drop length rows: 1 for each row to take out
   * @param entries how many entries they have in all
   */
  remove(drop: Uint8Array, entries: number): void {
    const indices = [...drop.keys()].filter((row) => drop[row] !== 0);
    if (indices.length === 0) return;
    this.#native.deleteRows({ kind: "set", indices });
    this.#rows -= indices.length;
    this.#entries -= entries;
  }

  /** Sets the bounds of all columns; two arrays of their length. */
  setBounds(lower: Float64Array, upper: Float64Array): void {
    const to = this.#columns - 1;
    if (to >= 0) this.#native.changeColsBounds({ kind: "range", from: 0, to }, lower, upper);
  }

  /**
   * Solves from the last basis.
   *
   * @param meter counts the iterations, each about twenty times the size of the model
   * @returns the optimum; undefined when HiGHS does not call its point optimal
   * @throws {Interrupted} when the meter ends the run, also in the middle of a solve
   */
  solve(meter: Meter): RelaxedPoint | undefined {
    const { callbackType, modelStatus } = this.#highs.constants;
    const native = this.#native;
    const { modelStatus: ended } = native.run({
      [callbackType.simplexInterrupt](event) {
        if (meter.interruption !== undefined) event.interrupt();
        return undefined;
      },
    });
    const iterations = Math.max(0, native.info.get("simplex_iteration_count") as number);
    meter.tick((iterations + 4) * 20 * (this.#entries + this.#rows + this.#columns));
    if (ended === modelStatus.interrupted) {
      throw new Interrupted(meter.interruption ?? "stop");
    }
    if (ended !== modelStatus.optimal) return undefined;
    const { colValue, rowDual } = native.getSolution();
    return {
      value: native.getObjectiveValue(),
      x: Float64Array.from(colValue),
      multipliers: Float64Array.from(rowDual, (d) => Math.abs(d)),
    };
  }

  dispose(): void {
    this.#native.dispose();
  }
}
