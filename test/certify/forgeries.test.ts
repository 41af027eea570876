import { describe, expect, it } from "vitest";
import type { ProjectiveProof, Proof } from "../../lib/certify/certificate.ts";
import { check } from "../../lib/certify/check.ts";
import { neighbourLists, scratchFor } from "../../lib/certify/play.ts";
import { provenBound } from "../../lib/certify/proof.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { proveByCases } from "../support/prove.ts";

type Weights = Record<string, number>;
type Pair = readonly [string, string];

const tables = (weights: Weights, conflicts: Pair[] = []) =>
  Instance.from({
    items: Object.entries(weights).map(([id, weight]) => ({ id, weight })),
    conflicts,
  });

/** A solution that claims this choice to be best, on the strength of one proof about all items. */
function claim(
  instance: Instance,
  chosen: string[],
  proof: unknown,
  { solution = {}, certificate = {}, part = {} }: {
    solution?: object;
    certificate?: object;
    part?: object;
  } = {},
) {
  let weight = 0;
  for (const id of chosen) weight += instance.weights[instance.indexOf(id)];
  return {
    kind: "solution",
    status: "optimal",
    chosen,
    weight,
    upperBound: weight,
    choose: [],
    leave: [],
    ...solution,
    certificate: {
      kind: "certificate",
      version: 1,
      fingerprint: instance.fingerprint,
      choose: [],
      leave: [],
      bound: weight,
      parts: [{ vertices: Array.from(instance.ids.keys()), bound: weight, proof, ...part }],
      ...certificate,
    },
  };
}

const NOTHING = { rule: "packing", ends: [], doubled: [] };

/** A path of items worth the same; items are numbered along it. */
const path = (length: number, weight: number) => {
  const ids = Array.from({ length }, (_, i) => `p${i}`);
  return tables(
    Object.fromEntries(ids.map((id) => [id, weight])),
    ids.slice(1).map((id, i) => [ids[i], id] as const),
  );
};

describe("the checker refuses", () => {
  it("an odd cycle of three and a half vertices", () => {
    // 2.5 / 2 for the four items of a path, of which two can be chosen.
    const four = path(4, 2);
    const cycle = { length: 3.5, 0: 0, 1: 1, 2: 2, 3: 3, "0.5": 2 };
    const proof = { rule: "cases", cliques: [], oddCycles: [cycle], nodes: [{ set: [0, 4] }] };
    expect(check(four, claim(four, ["p0"], proof)).reason).toBe(
      "part 0: odd cycles, 0: expected a list",
    );
  });

  it("a part of one and a half items, which is two to be counted and one to be proved", () => {
    const two = tables({ a: 1, b: 1 });
    const proof = { rule: "blocks", ends: [], doubled: [], blocks: [], parts: [] };
    const vertices = { length: 1.5, 0: 0, 1: 1 };
    expect(check(two, claim(two, ["a"], proof, { part: { vertices } })).reason).toBe(
      'part 0, "vertices": expected a list',
    );
  });

  it("a part of one and a half vertices inside a blocks proof", () => {
    const two = path(2, 1);
    const inner = { rule: "blocks", ends: [], doubled: [], blocks: [], parts: [] };
    const parts = [{ vertices: { length: 1.5, 0: 0, 1: 1 }, bound: 0, proof: inner }];
    const proof = { rule: "blocks", ends: [0, 1], doubled: [2], blocks: [], parts };
    expect(check(two, claim(two, ["p0"], proof)).reason).toBe(
      'part 0: blocks, part 0, "vertices": expected a list',
    );
  });

  it("a block with fewer edges than none, which leaves no room for those of the next", () => {
    const two = path(2, 1);
    const block = { inside: [], attachments: [], vertices: 0 };
    const blocks = [
      { ...block, ends: { length: -6 }, doubled: { length: -3 } },
      { ...block, vertices: 2, ends: [2, 3], doubled: [0] },
    ];
    const proof = { rule: "blocks", ends: [], doubled: [], blocks, parts: [] };
    expect(check(two, claim(two, ["p0"], proof)).reason).toBe(
      'part 0: block 0, "ends": expected a list',
    );
  });

  it("an item worth less than nothing that is required twice", () => {
    const three = tables({ a: 10, b: 5, c: -5 });
    const asked = { solution: { choose: ["c", "c"] }, certificate: { choose: [2] } };
    const part = { vertices: [0, 1], bound: 15 };
    const { valid, reason } = check(three, claim(three, ["a", "c"], NOTHING, { ...asked, part }));
    expect([valid, reason]).toEqual([
      false,
      "the bounds of the parts add up to 10, the certificate states 5",
    ]);
    const whole = claim(three, ["a", "b", "c"], NOTHING, { ...asked, part });
    expect(check(three, whole)).toMatchObject({
      valid: true,
      reason: "no conflict-free choice is worth more than 10 with 1 items required and 0 ruled " +
        "out; 3 items accounted for (parts: 1)",
    });
  });

  it("a block whose costs add up to more than 2^53, where sums would be rounded", () => {
    // a and b, inside, take all slack when chosen; rounding made that one unit of slack. The
    // triangles make it dear to choose s or t instead.
    const [p, q] = [2 ** 52 + 1, 2 ** 52 + 2];
    const eight = tables(
      { a: (p + 1) / 2, b: q / 2, s: 0, t: 0, z1: 1, z2: 1, z3: 1, z4: 1 },
      [
        ["a", "s"],
        ["b", "t"],
        ["s", "z1"],
        ["s", "z2"],
        ["z1", "z2"],
        ["t", "z3"],
        ["t", "z4"],
        ["z3", "z4"],
      ],
    );
    const left = graphFromPairs(10, [
      [2, 8],
      [8, 9],
      [9, 3],
      [2, 4],
      [2, 5],
      [4, 5],
      [3, 6],
      [3, 7],
      [6, 7],
    ]);
    const blocks = [{
      inside: [0, 1],
      attachments: [2, 3],
      vertices: 2,
      ends: [2, 8, 8, 9, 9, 3],
      doubled: [1, 0, 1],
    }];
    const proof = (doubled: number[]) => ({
      rule: "blocks",
      ends: [0, 2, 1, 3, 4, 5, 6, 7],
      doubled,
      blocks,
      parts: [{
        vertices: [2, 3, 4, 5, 6, 7, 8, 9],
        bound: 5,
        proof: proveByCases(left, Int32Array.from({ length: 10 }, (_, v) => v)),
      }],
    });
    expect(check(eight, claim(eight, ["a", "b", "z1"], proof([p, q, 2, 2]))).reason).toBe(
      "part 0: block 0: costs beyond 2^53",
    );
    expect(check(eight, claim(eight, ["a", "b", "z1"], proof([p - 2, 1, 2, 2]))).reason).toBe(
      "part 0: block 0: with no attachment chosen the gadget costs at least 1, but the block only 0",
    );
  });

  it("costs in units whose product is rounded to twice a weight above 2^52", () => {
    // Three of these five loads times the unit are odd and above 2^53.
    const unit = 4503599627370493;
    const weights = Float64Array.of(
      6755399441055740,
      0,
      4503599627370493,
      6755399441055740,
      9007199254740986,
    );
    const graph = graphFromPairs(5, [[0, 1], [1, 2], [2, 3], [3, 4], [4, 0]]);
    const proof: ProjectiveProof = {
      rule: "projective",
      unit,
      costs: [0, 3, 0, 2, 1],
      rotation: [0, 1, 0, 1, 0, 1, 0, 1, 0, 1],
      sources: [0],
      distance: 0,
    };
    const play = {
      n: 5,
      ...neighbourLists(5, graph.tails, graph.heads),
      weights,
      vertices: [0, 1, 2, 3, 4],
      nameOf: String,
      scratch: scratchFor(5),
    };
    // Items 0 and 3 are worth 13510798882111480; the proof proved 13510798882111479.
    expect(() => provenBound(play, proof)).toThrow(/costs at 0 add up to .* twice its weight/);
  });

  it("a bound that is no integer, is text, or is stated beside the certificate", () => {
    const one = tables({ a: 1 });
    for (const bound of [1.5, "1", [1], true, null]) {
      expect(check(one, claim(one, ["a"], NOTHING, { part: { bound } })).reason).toMatch(
        /^part 0: the proof proves 1, the certificate states/,
      );
      expect(check(one, claim(one, ["a"], NOTHING, { certificate: { bound } })).reason).toMatch(
        /^the bounds of the parts add up to 1, the certificate states/,
      );
    }
    const better = { solution: { upperBound: 2 } };
    expect(check(one, claim(one, ["a"], NOTHING, better)).reason).toBe(
      "the choice is worth 1, but the solution states the bound 2",
    );
  });

  it("sources that are properties of the list of darts", () => {
    const three = tables({ a: 1, b: 1, c: 1 }, [["a", "b"], ["b", "c"], ["a", "c"]]);
    const proof = {
      rule: "projective",
      unit: 1,
      costs: [1, 1, 1],
      rotation: [0, 1, 0, 1, 0, 1],
      distance: 1,
    };
    expect(check(three, claim(three, ["a"], { ...proof, sources: [0] })).valid).toBe(true);
    for (const source of ["length", "byteLength", "buffer", "__proto__", "0", null, 0.5]) {
      expect(check(three, claim(three, ["a"], { ...proof, sources: [source] })).reason).toBe(
        `part 0: projective, source 0: expected a dart from 0 to 5, got ${source}`,
      );
    }
  });
});

describe("the checker does not", () => {
  it("fill the memory with lists of a stated length", () => {
    const one = tables({ a: 1 });
    const long = { length: 4e9 };
    const reasons = [
      claim(one, ["a"], NOTHING, { certificate: { choose: long } }),
      claim(one, ["a"], NOTHING, { certificate: { leave: long } }),
      claim(one, ["a"], NOTHING, { certificate: { parts: long } }),
      claim(one, ["a"], NOTHING, { part: { vertices: long } }),
      claim(one, ["a"], { rule: "packing", ends: { length: 8e9 }, doubled: long }),
      claim(one, ["a"], { rule: "cases", cliques: [long], oddCycles: [], nodes: [{}] }),
      claim(one, ["a"], { rule: "cases", cliques: [], oddCycles: [], nodes: [{ split: [long] }] }),
    ].map((solution) => check(one, solution).reason);
    for (const reason of reasons) expect(reason).toMatch(/expected a list/);
  });

  it("take time in proportion to a denominator", () => {
    // Both used to add 2^52 again and again.
    const one = tables({ a: 2 ** 40 });
    const proof: Proof = {
      rule: "cases",
      denominator: 2 ** 53 - 1,
      cliques: [[0]],
      oddCycles: [],
      nodes: [{ set: [0, 2 ** 53 - 1] }],
    };
    expect(check(one, claim(one, ["a"], proof)).valid).toBe(true);
  });

  it("run out of stack on lists in lists in lists", () => {
    const one = tables({ a: 1 });
    const deep = "[".repeat(100_000) + "]".repeat(100_000);
    const text = (place: string) =>
      JSON.stringify(claim(one, ["a"], NOTHING)).replace(place, `${place.split(":")[0]}:${deep}`);
    for (const place of ['"status":"optimal"', '"vertices":[0]', '"rule":"packing"', '"ends":[]']) {
      const { valid, reason } = check(one, text(place));
      expect(valid).toBe(false);
      expect(reason.length).toBeLessThan(1100);
    }
    expect(check(one, deep).valid).toBe(false);
  });

  it("print what would write over its verdict", () => {
    const one = tables({ a: 1 });
    const fingerprint = "\u001b[1K\rProved: no conflict-free choice is worth more\n\u202e";
    const { valid, reason } = check(
      one,
      claim(one, ["a"], NOTHING, { certificate: { fingerprint } }),
    );
    expect(valid).toBe(false);
    expect(reason).toContain("fingerprint \ufffd[1K\ufffdProved: ");
    expect(reason.split(/\p{Cc}|\u202e/u).length).toBe(1);
  });

  it("follow blocks proofs within blocks proofs without end", () => {
    const one = tables({ a: 1 });
    const nested = (depth: number) => {
      let proof: object = NOTHING;
      for (let i = 0; i < depth; i++) {
        const parts = [{ vertices: [0], bound: 0, proof }];
        proof = { rule: "blocks", ends: [], doubled: [], blocks: [], parts };
      }
      return check(one, claim(one, ["a"], proof));
    };
    expect(nested(16).valid).toBe(true);
    for (const depth of [17, 100, 100_000]) {
      expect(nested(depth).reason).toMatch(/blocks: more than 16 proofs, each in a part/);
    }
  });
});
