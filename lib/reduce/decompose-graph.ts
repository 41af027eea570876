/** Core and blocks of each component of a graph, on vertex numbers; what a worker computes. */
import { componentSubgraphs } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { twoColouring } from "../graph/two-colouring.ts";
import { evenFaceEmbedding } from "../parity/even-face.ts";
import { leastTransversal } from "../parity/transversal.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import type { Block } from "./blocks-costs.ts";
import { blocksOf } from "./decompose-blocks.ts";

/** One component; blocks speak of vertices by their position in `vertices`. */
export interface Anatomy {
  /** Increasing vertices of the whole graph. */
  readonly vertices: Int32Array;
  readonly blocks: readonly Block[];
  /**
   * No odd cycle transversal has fewer vertices; looked at up to 4, so 4 stands for "4 or more".
   * Undefined when a limit came first.
   */
  readonly transversal: number | undefined;
  /** Whether the core with gadgets has an even-face embedding. */
  readonly evenFace: "yes" | "no" | "unknown";
  readonly complete: boolean;
}

/**
 * @param graph any simple graph
 * @returns the components, in order of their least vertex. Near-linear in practice; what a limit
 *   leaves open is said in each component.
 */
export async function anatomy(graph: Graph, meter: Meter): Promise<Anatomy[]> {
  const list: Anatomy[] = [];
  let done = 0;
  for (const { graph: part, vertices } of componentSubgraphs(graph)) {
    meter.report("core and blocks", { done, total: graph.n });
    await meter.breathe();
    list.push({ vertices, ...componentAnatomy(part, meter) });
    done += part.n;
  }
  meter.report("core and blocks", { done, total: graph.n }, true);
  return list;
}

function componentAnatomy(graph: Graph, meter: Meter): Omit<Anatomy, "vertices"> {
  const { side } = twoColouring(graph);
  if (side !== undefined) {
    const whole: Block = {
      inside: Int32Array.from({ length: graph.n }, (_, v) => v),
      insideSide: side,
      attachments: new Int32Array(0),
      attachmentSide: new Uint8Array(0),
    };
    return { blocks: [whole], transversal: 0, evenFace: "no", complete: true };
  }
  const { blocks, reduced, complete } = blocksOf(graph, meter);
  // Gadgets change no transversal number, and the graph with gadgets is smaller.
  const { lower, upper } = leastTransversal(reduced, meter, { limit: 3 });
  return {
    blocks,
    transversal: lower >= 4 ? 4 : lower === upper ? lower : undefined,
    evenFace: complete ? evenFaceOf(reduced, meter) : "unknown",
    complete,
  };
}

function evenFaceOf(graph: Graph, meter: Meter): Anatomy["evenFace"] {
  try {
    return evenFaceEmbedding(graph, meter, { witness: false }).kind === "embedded" ? "yes" : "no";
  } catch (error) {
    if (error instanceof Interrupted) return "unknown";
    throw error;
  }
}
