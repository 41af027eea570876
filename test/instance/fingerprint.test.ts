import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import { type Conflict, Instance } from "../../lib/instance/mod.ts";
import { Random } from "../../lib/run/random.ts";

describe("the fingerprint", () => {
  it("is SHA-256 of the documented form", () => {
    const form = [
      "evenface instance 1",
      "items 4",
      '"10" 1000',
      '"9" 0',
      '"a\\"\\n" -12.5',
      '"é\\ud800" 0.25',
      "conflicts 2",
      "0 2",
      "1 3",
      "",
    ].join("\n");
    const one = Instance.from({
      items: [{ id: "é\ud800", weight: "0.250" }, { id: "9", weight: -0 }, {
        id: 'a"\n',
        weight: -12.5,
      }, { id: "10", weight: "1e3" }],
      conflicts: [["9", "é\ud800"], ['a"\n', "10"]],
    });
    expect(one.fingerprint).toBe(createHash("sha256").update(form, "utf8").digest("hex"));
  });

  it("does not depend on row order, spelling, reasons, names or further columns", () => {
    const random = new Random(8);
    for (let round = 0; round < 200; round++) {
      const n = 2 + random.below(10);
      const ids = Array.from({ length: n }, (_, i) => `${random.below(2)}x${i}`);
      const cents = ids.map(() => random.below(1000) - 100);
      const conflicts: Conflict[] = [];
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < i; j++) if (random.below(3) === 0) conflicts.push([ids[i], ids[j]]);
      }
      const plain = Instance.from({
        items: ids.map((id, i) => ({ id, weight: cents[i] / 100 })),
        conflicts,
      });
      const turned = Instance.from({
        name: "other",
        unit: "other",
        items: random.shuffle(ids.map((id, i) => ({
          note: "kept",
          id,
          weight: `${(cents[i] / 100).toFixed(2)}00`,
        }))),
        conflicts: random.shuffle(conflicts.flatMap((c): Conflict[] => {
          const [a, b] = c as readonly [string, string];
          return random.below(2) === 0 ? [[b, a]] : [{ between: [b, a], reason: "why" }, [a, b]];
        })),
      });
      expect(turned.fingerprint).toBe(plain.fingerprint);
    }
  });

  it("changes with an id, a weight or a conflict", () => {
    const of = (weight: number, id = "a", conflicts: Conflict[] = [["b", "c"]]) =>
      Instance.from({
        items: [{ id, weight }, { id: "b", weight: 1 }, { id: "c", weight: 1 }],
        conflicts,
      }).fingerprint;
    const all = [of(1), of(2), of(0.1), of(1, "z"), of(1, "a", []), of(1, "a", [["a", "b"]])];
    expect(new Set(all).size).toBe(all.length);
  });
});
