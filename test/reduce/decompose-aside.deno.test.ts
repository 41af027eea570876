import { describe, expect, it } from "vitest";
import { check } from "../../lib/certify/check.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { decompose } from "../../lib/reduce/decompose.ts";
import { replaceBlocks } from "../../lib/reduce/replace-blocks.ts";
import { Random } from "../../lib/run/random.ts";
import { solve } from "../../lib/solve/solve.ts";
import { gridWithBlocks } from "../support/grid-with-blocks.ts";
import { randomCosts, weightsOfCosts } from "../support/with-blocks.ts";

function largeInstance(): Instance {
  const random = new Random(1);
  const graph = gridWithBlocks(random, 120, 120, { blocks: 600, size: 12, nested: true });
  const weights = weightsOfCosts(graph, randomCosts(random, graph.m, 9));
  return Instance.from({
    items: Array.from(weights, (weight, v) => ({ id: `item ${v}`, weight })),
    conflicts: Array.from(graph.tails, (u, e) => [`item ${u}`, `item ${graph.heads[e]}`] as const),
  });
}

describe("decompose and replaceBlocks in a worker", () => {
  const instance = largeInstance();

  it("answer as in the caller's thread", async () => {
    const aside = await decompose(instance);
    const here = await decompose(instance, { workers: 0 });
    expect(aside.components).toEqual(here.components);
    expect(aside.components[0].blocks.length).toBeGreaterThan(200);
    const small = await replaceBlocks(aside);
    const same = await replaceBlocks(here, { workers: 0 });
    expect(small.instance.fingerprint).toBe(same.instance.fingerprint);
    expect(small.gadgets).toEqual(same.gadgets);
    const lifted = small.lift(await solve(small.instance));
    expect(lifted.status).toBe("optimal");
    expect(check(instance, lifted).valid).toBe(true);
  });

  it("can be stopped", async () => {
    const stop = new AbortController();
    setTimeout(() => stop.abort(), 150);
    const found = await decompose(instance, { signal: stop.signal });
    expect(found.components.flatMap((component) => component.items).length).toBe(instance.size);
  });
});
