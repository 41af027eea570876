import { describe, expect, it } from "vitest";
import { drawConflicts } from "../../lib/display/conflict-picture.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { markupProblem } from "../support/markup.ts";
import { smallMarket } from "../support/quay.ts";
import { firstFit } from "../support/solutions.ts";

/** An odd cycle of five with a path of blocks hanging on it. */
const instance = Instance.from({
  items: Array.from({ length: 40 }, (_, i) => ({ id: `v${i}`, weight: i })),
  conflicts: Array.from(
    { length: 40 },
    (_, i) => [`v${i === 4 ? 0 : Math.max(0, i - 1)}`, `v${i}`] as const,
  ).slice(1)
    .concat([["v4", "v3"]]),
});
const count = (svg: string, what: RegExp) => svg.match(what)?.length ?? 0;

describe("drawConflicts", () => {
  it("draws every item and every conflict", () => {
    const market = smallMarket(6, 5, 2);
    const { svg, title } = drawConflicts(market, { solution: firstFit(market) });
    expect(count(svg, /<line /g)).toBe(market.conflictCount);
    expect(count(svg, /<circle [^>]*><title>/g)).toBe(30);
    expect(title).toBe("30 items and 49 conflicts.");
    expect(markupProblem(svg)).toBe(undefined);
  });

  it("draws the edges of odd cycles strong, once each", () => {
    const { svg } = drawConflicts(instance, { cycles: [["v0", "v1", "v2", "v3", "v4"]] });
    expect(count(svg, /stroke-linecap="round"/g)).toBe(5);
  });

  it("draws some items only", () => {
    const { title } = drawConflicts(instance, { items: ["v10", "v11", "v12", "v30"] });
    expect(title).toBe("4 items and 2 conflicts.");
  });

  it("fills blocks by turns", () => {
    const blocks = Array.from({ length: 12 }, (_, b) => [`v${5 + 2 * b}`, `v${6 + 2 * b}`]);
    const { svg, title } = drawConflicts(instance, { blocks });
    expect(title).toContain("12 blocks beside the core");
    expect(svg).toContain("blocks, colours by turns");
    expect(new Set(svg.match(/fill="#[0-9a-f]{6}"(?=><title>)/g)).size).toBe(7);
  });

  it("places items by their columns x and y", () => {
    const placed = Instance.from({
      items: [
        { id: "a", weight: 1, x: "0", y: "0" },
        { id: "b", weight: 1, x: "10", y: "0" },
        { id: "c", weight: 1, x: "10", y: "5" },
      ],
      conflicts: [],
    });
    const at = [...drawConflicts(placed).svg.matchAll(/cx="([\d.]+)" cy="([\d.]+)"[^>]*><title>/g)]
      .map((m) => [Number(m[1]), Number(m[2])]);
    expect(at[0][1]).toBe(at[1][1]);
    expect(at[2][1]).toBeLessThan(at[1][1]);
    expect(at[1][0]).toBe(at[2][0]);
  });

  it("refuses ids that do not exist and cycles that are none", () => {
    expect(() => drawConflicts(instance, { items: ["v0", "nobody"] })).toThrow(/"nobody"/);
    expect(() => drawConflicts(instance, { cycles: [["v0", "v9", "v20"]] })).toThrow(/no conflict/);
  });
});
