import { spawn } from "node:child_process";
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, describe, expect, it } from "vitest";
import { run as runCheck } from "../../lib/commands/check.ts";
import { run as runDemo } from "../../lib/commands/demo.ts";
import { writeAll } from "../../lib/commands/files.ts";
import type { Io } from "../../lib/commands/io.ts";
import { run as runSolve } from "../../lib/commands/solve.ts";
import { Random } from "../../lib/run/random.ts";

const root = fileURLToPath(new URL("../../", import.meta.url));
const folder = mkdtempSync(join(tmpdir(), "evenface-commands-"));
afterAll(() => rmSync(folder, { recursive: true }));

const ITEMS = "code;price;who\na;1.5;x\nb;2;y\nc;1.5;z\n";
const CONFLICTS = "left,right,reason\na,b,same hour\nb,c,same table\n";

function file(name: string, text: string): string {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
}

/** What a forger may turn in a solution file. */
interface Forged {
  kind: string;
  weight: number;
  chosen: string[];
  instance: { columns: { weight: string } };
  certificate?: { bound: number; fingerprint: string; parts: unknown[] };
}

/** Runs a command in this process. */
async function call(
  run: (argv: string[], io: Io) => Promise<number>,
  argv: string[],
  stdin = "",
): Promise<{ code: number; out: string; err: string }> {
  const out: string[] = [], err: string[] = [];
  const code = await run(argv, {
    out: (line) => out.push(line),
    err: (line) => err.push(line),
    stdin: () => Promise.resolve(new TextEncoder().encode(stdin)),
  });
  return { code, out: out.join("\n"), err: err.join("\n") };
}

/** Runs a task as a user does. */
function task(argv: string[], stdin = ""): Promise<{ code: number; out: string; err: string }> {
  return new Promise((resolve, reject) => {
    const child = spawn(Deno.execPath(), ["task", ...argv], {
      cwd: root,
      env: { ...Deno.env.toObject(), NO_COLOR: "1" },
    });
    const out: string[] = [], err: string[] = [];
    child.stdout.on("data", (chunk) => out.push(String(chunk)));
    child.stderr.on("data", (chunk) => err.push(String(chunk)));
    child.on("error", reject);
    child.on(
      "close",
      (code) => resolve({ code: code ?? -1, out: out.join(""), err: err.join("") }),
    );
    child.stdin.end(stdin);
  });
}

/** A dense enough random table that no engine settles in a moment. */
function hardTables(): { items: string; conflicts: string } {
  const random = new Random(12);
  const n = 260;
  const items = ["id,weight"], conflicts = ["a,b"];
  for (let i = 0; i < n; i++) {
    items.push(`i${i},${50 + random.below(50)}`);
    for (let j = 0; j < i; j++) if (random.below(20) === 0) conflicts.push(`i${j},i${i}`);
  }
  return {
    items: file("hard-items.csv", items.join("\n") + "\n"),
    conflicts: file("hard-conflicts.csv", conflicts.join("\n") + "\n"),
  };
}

describe("solve", () => {
  const items = file("items.csv", ITEMS), conflicts = file("conflicts.csv", CONFLICTS);
  const columns = ["--id", "code", "--weight", "price"];

  it("writes report, choice and proof, which check accepts", async () => {
    const out = join(folder, "new", "deep");
    const solved = await call(runSolve, [items, conflicts, "--out", out, ...columns]);
    expect([solved.code, solved.err]).toEqual([0, ""]);
    expect(solved.out).toContain("2 items worth 3");
    expect(solved.out.split("\n").length).toBeLessThan(16);
    expect(readdirSync(out).sort()).toEqual(["chosen.csv", "report.html", "solution.json"]);
    expect(readFileSync(join(out, "chosen.csv"), "utf8")).toBe(
      "code,price,who\na,1.5,x\nc,1.5,z\n",
    );
    expect(readFileSync(join(out, "report.html"), "utf8")).toContain(
      `deno task solve ${items} ${conflicts} --out ${out} --id code --weight price`,
    );
    const solution = join(out, "solution.json");
    const checked = await call(runCheck, [solution, items, conflicts]);
    expect(checked.code).toBe(0);
    expect(checked.out).toContain('ids from column "code", weights from column "price"');
  });

  it("reads either table from standard input", async () => {
    const out = join(folder, "stdin");
    const first = await call(runSolve, ["-", conflicts, "--out", out, ...columns], ITEMS);
    expect(first.code).toBe(0);
    const second = await call(runCheck, [join(out, "solution.json"), items, "-"], CONFLICTS);
    expect(second.code).toBe(0);
    const both = await call(runSolve, ["-", "-", "--out", out, ...columns], ITEMS);
    expect([both.code, both.err]).toEqual([
      2,
      "1 problem, nothing written:\n- expected at most one table from standard input, got - twice",
    ]);
  });

  it("lists every problem of bad input and writes nothing", async () => {
    const out = join(folder, "bad");
    const bad = file("bad.csv", "id,weight\na,1\na,x\nb,\n");
    const wrong = file("wrong.csv", "a,b\na,q\nb,b\n");
    const { code, err } = await call(runSolve, [bad, wrong, "--out", out]);
    expect(code).toBe(2);
    expect(err.split("\n")).toEqual([
      "5 problems, nothing written:",
      '- bad.csv line 3: id "a" used before (bad.csv line 2)',
      '- bad.csv line 3 (a): weight "x"; expected a number',
      "- bad.csv line 4 (b): weight missing; expected a number",
      '- wrong.csv line 2: unknown id "q"; expected the id of an item',
      '- wrong.csv line 3: item "b" in conflict with itself',
    ]);
    expect(existsSync(out)).toBe(false);
  });

  it("refuses command lines that mean nothing", async () => {
    for (
      const [argv, said] of [
        [[], "expected ITEMS.csv CONFLICTS.csv, got none"],
        [[items, conflicts], "--out: expected a folder"],
        [[items, conflicts, "--out", "x", "--time-limit", "soon"], "--time-limit: expected"],
        [[items, conflicts, "--out", "x", "--time-limit=-1"], "--time-limit: expected"],
        [[items, conflicts, "--colour"], "--colour"],
        [[items, join(folder, "gone.csv"), "--out", join(folder, "x")], "does not exist"],
      ] as [string[], string][]
    ) {
      const { code, err } = await call(runSolve, argv);
      expect(code).toBe(2);
      expect(err).toContain(said);
    }
    expect(existsSync(join(folder, "x"))).toBe(false);
  });

  it("leaves nothing behind when a file cannot be written", async () => {
    const blocked = file("blocked", "a file where a folder should be");
    const { code, err } = await call(runSolve, [items, conflicts, "--out", blocked, ...columns]);
    expect(code).toBe(1);
    expect(err).toContain("nothing written");
    const half = join(folder, "half");
    await writeAll(half, { "one.txt": "old" });
    const call2 = writeAll(half, { "one.txt": "new", "no/such/folder.txt": "x" });
    expect(await call2.then(() => "written", () => "refused")).toBe("refused");
    expect(readdirSync(half)).toEqual(["one.txt"]);
    expect(readFileSync(join(half, "one.txt"), "utf8")).toBe("old");
  });

  it("stops at the time limit with code 3 and everything written", async () => {
    const hard = hardTables(), out = join(folder, "limit");
    const { code, out: said } = await call(runSolve, [
      hard.items,
      hard.conflicts,
      "--out",
      out,
      "--time-limit",
      "0.5",
    ]);
    expect(code).toBe(3);
    expect(said).toContain("bound        nothing above");
    expect(readdirSync(out).sort()).toEqual(["chosen.csv", "report.html", "solution.json"]);
    const refused = await call(runCheck, [join(out, "solution.json"), hard.items, hard.conflicts]);
    expect(refused.code).toBe(1);
  });

  it("makes the same report again without the timing section", async () => {
    const texts: string[] = [];
    for (let round = 0; round < 2; round++) {
      const out = join(folder, "same");
      await call(runSolve, [items, conflicts, "--out", out, "--no-timing", ...columns]);
      texts.push(readFileSync(join(out, "report.html"), "utf8"));
    }
    expect(texts[1]).toBe(texts[0]);
  });
});

describe("demo and check", () => {
  const data = "notebooks/data/quay-market/";
  const tables = [`${root}${data}requests.csv`, `${root}${data}conflicts.csv`];

  it("prove the bundled scenario, and reject each tampered copy", async () => {
    const out = join(folder, "demo");
    const demo = await call(runDemo, ["--out", out]);
    expect([demo.code, demo.err]).toEqual([0, ""]);
    expect(demo.out).toContain("Night market on Lantern Quay: 312 items, 597 conflicts");
    const text = readFileSync(join(out, "solution.json"), "utf8");
    const forged = async (edit: (solution: Forged) => void) => {
      const solution = JSON.parse(text) as Forged;
      edit(solution);
      const path = file("forged.json", JSON.stringify(solution));
      return await call(runCheck, [path, ...tables]);
    };
    expect((await forged(() => {})).code).toBe(0);
    const edits: ((s: Forged) => void)[] = [
      (s) => s.weight += 5,
      (s) => s.chosen.pop(),
      (s) => s.chosen.push("p01-e01", "p01-e02"),
      (s) => s.certificate!.bound -= 5,
      (s) => s.certificate!.parts.pop(),
      (s) => s.certificate!.fingerprint = "0".repeat(64),
      (s) => delete s.certificate,
      (s) => s.kind = "verdict",
    ];
    for (const edit of edits) {
      const { code, out: said } = await forged(edit);
      expect(code).toBe(1);
      expect(said).toContain("Not proved: ");
    }
    // Barges have no pitch, so this column cannot be the weight.
    expect((await forged((s) => s.instance.columns.weight = "pitch")).code).toBe(2);
    const other = file("cheaper.csv", readFileSync(tables[0], "utf8").replace(/\d+\n$/, "5\n"));
    const elsewhere = await call(runCheck, [join(out, "solution.json"), other, tables[1]]);
    expect(elsewhere.code).toBe(1);
  });

  it("refuse a solution that is not there or no JSON", async () => {
    const gone = await call(runCheck, [join(folder, "none.json"), ...tables]);
    expect([gone.code, gone.err.includes("does not exist")]).toEqual([2, true]);
    const broken = await call(runCheck, [file("broken.json", "{"), ...tables]);
    expect([broken.code, broken.err.includes("is not JSON")]).toEqual([2, true]);
  });

  it("run as tasks", async () => {
    const out = join(folder, "task");
    const demo = await task(["demo", "--out", out]);
    expect(demo.code).toBe(0);
    const solution = join(out, "solution.json");
    const table = readFileSync(tables[1], "utf8");
    const checked = await task(["check", solution, `${data}requests.csv`, "-"], table);
    expect(checked.code).toBe(0);
    expect(checked.out).toContain("Proved");
    const bad = await task(["solve", "-", tables[1], "--out", join(folder, "task-bad")], "id\n");
    expect(bad.code).toBe(2);
    expect(existsSync(join(folder, "task-bad"))).toBe(false);
  });

  it("adds the anatomy to a report when asked", async () => {
    const ring = ["a", "b", "c", "d", "e"];
    const items = file("ring.csv", `id,weight\n${ring.map((id) => `${id},1`).join("\n")}\n`);
    const pairs = ring.map((id, i) => `${id},${ring[(i + 1) % 5]}`);
    const conflicts = file("ring-pairs.csv", `a,b\n${pairs.join("\n")}\n`);
    const out = join(folder, "ring");
    const plain = await call(runSolve, [items, conflicts, "--out", out]);
    expect(plain.code).toBe(0);
    expect(readFileSync(join(out, "report.html"), "utf8")).not.toContain("odd cycle packing");
    expect((await call(runSolve, [items, conflicts, "--out", out, "--anatomy"])).code).toBe(0);
    const report = readFileSync(join(out, "report.html"), "utf8").toLowerCase();
    expect(report).toContain("odd cycle");
    expect(report).toContain("core");
  });
});
