import { describe, expect, it } from "vitest";
import {
  type Conflict,
  distanceConflicts,
  EARTH_RADIUS_METRES,
  overlapConflicts,
  sharedConflicts,
} from "../../lib/instance/mod.ts";
import { Random } from "../../lib/run/random.ts";
import { haversine, nearPairs, overlappingPairs } from "../oracle/close-rows.ts";
import { effortMs } from "../support/effort.ts";
import { problemsOf } from "../support/thrown.ts";

/** Pairs as "i j", i < j, for ids that are indices; a pair given twice stays twice. */
function pairs(conflicts: readonly Conflict[]): string[] {
  return conflicts.map((conflict) => {
    const [a, b] = "between" in conflict ? conflict.between : conflict;
    return `${Math.min(+a, +b)} ${Math.max(+a, +b)}`;
  }).sort();
}

function reasons(conflicts: readonly Conflict[]): unknown[] {
  return conflicts.map((conflict) => "between" in conflict ? conflict.reason : undefined);
}

describe("overlapConflicts", () => {
  it("agrees with comparing all pairs", () => {
    const random = new Random(21);
    for (let round = 0; round < 3000; round++) {
      const rows = Array.from({ length: random.below(12) }, (_, id) => {
        const start = random.below(20);
        return { id, start, end: start + random.below(6), resource: random.below(3) };
      });
      const gap = random.below(2) * random.below(5);
      const built = overlapConflicts(rows, {
        start: "start",
        end: "end",
        resource: "resource",
        gap,
      });
      expect(pairs(built)).toEqual(overlappingPairs(rows, gap));
      const all = overlapConflicts(rows, { start: "start", end: (r) => r.end, gap });
      expect(pairs(all)).toEqual(overlappingPairs(rows.map((r) => ({ ...r, resource: 0 })), gap));
    }
  });

  it("says what is shared, and between when", () => {
    const rows = [
      { id: 1, from: "18:00", to: "19:30", pitch: 7 },
      { id: 2, from: "18:30", to: "19:00", pitch: 7 },
      { id: 3, from: "19:40", to: "20:00", pitch: 7 },
      { id: 4, from: "18:00", to: "20:00", pitch: 8 },
    ];
    const options = { start: "from", end: "to", resource: "pitch" };
    expect(reasons(overlapConflicts(rows, options))).toEqual([
      "share pitch 7 between 18:30 and 19:00",
    ]);
    expect(reasons(overlapConflicts(rows, { ...options, gap: 15 * 60000 }))).toEqual([
      "share pitch 7 between 18:30 and 19:00",
      "less than 15 min between 19:30 and 19:40 on pitch 7",
    ]);
    const asked = overlapConflicts(rows, { ...options, reason: (a, b) => `${a.id} and ${b.id}` });
    expect(reasons(asked)).toEqual(["1 and 2"]);
    expect(reasons(overlapConflicts(rows.slice(0, 2), { start: "from", end: "to" }))).toEqual([
      "overlap between 18:30 and 19:00",
    ]);
  });

  it("reads Dates, ISO dates with and without zones, and numbers as text", () => {
    const rows = [
      { id: 0, from: new Date(Date.UTC(2026, 5, 1, 18)), to: "2026-06-01T19:00Z" },
      { id: 1, from: "2026-06-01T20:59+02:00", to: "2026-06-01 23:00:00.5" },
      { id: 2, from: "2026-06-01T15:00:00-04:00", to: "2026-06-02" },
    ];
    const built = overlapConflicts(rows, { start: "from", end: "to" });
    expect(pairs(built)).toEqual(["0 1", "1 2"]);
    expect(reasons(built)[0]).toBe(
      "overlap between 2026-06-01 20:59+02:00 and 2026-06-01 19:00Z",
    );
    const numbers = [{ id: 0, s: "1", e: "2.5" }, { id: 1, s: 2, e: " 3e0 " }];
    expect(pairs(overlapConflicts(numbers, { start: "s", end: "e" }))).toEqual(["0 1"]);
  });

  it("refuses what it cannot read, all at once", async () => {
    const rows = [
      { id: 1, s: "18:00", e: "17:30" },
      { id: 2, s: 3, e: "soon" },
      { id: "", s: "25:00", e: "18:61" },
      { id: 4, s: "2026-02-30", e: null },
    ];
    const call = () => overlapConflicts(rows, { start: "s", end: "e", resource: "q", gap: -1 });
    expect(await problemsOf(call)).toEqual([
      "gap: expected a number >= 0, got -1",
      'no column "q"; the columns are "id", "s", "e"',
      'row 3: id ""; expected a non-empty text',
      "row 1 (1): ends at 17:30, before it starts at 18:00; expected an end not before the start",
      "row 2 (2): s 3 is a number; expected a time of day, as in row 1",
      'row 2 (2): e "soon"; expected a number, a date or a time',
      'row 3 (): s "25:00"; expected a number, a date or a time',
      'row 3 (): e "18:61"; expected a number, a date or a time',
      'row 4 (4): s "2026-02-30"; expected a number, a date or a time',
      "row 4 (4): e null; expected a number, a date or a time",
    ]);
  });

  it("takes 200,000 intervals in less than two seconds", () => {
    const random = new Random(1);
    const rows = Array.from({ length: 200000 }, (_, id) => {
      const start = random.below(1000000);
      return { id, start, end: start + 1 + random.below(40), pitch: random.below(20) };
    });
    let built: Conflict[] = [];
    const ms = effortMs(() => {
      built = overlapConflicts(rows, { start: "start", end: "end", resource: "pitch" });
    }, 3);
    expect(ms).toBeLessThan(2000);
    expect(built.length).toBeGreaterThan(1000);
  });
});

describe("distanceConflicts", () => {
  const columns = { x: "x", y: "y" };

  it("agrees with comparing all pairs in the plane", () => {
    const random = new Random(22);
    for (let round = 0; round < 2000; round++) {
      const size = [1, 10, 1e6, 1e-6][random.below(4)];
      const rows = Array.from({ length: random.below(30) }, (_, id) => ({
        id,
        x: (random.below(40) - 20) * size,
        y: (random.below(40) - 20) * size,
      }));
      const within = random.below(12) * size;
      expect(pairs(distanceConflicts(rows, { ...columns, within }))).toEqual(
        nearPairs(rows, within),
      );
    }
  });

  it("agrees with the haversine formula on the sphere, poles and date line included", () => {
    const random = new Random(23);
    for (let round = 0; round < 2000; round++) {
      const around = [[0, 0], [180, 10], [40, 89.9], [-100, -90], [179.99, -45]][random.below(5)];
      const spread = [200, 5, 0.2, 0.001][random.below(4)];
      const rows = Array.from({ length: random.below(25) }, (_, id) => ({
        id,
        x: around[0] + (random.unit() - 0.5) * spread * 2,
        y: Math.max(-90, Math.min(90, around[1] + (random.unit() - 0.5) * spread)),
      }));
      const within = random.unit() * spread * 60000;
      const expected: string[] = [];
      let close = false;
      for (let j = 0; j < rows.length; j++) {
        for (let i = 0; i < j; i++) {
          const metres = haversine(rows[i], rows[j], EARTH_RADIUS_METRES);
          close ||= Math.abs(metres - within) < 1e-3;
          if (metres <= within) expected.push(`${i} ${j}`);
        }
      }
      if (close) continue;
      const built = distanceConflicts(rows, { ...columns, within, metric: "sphere" });
      expect(pairs(built)).toEqual(expected.sort());
    }
  });

  it("knows poles and the date line", () => {
    const rows = [
      { id: 0, x: 0, y: 90 },
      { id: 1, x: 123, y: 90 },
      { id: 2, x: 179.9995, y: 0 },
      { id: 3, x: -179.9995, y: 0 },
      { id: 4, x: 540.0005, y: 0 },
    ];
    const built = distanceConflicts(rows, { ...columns, within: 200, metric: "sphere" });
    expect(pairs(built)).toEqual(["0 1", "2 3", "2 4", "3 4"]);
    const [pole, ...line] = reasons(built).sort();
    expect(pole).toBe("0 m apart, within 200 m");
    expect(line).toContain("111 m apart, within 200 m");
    const half = { ...columns, within: 21000000, metric: "sphere" as const };
    expect(distanceConflicts(rows, half).length).toBe(10);
  });

  it("takes a distance of zero, and many rows in one place or far apart", () => {
    const rows = [{ id: 0, x: 1, y: 1 }, { id: 1, x: 1, y: 1 }, { id: 2, x: 1, y: 2 }];
    expect(pairs(distanceConflicts(rows, { ...columns, within: 0 }))).toEqual(["0 1"]);
    const far = [{ id: 0, x: -1e300, y: 0 }, { id: 1, x: 1e300, y: 0 }, { id: 2, x: 1e300, y: 1 }];
    expect(pairs(distanceConflicts(far, { ...columns, within: 1 }))).toEqual(["1 2"]);
  });

  it("refuses what it cannot read, all at once", async () => {
    const rows = [{ id: 1, x: "one", y: 91 }, { id: 2, x: "", y: Infinity }];
    const options = { ...columns, within: NaN, metric: "sphere" as const };
    expect(await problemsOf(() => distanceConflicts(rows, options))).toEqual([
      "within: expected a finite number >= 0, got NaN",
      'row 1 (1): x "one"; expected a finite number',
      "row 1 (1): y 91; expected a latitude from -90 to 90 degrees",
      'row 2 (2): x ""; expected a finite number',
      "row 2 (2): y Infinity; expected a finite number",
    ]);
  });

  it("takes 200,000 points in a few seconds", () => {
    const random = new Random(2);
    const rows = Array.from({ length: 200000 }, (_, id) => ({
      id,
      x: random.unit() * 360 - 180,
      y: Math.asin(2 * random.unit() - 1) * 180 / Math.PI,
    }));
    let built: Conflict[] = [];
    const ms = effortMs(() => {
      built = distanceConflicts(rows, { ...columns, within: 20000, metric: "sphere" });
    });
    expect(ms).toBeLessThan(10000);
    // Expected 200000²/2 · (1 - cos(20/6371)) / 2, about 49,000.
    expect(Math.abs(built.length - 49270)).toBeLessThan(1500);
  });
});

describe("sharedConflicts", () => {
  it("makes a clique of each group and leaves out rows without one", () => {
    const rows = [
      { id: 0, customer: 12 },
      { id: 1, customer: "12" },
      { id: 2, customer: "" },
      { id: 3, customer: null },
      { id: 4, customer: 12 },
      { id: 5, customer: 0 },
      { id: 6, customer: 0 },
    ];
    const built = sharedConflicts(rows, { by: "customer" });
    expect(pairs(built)).toEqual(["0 1", "0 4", "1 4", "5 6"]);
    expect(reasons(built)).toEqual([
      "share customer 12",
      "share customer 12",
      "share customer 12",
      "share customer 0",
    ]);
  });

  it("takes lists, functions and a reason", () => {
    const rows = [{ id: 0, p: 1 }, { id: 1, p: 2 }, { id: 2, p: 4 }, { id: 3, p: 3 }];
    const by = (row: Readonly<Record<string, unknown>>) => [Number(row.p) - 1, row.p, row.p];
    const built = sharedConflicts(rows, { by, reason: "share a generator" });
    expect(pairs(built)).toEqual(["0 1", "1 3", "2 3"]);
    expect(new Set(reasons(built))).toEqual(new Set(["share a generator"]));
    expect(reasons(sharedConflicts(rows, { by: () => "x" }))[0]).toBe("share x");
  });

  it("refuses a column that is not there", async () => {
    expect(await problemsOf(() => sharedConflicts([{ id: 1 }], { by: "group" }))).toEqual([
      'no column "group"; the columns are "id"',
    ]);
  });
});
