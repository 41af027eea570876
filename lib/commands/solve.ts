/** `deno task solve ITEMS.csv CONFLICTS.csv --out DIR`: the main job on the user's own tables. */
import { InstanceError } from "../run/errors.ts";
import {
  printProblems,
  readArguments,
  shellQuoted,
  TABLE_OPTIONS,
  tableSources,
} from "./arguments.ts";
import { EXIT, type Io, main } from "./io.ts";
import { readSeconds, runJob } from "./job.ts";

const USAGE =
  "usage: deno task solve ITEMS.csv CONFLICTS.csv --out DIR [--id COL] [--weight COL] " +
  "[--time-limit S] [--name TEXT] [--unit TEXT] [--anatomy] [--no-timing]";

const OPTIONS = {
  ...TABLE_OPTIONS,
  out: { type: "string" },
  "time-limit": { type: "string" },
  name: { type: "string" },
  unit: { type: "string" },
  anatomy: { type: "boolean" },
  "no-timing": { type: "boolean" },
} as const;

/**
 * Solves and writes `report.html`, `chosen.csv` and `solution.json` into the folder `--out`.
 *
 * @param argv items and conflicts, as paths, addresses or `-` for standard input, and options:
 *   columns of id and weight, seconds to stop after, title and unit for the report, and whether to
 *   add the instance's anatomy or leave the timing section out
 * @param io where to print
 * @returns 0 optimal; 2 bad input, every problem printed and nothing written; 3 stopped at the limit
 *   or by Ctrl-C, everything written; 1 for any other failure, nothing written
 */
export async function run(argv: string[], io: Io): Promise<number> {
  try {
    const { values, positionals: [items, conflicts] } = readArguments(
      argv,
      OPTIONS,
      ["ITEMS.csv", "CONFLICTS.csv"],
      USAGE,
    );
    const { id, weight, out, name, unit } = values;
    const problems: string[] = [];
    if (out === undefined || out === "") problems.push(`--out: expected a folder\n${USAGE}`);
    let timeLimit: number | undefined;
    try {
      timeLimit = readSeconds(values["time-limit"]);
    } catch (error) {
      problems.push(...(error as InstanceError).problems);
    }
    if (out === undefined || problems.length > 0) throw new InstanceError(problems);
    const again = (command: string) => `deno task ${command}`;
    const columns = [["--id", id], ["--weight", weight]]
      .flatMap(([flag, value]) => value === undefined ? [] : [flag, value]) as string[];
    const folder = out.replace(/\/+$/, "") || out;
    return await runJob(
      { ...await tableSources(items, conflicts, io), id, weight, name, unit },
      {
        out,
        timeLimit,
        timing: values["no-timing"] !== true,
        anatomy: values.anatomy === true,
        rerun: again(["solve", ...argv.filter((one) => one !== "--")].map(shellQuoted).join(" ")),
        recheck: again(
          ["check", `${folder}/solution.json`, items, conflicts, ...columns].map(shellQuoted)
            .join(" "),
        ),
      },
      io,
    );
  } catch (error) {
    if (!(error instanceof InstanceError)) throw error;
    printProblems(error, io);
    return EXIT.badInput;
  }
}

if (import.meta.main) await main(run);
