/** Command lines to values, and tables named on them to sources. */
import { parseArgs, type ParseArgsConfig } from "node:util";
import type { Tables, TableSource } from "../instance/tables.ts";
import { InstanceError } from "../run/errors.ts";
import type { Io } from "./io.ts";

/** The options that say how tables are read. */
export const TABLE_OPTIONS = {
  id: { type: "string" },
  weight: { type: "string" },
} as const satisfies ParseArgsConfig["options"];

/**
 * Reads a command line.
 *
 * @param argv without the program's name
 * @param options as `node:util` takes them
 * @param names the positional arguments, all required
 * @param usage shown with every problem
 * @throws {InstanceError} when the command line means nothing
 */
export function readArguments<T extends NonNullable<ParseArgsConfig["options"]>>(
  argv: string[],
  options: T,
  names: readonly string[],
  usage: string,
) {
  // `deno task check -- a b` hands the dashes on.
  const args = argv[0] === "--" ? argv.slice(1) : argv;
  let parsed;
  try {
    parsed = parseArgs({ args, options, allowPositionals: true, strict: true });
  } catch (error) {
    throw new InstanceError([`${(error as Error).message}\n${usage}`]);
  }
  const given = parsed.positionals;
  if (given.length !== names.length) {
    throw new InstanceError([
      `expected ${names.length === 0 ? "no arguments" : names.join(" ")}, got ` +
      `${given.length === 0 ? "none" : given.join(" ")}\n${usage}`,
    ]);
  }
  return { values: parsed.values, positionals: given };
}

/**
 * The sources of two tables; `-` is standard input, for one of them.
 *
 * @throws {InstanceError} when both are `-`, or standard input is not UTF-8
 */
export async function tableSources(
  items: string,
  conflicts: string,
  io: Io,
): Promise<Pick<Tables, "items" | "conflicts">> {
  if (items === "-" && conflicts === "-") {
    throw new InstanceError(["expected at most one table from standard input, got - twice"]);
  }
  const source = async (argument: string): Promise<TableSource> => {
    if (argument !== "-") return argument;
    try {
      const text = new TextDecoder("utf-8", { fatal: true }).decode(await io.stdin());
      return { name: "standard input", text };
    } catch {
      throw new InstanceError(["standard input is not UTF-8 text; expected a CSV table"]);
    }
  };
  return { items: await source(items), conflicts: await source(conflicts) };
}

/** Prints every problem of bad input. */
export function printProblems(error: InstanceError, io: Io): void {
  const count = error.problems.length;
  io.err(count === 1 ? "1 problem, nothing written:" : `${count} problems, nothing written:`);
  for (const problem of error.problems) io.err(`- ${problem}`);
}

/** An argument as a shell takes it. */
export function shellQuoted(argument: string): string {
  return /^[\w./:=@%+,-]+$/.test(argument) ? argument : `'${argument.replaceAll("'", `'\\''`)}'`;
}
