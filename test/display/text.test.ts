import { describe, expect, it } from "vitest";
import { escapeHtml } from "../../lib/display/html.ts";
import { rowsTable } from "../../lib/display/rows.ts";
import { rightColumns, tableHtml, tableText } from "../../lib/display/table.ts";
import {
  cellText,
  counted,
  groupDigits,
  listText,
  numberText,
  percentText,
  secondsText,
} from "../../lib/display/text.ts";
import { EVIL } from "../support/quay.ts";
import { markupProblem } from "../support/markup.ts";

describe("figures in words", () => {
  it("groups whole digits and leaves decimals", () => {
    expect([0, 7, 999, 1000, -1234567.25, 0.5].map(numberText))
      .toEqual(["0", "7", "999", "1,000", "-1,234,567.25", "0.5"]);
    expect(groupDigits("12345678901234567890.10")).toBe("12,345,678,901,234,567,890.10");
    expect(groupDigits("1e21")).toBe("1e21");
  });

  it("never lets a gap read as zero", () => {
    expect(percentText(1e-9)).toBe("0.01%");
    expect(percentText(0)).toBe("0%");
    expect(percentText(0.1234)).toBe("12.34%");
  });

  it("tells durations in the unit that fits", () => {
    expect([3, 250, 1500, 61_000, 125_000].map(secondsText))
      .toEqual(["3.0 ms", "250 ms", "1.5 s", "61.0 s", "2 min 5 s"]);
  });

  it("counts and lists", () => {
    expect([counted(1, "item"), counted(2000, "copy", "copies")]).toEqual([
      "1 item",
      "2,000 copies",
    ]);
    expect(listText([])).toBe("");
    expect(listText(["a", "b", "c"])).toBe("a, b and c");
    expect(listText(["a", "b", "c", "d"], 2)).toBe("a, b and 2 more");
  });

  it("shows cells of all kinds", () => {
    expect([undefined, null, 1200, "x", true, { a: 1n }].map(cellText))
      .toEqual(["", "", "1,200", "x", "true", '{"a":"1"}']);
    expect(cellText(new Date(0))).toBe("1970-01-01T00:00:00.000Z");
  });
});

describe("tables", () => {
  it("puts columns of numbers to the right", () => {
    const table = { columns: ["a", "b", "c"], rows: [["x", "1,000", ""], ["2", "-3.5", ""]] };
    expect(rightColumns(table)).toEqual([false, true, false]);
    expect(tableText(table)).toBe("a      b  c\nx  1,000\n2   -3.5");
  });

  it("escapes heads, cells and captions", () => {
    const html = tableHtml({ columns: [EVIL], rows: [[EVIL], [[EVIL, EVIL]]], caption: EVIL });
    expect(html).not.toContain("<script");
    expect(markupProblem(html)).toBe(undefined);
  });

  it("says which rows and columns it leaves out", () => {
    const rows = Array.from(
      { length: 30 },
      () => Object.fromEntries(Array.from({ length: 20 }, (_, i) => [`column ${i}`, i])),
    );
    const { table, rest } = rowsTable(rows);
    expect(table.rows.length).toBe(10);
    expect(rest).toBe("the first 10 of 30 rows, the first 12 of 20 columns");
  });
});

describe("escapeHtml", () => {
  it("leaves nothing that opens a tag, ends an attribute or is no character", () => {
    expect(escapeHtml(`<a b="c" d='e'>&\0\u0008`))
      .toBe("&lt;a b=&quot;c&quot; d=&#39;e&#39;&gt;&amp;\ufffd\ufffd");
  });
});
