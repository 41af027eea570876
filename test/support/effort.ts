/** Time that a busy machine does not spoil: bounds in tests are about the work, not the neighbours. */
import process from "node:process";

/**
 * Milliseconds a synchronous call takes: the lesser of wall-clock and processor time, least of
 * several runs.
 */
export function effortMs(call: () => void, runs = 1): number {
  let least = Infinity;
  for (let run = 0; run < runs; run++) {
    const begun = performance.now(), before = process.cpuUsage();
    call();
    const { user, system } = process.cpuUsage(before);
    least = Math.min(least, performance.now() - begun, (user + system) / 1000);
  }
  return least;
}

/** Milliseconds an asynchronous call takes: the lesser of wall-clock and processor time. */
export async function asyncEffortMs(call: () => Promise<unknown>): Promise<number> {
  const begun = performance.now(), before = process.cpuUsage();
  await call();
  const { user, system } = process.cpuUsage(before);
  return Math.min(performance.now() - begun, (user + system) / 1000);
}

/** What the library promises: a limit or a stop ends a run within so many milliseconds. */
export const PROMISED_MS = 200;

/**
 * The least delay of up to five tries: other tests may hold all cores when a limit is reached, and
 * one try within the promise shows that the run itself keeps it.
 *
 * @param run one try; returns by how many milliseconds it overran
 */
export async function leastDelayMs(run: () => Promise<number>): Promise<number> {
  let least = Infinity;
  for (let attempt = 0; attempt < 5 && least > PROMISED_MS; attempt++) {
    least = Math.min(least, await run());
  }
  return least;
}
