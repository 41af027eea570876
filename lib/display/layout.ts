/**
 * Where the vertices of a small graph go in the plane: stress minimised by stochastic gradient
 * descent on all pairs, component by component, then packed side by side. Source: Zheng, Pawar and
 * Goodman, "Graph Drawing by Stochastic Gradient Descent", IEEE TVCG 25, 2019,
 * doi:10.1109/TVCG.2018.2859997 (written from memory). O(n·m + sweeps·n²) time and n² bytes for the
 * largest component, so it is meant for some hundreds of vertices, at most two thousand.
 */
import { components } from "../graph/components.ts";
import type { Graph } from "../graph/graph.ts";
import { Random } from "../run/random.ts";

/** Positions of vertices; one unit is about the length of an edge. */
export interface Layout {
  /** Length n each. */
  readonly x: Float64Array;
  readonly y: Float64Array;
}

/** Most vertices of one component that are laid out; the cost is quadratic. */
export const LAYOUT_LIMIT = 2000;

const SWEEPS = 30;

/**
 * Lays a graph out.
 *
 * @param graph no component above `LAYOUT_LIMIT` vertices
 * @param seed same graph and seed, same layout
 * @returns positions, spread over a rectangle from (0, 0)
 * @throws {RangeError} for a component that is too large
 */
export function layoutGraph(graph: Graph, seed: number = 1): Layout {
  const { n } = graph;
  const x = new Float64Array(n), y = new Float64Array(n);
  const { count, of } = components(graph);
  const members: number[][] = Array.from({ length: count }, () => []);
  for (let v = 0; v < n; v++) members[of[v]].push(v);
  const random = new Random(seed);
  for (const list of members) {
    if (list.length > LAYOUT_LIMIT) {
      throw new RangeError(
        `layout: a component has ${list.length} vertices; at most ${LAYOUT_LIMIT} can be drawn`,
      );
    }
    layoutComponent(graph, list, x, y, random);
    turnWide(list, x, y);
  }
  packComponents(members, x, y);
  return { x, y };
}

/** Stress by gradient descent on one component; distances are numbers of edges. */
function layoutComponent(
  graph: Graph,
  list: readonly number[],
  x: Float64Array,
  y: Float64Array,
  random: Random,
): void {
  const k = list.length;
  if (k === 1) return;
  const distance = allDistances(graph, list);
  let farthest = 1;
  for (let i = 0; i < distance.length; i++) farthest = Math.max(farthest, distance[i]);
  for (const v of list) {
    x[v] = random.unit() * farthest;
    y[v] = random.unit() * farthest;
  }
  const pairs = new Int32Array(k * (k - 1) / 2);
  for (let i = 0, at = 0; i < k; i++) for (let j = 0; j < i; j++) pairs[at++] = i * k + j;
  // Step sizes fall from d_max² to 0.1: the first moves pairs at will, the last only settles.
  const decay = Math.log(farthest * farthest / 0.1) / (SWEEPS - 1);
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    const step = farthest * farthest * Math.exp(-decay * sweep);
    random.shuffle(pairs);
    for (const pair of pairs) {
      const d = distance[pair];
      const v = list[Math.floor(pair / k)], w = list[pair % k];
      const dx = x[v] - x[w], dy = y[v] - y[w];
      const length = Math.hypot(dx, dy) || 1e-9;
      const move = Math.min(1, step / (d * d)) * (length - d) / (2 * length);
      x[v] -= move * dx;
      y[v] -= move * dy;
      x[w] += move * dx;
      y[w] += move * dy;
    }
  }
}

/** Numbers of edges between all pairs of a component, by breadth-first searches; row by row. */
function allDistances(graph: Graph, list: readonly number[]): Uint16Array {
  const k = list.length;
  const distance = new Uint16Array(k * k);
  const index = new Int32Array(graph.n).fill(-1);
  list.forEach((v, i) => index[v] = i);
  const queue = new Int32Array(k), seen = new Int32Array(k).fill(-1);
  for (let s = 0; s < k; s++) {
    let head = 0, tail = 0;
    queue[tail++] = s;
    seen[s] = s;
    while (head < tail) {
      const i = queue[head++], v = list[i];
      for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
        const j = index[graph.targets[a]];
        if (seen[j] === s) continue;
        seen[j] = s;
        distance[s * k + j] = distance[s * k + i] + 1;
        queue[tail++] = j;
      }
    }
  }
  return distance;
}

/** Turns a component so that it is as wide as it can be, by its principal axis. */
function turnWide(list: readonly number[], x: Float64Array, y: Float64Array): void {
  let mx = 0, my = 0;
  for (const v of list) {
    mx += x[v] / list.length;
    my += y[v] / list.length;
  }
  let xx = 0, yy = 0, xy = 0;
  for (const v of list) {
    xx += (x[v] - mx) ** 2;
    yy += (y[v] - my) ** 2;
    xy += (x[v] - mx) * (y[v] - my);
  }
  const angle = Math.atan2(2 * xy, xx - yy) / 2;
  const c = Math.cos(angle), s = Math.sin(angle);
  for (const v of list) {
    const dx = x[v] - mx, dy = y[v] - my;
    x[v] = c * dx + s * dy;
    y[v] = c * dy - s * dx;
  }
}

/** Sets components on shelves, the largest first, about half as high as wide. */
function packComponents(members: readonly number[][], x: Float64Array, y: Float64Array): void {
  const boxes = members.map((list) => {
    let left = Infinity, right = -Infinity, top = Infinity, bottom = -Infinity;
    for (const v of list) {
      left = Math.min(left, x[v]);
      right = Math.max(right, x[v]);
      top = Math.min(top, y[v]);
      bottom = Math.max(bottom, y[v]);
    }
    return { list, left, top, width: right - left + 1, height: bottom - top + 1 };
  });
  boxes.sort((a, b) => b.height - a.height || b.width - a.width);
  const area = boxes.reduce((sum, b) => sum + b.width * b.height, 0);
  const shelf = Math.max(Math.sqrt(2 * area), ...boxes.map((b) => b.width));
  let atX = 0, atY = 0, height = 0;
  for (const box of boxes) {
    if (atX > 0 && atX + box.width > shelf) {
      atX = 0;
      atY += height;
      height = 0;
    }
    for (const v of box.list) {
      x[v] += atX - box.left;
      y[v] += atY - box.top;
    }
    atX += box.width;
    height = Math.max(height, box.height);
  }
}
