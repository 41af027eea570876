/**
 * A tree of shortest paths on the sphere whose source moves from face to face. Moving costs what
 * changes in the tree, not what the sphere holds: P. N. Klein, "Multiple-source shortest paths in
 * planar graphs" (SODA 2005), but with the boundary between what has changed and what has not written
 * out, where he has dynamic trees. On the sphere a source may move anywhere; his bound on the number
 * of changes, for sources around one face, is then only what is seen in practice.
 *
 * Every face x has a *potential*, at first d(s, x) with s the source, and the arc x→y the *slack*
 * c(x→y) + potential(x) - potential(y) >= 0; tree arcs have none. To move from s to t, cut the branch
 * at t off the tree; its faces are *new*, the others *old*. Let the potentials of all old faces
 * rise by a common *level*. Only arcs from new to old lose slack. When one has lost all, it
 * becomes the tree arc of the face it enters, which is new from then on with all that hangs below it.
 * The last face to turn is s. The level is then d(s, t) + d(t, s), and the tree one of shortest paths
 * from t.
 *
 * The edges of the cover that the tree does not cross form a spanning tree of the cover's vertices, the
 * cotree. While the source moves the tree of faces is in two pieces, so there is one edge more: the
 * cotree with one cycle, the *boundary* between new and old. Every vertex points along its edge towards
 * the boundary, and around it with the new faces on the left. Arcs from new to old are those
 * across edges that point from their white end to the black one.
 *
 * Slacks stand with the edges of the cotree. Those of the boundary note the level at which they came
 * there, and their slack is put right when they leave.
 */
import { BucketQueue, HeapQueue, type MonotoneQueue } from "../../graph/heap.ts";
import type { Graph } from "../../graph/graph.ts";
import type { Meter } from "../../run/meter.ts";
import { cotreeOf } from "./cotree.ts";
import type { DirectedDual } from "./directed-dual.ts";
import type { ShortestPaths } from "./shortest-paths.ts";

/** Fields of a cover vertex in `#links`. Its number is the place of the first, plus 1 if it is white. */
const DART = 0, NEXT = 1, SLACK = 2, SINCE = 3, FIELDS = 4;
/** In SINCE: not on the boundary; perhaps about to be. */
const OFF = -1, MAYBE = -2;

export class MovingSource {
  /** Length 2·pairs: the dart whose arc enters the face in the tree, -1 at the source. */
  readonly #parent: Int32Array;
  /**
   * Length 8n: for each cover vertex the dart of the edge it points along, the vertex it points at, the
   * slack of that edge, and the level since when the edge is on the boundary.
   */
  readonly #links: Int32Array | Float64Array;
  /** Length 4m: the black end of the edge of dart d at 2d, the white end at 2d + 1. */
  readonly #ends: Int32Array;
  readonly #queue: MonotoneQueue;
  /** While the source moves: the level, the largest one possible, and how far the new source was. */
  #level = 0;
  #limit = 0;
  #raised = 0;
  #source: number;
  #work = 0;

  /**
   * @param paths shortest paths from the first source; left as they are
   * @param costs as for `shortestPaths`
   * @param range no less than the limits of all moves together
   * @param unitsPerTick units counted between two ticks of the meter
   */
  constructor(
    graph: Graph,
    readonly dual: DirectedDual,
    readonly costs: Int32Array | Float64Array,
    paths: ShortestPaths,
    source: number,
    range: number,
    readonly unitsPerTick = 4096,
  ) {
    const { tree, furthest } = paths;
    this.#parent = new Int32Array(2 * dual.pairs);
    for (let x = 0; x < this.#parent.length; x++) this.#parent[x] = tree[2 * x + 1];
    this.#source = source;

    const { n, m, tails, heads } = graph;
    const { places, vertices, next, darts } = cotreeOf(graph, this.#parent);
    const nameOf = (vertex: number) => FIELDS * places[vertex] + (vertex & 1);
    let dearest = 0;
    for (let e = 0; e < m; e++) if (costs[e] > dearest) dearest = costs[e];
    // A slack is at most a cost and a distance, and grows by no more than the moves.
    const narrow = dearest + furthest + range < 2 ** 31;
    const links = narrow ? new Int32Array(2 * n * FIELDS) : new Float64Array(2 * n * FIELDS);
    for (let place = 0; place < 2 * n; place++) {
      const link = FIELDS * place, d = darts[place];
      links[link + DART] = d;
      links[link + NEXT] = d < 0 ? -1 : FIELDS * next[place] + (vertices[next[place]] & 1);
      links[link + SINCE] = OFF;
      if (d < 0) continue;
      links[link + SLACK] = costs[d >> 1] + tree[2 * dual.right[d]] - tree[2 * dual.left[d]];
    }
    this.#links = links;
    this.#ends = new Int32Array(4 * m);
    for (let e = 0; e < m; e++) {
      this.#ends[4 * e] = nameOf(2 * tails[e]);
      this.#ends[4 * e + 1] = nameOf(2 * heads[e] + 1);
      this.#ends[4 * e + 2] = nameOf(2 * heads[e]);
      this.#ends[4 * e + 3] = nameOf(2 * tails[e] + 1);
    }
    this.#queue = range <= Math.max(1 << 16, dual.pairs) ? new BucketQueue(range) : new HeapQueue();
  }

  /** The distance from the source to a face. O(length of the path) time. */
  distance(x: number): number {
    const parent = this.#parent, { right } = this.dual;
    let sum = 0, root = x;
    for (let d = parent[x]; d >= 0; d = parent[root]) {
      sum += this.costs[d >> 1];
      root = right[d];
    }
    // While the source moves, the faces still below the former one rise with the level.
    return sum + (root === this.#source ? this.#raised : this.#level);
  }

  /** A lower bound for the distance between x and its antipode, which is the same both ways. */
  bound(x: number): number {
    return Math.abs(this.distance(x) - this.distance(x ^ 1));
  }

  /** The edges of H crossed on a shortest path from the source to a face. */
  path(x: number): number[] {
    const crossed: number[] = [];
    for (let d = this.#parent[x]; d >= 0; d = this.#parent[x]) {
      crossed.push(d >> 1);
      x = this.dual.right[d];
    }
    return crossed;
  }

  /**
   * Moves the source.
   *
   * @param to a face
   * @param limit no less than what going from the source there and back costs
   * @param meter counts about one unit for each edge that comes to the boundary or leaves it
   * @throws {Interrupted} when the meter runs out; `bound` still holds then, but moving is over
   */
  move(to: number, limit: number, meter: Meter): void {
    const { left } = this.dual;
    const parent = this.#parent, links = this.#links, ends = this.#ends, queue = this.#queue;
    const first = parent[to];
    if (first < 0) return;
    this.#raised = this.distance(to);
    this.#limit = limit;
    this.#source = to;
    parent[to] = -1;
    queue.clear();
    // New is to the left of the arc's own edge if that is walked from its black end.
    const black = ends[2 * first];
    this.#turn(black, -1, first, ends[2 * first + 1]);
    let w = black;
    do w = this.#enter(w); while (w !== black);
    for (;;) {
      if (this.#work >= this.unitsPerTick) {
        const work = this.#work;
        this.#work = 0;
        meter.tick(work);
      }
      const white = queue.pop();
      if (white < 0) throw new Error("internal: moving the source passes its limit");
      const link = white & ~1, since = links[link + SINCE];
      // The vertex may point along another edge by now.
      if (since < 0 || since + links[link + SLACK] !== queue.key) continue;
      this.#level = queue.key;
      const dart = links[link + DART], y = left[dart], former = parent[y];
      parent[y] = dart;
      if (former >= 0) {
        this.#reroute(white, former);
        continue;
      }
      // The former source: all faces are new, and the rest of the boundary is a path to `white`.
      for (w = links[link + NEXT]; w !== white;) w = this.#leave(w);
      links[link + DART] = links[link + NEXT] = -1;
      links[link + SINCE] = OFF;
      this.#level = this.#raised = 0;
      return;
    }
  }

  /**
   * The edge that `white` points along goes to the tree, that of `former` to the cotree. This closes
   * another cycle, which becomes the boundary.
   */
  #reroute(white: number, former: number): void {
    const links = this.#links;
    const black = this.#ends[2 * former], beyond = this.#ends[2 * former + 1];
    let w = links[(white & ~1) + NEXT];
    // On the way to the boundary, then around it to `white`; the latter part leaves it.
    const joint = this.#turn(black, white, former, beyond);
    let v = beyond;
    while (links[(v & ~1) + SINCE] === OFF) v = this.#enter(v);
    if (links[(v & ~1) + SINCE] === MAYBE) {
      // The ways from both ends meet before the boundary: the new one does not touch it.
      while (w !== joint) w = this.#leave(w);
      for (; w !== v; w = links[(w & ~1) + NEXT]) links[(w & ~1) + SINCE] = OFF;
    } else {
      while (w !== v) w = this.#leave(w);
      w = joint;
    }
    while (w !== black) w = this.#enter(w);
    this.#enter(black);
  }

  /**
   * Turns the path around that leads from a vertex to the end of the cotree, and lets the vertex point
   * along another edge, which crosses a tree arc and has no slack. Edges of the boundary leave it.
   *
   * @param from the vertex
   * @param to the end of the path: a vertex whose own edge is dropped; -1 for one that has none
   * @param dart the other edge
   * @param next its other end
   * @returns the first vertex of the boundary on the path, which counts as on it still; those before
   *   are marked MAYBE. -1 if there is no boundary yet
   */
  #turn(from: number, to: number, dart: number, next: number): number {
    const links = this.#links, level = this.#level;
    let joint = -1, slack = 0, count = 0;
    for (let w = from;; count++) {
      const link = w & ~1;
      const itsDart = links[link + DART], itsNext = links[link + NEXT], since = links[link + SINCE];
      let itsSlack = links[link + SLACK];
      links[link + DART] = dart;
      links[link + NEXT] = next;
      links[link + SLACK] = slack;
      if (since >= 0) {
        itsSlack += (w & 1) !== 0 ? since - level : level - since;
        if (joint < 0) joint = w;
        else links[link + SINCE] = OFF;
      } else if (to >= 0) links[link + SINCE] = MAYBE;
      if (w === to || itsNext < 0) break;
      dart = itsDart;
      next = w;
      slack = itsSlack;
      w = itsNext;
    }
    this.#work += count;
    return joint;
  }

  /** The edge along which w points comes to the boundary. Answers where it leads. */
  #enter(w: number): number {
    const links = this.#links, link = w & ~1, level = this.#level;
    links[link + SINCE] = level;
    this.#work++;
    if ((w & 1) !== 0) {
      const lost = level + links[link + SLACK];
      if (lost <= this.#limit) this.#queue.push(lost, w);
    }
    return links[link + NEXT];
  }

  /** The edge along which w points leaves the boundary. Answers where it leads. */
  #leave(w: number): number {
    const links = this.#links, link = w & ~1, passed = this.#level - links[link + SINCE];
    links[link + SLACK] += (w & 1) !== 0 ? -passed : passed;
    links[link + SINCE] = OFF;
    return links[link + NEXT];
  }
}
