/**
 * What two vertices cut off a 2-connected graph embedded in the sphere, found in the embedding: two
 * vertices separate exactly where they lie on two common faces, so the pairs are the four-cycles of
 * the vertex-face incidence graph. Near-linear time.
 *
 * Two tools make it short. Four-cycles come in groups with the same two opposite corners, by the
 * method of N. Chiba and T. Nishizeki, "Arboricity and subgraph listing algorithms" (SIAM J. Comput.
 * 14, 1985; written from memory); in a planar graph that takes linear time. And the number of edges on
 * the left of a closed curve through faces and vertices is a sum of potentials on its corners, so
 * groups are ordered and measured without walking around them.
 */
import { dartStart, type Faces } from "./embedding.ts";
import type { Graph } from "./graph.ts";
import type { Meter } from "../run/meter.ts";

/**
 * Parts cut off by two vertices, each with less than half of all edges, largest first. A part is
 * connected to the rest at its two poles only. At pole i of part p its darts are, counterclockwise,
 * next[ends[4p + 2i]] up to and including ends[4p + 2i + 1].
 */
export interface CutOff {
  /** Number of parts. They may lie in one another, and occur twice. */
  readonly count: number;
  /** Length 4 · count: two darts for each pole, as said above. */
  readonly ends: Int32Array;
}

/**
 * Finds, among the parts behind pairs of vertices that hold less than half of the edges but more than
 * one, candidates that include every one not contained in a larger one.
 *
 * @param graph a 2-connected graph, at least three vertices
 * @param next length 2m, a rotation system of genus 0
 * @param faces its faces
 * @param meter counts about eight units for each edge
 * @param among length faces.count; only pairs of faces not marked 0 are looked at (default: all)
 * @returns the parts, largest first
 */
export function cutOffParts(
  graph: Graph,
  next: Int32Array,
  faces: Faces,
  meter: Meter,
  among?: Uint8Array,
): CutOff {
  const { n, m } = graph;
  const potential = cornerPotential(next);
  meter.tick(4 * m);

  // The incidence graph: nodes 0 … n-1 are vertices, n … are faces. Corner d joins the vertex where
  // dart d starts to the face on its left, and lies between d and next[d].
  const nodes = n + faces.count;
  const row = new Int32Array(nodes + 1);
  const skipped = (d: number) => among !== undefined && among[faces.of[d]] === 0;
  for (let d = 0; d < 2 * m; d++) {
    if (skipped(d)) continue;
    row[dartStart(graph, d) + 1]++;
    row[n + faces.of[d] + 1]++;
  }
  for (let x = 0; x < nodes; x++) row[x + 1] += row[x];
  const corners = new Int32Array(row[nodes]), fill = row.slice(0, nodes);
  for (let d = 0; d < 2 * m; d++) {
    if (skipped(d)) continue;
    corners[fill[dartStart(graph, d)]++] = d;
    corners[fill[n + faces.of[d]]++] = d;
  }
  const far = (x: number, d: number) => x < n ? n + faces.of[d] : dartStart(graph, d);

  const found: number[] = []; // size and four darts of each part
  const done = new Uint8Array(nodes);
  // For each far corner w of the node at hand: its list of middles, linked through `link`.
  const last = new Int32Array(nodes).fill(-1);
  const link: number[] = [], first: number[] = [], second: number[] = [], opposite: number[] = [];
  for (const a of byFallingDegree(nodes, row)) {
    link.length =
      first.length =
      second.length =
      opposite.length =
        0;
    for (let i = row[a]; i < row[a + 1]; i++) {
      const c = far(a, corners[i]);
      if (done[c] !== 0) continue;
      for (let j = row[c]; j < row[c + 1]; j++) {
        const b = far(c, corners[j]);
        if (b === a || done[b] !== 0) continue;
        if (last[b] < 0) opposite.push(b);
        link.push(last[b]);
        last[b] = first.length;
        first.push(corners[i]);
        second.push(corners[j]);
      }
      meter.tick(row[c + 1] - row[c]);
    }
    for (const b of opposite) {
      let at = last[b];
      last[b] = -1;
      if (link[at] < 0) continue; // one middle only
      const group: number[] = [];
      for (; at >= 0; at = link[at]) group.push(at);
      measure(a < n, group);
    }
    done[a] = 1;
  }

  const order = Float64Array.from(
    { length: found.length / 5 },
    (_, i) => (m - found[5 * i]) * (found.length / 5) + i,
  ).sort();
  const ends = new Int32Array(4 * order.length);
  for (let p = 0; p < order.length; p++) {
    const i = order[p] % order.length;
    for (let k = 0; k < 4; k++) ends[4 * p + k] = found[5 * i + 1 + k];
  }
  return { count: order.length, ends };

  /** The paths a – c – b of a group split the sphere; keeps the complement of a majority, if any. */
  function measure(vertexFirst: boolean, group: number[]): void {
    const sign = vertexFirst ? 1 : -1;
    const height = (i: number) => modulo(sign * (potential[first[i]] - potential[second[i]]), m);
    group.sort((i, j) => height(i) - height(j));
    for (let g = 0; g < group.length; g++) {
      const i = group[g], j = group[(g + 1) % group.length];
      const between = modulo(height(j) - height(i), m); // edges left of a → j → b → i → a
      if (2 * between <= m || between >= m - 1) continue;
      // The part lies left of a → i → b → j → a.
      found.push(m - between);
      if (vertexFirst) found.push(first[i], first[j], second[j], second[i]);
      else found.push(second[i], first[i], first[j], second[j]);
    }
  }
}

function modulo(x: number, m: number): number {
  const r = x % m;
  return r < 0 ? r + m : r;
}

/**
 * Integers s on the corners such that, for each edge, going around it counterclockwise through the
 * four corners beside it adds up to 1 modulo m, vertex to face counting +s and face to vertex -s.
 */
function cornerPotential(next: Int32Array): Int32Array {
  const m = next.length >> 1;
  const potential = new Int32Array(2 * m);
  if (m === 0) return potential;
  // Edges that follow each other around a vertex are neighbours through the corner between them.
  // Breadth-first tree of this relation; corners off the tree have potential 0.
  const prev = new Int32Array(2 * m);
  for (let d = 0; d < 2 * m; d++) prev[next[d]] = d;
  const order = new Int32Array(m), via = new Int32Array(m).fill(-1); // corner, doubled, +1 if behind
  const seen = new Uint8Array(m);
  seen[0] = 1;
  let tail = 1;
  for (let head = 0; head < tail; head++) {
    const e = order[head];
    for (let side = 0; side < 2; side++) {
      const d = 2 * e + side;
      const ahead = next[d] >> 1, behind = prev[d] >> 1;
      if (seen[ahead] === 0) {
        seen[ahead] = 1;
        via[ahead] = 2 * d + 1; // corner d comes before the dart next[d] of that edge
        order[tail++] = ahead;
      }
      if (seen[behind] === 0) {
        seen[behind] = 1;
        via[behind] = 2 * prev[d]; // corner prev[d] comes after the dart of that edge
        order[tail++] = behind;
      }
    }
  }
  // From the leaves up: the corner to the parent makes the sum right.
  const missing = new Int32Array(m).fill(1);
  for (let i = tail - 1; i > 0; i--) {
    const e = order[i], corner = via[e] >> 1;
    // A corner counts +s for the edge of the dart after it, -s for the edge of the dart before it.
    const s = (via[e] & 1) === 1 ? missing[e] : -missing[e];
    potential[corner] = s;
    const parent = (via[e] & 1) === 1 ? corner >> 1 : next[corner] >> 1;
    missing[parent] += missing[e];
  }
  return potential;
}

/** The nodes by falling degree, by counting. */
function byFallingDegree(nodes: number, row: Int32Array): Int32Array {
  let most = 0;
  for (let x = 0; x < nodes; x++) most = Math.max(most, row[x + 1] - row[x]);
  const at = new Int32Array(most + 2);
  for (let x = 0; x < nodes; x++) at[most - (row[x + 1] - row[x]) + 1]++;
  for (let k = 0; k <= most; k++) at[k + 1] += at[k];
  const order = new Int32Array(nodes);
  for (let x = 0; x < nodes; x++) order[at[most - (row[x + 1] - row[x])]++] = x;
  return order;
}
