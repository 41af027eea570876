/**
 * Third phase of the left-right planarity test: from the sides of the edges to a rotation system.
 * O(n + m) time, no recursion.
 */
import type { Orientation } from "./planarity-orientation.ts";
import type { Sides } from "./planarity-test.ts";
import type { Meter } from "../run/meter.ts";

/**
 * Builds the rotation system.
 *
 * @param o the orientation of the graph; the rows of `target` and `dart` are reordered
 * @param sides the relative sides of its edges; made absolute in place
 * @param meter counts about one unit for each edge
 * @returns length 2m: the dart that follows each dart around its vertex
 */
export function rotationFromSides(o: Orientation, sides: Sides, meter: Meter): Int32Array {
  const { n, m, parent, start, target, dart } = o;
  resolve(sides);
  meter.tick(m);
  const { side } = sides;
  leftThenRight(o, side);

  // Around each vertex: first the edge from the parent, then the out-edges from left to right.
  const next = new Int32Array(2 * m), prev = new Int32Array(2 * m);
  for (let v = 0; v < n; v++) {
    const first = parent[v] < 0 ? -1 : dart[o.parentEdge[v]] ^ 1;
    let last = first;
    for (let k = start[v]; k < start[v + 1]; k++) {
      const d = dart[k];
      if (last >= 0) {
        next[last] = d;
        prev[d] = last;
      }
      last = d;
    }
    if (last >= 0) {
      const head = first >= 0 ? first : dart[start[v]];
      next[last] = head;
      prev[head] = last;
    }
  }

  // Back edges enter an ancestor beside the tree edge in use there: just right of it, or left of all
  // that came in on its left.
  const leftRef = new Int32Array(n), rightRef = new Int32Array(n); // darts
  const cursor = start.slice(0, n);
  for (let root = 0; root < n; root++) {
    if (parent[root] >= 0) continue;
    let v = root;
    while (v >= 0) {
      const k = cursor[v];
      if (k >= start[v + 1]) {
        meter.tick(1 + start[v + 1] - start[v]);
        v = parent[v];
        continue;
      }
      cursor[v]++;
      const w = target[k];
      if (w > v) {
        leftRef[v] = rightRef[v] = dart[k];
        v = w;
        continue;
      }
      const into = dart[k] ^ 1;
      const before = side[k] > 0 ? rightRef[w] : prev[leftRef[w]];
      const after = next[before];
      next[before] = into;
      prev[into] = before;
      next[into] = after;
      prev[after] = into;
      if (side[k] < 0) leftRef[w] = into;
    }
  }
  return next;
}

/** Makes every side absolute: follow the references to their end, then come back. */
function resolve({ ref, side }: Sides): void {
  for (let k = 0; k < ref.length; k++) {
    if (ref[k] < 0) continue;
    // Go up, turning the references round so that they lead back.
    let at = k, from = -1;
    while (ref[at] >= 0) {
      const up = ref[at];
      ref[at] = from;
      from = at;
      at = up;
    }
    let sign = side[at];
    while (from >= 0) {
      sign = side[from] = side[from] * sign;
      const down = ref[from];
      ref[from] = -1;
      from = down;
    }
  }
}

/** Reorders each row: left edges from deep to shallow nesting, then right ones the other way. */
function leftThenRight(o: Orientation, side: Int8Array): void {
  const { n, start, target, dart, parentEdge } = o;
  let room = 16;
  let rowTarget = new Int32Array(room),
    rowDart = new Int32Array(room),
    rowSide = new Int8Array(room);
  for (let v = 0; v < n; v++) {
    const from = start[v], count = start[v + 1] - from;
    if (count > room) {
      room = 2 * count;
      rowTarget = new Int32Array(room);
      rowDart = new Int32Array(room);
      rowSide = new Int8Array(room);
    }
    let lefts = 0;
    for (let i = 0; i < count; i++) {
      rowTarget[i] = target[from + i];
      rowDart[i] = dart[from + i];
      rowSide[i] = side[from + i];
      if (rowSide[i] < 0) lefts++;
    }
    let left = from + lefts, right = from + lefts;
    for (let i = 0; i < count; i++) {
      const k = rowSide[i] < 0 ? --left : right++;
      target[k] = rowTarget[i];
      dart[k] = rowDart[i];
      side[k] = rowSide[i];
      if (rowTarget[i] > v) parentEdge[rowTarget[i]] = k;
    }
  }
}
