/**
 * A headless Chromium, driven over its debugging protocol: pages are opened, asked and photographed.
 * No more of the protocol than the front tests need.
 */
import { chromium } from "./venv.ts";

/** Flags for a machine without display, network and other users. */
const FLAGS = [
  "--headless",
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
  "--hide-scrollbars",
  "--remote-debugging-port=0",
];

type Json = Record<string, unknown>;

/** A browser with one page. */
export class Browser {
  readonly #process: Deno.ChildProcess;
  readonly #folder: string;
  readonly #socket: WebSocket;
  readonly #waiting = new Map<number, { resolve(v: Json): void; reject(e: Error): void }>();
  #id = 0;

  private constructor(process: Deno.ChildProcess, folder: string, socket: WebSocket) {
    this.#process = process;
    this.#folder = folder;
    this.#socket = socket;
    socket.onmessage = ({ data }) => {
      const message = JSON.parse(data);
      const one = this.#waiting.get(message.id);
      this.#waiting.delete(message.id);
      if (message.error !== undefined) one?.reject(new Error(JSON.stringify(message.error)));
      else one?.resolve(message.result);
    };
  }

  /** Starts the browser. */
  static async start(): Promise<Browser> {
    const folder = Deno.makeTempDirSync({ prefix: "front-" });
    const process = new Deno.Command(await chromium(), {
      args: [...FLAGS, `--user-data-dir=${folder}`, "about:blank"],
      stdout: "null",
      stderr: "null",
    }).spawn();
    const port = await until("the browser's port", 30_000, async () => {
      const text = await Deno.readTextFile(`${folder}/DevToolsActivePort`).catch(() => "");
      return text.split("\n")[0] || undefined;
    });
    const pages = await (await fetch(`http://127.0.0.1:${port}/json`)).json() as Json[];
    const page = pages.find((one) => one.type === "page");
    const socket = new WebSocket(String(page?.webSocketDebuggerUrl));
    await new Promise((resolve, reject) => {
      socket.onopen = resolve;
      socket.onerror = reject;
    });
    const browser = new Browser(process, folder, socket);
    await browser.send("Emulation.setFocusEmulationEnabled", { enabled: true });
    return browser;
  }

  /** Sends one command of the protocol. */
  send(method: string, params: Json = {}): Promise<Json> {
    const id = ++this.#id;
    this.#socket.send(JSON.stringify({ id, method, params }));
    return new Promise((resolve, reject) => this.#waiting.set(id, { resolve, reject }));
  }

  /** Opens an address in a window of the given size. */
  async open(url: string, width: number, height: number): Promise<void> {
    await this.resize(width, height);
    await this.send("Page.navigate", { url });
  }

  /** Sets the size of the window. */
  async resize(width: number, height: number): Promise<void> {
    await this.send("Emulation.setDeviceMetricsOverride", {
      width,
      height,
      deviceScaleFactor: 1,
      mobile: false,
    });
  }

  /** The value of an expression in the page; promises are awaited. */
  async ask(expression: string): Promise<unknown> {
    const answer = await this.send("Runtime.evaluate", {
      expression,
      awaitPromise: true,
      returnByValue: true,
    });
    if (answer.exceptionDetails !== undefined) {
      throw new Error(`in the page: ${JSON.stringify(answer.exceptionDetails).slice(0, 500)}`);
    }
    return (answer.result as Json).value;
  }

  /** Waits until an expression in the page is true. @throws {Error} after `ms` milliseconds */
  async wait(expression: string, ms: number = 60_000): Promise<void> {
    await until(
      expression,
      ms,
      async () => await this.ask(expression).catch(() => false) === true ? true : undefined,
    );
  }

  /** Clicks the middle of the first element that a selector finds. */
  async click(selector: string): Promise<void> {
    const box = await this.ask(`(() => {
      const b = document.querySelector(${JSON.stringify(selector)}).getBoundingClientRect();
      return { x: b.x + b.width / 2, y: b.y + b.height / 2 };
    })()`) as Json;
    const common = { ...box, button: "left", clickCount: 1 };
    await this.send("Input.dispatchMouseEvent", { ...common, type: "mousePressed" });
    await this.send("Input.dispatchMouseEvent", { ...common, type: "mouseReleased" });
  }

  /** Writes a screenshot of the window as a PNG file. */
  async photograph(path: string): Promise<void> {
    const { data } = await this.send("Page.captureScreenshot", { format: "png" });
    await Deno.writeFile(path, Uint8Array.from(atob(String(data)), (c) => c.charCodeAt(0)));
  }

  /** Writes the page as a PDF file, as a printer would get it. */
  async print(path: string): Promise<void> {
    const { data } = await this.send("Page.printToPDF", { preferCSSPageSize: true });
    await Deno.writeFile(path, Uint8Array.from(atob(String(data)), (c) => c.charCodeAt(0)));
  }

  /** Ends the browser. */
  async close(): Promise<void> {
    this.#socket.close();
    this.#process.kill("SIGKILL");
    await this.#process.status;
    await Deno.remove(this.#folder, { recursive: true }).catch(() => {});
  }
}

/** Asks ten times a second until there is an answer. @throws {Error} after `ms` milliseconds */
export async function until<T>(
  what: string,
  ms: number,
  ask: () => Promise<T | undefined>,
): Promise<T> {
  const began = performance.now();
  for (;;) {
    const answer = await ask();
    if (answer !== undefined) return answer;
    if (performance.now() - began > ms) throw new Error(`waited ${ms} ms in vain for: ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}
