/** A proper two-colouring, or an odd cycle: the certificate that a graph is or is not bipartite. */
import type { Graph } from "./graph.ts";

/** Exactly one of the two is set. */
export interface TwoColouring {
  /** Length n, entries 0 and 1 (2 where a vertex was left out); ends of every edge differ. */
  readonly side?: Uint8Array;
  /** Vertices of an odd cycle in order, first not repeated; a simple cycle, not always shortest. */
  readonly oddCycle?: Int32Array;
}

/**
 * Two-colours a graph by breadth-first search.
 *
 * @param graph any graph
 * @param keep length n; vertices with 0 are left out (default: none)
 * @returns the sides, the least vertex of each component on side 0; or an odd cycle.
 *   O(n + m) time.
 */
export function twoColouring(graph: Graph, keep?: Uint8Array): TwoColouring {
  const { n, offsets, targets } = graph;
  const side = new Uint8Array(n).fill(2);
  const parent = new Int32Array(n).fill(-1);
  const queue = new Int32Array(n);
  for (let root = 0; root < n; root++) {
    if (side[root] !== 2 || (keep !== undefined && keep[root] === 0)) continue;
    let head = 0, tail = 0;
    queue[tail++] = root;
    side[root] = 0;
    while (head < tail) {
      const v = queue[head++];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a];
        if (keep !== undefined && keep[u] === 0) continue;
        if (side[u] === 2) {
          side[u] = 1 - side[v];
          parent[u] = v;
          queue[tail++] = u;
        } else if (side[u] === side[v]) {
          return { oddCycle: closeCycle(parent, u, v) };
        }
      }
    }
  }
  return { side };
}

/** The tree paths from u and v, at equal depth, up to where they meet. */
function closeCycle(parent: Int32Array, u: number, v: number): Int32Array {
  const left = [u], right = [v];
  while (u !== v) {
    u = parent[u];
    v = parent[v];
    left.push(u);
    right.push(v);
  }
  right.pop();
  return Int32Array.from([...left, ...right.reverse()]);
}
