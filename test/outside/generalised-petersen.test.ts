import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { solve } from "../../lib/solve/solve.ts";

/** GP(n, k): an outer ring, an inner ring of step k, and a spoke between each two. */
function generalisedPetersen(n: number, k: number): Instance {
  const ring = Array.from({ length: n }, (_, i) => i);
  return Instance.from({
    name: `GP(${n}, ${k})`,
    items: ring.flatMap((i) => [{ id: `o${i}`, weight: 1 }, { id: `i${i}`, weight: 1 }]),
    conflicts: ring.flatMap((i) => [
      [`o${i}`, `o${(i + 1) % n}`] as const,
      [`i${i}`, `i${(i + k) % n}`] as const,
      [`o${i}`, `i${i}`] as const,
    ]),
  });
}

async function independenceNumber(instance: Instance): Promise<number> {
  const solution = await solve(instance, { workers: 0 });
  expect(solution.status).toBe("optimal");
  expect(check(instance, solution)).toMatchObject({ valid: true });
  return solution.weight;
}

/**
 * J. Fox, R. Gera and P. Stanica, "The independence number for the generalized Petersen graphs", Ars
 * Combinatoria 93, 2009; formulas written from memory. GP(5, 2) is the Petersen graph.
 */
describe("independence numbers of generalised Petersen graphs", () => {
  it("GP(n, 1): n for even n, n - 1 for odd n", async () => {
    for (let n = 3; n <= 24; n++) {
      expect(await independenceNumber(generalisedPetersen(n, 1))).toBe(n % 2 === 0 ? n : n - 1);
    }
  });

  it("GP(n, 2): the integer part of 4n / 5", async () => {
    for (let n = 5; n <= 24; n++) {
      expect(await independenceNumber(generalisedPetersen(n, 2))).toBe(Math.floor(4 * n / 5));
    }
  });

  it("GP(n, 3): n for even n, n - 2 for odd n", async () => {
    for (let n = 7; n <= 24; n++) {
      expect(await independenceNumber(generalisedPetersen(n, 3))).toBe(n % 2 === 0 ? n : n - 2);
    }
  });
});
