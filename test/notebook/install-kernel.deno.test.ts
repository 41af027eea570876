// Deno only: runs the installer as a program.
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";

async function install(args: string[], env: Record<string, string> = {}) {
  const program = new URL("../../lib/notebook/install-kernel.ts", import.meta.url).pathname;
  const { code, stdout, stderr } = await new Deno.Command(Deno.execPath(), {
    args: ["run", "-A", "--no-check", program, ...args],
    env,
  }).output();
  const text = new TextDecoder();
  return { code, out: text.decode(stdout), err: text.decode(stderr) };
}

describe("deno task kernel", () => {
  it("writes the kernelspec below a prefix, or where JUPYTER_DATA_DIR says", async () => {
    const folder = mkdtempSync(join(tmpdir(), "jupyter-"));
    try {
      const first = await install(["--prefix", join(folder, "venv"), "--name", "ours"]);
      const second = await install([], { JUPYTER_DATA_DIR: join(folder, "data") });
      expect([first.code, second.code]).toEqual([0, 0]);
      expect(first.out).toContain(join(folder, "venv", "share", "jupyter", "kernels", "ours"));
      const spec = JSON.parse(
        readFileSync(join(folder, "data", "kernels", "evenface", "kernel.json"), "utf8"),
      );
      expect(spec.argv[0]).toBe(Deno.execPath());
    } finally {
      rmSync(folder, { recursive: true });
    }
  });

  it("says how it is used when it is used wrongly", async () => {
    const { code, err } = await install(["--prefixx", "here"]);
    expect(code).toBe(2);
    expect(err).toContain("usage: deno task kernel");
  });
});
