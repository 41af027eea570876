import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { Verdict } from "../../lib/certify/verdict.ts";
import { refusals } from "../../lib/display/decisive.ts";
import { Picture } from "../../lib/display/picture.ts";
import { registerRenderers } from "../../lib/display/register.ts";
import { report } from "../../lib/display/report.ts";
import { saveReport } from "../../lib/display/save-report.ts";
import { Classification } from "../../lib/reduce/classify.ts";
import { markupProblem } from "../support/markup.ts";
import { EVIL, smallMarket } from "../support/quay.ts";
import { firstFit } from "../support/solutions.ts";

registerRenderers();
const instance = smallMarket(5, 4, 1);
const solution = firstFit(instance);
const passed = new Verdict(true, `no choice is worth more than ${solution.weight}`);

/** The text of a page without its tags. */
const words = (html: string) =>
  html.replace(/<style>[\s\S]*<\/style>/, "").replace(/<[^>]*>/g, " ");

describe("report", () => {
  it("is one well-formed page that fetches nothing and fits a phone", async () => {
    const page = await report([instance, solution, passed]);
    expect(page.startsWith("<!DOCTYPE html>")).toBe(true);
    expect(markupProblem(page)).toBe(undefined);
    expect(page).toContain('<html lang="en">');
    expect(page).toContain('name="viewport"');
    expect(page).toContain("@media print");
    // Outside addresses may only be names of namespaces.
    const outside = page.match(/(?:src|href)="(?!#|data:)[^"]*"|url\(|@import|<script|<link/g);
    expect(outside).toBe(null);
  });

  it("escapes ids, names, reasons and cells", async () => {
    const title = `Title ${EVIL}`;
    const page = await report([instance, solution, passed], { title, rerun: EVIL });
    expect(page).not.toContain("<script");
    expect(page).toContain("&lt;script&gt;");
  });

  it("answers first: chosen, worth, proved or not, bound; then what decided; caution last", async () => {
    const page = await report([instance, solution, passed], { timing: false });
    const text = words(page.replace(/<nav[\s\S]*<\/nav>/, ""));
    const order = [
      `${solution.chosen.length} of 20 items chosen, worth`,
      "Proved optimal",
      "proven bound",
      "independent check",
      "Conflicts that decided",
      "Chosen items",
      "How it was solved",
      "Fingerprint",
      instance.fingerprint,
      "How to get this again",
      "Versions",
      "The answer is only as good as the conflict list.",
      "licensed",
    ];
    let at = -1;
    for (const part of order) {
      const next = text.indexOf(part, at + 1);
      expect([part, next > at]).toEqual([part, true]);
      at = next;
    }
  });

  it("lists every chosen item", async () => {
    const page = await report([instance, solution]);
    const table = page.slice(page.indexOf("chosen items, by worth"), page.indexOf('id="method"'));
    for (const id of solution.chosen) {
      if (id !== EVIL) expect(table.includes(`>${id}</td>`)).toBe(true);
    }
    expect(table.match(/<tr>/g)?.length).toBe(solution.chosen.length + 1);
  });

  it("says on its first screen that a run stopped before the proof", async () => {
    const stopped = firstFit(instance, {
      status: "feasible",
      reason: "the time limit of 2 s was reached",
      upperBound: solution.weight + 100,
    });
    const text = words(await report([instance, stopped]));
    const first = text.slice(0, text.indexOf("The refused items of greatest worth"));
    expect(first).toContain("Not proved optimal");
    expect(first).toContain("The run ended early: the time limit of 2 s was reached.");
    expect(first).toContain("at most 100 euros");
    expect(text).toContain("There is no certificate, because optimality is not proved.");
  });

  it("tells of a choice that cannot be had", async () => {
    const none = firstFit(instance, {
      status: "infeasible",
      reason: "a and b are both required, but they are in conflict",
      chosen: [],
      weight: 0,
      upperBound: 0,
      parts: [],
    });
    const text = words(await report([instance, none]));
    expect(text).toContain("No choice is possible.");
    expect(text).toContain("a and b are both required");
  });

  it("is the same byte for byte without timing, and differs only in timing with it", async () => {
    const again = firstFit(smallMarket(5, 4, 1), { elapsedMs: 99.9 });
    const options = { timing: false, options: { seed: 1, onProgress: () => {} } };
    expect(await report([smallMarket(5, 4, 1), again, passed], options))
      .toBe(await report([instance, solution, passed], options));
    const cut = (page: string) =>
      page.replace(/<section aria-labelledby="timing">[\s\S]*?<\/section>/, "");
    const a = await report([instance, solution]), b = await report([instance, again]);
    expect(a === b).toBe(false);
    expect(cut(a)).toBe(cut(b));
  });

  it("leaves out the time that further results took", async () => {
    const took = (elapsedMs: number) =>
      new Classification({
        instance: { name: "m", items: 0, conflicts: 0, fingerprint: "f".repeat(64) },
        components: [],
        elapsedMs,
      });
    const options = { timing: false };
    const page = await report([solution, took(12)], options);
    expect(page).toContain("largest first");
    expect(page).toBe(await report([solution, took(3456)], options));
  });

  it("shows options, but not callbacks and signals", async () => {
    const options = {
      timeLimitMs: 1500,
      onProgress: () => {},
      signal: new AbortController().signal,
    };
    const text = words(await report([instance, solution], { options }));
    expect(text).toContain("timeLimitMs");
    expect(text).not.toContain("onProgress");
    expect(text).not.toContain("signal");
  });

  it("shows further results in the order given", async () => {
    const svg = '<svg xmlns="http://www.w3.org/2000/svg"></svg>';
    const pictures = [new Picture(svg, "first picture"), new Picture(svg, "second picture")];
    const text = words(await report([pictures[0], solution, instance, pictures[1]]));
    expect(text.indexOf("first picture")).toBeGreaterThan(0);
    expect(text.indexOf("second picture")).toBeGreaterThan(text.indexOf("first picture"));
  });

  it("refuses results without a solution, and an instance that is another one", async () => {
    const message = async (promise: Promise<string>) =>
      await promise.then(() => "", (error) => `${error.name}: ${error.message}`);
    expect(await message(report([instance]))).toBe(
      "TypeError: report: expected a solution among the results, got instance",
    );
    expect(await message(report([smallMarket(5, 4, 2), solution]))).toMatch(/^RangeError: report/);
  });

  it("makes do with a solution alone", async () => {
    const page = await report(firstFit(instance));
    expect(markupProblem(page)).toBe(undefined);
    expect(words(page)).toContain("chosen item");
  });
});

describe("saveReport", () => {
  it("writes the page whole, or leaves the old one", async () => {
    const folder = mkdtempSync(join(tmpdir(), "report-"));
    try {
      const path = join(folder, "deep", "report.html");
      await saveReport(path, [instance, solution], { timing: false });
      expect(readFileSync(path, "utf8")).toBe(
        await report([instance, solution], { timing: false }),
      );
      writeFileSync(path, "old");
      await saveReport(path, [instance]).catch(() => {});
      expect(readFileSync(path, "utf8")).toBe("old");
      await saveReport(path, [instance, solution]);
      expect(readdirSync(join(folder, "deep"))).toEqual(["report.html"]);
      // A path that cannot be written leaves nothing behind.
      await saveReport(join(folder, "deep"), [instance, solution]).catch(() => {});
      expect(readdirSync(folder)).toEqual(["deep"]);
      expect(existsSync(path)).toBe(true);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});

describe("refusals", () => {
  it("names the blockers of every refused item with the reasons of the data", () => {
    const chosen = new Set(solution.chosen);
    const list = refusals(instance, solution.chosen);
    expect(list.length).toBe(instance.size - chosen.size);
    for (let i = 1; i < list.length; i++) {
      expect(list[i - 1].weight >= list[i].weight).toBe(true);
    }
    for (const { id, blockers } of list) {
      expect(chosen.has(id)).toBe(false);
      expect(blockers.length).toBeGreaterThan(0);
      for (const blocker of blockers) {
        expect(chosen.has(blocker.id)).toBe(true);
        expect(blocker.reasons.every((r) => r === "rests" || r.startsWith("generator"))).toBe(true);
      }
    }
    expect(refusals(instance, solution.chosen, 3)).toEqual(list.slice(0, 3));
  });
});
