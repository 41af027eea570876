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

/** Each cover vertex and each face has four fields. */
const FIELDS = 4;
/**
 * Of a cover vertex: the dart of the edge it points along, the vertex it points at, the slack of the
 * edge, and the level since when it is on the boundary. A vertex is named by the place of its first
 * field, plus 1 if it is white.
 */
const DART = 0, NEXT = 1, SLACK = 2, SINCE = 3;
/** In SINCE: not on the boundary; perhaps about to be. */
const OFF = -1, MAYBE = -2;
/**
 * Of a face: the dart whose arc enters it in the tree, -1 at the source; the face where that comes from;
 * the black and the white end of the edge it crosses.
 */
const ENTRY = 0, ABOVE = 1, BLACK = 2, WHITE = 3;

export class MovingSource {
  /** Length 8·pairs: the fields of face x from FIELDS·x on. */
  readonly #faces: Int32Array;
  /** Length 8n: the fields of cover vertices. */
  readonly #links: Int32Array | Float64Array;
  /** As in `DirectedDual`. */
  readonly #sides: Int32Array;
  readonly #queue: MonotoneQueue;
  /** While the source moves: the level, the largest one possible, and how far the new source was. */
  #level = 0;
  #limit = 0;
  #raised = 0;
  #source: number;
  #work = 0;

  /**
   * @param costs as for `shortestPaths`
   * @param paths shortest paths from the first source
   * @param range no less than what going there and back costs in all moves together
   * @param meter counts one unit for each arc, and in moving about one for each edge that comes to the
   *   boundary or leaves it
   * @param unitsPerTick units counted between two ticks of it
   * @throws {Interrupted} when the meter runs out
   */
  constructor(
    graph: Graph,
    { pairs, sides }: DirectedDual,
    readonly costs: Int32Array | Float64Array,
    paths: ShortestPaths,
    source: number,
    range: number,
    readonly meter: Meter,
    readonly unitsPerTick = 4096,
  ) {
    const { n, m, tails, heads } = graph, { tree, furthest } = paths;
    this.#source = source;
    this.#queue = range <= Math.max(1 << 16, pairs) ? new BucketQueue(range) : new HeapQueue();
    this.#sides = sides;
    const crossed = new Uint8Array(2 * m);
    for (let x = 0; x < 2 * pairs; x++) if (x !== source) crossed[tree[2 * x + 1]] = 1;
    const { places, next, darts } = cotreeOf(graph, crossed, meter);

    meter.tick(2 * pairs);
    const faces = this.#faces = new Int32Array(2 * pairs * FIELDS);
    for (let x = 0; x < 2 * pairs; x++) {
      const face = FIELDS * x, d = faces[face + ENTRY] = tree[2 * x + 1];
      if (d < 0) continue;
      const ends = (d & 1) === 0 ? tails : heads, others = (d & 1) === 0 ? heads : tails;
      faces[face + ABOVE] = sides[2 * d + 1];
      faces[face + BLACK] = FIELDS * places[2 * ends[d >> 1]];
      faces[face + WHITE] = FIELDS * places[2 * others[d >> 1] + 1] + 1;
    }
    meter.tick(2 * n);
    let dearest = 0;
    for (let e = 0; e < m; e++) if (costs[e] > dearest) dearest = costs[e];
    // A slack is at most a cost and a distance, and grows by no more than the moves.
    const narrow = dearest + furthest + range < 2 ** 31;
    const links = narrow ? new Int32Array(2 * n * FIELDS) : new Float64Array(2 * n * FIELDS);
    for (let place = 0; place < 2 * n; place++) {
      const link = FIELDS * place, d = darts[place];
      links[link + DART] = d;
      links[link + NEXT] = d < 0 ? -1 : FIELDS * places[next[place]] + (next[place] & 1);
      links[link + SINCE] = OFF;
      if (d < 0) continue;
      links[link + SLACK] = costs[d >> 1] + tree[2 * sides[2 * d + 1]] - tree[2 * sides[2 * d]];
    }
    this.#links = links;
  }

  /** The distance from the source to a face. O(length of the path) time. */
  distance(x: number): number {
    const faces = this.#faces, costs = this.costs;
    let sum = 0, face = FIELDS * x;
    for (let d = faces[face + ENTRY]; d >= 0; d = faces[face + ENTRY]) {
      sum += costs[d >> 1];
      face = FIELDS * faces[face + ABOVE];
    }
    // While the source moves, the faces still below the former one rise with the level.
    return sum + (face === FIELDS * this.#source ? this.#raised : this.#level);
  }

  /** A lower bound for the distance between x and its antipode, which is the same both ways. */
  bound(x: number): number {
    return Math.abs(this.distance(x) - this.distance(x ^ 1));
  }

  /** The edges of H crossed on a shortest path from the source to a face. */
  path(x: number): number[] {
    const faces = this.#faces, crossed: number[] = [];
    for (let d = faces[FIELDS * x + ENTRY]; d >= 0; d = faces[FIELDS * x + ENTRY]) {
      crossed.push(d >> 1);
      x = faces[FIELDS * x + ABOVE];
    }
    return crossed;
  }

  /**
   * Moves the source.
   *
   * @param to a face
   * @param back no less than the distance from there to the source
   * @throws {Interrupted} when the meter runs out; `bound` still holds then, but moving is over
   */
  move(to: number, back: number): void {
    const faces = this.#faces, links = this.#links, sides = this.#sides, queue = this.#queue;
    if (to === this.#source) return;
    this.#raised = this.distance(to);
    this.#limit = this.#raised + back;
    this.#source = to;
    queue.clear();
    // The new faces are on the left of the edge of the arc cut if that is walked from its black end.
    const cut = FIELDS * to, start = faces[cut + BLACK];
    this.#turn(start, -1, faces[cut + ENTRY], faces[cut + WHITE]);
    faces[cut + ENTRY] = -1;
    let w = start;
    do w = this.#enter(w); while (w !== start);
    for (;;) {
      if (this.#work >= this.unitsPerTick) {
        const work = this.#work;
        this.#work = 0;
        this.meter.tick(work);
      }
      const white = queue.pop();
      if (white < 0) throw new Error("internal: moving the source passes its limit");
      const link = white & ~1, since = links[link + SINCE];
      // The vertex may point along another edge by now.
      if (since < 0 || since + links[link + SLACK] !== queue.key) continue;
      this.#level = queue.key;
      const dart = links[link + DART], ahead = links[link + NEXT];
      const face = FIELDS * sides[2 * dart];
      const former = faces[face + ENTRY], black = faces[face + BLACK], beyond = faces[face + WHITE];
      faces[face + ENTRY] = dart;
      faces[face + ABOVE] = sides[2 * dart + 1];
      faces[face + BLACK] = ahead;
      faces[face + WHITE] = white;
      if (former >= 0) {
        this.#reroute(white, ahead, former, black, beyond);
        continue;
      }
      // The former source: all faces are new, and the rest of the boundary is a path to `white`.
      for (w = ahead; w !== white;) w = this.#leave(w);
      links[link + DART] = links[link + NEXT] = -1;
      links[link + SINCE] = OFF;
      this.#level = this.#raised = 0;
      return;
    }
  }

  /**
   * The edge along which `white` points to `ahead` goes to the tree, and that of the dart `former`, from
   * `black` to `beyond`, to the cotree. This closes another cycle, which becomes the boundary.
   */
  #reroute(white: number, ahead: number, former: number, black: number, beyond: number): void {
    const links = this.#links;
    // On the way to the boundary, then around it to `white`; the latter part leaves it.
    const joint = this.#turn(black, white, former, beyond);
    let w = ahead, v = beyond;
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
