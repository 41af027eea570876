import { describe, expect, it } from "vitest";
import { formatScaled, scaleWeights } from "../../lib/instance/weights.ts";
import { Random } from "../../lib/run/random.ts";

const place = (i: number) => `row ${i + 1}`;

describe("exact weights", () => {
  it("reads numbers, bigints and text by the same least power of ten", () => {
    const { weights, scale, problems } = scaleWeights(
      [1.5, "1.50", "+2.", ".25", "1e1", "  -3 ", 7n, 1e-7, "5E-7", -0, "0.000", "0e99"],
      place,
    );
    expect(problems).toEqual([]);
    expect(scale).toBe(1e7);
    expect([...weights]).toEqual(
      [15000000, 15000000, 20000000, 2500000, 1e8, -3e7, 7e7, 1, 5, 0, 0, 0],
    );
  });

  it("drops trailing zeros and never scales below one", () => {
    expect(scaleWeights(["1.500", "2.00"], place).scale).toBe(10);
    expect(scaleWeights(["100", "2000", 30n], place)).toEqual({
      weights: Float64Array.of(100, 2000, 30),
      scale: 1,
      problems: [],
    });
  });

  it("takes a number by its shortest decimal form", () => {
    expect(scaleWeights([0.1, 0.2, 0.3], place)).toEqual({
      weights: Float64Array.of(1, 2, 3),
      scale: 10,
      problems: [],
    });
    expect(scaleWeights([0.1 + 0.2], place).problems[0]).toContain(
      "round the weights to 16 decimals",
    );
  });

  it("agrees with big integer arithmetic on random decimals", () => {
    const random = new Random(11);
    for (let round = 0; round < 3000; round++) {
      const texts = Array.from({ length: 1 + random.below(4) }, () => {
        const whole = String(random.below(10 ** random.below(6)));
        const fraction = random.below(2) === 0 ? "" : `.${random.below(10 ** random.below(6))}`;
        const exponent = random.below(3) === 0 ? `e${random.below(7) - 3}` : "";
        return `${random.below(2) === 0 ? "-" : ""}${whole}${fraction}${exponent}`;
      });
      const asNumbers = random.below(2) === 0;
      const { weights, scale, problems } = scaleWeights(
        asNumbers ? texts.map(Number) : texts,
        place,
      );
      expect(problems).toEqual([]);
      // Every text has at most 6 + 3 decimals.
      const exact = texts.map((text) => {
        const [mantissa, exponent = "0"] = text.replace(/^-/, "").split("e");
        const [whole, fraction = ""] = mantissa.split(".");
        const shift = 9 + Number(exponent) - fraction.length;
        const size = BigInt(whole + fraction) * 10n ** BigInt(shift);
        return text.startsWith("-") ? -size : size;
      });
      exact.forEach((value, i) => {
        expect(BigInt(weights[i]) * 10n ** 9n).toBe(value * BigInt(scale));
      });
      const smaller = scale / 10;
      if (scale > 1) {
        expect(exact.every((v) => (v * BigInt(smaller)) % 10n ** 9n === 0n)).toBe(false);
      }
    }
  });

  it("names each weight that is not a number", () => {
    const bad = [
      "",
      "  ",
      null,
      undefined,
      NaN,
      Infinity,
      -Infinity,
      "Infinity",
      "abc",
      "1,5",
      "1e",
      "0x10",
      true,
      {},
      [],
      "1 000",
    ];
    const { problems } = scaleWeights(bad, place);
    expect(problems.length).toBe(bad.length);
    expect(problems[0]).toBe("row 1: weight missing; expected a number");
    expect(problems[4]).toBe("row 5: weight NaN; expected a finite number");
    expect(problems[9]).toBe(
      'row 10: weight "1,5"; expected a number with a decimal point, not a comma',
    );
  });

  it("accepts a sum of 2^53 - 1 and refuses the next", () => {
    expect(scaleWeights([2 ** 53 - 2, -1], place).problems).toEqual([]);
    expect(scaleWeights(["9007199254740990", "-2"], place).problems).toEqual([
      "weights: the sum of the weights passes 2^53 in whole units, too large to stay exact; not " +
      "even whole units fit; the largest scale that fits is 10^-1: state the weights in a unit " +
      "10^1 times larger",
    ]);
  });

  it("names a scale that fits, and no larger one does", () => {
    const random = new Random(5);
    for (let round = 0; round < 300; round++) {
      const decimals = 12 + random.below(9);
      const texts = Array.from({ length: 1 + random.below(5) }, () => {
        const digits = Array.from({ length: decimals - 1 }, () => random.below(10)).join("");
        return `${random.below(10 ** (1 + random.below(8)))}.${digits}${1 + random.below(9)}`;
      });
      const { problems, scale } = scaleWeights(texts, place);
      const sumAt = (k: number) => {
        let sum = 0n;
        for (const text of texts) {
          const [whole, fraction] = text.split(".");
          const all = BigInt(whole + fraction), cut = 10n ** BigInt(decimals - k);
          sum += (all * 2n + cut) / (cut * 2n);
        }
        return sum;
      };
      const limit = 2n ** 53n - 1n;
      if (sumAt(decimals) <= limit) {
        expect(problems).toEqual([]);
        expect(scale).toBe(Number(`1e${decimals}`));
        continue;
      }
      const named = Number(/the largest scale that fits is (?:10\^)?(-?\d+)/.exec(problems[0])![1]);
      const fits = problems[0].includes("fits is 10^") ? named : 0;
      expect(sumAt(fits) <= limit).toBe(true);
      expect(sumAt(fits + 1) > limit).toBe(true);
    }
  });

  it("refuses absurd sizes without working on them", () => {
    for (const text of ["1e999999999", "1e400", "1e-999999999", "9".repeat(5000)]) {
      expect(scaleWeights([text, "1"], place).problems.length).toBe(1);
    }
    expect(scaleWeights(["1e-30"], place).problems[0]).toContain(
      "round the weights to 22 decimals",
    );
    expect(scaleWeights(["1e-22"], place)).toEqual({
      weights: Float64Array.of(1),
      scale: 1e22,
      problems: [],
    });
  });

  it("writes scaled integers back exactly", () => {
    expect(formatScaled(1250, 100)).toBe("12.5");
    expect(formatScaled(-5, 1000)).toBe("-0.005");
    expect(formatScaled(-0, 1)).toBe("0");
    expect(formatScaled(0, 100)).toBe("0");
    expect(formatScaled(9007199254740991, 100)).toBe("90071992547409.91");
    expect(formatScaled(1, 1e22)).toBe("0.0000000000000000000001");
  });
});
