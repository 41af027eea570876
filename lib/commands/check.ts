/**
 * `deno task check SOLUTION.json ITEMS.csv CONFLICTS.csv`: the independent checker. Reads the tables
 * afresh and loads none of the solvers.
 */
import { readFile } from "node:fs/promises";
import { check } from "../certify/check.ts";
import { readTables } from "../instance/tables.ts";
import { InstanceError } from "../run/errors.ts";
import { printProblems, readArguments, TABLE_OPTIONS, tableSources } from "./arguments.ts";
import { EXIT, type Io, main } from "./io.ts";

const USAGE = "usage: deno task check SOLUTION.json ITEMS.csv CONFLICTS.csv " +
  "[--id COL] [--weight COL]";

/**
 * Checks that a solution's certificate proves its stated value for exactly these tables.
 *
 * @param argv solution, items, conflicts; `-` for one of the tables is standard input. Without
 *   `--id` and `--weight` the columns are those the solution says it was read from, and they are
 *   printed: what was proved is about these columns
 * @param io where to print
 * @returns 0 if it does; 1 if not, with the first thing that is wrong; 2 for bad input
 */
export async function run(argv: string[], io: Io): Promise<number> {
  try {
    const { values, positionals: [path, items, conflicts] } = readArguments(
      argv,
      TABLE_OPTIONS,
      ["SOLUTION.json", "ITEMS.csv", "CONFLICTS.csv"],
      USAGE,
    );
    const solution = await readSolution(path);
    const stated = statedColumns(solution);
    const id = values.id ?? stated.id, weight = values.weight ?? stated.weight;
    const instance = await readTables({ ...await tableSources(items, conflicts, io), id, weight });
    const verdict = check(instance, solution);
    io.out(String(verdict));
    io.out(
      `${instance.size} items, ${instance.conflictCount} conflicts; ids from column ` +
        `"${instance.columns.id}", weights from column "${instance.columns.weight}"`,
    );
    io.out(`fingerprint ${instance.fingerprint}`);
    return verdict.valid ? EXIT.proved : EXIT.refused;
  } catch (error) {
    if (!(error instanceof InstanceError)) throw error;
    printProblems(error, io);
    return EXIT.badInput;
  }
}

async function readSolution(path: string): Promise<unknown> {
  let text: string;
  try {
    text = await readFile(path, "utf8");
  } catch (error) {
    const missing = (error as { code?: string }).code === "ENOENT";
    throw new InstanceError([
      missing
        ? `solution: the file ${JSON.stringify(path)} does not exist`
        : `solution: cannot read ${JSON.stringify(path)}: ${(error as Error).message}`,
    ]);
  }
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new InstanceError([
      `solution: ${JSON.stringify(path)} is not JSON: ${(error as Error).message}`,
    ]);
  }
}

/** The columns a solution says it was read from; the usual ones where it says nothing. */
function statedColumns(solution: unknown): { id?: string; weight?: string } {
  const columns = (solution as { instance?: { columns?: Record<string, unknown> } } | null)
    ?.instance?.columns;
  const text = (value: unknown) => typeof value === "string" ? value : undefined;
  return { id: text(columns?.id), weight: text(columns?.weight) };
}

if (import.meta.main) await main(run);
