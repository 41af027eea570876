/** Writing several files, all or none. */
import { randomUUID } from "node:crypto";
import { mkdir, rename, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";

/**
 * Writes files into a folder. Each text goes to a temporary file beside its place first; only when
 * all of them are complete are they renamed, so a full disk or a refused permission changes nothing.
 *
 * @param folder made if it is not there, with the folders above it
 * @param files text by file name
 * @throws what the file system says
 */
export async function writeAll(
  folder: string,
  files: Readonly<Record<string, string>>,
): Promise<void> {
  await mkdir(folder, { recursive: true });
  const ready: { from: string; to: string }[] = [];
  try {
    for (const [name, text] of Object.entries(files)) {
      const from = join(folder, `.${name}.${randomUUID()}`);
      ready.push({ from, to: join(folder, name) });
      await writeFile(from, text);
    }
    for (const { from, to } of ready) await rename(from, to);
  } catch (error) {
    await Promise.all(ready.map(({ from }) => rm(from, { force: true })));
    throw error;
  }
}
