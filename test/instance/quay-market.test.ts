import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { componentSubgraphs } from "../../lib/graph/components.ts";
import { Instance, readRows, readTables } from "../../lib/instance/mod.ts";
import { evenFaceEmbedding } from "../../lib/parity/even-face.ts";
import { leastTransversal } from "../../lib/parity/transversal.ts";
import { halfIntegralKernel } from "../../lib/reduce/kernel.ts";
import { Meter } from "../../lib/run/meter.ts";
import { files, houseRules, SEED } from "../../notebooks/data/quay-market/generate.ts";

const committed = (name: string) =>
  new URL(`../../notebooks/data/quay-market/${name}`, import.meta.url);

describe("the quay market", () => {
  it("is written byte for byte by its generator", () => {
    for (const [name, text] of Object.entries(files(SEED))) {
      expect(readFileSync(committed(name), "utf8")).toBe(text);
    }
  });

  it("has the shape its README tells, by table and by rules", async () => {
    const requests = committed("requests.csv");
    const table = await readTables({
      items: requests,
      conflicts: committed("conflicts.csv"),
      weight: "offer",
    });
    const rows = await readRows(requests);
    const ruled = Instance.from({ items: rows, conflicts: houseRules(rows), weight: "offer" });
    expect(ruled.fingerprint).toBe(table.fingerprint);
    expect([table.size, table.conflictCount, table.notes]).toEqual([312, 597, []]);
    const barges = componentSubgraphs(
      table.graph,
      Uint8Array.from(rows, (row) => row.where === "quay" ? 0 : 1),
    );
    expect(barges.map((barge) => barge.graph.n)).toEqual([12, 15, 12]);
  });

  it("leaves a connected kernel with an even-face embedding, far from bipartite", async () => {
    const { graph, weights } = await readTables({
      items: committed("requests.csv"),
      conflicts: committed("conflicts.csv"),
      weight: "offer",
    });
    const { value } = halfIntegralKernel(graph, weights, new Meter());
    const parts = componentSubgraphs(graph, value.map((half) => half === 1 ? 1 : 0));
    expect(parts.map((part) => part.graph.n)).toEqual([285]);
    expect(evenFaceEmbedding(parts[0].graph, new Meter()).kind).toBe("embedded");
    expect(leastTransversal(parts[0].graph, new Meter()).lower).toBeGreaterThan(12);
  });
});
