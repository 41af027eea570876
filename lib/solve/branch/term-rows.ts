/**
 * The rows of a relaxation and the terms they are in a proof: cliques x(K) <= 1 and odd cycles
 * x(C) <= (|C| - 1) / 2. The first rows stay; later ones leave when they have been of no use for a
 * while. Choosing a vertex lowers what is left of the right-hand sides of its rows.
 */
import { type Rows, rowsOfSets } from "../../polytope/model.ts";
import type { CaseTree } from "./case-tree.ts";

export class TermRows {
  readonly #tree: CaseTree;
  readonly #fixed: number;
  /** By row: its term in the tree, its vertices, its right-hand side. */
  #terms: number[] = [];
  #sets: (readonly number[])[] = [];
  #rhs: number[] = [];
  /** By row: the right-hand side less the chosen vertices. */
  #left: number[] = [];
  /** By row: for how many solves in a row its multiplier has been zero. */
  #idle: number[] = [];
  /** The rows each vertex is in. */
  readonly #rowsOf: number[][];

  /**
   * @param n number of vertices
   * @param cliques the rows that stay
   * @param tree numbers the terms
   */
  constructor(n: number, cliques: readonly (readonly number[])[], tree: CaseTree) {
    this.#tree = tree;
    this.#rowsOf = Array.from({ length: n }, () => []);
    for (const clique of cliques) this.#append(clique, true, 0);
    this.#fixed = cliques.length;
  }

  get count(): number {
    return this.#sets.length;
  }

  term(row: number): number {
    return this.#terms[row];
  }

  vertices(row: number): readonly number[] {
    return this.#sets[row];
  }

  /** The right-hand side less the chosen vertices in the row. */
  left(row: number): number {
    return this.#left[row];
  }

  /** All rows as the model takes them, from row `first` on. */
  asRows(first = 0): Rows {
    return rowsOfSets(this.#sets.slice(first), this.#rhs.slice(first));
  }

  /**
   * Appends rows.
   *
   * @param isChosen says of a vertex whether it is chosen now
   */
  add(
    cliques: readonly (readonly number[])[],
    oddCycles: readonly (readonly number[])[],
    isChosen: (v: number) => boolean,
  ): void {
    for (const set of cliques) this.#append(set, true, set.filter(isChosen).length);
    for (const set of oddCycles) this.#append(set, false, set.filter(isChosen).length);
  }

  #append(set: readonly number[], isClique: boolean, chosen: number): void {
    const rhs = isClique ? 1 : (set.length - 1) / 2;
    for (const v of set) this.#rowsOf[v].push(this.#sets.length);
    this.#sets.push(set);
    this.#terms.push(isClique ? this.#tree.clique(set) : this.#tree.oddCycle(set));
    this.#rhs.push(rhs);
    this.#left.push(rhs - chosen);
    this.#idle.push(0);
  }

  /** Vertex v is chosen (change -1), or not any more (change 1). */
  shift(v: number, change: 1 | -1): void {
    for (const row of this.#rowsOf[v]) this.#left[row] += change;
  }

  /** Notes whether a row was of use in the last solve. */
  used(row: number, wasOfUse: boolean): void {
    this.#idle[row] = wasOfUse ? 0 : this.#idle[row] + 1;
  }

  /**
   * Takes out the rows that have been idle for more than `patience` solves.
   *
   * @returns length of the old count, 1 for each row taken out, and their entries; undefined if none
   */
  dropIdle(patience: number): { drop: Uint8Array; entries: number } | undefined {
    const drop = new Uint8Array(this.count);
    let entries = 0;
    for (let row = this.#fixed; row < drop.length; row++) {
      if (this.#idle[row] <= patience) continue;
      drop[row] = 1;
      entries += this.#sets[row].length;
    }
    if (entries === 0) return undefined;
    const kept = <T>(list: readonly T[]): T[] => list.filter((_, row) => drop[row] === 0);
    this.#terms = kept(this.#terms);
    this.#sets = kept(this.#sets);
    this.#rhs = kept(this.#rhs);
    this.#left = kept(this.#left);
    this.#idle = kept(this.#idle);
    for (const list of this.#rowsOf) list.length = 0;
    this.#sets.forEach((set, row) => {
      for (const v of set) this.#rowsOf[v].push(row);
    });
    return { drop, entries };
  }
}
