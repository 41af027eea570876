/**
 * `deno task bench [name …] [--time-limit SECONDS]`: speed, side by side with HiGHS in the same run,
 * as ratios. Without names all benches run, one after another; run them on an idle machine.
 */
import { parseArgs } from "node:util";
import process from "node:process";
import { blocksBench } from "./blocks.bench.ts";
import { branchBench } from "./branch.bench.ts";
import { kernelBench } from "./kernel.bench.ts";
import { planarityBench } from "./planarity.bench.ts";
import { projectiveBench } from "./projective.bench.ts";

const benches: Readonly<Record<string, (timeLimitMs: number) => Promise<unknown>>> = {
  blocks: (timeLimitMs) => blocksBench(timeLimitMs),
  branch: (timeLimitMs) => branchBench(timeLimitMs),
  kernel: () => Promise.resolve(kernelBench()),
  planarity: () => Promise.resolve(planarityBench()),
  projective: (timeLimitMs) => projectiveBench(timeLimitMs),
};

const { values, positionals } = parseArgs({
  allowPositionals: true,
  options: { "time-limit": { type: "string", default: "60" } },
});
const unknown = positionals.filter((name) => !Object.hasOwn(benches, name));
const seconds = Number(values["time-limit"]);
if (unknown.length > 0 || !(seconds > 0)) {
  console.error(
    `expected any of ${Object.keys(benches).join(", ")} and a time limit in seconds above 0, got ` +
      [...unknown, values["time-limit"]].join(" "),
  );
  process.exit(2);
}
for (const name of positionals.length > 0 ? positionals : Object.keys(benches)) {
  console.log(`\n## ${name}\n`);
  await benches[name](1000 * seconds);
}
