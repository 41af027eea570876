import { describe, expect, it } from "vitest";
import { graphFromPairs } from "../../lib/graph/graph.ts";
import { reduceBlocks } from "../../lib/reduce/blocks.ts";
import { hangingBlocks } from "../../lib/reduce/blocks-peel.ts";
import { Meter } from "../../lib/run/meter.ts";
import { Random } from "../../lib/run/random.ts";
import { allSides, isSide } from "../oracle/sides.ts";
import { randomGraph } from "../support/random-graphs.ts";

describe("parts that hang on one vertex", () => {
  it("are all sides with at most one attachment, 800 cases", () => {
    const random = new Random(1);
    let found = 0;
    for (let run = 0; run < 800; run++) {
      const graph = randomGraph(random, 3 + random.below(8), 0.15 + 0.2 * random.unit());
      const blocks = hangingBlocks(graph, new Meter());
      const inside = blocks.flatMap((block) => Array.from(block.inside));
      expect(new Set(inside).size).toBe(inside.length);
      for (const block of blocks) expect(isSide(graph, block.inside, block.attachments)).toBe(true);
      const expected = new Set(
        allSides(graph).filter((side) => side.attachments.length <= 1).flatMap((s) => s.inside),
      );
      expect(new Set(inside)).toEqual(expected);
      found += blocks.length;
    }
    expect(found).toBeGreaterThan(400);
  });

  it("are taken off long odd rings in linear time", () => {
    const L = 20001, pairs: [number, number][] = [];
    for (let i = 0; i < L; i++) pairs.push([i, (i + 1) % L], [i, L + i]);
    const graph = graphFromPairs(2 * L, pairs);
    const ids = Int32Array.from({ length: graph.n }, (_, v) => v);
    const meter = new Meter().within(50 * graph.n);
    const { after } = reduceBlocks(
      { graph, costs: new Float64Array(graph.m).fill(1), ids, nextId: graph.n },
      meter,
    );
    expect(after.graph.n).toBe(L);
  });
});
