/** `deno task demo`: the main job on the bundled scenario, the night market on Lantern Quay. */
import { fileURLToPath } from "node:url";
import { chartWeights } from "../display/weight-chart.ts";
import { drawConflicts } from "../display/conflict-picture.ts";
import { InstanceError } from "../run/errors.ts";
import { printProblems, readArguments } from "./arguments.ts";
import { EXIT, type Io, main } from "./io.ts";
import { runJob } from "./job.ts";

const FOLDER = "notebooks/data/quay-market";

const bundled = (name: string) =>
  fileURLToPath(new URL(`../../${FOLDER}/${name}`, import.meta.url));

/**
 * Solves the bundled scenario and writes into `out/`.
 *
 * @param argv `--out DIR` for another folder, `--no-timing` for a report without times
 * @param io where to print
 * @returns exit codes as those of `solve`
 */
export async function run(argv: string[], io: Io): Promise<number> {
  try {
    const { values: { out = "out", "no-timing": noTiming } } = readArguments(
      argv,
      { out: { type: "string" }, "no-timing": { type: "boolean" } },
      [],
      "usage: deno task demo [--out DIR] [--no-timing]",
    );
    return await runJob(
      {
        name: "Night market on Lantern Quay",
        unit: "euros",
        items: bundled("requests.csv"),
        conflicts: bundled("conflicts.csv"),
        weight: "offer",
      },
      {
        out,
        timing: noTiming !== true,
        anatomy: true,
        rerun: "deno task demo",
        recheck:
          `deno task check ${out}/solution.json ${FOLDER}/requests.csv ${FOLDER}/conflicts.csv`,
        extras: (instance, solution) => [
          chartWeights(instance, solution),
          drawConflicts(instance, { solution }),
        ],
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
