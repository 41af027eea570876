/**
 * Second phase of the left-right planarity test: decide for every return edge whether it runs on the
 * left or on the right of the tree path it closes, or find that this cannot be done. O(n + m) time,
 * no recursion.
 *
 * The stack holds conflict pairs: two intervals of return edges, one for each side, each a chain
 * linked through `ref` from its high to its low edge. Names follow U. Brandes, "The left-right
 * planarity test" (manuscript, 2009; written from memory), phase "testing".
 */
import type { Orientation } from "./planarity-orientation.ts";
import type { Meter } from "../run/meter.ts";

/** The sides of the edges of a planar graph, still relative to each other. */
export interface Sides {
  /** Length m: the edge each edge's side is relative to, or -1. Free of cycles. */
  readonly ref: Int32Array;
  /** Length m, entries 1 (same side as `ref`, or right) and -1 (opposite, or left). */
  readonly side: Int8Array;
}

/** Where the test failed. */
export interface TestFailure {
  /**
   * The back edges met until then, in order, as indices of oriented edges. Together with the tree
   * they are not planar; without the last few they were not found to be.
   */
  readonly met: Int32Array;
}

/**
 * Decides planarity.
 *
 * @param o the orientation of the graph
 * @param meter counts about one unit for each edge
 * @returns the sides, or the failure
 */
export function decideSides(o: Orientation, meter: Meter): Sides | TestFailure {
  const { n, m, parent, parentEdge, start, target, low } = o;
  const ref = new Int32Array(m).fill(-1);
  const side = new Int8Array(m).fill(1);
  const cursor = start.slice(0, n);
  const bottom = new Int32Array(n); // stack height when the out-edge being worked on was begun
  const lowEdge = new Int32Array(n).fill(-1); // lowpt_edge of the tree edge entering each vertex

  // Conflict pairs: low and high edge of the left and of the right interval, -1 where empty.
  const capacity = m - n + 2 + countRoots(parent);
  const leftLow = new Int32Array(capacity), leftHigh = new Int32Array(capacity);
  const rightLow = new Int32Array(capacity), rightHigh = new Int32Array(capacity);
  let top = 0; // stack height

  const met = new Int32Array(capacity);
  let metCount = 0;
  const failure = (): TestFailure => ({ met: met.slice(0, metCount) });

  for (let root = 0; root < n; root++) {
    if (parent[root] >= 0) continue;
    let v = root;
    let back = false; // whether the current out-edge of v is a tree edge just come back from
    while (true) {
      const k = cursor[v];
      if (k < start[v + 1]) {
        const w = target[k];
        if (!back) {
          bottom[v] = top;
          if (w > v) {
            v = w;
            continue;
          }
          met[metCount++] = k;
          leftLow[top] = leftHigh[top] = -1;
          rightLow[top] = rightHigh[top] = k;
          top++;
        }
        back = false;
        // Integrate the return edges of edge k.
        const lowK = w > v ? low[w] : w;
        if (lowK < v) {
          const lowE = w > v ? lowEdge[w] : k;
          if (k === start[v]) lowEdge[v] = lowE;
          else if (!addConstraints(v, lowK)) return failure();
        }
        cursor[v]++;
        continue;
      }
      meter.tick(1 + start[v + 1] - start[v]);
      const u = parent[v];
      if (u < 0) break;
      removeBackEdges(u, v);
      v = u;
      back = true;
    }
  }
  return { ref, side };

  /** Merges the return edges of the current out-edge of v, with lowpoint lowK, into the stack. */
  function addConstraints(v: number, lowK: number): boolean {
    const lowV = low[v], base = bottom[v];
    let pLeftLow = -1, pLeftHigh = -1, pRightLow = -1, pRightHigh = -1;
    // Merge the return edges of the current edge into the right interval.
    do {
      top--;
      let qLow = rightLow[top], qHigh = rightHigh[top];
      if (leftHigh[top] >= 0) {
        if (qHigh >= 0) return false;
        qLow = leftLow[top];
        qHigh = leftHigh[top];
      }
      if (target[qLow] > lowV) {
        if (pRightHigh < 0) pRightHigh = qHigh;
        else ref[pRightLow] = qHigh;
        pRightLow = qLow;
      } else {
        ref[qLow] = lowEdge[v]; // align
      }
    } while (top > base);
    // Merge conflicting return edges of the earlier edges into the left interval.
    while (top > 0) {
      const q = top - 1;
      const leftConflict = leftHigh[q] >= 0 && target[leftHigh[q]] > lowK;
      const rightConflict = rightHigh[q] >= 0 && target[rightHigh[q]] > lowK;
      if (!leftConflict && !rightConflict) break;
      if (leftConflict && rightConflict) return false;
      top = q;
      let qLeftLow = leftLow[q], qLeftHigh = leftHigh[q];
      let qRightLow = rightLow[q], qRightHigh = rightHigh[q];
      if (rightConflict) {
        [qLeftLow, qRightLow] = [qRightLow, qLeftLow];
        [qLeftHigh, qRightHigh] = [qRightHigh, qLeftHigh];
      }
      // Below lowK there is no conflict: that interval joins the right.
      if (pRightLow >= 0) ref[pRightLow] = qRightHigh;
      if (qRightLow >= 0) pRightLow = qRightLow;
      if (pLeftHigh < 0) pLeftHigh = qLeftHigh;
      else ref[pLeftLow] = qLeftHigh;
      pLeftLow = qLeftLow;
    }
    if (pLeftHigh >= 0 || pRightHigh >= 0) {
      leftLow[top] = pLeftLow;
      leftHigh[top] = pLeftHigh;
      rightLow[top] = pRightLow;
      rightHigh[top] = pRightHigh;
      top++;
    }
    return true;
  }

  /** Takes the back edges that end at u off the stack, when the tree edge u → v is done. */
  function removeBackEdges(u: number, v: number): void {
    // Drop entire conflict pairs.
    while (top > 0 && lowest(top - 1) === u) {
      top--;
      if (leftLow[top] >= 0) side[leftLow[top]] = -1;
    }
    if (top > 0) {
      const p = top - 1;
      let high = leftHigh[p];
      while (high >= 0 && target[high] === u) high = ref[high];
      leftHigh[p] = high;
      if (high < 0 && leftLow[p] >= 0) {
        ref[leftLow[p]] = rightLow[p];
        side[leftLow[p]] = -1;
        leftLow[p] = -1;
      }
      high = rightHigh[p];
      while (high >= 0 && target[high] === u) high = ref[high];
      rightHigh[p] = high;
      if (high < 0 && rightLow[p] >= 0) {
        ref[rightLow[p]] = leftLow[p];
        side[rightLow[p]] = -1;
        rightLow[p] = -1;
      }
    }
    if (low[v] < u) {
      // The side of the tree edge is the side of a highest return edge.
      const l = leftHigh[top - 1], r = rightHigh[top - 1];
      ref[parentEdge[v]] = l >= 0 && (r < 0 || target[l] > target[r]) ? l : r;
    }
  }

  function lowest(p: number): number {
    if (leftHigh[p] < 0) return target[rightLow[p]];
    if (rightHigh[p] < 0) return target[leftLow[p]];
    const l = target[leftLow[p]], r = target[rightLow[p]];
    return l < r ? l : r;
  }
}

function countRoots(parent: Int32Array): number {
  let roots = 0;
  for (let v = 0; v < parent.length; v++) if (parent[v] < 0) roots++;
  return roots;
}
