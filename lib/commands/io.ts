/** What a command sees of the world, in one place, so that tests can put something else there. */
import { Buffer } from "node:buffer";
import process from "node:process";

/** Exit codes of all commands. */
export const EXIT = {
  /** Proved: an optimum found, or a certificate accepted. */
  proved: 0,
  /** The certificate does not prove what is stated; or something failed that is not the input's fault. */
  refused: 1,
  /** Bad input or usage; nothing was written. */
  badInput: 2,
  /** Stopped before the proof was complete; what was found is written with its bound. */
  stopped: 3,
} as const;

/** Where a command reads and writes besides files. */
export interface Io {
  /** Prints a line of the answer. */
  out(line: string): void;
  /** Prints a line about the run: problems, progress. */
  err(line: string): void;
  /** All of standard input, as bytes. */
  stdin(): Promise<Uint8Array>;
  /** Asked for by Ctrl-C: the run ends with the best it has. */
  readonly signal?: AbortSignal;
  /** Whether to tell how a long run goes. */
  readonly showProgress?: boolean;
}

/** The process's own streams; the first Ctrl-C asks for a stop, the second ends the process. */
export function processIo(): Io {
  const stop = new AbortController();
  process.once("SIGINT", () => stop.abort());
  return {
    out: (line) => console.log(line),
    err: (line) => console.error(line),
    stdin: async () => {
      const chunks: Uint8Array[] = [];
      for await (const chunk of process.stdin) chunks.push(chunk);
      return Buffer.concat(chunks);
    },
    signal: stop.signal,
    showProgress: process.stderr.isTTY === true,
  };
}

/** Runs a command as the process: its exit code becomes the process's. */
export async function main(run: (argv: string[], io: Io) => Promise<number>): Promise<never> {
  process.exit(await run(process.argv.slice(2), processIo()));
}
