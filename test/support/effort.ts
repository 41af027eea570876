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
