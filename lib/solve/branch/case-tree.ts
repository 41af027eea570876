/**
 * Collects a proof by cases while a search runs: the terms used, each stored once, and the tree of
 * nodes with the multipliers wanted at each. Flattening into a `CasesProof` writes only the
 * multipliers that differ from those inherited; O(size of the tree) time and no recursion.
 */
import type { CaseNode, CasesProof } from "../../certify/certificate.ts";
import type { Meter } from "../../run/meter.ts";
import { SequenceTable } from "./sequence-table.ts";

/** A node of the tree. A search fills in the children as it goes. */
export interface Case {
  /**
   * Pairs (term, multiplier times the denominator), all that are not zero; where it is absent the
   * multipliers inherited from above hold.
   */
  terms?: ArrayLike<number>;
  /** The vertex branched on; `chosen` and `left` are set with it. */
  on?: number;
  chosen?: Case;
  left?: Case;
}

export class CaseTree {
  readonly #cliques = new SequenceTable();
  readonly #oddCycles = new SequenceTable();

  /** Number of terms so far. */
  get termCount(): number {
    return this.#cliques.count + this.#oddCycles.count;
  }

  /**
   * Numbers a clique; the same sequence of vertices gets the same number.
   *
   * @param vertices its first `size` entries are pairwise adjacent
   * @returns a term for `Case.terms`, even
   */
  clique(vertices: ArrayLike<number>, size: number = vertices.length): number {
    return 2 * this.#cliques.number(vertices, size);
  }

  /**
   * Numbers an odd cycle.
   *
   * @param vertices consecutive ones adjacent, also last and first; each once
   * @returns a term for `Case.terms`, odd
   */
  oddCycle(vertices: ArrayLike<number>): number {
    return 2 * this.#oddCycles.number(vertices) + 1;
  }

  /**
   * Writes the tree as a certificate's proof. Terms that no node uses are left out.
   *
   * @param root every inner node complete
   * @param denominator what the multipliers are multiples of the inverse of
   * @param labels length n: the number each vertex carries in the certificate
   * @param meter counts the numbers written
   * @throws {Interrupted} when the meter runs out
   */
  toProof(root: Case, denominator: number, labels: Int32Array, meter?: Meter): CasesProof {
    // Which terms occur, and their final numbers: cliques first, then odd cycles. What divides all
    // multipliers and the denominator is taken out.
    let divisor = denominator;
    const usedCliques = new Uint8Array(this.#cliques.count);
    const usedCycles = new Uint8Array(this.#oddCycles.count);
    const stack: Case[] = [root];
    while (stack.length > 0) {
      const node = stack.pop()!;
      const terms = node.terms;
      for (let i = 0; terms !== undefined && i < terms.length; i += 2) {
        if (terms[i] % 2 === 0) usedCliques[terms[i] / 2] = 1;
        else usedCycles[(terms[i] - 1) / 2] = 1;
        if (divisor > 1) divisor = greatestCommonDivisor(divisor, terms[i + 1]);
      }
      if (node.on !== undefined) stack.push(node.left!, node.chosen!);
    }
    const number = new Int32Array(2 * Math.max(usedCliques.length, usedCycles.length) + 2);
    const cliques: number[][] = [], oddCycles: number[][] = [];
    const labelled = (list: Int32Array): number[] => Array.from(list, (v) => labels[v]);
    usedCliques.forEach((used, i) => {
      if (used === 0) return;
      number[2 * i] = cliques.length;
      cliques.push(labelled(this.#cliques.at(i)));
    });
    usedCycles.forEach((used, i) => {
      if (used === 0) return;
      number[2 * i + 1] = cliques.length + oddCycles.length;
      oddCycles.push(labelled(this.#oddCycles.at(i)));
    });

    // Preorder, with the multipliers in force kept in `now` and undone on the way back.
    const now = new Float64Array(cliques.length + oddCycles.length);
    let active: number[] = [];
    const nodes: CaseNode[] = [];
    const wanted = new Float64Array(now.length), stamp = new Int32Array(now.length);
    let round = 0;
    const path: { node: Case; undo: number[]; before: number[] }[] = [];
    let next: Case | undefined = root;
    while (next !== undefined) {
      const node: Case = next;
      const undo: number[] = [], before = active;
      const set: number[] = [];
      if (node.terms !== undefined) {
        round++;
        const terms = node.terms;
        const after: number[] = [];
        for (let i = 0; i < terms.length; i += 2) {
          if (terms[i + 1] === 0) continue;
          const t = number[terms[i]];
          wanted[t] = terms[i + 1] / divisor;
          stamp[t] = round;
          after.push(t);
        }
        for (const t of active) {
          if (stamp[t] === round) continue;
          undo.push(t, now[t]);
          set.push(t, 0);
          now[t] = 0;
        }
        for (const t of after) {
          if (now[t] === wanted[t]) continue;
          undo.push(t, now[t]);
          set.push(t, wanted[t]);
          now[t] = wanted[t];
        }
        active = after;
      }
      nodes.push({
        ...(set.length > 0 ? { set } : {}),
        ...(node.on !== undefined ? { on: labels[node.on] } : {}),
      });
      path.push({ node, undo, before });
      meter?.tick(16 + 16 * set.length);
      if (node.on !== undefined) {
        next = node.chosen!;
        continue;
      }
      // Back up to the nearest node whose second child has not been written.
      next = undefined;
      let child: Case | undefined;
      while (path.length > 0 && next === undefined) {
        const top: { node: Case; undo: number[]; before: number[] } = path[path.length - 1];
        if (child !== undefined && top.node.chosen === child) {
          next = top.node.left!;
          break;
        }
        for (let i = top.undo.length - 2; i >= 0; i -= 2) now[top.undo[i]] = top.undo[i + 1];
        active = top.before;
        child = top.node;
        path.pop();
      }
    }
    return { rule: "cases", denominator: denominator / divisor, cliques, oddCycles, nodes };
  }
}

function greatestCommonDivisor(a: number, b: number): number {
  while (b !== 0) [a, b] = [b, a % b];
  return a;
}

/** Number of nodes and of multipliers written, for the reader of a result. */
export function proofSize(proof: CasesProof): { nodes: number; numbers: number } {
  let numbers = 0;
  for (const term of proof.cliques) numbers += term.length;
  for (const term of proof.oddCycles) numbers += term.length;
  for (const node of proof.nodes) numbers += 1 + (node.set?.length ?? 0);
  return { nodes: proof.nodes.length, numbers };
}
