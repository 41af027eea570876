/**
 * Checks a tree of cases. The tree is walked once, in preorder and without recursion; vertices that
 * leave and multipliers that change are logged and put back on the way up, so the cost is the size of
 * the proof plus, for each vertex branched on, its degree and the terms with it, the length of each
 * term whose multiplier changes, and a look-up for each two vertices of a clique.
 */
import type { CaseNode, CasesProof, Numbers } from "./certificate.ts";
import { type Play, requireEdge, requireMultiplier, requireVertex } from "./play.ts";
import { Rejected } from "./rejected.ts";
import { SlackLedger } from "./slack-ledger.ts";

/** A node whose children are being walked. */
interface Frame {
  readonly node: CaseNode;
  readonly index: number;
  /** Children begun so far. */
  child: number;
  /** Largest bound (branch) or sum of bounds (split) of the finished children. */
  bound: bigint;
  /** Lengths of the two logs to return to after each child, and after the node. */
  readonly leaversAtChild: number;
  readonly changesAtChild: number;
  readonly changesAtNode: number;
}

/**
 * The bound a tree of cases proves.
 *
 * @param play the graph and the vertices in play
 * @param proof terms and nodes in preorder
 * @returns the bound at the root, in scaled units
 * @throws {Rejected} naming the first node or term that is wrong
 */
export function casesBound(play: Play, proof: CasesProof): bigint {
  return new CaseWalk(play, proof).bound();
}

class CaseWalk {
  readonly #play: Play;
  readonly #nodes: readonly CaseNode[];
  readonly #terms: readonly Numbers[];
  /** Right-hand side of each term, less the vertices in it that have been chosen above. */
  readonly #rhs: Float64Array;
  /** The terms that have a vertex. */
  readonly #termsOf = new Map<number, number[]>();
  readonly #multiplier: Float64Array;
  readonly #ledger: SlackLedger;
  /** Log of vertices that left (v) or came back (-1 - v), to be undone in reverse. */
  readonly #leavers: number[] = [];
  /** Log of pairs (term, multiplier before). */
  readonly #changes: number[] = [];
  /** Where in `#changes` the innermost split began: below it, multipliers started at zero. */
  readonly #splitStarts: number[] = [0];
  #at = 0;

  constructor(play: Play, proof: CasesProof) {
    this.#play = play;
    this.#nodes = proof.nodes;
    requireTerms(play, proof);
    this.#terms = [...proof.cliques, ...proof.oddCycles];
    this.#rhs = new Float64Array(this.#terms.length).fill(1);
    for (let t = proof.cliques.length; t < this.#terms.length; t++) {
      this.#rhs[t] = (this.#terms[t].length - 1) / 2;
    }
    this.#multiplier = new Float64Array(this.#terms.length);
    this.#terms.forEach((term, t) => {
      for (let i = 0; i < term.length; i++) {
        const known = this.#termsOf.get(term[i]);
        if (known === undefined) this.#termsOf.set(term[i], [t]);
        else known.push(t);
      }
    });
    this.#ledger = new SlackLedger(play, proof.denominator ?? 2);
  }

  bound(): bigint {
    const stack: Frame[] = [];
    let result = this.#enter(stack);
    while (stack.length > 0) {
      const frame = stack[stack.length - 1];
      if (result !== undefined) {
        this.#childDone(frame, result);
        this.#undoChild(frame);
      }
      if (frame.child < childCount(frame.node)) {
        this.#beginChild(frame);
        frame.child++;
        result = this.#enter(stack);
      } else {
        if (frame.node.split !== undefined) this.#restoreSplit(frame);
        this.#undoChanges(frame.changesAtNode);
        stack.pop();
        result = frame.bound;
      }
    }
    if (this.#at !== this.#nodes.length) {
      throw new Rejected(
        `case tree: ${this.#nodes.length - this.#at} nodes left over after the root was closed`,
      );
    }
    this.#ledger.release();
    return result as bigint;
  }

  /** Takes the next node; returns its bound if it is a leaf, else pushes a frame. */
  #enter(stack: Frame[]): bigint | undefined {
    const index = this.#at++;
    if (index >= this.#nodes.length) {
      throw new Rejected(`case tree: a case is missing, the tree ends after node ${index - 1}`);
    }
    const node = this.#nodes[index];
    const changesAtNode = this.#changes.length;
    this.#setMultipliers(node, index);
    if (node.on === undefined && node.split === undefined) {
      const bound = this.#ledger.bound;
      this.#undoChanges(changesAtNode);
      return bound;
    }
    if (node.on !== undefined && node.split !== undefined) {
      throw new Rejected(`node ${index}: both "on" and "split"`);
    }
    if (node.on !== undefined) {
      requireVertex(this.#play, node.on, `node ${index}`);
      if (!this.#ledger.has(node.on)) {
        throw new Rejected(
          `node ${index}: branches on ${this.#play.nameOf(node.on)}, which is not in play there`,
        );
      }
    } else {
      this.#requirePartition(node.split as readonly Numbers[], index);
    }
    const leaversBefore = this.#leavers.length, changesBefore = this.#changes.length;
    if (node.split !== undefined) this.#clearForSplit(node.split);
    stack.push({
      node,
      index,
      child: 0,
      bound: 0n,
      leaversAtChild: node.split === undefined ? leaversBefore : this.#leavers.length,
      changesAtChild: node.split === undefined ? changesBefore : this.#changes.length,
      changesAtNode,
    });
    return undefined;
  }

  #beginChild(frame: Frame): void {
    const { on, split } = frame.node;
    if (split !== undefined) {
      for (let i = 0; i < split[frame.child].length; i++) this.#bringBack(split[frame.child][i]);
      return;
    }
    const v = on as number;
    this.#takeOut(v);
    if (frame.child > 0) return;
    this.#countChosen(v, 1);
    const { offsets, neighbours } = this.#play;
    for (let a = offsets[v]; a < offsets[v + 1]; a++) {
      if (this.#ledger.has(neighbours[a])) this.#takeOut(neighbours[a]);
    }
  }

  #childDone(frame: Frame, bound: bigint): void {
    if (frame.node.split !== undefined) {
      frame.bound += bound;
      return;
    }
    const total = frame.child === 1
      ? bound + BigInt(this.#play.weights[frame.node.on as number])
      : bound;
    if (frame.child === 1 || total > frame.bound) frame.bound = total;
  }

  #undoChild(frame: Frame): void {
    this.#undoLeavers(frame.leaversAtChild);
    if (frame.node.on !== undefined && frame.child === 1) this.#countChosen(frame.node.on, -1);
    this.#undoChanges(frame.changesAtChild);
  }

  /** Lowers the right-hand sides of the terms with v by one, or raises them again. */
  #countChosen(v: number, change: 1 | -1): void {
    for (const term of this.#termsOf.get(v) ?? []) {
      this.#rhs[term] -= change;
      this.#ledger.changeTotal(-change * this.#multiplier[term]);
    }
  }

  /** Empties S and zeroes the multipliers; `restoreSplit` undoes it from the same sets. */
  #clearForSplit(sets: readonly Numbers[]): void {
    const start = this.#splitStarts[this.#splitStarts.length - 1];
    const end = this.#changes.length;
    for (let i = start; i < end; i += 2) this.#change(this.#changes[i], 0);
    this.#splitStarts.push(this.#changes.length);
    for (const set of sets) for (let i = 0; i < set.length; i++) this.#ledger.leave(set[i]);
  }

  #restoreSplit(frame: Frame): void {
    const sets = frame.node.split as readonly Numbers[];
    for (const set of sets) for (let i = 0; i < set.length; i++) this.#ledger.enter(set[i]);
    this.#splitStarts.pop();
  }

  #requirePartition(sets: readonly Numbers[], index: number): void {
    let count = 0;
    const seen = new Set<number>();
    for (const set of sets) {
      for (let i = 0; i < set.length; i++) {
        const v = requireVertex(this.#play, set[i], `node ${index}, split`);
        if (!this.#ledger.has(v) || seen.has(v)) {
          throw new Rejected(
            `node ${index}: the split names ${this.#play.nameOf(v)}, ` +
              `which is ${seen.has(v) ? "named twice" : "not in play there"}`,
          );
        }
        seen.add(v);
        count++;
      }
    }
    if (count !== this.#ledger.count) {
      throw new Rejected(
        `node ${index}: the split covers ${count} of the ${this.#ledger.count} vertices in play`,
      );
    }
  }

  #setMultipliers(node: CaseNode, index: number): void {
    const set = node.set;
    if (set === undefined) return;
    if (set.length % 2 !== 0) throw new Rejected(`node ${index}: "set" has an odd length`);
    for (let i = 0; i < set.length; i += 2) {
      const term = set[i];
      if (!Number.isInteger(term) || term < 0 || term >= this.#terms.length) {
        throw new Rejected(
          `node ${index}: expected a term from 0 to ${this.#terms.length - 1}, got ${term}`,
        );
      }
      this.#change(term, requireMultiplier(set[i + 1], `node ${index}, term ${term}`));
    }
  }

  #change(term: number, to: number): void {
    const before = this.#multiplier[term];
    if (before === to) return;
    this.#changes.push(term, before);
    this.#multiplier[term] = to;
    this.#ledger.changeTerm(this.#terms[term], this.#rhs[term], to - before);
  }

  #undoChanges(length: number): void {
    while (this.#changes.length > length) {
      const before = this.#changes.pop() as number, term = this.#changes.pop() as number;
      const now = this.#multiplier[term];
      this.#multiplier[term] = before;
      this.#ledger.changeTerm(this.#terms[term], this.#rhs[term], before - now);
    }
  }

  #takeOut(v: number): void {
    this.#leavers.push(v);
    this.#ledger.leave(v);
  }

  #bringBack(v: number): void {
    this.#leavers.push(-1 - v);
    this.#ledger.enter(v);
  }

  #undoLeavers(length: number): void {
    while (this.#leavers.length > length) {
      const v = this.#leavers.pop() as number;
      if (v >= 0) this.#ledger.enter(v);
      else this.#ledger.leave(-1 - v);
    }
  }
}

function childCount(node: CaseNode): number {
  return node.split === undefined ? 2 : node.split.length;
}

function requireTerms(play: Play, proof: CasesProof): void {
  const { denominator } = proof;
  if (denominator !== undefined && !(Number.isSafeInteger(denominator) && denominator >= 1)) {
    throw new Rejected(`case tree: expected a denominator >= 1, got ${denominator}`);
  }
  proof.cliques.forEach((clique, t) => {
    const where = `clique ${t}`;
    for (let i = 0; i < clique.length; i++) {
      requireVertex(play, clique[i], where);
      for (let j = 0; j < i; j++) requireEdge(play, clique[i], clique[j], where);
    }
  });
  proof.oddCycles.forEach((cycle, t) => {
    const where = `odd cycle ${t}`;
    if (cycle.length < 3 || cycle.length % 2 === 0) {
      throw new Rejected(
        `${where}: expected an odd number of vertices from 3, got ${cycle.length}`,
      );
    }
    const seen = new Set<number>();
    for (let i = 0; i < cycle.length; i++) {
      if (seen.has(requireVertex(play, cycle[i], where))) {
        throw new Rejected(`${where}: passes ${play.nameOf(cycle[i])} twice`);
      }
      seen.add(cycle[i]);
    }
    for (let i = 0; i < cycle.length; i++) {
      requireEdge(play, cycle[i], cycle[(i + 1) % cycle.length], where);
    }
  });
}
