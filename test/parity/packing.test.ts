import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { componentSubgraphs } from "../../lib/graph/components.ts";
import { type Graph, graphFromPairs } from "../../lib/graph/graph.ts";
import { twoDisjointOddCycles } from "../../lib/parity/disjoint-odd-cycles.ts";
import { embeddedTransversal } from "../../lib/parity/embedded-transversal.ts";
import { oddCyclePacking } from "../../lib/parity/odd-cycle-packing.ts";
import { oddCyclePair } from "../../lib/parity/odd-cycle-pair.ts";
import { leastTransversal } from "../../lib/parity/transversal.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { bruteOcp, hasTwoOddCycles } from "../oracle/ocp.ts";
import { bruteOct } from "../oracle/oct.ts";
import { bandGraph } from "../support/band.ts";
import { graphFromGraph6 } from "../support/graph6.ts";
import { mirroredGrid } from "../support/mirrored-grid.ts";
import { changedGrid } from "../support/odd-cycle-cases.ts";
import { faultOfOddCycles } from "../support/odd-cycles.ts";
import { randomConnectedGraph, randomGraph } from "../support/random-graphs.ts";

/** What is wrong with the answer for a graph with this packing number; "" if nothing is. */
function faultOfPacking(graph: Graph, ocp: number): string {
  const { lower, upper, cycles } = oddCyclePacking(graph, new Meter());
  const sound = lower <= ocp && ocp <= upper && lower >= Math.min(2, ocp) &&
    (ocp > 1 || upper === ocp) && cycles.length === lower;
  return sound
    ? faultOfOddCycles(graph, cycles)
    : `${lower} to ${upper}, ${cycles.length} cycles, where the number is ${ocp}`;
}

function expectPacking(graph: Graph, ocp: number): void {
  expect(faultOfPacking(graph, ocp)).toBe("");
}

describe("oddCyclePacking", () => {
  it("decides 0, 1 or at least 2 on all connected graphs of up to 8 vertices", () => {
    // Source: B. D. McKay, nauty (Debian 2.8.6): `geng -c -q n` for n = 2 … 8, one graph6 string a
    // line. Every ninth of the graphs on 8 vertices also goes through brute-force transversals.
    const file = new URL("../fixtures/connected-graphs-to-8.g6", import.meta.url);
    const lines = readFileSync(file, "utf8").trim().split("\n");
    expect(lines.length).toBe(1 + 2 + 6 + 21 + 112 + 853 + 11117);
    lines.forEach((line, i) => {
      const graph = graphFromGraph6(line);
      const fault = faultOfPacking(graph, bruteOcp(graph));
      if (fault !== "") throw new Error(`${line}: ${fault}`);
      if (graph.n === 8 && i % 9 !== 0) return;
      const { lower, upper } = leastTransversal(graph, new Meter());
      const oct = bruteOct(graph);
      if (lower !== oct || upper !== oct) {
        throw new Error(`${line}: ${lower} to ${upper}, not ${oct}`);
      }
    });
  });

  it("decides it on random graphs of up to 14 vertices", () => {
    const random = new Random(50);
    for (let i = 0; i < 1500; i++) {
      const n = 5 + random.below(10);
      const whole = i % 2 === 0
        ? randomGraph(random, n, 0.1 + 0.25 * random.unit())
        : randomConnectedGraph(random, n, random.below(n));
      for (const { graph } of componentSubgraphs(whole)) expectPacking(graph, bruteOcp(graph));
    }
  });

  it("decides it near the boundary: mirrored grids changed a little, with blocks hung on", () => {
    const random = new Random(51);
    const counts = new Map<string, number>();
    for (let i = 0; i < 1500; i++) {
      const graph = changedGrid(random);
      const two = hasTwoOddCycles(graph);
      const { exist, because, embedded } = twoDisjointOddCycles(graph, new Meter(), {
        look: false,
      });
      if (exist !== two) throw new Error(`case ${i}: ${exist}, because ${because}`);
      const { lower, upper } = leastTransversal(graph, new Meter());
      if (embedded !== undefined) {
        const least = embeddedTransversal(embedded, new Meter());
        if (least.lower > upper) {
          throw new Error(`case ${i}: ${upper} vertices, not ${least.lower}`);
        }
      }
      const key = `${Math.min(4, lower)} ${two}`;
      counts.set(key, (counts.get(key) ?? 0) + 1);
    }
    for (const key of ["2 false", "2 true", "3 false", "3 true", "4 false", "4 true"]) {
      expect(counts.get(key) ?? 0).toBeGreaterThan(30);
    }
  });

  it("names two disjoint odd cycles by deleting edges where a quick look sees none", () => {
    const random = new Random(52);
    let pairs = 0;
    for (let i = 0; i < 600; i++) {
      const graph = changedGrid(random);
      if (twoDisjointOddCycles(graph, new Meter()).exist !== true) continue;
      pairs++;
      expect(faultOfOddCycles(graph, oddCyclePair(graph, new Meter()))).toBe("");
    }
    expect(pairs).toBeGreaterThan(100);
  });

  it("is 1 for mirrored grids and 2 or more with an odd cycle far away", () => {
    for (const side of [5, 20, 61]) {
      const grid = mirroredGrid(side, side);
      expectPacking(grid, 1);
      const pairs = Array.from(grid.tails, (u, e) => [u, grid.heads[e]] as const);
      const middle = Math.floor(side / 2) * side + Math.floor(side / 2);
      // A square of the grid with a diagonal: a triangle that the whole grid is larger than.
      const packing = oddCyclePacking(
        graphFromPairs(grid.n, [...pairs, [middle, middle + side + 1]]),
        new Meter(),
      );
      expect(packing.lower).toBeGreaterThanOrEqual(2);
    }
  });

  it("is at least the number of odd rows of a torus grid", () => {
    const pairs: [number, number][] = [];
    for (let i = 0; i < 8; i++) {
      for (let j = 0; j < 7; j++) {
        pairs.push([7 * i + j, 7 * i + (j + 1) % 7], [7 * i + j, 7 * ((i + 1) % 8) + j]);
      }
    }
    const { lower, upper } = oddCyclePacking(graphFromPairs(56, pairs), new Meter());
    expect([lower, upper]).toEqual([8, 8]);
  });

  it("decides transversals of two whose cycles must cross, at 10,000 vertices", () => {
    // Two items tied to opposite rims of a square grid, one to top and bottom, one to left and right.
    const crossing = bandGraph(100, false), free = bandGraph(100, true);
    expectPacking(crossing, 1);
    const packing = oddCyclePacking(free, new Meter());
    expect([packing.lower, packing.upper]).toEqual([2, 2]);
    expect(faultOfOddCycles(free, packing.cycles)).toBe("");
  });

  it("keeps parallel gadgets of opposite parity apart from those of equal parity", () => {
    // Between a and b, chains of lengths 2 and 4 (equal parity) or 2 and 3 (an odd cycle).
    const chain = (from: number, to: number, inner: readonly number[]): [number, number][] => {
      const stops = [from, ...inner, to];
      return inner.concat(to).map((_, i) => [stops[i], stops[i + 1]]);
    };
    const even = graphFromPairs(6, [...chain(0, 1, [2]), ...chain(0, 1, [3, 4, 5])]);
    const odd = graphFromPairs(5, [...chain(0, 1, [2]), ...chain(0, 1, [3, 4])]);
    expectPacking(even, 0);
    expectPacking(odd, 1);
    // Two such odd pairs on a square, on opposite sides and on sides that meet.
    const square: [number, number][] = [[0, 1], [1, 2], [2, 3], [3, 0]];
    expectPacking(graphFromPairs(6, [...square, ...chain(0, 1, [4]), ...chain(2, 3, [5])]), 2);
    expectPacking(graphFromPairs(6, [...square, ...chain(0, 1, [4]), ...chain(1, 2, [5])]), 1);
  });

  it("replaces sides that are not planar, whatever they hang on", () => {
    // A mirrored grid and K(3,3) behind one, two or three of its vertices: corners of a square.
    const grid = mirroredGrid(6, 6);
    for (const attachments of [[7], [7, 8], [7, 14], [7, 8, 13], [8, 13, 14]]) {
      const pairs = Array.from(grid.tails, (u, e): [number, number] => [u, grid.heads[e]]);
      for (let copies = 1, n = grid.n; copies <= 2; copies++, n += 6) {
        for (let p = 0; p < 3; p++) for (let q = 3; q < 6; q++) pairs.push([n + p, n + q]);
        for (const [i, v] of attachments.entries()) {
          // The side of v in the square decides which class of the block it is tied to.
          pairs.push([v, n + (v === 7 || v === 14 ? 0 : 3) + (i % 3)]);
        }
        const graph = graphFromPairs(n + 6, [...pairs]);
        const answer = twoDisjointOddCycles(graph, new Meter());
        expect([attachments, copies, answer.exist]).toEqual([attachments, copies, false]);
      }
      // Once tied to the wrong class as well, the block holds an odd cycle beside the grid's.
      const wrong = graphFromPairs(grid.n + 12, [...pairs, [attachments[0], grid.n + 5], [
        attachments[0],
        grid.n + 2,
      ]]);
      expect(twoDisjointOddCycles(wrong, new Meter()).exist).toBe(true);
    }
  });

  it("says what is open when the run ends early", () => {
    const graph = mirroredGrid(30, 30);
    for (let units = 1; units < 10_000_000; units *= 4) {
      const { lower, upper, cycles, stopped } = oddCyclePacking(graph, new Meter().within(units));
      expect(lower).toBeLessThanOrEqual(1);
      expect(upper).toBeGreaterThanOrEqual(1);
      expect(cycles.length).toBe(lower);
      if (upper > 1) expect(stopped).toBe("work");
    }
  });

  it("refuses a graph that is not connected", () => {
    expect(() => oddCyclePacking(graphFromPairs(2, []), new Meter())).toThrow(RangeError);
  });
});
