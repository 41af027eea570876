import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { Random } from "../../lib/run/random.ts";
import {
  type Bendable,
  everyPlace,
  honest,
  KINDS,
  mutate,
  optimumAsAsked,
  restated,
  STRANGE,
} from "../support/mutations.ts";

/** The rules of the proofs in a certificate, with those that stand in others: "blocks > cases". */
function rulesOf(parts: Bendable[], above = ""): string[] {
  return parts.flatMap(({ proof }) => {
    const rule = above + proof.rule;
    return [rule, ...rulesOf(proof.parts ?? [], `${rule} > `)];
  });
}

describe("the checker", () => {
  const seen = new Set<string>();

  KINDS.forEach((kind, k) => {
    it(`never finds less than the optimum proved, whatever is changed: ${kind}`, async () => {
      const random = new Random(100 + k);
      let accepted = 0, rejected = 0;
      for (let i = 0; i < 30; i++) {
        const { instance, text } = await honest(kind, random);
        const data = JSON.parse(text);
        const optimum = optimumAsAsked(instance, data);
        expect(restated(instance, data) as number).toBeGreaterThanOrEqual(optimum);
        if (kind !== "cases") {
          expect(check(instance, text)).toMatchObject({ valid: true });
          expect(data.weight).toBe(optimum);
        }
        for (const rule of rulesOf(data.certificate.parts)) seen.add(rule);
        // Goes on from what proves no more than before, so that changes add up.
        let current = text, least = Infinity;
        for (let j = 0; j < 50; j++) {
          const changed = JSON.parse(current);
          for (let more = random.below(3); more >= 0; more--) mutate(random, changed);
          const bound = restated(instance, changed);
          if (typeof bound === "string") {
            rejected++;
            continue;
          }
          accepted++;
          const best = optimumAsAsked(instance, changed);
          if (bound < best) throw new Error(`${bound} for ${best}: ${JSON.stringify(changed)}`);
          if (bound <= least) [current, least] = [JSON.stringify(changed), bound];
        }
      }
      expect(Math.min(accepted, rejected)).toBeGreaterThan(100);
    });
  });

  it("answers with a verdict, whatever stands in whatever place", async () => {
    const random = new Random(99);
    let places = 0;
    for (const kind of KINDS) {
      const { instance, text } = await honest(kind, random);
      const box = { solution: JSON.parse(text) };
      for (const unread of ["parts", "instance", "elapsedMs", "gap"]) delete box.solution[unread];
      for (const [holder, key] of everyPlace(box, 2)) {
        places++;
        const kept = holder[key];
        for (const value of STRANGE) {
          holder[key] = value;
          const { valid, reason } = check(instance, box.solution);
          expect(typeof reason).toBe("string");
          if (valid) {
            const best = optimumAsAsked(instance, box.solution);
            expect(box.solution.weight).toBe(best);
          }
        }
        holder[key] = kept;
      }
    }

    expect(places).toBeGreaterThan(300);
  });

  it("met every rule, also inside blocks and inside blocks within blocks", () => {
    const met = [...seen].sort();
    for (
      const rule of [
        "blocks",
        "blocks > blocks",
        "blocks > cases",
        "blocks > projective",
        "cases",
        "packing",
        "projective",
      ]
    ) {
      expect(met).toContain(rule);
    }
  });
});
