/**
 * Kernelspecs: the small folder through which Jupyter learns of a kernel. Nothing here needs Jupyter
 * or Python; where the folder belongs is worked out from the system and the environment.
 */
import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";

/** What decides where a kernelspec goes. */
export interface Surroundings {
  /** As `process.platform` names it. */
  platform: string;
  /** Environment variables. */
  env: Record<string, string | undefined>;
  /** The user's home folder. */
  home: string;
}

/**
 * The folder that holds kernelspecs.
 *
 * @param prefix an environment's root, such as a Python virtual environment; wins over all else
 * @param around system, environment and home
 * @returns `<prefix>/share/jupyter/kernels`, else the user's own: below `JUPYTER_DATA_DIR` where that
 *   is set, else where Jupyter keeps user data on this system
 * Source: Jupyter documentation, "Common Directories and File Locations" (written from memory).
 */
export function kernelsFolder(prefix: string | undefined, around: Surroundings): string {
  if (prefix !== undefined) return join(prefix, "share", "jupyter", "kernels");
  const { platform, env, home } = around;
  if (env.JUPYTER_DATA_DIR) return join(env.JUPYTER_DATA_DIR, "kernels");
  if (platform === "darwin") return join(home, "Library", "Jupyter", "kernels");
  if (platform === "win32") {
    const roaming = env.APPDATA || join(home, "AppData", "Roaming");
    return join(roaming, "jupyter", "kernels");
  }
  return join(env.XDG_DATA_HOME || join(home, ".local", "share"), "jupyter", "kernels");
}

/** The contents of kernel.json. `interrupt_mode` is left at its default, by signal. */
export interface Kernelspec {
  argv: string[];
  display_name: string;
  language: string;
  metadata: { debugger: boolean };
}

/**
 * The kernelspec that starts Deno's kernel with this very binary.
 *
 * @param deno path of the Deno binary
 * @param displayName what a launcher shows
 */
export function denoKernelspec(deno: string, displayName: string): Kernelspec {
  return {
    argv: [deno, "jupyter", "--kernel", "--conn", "{connection_file}"],
    display_name: displayName,
    language: "typescript",
    metadata: { debugger: false },
  };
}

/**
 * Writes a kernelspec; an older one of the same name is replaced.
 *
 * @param kernels the folder that holds kernelspecs
 * @param name folder name of the kernel: letters, digits, `.`, `_` and `-`
 * @param spec what to write
 * @returns the folder written
 * @throws {RangeError} for a name that Jupyter would not accept
 */
export function writeKernelspec(kernels: string, name: string, spec: Kernelspec): string {
  if (!/^[A-Za-z0-9._-]+$/.test(name)) {
    throw new RangeError(
      `kernel name: expected letters, digits, ".", "_" and "-", got ${JSON.stringify(name)}`,
    );
  }
  const folder = join(kernels, name);
  mkdirSync(folder, { recursive: true });
  writeFileSync(join(folder, "kernel.json"), JSON.stringify(spec, null, 2) + "\n");
  return folder;
}
