/**
 * Good stable sets quickly, without a proof: iterated local search with two moves, an insertion that
 * outweighs the chosen neighbours it drives out, and the exchange of one chosen vertex for two. The
 * neighbourhood and the perturbation follow Andrade, Resende and Werneck, "Fast local search for the
 * maximum independent set problem" (J. Heuristics 18, 2012), and its weighted form by Nogueira,
 * Pinheiro and Subramanian (Optimization Letters 12, 2018); both written from memory.
 *
 * Deterministic: the path depends on the seed and on the work allowed, never on the clock, unless
 * the meter's own limit ends the search.
 */
import type { Graph } from "../graph/graph.ts";
import { Interrupted, type Meter } from "../run/meter.ts";
import { Random } from "../run/random.ts";

/** A stable set with its exact weight. */
export interface Incumbent {
  /** Length n, entries 0 and 1. */
  readonly chosen: Uint8Array;
  readonly weight: number;
}

/**
 * Searches for a heavy stable set.
 *
 * @param graph any graph
 * @param weights length n, positive integers with a sum below 2^53
 * @param meter seed and limits of the run; an interruption ends the search, it is not passed on
 * @param work units of work to spend, about one for each arc scanned
 * @param start where to begin, if not with the greedy set; length n, stable
 * @param variant another path through the same search for each number
 * @returns the heaviest set met; a maximal stable set, except when interrupted at once
 */
export function localSearch(
  graph: Graph,
  weights: Float64Array,
  meter: Meter,
  work: number,
  start?: Uint8Array,
  variant = 0,
): Incumbent {
  const search = new Search(graph, weights);
  try {
    search.run(meter, work, start, variant);
  } catch (error) {
    if (!(error instanceof Interrupted)) throw error;
  }
  return search.best();
}

class Search {
  readonly #graph: Graph;
  readonly #weights: Float64Array;
  /** Length n: 1 where chosen. */
  readonly #chosen: Uint8Array;
  /** Length n: weight and number of the chosen neighbours. */
  readonly #pressure: Float64Array;
  readonly #tight: Int32Array;
  /** Vertices to look at again; `#queued` says which are listed. */
  readonly #queue: Int32Array;
  readonly #queued: Uint8Array;
  #queueLength = 0;
  /** Length n, a stamp for marking neighbours. */
  readonly #mark: Int32Array;
  #stamp = 0;
  /** Length n: the round in which a vertex was last taken out. */
  readonly #leftAt: Int32Array;
  /** Vertices flipped since the last accepted set, in order. */
  #journal: number[] = [];
  #weight = 0;
  #bestWeight = 0;
  /** The vertices by which the current set differs from the best are not tracked: a copy is kept. */
  readonly #bestChosen: Uint8Array;
  #spent = 0;

  constructor(graph: Graph, weights: Float64Array) {
    const { n } = graph;
    this.#graph = graph;
    this.#weights = weights;
    this.#chosen = new Uint8Array(n);
    this.#pressure = new Float64Array(n);
    this.#tight = new Int32Array(n);
    this.#queue = new Int32Array(n);
    this.#queued = new Uint8Array(n);
    this.#mark = new Int32Array(n);
    this.#leftAt = new Int32Array(n);
    this.#bestChosen = new Uint8Array(n);
  }

  best(): Incumbent {
    if (this.#weight > this.#bestWeight) this.#keep();
    return { chosen: this.#bestChosen, weight: this.#bestWeight };
  }

  run(meter: Meter, work: number, start: Uint8Array | undefined, variant: number): void {
    const { n } = this.#graph;
    if (n === 0) return;
    // A scattered arc costs about three arcs scanned in a row.
    const tick = (): void => {
      meter.tick(3 * this.#spent);
      work -= 3 * this.#spent;
      this.#spent = 0;
    };
    for (const v of start === undefined ? greedyOrder(this.#graph, this.#weights) : rangeOf(n)) {
      if (this.#tight[v] === 0 && (start === undefined || start[v] !== 0)) this.#insert(v);
    }
    for (let v = 0; v < n; v++) this.#enqueue(v);
    this.#improve(tick);
    this.#keep();
    this.#journal.length = 0;

    const random = new Random((meter.seed ^ 0x51ab) + 0x9e37 * variant);
    let stale = 0;
    for (let round = 1; work > 0; round++) {
      const before = this.#weight;
      // Perturbation: mostly one vertex forced in, now and then a few; of four drawn, the one that
      // has been out longest.
      const forced = random.below(2 * n) === 0 ? 2 + random.below(3) : 1;
      for (let k = 0; k < forced; k++) {
        let pick = -1;
        for (let draw = 0; draw < 4; draw++) {
          const v = random.below(n);
          if (this.#chosen[v] !== 0) continue;
          if (pick < 0 || this.#leftAt[v] < this.#leftAt[pick]) pick = v;
        }
        if (pick >= 0) this.#force(pick, round);
      }
      this.#improve(tick, round);
      this.#spent += 8;
      tick();
      if (this.#weight > this.#bestWeight) {
        this.#keep();
        stale = 0;
      } else stale++;
      // Acceptance: never mind a small loss once in a while, else go back.
      if (this.#weight < before) {
        const loss = (before - this.#weight) * Math.max(1, this.#bestWeight - this.#weight);
        const patience = 1 + loss / Math.max(1, before / n) ** 2;
        if (random.unit() * patience >= 1 / (1 + n / 64)) this.#rollBack();
      }
      if (stale > 40 * n + 4000) {
        stale = 0;
        this.#restore();
      }
      this.#journal.length = 0;
    }
  }

  #keep(): void {
    this.#bestChosen.set(this.#chosen);
    this.#bestWeight = this.#weight;
    this.#spent += this.#chosen.length >> 3;
  }

  /** Goes back to the best set. */
  #restore(): void {
    for (let v = 0; v < this.#chosen.length; v++) {
      if (this.#chosen[v] !== 0 && this.#bestChosen[v] === 0) this.#flip(v);
    }
    for (let v = 0; v < this.#chosen.length; v++) {
      if (this.#chosen[v] === 0 && this.#bestChosen[v] !== 0) this.#flip(v);
    }
  }

  #rollBack(): void {
    for (let i = this.#journal.length - 1; i >= 0; i--) this.#flip(this.#journal[i]);
  }

  #flip(v: number): void {
    const { offsets, targets } = this.#graph;
    const sign = this.#chosen[v] !== 0 ? -1 : 1;
    this.#chosen[v] ^= 1;
    const w = sign * this.#weights[v];
    this.#weight += w;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      this.#pressure[targets[a]] += w;
      this.#tight[targets[a]] += sign;
    }
    this.#spent += offsets[v + 1] - offsets[v] + 1;
  }

  #insert(v: number): void {
    this.#flip(v);
    this.#journal.push(v);
  }

  #remove(v: number, round: number): void {
    this.#flip(v);
    this.#journal.push(v);
    this.#leftAt[v] = round;
    this.#enqueue(v);
  }

  /** Chooses v and takes its chosen neighbours out. */
  #force(v: number, round: number): void {
    const { offsets, targets } = this.#graph;
    for (let a = offsets[v]; this.#tight[v] > 0 && a < offsets[v + 1]; a++) {
      const u = targets[a];
      if (this.#chosen[u] === 0) continue;
      this.#remove(u, round);
      for (let b = offsets[u]; b < offsets[u + 1]; b++) this.#enqueue(targets[b]);
    }
    this.#insert(v);
    this.#enqueue(v);
    this.#spent += offsets[v + 1] - offsets[v];
  }

  #enqueue(v: number): void {
    if (this.#queued[v] !== 0) return;
    this.#queued[v] = 1;
    this.#queue[this.#queueLength++] = v;
  }

  /** Moves while one of the two moves gains, looking only at vertices whose surroundings changed. */
  #improve(tick: () => void, round = 0): void {
    while (this.#queueLength > 0) {
      const v = this.#queue[--this.#queueLength];
      this.#queued[v] = 0;
      if (this.#chosen[v] === 0) {
        if (this.#weights[v] > this.#pressure[v]) this.#force(v, round);
        else if (this.#tight[v] === 1) this.#enqueue(this.#chosenNeighbour(v));
      } else this.#exchange(v, round);
      if (this.#spent > 4096) tick();
    }
  }

  #chosenNeighbour(v: number): number {
    const { offsets, targets } = this.#graph;
    let a = offsets[v];
    while (this.#chosen[targets[a]] === 0) a++;
    this.#spent += a - offsets[v] + 1;
    return targets[a];
  }

  /** One chosen vertex out, two of the vertices that only it keeps out in, if that gains. */
  #exchange(v: number, round: number): void {
    const { offsets, targets } = this.#graph;
    const free: number[] = [];
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (this.#tight[targets[a]] === 1) free.push(targets[a]);
    }
    this.#spent += offsets[v + 1] - offsets[v] + 1;
    if (free.length < 2) return;
    for (const u of free) {
      this.#stamp++;
      this.#mark[u] = this.#stamp;
      for (let a = offsets[u]; a < offsets[u + 1]; a++) this.#mark[targets[a]] = this.#stamp;
      this.#spent += offsets[u + 1] - offsets[u] + free.length;
      let mate = -1;
      for (const t of free) {
        if (this.#mark[t] === this.#stamp) continue;
        if (mate < 0 || this.#weights[t] > this.#weights[mate]) mate = t;
      }
      if (mate < 0 || this.#weights[u] + this.#weights[mate] <= this.#weights[v]) continue;
      this.#remove(v, round);
      for (let a = offsets[v]; a < offsets[v + 1]; a++) this.#enqueue(targets[a]);
      this.#insert(u);
      this.#insert(mate);
      this.#enqueue(u);
      this.#enqueue(mate);
      return;
    }
  }
}

/** Vertices by weight over degree plus one, best first; ties by number. */
function greedyOrder(graph: Graph, weights: Float64Array): Int32Array {
  const { n, offsets } = graph;
  const value = Float64Array.from(
    { length: n },
    (_, v) => weights[v] / (offsets[v + 1] - offsets[v] + 1),
  );
  return rangeOf(n).sort((a, b) => value[b] - value[a] || a - b);
}

function rangeOf(n: number): Int32Array {
  return Int32Array.from({ length: n }, (_, v) => v);
}
