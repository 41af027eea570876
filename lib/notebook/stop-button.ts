/**
 * The Stop button. The front end turns it into SIGINT, which ends Deno's kernel and all its state
 * unless somebody listens; so a listener stands while a run goes on, and is taken away afterwards.
 *
 * A synchronous computation keeps this thread from seeing the signal. A second thread listens too
 * and raises a flag in shared memory; the `AbortSignal` handed to the run reads that flag, so the
 * run's meter notices the button within a few milliseconds whether the run awaits or computes.
 */

/** What this file uses of `Deno`. */
interface Signals {
  addSignalListener(signal: "SIGINT", listener: () => void): void;
  removeSignalListener(signal: "SIGINT", listener: () => void): void;
}

/** Milliseconds for which a second press is swallowed after a run that was stopped. */
const GRACE_MS = 1000;

let watcher: Worker | undefined;
/** Length 1, over shared memory: 1 once the button was pressed. */
let pressed = new Int32Array(new SharedArrayBuffer(4));
let runs = 0;

/** Starts the second thread ahead of the first run; it takes about a second in the kernel. */
export function warmStopButton(): void {
  if (watcher !== undefined) return;
  watcher = new Worker(new URL("./interrupt-watcher.ts", import.meta.url), { type: "module" });
}

/** Ends the second thread, for programs that want to end; the next run starts it again. */
export function coolStopButton(): void {
  watcher?.terminate();
  watcher = undefined;
}

/**
 * Runs a computation that the Stop button stops. Only for code under the kernel. Runs that overlap
 * share the button: one press stops all of them.
 *
 * @param outer a signal of the caller's own, which stops the run as well
 * @param run the computation; takes the signal that says when to stop
 * @returns what the run returns
 */
export async function withStopButton<R>(
  outer: AbortSignal | undefined,
  run: (signal: AbortSignal) => Promise<R>,
): Promise<R> {
  const signals = (globalThis as unknown as { Deno: Signals }).Deno;
  const controller = new AbortController();
  let aborting = false;
  const abort = () => {
    // `abort` does nothing on a signal that says it is aborted already, so the flag keeps quiet.
    aborting = true;
    controller.abort();
    aborting = false;
  };
  outer?.addEventListener("abort", abort);
  if (outer?.aborted) abort();

  warmStopButton();
  // A flag that an earlier press has raised is left behind; the watcher raises the newest.
  if (runs++ === 0 || Atomics.load(pressed, 0) !== 0) {
    pressed = new Int32Array(new SharedArrayBuffer(4));
    watcher!.postMessage({ flag: pressed.buffer });
  }
  const mine = pressed;
  Object.defineProperty(controller.signal, "aborted", {
    get: () =>
      plainAborted.call(controller.signal) ||
      (!aborting && (Atomics.load(mine, 0) !== 0 || outer?.aborted === true)),
  });
  signals.addSignalListener("SIGINT", abort);
  try {
    return await run(controller.signal);
  } finally {
    outer?.removeEventListener("abort", abort);
    const leave = () => {
      signals.removeSignalListener("SIGINT", abort);
      if (--runs === 0) watcher?.postMessage("rest");
    };
    // A double click sends a second signal just after the run has ended; it must not end the kernel.
    if (controller.signal.aborted) setTimeout(leave, GRACE_MS);
    else leave();
  }
}

/** The getter that every AbortSignal inherits. */
const plainAborted = Object.getOwnPropertyDescriptor(AbortSignal.prototype, "aborted")!
  .get as (this: AbortSignal) => boolean;
