/** Kuratowski subdivisions: what they are as data, and whether one is right, edge by edge. */
import type { Graph } from "./graph.ts";

/** A subdivision of K₅ or K₃,₃ in a graph: the witness that the graph is not planar. */
export interface Kuratowski {
  readonly kind: "K5" | "K3,3";
  /** The five branch vertices, or the six: first the three of one side, then the three others. */
  readonly branches: Int32Array;
  /**
   * The ten or nine paths between branch vertices, each as its edges in order; they share no
   * vertices but branches. Order: for K₅ (0,1), (0,2), …, (3,4); for K₃,₃ (0,3), (0,4), (0,5), (1,3) …
   */
  readonly paths: readonly Int32Array[];
}

/**
 * Checks a Kuratowski subdivision by walking it.
 *
 * @param graph the graph it should lie in
 * @param witness the subdivision
 * @returns what is wrong with it, or undefined. Time linear in n and the size of the witness.
 */
export function kuratowskiProblem(graph: Graph, witness: Kuratowski): string | undefined {
  const size = witness.kind === "K5" ? 5 : 6;
  const { branches, paths } = witness;
  if (branches.length !== size) return `expected ${size} branch vertices, got ${branches.length}`;
  const used = new Uint8Array(graph.n);
  for (const b of branches) {
    if (!(b >= 0 && b < graph.n)) return `branch vertex ${b} does not exist`;
    if (used[b] !== 0) return `branch vertex ${b} occurs twice`;
    used[b] = 1;
  }
  let at = 0;
  for (let i = 0; i < size; i++) {
    for (let j = i + 1; j < size; j++) {
      if (size === 6 && (i < 3) === (j < 3)) continue;
      const path = paths[at++];
      if (path === undefined || path.length === 0) return `no path from branch ${i} to ${j}`;
      let v = branches[i];
      for (let k = 0; k < path.length; k++) {
        const e = path[k];
        if (!(e >= 0 && e < graph.m)) return `edge ${e} does not exist`;
        if (graph.tails[e] === v) v = graph.heads[e];
        else if (graph.heads[e] === v) v = graph.tails[e];
        else return `edge ${e} does not go on from vertex ${v}`;
        if (k === path.length - 1) break;
        if (used[v] !== 0) return `vertex ${v} is used twice`;
        used[v] = 1;
      }
      if (v !== branches[j]) return `the path from branch ${i} ends at ${v}, not at ${branches[j]}`;
    }
  }
  return paths.length === at ? undefined : `expected ${at} paths, got ${paths.length}`;
}
