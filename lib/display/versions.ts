/** What a result was made with: this library, what it runs on, and the solver it may call. */
import process from "node:process";
import project from "../../deno.json" with { type: "json" };
import map from "../../import_map.json" with { type: "json" };

/** Name and version of each, in a fixed order. */
export function versions(): [name: string, version: string][] {
  const deno = (process.versions as Record<string, string | undefined>).deno;
  const highs = map.imports.highs.split("@").at(-1) ?? "";
  return [
    ["evenface", project.version],
    deno === undefined ? ["Node", process.versions.node] : ["Deno", deno],
    ["HiGHS (npm)", highs],
    ["certificate", "version 1"],
  ];
}
