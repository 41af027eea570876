import { describe, expect, it } from "vitest";
import { renderClassification } from "../../lib/display/classification.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { classify } from "../../lib/reduce/classify.ts";

const conflicts: [string, string][] = [
  ["a<b", "b"],
  ["b", "c"],
  ["c", "a<b"],
  ["c", "d"],
  ["d", "e"],
  ["e", "f"],
  ["f", "d"],
  ["g", "h"],
];

describe("renderClassification", () => {
  it("tells the sentence, the components and two disjoint odd cycles, ids escaped", async () => {
    const instance = Instance.from({
      name: "Stalls & stands",
      items: ["a<b", "b", "c", "d", "e", "f", "g", "h"].map((id) => ({ id, weight: 1 })),
      conflicts,
    });
    const found = await classify(instance, { workers: 0 });
    const bundle = renderClassification(found);
    const html = bundle["text/html"] as string, text = bundle["text/plain"] as string;
    expect(html).toContain("Stalls &amp; stands: 2 components");
    expect(html).toContain("a&lt;b");
    expect(html).not.toContain("a<b");
    expect(text).toContain(found.sentence);
    expect(text).toMatch(/Two disjoint odd cycles: .*; and /);
    expect(text).toContain("largest subdeterminant of the conflict matrix 2^2.");
    expect(text).toMatch(/near-bipartite +2 +2 +no/);
    expect(text).toMatch(/bipartite +0 +0 +no/);
  });
});
