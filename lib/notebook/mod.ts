/**
 * The kernel side of a notebook: output that is never lost, a live line of progress, and a Stop
 * button that ends a run and not the kernel. Outside the kernel everything here stays quiet.
 *
 * @example
 * ```ts
 * import { show, underKernel } from "./mod.ts";
 * if (!underKernel()) await show("printed in a terminal, displayed in a notebook");
 * ```
 * @module
 */
export { enterNotebook } from "./enter.ts";
export { underKernel } from "./kernel.ts";
export { withKernelRun } from "./kernel-run.ts";
export { show } from "./show.ts";
