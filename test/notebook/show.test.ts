import { describe, expect, it } from "vitest";
import { UndirectedGraph } from "graphology";
import { drawGraphologyGraphs } from "../../lib/notebook/graph-hooks.ts";
import { kernel, underKernel } from "../../lib/notebook/kernel.ts";
import { presentThroughKernel } from "../../lib/notebook/presenter.ts";
import { show } from "../../lib/notebook/show.ts";
import { Displayable } from "../../lib/run/displayable.ts";
import { inFakeKernel } from "./fake-kernel.ts";

class Plain extends Displayable {
  readonly kind = "plain-for-tests";
  constructor(readonly words: string) {
    super();
  }
  override toString() {
    return this.words;
  }
}

describe("kernel", () => {
  it("is absent outside a notebook", () => {
    expect(kernel()).toBe(undefined);
    expect(underKernel()).toBe(false);
  });

  it("is absent where reading it throws", () => {
    const scope = globalThis as { Deno?: object };
    const before = Object.getOwnPropertyDescriptor(scope, "Deno");
    Object.defineProperty(scope, "Deno", {
      configurable: true,
      value: Object.defineProperty({}, "jupyter", {
        get() {
          throw new Error("only in the kernel");
        },
      }),
    });
    try {
      expect(underKernel()).toBe(false);
    } finally {
      if (before === undefined) delete scope.Deno;
      else Object.defineProperty(scope, "Deno", before);
    }
  });
});

describe("show", () => {
  const texts = async (value: unknown) =>
    (await inFakeKernel(() => show(value))).map((m) => m.data["text/plain"]);

  it("shows a result, a list of results each in turn, and plain values", async () => {
    expect(await texts(new Plain("one"))).toEqual(["one"]);
    expect(await texts([new Plain("one"), new Plain("two")])).toEqual(["one", "two"]);
    expect(await texts("words")).toEqual(["words"]);
    expect(await texts(12n)).toEqual(["12"]);
    expect(await texts(undefined)).toEqual(["undefined"]);
    expect(await texts([1, 2])).toEqual(["[\n  1,\n  2\n]"]);
    expect(await texts({ big: 3n })).toEqual(['{\n  "big": "3"\n}']);
    expect(await texts(new Error("no"))).toEqual(["Error: no"]);
  });

  it("shows rows as a table with every cell escaped", async () => {
    const [message] = await inFakeKernel(() =>
      show([{ id: "<script>alert(1)</script>", weight: 1200 }, { id: "b", weight: 7 }])
    );
    expect(message.type).toBe("display_data");
    const html = String(message.data["text/html"]);
    expect(html).toContain("&lt;script&gt;");
    expect(html).not.toContain("<script");
    expect(String(message.data["text/plain"])).toContain("1,200");
  });

  it("asks an object that has a display method of its own", async () => {
    const own = { [Symbol.for("Jupyter.display")]: () => ({ "text/plain": "mine" }) };
    expect(await texts(own)).toEqual(["mine"]);
  });

  it("draws graphology graphs", async () => {
    const graph = new UndirectedGraph();
    graph.addNode("a", { weight: 2 });
    graph.addNode("b", { weight: 1 });
    graph.addEdge("a", "b");
    const [message] = await inFakeKernel(() => show(graph));
    expect(message.data["text/plain"]).toBe("graph with 2 nodes and 1 edge");
    expect(String(message.data["text/html"])).toContain("data:image/svg+xml;base64,");
  });
});

describe("the last expression of a cell", () => {
  const hook = Symbol.for("Jupyter.display");

  it("displays by itself in the kernel and hands back nothing", async () => {
    presentThroughKernel();
    let returned: unknown;
    const sent = await inFakeKernel(async () => {
      returned = await (new Plain("seen") as unknown as Record<symbol, () => unknown>)[hook]();
    });
    expect(sent.map((m) => m.data)).toEqual([{ "text/plain": "seen" }]);
    expect(returned).toEqual({});
  });

  it("hands the bundle back where there is no kernel", async () => {
    const plain = new Plain("text") as unknown as Record<symbol, () => unknown>;
    expect(await plain[hook]()).toEqual({ "text/plain": "text" });
  });

  it("draws a graph of graphology", async () => {
    drawGraphologyGraphs();
    const graph = new UndirectedGraph() as unknown as Record<symbol, () => unknown>;
    const bundle = await graph[hook]() as Record<string, unknown>;
    expect(bundle["text/plain"]).toBe("graph with 0 nodes and 0 edges");
  });
});
