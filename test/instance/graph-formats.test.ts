import { DirectedGraph, MultiGraph } from "graphology";
import { describe, expect, it } from "vitest";
import { Instance, readDimacs, readGraph, toDimacs } from "../../lib/instance/mod.ts";
import { Random } from "../../lib/run/random.ts";
import { problemsOf } from "../support/thrown.ts";

describe("DIMACS", () => {
  it("reads edges, weights and comments", () => {
    const one = readDimacs("c a square\np edge 4 4\nn 2 5\ne 1 2\ne 2 3\n\ne 3 4\r\ne 4 1\n");
    expect(one.ids).toEqual(["1", "2", "3", "4"]);
    expect([...one.weights]).toEqual([1, 5, 1, 1]);
    expect(one.conflictCount).toBe(4);
    expect(one.notes).toEqual([]);
  });

  it("notes a wrong count and merges edges given both ways", () => {
    const one = readDimacs("p col 2 1\ne 1 2\ne 2 1\n");
    expect(one.conflictCount).toBe(1);
    expect(one.notes[0]).toBe("the p line announces 1 edges, the file has 2");
    expect(one.notes[1]).toContain("1 duplicate conflict merged");
  });

  it("lists all problems with their lines", async () => {
    const text = "c x\np edge 3 1\ne 1 4\nn 2 x\nn 2 3\nq\ne 1\ne 2 2\ne 0 1\np edge 1 0\nn 3\n";
    expect(await problemsOf(() => readDimacs(text))).toEqual([
      "line 3: expected a vertex from 1 to 3, got 4",
      "line 5: a second weight of vertex 2 (first on line 4)",
      'line 6: expected a line of kind c, p, n or e, got "q"',
      'line 7: expected "e VERTEX VERTEX", got "e 1"',
      "line 9: expected a vertex from 1 to 3, got 0",
      "line 10: a second p line; expected one",
      'line 11: expected "n VERTEX WEIGHT", got "n 3"',
      'line 4 (2): weight "x"; expected a number',
      'line 8: item "2" in conflict with itself',
    ]);
    expect(await problemsOf(() => readDimacs("e 1 2\n"))).toEqual([
      "line 1: expected the p line first",
      'no p line; expected "p edge VERTICES EDGES"',
    ]);
    expect(await problemsOf(() => readDimacs("p edge many 1\n"))).toEqual([
      'line 1: expected "p edge VERTICES EDGES", got "p edge many 1"',
    ]);
    expect(await problemsOf(() => readDimacs("p edge 999999999 0\n"))).toEqual([
      "line 1: expected at most 16777216 vertices, got 999999999",
    ]);
  });

  it("reads back what it writes", () => {
    const random = new Random(2);
    for (let round = 0; round < 200; round++) {
      const n = 1 + random.below(9), lines = [`p edge ${n} 0`];
      for (let v = 1; v <= n; v++) lines.push(`n ${v} ${random.below(9) - 2}`);
      for (let u = 1; u <= n; u++) {
        for (let v = 1; v < u; v++) if (random.below(2) === 0) lines.push(`e ${u} ${v}`);
      }
      const one = readDimacs(lines.join("\n"));
      expect(readDimacs(toDimacs(one)).fingerprint).toBe(one.fingerprint);
    }
  });
});

describe("graphology", () => {
  const one = Instance.from({
    items: [{ id: "a", weight: "1.5", trade: "tea" }, { id: "b", weight: 2 }, {
      id: "c",
      weight: 3,
    }],
    conflicts: [{ between: ["b", "a"], reason: "loud" }, {
      between: ["a", "b"],
      reason: "late",
    }, ["b", "c"]],
  });

  it("comes back as it went", () => {
    const graph = one.toGraph();
    expect([graph.order, graph.size, graph.type]).toEqual([3, 2, "undirected"]);
    expect(graph.getNodeAttribute("a", "trade")).toBe("tea");
    const back = readGraph(graph);
    expect(back.fingerprint).toBe(one.fingerprint);
    expect(back.reasonsOf(0)).toEqual(["loud", "late"]);
    expect(back.notes).toEqual([]);
  });

  it("reads directed multigraphs, with weights by attribute or all alike", () => {
    const graph = new MultiGraph({ type: "mixed" });
    for (const key of ["x", "y", "z"]) graph.addNode(key, { worth: key.charCodeAt(0) });
    graph.addDirectedEdge("x", "y", { reason: "one" });
    graph.addDirectedEdge("y", "x", { reason: "two" });
    graph.addUndirectedEdge("y", "z");
    const worth = readGraph(graph, { weight: "worth" });
    expect([...worth.weights]).toEqual([120, 121, 122]);
    expect(worth.reasonsOf(0)).toEqual(["one", "two"]);
    expect([...readGraph(graph, { weight: 1 }).weights]).toEqual([1, 1, 1]);
  });

  it("names nodes and edges in problems", async () => {
    const graph = new DirectedGraph();
    graph.addNode("x", { weight: 1 });
    graph.addNode("y");
    graph.addEdgeWithKey("loop", "x", "x");
    expect(await problemsOf(() => readGraph(graph))).toEqual([
      'node "y" (y): weight missing; expected a number',
      'edge "loop": item "x" in conflict with itself',
    ]);
    expect(await problemsOf(() => readGraph(5 as unknown as DirectedGraph))).toEqual([
      "expected a graphology graph, got 5",
    ]);
  });
});
