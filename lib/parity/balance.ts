/**
 * Balance: a graph with odd and even edges is *balanced* if every cycle has an even number of odd
 * edges, that is, if its vertices have two sides such that odd edges cross and even edges do not.
 * With all edges odd this is bipartiteness.
 */
import type { Graph } from "../graph/graph.ts";

/** An odd cycle, as vertices and the edges between them. */
export interface OddCycle {
  /** Vertices in order, first not repeated; two of them where two parallel edges close the cycle. */
  readonly vertices: Int32Array;
  /** Same length: edges[i] joins vertices[i] to the next vertex, the last one to the first. */
  readonly edges: Int32Array;
}

/** Exactly one of the two is set. */
export interface Balance {
  /** Length n, entries 0 and 1; 2 where a vertex was left out. */
  readonly side?: Uint8Array;
  readonly oddCycle?: OddCycle;
}

/**
 * Finds sides or an odd cycle by breadth-first search.
 *
 * @param graph any graph
 * @param even length m, nonzero where an edge is even; absent: every edge is odd
 * @param keep length n; vertices with 0 are left out (default: none)
 * @returns the sides, the least vertex of each component on side 0; or a simple odd cycle.
 *   O(n + m) time.
 */
export function balance(graph: Graph, even?: Uint8Array, keep?: Uint8Array): Balance {
  const { n, offsets, targets, edgeOf } = graph;
  const side = new Uint8Array(n).fill(2);
  const parentEdge = new Int32Array(n).fill(-1);
  const depth = new Int32Array(n);
  const queue = new Int32Array(n);
  for (let root = 0; root < n; root++) {
    if (side[root] !== 2 || (keep !== undefined && keep[root] === 0)) continue;
    let head = 0, tail = 0;
    queue[tail++] = root;
    side[root] = 0;
    while (head < tail) {
      const v = queue[head++];
      for (let a = offsets[v]; a < offsets[v + 1]; a++) {
        const u = targets[a], e = edgeOf[a];
        if (keep !== undefined && keep[u] === 0) continue;
        const want = side[v] ^ (even !== undefined && even[e] !== 0 ? 0 : 1);
        if (side[u] === 2) {
          side[u] = want;
          parentEdge[u] = e;
          depth[u] = depth[v] + 1;
          queue[tail++] = u;
        } else if (side[u] !== want) {
          return { oddCycle: closeCycle(graph, parentEdge, depth, e) };
        }
      }
    }
  }
  return { side };
}

/**
 * The cycle that an edge closes with the paths to the root in a tree.
 *
 * @param parentEdge the tree edge from each vertex towards the root
 * @param depth the number of tree edges from each vertex to the root
 * @param edge an edge outside the tree, both ends in it
 */
export function closeCycle(
  graph: Graph,
  parentEdge: Int32Array,
  depth: Int32Array,
  edge: number,
): OddCycle {
  const { tails, heads } = graph;
  let u = tails[edge], v = heads[edge];
  const left = [u], right = [v], leftEdges: number[] = [], rightEdges: number[] = [];
  while (u !== v) {
    if (depth[u] >= depth[v]) {
      const e = parentEdge[u];
      leftEdges.push(e);
      u = tails[e] ^ heads[e] ^ u;
      left.push(u);
    } else {
      const e = parentEdge[v];
      rightEdges.push(e);
      v = tails[e] ^ heads[e] ^ v;
      right.push(v);
    }
  }
  // From the tail up to the meeting vertex, then down to the head, and back along the edge.
  right.pop();
  return {
    vertices: Int32Array.from([...left, ...right.reverse()]),
    edges: Int32Array.from([...leftEdges, ...rightEdges.reverse(), edge]),
  };
}
