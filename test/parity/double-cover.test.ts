import { describe, expect, it } from "vitest";
import { components } from "../../lib/graph/components.ts";
import {
  dartEnd,
  dartStart,
  eulerGenus,
  isRotationSystem,
  mirrored,
  signedEulerGenus,
} from "../../lib/graph/embedding.ts";
import { twoColouring } from "../../lib/graph/two-colouring.ts";
import { doubleCover, liftDart, liftRotation } from "../../lib/parity/double-cover.ts";
import { Random } from "../../lib/run/random.ts";
import { randomConnectedGraph } from "../support/random-graphs.ts";

describe("doubleCover", () => {
  it("lifts darts to where they start, and swaps sheets by flipping the last bit", () => {
    const random = new Random(41);
    for (let t = 0; t < 200; t++) {
      const graph = randomConnectedGraph(random, 2 + random.below(8), random.below(8));
      const signed = random.below(2) === 0;
      const even = Uint8Array.from(graph.tails, () => signed ? random.below(2) : 0);
      const cover = doubleCover(graph, signed ? even : undefined);
      expect(cover.n).toBe(2 * graph.n);
      const seen = new Set<number>();
      for (let d = 0; d < 2 * graph.m; d++) {
        const odd = even[d >> 1] === 0 ? 1 : 0;
        for (const sheet of [0, 1]) {
          const lifted = liftDart(d, sheet, odd);
          seen.add(lifted);
          expect(dartStart(cover, lifted)).toBe(2 * dartStart(graph, d) + sheet);
          expect(dartEnd(cover, lifted)).toBe(2 * dartEnd(graph, d) + (sheet ^ odd));
          expect(liftDart(d, 1 - sheet, odd)).toBe(lifted ^ 2);
          expect(liftDart(d ^ 1, sheet ^ odd, odd)).toBe(lifted ^ 1);
        }
      }
      expect(seen.size).toBe(4 * graph.m);
      if (!signed) {
        const bipartite = twoColouring(graph).side !== undefined;
        expect(components(cover).count).toBe(bipartite ? 2 : 1);
        expect(twoColouring(cover).side !== undefined).toBe(true);
      }
    }
  });

  it("lifts a signed embedding to its orientable double cover: twice the Euler genus less two", () => {
    const random = new Random(42);
    let projective = 0;
    for (let t = 0; t < 800; t++) {
      const graph = randomConnectedGraph(random, 2 + random.below(6), random.below(6));
      const even = Uint8Array.from(graph.tails, () => random.below(2));
      const next = new Int32Array(2 * graph.m);
      for (let v = 0; v < graph.n; v++) {
        const around: number[] = [];
        for (let d = 0; d < 2 * graph.m; d++) if (dartStart(graph, d) === v) around.push(d);
        random.shuffle(around).forEach((d, i) => next[d] = around[(i + 1) % around.length]);
      }
      const cover = doubleCover(graph, even), coverNext = liftRotation(next, even);
      expect(isRotationSystem(cover, coverNext)).toBe(true);
      // The swap reverses orientation.
      const mirror = mirrored(coverNext);
      expect(mirror.every((e, d) => e === (coverNext[d ^ 2] ^ 2))).toBe(true);
      const genus = signedEulerGenus(graph, { next, twisted: even.map((x) => 1 - x) });
      const sheets = components(cover).count;
      // Euler characteristics double; one sheet pair is one surface or two copies of H's own.
      expect(2 * sheets - eulerGenus(cover, coverNext)).toBe(2 * (2 - genus));
      if (genus === 1) projective++;
    }
    expect(projective).toBeGreaterThan(100);
  });
});
