/**
 * A tree of paths on the sphere that can be rehung from one face to another. The first tree takes
 * O(m log m) time, rehanging it at worst O(m); over a whole walk of sources, in practice, together no
 * more than the first.
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
 * Edges of the cover that cross no tree arc form a spanning tree of its vertices (as always for a
 * spanning tree of the faces of a sphere); each vertex but one has one of them to lead on by. During
 * rehanging they are that cycle with trees that lead to it.
 */
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../graph/heap.ts";
import type { InnerGraph } from "./projective-graph.ts";
import type { SphereDual } from "./projective-dual.ts";
import { shortestPaths } from "./projective-paths.ts";
import { Rejected } from "./rejected.ts";

/** Where keys stay below this, buckets are used. */
const MOST_BUCKETS = 1 << 17;
/** Faces and cover vertices have a record of four numbers each. */
const RECORD = 4;
/**
 * Of a cover vertex: the dart whose edge leads on from it, the vertex at the other end, the slack of
 * that edge, and how far p had been raised outside when the edge came between branch and outside. A
 * vertex is called by the place of its record, plus 1 if it is white.
 */
const EDGE = 0, ONWARD = 1, SLACK = 2, RAISED = 3;
/** In RAISED: the edge is not between branch and outside; it is on a way to the cycle just walked. */
const AWAY = -1, WALKED = -2;
/**
 * Of a face: the dart whose arc enters it in the tree, -1 at the root; the face that comes from; and the
 * ends of the edge it crosses.
 */
const ARC = 0, ABOVE = 1, BLACK = 2, WHITE = 3;

export class RehungTree {
  readonly #faces: Int32Array;
  readonly #vertices: Int32Array | Float64Array;
  readonly #queue: MonotoneQueue;
  #root: number;
  #raised = 0;
  #limit = 0;

  /**
   * Starts with a tree of shortest paths.
   *
   * @param most no less than what going there and back costs each time it is rehung, all together
   */
  constructor(
    readonly inner: InnerGraph,
    readonly dual: SphereDual,
    readonly costs: Float64Array,
    root: number,
    most: number,
  ) {
    const { right } = dual, { reverse, targets } = inner;
    const { state, furthest, dearest } = shortestPaths(inner, dual, costs, root);
    this.#root = root;
    this.#queue = most < MOST_BUCKETS ? new BucketQueue(most) : new HeapQueue();
    const faces = this.#faces = new Int32Array(RECORD * 2 * dual.pairs);
    const inTree = new Uint8Array(right.length);
    for (let x = 0; x < 2 * dual.pairs; x++) {
      const d = faces[RECORD * x + ARC] = state[2 * x + 1];
      if (d < 0) continue;
      inTree[d] = 1;
      faces[RECORD * x + ABOVE] = right[d];
    }
    // Slacks are at most this at first, and later grow by what p is raised.
    const size = RECORD * 2 * (inner.offsets.length - 1);
    this.#vertices = dearest + furthest + most < 2 ** 31
      ? new Int32Array(size)
      : new Float64Array(size);
    const name = this.#span(inTree, state);
    for (let face = 0; face < faces.length; face += RECORD) {
      const d = faces[face + ARC];
      if (d < 0) continue;
      faces[face + BLACK] = name[2 * targets[reverse[d]]];
      faces[face + WHITE] = name[2 * targets[d] + 1];
    }
  }

  /**
   * The spanning tree of the cover's vertices, with its slacks. Records stand in depth-first order, so
   * that leading on mostly means going back one in memory.
   *
   * @param inTree length 2m: 1 for darts whose arcs are in the tree of faces
   * @param state distances as `shortestPaths` gives them
   * @returns length 2n: what (v,0) and (v,1) are called, at 2v and 2v + 1
   */
  #span(inTree: Uint8Array, state: Int32Array | Float64Array): Int32Array {
    const { offsets, targets, reverse } = this.inner;
    const { left, right, edgeOf } = this.dual, records = this.#vertices;
    const n = offsets.length - 1, name = new Int32Array(2 * n);
    // Vertices still to come, what their predecessors are called, and the edges that lead there.
    const open = new Int32Array(2 * n), onward = new Int32Array(2 * n), by = new Int32Array(2 * n);
    onward[0] = by[0] = -1;
    let count = 0;
    for (let top = 1; top > 0;) {
      if (count === 2 * n) throw new Rejected("projective: the edges hold a cycle of the cover");
      const x = open[--top], white = x & 1, d = by[top], record = RECORD * count++;
      const own = name[x] = record + white;
      records[record + EDGE] = d;
      records[record + ONWARD] = onward[top];
      records[record + RAISED] = AWAY;
      if (d >= 0) {
        records[record + SLACK] = this.costs[edgeOf[d]] + state[2 * right[d]] - state[2 * left[d]];
      }
      for (let a = offsets[x >> 1]; a < offsets[(x >> 1) + 1]; a++) {
        const edge = white === 0 ? a : reverse[a];
        if (edge === d || inTree[edge] !== 0) continue;
        open[top] = 2 * targets[a] + 1 - white;
        onward[top] = own;
        by[top++] = edge;
      }
    }
    if (count < 2 * n) throw new Rejected("projective: the edges do not span the cover");
    return name;
  }

  /** A lower bound for the distance between a face and its antipode, the same both ways. */
  apart(x: number): number {
    return Math.abs(this.#below(x) - this.#below(x ^ 1));
  }

  /** The costs on the way from the root down to a face. */
  #below(x: number): number {
    const faces = this.#faces, { edgeOf } = this.dual;
    let sum = 0;
    for (let d = faces[RECORD * x + ARC]; d >= 0; d = faces[RECORD * x + ARC]) {
      sum += this.costs[edgeOf[d]];
      x = faces[RECORD * x + ABOVE];
    }
    return sum;
  }

  /**
   * Hangs the tree up at another face.
   *
   * @param to the face
   * @param back no less than the distance from there to the root
   */
  rehang(to: number, back: number): void {
    if (to === this.#root) return;
    const faces = this.#faces, vertices = this.#vertices, queue = this.#queue;
    const { left, right } = this.dual;
    this.#root = to;
    this.#limit = this.#below(to) + back;
    this.#raised = 0;
    queue.clear();
    // The cut arc leads into the branch: its edge is walked from its black end.
    const cut = RECORD * to, start = faces[cut + BLACK];
    this.#turnRound(start, -1, faces[cut + ARC], faces[cut + WHITE]);
    faces[cut + ARC] = -1;
    for (let w = start;;) if ((w = this.#come(w)) === start) break;
    for (;;) {
      const white = queue.pop(), record = white & ~1;
      if (white < 0) throw new Rejected("projective: rehanging passes its limit");
      const came = vertices[record + RAISED];
      // An edge that is gone, or another one in its place.
      if (came < 0 || came + vertices[record + SLACK] !== queue.key) continue;
      this.#raised = queue.key;
      const edge = vertices[record + EDGE], ahead = vertices[record + ONWARD];
      const held = RECORD * left[edge], former = faces[held + ARC];
      const black = faces[held + BLACK], other = faces[held + WHITE];
      faces[held + ARC] = edge;
      faces[held + ABOVE] = right[edge];
      faces[held + BLACK] = ahead;
      faces[held + WHITE] = white;
      let w = ahead;
      if (former < 0) {
        while (w !== white) w = this.#go(w);
        vertices[record + EDGE] = vertices[record + ONWARD] = -1;
        vertices[record + RAISED] = AWAY;
        return;
      }
      // The edge of `former` closes another cycle, now that the one held leads nowhere.
      const joint = this.#turnRound(black, white, former, other);
      let x = other;
      while (vertices[(x & ~1) + RAISED] === AWAY) x = this.#come(x);
      const apart = vertices[(x & ~1) + RAISED] === WALKED;
      // What is left of the former cycle: up to where the new one joins it, or all of it.
      for (const end = apart ? joint : x; w !== end;) w = this.#go(w);
      w = joint;
      if (apart) {
        for (; w !== x; w = vertices[(w & ~1) + ONWARD]) vertices[(w & ~1) + RAISED] = AWAY;
      }
      while (w !== black) w = this.#come(w);
      this.#come(black);
    }
  }

  /**
   * Lets all edges on the way from a vertex to the end of the spanning tree lead the other way, and the
   * vertex lead on by an edge without slack. Edges of the cycle go.
   *
   * @param from the vertex
   * @param end the vertex at the end, whose own edge is lost; -1 if it has none
   * @param edge the edge to lead on by, and `onward` the vertex where it leads
   * @returns the first vertex of the cycle on the way, which stays marked; those before are WALKED
   */
  #turnRound(from: number, end: number, edge: number, onward: number): number {
    const vertices = this.#vertices, raised = this.#raised;
    let joint = -1, slack = 0;
    for (let w = from;;) {
      const record = w & ~1, came = vertices[record + RAISED];
      const itsEdge = vertices[record + EDGE], itsOnward = vertices[record + ONWARD];
      let itsSlack = vertices[record + SLACK];
      vertices[record + EDGE] = edge;
      vertices[record + ONWARD] = onward;
      vertices[record + SLACK] = slack;
      if (came >= 0) {
        itsSlack += (w & 1) !== 0 ? came - raised : raised - came;
        if (joint < 0) joint = w;
        else vertices[record + RAISED] = AWAY;
      } else if (end >= 0) vertices[record + RAISED] = WALKED;
      if (w === end || itsOnward < 0) return joint;
      edge = itsEdge;
      onward = w;
      slack = itsSlack;
      w = itsOnward;
    }
  }

  /** The edge that leads on from w comes between branch and outside. Answers where it leads. */
  #come(w: number): number {
    const vertices = this.#vertices, record = w & ~1, raised = this.#raised;
    vertices[record + RAISED] = raised;
    if ((w & 1) !== 0) {
      const gone = raised + vertices[record + SLACK];
      if (gone <= this.#limit) this.#queue.push(gone, w);
    }
    return vertices[record + ONWARD];
  }

  /** The edge that leads on from w is between them no more. Answers where it leads. */
  #go(w: number): number {
    const vertices = this.#vertices, record = w & ~1;
    const since = this.#raised - vertices[record + RAISED];
    const slack = vertices[record + SLACK] + ((w & 1) !== 0 ? -since : since);
    if (slack < 0) throw new Rejected("projective: a slack is negative");
    vertices[record + SLACK] = slack;
    vertices[record + RAISED] = AWAY;
    return vertices[record + ONWARD];
  }

  /**
   * Around each vertex of the cover the numbers p cancel, so that the slacks add up to the costs. Were
   * they handled wrongly anywhere, they would no longer.
   *
   * @param load length n, the costs at each vertex added up
   */
  requireSums(load: Float64Array): void {
    const { targets, reverse } = this.inner, vertices = this.#vertices;
    const sums = new Float64Array(vertices.length / RECORD);
    for (let record = 0; record < vertices.length; record += RECORD) {
      if (vertices[record + EDGE] < 0) continue;
      const slack = vertices[record + SLACK];
      if (slack < 0) throw new Rejected("projective: a slack is negative");
      sums[record / RECORD] += slack;
      sums[vertices[record + ONWARD] >> 2] += slack;
    }
    for (let record = 0; record < vertices.length; record += RECORD) {
      const d = vertices[record + EDGE];
      // The sum at the root is right if all others are: both colours have the same total.
      if (d < 0) continue;
      const isWhite = (vertices[record + ONWARD] & 1) === 0;
      if (sums[record / RECORD] !== load[targets[isWhite ? d : reverse[d]]]) {
        throw new Rejected("projective: the slacks do not add up");
      }
    }
  }
}
