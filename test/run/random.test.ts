import { describe, expect, it } from "vitest";
import { exactAdd, exactSum } from "../../lib/run/exact.ts";
import { Random } from "../../lib/run/random.ts";

describe("seeded random numbers", () => {
  it("repeat with the seed and differ between seeds, above 2^32 too", () => {
    const first = (seed: number) =>
      Array.from({ length: 8 }, ((r) => () => r.bits())(new Random(seed)));
    expect(first(7)).toEqual(first(7));
    expect(first(7)).not.toEqual(first(8));
    expect(first(7)).not.toEqual(first(7 + 2 ** 32));
  });

  it("fill their range evenly: chi-square of 16 classes over 160,000 draws", () => {
    const random = new Random(3);
    const counts = new Float64Array(16);
    for (let i = 0; i < 160_000; i++) counts[random.below(16)]++;
    const chi = counts.reduce((sum, c) => sum + (c - 10_000) ** 2 / 10_000, 0);
    // 15 degrees of freedom: above 37.7 with probability 0.001 (any table of the distribution).
    expect(chi).toBeLessThan(37.7);
  });

  it("shuffle into every order of three about equally often", () => {
    const random = new Random(5);
    const counts = new Map<string, number>();
    for (let i = 0; i < 6000; i++) {
      const order = random.shuffle([0, 1, 2]).join("");
      counts.set(order, (counts.get(order) ?? 0) + 1);
    }
    expect(counts.size).toBe(6);
    for (const count of counts.values()) expect(Math.abs(count - 1000)).toBeLessThan(150);
  });
});

describe("exact sums", () => {
  it("refuse what leaves the range below 2^53", () => {
    expect(exactSum([2 ** 52, 2 ** 52 - 1])).toBe(2 ** 53 - 1);
    expect(() => exactSum([2 ** 52, 2 ** 52])).toThrow(RangeError);
    expect(() => exactAdd(-(2 ** 53) + 1, -1)).toThrow(RangeError);
  });
});
