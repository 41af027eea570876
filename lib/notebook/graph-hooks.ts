/** Lets graphology graphs draw themselves as the last expression of a cell. */
import { UndirectedGraph } from "graphology";
import { type GraphLike, renderGraphology } from "../display/graphology.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { present } from "./presenter.ts";

/**
 * Gives all graphs made by this project's graphology (its class and those derived from it) a display
 * hook. Only useful under the kernel; calling it twice does no harm.
 */
export function drawGraphologyGraphs(): void {
  Object.defineProperty(
    Object.getPrototypeOf(UndirectedGraph.prototype),
    Symbol.for("Jupyter.display"),
    {
      configurable: true,
      value(this: GraphLike): Promise<MimeBundle> {
        return present(renderGraphology(this));
      },
    },
  );
}
