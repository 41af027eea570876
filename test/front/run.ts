/** Runs other programs for the front tests. */

/** What is asked beside the command. */
export interface RunSettings {
  cwd?: string;
  env?: Record<string, string>;
}

/**
 * Runs a program to its end.
 *
 * @param command program and arguments
 * @returns what it wrote to standard output
 * @throws {Error} when it fails, with what it wrote
 */
export async function run(command: string[], settings: RunSettings = {}): Promise<string> {
  const [program, ...args] = command;
  const { success, code, stdout, stderr } = await new Deno.Command(program, { args, ...settings })
    .output();
  const text = new TextDecoder();
  if (!success) {
    throw new Error(
      `${command.join(" ")} ended with ${code}\n${text.decode(stdout)}${text.decode(stderr)}`,
    );
  }
  return text.decode(stdout);
}
