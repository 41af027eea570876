import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { fromJson, toJson } from "../../lib/certify/json.ts";
import { Solution } from "../../lib/certify/solution.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { decompose } from "../../lib/reduce/decompose.ts";
import type { Decomposition } from "../../lib/reduce/decomposition.ts";
import { replaceBlocks } from "../../lib/reduce/replace-blocks.ts";
import { Random } from "../../lib/run/random.ts";
import { solve } from "../../lib/solve/solve.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { randomConnectedGraph, randomGraph } from "../support/random-graphs.ts";
import { randomCosts, weightsOfCosts, withBlocks } from "../support/with-blocks.ts";

function instanceOf(
  graph: Graph,
  weights: ArrayLike<number | string>,
  idOf = (v: number) => `item ${v}`,
): Instance {
  return Instance.from({
    name: "made up",
    unit: "points",
    items: Array.from({ length: graph.n }, (_, v) => ({ id: idOf(v), weight: weights[v] })),
    conflicts: Array.from(graph.tails, (u, e) => [idOf(u), idOf(graph.heads[e])] as const),
  });
}

/** Every block listed is one, and core and blocks share the items out. */
function expectAnatomy(instance: Instance, { components }: Decomposition): void {
  const seen = new Set<string>();
  for (const { items, core, blocks } of components) {
    const listed = [...core, ...blocks.flatMap((block) => block.items)];
    expect([...listed].sort()).toEqual([...items].sort());
    for (const id of items) {
      expect(seen.has(id)).toBe(false);
      seen.add(id);
    }
    for (const { items, attachments, sides } of blocks) {
      expect(attachments.length).toBeLessThanOrEqual(3);
      const inside = new Set(items), at = new Set(attachments);
      const side = new Map<string, number>();
      sides.forEach((ids, s) => ids.forEach((id) => side.set(id, s)));
      expect(side.size).toBe(items.length + attachments.length);
      const met = new Set<string>();
      const { tails, heads } = instance.graph;
      for (let e = 0; e < tails.length; e++) {
        const u = instance.ids[tails[e]], v = instance.ids[heads[e]];
        if (!inside.has(u) && !inside.has(v)) continue;
        for (const id of [u, v]) {
          expect(inside.has(id) || at.has(id)).toBe(true);
          if (at.has(id)) met.add(id);
        }
        expect(side.get(u)).not.toBe(side.get(v));
      }
      expect(met).toEqual(at);
    }
  }
  expect(seen.size).toBe(instance.size);
}

describe("decompose", () => {
  it("names core and blocks of any graph, 400 cases", async () => {
    const random = new Random(1);
    for (let run = 0; run < 400; run++) {
      const graph = run % 2 === 0
        ? randomConnectedGraph(random, 5 + random.below(20), random.below(20))
        : withBlocks(random, randomGraph(random, 7, 0.7), { blocks: 4, size: 6, nested: true })
          .graph;
      const instance = instanceOf(graph, new Float64Array(graph.n).fill(1));
      const found = await decompose(instance);
      expectAnatomy(instance, found);
      expect(found.complete).toBe(true);
    }
  });

  it("finds what was planted on a mirrored grid, and sees its embedding", async () => {
    const random = new Random(2);
    for (let run = 0; run < 10; run++) {
      const grid = mirroredGrid(10, 10);
      const { graph, blocks } = withBlocks(random, grid, {
        blocks: 8,
        size: 14,
        attachments: 1 + run % 2,
      });
      const instance = instanceOf(graph, new Float64Array(graph.n).fill(1));
      const found = await decompose(instance);
      expectAnatomy(instance, found);
      const [component] = found.components;
      // A block on two neighbours at the border can take one of them along.
      expect(component.core.length).toBeGreaterThan(95);
      expect(component.bigSide).toBe(true);
      if (run % 2 === 0) {
        // Blocks on one item are gone without a trace, so only the grid is left to be embedded.
        expect(component.evenFace).toBe("yes");
      }
      const inBlocks = component.blocks.flatMap((block) => block.items);
      // A path of one or two items is its own gadget and stays.
      const large = blocks.filter((block) => block.inside.length > 2);
      const planted = new Set(large.flatMap((block) => block.inside.map((v) => `item ${v}`)));
      expect(inBlocks.filter((id) => planted.has(id)).length).toBe(planted.size);
    }
  });

  it("says where no side is big", async () => {
    const pairs: [number, number][] = [[0, 1], [1, 2], [2, 3], [3, 0], [4, 5], [5, 6], [6, 4]];
    const instance = instanceOf(graphFromPairs(7, pairs), new Float64Array(7).fill(1));
    const { components } = await decompose(instance);
    expect(components.map(({ bigSide, core }) => [bigSide, core.length])).toEqual([
      [false, 0],
      [false, 3],
    ]);
    expect(components[0].note).toMatch(/no odd cycle/);
    expect(components[1].note).toMatch(/1 item meets all odd cycles/);
  });

  it("returns what it has when the time is up", async () => {
    const grid = mirroredGrid(60, 60);
    const instance = instanceOf(grid, new Float64Array(grid.n).fill(1));
    const found = await decompose(instance, { timeLimitMs: 0 });
    expect(found.complete).toBe(false);
    expectAnatomy(instance, found);
    await expect(decompose(instance, { timeLimitMs: -1 })).rejects.toThrow(RangeError);
  });

  it("writes itself as plain data", async () => {
    const grid = mirroredGrid(4, 4);
    const found = await decompose(instanceOf(grid, new Float64Array(16).fill(1)));
    const data = JSON.parse(toJson(found));
    expect(data.kind).toBe("decomposition");
    expect(Object.keys(data).sort()).toEqual(["components", "elapsedMs", "instance", "kind"]);
    expect(found.toString()).toMatch(/16 items, 1 component; 0 blocks/);
  });
});

describe("replaceBlocks", () => {
  it("keeps the optimum up to its offset and lifts it with a certificate, 250 cases", async () => {
    const random = new Random(3);
    let gadgets = 0;
    for (let run = 0; run < 250; run++) {
      const core = randomGraph(random, 7, 0.8);
      const options = { blocks: 1 + random.below(3), size: 6, connected: run % 5 !== 0 };
      const { graph } = withBlocks(random, core, options);
      // Kernels that hold everything, kernels that take blocks to pieces, cents, items worth nothing.
      const weights = run % 2 === 0
        ? weightsOfCosts(graph, randomCosts(random, graph.m, 9))
        : Float64Array.from({ length: graph.n }, () => random.below(9) - 1);
      const scale = run % 3 === 0 ? 100 : 1;
      const idOf = (v: number) => v === 3 ? "gadget 1.1" : `item ${v}`;
      const instance = instanceOf(graph, weights.map((w) => w / scale), idOf);
      const replaced = await replaceBlocks(await decompose(instance));
      const small = replaced.instance;
      const best = bruteForce(small.graph, small.weights).weight;
      const optimum = bruteForce(instance.graph, instance.weights).weight;
      expect(Math.round((replaced.offset + best / replaced.unitsPer) * instance.scale))
        .toBe(optimum);
      const solution = replaced.lift(await solve(small, { workers: 0 }));
      expect(solution.status).toBe("optimal");
      expect(solution.weight).toBe(optimum / instance.scale);
      const verdict = check(instance, JSON.parse(toJson(solution)));
      expect([verdict.valid, verdict.reason]).toEqual([true, verdict.reason]);
      gadgets += replaced.gadgets.filter((gadget) => gadget.kind !== "nothing").length;
    }
    expect(gadgets).toBeGreaterThan(50);
  });

  it("tells what each gadget costs in each state", async () => {
    const random = new Random(4);
    let rows = 0;
    for (let run = 0; run < 40; run++) {
      const { graph } = withBlocks(random, randomGraph(random, 6, 0.9), {
        blocks: 2,
        size: 6,
        attachments: 3,
      });
      const weights = weightsOfCosts(graph, randomCosts(random, graph.m, 9));
      const replaced = await replaceBlocks(await decompose(instanceOf(graph, weights)));
      for (const { block, table, kind, conflicts, items } of replaced.gadgets) {
        // The gadget's own conflicts reach the table in every state.
        for (const { chosen, cost } of table) {
          expect(gadgetCost(items, conflicts, chosen)).toBe(kind === "edge" ? NaN : cost);
          rows++;
        }
        expect(table[0].chosen).toEqual([]);
        expect(block.attachments.length).toBeLessThanOrEqual(3);
      }
    }
    expect(rows).toBeGreaterThan(50);
  });

  it("refuses to lift what it cannot", async () => {
    const grid = mirroredGrid(4, 4);
    const instance = instanceOf(grid, new Float64Array(16).fill(1));
    const replaced = await replaceBlocks(await decompose(instance));
    expect(() => replaced.lift(fakeSolution(instance))).toThrow(/gadget instance/);
    const asked = await solve(replaced.instance, { workers: 0, leave: [replaced.instance.ids[0]] });
    expect(() => replaced.lift(asked)).toThrow(/without required/);
  });

  it("leaves one item worth nothing where the kernel settles everything", async () => {
    const instance = instanceOf(graphFromPairs(3, [[0, 1], [1, 2]]), [1, 1, 1]);
    const replaced = await replaceBlocks(await decompose(instance));
    expect([replaced.instance.ids, replaced.offset, replaced.settled]).toEqual([
      ["nothing left"],
      2,
      3,
    ]);
    const lifted = replaced.lift(await solve(replaced.instance, { workers: 0 }));
    expect(check(instance, fromJson(toJson(lifted))).valid).toBe(true);
    expect(replaced.toString()).toMatch(/3 items settled/);
  });
});

/** Least slack cost of a gadget by trying its items out; NaN for a cost added to a conflict. */
function gadgetCost(
  items: readonly string[],
  conflicts: readonly { between: readonly [string, string]; cost: number }[],
  chosen: readonly string[],
): number {
  if (conflicts.some(({ between }) => between.every((id) => !items.includes(id)))) return NaN;
  let least = Infinity;
  for (let mask = 0; mask < 1 << items.length; mask++) {
    const taken = new Set([...chosen, ...items.filter((_, i) => (mask >> i & 1) !== 0)]);
    let cost = 0;
    for (const { between: [u, v], cost: each } of conflicts) {
      const count = (taken.has(u) ? 1 : 0) + (taken.has(v) ? 1 : 0);
      cost += count === 2 ? Infinity : count === 1 ? 0 : each;
    }
    least = Math.min(least, cost);
  }
  return least;
}

function fakeSolution(instance: Instance): Solution {
  return new Solution({
    status: "feasible",
    chosen: [],
    weight: 0,
    upperBound: 100,
    parts: [],
    elapsedMs: 0,
    choose: [],
    leave: [],
    instance: {
      name: instance.name,
      unit: instance.unit,
      items: instance.size,
      conflicts: instance.conflictCount,
      fingerprint: instance.fingerprint,
    },
  });
}
