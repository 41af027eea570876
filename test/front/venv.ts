/**
 * The Jupyter that the front tests use: a virtual environment of their own below `.cache/`, with
 * pinned versions, this project's kernel installed in it, and settings that keep JupyterLab from
 * asking for the network.
 */
import { fileURLToPath } from "node:url";
import { run } from "./run.ts";

/** Root folder of the project. */
export const ROOT = fileURLToPath(new URL("../../", import.meta.url));
/** Folder of the virtual environment. */
export const VENV = `${ROOT}.cache/venv`;
/** Where the front tests leave screenshots and executed notebooks. */
export const OUT = `${ROOT}out/front`;

/** Environment of every Jupyter process: nothing of the user's own is read or written. */
export const JUPYTER_ENV = {
  JUPYTER_DATA_DIR: `${ROOT}.cache/jupyter/data`,
  JUPYTER_CONFIG_DIR: `${ROOT}.cache/jupyter/config`,
  JUPYTER_RUNTIME_DIR: `${ROOT}.cache/jupyter/runtime`,
  JUPYTERLAB_WORKSPACES_DIR: `${ROOT}.cache/jupyter/workspaces`,
  IPYTHONDIR: `${ROOT}.cache/jupyter/ipython`,
  NO_COLOR: "1",
};

/** Makes or updates the environment; quick when nothing has changed. */
export async function prepare(): Promise<void> {
  const wanted = Deno.readTextFileSync(new URL("./requirements.txt", import.meta.url));
  const stamp = `${VENV}/evenface-requirements.txt`;
  if (await readOr(stamp, "") !== wanted) {
    await makeVenv();
    await run([
      `${VENV}/bin/pip`,
      "install",
      "--quiet",
      "--disable-pip-version-check",
      "-r",
      fileURLToPath(new URL("./requirements.txt", import.meta.url)),
    ]);
    Deno.writeTextFileSync(stamp, wanted);
  }
  await run([Deno.execPath(), "task", "kernel", "--prefix", VENV], { cwd: ROOT });
  Deno.mkdirSync(`${VENV}/share/jupyter/lab/settings`, { recursive: true });
  Deno.writeTextFileSync(
    `${VENV}/share/jupyter/lab/settings/overrides.json`,
    JSON.stringify({
      "@jupyterlab/apputils-extension:notification": { fetchNews: "false", checkForUpdates: false },
      "@jupyterlab/docmanager-extension:plugin": { autosave: false },
      // All cells stand in the page, however far below the window they are.
      "@jupyterlab/notebook-extension:tracker": { windowingMode: "none" },
    }),
  );
  for (const name of ["data", "config", "runtime", "workspaces"]) {
    Deno.mkdirSync(`${ROOT}.cache/jupyter/${name}`, { recursive: true });
  }
  Deno.mkdirSync(OUT, { recursive: true });
}

async function makeVenv(): Promise<void> {
  try {
    await run(["python3", "-m", "venv", VENV]);
  } catch (error) {
    // Debian's own Python leaves venv to a package.
    if (Deno.uid() !== 0) throw error;
    await run(["apt-get", "update", "-q"]);
    await run(["apt-get", "install", "-y", "-q", "python3", "python3-venv"]);
    await run(["python3", "-m", "venv", VENV]);
  }
}

/** Finds Chromium, or installs Debian's when this is root. @returns its path */
export async function chromium(): Promise<string> {
  for (const path of ["/usr/bin/chromium", "/usr/bin/chromium-browser", "/usr/bin/google-chrome"]) {
    if (await exists(path)) return path;
  }
  if (Deno.uid() !== 0) throw new Error("no Chromium found; install the package `chromium`");
  await run(["apt-get", "update", "-q"]);
  await run(["apt-get", "install", "-y", "-q", "chromium"]);
  return "/usr/bin/chromium";
}

async function exists(path: string): Promise<boolean> {
  return await Deno.stat(path).then(() => true, () => false);
}

async function readOr(path: string, otherwise: string): Promise<string> {
  return await Deno.readTextFile(path).catch(() => otherwise);
}
