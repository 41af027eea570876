import { describe, expect, it } from "vitest";
import { type FlowNetwork, maxFlow } from "../../lib/graph/max-flow.ts";
import {
  type CoverFlow,
  type CoverNetwork,
  raiseToMaximum,
} from "../../lib/graph/max-flow-cover.ts";
import { extremeCuts, residualComponents } from "../../lib/graph/max-flow-cover-cuts.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { mirroredGrid, uniformWeights } from "../support/mirrored-grid.ts";
import { randomGraph, randomGraphWithEdges } from "../support/random-graphs.ts";

/** The network of a graph, arcs in its own order. */
function coverOf(graph: Graph): CoverNetwork {
  const { n, m, offsets, targets, edgeOf } = graph;
  const twin = new Int32Array(2 * m), seen = new Int32Array(m).fill(-1);
  for (let p = 0; p < 2 * m; p++) {
    const q = seen[edgeOf[p]];
    if (q < 0) seen[edgeOf[p]] = p;
    else [twin[p], twin[q]] = [q, p];
  }
  return { n, offsets, targets, twin };
}

/** The double cover spelled out: copies v and n + v, source 2n, sink 2n + 1. */
function spelledOut(graph: Graph, supply: Float64Array, demand: Float64Array): FlowNetwork {
  const arcs: [number, number, number][] = [];
  for (let v = 0; v < graph.n; v++) {
    arcs.push([2 * graph.n, v, supply[v]], [graph.n + v, 2 * graph.n + 1, demand[v]]);
    for (let a = graph.offsets[v]; a < graph.offsets[v + 1]; a++) {
      arcs.push([v, graph.n + graph.targets[a], Infinity]);
    }
  }
  return {
    n: 2 * graph.n + 2,
    tails: Int32Array.from(arcs, (a) => a[0]),
    heads: Int32Array.from(arcs, (a) => a[1]),
    capacities: Float64Array.from(arcs, (a) => a[2]),
  };
}

function sum(values: Float64Array): number {
  return values.reduce((a, b) => a + b, 0);
}

/** Flow and leftovers must add up to the capacities at every copy. */
function validate(
  { n, offsets, twin }: CoverNetwork,
  state: CoverFlow,
  supply: Float64Array,
  demand: Float64Array,
): void {
  for (let v = 0; v < n; v++) {
    let out = state.supply[v], into = state.demand[v];
    for (let p = offsets[v]; p < offsets[v + 1]; p++) {
      if (!(state.flow[p] >= 0)) throw new Error(`flow ${state.flow[p]}`);
      into += state.flow[p];
      out += state.flow[twin[p]];
    }
    if (!(state.supply[v] >= 0 && state.demand[v] >= 0)) throw new Error("negative leftover");
    if (out !== supply[v] || into !== demand[v]) throw new Error(`vertex ${v} does not add up`);
  }
}

/** Whether component numbers are right: equal exactly for mutually reachable copies, never rising. */
function expectComponents(
  network: CoverNetwork,
  state: CoverFlow,
  left: Int32Array,
  right: Int32Array,
): void {
  const { n, offsets, targets } = network;
  const number = [...left, ...right];
  const reach = number.map((_, x) => new Set([x]));
  const arcs: [number, number][] = [];
  for (let v = 0; v < n; v++) {
    for (let p = offsets[v]; p < offsets[v + 1]; p++) {
      arcs.push([v, n + targets[p]]);
      if (state.flow[p] > 0) arcs.push([n + v, targets[p]]);
    }
  }
  const open = arcs.filter(([x, y]) => number[x] >= 0 && number[y] >= 0);
  for (let changed = true; changed;) {
    changed = false;
    for (const [x, y] of open) {
      const before = reach[x].size;
      reach[y].forEach((z) => reach[x].add(z));
      if (reach[x].size > before) changed = true;
    }
  }
  for (const [x, y] of open) expect(number[x]).toBeGreaterThanOrEqual(number[y]);
  for (let x = 0; x < 2 * n; x++) {
    for (let y = 0; y < 2 * n; y++) {
      if (number[x] < 0 || number[y] < 0) continue;
      expect(number[x] === number[y]).toBe(reach[x].has(y) && reach[y].has(x));
    }
  }
}

describe("maximum flow in a double cover", () => {
  it("agrees with the general algorithm from a zero flow: value, cuts, components", () => {
    const random = new Random(31);
    for (let t = 0; t < 1500; t++) {
      const n = 1 + random.below(9);
      const graph = randomGraph(random, n, random.unit());
      // Supplies and demands need not be alike, and some are missing.
      const capacities = (): Float64Array =>
        Float64Array.from({ length: n }, () => random.below(4) === 0 ? 0 : 1 + random.below(9));
      const supply = capacities(), demand = capacities();
      const network = coverOf(graph);
      const state = {
        supply: supply.slice(),
        demand: demand.slice(),
        flow: new Float64Array(2 * graph.m),
      };
      raiseToMaximum(network, state, new Meter());
      validate(network, state, supply, demand);
      const expected = maxFlow(spelledOut(graph, supply, demand), 2 * n, 2 * n + 1, new Meter());
      expect(sum(state.flow)).toBe(expected.value);
      const cuts = extremeCuts(network, state, new Meter());
      const side = (x: number) => expected.sourceSide[x] === 1 ? 1 : 2 * expected.sinkSide[x];
      for (let v = 0; v < n; v++) {
        expect(cuts.left[v]).toBe(side(v));
        expect(cuts.right[v]).toBe(side(n + v));
      }
      const all = new Uint8Array(n).fill(1);
      const { left, right } = residualComponents(network, state, cuts, all, new Meter());
      for (let v = 0; v < n; v++) {
        expect(left[v] >= 0).toBe(cuts.left[v] === 0);
        expect(right[v] >= 0).toBe(cuts.right[v] === 0);
      }
      if (t % 5 === 0) expectComponents(network, state, left, right);
    }
  });

  it("agrees with the general algorithm on larger graphs", () => {
    const random = new Random(32);
    for (let t = 0; t < 60; t++) {
      const n = 50 + random.below(400);
      const graph = t % 2 === 0
        ? randomGraphWithEdges(random, n, Math.floor(n * (0.6 + 2 * random.unit())))
        : mirroredGrid(2 * (2 + random.below(9)), 2 * (2 + random.below(9)));
      const supply = uniformWeights(graph.n, random), demand = uniformWeights(graph.n, random);
      const network = coverOf(graph);
      const state = {
        supply: supply.slice(),
        demand: demand.slice(),
        flow: new Float64Array(2 * graph.m),
      };
      raiseToMaximum(network, state, new Meter());
      validate(network, state, supply, demand);
      const cover = spelledOut(graph, supply, demand);
      const { value } = maxFlow(cover, 2 * graph.n, 2 * graph.n + 1, new Meter());
      expect(sum(state.flow)).toBe(value);
    }
  });

  it("leaves a flow behind when it is interrupted, and goes on from there", () => {
    const graph = mirroredGrid(60, 60);
    const supply = uniformWeights(graph.n, new Random(33));
    const demand = uniformWeights(graph.n, new Random(34));
    const network = coverOf(graph);
    const state = {
      supply: supply.slice(),
      demand: demand.slice(),
      flow: new Float64Array(2 * graph.m),
    };
    let stops = 0, last = 0;
    for (let budget = 50_000;; budget *= 2) {
      try {
        raiseToMaximum(network, state, new Meter().within(budget));
        break;
      } catch (stop) {
        expect(stop).toBeInstanceOf(Interrupted);
        validate(network, state, supply, demand);
        expect(sum(state.flow)).toBeGreaterThanOrEqual(last);
        last = sum(state.flow);
        stops++;
      }
    }
    expect(stops).toBeGreaterThan(1);
    const cover = spelledOut(graph, supply, demand);
    const { value } = maxFlow(cover, 2 * graph.n, 2 * graph.n + 1, new Meter());
    expect(sum(state.flow)).toBe(value);
  });

  it("carries weights next to 2^53 through a long way", () => {
    // A path whose two ends hold almost everything: u0 - u1 - … - u5, amounts must pass exactly.
    const graph = graphFromPairs(6, [[0, 1], [1, 2], [2, 3], [3, 4], [4, 5]]);
    const big = 2 ** 51;
    const supply = Float64Array.of(big + 1, 0, big - 1, 0, 7, 0);
    const demand = Float64Array.of(0, 3, 0, big, 0, big);
    const network = coverOf(graph);
    const state = {
      supply: supply.slice(),
      demand: demand.slice(),
      flow: new Float64Array(2 * graph.m),
    };
    raiseToMaximum(network, state, new Meter());
    validate(network, state, supply, demand);
    const cover = spelledOut(graph, supply, demand);
    expect(sum(state.flow)).toBe(maxFlow(cover, 12, 13, new Meter()).value);
  });
});
