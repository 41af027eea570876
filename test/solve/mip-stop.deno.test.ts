import { describe, expect, it } from "vitest";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { mip } from "../../lib/solve/mip.ts";
import { isStable, weightOf } from "../oracle/brute-force.ts";
import { leastDelayMs, PROMISED_MS } from "../support/effort.ts";
import { randomRegularGraph } from "../support/random-graphs.ts";

const graph = randomRegularGraph(new Random(1), 400, 6);
const weights = new Float64Array(400).fill(1);
const labels = Int32Array.from({ length: 400 }, (_, v) => v);

describe("the mixed-integer solver in its worker", () => {
  it("ends within 200 ms of a time limit with a verified set and both bounds", async () => {
    const delay = await leastDelayMs(async () => {
      const began = performance.now();
      const solved = await mip({ graph, weights, labels }, new Meter({ timeLimitMs: 3000 }));
      const took = performance.now() - began;
      expect(took > 2000).toBe(true);
      expect(solved.status).toBe("feasible");
      expect(isStable(graph, solved.chosen)).toBe(true);
      expect(weightOf(weights, solved.chosen)).toBe(solved.weight);
      expect(solved.weight > 120).toBe(true);
      expect(solved.upperBound >= solved.weight).toBe(true);
      return took - 3000;
    });
    expect(delay <= PROMISED_MS).toBe(true);
  });

  it("ends within 200 ms of a signal", async () => {
    const delay = await leastDelayMs(async () => {
      const controller = new AbortController();
      let abortedAt = Infinity;
      setTimeout(() => {
        abortedAt = performance.now();
        controller.abort();
      }, 1500);
      const meter = new Meter({ signal: controller.signal });
      const solved = await mip({ graph, weights, labels }, meter);
      const took = performance.now() - abortedAt;
      expect(Number.isFinite(took)).toBe(true);
      expect(solved.weight > 120).toBe(true);
      return took;
    });
    expect(delay <= PROMISED_MS).toBe(true);
  });
});
