import { describe, expect, it } from "vitest";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { edgeCliqueCover } from "../../lib/polytope/clique-rows.ts";
import { loadHighs, runHighs } from "../../lib/polytope/highs.ts";
import { rowsOfSets, stableSetModel } from "../../lib/polytope/model.ts";
import { Relaxation } from "../../lib/polytope/relaxation.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteForce } from "../oracle/brute-force.ts";
import { randomGraph, randomRegularGraph, randomWeights } from "../support/random-graphs.ts";

describe("the call of HiGHS", () => {
  it("finds the heaviest stable set of 60 small graphs", async () => {
    const random = new Random(1);
    for (let round = 0; round < 60; round++) {
      const n = 1 + random.below(14);
      const graph = randomGraph(random, n, random.unit());
      const weights = randomWeights(random, n, 1, 50);
      const model = stableSetModel(weights, edgeCliqueCover(graph), true);
      const outcome = await runHighs(model, { absoluteGap: 0.5 });
      expect(outcome.status).toBe("optimal");
      expect(Math.round(outcome.value)).toBe(bruteForce(graph, weights).weight);
      expect(outcome.bound >= outcome.value - 1e-6).toBe(true);
      expect(outcome.x?.length).toBe(n);
    }
  });

  it("stops when it is asked to, with a bound", async () => {
    const graph = randomRegularGraph(new Random(2), 200, 6);
    const weights = new Float64Array(200).fill(1);
    const model = stableSetModel(weights, edgeCliqueCover(graph), true);
    const points: number[] = [];
    const began = performance.now();
    const outcome = await runHighs(model, {
      shouldStop: () => performance.now() - began > 500,
      onPoint: (x) => points.push(Math.round(x.reduce((sum, v) => sum + v, 0))),
    });
    expect(outcome.status).toBe("interrupted");
    expect(outcome.bound < 100 && outcome.bound >= outcome.value).toBe(true);
    expect(points.length > 0).toBe(true);
    expect(Math.max(...points)).toBe(Math.round(outcome.value));
  });

  it("keeps to a limit of nodes, the same way each time", async () => {
    const graph = randomRegularGraph(new Random(3), 80, 5);
    const weights = randomWeights(new Random(4), 80, 1, 3);
    const model = stableSetModel(weights, edgeCliqueCover(graph), true);
    const runs = [];
    for (let i = 0; i < 2; i++) {
      const { status, value, nodes } = await runHighs(model, { nodeLimit: 1, seed: 7 });
      runs.push({ status, value, nodes });
    }
    expect(runs[0]).toEqual(runs[1]);
    expect(runs[0].nodes <= 1).toBe(true);
  });

  it("solves relaxations: a pentagon is worth two and a half", async () => {
    const graph = graphFromPairs(5, [[0, 1], [1, 2], [2, 3], [3, 4], [4, 0]]);
    const weights = new Float64Array(5).fill(1);
    const { value, bound } = await runHighs(stableSetModel(weights, edgeCliqueCover(graph), false));
    expect(Math.abs(value - 2.5) < 1e-6).toBe(true);
    expect(Math.abs(bound - 2.5) < 1e-6).toBe(true);
  });
});

describe("a warm relaxation", () => {
  it("agrees with a fresh one while rows come and go and columns are fixed", async () => {
    const highs = await loadHighs();
    const random = new Random(5);
    for (let round = 0; round < 30; round++) {
      const n = 3 + random.below(12);
      const graph = randomGraph(random, n, random.unit());
      const weights = randomWeights(random, n, 1, 9);
      let sets: number[][] = edgeCliqueCover(graph);
      const warm = new Relaxation(highs, stableSetModel(weights, sets, false));
      for (let step = 0; step < 5; step++) {
        const lower = new Float64Array(n), upper = new Float64Array(n).fill(1);
        for (let v = 0; v < n; v++) if (random.below(4) === 0) upper[v] = 0;
        if (step === 2) {
          const added = Array.from({ length: 3 }, () => [random.below(n)]);
          warm.add(rowsOfSets(added));
          sets = [...sets, ...added];
        }
        if (step === 3) {
          const drop = Uint8Array.from(sets, (_, row) => row >= sets.length - 2 ? 1 : 0);
          warm.remove(drop, 2);
          sets = sets.slice(0, -2);
        }
        warm.setBounds(lower, upper);
        const point = warm.solve(new Meter());
        const model = { ...stableSetModel(weights, sets, false), lower, upper };
        const fresh = await runHighs(model);
        expect(Math.abs((point?.value ?? NaN) - fresh.value) < 1e-6).toBe(true);
        expect(point?.multipliers.length).toBe(sets.length);
        // Weak duality: the multipliers prove the value they come with.
        let proved = 0;
        const load = new Float64Array(n);
        sets.forEach((set, row) => {
          proved += point!.multipliers[row];
          for (const v of set) load[v] += point!.multipliers[row];
        });
        for (let v = 0; v < n; v++) if (upper[v] > 0) proved += Math.max(0, weights[v] - load[v]);
        expect(Math.abs(proved - fresh.value) < 1e-6).toBe(true);
      }
      expect(() => warm.solve(new Meter({ timeLimitMs: 0 }).within(0))).toThrow(Interrupted);
      warm.dispose();
    }
  });
});
