/**
 * `deno task kernel [--prefix DIR] [--name NAME]`: tells Jupyter of a Deno kernel for this project's
 * notebooks. Needs no Jupyter to run; a Jupyter installed later finds the kernel too.
 *
 * The kernel reads the configuration nearest above the notebook's folder, so notebooks inside the
 * project find its import map without further ado.
 */
import { homedir } from "node:os";
import { parseArgs } from "node:util";
import process from "node:process";
import { denoKernelspec, kernelsFolder, writeKernelspec } from "./kernelspec.ts";

const USAGE = "usage: deno task kernel [--prefix DIR] [--name NAME]";

/** Carries out the command; returns the exit code. */
function main(args: string[]): number {
  let prefix: string | undefined, name: string;
  try {
    const { values } = parseArgs({
      args,
      options: { prefix: { type: "string" }, name: { type: "string", default: "evenface" } },
    });
    ({ prefix, name } = values);
    const around = { platform: process.platform, env: process.env, home: homedir() };
    const spec = denoKernelspec(process.execPath, "Deno (evenface)");
    const folder = writeKernelspec(kernelsFolder(prefix, around), name, spec);
    console.log(`kernel "${name}" written to ${folder}`);
    console.log(`it starts ${process.execPath}`);
    if (/[\\/]_npx[\\/]/.test(process.execPath)) {
      console.log(
        "this binary lies in npx's cache; run the command again when the cache is cleared",
      );
    }
    return 0;
  } catch (error) {
    console.error(error instanceof Error ? error.message : String(error));
    console.error(USAGE);
    return 2;
  }
}

if (import.meta.main) process.exitCode = main(process.argv.slice(2));
