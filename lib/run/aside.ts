/**
 * Work done in another thread. Objects that cross lose their methods and an AbortSignal arrives
 * empty, so plain arrays are sent and a stop is asked for through a flag in shared memory.
 *
 * Starting a worker takes 10 to 30 ms, and about a second in a notebook's kernel: a kernel keeps one
 * warm, everything else ends it with its job so that the process can exit.
 */
import { InstanceError } from "./errors.ts";
import { Meter } from "./meter.ts";
import type { Progress, RunOptions } from "./options.ts";

/** What is sent to the worker. */
export interface Order {
  readonly job: string;
  readonly input: unknown;
  readonly seed: number | undefined;
  /** When to stop, in milliseconds since 1970, so that the time the worker takes to start counts. */
  readonly deadline: number | undefined;
  /** Length 1, shared: 1 asks for a stop. */
  readonly flag: Int32Array;
  readonly reports: boolean;
}

/** What the worker sends back: reports and notices, as many as it likes, then a result or a failure. */
export type Reply =
  | { readonly progress: Progress }
  | { readonly notice: unknown }
  | { readonly result: unknown }
  | { readonly failure: { name: string; message: string; problems?: readonly string[] } };

/** Whether this runtime has the workers of the web standard. */
export function canWorkAside(): boolean {
  return typeof Worker === "function" && typeof SharedArrayBuffer === "function";
}

let keepsWarm = false;
let idle: Worker | undefined;

/** Keeps one worker alive between jobs, and starts it at once. For notebooks. */
export function keepWorkerWarm(entry: URL): void {
  if (!canWorkAside()) return;
  keepsWarm = true;
  idle ??= start(entry);
}

function start(entry: URL): Worker {
  return new Worker(entry, { type: "module" });
}

/**
 * Runs a job in a worker.
 *
 * @param entry the worker's module
 * @param job the name under which the worker knows the job
 * @param input plain data; typed arrays are copied
 * @param options limits of the run; a signal is passed on as a flag
 * @param onNotice called with what the job sends before its result
 * @returns the job's result
 * @throws what the job threw; `InstanceError` keeps its problems
 */
export async function runAside(
  entry: URL,
  job: string,
  input: unknown,
  options: RunOptions,
  onNotice: (notice: unknown) => void = () => {},
): Promise<unknown> {
  const worker = idle ?? start(entry);
  idle = undefined;
  const flag = new Int32Array(new SharedArrayBuffer(4));
  const stop = () => Atomics.store(flag, 0, 1);
  if (options.signal?.aborted) stop();
  options.signal?.addEventListener("abort", stop);
  let healthy = false;
  try {
    const result = await new Promise((resolve, reject) => {
      worker.onmessage = ({ data }: MessageEvent<Reply>) => {
        if ("progress" in data) options.onProgress?.(data.progress);
        else if ("notice" in data) onNotice(data.notice);
        else if ("result" in data) resolve(data.result);
        else reject(revive(data.failure));
      };
      worker.onerror = (event) => {
        event.preventDefault();
        reject(new Error(`the worker failed: ${event.message}`));
      };
      const order: Order = {
        job,
        input,
        seed: options.seed,
        deadline: options.timeLimitMs === undefined ? undefined : Date.now() + options.timeLimitMs,
        flag,
        reports: options.onProgress !== undefined,
      };
      worker.postMessage(order);
    });
    healthy = true;
    return result;
  } finally {
    options.signal?.removeEventListener("abort", stop);
    if (healthy && keepsWarm && idle === undefined) {
      idle = worker;
    } else {
      worker.terminate();
      if (keepsWarm) idle ??= start(entry);
    }
  }
}

function revive(failure: { name: string; message: string; problems?: readonly string[] }): Error {
  if (failure.problems !== undefined) return new InstanceError(failure.problems);
  const error = failure.name === "RangeError"
    ? new RangeError(failure.message)
    : new Error(failure.message);
  return error;
}

/** A job as the worker runs it: input, meter, and a way to send notices before the result. */
export type Job = (
  input: unknown,
  meter: Meter,
  notify: (notice: unknown) => void,
) => unknown | Promise<unknown>;

/**
 * The worker's side: runs one order and answers through `send`.
 *
 * @param order what `runAside` sent
 * @param jobs the jobs by name
 * @param send posts a reply to the other thread
 */
export async function serve(
  order: Order,
  jobs: Readonly<Record<string, Job>>,
  send: (reply: Reply) => void,
): Promise<void> {
  try {
    const meter = new Meter(
      {
        seed: order.seed,
        timeLimitMs: order.deadline === undefined
          ? undefined
          : Math.max(0, order.deadline - Date.now()),
        onProgress: order.reports ? (progress) => send({ progress }) : undefined,
      },
      order.flag,
    );
    const job = jobs[order.job];
    if (job === undefined) throw new Error(`no job called ${JSON.stringify(order.job)}`);
    send({ result: await job(order.input, meter, (notice) => send({ notice })) });
  } catch (error) {
    const { name, message, problems } = error as Error & { problems?: readonly string[] };
    send({ failure: problems === undefined ? { name, message } : { name, message, problems } });
  }
}

/** Work that is tried in the caller's thread before a worker is started: about 0.2 s. */
const WORK_HERE = 5e7;
/** Vertices and edges above which a worker is used at once. */
const SIZE_HERE = 200_000;

/**
 * Runs a job in the caller's thread while it is quick, else from the start in a worker, where a stop
 * reaches even a synchronous stretch. Which of the two depends on the work and not on the clock.
 *
 * @param job the name under which the worker knows the job
 * @param size vertices and edges
 * @param options limits of the run; `workers: 0` keeps it here
 * @param here the job for this thread; when its meter runs out it returns what it has
 * @param input makes what the worker needs, as plain data
 * @returns the job's result
 */
export async function hereOrAside<T>(
  job: string,
  size: number,
  options: RunOptions,
  here: (meter: Meter) => Promise<T>,
  input: () => unknown,
): Promise<T> {
  const meter = new Meter(options);
  if (options.workers === 0 || !canWorkAside()) return await here(meter);
  if (size <= SIZE_HERE) {
    const budget = meter.within(WORK_HERE);
    const result = await here(budget);
    if (budget.remainingWork > 0 || meter.interruption !== undefined) return result;
  }
  const { timeLimitMs } = options;
  return await runAside(new URL("../worker.ts", import.meta.url), job, input(), {
    ...options,
    ...(timeLimitMs !== undefined && { timeLimitMs: meter.remainingMs }),
  }) as T;
}
