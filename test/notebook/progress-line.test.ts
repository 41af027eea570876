import { describe, expect, it } from "vitest";
import type { Kernel } from "../../lib/notebook/kernel.ts";
import { kernel } from "../../lib/notebook/kernel.ts";
import { ProgressLine, progressText } from "../../lib/notebook/progress-line.ts";
import { inFakeKernel, type Message } from "./fake-kernel.ts";

/** Feeds a line with a report each `step` ms for `total` ms, then finishes it. */
async function run(step: number, total: number): Promise<Message[]> {
  return await inFakeKernel(async () => {
    let now = 0;
    const line = new ProgressLine(kernel() as Kernel, "solve", () => now);
    for (; now < total; now += step) {
      line.report({ phase: "search", done: now, elapsedMs: now, lower: 5, upper: 9 });
    }
    await line.finish("done");
  });
}

describe("ProgressLine", () => {
  it("stays away from quick runs", async () => {
    expect(await run(10, 290)).toEqual([]);
  });

  it("appears once, is rewritten in place ten times a second, and ends with a last word", async () => {
    const sent = await run(1, 2300);
    expect(sent[0].type).toBe("display_data");
    expect(sent.slice(1).every((m) => m.type === "update_display_data")).toBe(true);
    expect(new Set(sent.map((m) => m.id)).size).toBe(1);
    expect(sent.length).toBe(21);
    expect(sent[20].data["text/plain"]).toBe("solve: done after 2.3 s");
  });

  it("uses a new display for each run", async () => {
    const [a] = await run(50, 400), [b] = await run(50, 400);
    expect(a.id === b.id).toBe(false);
  });
});

describe("progressText", () => {
  it("says what is known and no more", () => {
    const common = { phase: "parts", done: 3, elapsedMs: 1500 };
    expect(progressText("solve", common)).toBe("solve: parts · 3 · 1.5 s");
    expect(progressText("solve", { ...common, total: 1200, lower: 5, upper: 9 }))
      .toBe("solve: parts · 3 of 1,200 · between 5 and 9 · 1.5 s");
    expect(progressText("solve", { ...common, done: 0, upper: 9 }))
      .toBe("solve: parts · at most 9 · 1.5 s");
    expect(progressText("solve", { ...common, done: 0, lower: 9 }))
      .toBe("solve: parts · at least 9 · 1.5 s");
  });
});
