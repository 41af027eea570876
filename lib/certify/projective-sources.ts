/**
 * The distance between each source of a proof and its antipode, from one tree of paths on the sphere
 * that is rehung from source to source. O(m log m) time for the first; for the others together the
 * same in practice, at worst O(m) for each.
 *
 * Give every face x a number p(x). The *slack* of an arc x→y is c(x→y) + p(x) - p(y). Where no slack is
 * negative, d(x, y) >= p(y) - p(x) for any two faces, with equality along paths of slack 0.
 * The tree spans all faces with arcs of slack 0, so its paths are shortest ones.
 *
 * To rehang the tree from its root s to t, cut off the branch at t and raise p evenly on all faces
 * outside. Slacks of arcs from the branch outward fall. When one reaches 0 it holds what hangs on its
 * head to the branch, until s is held too. No slack inside or outside changes, so only those of the
 * edges between need care. They form a cycle in the double cover, walked with the branch on the left:
 * then arcs lead outward over the edges that are walked from their white end.
 *
 * Edges of the cover that cross no tree arc form a spanning tree of its vertices (the sphere has no
 * other closed curve than boundaries); each vertex but one has one of them to lead on by. During
 * rehanging they are that cycle with trees that lead to it.
 */
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../graph/heap.ts";
import type { InnerGraph } from "./projective-graph.ts";
import type { SphereDual } from "./projective-dual.ts";
import type { Walk } from "./projective-walk.ts";
import { Rejected } from "./rejected.ts";

/** No sum of loads may be larger, so that every sum below is exact. */
const MOST_LOAD = 2 ** 51;
/** Where keys stay below this, buckets are used. */
const MOST_BUCKETS = 1 << 17;

/**
 * Lower bounds for the distances between the faces of the walk and their antipodes.
 *
 * @param inner H
 * @param dual the sphere
 * @param costs length m, costs of edges
 * @param load length n, the costs at each vertex added up
 * @param walk the sources
 * @param wanted bounds that reach this need not be exact
 * @returns as long as the walk
 * @throws {Rejected} when costs are too large to be added exactly
 */
export function provenDistances(
  inner: InnerGraph,
  dual: SphereDual,
  costs: Float64Array,
  load: Float64Array,
  walk: Walk,
  wanted: number,
): Float64Array {
  const { faces, returns } = walk;
  const total = load.reduce((sum, x) => sum + x, 0);
  if (!(total <= MOST_LOAD)) {
    throw new Rejected(`projective: the costs add up to ${total}, more than ${MOST_LOAD}`);
  }
  const proven = new Float64Array(faces.length);
  const tree = new RehungTree(inner, dual, costs, faces[0], returns.reduce((sum, x) => sum + x, 0));
  let limit = 0;
  for (let i = 0; i < faces.length; i++) {
    limit += returns[i];
    proven[i] = tree.apart(faces[i]);
    if (proven[i] >= wanted) continue;
    tree.rehang(faces[i], limit);
    limit = 0;
    proven[i] = tree.apart(faces[i]);
  }
  tree.requireSums(load);
  return proven;
}

/**
 * Each cover vertex has a record of four numbers: the dart whose edge leads on from it, the vertex at
 * the other end, the slack of that edge, and how far p had been raised outside when the edge came
 * between branch and outside. A vertex is called by the place of its record, plus 1 if it is white.
 */
const EDGE = 0, ONWARD = 1, SLACK = 2, RAISED = 3, RECORD = 4;
/** In RAISED: the edge is not between branch and outside; it is on a way to the cycle just walked. */
const AWAY = -1, WALKED = -2;

class RehungTree {
  /** Length 2·pairs: the dart whose arc enters the face in the tree, -1 at the root. */
  readonly #above: Int32Array;
  readonly #records: Int32Array | Float64Array;
  /** Length 4m: the black end of the edge of dart d at 2d, its white end at 2d + 1. */
  readonly #ends: Int32Array;
  readonly #queue: MonotoneQueue;
  #raised = 0;

  /**
   * Starts with a tree of shortest paths.
   *
   * @param most no less than all limits of `rehang` together
   */
  constructor(
    readonly inner: InnerGraph,
    readonly dual: SphereDual,
    readonly costs: Float64Array,
    root: number,
    most: number,
  ) {
    const { distance, above } = shortestPaths(inner, dual, costs, root);
    this.#above = above;
    let largest = 0, dearest = 0;
    for (let x = 0; x < distance.length; x++) if (distance[x] > largest) largest = distance[x];
    for (let e = 0; e < costs.length; e++) if (costs[e] > dearest) dearest = costs[e];
    // Slacks are at most this at first, and later grow by what p is raised.
    const size = 2 * RECORD * (inner.offsets.length - 1);
    this.#records = dearest + largest + most < 2 ** 31
      ? new Int32Array(size)
      : new Float64Array(size);
    this.#ends = this.#span(distance);
    this.#queue = most < MOST_BUCKETS ? new BucketQueue(most) : new HeapQueue();
  }

  /**
   * The spanning tree of the cover's vertices, with its slacks. Vertices that lead on to each other are
   * put next to each other where that is possible.
   *
   * @returns the ends of edges
   */
  #span(distance: ArrayLike<number>): Int32Array {
    const { offsets, targets, reverse } = this.inner;
    const { left, right, edgeOf } = this.dual, above = this.#above, records = this.#records;
    const n = offsets.length - 1, darts = targets.length;
    const inTree = new Uint8Array(darts);
    for (let x = 0; x < above.length; x++) if (above[x] >= 0) inTree[above[x]] = 1;
    // Cover vertex 2v is (v,0), 2v + 1 is (v,1).
    const order = new Int32Array(2 * n), before = new Int32Array(2 * n).fill(-1);
    const by = new Int32Array(2 * n);
    let tail = 1;
    before[0] = 0;
    by[0] = -1;
    for (let head = 0; head < tail; head++) {
      const x = order[head], white = x & 1;
      for (let d = offsets[x >> 1]; d < offsets[(x >> 1) + 1]; d++) {
        const y = 2 * targets[d] + 1 - white, edge = white === 0 ? d : reverse[d];
        if (before[y] >= 0 || inTree[edge] !== 0) continue;
        before[y] = x;
        by[y] = edge;
        order[tail++] = y;
      }
    }
    if (tail < 2 * n) {
      throw new Rejected("projective: the edges outside the tree do not span the cover");
    }
    // How many hang on each; the one that most hang on comes right after the one it leads to.
    const weight = new Int32Array(2 * n).fill(1), main = new Int32Array(2 * n).fill(-1);
    for (let i = 2 * n - 1; i > 0; i--) {
      const y = order[i], x = before[y];
      weight[x] += weight[y];
      if (main[x] < 0 || weight[y] > weight[main[x]]) main[x] = y;
    }
    const name = new Int32Array(2 * n), free = new Int32Array(2 * n);
    for (let i = 0; i < 2 * n; i++) {
      const y = order[i], x = before[y], d = by[y];
      let place = 0;
      if (i > 0) {
        place = main[x] === y ? name[x] / RECORD + 1 | 0 : free[x];
        if (main[x] !== y) free[x] += weight[y];
      }
      free[y] = place + 1 + (main[y] < 0 ? 0 : weight[main[y]]);
      const record = RECORD * place;
      name[y] = record + (y & 1);
      records[record + EDGE] = d;
      records[record + ONWARD] = i > 0 ? name[x] : -1;
      records[record + RAISED] = AWAY;
      if (i > 0) {
        records[record + SLACK] = this.costs[edgeOf[d]] + distance[right[d]] - distance[left[d]];
      }
    }
    const ends = new Int32Array(2 * darts);
    for (let v = 0; v < n; v++) {
      for (let d = offsets[v]; d < offsets[v + 1]; d++) {
        ends[2 * d] = name[2 * v];
        ends[2 * d + 1] = name[2 * targets[d] + 1];
      }
    }
    return ends;
  }

  /** A lower bound for the distance between a face and its antipode, the same both ways. */
  apart(x: number): number {
    return Math.abs(this.#below(x) - this.#below(x ^ 1));
  }

  /** The costs on the way from the root down to a face. */
  #below(x: number): number {
    let sum = 0;
    for (let d = this.#above[x]; d >= 0; d = this.#above[x]) {
      sum += this.costs[this.dual.edgeOf[d]];
      x = this.dual.right[d];
    }
    return sum;
  }

  /**
   * Hangs the tree up at another face.
   *
   * @param to the face
   * @param limit no less than what going from the root there and back costs
   */
  rehang(to: number, limit: number): void {
    const above = this.#above, records = this.#records, ends = this.#ends, queue = this.#queue;
    const cut = above[to];
    if (cut < 0) return;
    above[to] = -1;
    this.#raised = 0;
    queue.clear();
    // The cut arc leads into the branch: its edge is walked from its black end.
    const start = ends[2 * cut];
    this.#turnRound(start, -1, cut);
    for (let w = start;;) if ((w = this.#come(w, limit)) === start) break;
    for (;;) {
      const white = queue.pop(), record = white & ~1;
      if (white < 0) throw new Rejected("projective: rehanging passes its limit");
      const came = records[record + RAISED];
      // An edge that is gone, or another one in its place.
      if (came < 0 || came + records[record + SLACK] !== queue.key) continue;
      this.#raised = queue.key;
      const edge = records[record + EDGE], held = this.dual.left[edge], former = above[held];
      above[held] = edge;
      if (former < 0) {
        for (let w = records[record + ONWARD]; w !== white;) w = this.#go(w);
        records[record + EDGE] = records[record + ONWARD] = -1;
        records[record + RAISED] = AWAY;
        return;
      }
      // The edge of `former` closes another cycle, now that the one held leads nowhere.
      let w = records[record + ONWARD];
      const black = ends[2 * former], other = ends[2 * former + 1];
      const joint = this.#turnRound(black, white, former);
      let x = other;
      while (records[(x & ~1) + RAISED] === AWAY) x = this.#come(x, limit);
      const apart = records[(x & ~1) + RAISED] === WALKED;
      // What is left of the former cycle: up to where the new one joins it, or all of it.
      for (const end = apart ? joint : x; w !== end;) w = this.#go(w);
      w = joint;
      if (apart) {
        for (; w !== x; w = records[(w & ~1) + ONWARD]) records[(w & ~1) + RAISED] = AWAY;
      }
      while (w !== black) w = this.#come(w, limit);
      this.#come(black, limit);
    }
  }

  /**
   * Lets all edges on the way from a vertex to the end of the spanning tree lead the other way, and the
   * vertex lead on by an edge without slack. Edges of the cycle go.
   *
   * @param from the vertex
   * @param end the vertex at the end, whose own edge is lost; -1 if it has none
   * @param edge the edge to lead on by, `from` being its black end
   * @returns the first vertex of the cycle on the way, which stays marked; those before are WALKED
   */
  #turnRound(from: number, end: number, edge: number): number {
    const records = this.#records, raised = this.#raised;
    let joint = -1, onward = this.#ends[2 * edge + 1], slack = 0;
    for (let w = from;;) {
      const record = w & ~1, came = records[record + RAISED];
      const itsEdge = records[record + EDGE], itsOnward = records[record + ONWARD];
      let itsSlack = records[record + SLACK];
      records[record + EDGE] = edge;
      records[record + ONWARD] = onward;
      records[record + SLACK] = slack;
      if (came >= 0) {
        itsSlack += (w & 1) !== 0 ? came - raised : raised - came;
        if (joint < 0) joint = w;
        else records[record + RAISED] = AWAY;
      } else if (end >= 0) records[record + RAISED] = WALKED;
      if (w === end || itsOnward < 0) return joint;
      edge = itsEdge;
      onward = w;
      slack = itsSlack;
      w = itsOnward;
    }
  }

  /** The edge that leads on from w comes between branch and outside. Answers where it leads. */
  #come(w: number, limit: number): number {
    const records = this.#records, record = w & ~1, raised = this.#raised;
    records[record + RAISED] = raised;
    if ((w & 1) !== 0) {
      const gone = raised + records[record + SLACK];
      if (gone <= limit) this.#queue.push(gone, w);
    }
    return records[record + ONWARD];
  }

  /** The edge that leads on from w is between them no more. Answers where it leads. */
  #go(w: number): number {
    const records = this.#records, record = w & ~1, since = this.#raised - records[record + RAISED];
    const slack = records[record + SLACK] + ((w & 1) !== 0 ? -since : since);
    if (slack < 0) throw new Rejected("projective: a slack is negative");
    records[record + SLACK] = slack;
    records[record + RAISED] = AWAY;
    return records[record + ONWARD];
  }

  /**
   * Around each vertex of the cover the numbers p cancel, so that the slacks add up to the costs. Were
   * they handled wrongly anywhere, they would no longer.
   *
   * @param load length n, the costs at each vertex added up
   */
  requireSums(load: Float64Array): void {
    const { offsets } = this.inner, records = this.#records, ends = this.#ends;
    const sums = new Float64Array(records.length / RECORD);
    for (let record = 0; record < records.length; record += RECORD) {
      if (records[record + ONWARD] < 0) continue;
      if (records[record + SLACK] < 0) throw new Rejected("projective: a slack is negative");
      sums[record / RECORD] += records[record + SLACK];
      sums[records[record + ONWARD] >> 2] += records[record + SLACK];
    }
    for (let v = 0; v < load.length; v++) {
      for (let d = offsets[v]; d < offsets[v + 1]; d++) {
        const black = ends[2 * d] >> 2, white = ends[2 * this.inner.reverse[d] + 1] >> 2;
        if (sums[black] !== load[v] || sums[white] !== load[v]) {
          throw new Rejected("projective: the slacks do not add up");
        }
      }
    }
  }
}

/** Dijkstra's method on the sphere: distances from a face, and the dart whose arc enters each. */
function shortestPaths(
  { reverse }: InnerGraph,
  { pairs, offsets, out, left, edgeOf }: SphereDual,
  costs: Float64Array,
  root: number,
): { distance: Float64Array; above: Int32Array } {
  let dearest = 0;
  for (let e = 0; e < costs.length; e++) if (costs[e] > dearest) dearest = costs[e];
  const queue = dearest < MOST_BUCKETS / 128 ? new BucketQueue(dearest) : new HeapQueue();
  const distance = new Float64Array(2 * pairs).fill(Infinity);
  const above = new Int32Array(2 * pairs).fill(-1);
  // End and cost of each arc out of an even face; out of its antipode it is the antipode of the end.
  const arcs = new Float64Array(2 * out.length);
  for (let a = 0; a < out.length; a++) {
    arcs[2 * a] = left[out[a]];
    arcs[2 * a + 1] = costs[edgeOf[out[a]]];
  }
  distance[root] = 0;
  queue.push(0, root);
  for (let x = queue.pop(); x >= 0; x = queue.pop()) {
    const key = queue.key, side = x & 1, last = offsets[(x >> 1) + 1];
    if (distance[x] !== key) continue;
    for (let a = offsets[x >> 1]; a < last; a++) {
      const y = arcs[2 * a] ^ side, reached = key + arcs[2 * a + 1];
      if (reached >= distance[y]) continue;
      distance[y] = reached;
      above[y] = side === 0 ? out[a] : reverse[out[a]];
      queue.push(reached, y);
    }
  }
  return { distance, above };
}
