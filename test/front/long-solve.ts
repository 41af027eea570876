/**
 * Cells for the tests of the Stop button: a set-up, a solve that would go on for hours, what it
 * found, and a look at the state. The instance is a random graph in which every item has about
 * sixteen conflicts; its best choice is far out of reach of every exact method known.
 */

/** @param library address of lib/mod.ts, as the cells import it @returns the code of four cells */
export function longSolve(library: string): [string, string, string, string] {
  const setUp = `import { Instance, show, solve } from ${JSON.stringify(library)};
let bits = 7;
const random = (n) => {
  bits = (Math.imul(bits, 1664525) + 1013904223) >>> 0;
  return Math.floor((bits / 4294967296) * n);
};
const n = 900;
const instance = Instance.from({
  items: Array.from({ length: n }, (_, i) => ({ id: \`v\${i}\`, weight: 50 + random(20) })),
  conflicts: Array.from({ length: 8 * n }, () => {
    const a = random(n);
    return [\`v\${a}\`, \`v\${(a + 1 + random(n - 1)) % n}\`];
  }),
});
const kept = 42;`;
  return [
    setUp,
    "const solution = await solve(instance);",
    "await show(`${solution.status} ${solution.chosen.length} " +
    "${solution.weight <= solution.upperBound}`);",
    "await show(`kept ${kept}`);",
  ];
}
