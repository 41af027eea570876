import { describe, expect, it } from "vitest";
import { Displayable, registerRenderer, render } from "../../lib/run/displayable.ts";

class Tally extends Displayable {
  readonly kind = "tally";
  constructor(readonly count: number) {
    super();
  }
  override toString(): string {
    return `${this.count} counted`;
  }
}

describe("results", () => {
  it("show their text until a renderer is registered, for subclasses of any floor", async () => {
    const hook = Symbol.for("Jupyter.display");
    const tally = new Tally(3) as Tally & Record<symbol, () => Promise<unknown>>;
    expect(await tally[hook]()).toEqual({ "text/plain": "3 counted" });
    registerRenderer<Tally>("tally", (t) => ({ "text/html": `<b>${t.count}</b>` }));
    expect(await render(tally)).toEqual({ "text/html": "<b>3</b>" });
  });
});
