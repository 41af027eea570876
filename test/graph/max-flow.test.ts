import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type FlowNetwork, type MaxFlow, maxFlow } from "../../lib/graph/max-flow.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { ParkMiller, type RecordedFlows } from "../support/park-miller.ts";

function network(n: number, arcs: readonly (readonly [number, number, number])[]): FlowNetwork {
  return {
    n,
    tails: Int32Array.from(arcs, (a) => a[0]),
    heads: Int32Array.from(arcs, (a) => a[1]),
    capacities: Float64Array.from(arcs, (a) => a[2]),
  };
}

function randomNetwork(random: Random, n: number, arcs: number, top: number): FlowNetwork {
  return network(
    n,
    Array.from({ length: arcs }, () => {
      const capacity = random.below(8) === 0 ? Infinity : random.below(top + 1);
      return [random.below(n), random.below(n), capacity] as const;
    }),
  );
}

/** Capacity of the arcs out of a set of nodes. */
function capacityOut(net: FlowNetwork, inside: (v: number) => boolean): number {
  let sum = 0;
  for (let a = 0; a < net.tails.length; a++) {
    if (inside(net.tails[a]) && !inside(net.heads[a])) sum += net.capacities[a];
  }
  return sum;
}

/** The least cut by trying every set; n <= 12. Also the union and intersection of the least ones. */
function leastCut(net: FlowNetwork, source: number, sink: number) {
  let least = Infinity, meet = -1, join = 0;
  for (let mask = 0; mask < 1 << net.n; mask++) {
    if (((mask >> source) & 1) === 0 || ((mask >> sink) & 1) !== 0) continue;
    const capacity = capacityOut(net, (v) => ((mask >> v) & 1) === 1);
    if (capacity > least || capacity === Infinity) continue;
    if (capacity < least) [least, meet, join] = [capacity, mask, mask];
    meet &= mask;
    join |= mask;
  }
  return { least, meet, join };
}

/** A flow within its capacities, conserved, of the stated value, met by both cuts. */
function validate(net: FlowNetwork, source: number, sink: number, result: MaxFlow): void {
  const balance = new Float64Array(net.n);
  for (let a = 0; a < net.tails.length; a++) {
    const f = result.flow[a];
    if (!(Number.isSafeInteger(f) && f >= 0 && f <= net.capacities[a])) {
      throw new Error(`arc ${a} carries ${f} of ${net.capacities[a]}`);
    }
    balance[net.tails[a]] -= f;
    balance[net.heads[a]] += f;
  }
  for (let v = 0; v < net.n; v++) {
    const want = v === source ? -result.value : v === sink ? result.value : 0;
    if (balance[v] !== want) throw new Error(`node ${v}: balance ${balance[v]}, expected ${want}`);
  }
  const { sourceSide, sinkSide } = result;
  expect(capacityOut(net, (v) => sourceSide[v] === 1)).toBe(result.value);
  expect(capacityOut(net, (v) => sinkSide[v] === 0)).toBe(result.value);
}

describe("maximum flow", () => {
  it("equals the least cut and finds both extreme cuts, 4000 random networks", () => {
    const random = new Random(11);
    let unlimited = 0;
    for (let t = 0; t < 4000; t++) {
      const n = 2 + random.below(7);
      const net = randomNetwork(random, n, random.below(4 * n), 1 + random.below(9));
      const source = random.below(n), sink = (source + 1 + random.below(n - 1)) % n;
      const result = maxFlow(net, source, sink, new Meter());
      const { least, meet, join } = leastCut(net, source, sink);
      expect(result.value).toBe(least);
      if (least === Infinity) {
        unlimited++;
        expect(result.flow.every((f) => f === 0)).toBe(true);
        expect(result.sourceSide[sink] + result.sinkSide[source]).toBe(2);
        continue;
      }
      validate(net, source, sink, result);
      for (let v = 0; v < n; v++) {
        expect(result.sourceSide[v]).toBe((meet >> v) & 1);
        expect(result.sinkSide[v]).toBe(1 - ((join >> v) & 1));
      }
    }
    expect(unlimited).toBeGreaterThan(100);
  });

  it("agrees with networkx on the value, 1500 recorded networks", () => {
    // Source: networkx, maximum_flow_value, through test/fixtures/record-flows.py.
    const file = new URL("../fixtures/flows.json", import.meta.url);
    const recorded: RecordedFlows = JSON.parse(readFileSync(file, "utf8"));
    recorded.flows.forEach((value, k) => {
      const random = new ParkMiller(k + 1);
      const n = 2 + random.below(20);
      const arcs = Array.from(
        { length: random.below(5 * n) },
        () => [random.below(n), random.below(n), random.below(50)] as const,
      );
      const net = network(n, arcs.filter(([tail, head]) => tail !== head));
      const result = maxFlow(net, 0, n - 1, new Meter());
      expect(result.value).toBe(value);
      validate(net, 0, n - 1, result);
    });
  });

  it("is exact next to 2^53", () => {
    const big = Number.MAX_SAFE_INTEGER;
    const net = network(4, [[0, 1, big - 2], [0, 2, 1], [1, 3, Infinity], [2, 3, 5], [1, 2, 3]]);
    const result = maxFlow(net, 0, 3, new Meter());
    expect(result.value).toBe(big - 1);
    validate(net, 0, 3, result);
  });

  it("refuses a value that is not below 2^53", () => {
    const big = Number.MAX_SAFE_INTEGER;
    const net = network(3, [[0, 1, big], [0, 1, big], [1, 2, Infinity]]);
    expect(() => maxFlow(net, 0, 2, new Meter())).toThrow(RangeError);
  });

  it("walks a path of a million arcs without recursion", () => {
    const n = 1_000_001;
    const tails = new Int32Array(n - 1), heads = new Int32Array(n - 1);
    const capacities = new Float64Array(n - 1).fill(9);
    for (let a = 0; a + 1 < n; a++) {
      tails[a] = a;
      heads[a] = a + 1;
    }
    capacities[n >> 1] = 4;
    const result = maxFlow({ n, tails, heads, capacities }, 0, n - 1, new Meter());
    expect(result.value).toBe(4);
    expect(result.sourceSide.reduce((s, x) => s + x, 0)).toBe((n >> 1) + 1);
  });

  it("refuses bad nodes and capacities", () => {
    const net = network(2, [[0, 1, 1]]);
    expect(() => maxFlow(net, 0, 0, new Meter())).toThrow(RangeError);
    expect(() => maxFlow(net, 0, 2, new Meter())).toThrow(RangeError);
    for (const bad of [-1, 0.5, NaN, 2 ** 53]) {
      expect(() => maxFlow(network(2, [[0, 1, bad]]), 0, 1, new Meter())).toThrow(/arc 0/);
    }
    expect(() => maxFlow(network(2, [[0, 2, 1]]), 0, 1, new Meter())).toThrow(/arc 0/);
  });

  it("stops when the meter runs out", () => {
    const random = new Random(3);
    const net = randomNetwork(random, 500, 4000, 100);
    expect(() => maxFlow(net, 0, 1, new Meter().within(1000))).toThrow("interrupted: work");
  });
});
