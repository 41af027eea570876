/**
 * `deno task test:front [--runs N] [--only headless|stop|lab]`: the notebooks in a real Jupyter.
 * `deno task test:front --update` runs them once and writes the outputs into the committed files.
 *
 * 1. Every committed notebook is executed headless N times (3 if unset), each time with a fresh
 *    kernel; no output may be lost, no error may occur.
 * 2. The Stop button, as a signal to a real kernel during a long solve: the cell ends within a
 *    second with the best found so far, and the kernel keeps its state.
 * 3. The first notebook runs in JupyterLab, in headless Chromium: all outputs there, no error, and a
 *    screenshot for people to look at. There the Stop button is pressed with the mouse as well.
 *
 * Makes a virtual environment of its own with pinned versions; leaves screenshots in out/front/.
 */
import { parseArgs } from "node:util";
import { readdirSync } from "node:fs";
import { Browser } from "./browser.ts";
import { allDone, command, Lab, outputsOf, toHtml } from "./lab.ts";
import { run } from "./run.ts";
import { longSolve } from "./long-solve.ts";
import { JUPYTER_ENV, OUT, prepare, ROOT, VENV } from "./venv.ts";

/** A notebook that is made for one test and taken away again. */
const SCRATCH = "stop-in-lab.ipynb";
/** Seconds a cell may go on after the signal of the Stop button. */
const STOP_WITHIN = 1;
/** The same from the click of the mouse, with what the front end itself takes on a busy machine. */
const STOP_SHOWN_WITHIN = 2;

let passed = 0, failed = 0;

async function check(what: string, body: () => Promise<string>): Promise<void> {
  try {
    console.log(`ok      ${what}: ${await body()}`);
    passed++;
  } catch (error) {
    console.log(`FAILED  ${what}\n${error instanceof Error ? error.message : error}`);
    failed++;
  }
}

function expect(condition: boolean, message: string): void {
  if (!condition) throw new Error(message);
}

const python = async (script: string, ...args: string[]) =>
  JSON.parse(
    await run([`${VENV}/bin/python`, new URL(script, import.meta.url).pathname, ...args], {
      env: JUPYTER_ENV,
    }),
  );

async function headless(notebook: string, runs: number): Promise<string> {
  const path = `${ROOT}notebooks/${notebook}`;
  const got = await python("execute.py", path, String(runs), `${OUT}/${notebook}`);
  const line =
    `${got.runs} runs, ${got.outputs} outputs, ${got.lost} lost, ${got.errors} errors, ` +
    `${got.seconds} s`;
  expect(
    got.outputs > 0 && got.lost === 0 && got.errors === 0 && got.stderr === 0,
    `${line}\n${got.details.join("\n")}`,
  );
  return line;
}

async function stop(): Promise<string> {
  const cells = `${OUT}/stop-cells.json`;
  Deno.writeTextFileSync(cells, JSON.stringify(longSolve(`${ROOT}lib/mod.ts`)));
  const got = await python("stop.py", `${ROOT}notebooks`, cells);
  const all = JSON.stringify(got, null, 1);
  expect(got.alive, `the kernel died\n${all}`);
  expect(got.cells.every((cell: { status: string }) => cell.status === "ok"), all);
  expect(
    got.latency !== null && got.latency < STOP_WITHIN,
    `took ${got.latency} s to stop\n${all}`,
  );
  expect(/feasible [1-9]\d* true/.test(got.cells[2].texts.join()), `no best so far\n${all}`);
  expect(got.cells[3].texts.join().includes("kept 42"), `state lost\n${all}`);
  return `the cell ended ${got.latency.toFixed(3)} s after the signal, state kept`;
}

async function inLab(lab: Lab, browser: Browser, notebook: string): Promise<string> {
  const committed = JSON.parse(Deno.readTextFileSync(`${ROOT}notebooks/${notebook}`));
  await lab.open(browser, notebook);
  await command(browser, "notebook:clear-all-cell-outputs");
  await browser.wait("document.querySelectorAll('.jp-OutputArea-output').length === 0");
  // High enough that every cell is laid out: JupyterLab leaves out what is far below the window.
  await browser.resize(1200, 12_000);
  await command(browser, "notebook:run-all-cells");
  await allDone(browser);
  const cells = await outputsOf(browser);
  const codes = committed.cells.filter((cell: { cell_type: string }) => cell.cell_type === "code");
  expect(cells.length === codes.length, `${cells.length} cells of ${codes.length} are in the page`);
  let outputs = 0;
  codes.forEach((code: { outputs: { data?: object; output_type: string }[] }, i: number) => {
    const wanted = code.outputs.filter((one) =>
      one.output_type !== "execute_result" || Object.keys(one.data ?? {}).length > 0
    ).length;
    outputs += wanted;
    expect(cells[i].errors === 0, `cell ${i + 1} shows an error: ${cells[i].text.slice(0, 500)}`);
    expect(
      cells[i].shown >= wanted,
      `cell ${i + 1}: ${cells[i].shown} outputs, expected ${wanted}`,
    );
  });
  const height = await browser.ask(`(async () => {
    for (const one of document.querySelectorAll('.jp-NotebookPanel *')) one.scrollTop = 0;
    await new Promise((resolve) => setTimeout(resolve, 500));
    return Math.max(...[...document.querySelectorAll('.jp-Cell')]
      .map((cell) => cell.getBoundingClientRect().bottom));
  })()`);
  await browser.resize(1200, Math.ceil(Number(height)) + 60);
  await browser.ask("new Promise((resolve) => setTimeout(resolve, 500))");
  await browser.photograph(`${OUT}/jupyterlab.png`);
  return `${cells.length} cells, ${outputs} outputs, screenshot out/front/jupyterlab.png`;
}

async function stopInLab(lab: Lab, browser: Browser): Promise<string> {
  const path = `${ROOT}notebooks/${SCRATCH}`;
  const [setUp, long, found, state] = longSolve("../lib/mod.ts");
  const cell = (source: string) => ({
    cell_type: "code",
    source,
    outputs: [],
    execution_count: null,
    metadata: {},
  });
  const kernelspec = { name: "evenface", display_name: "Deno (evenface)", language: "typescript" };
  Deno.writeTextFileSync(
    path,
    JSON.stringify({
      nbformat: 4,
      nbformat_minor: 4,
      metadata: { kernelspec },
      cells: [setUp, long, found, state].map(cell),
    }),
  );
  try {
    await lab.open(browser, SCRATCH);
    await command(browser, "notebook:run-all-cells");
    // The second cell is running when its line of progress is there.
    await browser.wait(`document.body.textContent.includes("solve: ")`, 60_000);
    const line = String(
      await browser.ask(
        `[...document.querySelectorAll('.jp-OutputArea-output')].map((o) => o.textContent)
        .find((text) => text.startsWith("solve: "))`,
      ),
    );
    await browser.photograph(`${OUT}/progress.png`);
    const began = performance.now();
    await browser.click('[data-command="notebook:interrupt-kernel"], [title^="Interrupt"]');
    await browser.wait(`document.body.textContent.includes("solve: stopped")`, 20_000);
    const took = (performance.now() - began) / 1000;
    await browser.wait(`document.body.textContent.includes("kept 42")`, 20_000);
    expect(took < STOP_SHOWN_WITHIN, `took ${took} s`);
    await browser.photograph(`${OUT}/stopped.png`);
    return `progress said "${line.trim()}"; stopped ${took.toFixed(2)} s after the click`;
  } finally {
    Deno.removeSync(path);
  }
}

async function printed(browser: Browser, notebook: string): Promise<string> {
  const page = `${OUT}/${notebook.replace(/\.ipynb$/, ".html")}`;
  await toHtml(`${ROOT}notebooks/${notebook}`, page);
  await browser.open(`file://${page}`, 1000, 1200);
  await browser.wait("document.querySelectorAll('.jp-CodeCell').length > 0");
  const lost = await browser.ask(
    `[...document.images].filter((one) => !one.complete || one.naturalWidth === 0).length`,
  );
  expect(lost === 0, `${lost} pictures do not show`);
  await browser.photograph(`${OUT}/nbconvert.png`);
  return "all pictures show";
}

const { values } = parseArgs({
  args: Deno.args,
  options: {
    runs: { type: "string", default: "3" },
    only: { type: "string" },
    update: { type: "boolean" },
  },
});
const runs = Number(values.runs);
if (!Number.isInteger(runs) || runs < 1) {
  console.error(`--runs: expected an integer >= 1, got ${values.runs}`);
  Deno.exit(2);
}
const wanted = (name: string) => values.only === undefined || values.only === name;
await prepare();
const notebooks = readdirSync(`${ROOT}notebooks`)
  .filter((name) => name.endsWith(".ipynb") && name !== SCRATCH).sort();
expect(notebooks.length > 0, "there is no notebook");
if (values.update) {
  for (const name of notebooks) {
    const path = `${ROOT}notebooks/${name}`;
    const got = await python("execute.py", path, "1", path);
    console.log(`${name}: ${got.errors} errors, ${got.stderr} lines of stderr`);
    if (got.errors > 0) console.log(got.details.join("\n"));
    await run([Deno.execPath(), "fmt", "--quiet", path], { cwd: ROOT });
  }
  Deno.exit(0);
}
if (wanted("headless")) {
  for (const name of notebooks) await check(`${name} headless`, () => headless(name, runs));
}
if (wanted("stop")) await check("Stop in a real kernel", stop);
/** A browser of its own for each check: a page that was worked on asks before it is left. */
async function browsing(body: (browser: Browser) => Promise<string>): Promise<string> {
  const browser = await Browser.start();
  try {
    return await body(browser);
  } finally {
    await browser.close();
  }
}

if (wanted("lab")) {
  const lab = await Lab.start();
  try {
    for (const name of notebooks) {
      await check(`${name} in JupyterLab`, () => browsing((b) => inLab(lab, b, name)));
    }
    await check("Stop in JupyterLab", () => browsing((b) => stopInLab(lab, b)));
  } finally {
    await lab.stop();
  }
  for (const name of notebooks) {
    await check(`${name} as a page`, () => browsing((b) => printed(b, name)));
  }
}
console.log(`\n${passed} passed, ${failed} failed`);
Deno.exit(failed === 0 ? 0 : 1);
