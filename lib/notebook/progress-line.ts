/**
 * One line under the cell that tells how a long run is doing: phase, share done, bounds, time. It
 * appears only when a run lasts longer than a third of a second and is rewritten in place, at most
 * ten times a second. It costs one small message for each rewrite.
 */
import type { Progress } from "../run/options.ts";
import { escapeHtml } from "../display/html.ts";
import { integerText, secondsText } from "../display/text.ts";
import { type Kernel, settle } from "./kernel.ts";

/** Milliseconds a run goes on before its line appears. */
const QUIET_MS = 300;
/** Milliseconds between two rewrites. */
const REWRITE_MS = 100;

let lines = 0;

export class ProgressLine {
  readonly #kernel: Kernel;
  readonly #name: string;
  readonly #id: string;
  readonly #clock: () => number;
  readonly #startedAt: number;
  #shownAt = -Infinity;
  #shown = false;

  /**
   * @param to the kernel
   * @param name the verb of the run, such as `solve`
   * @param clock milliseconds, monotone
   */
  constructor(to: Kernel, name: string, clock: () => number = () => performance.now()) {
    this.#kernel = to;
    this.#name = name;
    // Updates reach a display by its id in the whole notebook, so an id must not come back when the
    // kernel is restarted and the old output still stands there.
    this.#id = `evenface-${Date.now().toString(36)}-${lines++}`;
    this.#clock = clock;
    this.#startedAt = clock();
  }

  /** Takes a report of the run; sends a message only now and then. */
  report(progress: Progress): void {
    const now = this.#clock();
    if (now - this.#startedAt < QUIET_MS || now - this.#shownAt < REWRITE_MS) return;
    this.#shownAt = now;
    this.#send(progressText(this.#name, progress), progress);
  }

  /** Leaves a last word behind if the line was ever shown, and waits until it is out. */
  async finish(word: string): Promise<void> {
    if (!this.#shown) return;
    const took = secondsText(this.#clock() - this.#startedAt);
    this.#send(`${this.#name}: ${word} after ${took}`);
    await settle();
  }

  #send(text: string, progress?: Progress): void {
    this.#kernel.broadcast(this.#shown ? "update_display_data" : "display_data", {
      data: { "text/plain": text, "text/html": lineHtml(text, progress) },
      metadata: {},
      transient: { display_id: this.#id },
    });
    this.#shown = true;
  }
}

/** A report as one line of text. */
export function progressText(name: string, progress: Progress): string {
  const { phase, done, total, lower, upper, elapsedMs } = progress;
  const parts = [`${name}: ${phase}`];
  if (total !== undefined) parts.push(`${integerText(done)} of ${integerText(total)}`);
  else if (done > 0) parts.push(integerText(done));
  if (lower !== undefined && upper !== undefined) {
    parts.push(`between ${integerText(lower)} and ${integerText(upper)}`);
  } else if (lower !== undefined) parts.push(`at least ${integerText(lower)}`);
  else if (upper !== undefined) parts.push(`at most ${integerText(upper)}`);
  parts.push(secondsText(elapsedMs));
  return parts.join(" · ");
}

function lineHtml(text: string, progress: Progress | undefined): string {
  const share = progress?.total !== undefined && progress.total > 0
    ? `<progress max="${progress.total}" value="${progress.done}" ` +
      `style="vertical-align:middle;width:8em;margin-right:.6em"></progress>`
    : "";
  return `<div style="font-size:90%;opacity:.85;font-variant-numeric:tabular-nums">${share}` +
    `${escapeHtml(text)}</div>`;
}
