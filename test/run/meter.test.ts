import { describe, expect, it } from "vitest";
import { Interrupted, Meter } from "../../lib/run/meter.ts";
import type { Progress } from "../../lib/run/options.ts";

/** Ticks until the meter runs out; returns the reason and the units counted. */
function exhaust(meter: Meter, most: number): { reason: string; units: number } {
  for (let units = 1; units <= most; units++) {
    try {
      meter.tick();
    } catch (error) {
      return { reason: (error as Interrupted).reason, units };
    }
  }
  return { reason: "none", units: most };
}

describe("the meter", () => {
  it("ends a budget of work after exactly so many units, also from within another", () => {
    const meter = new Meter();
    expect(exhaust(meter.within(1000), 5000)).toEqual({ reason: "work", units: 1001 });
    const outer = meter.within(300);
    expect(exhaust(outer.within(1000), 5000)).toEqual({ reason: "work", units: 301 });
    expect(outer.remainingWork).toBeLessThanOrEqual(0);
    expect(outer.interruption).toBe("work");
    expect(meter.interruption).toBe(undefined);
  });

  it("notices the time limit by its clock alone", () => {
    let now = 0;
    const meter = new Meter({ timeLimitMs: 50 }, undefined, () => now);
    expect(meter.interruption).toBe(undefined);
    now = 49;
    expect(meter.remainingMs).toBe(1);
    meter.look();
    now = 50;
    expect(meter.interruption).toBe("time");
    expect(() => meter.look()).toThrow(Interrupted);
    expect(exhaust(meter, 1 << 20).reason).toBe("time");
  });

  it("sees a stop through a signal and through shared memory", () => {
    const controller = new AbortController();
    const bySignal = new Meter({ signal: controller.signal });
    const flag = new Int32Array(new SharedArrayBuffer(4));
    const byFlag = new Meter({}, flag);
    const part = byFlag.within(1e9).reporting((p) => p);
    expect([bySignal.interruption, part.interruption]).toEqual([undefined, undefined]);
    controller.abort();
    Atomics.store(flag, 0, 1);
    expect([bySignal.interruption, part.interruption]).toEqual(["stop", "stop"]);
  });

  it("reports at most ten times a second, and lets a part's reports be rewritten", () => {
    let now = 0;
    const seen: Progress[] = [];
    const meter = new Meter({ onProgress: (p) => seen.push(p) }, undefined, () => now);
    for (; now < 1000; now++) meter.report("count", { done: now });
    expect(seen.length).toBe(10);
    meter.reporting((p) => ({ ...p, lower: 100 + (p.lower ?? 0) }))
      .report("part", { done: 1, lower: 7 }, true);
    expect(seen.at(-1)).toEqual({ phase: "part", done: 1, lower: 107, elapsedMs: 1000 });
  });

  it("refuses options that mean nothing, all at once", () => {
    expect(() => new Meter({ timeLimitMs: -1, seed: 0.5, workers: -2 }))
      .toThrow(/timeLimitMs.*seed.*workers/);
    expect(() => new Meter({ timeLimitMs: NaN })).toThrow(RangeError);
  });
});
