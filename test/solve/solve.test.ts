import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { Random } from "../../lib/run/random.ts";
import type { EngineName } from "../../lib/solve/engine.ts";
import { solve } from "../../lib/solve/solve.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { leastDelayMs, PROMISED_MS } from "../support/effort.ts";
import { randomGraph, randomRegularGraph, randomWeights } from "../support/random-graphs.ts";
import type { Graph } from "../../lib/graph/graph.ts";

function instanceOf(graph: Graph, weights: Float64Array): Instance {
  return Instance.from({
    items: Array.from(weights, (weight, v) => ({ id: `v${v}`, weight })),
    conflicts: Array.from(graph.tails, (u, e) => [`v${u}`, `v${graph.heads[e]}`] as const),
  });
}

/** Too hard for a second: cubic, 600 vertices, weights close together. */
function hardInstance(): Instance {
  const random = new Random(2);
  const graph = randomRegularGraph(random, 600, 4);
  return instanceOf(graph, randomWeights(random, graph.n, 1000, 1100));
}

describe("solve", () => {
  it("finds the optimum and proves it: 1,500 random instances against brute force", async () => {
    const random = new Random(4);
    for (let i = 0; i < 1500; i++) {
      const n = 1 + random.below(15);
      const graph = randomGraph(random, n, random.unit() ** 2);
      const weights = randomWeights(random, n, i % 4 === 0 ? -3 : 1, i % 5 === 0 ? 2 ** 40 : 6);
      const instance = instanceOf(graph, weights);
      const solution = await solve(instance, { workers: 0 });
      expect(solution.status).toBe("optimal");
      expect(solution.weight).toBe(bruteForce(graph, weights).weight);
      expect(check(instance, solution)).toMatchObject({ valid: true });
      expect(solution.parts.reduce((sum, part) => sum + part.weight, 0)).toBe(solution.weight);
    }
  });

  it("gives the same answer on every engine that does not decline", async () => {
    const random = new Random(6);
    const engines: EngineName[] = ["transversal", "projective", "branch"];
    for (let i = 0; i < 200; i++) {
      const graph = randomRegularGraph(random, 4 + 2 * random.below(6), 3);
      const weights = randomWeights(random, graph.n, 1, 9);
      const instance = instanceOf(graph, weights);
      const best = bruteForce(graph, weights).weight;
      for (const engine of engines) {
        const solution = await solve(instance, { engine, workers: 0 });
        expect(solution.weight).toBeLessThanOrEqual(best);
        expect(solution.upperBound).toBeGreaterThanOrEqual(best);
        if (engine === "branch") expect(solution.status).toBe("optimal");
        if (solution.status === "optimal") {
          expect(solution.weight).toBe(best);
          expect(check(instance, solution)).toMatchObject({ valid: true });
        }
      }
    }
  });

  it("keeps decimals exact", async () => {
    const instance = Instance.from({
      unit: "euros",
      items: [{ id: "a", weight: "0.1" }, { id: "b", weight: "0.2" }, { id: "c", weight: "0.3" }],
      conflicts: [["a", "c"], ["b", "c"]],
    });
    const solution = await solve(instance);
    expect(solution.weight).toBe(0.3);
    expect(solution.upperBound).toBe(0.3);
    expect(check(instance, solution).valid).toBe(true);
  });

  it("obeys what must be chosen and what must be left", async () => {
    const instance = Instance.from({
      items: ["a", "b", "c", "d"].map((id, i) => ({ id, weight: 10 - i })),
      conflicts: [["a", "b"], ["b", "c"], ["c", "d"]],
    });
    const forced = await solve(instance, { choose: ["b"], leave: ["d"] });
    expect([forced.chosen, forced.weight, forced.status]).toEqual([["b"], 9, "optimal"]);
    expect(check(instance, forced).valid).toBe(true);
    const impossible = await solve(instance, { choose: ["c", "d"] });
    expect(impossible.status).toBe("infeasible");
    expect(impossible.reason).toContain('"c" and "d" are both required');
    await expect(solve(instance, { choose: ["x", "a"], leave: ["a", "y"] })).rejects.toMatchObject({
      problems: [
        'choose: there is no item "x"',
        'leave: there is no item "y"',
        '"a" is both in choose and in leave',
      ],
    });
  });

  it("solves the empty question: everything left, or nothing worth anything", async () => {
    const instance = Instance.from({ items: [{ id: "a", weight: -1 }], conflicts: [] });
    const nothing = await solve(instance);
    expect([nothing.status, nothing.chosen, nothing.weight]).toEqual(["optimal", [], 0]);
    expect(check(instance, nothing).valid).toBe(true);
    const required = await solve(instance, { choose: ["a"] });
    expect([required.status, required.weight]).toEqual(["optimal", -1]);
    expect(check(instance, required).valid).toBe(true);
  });

  it("stops at the limit in this thread with an honest bound", async () => {
    const instance = hardInstance();
    for (const timeLimitMs of [0, 300]) {
      const delay = await leastDelayMs(async () => {
        const began = performance.now();
        const solution = await solve(instance, { timeLimitMs, workers: 0 });
        const took = performance.now() - began;
        expect(solution.status).toBe("feasible");
        expect(solution.weight).toBeLessThan(solution.upperBound);
        expect(solution.weight).toBeGreaterThan(0);
        expect(solution.certificate).toBe(undefined);
        expect(check(instance, solution).reason).toContain("does not claim");
        return took - timeLimitMs;
      });
      expect(delay).toBeLessThanOrEqual(PROMISED_MS);
    }
  });

  it("refuses options that mean nothing before any work", async () => {
    await expect(solve(hardInstance(), { timeLimitMs: -1 })).rejects.toThrow(RangeError);
    const misspelt = { timeLimit: 5 } as Record<string, number>;
    await expect(solve(hardInstance(), misspelt)).rejects.toThrow(/timeLimitMs.*got timeLimit$/);
    const magic = "magic" as EngineName;
    await expect(solve(hardInstance(), { engine: magic })).rejects.toThrow(/projective.*got magic/);
  });
});
