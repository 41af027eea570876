// Deno only: the Stop button uses Deno's signals and Workers.
import { afterAll, describe, expect, it } from "vitest";
import { withKernelRun } from "../../lib/notebook/kernel-run.ts";
import { coolStopButton, withStopButton } from "../../lib/notebook/stop-button.ts";
import { inFakeKernel } from "./fake-kernel.ts";

/** Runs the child, presses Stop 300 ms after it is ready; what it printed, line by line. */
async function stopped(how: "busy" | "waiting"): Promise<string[]> {
  const child = new Deno.Command(Deno.execPath(), {
    args: ["run", "-A", "--no-check", new URL("./stop-child.ts", import.meta.url).pathname, how],
    stdout: "piped",
  }).spawn();
  let text = "";
  for await (const chunk of child.stdout.pipeThrough(new TextDecoderStream())) {
    if (text === "") setTimeout(() => child.kill("SIGINT"), 300);
    text += chunk;
  }
  expect((await child.status).success).toBe(true);
  return text.trim().split("\n");
}

describe("the Stop button", () => {
  afterAll(coolStopButton);

  for (const how of ["busy", "waiting"] as const) {
    it(`stops a run that is ${how}, swallows a double click, and leaves the next run alone`, async () => {
      const [ready, outcome, next] = await stopped(how);
      expect(ready).toBe("ready");
      const [reason, took] = outcome.split(" ");
      expect(reason).toBe("stop");
      expect(Number(took)).toBeLessThan(2000);
      expect(next).toBe("next unstopped");
    });
  }

  it("starts the next run unstopped, and takes a caller's own signal", async () => {
    const own = new AbortController();
    const states = await withStopButton(own.signal, (signal) => {
      const before = signal.aborted;
      own.abort();
      return Promise.resolve([before, signal.aborted]);
    });
    expect(states).toEqual([false, true]);
  });
});

describe("withKernelRun", () => {
  it("passes options through untouched outside the kernel", async () => {
    const options = { seed: 3 };
    const got = await withKernelRun("solve", options, (o) => Promise.resolve(o));
    expect(got === options).toBe(true);
  });

  it("adds a signal and a line of progress in the kernel", async () => {
    const sent = await inFakeKernel(async () => {
      await withKernelRun("solve", {}, async (options: {
        signal?: AbortSignal;
        onProgress?: (p: { phase: string; done: number; elapsedMs: number }) => void;
      }) => {
        expect(options.signal?.aborted).toBe(false);
        await new Promise((resolve) => setTimeout(resolve, 350));
        options.onProgress?.({ phase: "search", done: 1, elapsedMs: 350 });
      });
    });
    coolStopButton();
    expect(sent.map((m) => m.type)).toEqual(["display_data", "update_display_data"]);
    expect(String(sent[1].data["text/plain"])).toMatch(/^solve: done after/);
  });

  it("leaves progress to a caller who takes it", async () => {
    const seen: string[] = [];
    const sent = await inFakeKernel(() =>
      withKernelRun("solve", { onProgress: (p) => void seen.push(p.phase) }, async (options) => {
        await new Promise((resolve) => setTimeout(resolve, 350));
        options.onProgress?.({ phase: "search", done: 1, elapsedMs: 350 });
      })
    );
    coolStopButton();
    expect(sent).toEqual([]);
    expect(seen).toEqual(["search"]);
  });
});
