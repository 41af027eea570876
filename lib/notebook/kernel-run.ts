/**
 * What a long run gets for free in a notebook: the Stop button and a live line of progress. Outside
 * the kernel nothing is added and nothing is touched.
 */
import type { RunOptions } from "../run/options.ts";
import { kernel } from "./kernel.ts";
import { ProgressLine } from "./progress-line.ts";
import { withStopButton } from "./stop-button.ts";

/**
 * Runs a long function under the kernel's Stop button, with a progress line unless the caller takes
 * progress itself.
 *
 * @param name the verb, such as `solve`; the progress line begins with it
 * @param options the caller's options, passed on with `signal` and `onProgress` filled in
 * @param run the long function
 * @returns what `run` returns; its errors pass through
 *
 * @example
 * ```ts
 * import { withKernelRun } from "./kernel-run.ts";
 * const six = await withKernelRun("multiply", { seed: 1 }, () => Promise.resolve(6));
 * console.assert(six === 6);
 * ```
 */
export async function withKernelRun<O extends RunOptions, R>(
  name: string,
  options: O,
  run: (options: O) => Promise<R>,
): Promise<R> {
  const to = kernel();
  if (to === undefined) return await run(options);
  return await withStopButton(options.signal, async (signal) => {
    if (options.onProgress !== undefined) return await run({ ...options, signal });
    const line = new ProgressLine(to, name);
    let word = "failed";
    try {
      const result = await run({ ...options, signal, onProgress: (p) => line.report(p) });
      word = signal.aborted ? "stopped" : "done";
      return result;
    } finally {
      await line.finish(word);
    }
  });
}
