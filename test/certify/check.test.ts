import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { fromJson, toJson } from "../../lib/certify/json.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { Random } from "../../lib/run/random.ts";
import { solve } from "../../lib/solve/solve.ts";
import { randomGraph, randomWeights } from "../support/random-graphs.ts";

/** Five items all in conflict, a path that the relaxation settles, and an item worth nothing. */
const instance = Instance.from({
  name: "Clique and path",
  items: [
    ...["p1", "p2", "p3", "p4", "p5"].map((id, i) => ({ id, weight: 4 + (i % 3) })),
    { id: "a", weight: 5 },
    { id: "b", weight: 3 },
    { id: "c", weight: 4 },
    { id: "nil", weight: 0 },
  ],
  conflicts: [
    ...["p1", "p2", "p3", "p4", "p5"].flatMap((p, i, all) =>
      all.slice(0, i).map((q) => [p, q] as const)
    ),
    ["a", "b"],
    ["b", "c"],
    ["nil", "a"],
  ],
});

/** JSON data that may be bent in any way. */
// deno-lint-ignore no-explicit-any
type Bendable = any;

const honest = toJson(await solve(instance, { workers: 0, engine: "transversal" }));

/** The checker's reason for a bent copy of the honest solution. */
function reasonFor(bend: (data: Bendable) => void, tables = instance): string {
  const data = JSON.parse(honest);
  bend(data);
  const verdict = check(tables, data);
  return verdict.valid ? "accepted" : verdict.reason;
}

/** The part of the certificate whose proof has this rule and says something. */
function part(data: Bendable, rule: string): Bendable {
  return data.certificate.parts.find((p: Bendable) =>
    p.proof.rule === rule && (p.proof.ends?.length ?? p.proof.nodes?.length) > 0
  );
}

describe("the checker", () => {
  it("accepts the honest solution, as an object, as text, and read back", () => {
    const solution = fromJson(honest);
    expect(check(instance, solution)).toMatchObject({ valid: true });
    expect(check(instance, honest)).toMatchObject({ valid: true });
    expect(check(instance, JSON.parse(honest))).toMatchObject({ valid: true });
    expect(JSON.parse(honest).weight).toBe(15);
  });

  it("accepts it for the same tables in another order, with other names and reasons", () => {
    const again = Instance.from({
      items: [...instance.ids].reverse().map((id) => ({
        id,
        weight: String(instance.weights[instance.indexOf(id)]) + ".0",
      })),
      conflicts: Array.from(instance.graph.tails, (u, e) => ({
        between: [instance.ids[instance.graph.heads[e]], instance.ids[u]] as const,
        reason: `rule ${e}`,
      })),
    });
    expect(check(again, honest).valid).toBe(true);
  });

  const forgeries: [string, (data: Bendable) => void, string | RegExp][] = [
    ["a worth off by one", (d) => d.weight++, "is worth 15, but the solution states 16"],
    ["an unknown item", (d) => d.chosen.push("ghost"), '"ghost" is not in these tables'],
    ["an item twice", (d) => d.chosen.push(d.chosen[0]), "is chosen twice"],
    ["two items in conflict", (d) => d.chosen.push("b"), "both chosen, but they are in conflict"],
    ["a worse choice", (d) => {
      d.chosen = d.chosen.filter((id: string) => id !== "a");
      d.weight -= 5;
    }, "add up to 15, but the choice is worth 10"],
    ["a worse choice with its bound", (d) => {
      d.chosen = d.chosen.filter((id: string) => id !== "a");
      d.weight -= 5;
      d.certificate.bound -= 5;
    }, "the bounds of the parts add up to 15, the certificate states 10"],
    ["another instance's fingerprint", (d) => {
      d.certificate.fingerprint = "0".repeat(64);
    }, "fingerprint"],
    ["no certificate", (d) => delete d.certificate, "carries no certificate"],
    ["another version", (d) => d.certificate.version = 2, "version 1"],
    ["a status that claims less", (d) => d.status = "feasible", "does not claim"],
    ["a part left out", (d) => d.certificate.parts.pop(), "is in no part"],
    ["an item left out of its part", (d) => part(d, "packing").vertices.pop(), "is in no part"],
    ["an item in two parts", (d) => {
      d.certificate.parts[0].vertices.push(d.certificate.parts[1].vertices[0]);
    }, "is in two parts"],
    ["an item that does not exist", (d) => {
      d.certificate.parts[0].vertices.push(9);
    }, "expected vertices from 0 to 8"],
    ["a packed conflict that does not exist", (d) => {
      part(d, "packing").proof.ends.splice(0, 2, 0, 2);
    }, "not in conflict"],
    ["a multiplier below zero", (d) => part(d, "packing").proof.doubled[0] = -2, "integer >= 0"],
    ["a multiplier that is not whole", (d) => part(d, "packing").proof.doubled[0] = 0.5, "integer"],
    ["a multiplier raised", (d) => part(d, "packing").proof.doubled[0] += 40, "proves"],
    ["a multiplier lowered", (d) => part(d, "packing").proof.doubled[0] -= 2, "proves"],
    ["ends without a multiplier", (d) => part(d, "packing").proof.doubled.pop(), "two ends"],
    ["a part's bound off by one", (d) => part(d, "cases").bound--, "the certificate states"],
    ["a missing case", (d) => part(d, "cases").proof.nodes.pop(), /missing|proves/],
    ["a case too many", (d) => part(d, "cases").proof.nodes.push({}), "left over"],
    ["a rule nobody knows", (d) => part(d, "cases").proof.rule = "trust me", "unknown rule"],
    ["a requirement slipped in", (d) => {
      d.certificate.choose = [0];
    }, "the certificate speaks of other items"],
    ["a requirement that is not met", (d) => d.choose = ["b"], '"choose": "b" is not chosen'],
    ["an exclusion that is not met", (d) => d.leave = ["a"], '"leave": "a" is chosen'],
    ["an exclusion the certificate does not know", (d) => d.leave = ["b"], "other items"],
    ["a list that is none", (d) => d.chosen = "all", '"chosen": expected a list'],
    ["parts that are none", (d) => d.certificate.parts = 3, '"parts": expected a list'],
    ["a part without vertices", (d) => delete part(d, "cases").vertices, "expected a list"],
    ["a part without a proof", (d) => delete part(d, "cases").proof, "unknown rule"],
  ];

  for (const [name, bend, reason] of forgeries) {
    it(`rejects ${name}`, () => {
      expect(reasonFor(bend)).toMatch(reason);
    });
  }

  it("gives instances, verdicts and solutions back as they were written", () => {
    const odd = Instance.from({
      name: "Odd rows",
      unit: "kg",
      items: [
        { key: 7, worth: "0.10", note: 5n },
        { key: "b", worth: 2n },
        { key: "c", worth: -1e-7 },
      ],
      conflicts: [{ between: ["7", "b"], reason: ["same crate", "same day"] }],
      id: "key",
      weight: "worth",
    });
    const back = fromJson(toJson(odd)) as Instance;
    expect(back.fingerprint).toBe(odd.fingerprint);
    expect([back.name, back.unit, back.reasonsOf(0)]).toEqual([
      "Odd rows",
      "kg",
      ["same crate", "same day"],
    ]);
    const verdict = check(instance, honest);
    expect(fromJson(toJson(verdict))).toEqual(verdict);
    expect(toJson(fromJson(honest))).toBe(honest);
    expect(() => fromJson('{"kind":"poem"}')).toThrow(/"instance", "solution" or "verdict"/);
  });

  it("rejects what is no solution at all", () => {
    expect(check(instance, "{").reason).toContain("not JSON");
    expect(check(instance, null).reason).toContain('"kind": "solution"');
    expect(check(instance, { kind: "instance" }).reason).toContain('"kind": "solution"');
  });

  it("rejects the honest solution for tables that differ in one weight or one conflict", () => {
    const items = instance.ids.map((id, i) => ({ id, weight: instance.weights[i] }));
    const conflicts = Array.from(
      instance.graph.tails,
      (u, e) => [instance.ids[u], instance.ids[instance.graph.heads[e]]] as const,
    );
    const heavier = Instance.from({
      items: items.map((item) => item.id === "b" ? { ...item, weight: 4 } : item),
      conflicts,
    });
    const fewer = Instance.from({ items, conflicts: conflicts.slice(1) });
    expect(check(heavier, honest).reason).toContain("fingerprint");
    expect(check(fewer, honest).reason).toContain("fingerprint");
  });

  it("accepts every optimal solution, with requirements and exclusions: 400 random instances", async () => {
    const random = new Random(11);
    for (let i = 0; i < 400; i++) {
      const n = 1 + random.below(14);
      const graph = randomGraph(random, n, random.unit() * 0.6);
      const weights = randomWeights(random, n, -1, 9);
      const made = Instance.from({
        items: Array.from(weights, (weight, v) => ({ id: `v${v}`, weight })),
        conflicts: Array.from(graph.tails, (u, e) => [`v${u}`, `v${graph.heads[e]}`] as const),
      });
      const ids = random.shuffle([...made.ids]);
      const asked = {
        choose: ids.slice(0, random.below(2)),
        leave: ids.slice(2, 2 + random.below(3)),
      };
      const solution = await solve(made, { ...asked, workers: 0 });
      expect(solution.status).toBe("optimal");
      expect(check(made, toJson(solution))).toMatchObject({ valid: true });
    }
  });
});
