/// <reference no-default-lib="true" />
/// <reference lib="deno.worker" />
/**
 * A thread that does nothing but wait for the Stop button. The main thread cannot see a signal while
 * it computes; this one can, and raises a flag in shared memory that the run's meter reads.
 *
 * Messages: `{ flag: SharedArrayBuffer }` (4 bytes) starts watching, `"rest"` ends it.
 */
let flag: Int32Array | undefined;

function raise(): void {
  if (flag !== undefined) Atomics.store(flag, 0, 1);
}

self.onmessage = (event: MessageEvent<{ flag: SharedArrayBuffer } | "rest">) => {
  if (event.data === "rest") {
    if (flag !== undefined) Deno.removeSignalListener("SIGINT", raise);
    flag = undefined;
  } else {
    if (flag === undefined) Deno.addSignalListener("SIGINT", raise);
    flag = new Int32Array(event.data.flag);
  }
};
