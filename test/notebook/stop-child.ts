/**
 * A program of its own for the tests of the Stop button, because `deno test` takes SIGINT for itself.
 * Prints `ready` when a run has begun, and what came of the run: for `busy` the milliseconds until a
 * computation that never lets go of the thread noticed the button, for `waiting` the same of a run
 * that awaits; then `next`, whether a run begun afterwards is unstopped.
 */
import process from "node:process";
import { coolStopButton, warmStopButton, withStopButton } from "../../lib/notebook/stop-button.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";

const LIMIT_MS = 8000;

function busy(signal: AbortSignal): Promise<string> {
  const meter = new Meter({ signal, timeLimitMs: LIMIT_MS });
  try {
    for (;;) meter.tick(1000);
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
    return Promise.resolve(error.reason);
  }
}

async function waiting(signal: AbortSignal): Promise<string> {
  let timer;
  const reason = await new Promise<string>((resolve) => {
    signal.addEventListener("abort", () => resolve("stop"));
    timer = setTimeout(() => resolve("time"), LIMIT_MS);
  });
  clearTimeout(timer);
  return reason;
}

warmStopButton();
await new Promise((resolve) => setTimeout(resolve, 300));
const began = performance.now();
const reason = await withStopButton(undefined, (signal) => {
  console.log("ready");
  return process.argv[2] === "busy" ? busy(signal) : waiting(signal);
});
console.log(`${reason} ${Math.round(performance.now() - began)}`);
// A double click: the second signal comes when the run has ended, and must do no harm.
process.kill(process.pid, "SIGINT");
await new Promise((resolve) => setTimeout(resolve, 50));
const next = await withStopButton(undefined, (signal) => Promise.resolve(signal.aborted));
console.log(`next ${next ? "stopped" : "unstopped"}`);
coolStopButton();
process.exit(0);
