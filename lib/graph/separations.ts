/**
 * The bipartite sides of a graph, and its core.
 *
 * A *side* is a connected set of vertices with at most three neighbours outside, its attachments,
 * such that both together, but without the edges between attachments, are bipartite. Where a graph
 * has no two disjoint odd cycles and no odd cycle transversal of three vertices, each set of at most
 * three vertices leaves exactly one component that is not bipartite, the *big side*, and all others
 * are sides; but sides are found in every graph.
 *
 * The core is grown from vertices that lie in no side: a vertex with four paths to the core, disjoint
 * except at their start, lies in no side either, and next to the core such paths are short. So almost
 * all tests are local; in practice the time is near-linear. Sides no larger than a star are of no use
 * to a reduction and are kept apart; their middle counts as core.
 */
import type { Meter } from "../run/meter.ts";
import { Random } from "../run/random.ts";
import { degree, type Graph } from "./graph.ts";
import { type CoverSide, SideSearch } from "./separations-search.ts";

/** A side with its two colour classes. */
export interface Side {
  readonly inside: Int32Array;
  /** Entries 0 and 1, in the order of `inside`. */
  readonly insideSide: Uint8Array;
  /** The neighbours outside, at most three, increasing. */
  readonly attachments: Int32Array;
  /** Entries 0 and 1, in the order of `attachments`; joined vertices have different entries. */
  readonly attachmentSide: Uint8Array;
}

/** Bipartite sides of a graph, or the reason why there is no big side. */
export interface Separations {
  /**
   * Sides that cannot be grown by an attachment, disjoint and without attachments inside another
   * one. A bipartite component is a side without attachments.
   */
  readonly sides: readonly Side[];
  /** Sides with three attachments that are no larger than a star; they may overlap each other. */
  readonly small: readonly Side[];
  /** Length n: 1 for vertices in none of `sides`. */
  readonly core: Uint8Array;
  /** Length n: 1 for vertices proved to lie in no side at all. */
  readonly proven: Uint8Array;
  /** How many sides were left out because they cross one in `sides`. */
  readonly crossing: number;
  /**
   * How often a search ended at a bipartite set that an attachment meets on both sides; 0 in graphs
   * without two disjoint odd cycles whose odd cycle transversals have at least four vertices.
   */
  readonly twisted: number;
  /** False when the work allowed ran out before everything was looked at. */
  readonly complete: boolean;
}

/** Most vertices of a star that stands for a side: a centre and three legs of one or two. */
const STAR = [4, 5];

/**
 * Units of work allowed for each vertex and edge. Grids with thousands of sides take about 100, random
 * cubic graphs 200.
 */
const WORK_PER_ELEMENT = 500;
/**
 * Work for one search at first, beside the credit; what takes more waits until the core has been
 * found elsewhere.
 */
const FIRST_LIMIT = 400;
/** Credit for each vertex and edge to begin with: while the core is small it is far from others. */
const FIRST_CREDIT = 50;
/** Credit that each vertex looked at adds. */
const MORE_CREDIT = 100;
/** So many core vertices are found whatever the credit. */
const SEEDS = 32;
/** Share of all work that may go into the seeds. */
const SEED_SHARE = 0.4;
/** Work for growing a side, later; at first an eighth of all that is left. */
const GROWING_LIMIT = 50_000;

/** What `separations` may be told. */
export interface SeparationsOptions {
  /** Length n: 0 for vertices that no side may have as attachments (default: all may). */
  readonly mayAttach?: Uint8Array;
  /** Length n: 1 for vertices known to lie in no side (default: none are known). */
  readonly known?: Uint8Array;
}

/**
 * Finds sides as large as they come, and the core.
 *
 * @param graph any simple graph
 * @param options what is known and what is not wanted
 * @returns disjoint sides, the core, and what was left out. Every side found is one whatever the
 *   graph is like; that no larger ones are missed is proved for graphs without twisted sets.
 *   Near-linear in practice; stops with complete = false after 500·(n + m) units of work.
 * @throws {Interrupted} when the meter runs out
 */
export function separations(
  graph: Graph,
  meter: Meter,
  options: SeparationsOptions = {},
): Separations {
  return new Growing(graph, meter, options).run();
}

class Growing {
  readonly #graph: Graph;
  readonly #search: SideSearch;
  #workLeft: number;
  readonly #sides: Side[] = [];
  readonly #small: Side[] = [];
  /** Length n: 1 inside a side, 2 attachment of a side (and outside all), 4 inside one left out. */
  readonly #role: Uint8Array;
  readonly #queued: Uint8Array;
  readonly #proven: Uint8Array;
  #coreCount = 0;
  #crossing = 0;
  #twisted = 0;
  /** Whether the core holds vertices that may lie in a side larger than a star. */
  #guessed = false;
  #complete = true;

  constructor(graph: Graph, meter: Meter, { mayAttach, known }: SeparationsOptions) {
    this.#graph = graph;
    this.#workLeft = WORK_PER_ELEMENT * (graph.n + graph.m);
    this.#search = new SideSearch(graph, (units) => {
      this.#workLeft -= units;
      meter.tick(units);
    }, mayAttach);
    if (known !== undefined) {
      this.#search.core.set(known);
      for (const isKnown of known) this.#coreCount += isKnown;
    }
    this.#proven = this.#search.core.slice();
    this.#role = new Uint8Array(graph.n);
    this.#queued = new Uint8Array(graph.n);
  }

  run(): Separations {
    const { n, offsets, targets } = this.#graph;
    const queue = new Int32Array(n);
    const later: number[] = [];
    let credit = FIRST_CREDIT * (n + this.#graph.m);
    const leftAfterSeeds = (1 - SEED_SHARE) * this.#workLeft;
    // Roots of large degree first: they are likely to be core, and the rest is then near to it.
    for (const root of byDegree(this.#graph)) {
      if (this.#queued[root] !== 0) continue;
      let tail = 0;
      queue[tail++] = root;
      this.#queued[root] = 1;
      for (let head = 0; head < tail; head++) {
        const v = queue[head];
        const before = this.#workLeft;
        const isSeed = this.#coreCount < SEEDS && this.#workLeft > leftAfterSeeds;
        const more = Math.max(isSeed ? this.#workLeft / 8 : 0, credit);
        if (!this.#settle(v, FIRST_LIMIT + more, 4 * FIRST_LIMIT + more)) later.push(v);
        if (!isSeed) credit += MORE_CREDIT - (before - this.#workLeft);
        for (let a = offsets[v]; a < offsets[v + 1]; a++) {
          const u = targets[a];
          if (this.#queued[u] !== 0) continue;
          this.#queued[u] = 1;
          queue[tail++] = u;
        }
      }
    }
    // What was too dear: in random order, so that core vertices are soon spread everywhere.
    new Random(n).shuffle(later);
    for (const v of later) this.#settle(v, Infinity, Math.max(GROWING_LIMIT, this.#workLeft / 8));
    return {
      sides: this.#sides,
      small: this.#small,
      core: Uint8Array.from(this.#role, (role) => role === 1 ? 0 : 1),
      proven: this.#proven,
      crossing: this.#crossing,
      twisted: this.#twisted,
      complete: this.#complete,
    };
  }

  /**
   * Decides what v is. Inner vertices of chains are passed over: they come with their side.
   *
   * @returns false when v took too much work and may be tried with a larger limit
   */
  #settle(v: number, limit: number, growing: number): boolean {
    const { core } = this.#search;
    const role = this.#role;
    if (role[v] === 1 || role[v] === 4 || core[v] !== 0 || degree(this.#graph, v) === 2) {
      return true;
    }
    if (this.#workLeft <= 0) {
      this.#complete = false;
      return true;
    }
    const found = this.#hasFourCoreNeighbours(v) ? "core" : this.#search.around(v, limit, growing);
    if (found === "dear" || (typeof found !== "string" && found.short && limit < Infinity)) {
      return false;
    }
    if (typeof found === "string") {
      core[v] = 1;
      this.#coreCount++;
      this.#guessed ||= found === "barred";
      if (found === "core" && !this.#guessed) this.#proven[v] = 1;
      if (found === "twisted") this.#makeRoom(v);
      return true;
    }
    if (found.twisted) this.#twisted++;
    if (found.short) this.#complete = false;
    const side = asSide(found);
    if (this.#isSmall(side)) {
      this.#small.push(side);
      this.#guessed ||= found.short;
      core[v] = 1;
      this.#coreCount++;
      return true;
    }
    const crosses = side.inside.some((u) => role[u] === 1 || role[u] === 2) ||
      side.attachments.some((u) => role[u] === 1);
    if (crosses) {
      this.#crossing++;
      for (const u of side.inside) if (role[u] === 0) role[u] = 4;
      return true;
    }
    this.#sides.push(side);
    for (const u of side.inside) role[u] = 1;
    for (const u of side.attachments) role[u] = 2;
    return true;
  }

  /** Room for the sides within a twisted set: v and its neighbours stand in for a core. */
  #makeRoom(v: number): void {
    this.#guessed = true;
    this.#twisted++;
    const { offsets, targets } = this.#graph;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (this.#role[u] !== 1 && degree(this.#graph, u) > 2) this.#search.core[u] = 1;
    }
  }

  #hasFourCoreNeighbours(v: number): boolean {
    const { offsets, targets } = this.#graph;
    let count = 0;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (this.#search.core[targets[a]] !== 0 && ++count === 4) return true;
    }
    return false;
  }

  #isSmall({ inside, attachments, attachmentSide: side }: Side): boolean {
    if (attachments.length < 3) return false;
    if (inside.length > (side[0] === side[1] && side[1] === side[2] ? STAR[0] : STAR[1])) {
      return false;
    }
    let branching = 0;
    for (const v of inside) if (degree(this.#graph, v) >= 3) branching++;
    return branching < 2;
  }
}

/** Vertices by degree, largest first, by counting. */
function byDegree(graph: Graph): Int32Array {
  const { n } = graph;
  let most = 0;
  for (let v = 0; v < n; v++) most = Math.max(most, degree(graph, v));
  const start = new Int32Array(most + 2);
  for (let v = 0; v < n; v++) start[most - degree(graph, v) + 1]++;
  for (let d = 0; d <= most; d++) start[d + 1] += start[d];
  const order = new Int32Array(n);
  for (let v = 0; v < n; v++) order[start[most - degree(graph, v)]++] = v;
  return order;
}

/** The vertices and sheets of nodes of the cover. */
function asSide({ inside, attachments }: CoverSide): Side {
  const sorted = [...attachments].sort((x, y) => x - y);
  return {
    inside: Int32Array.from(inside, (x) => x >> 1),
    insideSide: Uint8Array.from(inside, (x) => x & 1),
    attachments: Int32Array.from(sorted, (x) => x >> 1),
    attachmentSide: Uint8Array.from(sorted, (x) => x & 1),
  };
}
