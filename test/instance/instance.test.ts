import { describe, expect, it } from "vitest";
import { type Conflict, Instance } from "../../lib/instance/mod.ts";
import { InstanceError } from "../../lib/run/errors.ts";
import { Random } from "../../lib/run/random.ts";
import { effortMs } from "../support/effort.ts";
import { problemsOf } from "../support/thrown.ts";

const items = [{ id: "a", weight: 3 }, { id: "b", weight: "1.5" }, { id: "c", weight: 2n }];

describe("an instance", () => {
  it("keeps rows, scales weights and sorts conflicts by index", () => {
    const rows = [{ id: "b", weight: 1, trade: "tea" }, { id: "a", weight: 2 }, {
      id: "c",
      weight: 3,
    }];
    const one = Instance.from({ items: rows, conflicts: [["c", "a"], ["a", "b"], ["c", "b"]] });
    expect(one.items).toEqual(rows);
    expect([...one.graph.tails]).toEqual([0, 0, 1]);
    expect([...one.graph.heads]).toEqual([1, 2, 2]);
    expect([...one.canonical.order]).toEqual([1, 0, 2]);
    expect([...one.canonical.rank]).toEqual([1, 0, 2]);
    expect([one.indexOf("c"), one.indexOf("z")]).toEqual([2, -1]);
  });

  it("merges duplicate conflicts, keeps their reasons and notes it", () => {
    const one = Instance.from({
      items,
      conflicts: [
        ["a", "b"],
        { between: ["b", "a"], reason: "same table" },
        { between: ["a", "b"], reason: ["same hour", "same table"] },
        { between: ["b", "c"], reason: "same hour" },
      ],
    });
    expect(one.conflictCount).toBe(2);
    expect(one.reasonsOf(0)).toEqual(["same table", "same hour"]);
    expect(one.reasonsOf(1)).toEqual(["same hour"]);
    expect(one.notes).toEqual([
      "2 duplicate conflicts merged, reasons kept: a and b (conflicts row 1, conflicts row 2, " +
      "conflicts row 3)",
    ]);
  });

  it("allows weights of zero or less and notes them", () => {
    const one = Instance.from({
      items: [{ id: "a", weight: 0 }, { id: "b", weight: -2 }, { id: "c", weight: 1 }],
      conflicts: [],
    });
    expect(one.notes).toEqual([
      "2 items have a weight of zero or less and are never chosen: items row 1 (a), items row 2 (b)",
    ]);
  });

  it("takes numbers as ids and other columns for id and weight", () => {
    const one = Instance.from({
      items: [{ code: 7, price: 2 }, { code: "8", price: 3 }],
      conflicts: [["7", "8"]],
      id: "code",
      weight: "price",
    });
    expect(one.ids).toEqual(["7", "8"]);
    expect(one.columns).toEqual({ id: "code", weight: "price" });
  });

  it("tells itself in a few lines", () => {
    const one = Instance.from({ name: "stalls", unit: "euros", items, conflicts: [["a", "b"]] });
    const [first, second] = String(one).split("\n");
    expect(first).toBe("stalls: 3 items, 1 conflicts, 6.5 euros in all");
    expect(second).toBe(`fingerprint ${one.fingerprint.slice(0, 16)}`);
  });
});

describe("bad input", () => {
  const cases: [string, object[], unknown[], string[]][] = [
    ["duplicate id", [...items, { id: "a", weight: 1 }], [], [
      'items row 4: id "a" used before (items row 1)',
    ]],
    ["unknown id in a conflict", items, [["a", "q"]], [
      'conflicts row 1: unknown id "q"; expected the id of an item',
    ]],
    ["an item in conflict with itself", items, [["a", "b"], ["b", "b"]], [
      'conflicts row 2: item "b" in conflict with itself',
    ]],
    ["missing weight", [{ id: "a", weight: 1 }, { id: "b" }], [], [
      "items row 2 (b): weight missing; expected a number",
    ]],
    ["non-numeric weight", [{ id: "a", weight: "much" }], [], [
      'items row 1 (a): weight "much"; expected a number',
    ]],
    ["NaN", [{ id: "a", weight: NaN }], [], [
      "items row 1 (a): weight NaN; expected a finite number",
    ]],
    ["infinity", [{ id: "a", weight: -Infinity }], [], [
      "items row 1 (a): weight -Infinity; expected a finite number",
    ]],
    ["an empty table", [], [], ["items: the table is empty; expected at least one row"]],
    ["a missing column", [{ name: "a", weight: 1 }], [["a", "b"]], [
      'items: no column "id" for the id; the columns are "name", "weight"',
    ]],
    ["weights whose sum passes 2^53", [{ id: "a", weight: "900719925474099.05" }], [], [
      "weights: the sum of the weights passes 2^53 at 2 decimals, too large to stay exact; the " +
      "largest scale that fits is 10^1: round the weights to 1 decimal",
    ]],
    ["an empty id", [{ id: "", weight: 1 }, { id: null, weight: 1 }, { id: {}, weight: 1 }], [], [
      "items row 1: id missing; expected a non-empty text",
      "items row 2: id missing; expected a non-empty text",
      "items row 3: id {}; expected a non-empty text or a number",
    ]],
    [
      "rows that are no objects",
      [items[0], 5 as unknown as object, null as unknown as object],
      [],
      [
        "items row 2: expected an object with named columns, got 5",
        "items row 3: expected an object with named columns, got null",
        "items row 2: id missing; expected a non-empty text",
        "items row 3: id missing; expected a non-empty text",
        "items row 2: weight missing; expected a number",
        "items row 3: weight missing; expected a number",
      ],
    ],
    ["conflicts that are no pairs", items, [["a"], "ab", null, { between: ["a", ""] }], [
      'conflicts row 1: expected two ids, got ["a"]',
      'conflicts row 2: expected two ids, got "ab"',
      "conflicts row 3: expected two ids, got null",
      'conflicts row 4: expected two ids, got ["a",""]',
    ]],
  ];
  for (const [name, rows, conflicts, expected] of cases) {
    it(`is refused: ${name}`, async () => {
      const input = { items: rows, conflicts: conflicts as Conflict[] };
      expect(await problemsOf(() => Instance.from(input))).toEqual(expected);
    });
  }

  it("is reported all at once", async () => {
    const problems = await problemsOf(() =>
      Instance.from({
        items: [{ id: "a", weight: "x" }, { id: "a", weight: 1 }, { id: "b", weight: "9e15" }, {
          id: "c",
          weight: 1e15,
        }],
        conflicts: [["a", "q"], ["b", "b"], ["r", "s"]],
      })
    );
    expect(problems.length).toBe(7);
  });

  it("lists thousands of problems, and spells out the first twenty", () => {
    const rows = Array.from({ length: 5000 }, (_, i) => ({ id: `i${i}`, weight: "?" }));
    try {
      Instance.from({ items: rows, conflicts: [] });
      throw new Error("not refused");
    } catch (error) {
      expect(error).toBeInstanceOf(InstanceError);
      expect((error as InstanceError).problems.length).toBe(5000);
      expect((error as InstanceError).message).toContain("… and 4980 more");
    }
  });

  it("is refused where the arrays are missing", async () => {
    const nothing = {} as { items: object[]; conflicts: Conflict[] };
    expect(await problemsOf(() => Instance.from(nothing))).toEqual([
      "items: expected an array of rows, got nothing",
      "conflicts: expected an array of pairs of ids, got nothing",
    ]);
  });
});

describe("size", () => {
  it("builds a million items with a million conflicts in a few seconds", () => {
    const n = 1000000;
    const rows = Array.from({ length: n }, (_, i) => ({ id: `item${i}`, weight: (i % 997) / 100 }));
    const conflicts = rows.map((row, i): Conflict => [row.id, rows[(i + 1) % n].id]);
    let one = Instance.from({ items: [{ id: "a", weight: 1 }], conflicts: [] });
    const ms = effortMs(() => {
      one = Instance.from({ items: rows, conflicts });
    });
    expect(ms).toBeLessThan(15000);
    expect([one.size, one.conflictCount, one.scale]).toEqual([n, n, 100]);
    expect(one.fingerprint.length).toBe(64);
  });

  it("agrees with sets of pairs on random conflicts", () => {
    const random = new Random(3);
    for (let round = 0; round < 1000; round++) {
      const n = 2 + random.below(8);
      const rows = Array.from({ length: n }, (_, i) => ({ id: `i${i}`, weight: 1 }));
      const expected = new Map<string, Set<string>>();
      const conflicts: Conflict[] = [];
      for (let c = random.below(30); c > 0; c--) {
        const u = random.below(n), v = random.below(n), reason = `r${random.below(3)}`;
        if (u === v) continue;
        const key = `${Math.min(u, v)} ${Math.max(u, v)}`;
        if (!expected.has(key)) expected.set(key, new Set());
        if (random.below(2) === 0) {
          conflicts.push([`i${u}`, `i${v}`]);
        } else {
          conflicts.push({ between: [`i${u}`, `i${v}`], reason });
          expected.get(key)!.add(reason);
        }
      }
      const built = Instance.from({ items: rows, conflicts });
      const { tails, heads } = built.graph;
      const keys = Array.from(tails, (u, e) => `${u} ${heads[e]}`);
      expect(keys).toEqual([...expected.keys()].sort());
      keys.forEach((key, e) => expect(built.reasonsOf(e)).toEqual([...expected.get(key)!]));
    }
  });
});
