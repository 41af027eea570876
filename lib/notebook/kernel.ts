/**
 * The one place that looks for Deno's Jupyter kernel. Everywhere else asks `kernel()`.
 *
 * Outside the kernel the property `Deno.jupyter` throws when it is read, inside a Worker it is
 * undefined, and under Node there is no `Deno` at all: all three count as "no kernel".
 */
import type { MimeBundle } from "../run/displayable.ts";

/** What this floor uses of `Deno.jupyter`. */
export interface Kernel {
  /** Sends one message to the front end at once, even from a synchronous loop. */
  broadcast(type: string, content: Record<string, unknown>): void;
}

/**
 * Milliseconds to wait after a message, so that it is out before the kernel reports `idle`: front
 * ends drop what comes later. On an idle machine 10 is enough; the rest is for a busy one.
 */
export const SETTLE_MS = 25;

/** The kernel this code runs in, or undefined. */
export function kernel(): Kernel | undefined {
  const deno = (globalThis as { Deno?: { jupyter?: Kernel } }).Deno;
  if (deno === undefined) return undefined;
  try {
    return deno.jupyter;
  } catch {
    return undefined;
  }
}

/** Whether this code runs in a cell of a notebook. */
export function underKernel(): boolean {
  return kernel() !== undefined;
}

/** Waits until what was sent has left the kernel. */
export function settle(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, SETTLE_MS));
}

/** Sends one output to the front end and waits until it is out. */
export async function display(to: Kernel, bundle: MimeBundle): Promise<void> {
  to.broadcast("display_data", { data: bundle, metadata: {}, transient: {} });
  await settle();
}
