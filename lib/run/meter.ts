/**
 * The clock of a run. Synchronous cores call `tick` with the work they did (about one unit for each
 * arc scanned); the meter looks at the clock and the stop flag every few hundred thousand units,
 * which costs nothing measurable and notices a limit within a few milliseconds.
 *
 * A meter that has run out throws `Interrupted` from `tick`. The code that owns the best solution
 * so far catches it; callers of the public functions never see it.
 */
import { checkRunOptions, type Progress, type RunOptions } from "./options.ts";

/** Why a run ended early. `work` is a deterministic budget, set with `Meter.within`. */
export type StopReason = "time" | "stop" | "work";

/** Thrown by `Meter.tick`; not an error, but the way out of a deep synchronous loop. */
export class Interrupted extends Error {
  override readonly name = "Interrupted";
  /** Says why the meter ran out. @param reason limit, stop or budget */
  constructor(readonly reason: StopReason) {
    super(`interrupted: ${reason}`);
  }
}

/** Work units between two looks at the clock: about a millisecond of arc scanning. */
const UNITS_PER_LOOK = 1 << 18;
/** Milliseconds between two progress reports. */
const REPORT_EVERY_MS = 100;

/** Source of the time in milliseconds; one place, so that tests can replace it. */
export type Clock = () => number;

/** Counts the work of a run and says when to stop. */
export class Meter {
  readonly seed: number;
  #clock: Clock;
  #startedAt: number;
  #deadline: number;
  #signal: AbortSignal | undefined;
  #flag: Int32Array | undefined;
  #onProgress: ((p: Progress) => void) | undefined;
  #untilLook = UNITS_PER_LOOK;
  #workLeft = Infinity;
  #lastReport = -Infinity;
  #lastBreath: number;
  #parent: Meter | undefined;

  /**
   * Starts the clock.
   *
   * @param options limits and callbacks of the run
   * @param flag length 1, over a SharedArrayBuffer: another thread stores 1 to ask for a stop
   * @param clock milliseconds, monotone
   * @throws {RangeError} when an option means nothing
   */
  constructor(options: RunOptions = {}, flag?: Int32Array, clock: Clock = () => performance.now()) {
    checkRunOptions(options);
    this.seed = options.seed ?? 0;
    this.#clock = clock;
    this.#startedAt = this.#lastBreath = clock();
    this.#deadline = this.#startedAt + (options.timeLimitMs ?? Infinity);
    this.#signal = options.signal;
    this.#flag = flag;
    this.#onProgress = options.onProgress;
  }

  /** Milliseconds since the run began. */
  get elapsedMs(): number {
    return this.#clock() - this.#startedAt;
  }

  /** Milliseconds left before the time limit; `Infinity` without one, never negative. */
  get remainingMs(): number {
    return Math.max(0, this.#deadline - this.#clock());
  }

  /** Work units left of a budget set with `within`; `Infinity` without one. */
  get remainingWork(): number {
    return Math.min(this.#workLeft, this.#parent?.remainingWork ?? Infinity);
  }

  /**
   * Counts work and looks at the clock now and then.
   *
   * @param units work done since the last tick, about one for each arc scanned
   * @throws {Interrupted} when the limit is reached, the budget spent or a stop was asked for
   */
  tick(units = 1): void {
    this.#workLeft -= units;
    if (this.#workLeft < 0) throw new Interrupted("work");
    this.#untilLook -= units;
    if (this.#untilLook > 0) {
      if (this.#parent !== undefined) this.#parent.tick(units);
      return;
    }
    this.#untilLook = UNITS_PER_LOOK;
    if (this.#parent !== undefined) this.#parent.tick(units);
    this.look();
  }

  /** Looks at the clock and the stop flag at once. @throws {Interrupted} as `tick` does */
  look(): void {
    const reason = this.interruption;
    if (reason !== undefined) throw new Interrupted(reason);
  }

  /** The reason to stop, if there is one now. Never throws. */
  get interruption(): StopReason | undefined {
    if (this.#signal?.aborted) return "stop";
    if (this.#flag !== undefined && Atomics.load(this.#flag, 0) !== 0) return "stop";
    if (this.#clock() >= this.#deadline) return "time";
    if (this.remainingWork <= 0) return "work";
    return undefined;
  }

  /**
   * A meter for a part of the run that ends, with reason `work`, after so many units. Budgets count
   * work and not time, so the same input takes the same path on every machine.
   */
  within(units: number): Meter {
    const part = this.#derive();
    part.#workLeft = units;
    return part;
  }

  /** A meter for a part of the run whose reports are rewritten before they are passed on. */
  reporting(rewrite: (progress: Progress) => Progress): Meter {
    const part = this.#derive();
    const onProgress = this.#onProgress;
    part.#onProgress = onProgress && ((progress) => onProgress(rewrite(progress)));
    return part;
  }

  /** Same clock, limits and callbacks; its work counts here too. */
  #derive(): Meter {
    const part = new Meter({ seed: this.seed }, undefined, this.#clock);
    part.#startedAt = this.#startedAt;
    part.#deadline = this.#deadline;
    part.#signal = this.#signal;
    part.#flag = this.#flag;
    part.#onProgress = this.#onProgress;
    part.#parent = this;
    return part;
  }

  /** Reports progress, at most every tenth of a second unless `now` is set. */
  report(phase: string, state: Omit<Progress, "phase" | "elapsedMs">, now = false): void {
    if (this.#onProgress === undefined) return;
    const at = this.#clock();
    if (!now && at - this.#lastReport < REPORT_EVERY_MS) return;
    this.#lastReport = at;
    this.#onProgress({ phase, ...state, elapsedMs: at - this.#startedAt });
  }

  /** Lets timers and signals of this thread through, if more than 20 ms have passed since. */
  async breathe(): Promise<void> {
    const at = this.#clock();
    if (at - this.#lastBreath < 20) return;
    await new Promise((resolve) => setTimeout(resolve, 0));
    this.#lastBreath = this.#clock();
  }
}
