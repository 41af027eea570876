/** What loading the library does to a notebook, in one place. */
import { drawGraphologyGraphs } from "./graph-hooks.ts";
import { underKernel } from "./kernel.ts";
import { presentThroughKernel } from "./presenter.ts";
import { warmStopButton } from "./stop-button.ts";

/** Sets the display hooks and warms the Stop button. Does nothing outside the kernel. */
export function enterNotebook(): void {
  if (!underKernel()) return;
  presentThroughKernel();
  drawGraphologyGraphs();
  warmStopButton();
}
