import { describe, expect, it } from "vitest";
import { CoverFlow } from "../../lib/graph/cover-flow.ts";
import type { Graph } from "../../lib/graph/graph.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { halfIntegralKernel } from "../../lib/reduce/kernel.ts";
import { randomGraph, randomWeights } from "../support/random-graphs.ts";

/** Flows and capacities as they show from outside. */
function picture(graph: Graph, flow: CoverFlow): number[] {
  const seen = [flow.total];
  for (let e = 0; e < graph.m; e++) seen.push(flow.doubledCost(e));
  for (let v = 0; v < graph.n; v++) seen.push(flow.capacity(v));
  return seen;
}

/** Asserts that doubled costs are feasible for the capacities and add up to the total. */
function expectFeasible(graph: Graph, flow: CoverFlow): void {
  const load = new Float64Array(graph.n);
  let sum = 0;
  for (let e = 0; e < graph.m; e++) {
    const cost = flow.doubledCost(e);
    expect(cost).toBeGreaterThanOrEqual(0);
    load[graph.tails[e]] += cost;
    load[graph.heads[e]] += cost;
    sum += cost;
  }
  expect(sum).toBe(flow.total);
  for (let v = 0; v < graph.n; v++) {
    expect(load[v]).toBeLessThanOrEqual(2 * flow.capacity(v));
  }
}

describe("CoverFlow", () => {
  it("is as large as the kernel's flow, also after vertices are taken out, and undoes", () => {
    const random = new Random(80);
    for (let i = 0; i < 120; i++) {
      const n = 2 + random.below(12);
      const graph = randomGraph(random, n, 0.2 + 0.5 * random.unit());
      const weights = randomWeights(random, n, 1, 30);
      const flow = new CoverFlow(graph, weights, new Meter());
      const left = Float64Array.from(weights);
      const marks: number[] = [], pictures: number[][] = [];
      for (const v of random.shuffle(Array.from({ length: n }, (_, u) => u))) {
        flow.maximise();
        expectFeasible(graph, flow);
        const { packed, value } = halfIntegralKernel(graph, positive(left), new Meter());
        if (left.every((w) => w > 0)) {
          expect(flow.total).toBe(packed);
          const values = flow.values();
          for (let u = 0; u < n; u++) if (values[u] !== 1) expect(values[u]).toBe(value[u]);
        }
        marks.push(flow.mark());
        pictures.push(picture(graph, flow));
        flow.takeOut(v);
        left[v] = 0;
        const changed = flow.changedSince(marks[marks.length - 1]);
        for (const e of changed) expect(graph.tails[e] === v || graph.heads[e] === v).toBe(true);
      }
      flow.maximise();
      expect(flow.total).toBe(0);
      while (marks.length > 0) {
        flow.undo(marks.pop() as number);
        expect(picture(graph, flow)).toEqual(pictures.pop());
      }
    }
  });

  it("is maximum on what is left, as a fresh flow is", () => {
    const random = new Random(81);
    for (let i = 0; i < 120; i++) {
      const n = 4 + random.below(30);
      const graph = randomGraph(random, n, 3 / n);
      const weights = randomWeights(random, n, 1, 9);
      const flow = new CoverFlow(graph, weights, new Meter());
      flow.maximise();
      const left = Float64Array.from(weights);
      for (let k = 0; k < 6; k++) {
        const mark = flow.mark(), v = random.below(n);
        flow.takeOut(v);
        flow.maximise();
        const kept = left[v];
        left[v] = 0;
        const fresh = new CoverFlow(graph, left, new Meter());
        fresh.maximise();
        expect(flow.total).toBe(fresh.total);
        expectFeasible(graph, flow);
        if (random.below(2) === 0) {
          flow.undo(mark);
          left[v] = kept;
        }
      }
    }
  });

  it("stops at enough", () => {
    const random = new Random(82);
    const graph = randomGraph(random, 60, 0.1);
    const weights = randomWeights(random, 60, 1, 9);
    const whole = new CoverFlow(graph, weights, new Meter());
    whole.maximise();
    const part = new CoverFlow(graph, weights, new Meter());
    part.maximise(50);
    expect(part.total).toBeGreaterThanOrEqual(50);
    expect(part.total).toBeLessThan(whole.total);
    part.maximise();
    expect(part.total).toBe(whole.total);
  });
});

/** The kernel wants positive weights; where some are 0 its answer is not compared. */
function positive(weights: Float64Array): Float64Array {
  return weights.map((w) => Math.max(1, w));
}
