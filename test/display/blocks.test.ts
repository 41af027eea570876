import { beforeAll, describe, expect, it } from "vitest";
import { registerRenderers } from "../../lib/display/register.ts";
import { Instance } from "../../lib/instance/instance.ts";
import { decompose } from "../../lib/reduce/decompose.ts";
import { replaceBlocks } from "../../lib/reduce/replace-blocks.ts";
import { render } from "../../lib/run/displayable.ts";

/** Five stalls that all compete, and a ring of six that hangs on three of them. */
function market(): Instance {
  const stalls = ["apples", "bread", "cheese", "dates", "eggs"];
  const ring = ["r1", "r2", "r3", "r4", "r5", "r6"];
  const pairs = stalls.flatMap((u, i) => stalls.slice(0, i).map((v) => [u, v] as const));
  const around = ring.map((u, i) => [u, ring[(i + 1) % 6]] as const);
  const hung = [["apples", "r1"], ["bread", "r3"], ["cheese", "r5"]] as const;
  const conflicts = [...pairs, ...around, ...hung];
  // Worth as much as an item has conflicts: then the relaxation settles nothing.
  const weight = (id: string) => conflicts.flat().filter((end) => end === id).length;
  return Instance.from({
    name: "market",
    items: [...stalls, ...ring].map((id) => ({ id, weight: weight(id) })),
    conflicts,
  });
}

describe("decompositions and replacements in a notebook", () => {
  beforeAll(() => registerRenderers());

  it("show core and blocks in a table", async () => {
    const bundle = await render(await decompose(market()));
    const text = bundle["text/plain"] as string;
    expect(text).toMatch(/market: 1 component, 1 block with 6 items/);
    expect(text).toMatch(/6 +apples, bread and cheese/);
    expect(text).toMatch(/a core of 5 and 1 block/);
    expect(bundle["text/html"]).toContain("<caption");
  });

  it("show what each block loses in each state", async () => {
    const replacement = await replaceBlocks(await decompose(market()));
    const text = (await render(replacement))["text/plain"] as string;
    expect(text).toMatch(/optimum = /);
    expect(replacement.gadgets.length).toBe(1);
    expect(text).toMatch(/lost inside the block/);
    expect(text).toMatch(/chosen +left +left +\d/);
  });
});
