/** Runs that move to a worker thread: only Deno has the workers of the web standard. */
import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { runAside } from "../../lib/run/aside.ts";
import type { Progress } from "../../lib/run/options.ts";
import { Random } from "../../lib/run/random.ts";
import { solve } from "../../lib/solve/solve.ts";
import { leastDelayMs, PROMISED_MS } from "../support/effort.ts";
import { randomRegularGraph, randomWeights } from "../support/random-graphs.ts";

function sparseInstance(n: number, d: number): Instance {
  const random = new Random(2);
  const graph = randomRegularGraph(random, n, d);
  return Instance.from({
    items: Array.from(
      randomWeights(random, n, 1000, 1100),
      (weight, v) => ({ id: `v${v}`, weight }),
    ),
    conflicts: Array.from(graph.tails, (u, e) => [`v${u}`, `v${graph.heads[e]}`] as const),
  });
}

describe("a run in a worker", () => {
  it("stops within a fifth of a second of the signal, with the best so far", async () => {
    const instance = sparseInstance(600, 4);
    const delay = await leastDelayMs(async () => {
      const controller = new AbortController();
      let askedAt = Infinity;
      setTimeout(() => {
        askedAt = performance.now();
        controller.abort();
      }, 1500);
      const reports: Progress[] = [];
      const solution = await solve(instance, {
        signal: controller.signal,
        onProgress: (p) => reports.push(p),
      });
      const took = performance.now() - askedAt;
      expect(solution.status).toBe("feasible");
      expect(solution.weight).toBeLessThan(solution.upperBound);
      expect(reports.length).toBeGreaterThan(1);
      for (const { lower, upper } of reports) {
        if (lower !== undefined && upper !== undefined) expect(lower).toBeLessThanOrEqual(upper);
      }
      return took;
    });
    expect(delay).toBeLessThanOrEqual(PROMISED_MS);
  });

  it("stops at the time limit", async () => {
    const solution = await solve(sparseInstance(600, 4), { timeLimitMs: 1000 });
    expect(solution.elapsedMs).toBeGreaterThan(1000);
    expect(solution.status).toBe("feasible");
  });

  it("gives what the same run gives in this thread", async () => {
    const instance = sparseInstance(100, 3);
    const aside = await solve(instance, { workers: 1 });
    const here = await solve(instance, { workers: 0 });
    expect([here.status, aside.status]).toEqual(["optimal", "optimal"]);
    expect(aside.chosen).toEqual(here.chosen);
    expect(check(instance, aside).valid).toBe(true);
  });

  it("passes failures on", async () => {
    const entry = new URL("../../lib/worker.ts", import.meta.url);
    await expect(runAside(entry, "no such job", {}, {})).rejects.toThrow(
      'no job called "no such job"',
    );
  });
});
