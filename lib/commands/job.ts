/** The main job: tables in; a choice, its proof, its report and a summary out. */
import { join } from "node:path";
import { check } from "../certify/check.ts";
import { toJson } from "../certify/json.ts";
import type { Solution } from "../certify/solution.ts";
import type { Verdict } from "../certify/verdict.ts";
import { report } from "../display/report.ts";
import { toCsv } from "../instance/csv.ts";
import type { Instance } from "../instance/instance.ts";
import type { Row } from "../instance/item.ts";
import { readTables, type Tables } from "../instance/tables.ts";
import { solve } from "../mod.ts";
import type { Displayable } from "../run/displayable.ts";
import { InstanceError } from "../run/errors.ts";
import type { Progress, RunOptions } from "../run/options.ts";
import { anatomyOf } from "./anatomy.ts";
import { writeAll } from "./files.ts";
import { EXIT, type Io } from "./io.ts";

/** What the job is told. */
export interface JobOptions {
  /** Folder the three files go to. */
  readonly out: string;
  /** Seconds; none if unset. */
  readonly timeLimit?: number;
  /** False leaves the timing section out of the report, which then is the same byte for byte. */
  readonly timing?: boolean;
  /** The command that does all this again. */
  readonly rerun: string;
  /** Command that checks the result. */
  readonly recheck: string;
  /** More results for the report. */
  readonly extras?: (instance: Instance, solution: Solution) => Displayable[];
  /** True adds the anatomy: class, core and blocks. */
  readonly anatomy?: boolean;
}

/**
 * Reads, solves, checks, writes `report.html`, `chosen.csv` and `solution.json`, and prints a summary.
 *
 * @param tables sources of items and conflicts
 * @param options where to, how long
 * @param io where to print
 * @returns 0 proved, 3 stopped with a bound; 1 if the checker does not accept a claimed optimum or
 *   the files cannot be written, and then nothing is
 * @throws {InstanceError} for bad input, before anything is written
 */
export async function runJob(tables: Tables, options: JobOptions, io: Io): Promise<number> {
  const instance = await readTables(tables);
  const run: RunOptions = {
    ...(options.timeLimit === undefined ? {} : { timeLimitMs: options.timeLimit * 1000 }),
    ...(io.signal === undefined ? {} : { signal: io.signal }),
    ...(io.showProgress === true ? { onProgress: progressLines(io) } : {}),
  };
  const solution = await solve(instance, run);
  const verdict = solution.status === "optimal" ? check(instance, solution) : undefined;
  if (verdict !== undefined && !verdict.valid) {
    io.err(`nothing written: the checker does not accept the solver's proof: ${verdict.reason}`);
    return EXIT.refused;
  }

  const extras = options.extras?.(instance, solution) ?? [];
  const anatomy = options.anatomy === true ? await anatomyOf(instance, run) : [];
  const results = [
    solution,
    instance,
    ...verdict === undefined ? [] : [verdict],
    ...extras,
    ...anatomy,
  ];
  const html = await report(results, {
    rerun: options.rerun,
    options: run,
    ...(options.timing === undefined ? {} : { timing: options.timing }),
  });
  const files = {
    "report.html": html,
    "chosen.csv": chosenCsv(instance, solution),
    "solution.json": toJson(solution) + "\n",
  };
  try {
    await writeAll(options.out, files);
  } catch (error) {
    io.err(`nothing written: ${(error as Error).message}`);
    return EXIT.refused;
  }
  for (const line of summary(instance, solution, verdict)) io.out(line);
  io.out(`written      ${Object.keys(files).map((name) => join(options.out, name)).join(", ")}`);
  io.out(`check with   ${options.recheck}`);
  io.out(
    "caution      the answer is only as good as the conflict list; where a choice can hurt someone, " +
      "local codes and licensed practice come first",
  );
  return solution.status === "optimal" ? EXIT.proved : EXIT.stopped;
}

/** The rows that were chosen, with all their columns. */
function chosenCsv(instance: Instance, solution: Solution): string {
  const columns = new Set<string>();
  for (const row of instance.items) for (const column of Object.keys(row)) columns.add(column);
  const rows = solution.chosen.map((id): Row => instance.items[instance.indexOf(id)]);
  return toCsv([...columns], rows);
}

/** The answer in about a dozen lines. */
function summary(instance: Instance, solution: Solution, verdict: Verdict | undefined): string[] {
  const unit = instance.unit === "" ? "" : ` ${instance.unit}`;
  const lines = [
    `data         ${instance.name}: ${instance.size} items, ${instance.conflictCount} conflicts`,
    `fingerprint  ${instance.fingerprint}`,
    `chosen       ${solution.chosen.length} items worth ${solution.weight}${unit}`,
  ];
  if (solution.status === "optimal") {
    lines.push("status       optimal, proved in exact integer arithmetic");
  } else {
    const percent = Math.ceil(solution.gap * 1e4) / 100;
    lines.push(
      `status       not proved optimal${
        solution.reason === undefined ? "" : `: ${solution.reason}`
      }`,
      `bound        nothing above ${solution.upperBound}${unit} exists, ${percent} % more at most`,
    );
    if (solution.floatingBound !== undefined) {
      lines.push(`             in floating point, not proved: ${solution.floatingBound}${unit}`);
    }
  }
  for (const line of methods(solution)) lines.push(line);
  if (verdict !== undefined) lines.push(`checker      ${verdict.reason}`);
  for (const note of instance.notes) lines.push(`note         ${note}`);
  lines.push(`time         ${(solution.elapsedMs / 1000).toFixed(2)} s to solve`);
  return lines;
}

/** One line for each engine that solved parts, with what it met. */
function methods(solution: Solution): string[] {
  const byEngine = new Map<string, { parts: number; items: number }>();
  for (const { engine, items } of solution.parts) {
    const sum = byEngine.get(engine) ?? { parts: 0, items: 0 };
    byEngine.set(engine, { parts: sum.parts + 1, items: sum.items + items });
  }
  return Array.from(byEngine, ([engine, { parts, items }], at) => {
    const head = at === 0 ? "methods      " : "             ";
    return `${head}${engine}: ${items} ${items === 1 ? "item" : "items"} in ${parts} ` +
      `${parts === 1 ? "part" : "parts"}`;
  });
}

/** Tells the state of a long run, every two seconds. */
function progressLines(io: Io): (progress: Progress) => void {
  let next = 2000;
  return ({ phase, done, total, lower, upper, elapsedMs }) => {
    if (elapsedMs < next) return;
    next = elapsedMs + 2000;
    const share = total === undefined ? `${done}` : `${done} of ${total}`;
    const bounds = lower === undefined && upper === undefined
      ? ""
      : `, between ${lower ?? "?"} and ${upper ?? "?"}`;
    io.err(`${(elapsedMs / 1000).toFixed(0)} s  ${phase}: ${share}${bounds}`);
  };
}

/** Reads a number of seconds. @throws {InstanceError} */
export function readSeconds(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  const seconds = text.trim() === "" ? NaN : Number(text);
  if (Number.isFinite(seconds) && seconds >= 0) return seconds;
  throw new InstanceError([`--time-limit: expected a number of seconds >= 0, got "${text}"`]);
}
