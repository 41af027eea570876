import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:http";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterAll, describe, expect, it } from "vitest";
import { readRows, readTables, toCsv } from "../../lib/instance/mod.ts";
import { parseCsv } from "../../lib/instance/csv.ts";
import { Random } from "../../lib/run/random.ts";
import { asyncEffortMs } from "../support/effort.ts";
import { problemsOf } from "../support/thrown.ts";

const folder = mkdtempSync(join(tmpdir(), "evenface-tables-"));
afterAll(() => rmSync(folder, { recursive: true }));

function file(name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

describe("CSV", () => {
  it("reads quotes, a byte order mark, all line endings, blank lines and three delimiters", () => {
    const rows = [{ id: "a", note: 'x, "y"\nz' }, { id: "b", note: "" }];
    for (const [delimiter, end] of [[",", "\n"], [";", "\r\n"], ["\t", "\r"]]) {
      const lines = [["id", "note"], ["a", '"x, ""y""\nz"'], [""], ["b ", " "]];
      const text = "\ufeff" + lines.map((line) => line.join(delimiter)).join(end);
      const table = parseCsv(text, "t.csv");
      expect(table.problems).toEqual([]);
      expect(table.rows).toEqual(rows);
      expect(table.columns).toEqual(["id", "note"]);
    }
  });

  it("knows the line each row begins on", () => {
    const quoted = parseCsv('id\n"a\nb"\n\n"c"\r\nd\n', "t.csv");
    expect(quoted.rows.map((_, i) => quoted.lineOf(i))).toEqual([2, 5, 6]);
    const plain = parseCsv("id\n\na\r\n\r\nb\n", "t.csv");
    expect(plain.rows.map((_, i) => plain.lineOf(i))).toEqual([3, 5]);
  });

  it("reads what it wrote, and the same with every field quoted", () => {
    const random = new Random(4);
    const alphabet = ["a", "b", "7", ",", ";", "\t", '"', "\n", "\r\n", "é", "-", " x"];
    for (let round = 0; round < 1000; round++) {
      const columns = ["id", "c2", "c3"].slice(0, 2 + random.below(2));
      const text = () =>
        Array.from({ length: random.below(5) }, () => alphabet[random.below(12)]).join("").trim();
      const rows = Array.from(
        { length: random.below(6) },
        (_, i) => Object.fromEntries(columns.map((c, at) => [c, at === 0 ? `r${i}` : text()])),
      );
      expect(parseCsv(toCsv(columns, rows), "t").rows).toEqual(rows);
      const quoted = [columns, ...rows.map((row) => columns.map((c) => row[c]))]
        .map((line) => line.map((f) => `"${f.replaceAll('"', '""')}"`).join(";")).join("\r\n");
      expect(parseCsv(quoted, "t").rows).toEqual(rows);
    }
  });

  it("reads unquoted text as it reads the same text with one quoted field", () => {
    const random = new Random(6);
    for (let round = 0; round < 500; round++) {
      const lines = Array.from(
        { length: 1 + random.below(8) },
        () => Array.from({ length: 1 + random.below(3) }, () => ["", "x", " y "][random.below(3)]),
      ).map((fields) => fields.join(","));
      const body = lines.join(["\n", "\r\n", "\r"][random.below(3)]);
      const plain = parseCsv(`id,w\n${body}\n`, "t");
      const quoted = parseCsv(`"id",w\n${body}\n`, "t");
      expect(quoted.rows).toEqual(plain.rows);
      expect(quoted.problems).toEqual(plain.problems);
    }
  });

  it("names the line of all that is malformed", () => {
    expect(parseCsv("id,weight\na,1\nb\nc,1,2\n", "t.csv").problems).toEqual([
      "t.csv line 3: expected 2 fields, got 1",
      "t.csv line 4: expected 2 fields, got 3",
    ]);
    const [closing] = parseCsv('id,weight\na,1\n"b"x,2\n', "t.csv").problems;
    expect(closing).toContain("t.csv line 3: malformed: Invalid Closing Quote");
    const [open] = parseCsv('id,weight\na,1\n"b,2\n', "t.csv").problems;
    expect(open).toContain("malformed: Quote Not Closed");
    expect(parseCsv("a,a,b\n1,2,3\n", "t.csv").problems).toEqual([
      't.csv line 1: column "a" stands twice',
    ]);
    expect(parseCsv("\n\n", "t.csv").problems).toEqual([
      "t.csv: the table is empty; expected a line of column names",
    ]);
  });
});

describe("readTables", () => {
  const items = "id,weight\na,1.5\nb,2\nc,3\n";
  const conflicts = "b,a,reason\na,b,same hour\nb,c,\n";

  it("reads files, addresses, text and rows alike", async () => {
    const paths = { items: file("items.csv", items), conflicts: file("conflicts.csv", conflicts) };
    const server = createServer((request, response) => {
      response.statusCode = request.url === "/items.csv" ? 200 : 404;
      response.end(items);
    });
    await new Promise<void>((listening) => server.listen(0, "127.0.0.1", listening));
    try {
      const { port } = server.address() as { port: number };
      const sources = [
        paths,
        { items: pathToFileURL(paths.items), conflicts: String(pathToFileURL(paths.conflicts)) },
        { items, conflicts },
        { items: { name: "x", text: items }, conflicts: await readRows(conflicts) },
        { items: `http://127.0.0.1:${port}/items.csv`, conflicts },
        { items: await readRows(items), conflicts: [["a", "b"], { between: ["c", "b"] }] },
      ];
      const prints = new Set<string>();
      for (const source of sources) prints.add((await readTables(source)).fingerprint);
      expect(prints.size).toBe(1);
      expect(
        await problemsOf(() =>
          readTables({ items: `http://127.0.0.1:${port}/none.csv`, conflicts })
        ),
      ).toEqual([
        `items: cannot read "http://127.0.0.1:${port}/none.csv": the server answered 404`,
      ]);
    } finally {
      await new Promise((closed) => server.close(closed));
    }
  });

  it("takes ids from a and b, or else from the first two columns, and reasons", async () => {
    const named = await readTables({ items, conflicts: "reason,b,a\nloud,a,b\n" });
    expect([named.conflictCount, named.reasonsOf(0)]).toEqual([1, ["loud"]]);
    const first = await readTables({ items, conflicts: "left,right,kind\na,b,x\n" });
    expect([first.conflictCount, first.reasonsOf(0)]).toEqual([1, []]);
    expect((await readTables({ items, conflicts: "a,b\n" })).conflictCount).toBe(0);
  });

  it("lists the problems of both tables with their lines, all at once", async () => {
    expect(
      await problemsOf(() =>
        readTables({
          items: file("bad.csv", "id;weight\na;1\na;\n\nb;x\n"),
          conflicts: "a,b\nq,a\nb,b\n",
        })
      ),
    ).toEqual([
      'bad.csv line 3: id "a" used before (bad.csv line 2)',
      "bad.csv line 3 (a): weight missing; expected a number",
      'bad.csv line 5 (b): weight "x"; expected a number',
      'conflicts line 2: unknown id "q"; expected the id of an item',
      'conflicts line 3: item "b" in conflict with itself',
    ]);
  });

  it("does not complain of ids whose rows could not be read", async () => {
    const problems = await problemsOf(() =>
      readTables({ items: "id,weight\na,1\nb\n", conflicts: "a,b\na,b\na,a\n" })
    );
    expect(problems).toEqual([
      "items line 3: expected 2 fields, got 1",
      'conflicts line 3: item "a" in conflict with itself',
    ]);
  });

  it("refuses a file that does not exist, both at once, and one that is not UTF-8", async () => {
    const gone = join(folder, "gone.csv");
    expect(await problemsOf(() => readTables({ items: gone, conflicts: gone + "2" }))).toEqual([
      `items: the file ${JSON.stringify(gone)} does not exist`,
      `conflicts: the file ${JSON.stringify(gone + "2")} does not exist`,
    ]);
    const latin = file("latin.csv", Uint8Array.of(105, 100, 10, 233, 10));
    expect(await problemsOf(() => readTables({ items: latin, conflicts }))).toEqual([
      `items: ${JSON.stringify(latin)} is not UTF-8 text; expected a CSV file saved as UTF-8`,
    ]);
  });

  it("lists the columns there are when one is missing", async () => {
    expect(
      await problemsOf(() =>
        readTables({ items: "name,price\na,1\n", conflicts: "a\nx\n", weight: "cost" })
      ),
    ).toEqual([
      'conflicts: expected two columns of ids ("a" and "b", or the first two); the columns are "a"',
      'items: no column "id" for the id; the columns are "name", "price"',
      'items: no column "cost" for the weight; the columns are "name", "price"',
    ]);
  });

  it("refuses what is no table", async () => {
    expect(
      await problemsOf(() => readTables({ items: 5 as unknown as string, conflicts: "" })),
    ).toEqual([
      "items: expected a path, an address, CSV text or rows, got 5",
      "conflicts: expected a path, an address or CSV text, got an empty text",
    ]);
    expect(await problemsOf(() => readTables({ items: "id,weight\n", conflicts: [] }))).toEqual([
      "items: the table is empty; expected at least one row",
    ]);
  });

  it("reads a million rows in seconds", async () => {
    const parts = ["id,weight\n"];
    for (let i = 0; i < 1000000; i++) parts.push(`item${i},${(i % 997) / 100}\n`);
    const text = parts.join("");
    const spent = await asyncEffortMs(async () => {
      const one = await readTables({ items: text, conflicts: "a,b\nitem0,item1\n" });
      expect(one.size).toBe(1000000);
    });
    expect(spent).toBeLessThan(15000);
  });
});
