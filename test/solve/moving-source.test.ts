import { describe, expect, it } from "vitest";
import { neighbourLists, scratchFor } from "../../lib/certify/play.ts";
import { sphereDual } from "../../lib/certify/projective-dual.ts";
import { innerGraph } from "../../lib/certify/projective-graph.ts";
import { provenDistances } from "../../lib/certify/projective-sources.ts";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { directedDual } from "../../lib/solve/projective/directed-dual.ts";
import { MovingSource } from "../../lib/solve/projective/moving-source.ts";
import { shortestPaths } from "../../lib/solve/projective/shortest-paths.ts";
import { distancesFrom, type Sphere, sphereOf } from "../oracle/sphere-distances.ts";
import { type EmbeddedGraph, smallEvenFace } from "../support/even-face.ts";

/** Costs of all kinds: many zeros, also all around a vertex; few sizes; many; large, so that sums or
 * costs themselves pass 32 bits. */
function someCosts(m: number, random: Random): Int32Array | Float64Array {
  const below = [2, 4, 20, 1000, 2 ** 30, 2 ** 40][random.below(6)], zeros = random.below(3);
  const costs = Array.from({ length: m }, () => random.below(3) < zeros ? 0 : random.below(below));
  return below < 2 ** 31 ? Int32Array.from(costs) : Float64Array.from(costs);
}

interface Case {
  readonly embedded: EmbeddedGraph;
  readonly dual: ReturnType<typeof directedDual>;
  readonly costs: Int32Array | Float64Array;
  /** The same sphere, its faces numbered as in `dual`. */
  readonly sphere: Sphere;
}

function someCase(random: Random): Case {
  const embedded = smallEvenFace(random, 20);
  const { graph, next } = embedded;
  const costs = someCosts(graph.m, random), dual = directedDual(next, new Meter());
  const { sphere, left } = sphereOf(graph, next, costs);
  expect(sphere.faces).toBe(2 * dual.pairs);
  const name = new Map(left.map((face, d) => [face, dual.sides[2 * d]]));
  expect(name.size).toBe(sphere.faces);
  const arcs = sphere.arcs.map(([x, y, c]) => [name.get(x)!, name.get(y)!, c] as const);
  return { embedded, dual, costs, sphere: { faces: sphere.faces, arcs } };
}

describe("MovingSource", () => {
  it("has all distances right after each move, wherever it goes: 1,500 spheres", () => {
    const random = new Random(71);
    for (let i = 0; i < 1500; i++) {
      const { embedded: { graph }, dual, costs, sphere } = someCase(random);
      const all = Array.from({ length: sphere.faces }, (_, x) => distancesFrom(sphere, x));
      const stops = Array.from({ length: 2 + random.below(8) }, () => random.below(sphere.faces));
      const there = (s: number, t: number) => all[s][t] + all[t][s];
      const range = stops.reduce((sum, x, k) => k > 0 ? sum + there(stops[k - 1], x) : 0, 0);
      const paths = shortestPaths(dual, costs, stops[0], new Meter());
      const source = new MovingSource(graph, dual, costs, paths, stops[0], range, new Meter());
      stops.forEach((x, k) => {
        if (k > 0) source.move(x, all[x][stops[k - 1]]);
        expect(Array.from(all, (_, y) => source.distance(y))).toEqual(all[x]);
        const y = random.below(sphere.faces);
        expect(source.path(y).reduce((sum, e) => sum + costs[e], 0)).toBe(all[x][y]);
        expect(source.bound(x)).toBe(all[x][x ^ 1]);
        expect(source.bound(y)).toBeLessThanOrEqual(all[y][y ^ 1]);
      });
    }
  });

  it("keeps its bounds when it is interrupted", () => {
    const random = new Random(72);
    let interrupted = 0;
    for (let i = 0; i < 2000; i++) {
      const { embedded: { graph }, dual, costs, sphere } = someCase(random);
      const [s, t] = [random.below(sphere.faces), random.below(sphere.faces)];
      const limit = distancesFrom(sphere, s)[t] + distancesFrom(sphere, t)[s];
      const paths = shortestPaths(dual, costs, s, new Meter());
      const meter = new Meter();
      const source = new MovingSource(graph, dual, costs, paths, s, limit, meter, 1);
      let left = random.below(12);
      meter.tick = () => {
        if (--left < 0) throw new Interrupted("stop");
      };
      try {
        source.move(t, distancesFrom(sphere, t)[s]);
      } catch (error) {
        expect(error).toBeInstanceOf(Interrupted);
        interrupted++;
      }
      for (let x = 0; x < sphere.faces; x++) {
        expect(source.bound(x)).toBeLessThanOrEqual(distancesFrom(sphere, x)[x ^ 1]);
      }
    }
    expect(interrupted).toBeGreaterThan(200);
  });
});

describe("provenDistances", () => {
  it("is exact where that is wanted, and never too large: 1,500 walks", () => {
    const random = new Random(73);
    for (let i = 0; i < 1500; i++) {
      const { embedded: { graph, next }, costs, sphere } = someCase(random);
      const play = {
        n: graph.n,
        ...neighbourLists(graph.n, graph.tails, graph.heads),
        weights: new Float64Array(graph.n),
        vertices: Int32Array.from({ length: graph.n }, (_, v) => v),
        nameOf: String,
        scratch: scratchFor(graph.n),
      };
      const inner = innerGraph(play);
      // Darts of the checker by ends; the graph is simple.
      const name = new Map<string, number>();
      for (let v = 0; v < graph.n; v++) {
        for (let d = inner.offsets[v]; d < inner.offsets[v + 1]; d++) {
          name.set(`${v} ${inner.targets[d]}`, d);
        }
      }
      const dartOf = (d: number) => {
        const [u, v] = [graph.tails[d >> 1], graph.heads[d >> 1]];
        return name.get(d % 2 === 0 ? `${u} ${v}` : `${v} ${u}`)!;
      };
      const rotation = new Int32Array(2 * graph.m);
      const own = Int32Array.from({ length: 2 * graph.m }, (_, d) => dartOf(d));
      for (let v = 0; v < graph.n; v++) {
        const begin = inner.offsets[v], degree = inner.offsets[v + 1] - begin;
        for (let k = 0, d = own.indexOf(begin); k < degree; k++, d = next[d]) {
          rotation[begin + k] = own[d] - begin;
        }
      }
      const dual = sphereDual(inner, rotation);
      const theirs = new Float64Array(graph.m);
      for (let d = 0; d < 2 * graph.m; d++) theirs[dual.edgeOf[own[d]]] = costs[d >> 1];
      const load = new Float64Array(graph.n);
      for (let e = 0; e < graph.m; e++) {
        load[graph.tails[e]] += costs[e];
        load[graph.heads[e]] += costs[e];
      }
      // From any face to any other, as far as the other may be.
      const ours = new Int32Array(sphere.faces);
      for (let d = 0; d < 2 * graph.m; d++) ours[dual.left[own[d]]] = sphere.arcs[d][1];
      const faces = random.shuffle(Int32Array.from({ length: sphere.faces }, (_, x) => x))
        .subarray(0, 1 + random.below(8));
      const all = Array.from(ours, (x) => distancesFrom(sphere, x));
      const before = (k: number) => faces[Math.max(k - 1, 0)];
      const there = Float64Array.from(faces, (x, k) => all[before(k)][ours[x]]);
      const back = Float64Array.from(faces, (x, k) => all[x][ours[before(k)]]);
      const exact = Array.from(faces, (x) => all[x][ours[x ^ 1]]);
      const proven = (wanted: number) =>
        Array.from(provenDistances(inner, dual, theirs, load, { faces, there, back }, wanted));
      expect(proven(Infinity)).toEqual(exact);
      const wanted = Math.min(...exact);
      proven(wanted).forEach((distance, k) => {
        expect(distance >= wanted && distance <= exact[k]).toBe(true);
      });
    }
  });
});
