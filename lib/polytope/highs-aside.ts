/**
 * HiGHS in a worker of its own, so that a stop is obeyed at once: HiGHS itself looks up only now and
 * then, sometimes once a second, but a worker can be ended. Where there are no workers the run stays in
 * this thread and ends when HiGHS next looks up.
 */
import { canWorkAside, type Job, type Order, type Reply } from "../run/aside.ts";
import type { Meter } from "../run/meter.ts";
import { type HighsOptions, type HighsOutcome, runHighs } from "./highs.ts";
import type { LinearModel } from "./model.ts";

/** Milliseconds between two looks at the meter. */
const LOOK_EVERY_MS = 20;

/** What is sent: plain data only. */
interface Task {
  readonly model: LinearModel;
  readonly options: Omit<HighsOptions, "shouldStop" | "onPoint" | "onBound">;
}

/** What comes back before the outcome. */
interface News {
  readonly x?: Float64Array;
  readonly bound: number;
}

/** The worker's side; registered as the job "highs" in `lib/worker.ts`. */
export const highsJob: Job = (input, meter, notify) => {
  const { model, options } = input as Task;
  return runHighs(model, {
    ...options,
    shouldStop: () => meter.interruption !== undefined,
    onPoint: (x, bound) => notify({ x, bound } satisfies News),
    onBound: (bound) => notify({ bound } satisfies News),
  });
};

/**
 * Maximises a linear model under the limits of a meter.
 *
 * @param model columns and rows
 * @param meter looked at every 20 ms; no work is counted on it
 * @param options as for `runHighs`; `onPoint` and `onBound` are called in this thread
 * @returns the outcome; after a stop, the last point and bound that were heard of
 */
export async function highsAside(
  model: LinearModel,
  meter: Meter,
  options: Omit<HighsOptions, "shouldStop"> = {},
): Promise<HighsOutcome> {
  const { onPoint, onBound, ...plain } = options;
  const task: Task = {
    model,
    options: {
      ...plain,
      timeLimitMs: Math.min(plain.timeLimitMs ?? Infinity, meter.remainingMs),
    },
  };
  if (!canWorkAside()) {
    return await runHighs(model, {
      ...task.options,
      onPoint,
      onBound,
      shouldStop: () => meter.interruption !== undefined,
    });
  }
  const worker = new Worker(new URL("../worker.ts", import.meta.url), { type: "module" });
  let x: Float64Array | undefined, bound = Infinity;
  try {
    return await new Promise<HighsOutcome>((resolve, reject) => {
      const timer = setInterval(() => {
        if (meter.interruption === undefined) return;
        clearInterval(timer);
        resolve({ status: "interrupted", value: valueOf(model, x), bound, x, nodes: 0 });
      }, LOOK_EVERY_MS);
      const settle = (action: () => void): void => {
        clearInterval(timer);
        action();
      };
      worker.onmessage = ({ data }: MessageEvent<Reply>) => {
        if ("notice" in data) {
          const news = data.notice as News;
          bound = Math.min(bound, news.bound);
          if (news.x === undefined) onBound?.(bound);
          else {
            x = news.x;
            onPoint?.(x, bound);
          }
        } else if ("result" in data) settle(() => resolve(data.result as HighsOutcome));
        else if ("failure" in data) settle(() => reject(new Error(data.failure.message)));
      };
      worker.onerror = (event) => {
        event.preventDefault();
        settle(() => reject(new Error(`the worker failed: ${event.message}`)));
      };
      const order: Order = {
        job: "highs",
        input: task,
        seed: meter.seed,
        deadline: undefined,
        flag: new Int32Array(new SharedArrayBuffer(4)),
        reports: false,
      };
      worker.postMessage(order);
    });
  } finally {
    worker.terminate();
  }
}

function valueOf(model: LinearModel, x: Float64Array | undefined): number {
  if (x === undefined) return -Infinity;
  let value = 0;
  for (let j = 0; j < x.length; j++) value += model.cost[j] * x[j];
  return value;
}
