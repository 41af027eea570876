import { describe, expect, it } from "vitest";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { type Case, CaseTree, proofSize } from "../../lib/solve/branch/case-tree.ts";
import { branchScore, PseudoCosts } from "../../lib/solve/branch/pseudo-costs.ts";
import { denominatorFor, FractionSum } from "../../lib/solve/branch/rounded-duals.ts";
import { SequenceTable } from "../../lib/solve/branch/sequence-table.ts";
import { TermRows } from "../../lib/solve/branch/term-rows.ts";
import { boundProved } from "../oracle/cases.ts";

describe("the table of sequences", () => {
  it("gives equal numbers to equal sequences only, and gives them back", () => {
    const random = new Random(1);
    const table = new SequenceTable();
    const known = new Map<string, number>();
    for (let round = 0; round < 20_000; round++) {
      const list = Int32Array.from({ length: random.below(6) }, () => random.below(12));
      const key = list.join();
      const number = table.number(list);
      expect(number).toBe(known.get(key) ?? known.size);
      known.set(key, number);
    }
    expect(table.count).toBe(known.size);
    for (const [key, number] of known) expect(table.at(number).join()).toBe(key);
  });

  it("reads only as many entries as it is told", () => {
    const table = new SequenceTable();
    expect(table.number([1, 2, 3], 2)).toBe(table.number([1, 2, 9], 2));
    expect(table.at(0).join()).toBe("1,2");
  });
});

describe("exact bounds from rounded multipliers", () => {
  it("sum fractions exactly, also beyond 2^53 in numerators", () => {
    const random = new Random(2);
    for (let round = 0; round < 2000; round++) {
      const denominator = 2 ** random.below(21);
      const sum = new FractionSum(denominator);
      let exact = 0n;
      for (let i = 0; i < 1 + random.below(40); i++) {
        const numerator = Math.floor(random.unit() * 2 ** random.below(53));
        sum.add(numerator);
        exact += BigInt(numerator);
      }
      const floor = exact / BigInt(denominator);
      expect(sum.floor).toBe(floor <= BigInt(Number.MAX_SAFE_INTEGER) ? Number(floor) : Infinity);
    }
  });

  it("choose a power of two that leaves room", () => {
    for (const heaviest of [1, 3, 1e6, 2 ** 30, 2 ** 44, 2 ** 52]) {
      const denominator = denominatorFor(heaviest);
      expect(Number.isInteger(Math.log2(denominator))).toBe(true);
      expect(denominator >= 1 && denominator <= 2 ** 20).toBe(true);
      expect(denominator === 1 || denominator * heaviest <= 2 ** 44).toBe(true);
    }
  });
});

describe("the tree of cases", () => {
  const path = graphFromPairs(4, [[0, 1], [1, 2], [2, 3]]);
  const ones = new Float64Array(4).fill(1);
  const identity = Int32Array.of(0, 1, 2, 3);

  it("writes preorder, changes only, and undoes them between cases", () => {
    const tree = new CaseTree();
    const left = tree.clique([0, 1]), right = tree.clique([2, 3]), middle = tree.clique([1, 2]);
    expect(tree.termCount).toBe(3);
    const root: Case = {
      terms: [left, 2, right, 2],
      on: 1,
      chosen: { terms: [right, 2] },
      left: { on: 2, chosen: {}, left: { terms: [left, 2, right, 2, middle, 0] } },
    };
    const proof = tree.toProof(root, 2, identity);
    expect(proof).toEqual({
      rule: "cases",
      denominator: 1,
      cliques: [[0, 1], [2, 3], [1, 2]],
      oddCycles: [],
      nodes: [
        { set: [0, 1, 1, 1], on: 1 },
        { set: [0, 0] },
        { on: 2 },
        {},
        {},
      ],
    });
    expect(boundProved(path, ones, proof)).toBe(2);
    expect(proofSize(proof)).toEqual({ nodes: 5, numbers: 6 + 5 + 6 });
  });

  it("leaves unused terms out and numbers odd cycles after the cliques", () => {
    const pentagon = graphFromPairs(5, [[0, 1], [1, 2], [2, 3], [3, 4], [4, 0]]);
    const tree = new CaseTree();
    tree.clique([0, 1]);
    const cycle = tree.oddCycle([0, 1, 2, 3, 4]);
    tree.clique([1, 2]);
    const proof = tree.toProof({ terms: [cycle, 4] }, 4, Int32Array.of(4, 3, 2, 1, 0));
    expect(proof.cliques).toEqual([]);
    expect(proof.oddCycles).toEqual([[4, 3, 2, 1, 0]]);
    expect(proof.nodes).toEqual([{ set: [0, 1] }]);
    expect(boundProved(pentagon, new Float64Array(5).fill(1), proof)).toBe(2);
  });

  it("survives 200,000 nested cases and stops when the meter does", () => {
    const tree = new CaseTree();
    const root: Case = {};
    let at = root;
    for (let depth = 0; depth < 200_000; depth++) {
      at.on = depth % 4;
      at.chosen = {};
      at.left = {};
      at = depth % 2 === 0 ? at.left : at.chosen;
    }
    expect(tree.toProof(root, 1, identity).nodes.length).toBe(400_001);
    expect(() => tree.toProof(root, 1, identity, new Meter().within(1000))).toThrow(Interrupted);
  });
});

describe("rows that are terms", () => {
  it("keep count of chosen vertices while rows come and go", () => {
    const tree = new CaseTree();
    const rows = new TermRows(6, [[0, 1], [1, 2]], tree);
    const chosen = new Set<number>([3]);
    rows.add([[3, 4]], [[1, 2, 3, 4, 5]], (v) => chosen.has(v));
    expect([0, 1, 2, 3].map((row) => rows.left(row))).toEqual([1, 1, 0, 1]);
    rows.shift(1, -1);
    expect([0, 1, 2, 3].map((row) => rows.left(row))).toEqual([0, 0, 0, 0]);
    for (const row of [0, 2]) rows.used(row, false);
    const dropped = rows.dropIdle(0);
    expect(dropped?.entries).toBe(2);
    expect(Array.from(dropped!.drop)).toEqual([0, 0, 1, 0]);
    expect(rows.count).toBe(3);
    rows.shift(1, 1);
    expect([0, 1, 2].map((row) => rows.left(row))).toEqual([1, 1, 1]);
    expect(Array.from(rows.asRows(2).upper)).toEqual([2]);
    expect(rows.dropIdle(0)).toBe(undefined);
  });
});

describe("pseudo-costs", () => {
  it("are means of what was learnt, and guesses before", () => {
    const costs = new PseudoCosts(2);
    expect(costs.mean(0, 1, 7)).toBe(7);
    costs.learn(0, 1, 2);
    costs.learn(0, 1, 4);
    expect(costs.mean(0, 1, 7)).toBe(3);
    expect(costs.trials(1)).toBe(0);
    costs.learn(1, 1, 1);
    expect(costs.trials(1)).toBe(1);
    expect(branchScore(2, 3) > branchScore(5, 1)).toBe(true);
  });
});
