/** What every long function accepts beside its input. */
export interface RunOptions {
  /** Wall-clock limit in milliseconds. When it is reached the result carries an honest bound. */
  timeLimitMs?: number;
  /** Asks the run to stop; the best found so far comes back with its bound. */
  signal?: AbortSignal;
  /** Seed of every random choice: same input, options and seed give the same answer. */
  seed?: number;
  /**
   * Threads beside the caller's own; 0 keeps the run in this thread, where a synchronous stretch
   * sees a `signal` only when it ends or from within `onProgress`. Unset: as the size suggests.
   */
  workers?: number;
  /** Called with the state of the run, at most about ten times a second. */
  onProgress?: (progress: Progress) => void;
}

/** One report of a long run. `lower` and `upper` bound the value sought, in the instance's unit. */
export interface Progress {
  phase: string;
  done: number;
  total?: number;
  lower?: number;
  upper?: number;
  elapsedMs: number;
}

/**
 * Refuses run options that mean nothing, all problems at once.
 *
 * @param options what a caller passed; `undefined` stands for no options
 * @returns the options, unchanged
 * @throws {RangeError} naming each bad field, what was expected and what came
 */
export function checkRunOptions(options: RunOptions = {}): RunOptions {
  const problems: string[] = [];
  const { timeLimitMs, seed, workers } = options;
  if (timeLimitMs !== undefined && !(timeLimitMs >= 0)) {
    problems.push(`timeLimitMs: expected a number of milliseconds >= 0, got ${timeLimitMs}`);
  }
  if (seed !== undefined && !Number.isSafeInteger(seed)) {
    problems.push(`seed: expected an integer below 2^53 in size, got ${seed}`);
  }
  if (workers !== undefined && !(Number.isInteger(workers) && workers >= 0)) {
    problems.push(`workers: expected an integer >= 0, got ${workers}`);
  }
  if (problems.length > 0) throw new RangeError(problems.join("; "));
  return options;
}
