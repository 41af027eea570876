/** Writes the report to a file, whole or not at all. */
import { randomUUID } from "node:crypto";
import { mkdir, rename, rm, writeFile } from "node:fs/promises";
import { basename, dirname, join } from "node:path";
import type { Displayable } from "../run/displayable.ts";
import { report, type ReportOptions } from "./report.ts";

/**
 * Makes the report and writes it. The file appears complete or stays as it was: the text goes to a
 * file beside it first, which is then renamed.
 *
 * @param path where the report goes; folders on the way are made
 * @param results as for `report`
 * @param options as for `report`
 * @throws as `report`; and what the file system says when the file cannot be written
 */
export async function saveReport(
  path: string,
  results: Displayable | readonly Displayable[],
  options: ReportOptions = {},
): Promise<void> {
  const text = await report(results, options);
  const folder = dirname(path);
  await mkdir(folder, { recursive: true });
  const beside = join(folder, `.${basename(path)}.${randomUUID()}`);
  try {
    await writeFile(beside, text);
    await rename(beside, path);
  } catch (error) {
    await rm(beside, { force: true });
    throw error;
  }
}
