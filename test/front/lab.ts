/** JupyterLab on this machine, with a notebook open in a headless Chromium. */
import { run } from "./run.ts";
import { type Browser, until } from "./browser.ts";
import { JUPYTER_ENV, ROOT, VENV } from "./venv.ts";

const TOKEN = "front-tests";

/** What the page shows of the outputs of one cell. */
export interface CellOutputs {
  /** Outputs with something to see. */
  shown: number;
  errors: number;
  text: string;
}

/** A running JupyterLab. */
export class Lab {
  readonly #server: Deno.ChildProcess;
  readonly #port: number;

  private constructor(server: Deno.ChildProcess, port: number) {
    this.#server = server;
    this.#port = port;
  }

  /** Starts a server on a free port of the loopback interface. */
  static async start(): Promise<Lab> {
    const probe = Deno.listen({ hostname: "127.0.0.1", port: 0 });
    const port = (probe.addr as Deno.NetAddr).port;
    probe.close();
    const server = new Deno.Command(`${VENV}/bin/jupyter-lab`, {
      args: [
        "--no-browser",
        "--allow-root",
        "--ip=127.0.0.1",
        `--port=${port}`,
        `--IdentityProvider.token=${TOKEN}`,
        `--ServerApp.root_dir=${ROOT}notebooks`,
        "--LabApp.extension_manager=readonly",
        "--LabApp.expose_app_in_browser=True",
      ],
      env: JUPYTER_ENV,
      stdout: "null",
      stderr: "null",
    }).spawn();
    const lab = new Lab(server, port);
    try {
      await until(
        "JupyterLab",
        60_000,
        async () =>
          await fetch(`http://127.0.0.1:${port}/api/status?token=${TOKEN}`)
            .then(async (response) => (await response.text(), response.ok || undefined))
            .catch(() => undefined),
      );
    } catch (error) {
      await lab.stop();
      throw error;
    }
    return lab;
  }

  /** Opens a notebook and waits until its kernel is idle. */
  async open(browser: Browser, notebook: string): Promise<void> {
    const url = `http://127.0.0.1:${this.#port}/doc/tree/${notebook}?token=${TOKEN}&reset`;
    await browser.open(url, 1200, 1000);
    await browser.wait("document.querySelectorAll('.jp-CodeCell').length > 0");
    await browser.wait("[...window.jupyterapp.shell.widgets('main')][0]?.context !== undefined");
    await browser.ask(`(async () => {
      await window.jupyterapp.restored;
      const [panel] = window.jupyterapp.shell.widgets("main");
      await panel.context.ready;
      await panel.sessionContext.ready;
      await panel.sessionContext.session.kernel.info;
    })()`);
    await browser.wait(IDLE);
  }

  /** Ends the server and the kernels it started. */
  async stop(): Promise<void> {
    this.#server.kill("SIGTERM");
    const done = await Promise.race([
      this.#server.status.then(() => true),
      new Promise<boolean>((resolve) => setTimeout(() => resolve(false), 15_000)),
    ]);
    if (!done) {
      this.#server.kill("SIGKILL");
      await this.#server.status;
    }
  }
}

/** True when the page says that the kernel is connected and has nothing to do. */
const IDLE = `document.querySelector(
  '.jp-Notebook-ExecutionIndicator')?.getAttribute("data-status") === "idle"`;

/** Carries out a command of JupyterLab, such as `notebook:run-all-cells`. */
export async function command(browser: Browser, name: string): Promise<void> {
  await browser.ask(`void window.jupyterapp.commands.execute(${JSON.stringify(name)})`);
}

/** Waits until every code cell has run: each has a number and none is waiting. */
export async function allDone(browser: Browser, ms: number = 120_000): Promise<void> {
  await browser.wait(
    `(() => {
      const prompts = [...document.querySelectorAll('.jp-CodeCell .jp-InputPrompt')]
        .map((one) => one.textContent);
      return prompts.length > 0 && prompts.every((text) => /\\d/.test(text)) && ${IDLE};
    })()`,
    ms,
  );
}

/** The outputs that the page shows, cell by cell; cells below the window are shown too. */
export async function outputsOf(browser: Browser): Promise<CellOutputs[]> {
  return await browser.ask(`[...document.querySelectorAll('.jp-CodeCell')].map((cell) => {
    const outputs = [...cell.querySelectorAll('.jp-OutputArea-output')]
      .filter((one) => one.textContent.trim() !== "" || one.querySelector("img, svg, canvas"));
    return {
      shown: outputs.length,
      errors: cell.querySelectorAll('[data-mime-type="application/vnd.jupyter.error"]').length,
      text: outputs.map((one) => one.textContent).join("\\n"),
    };
  })`) as CellOutputs[];
}

/** Converts a notebook to HTML without running it, as people share notebooks. */
export async function toHtml(notebook: string, out: string): Promise<void> {
  await run([`${VENV}/bin/jupyter`, "nbconvert", "--to", "html", "--output", out, notebook], {
    env: JUPYTER_ENV,
  });
}
