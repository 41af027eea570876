import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { denoKernelspec, kernelsFolder, writeKernelspec } from "../../lib/notebook/kernelspec.ts";

describe("kernelsFolder", () => {
  const linux = { platform: "linux", env: {}, home: "/home/ada" };

  it("knows where each system keeps a user's kernels", () => {
    expect(kernelsFolder(undefined, linux)).toBe("/home/ada/.local/share/jupyter/kernels");
    expect(kernelsFolder(undefined, { ...linux, platform: "darwin" }))
      .toBe("/home/ada/Library/Jupyter/kernels");
    const windows = { ...linux, platform: "win32", env: { APPDATA: "/roaming" } };
    expect(kernelsFolder(undefined, windows)).toBe("/roaming/jupyter/kernels");
  });

  it("follows the environment, and a prefix before the environment", () => {
    const env = { JUPYTER_DATA_DIR: "/data", XDG_DATA_HOME: "/xdg" };
    expect(kernelsFolder(undefined, { ...linux, env })).toBe("/data/kernels");
    expect(kernelsFolder(undefined, { ...linux, env: { XDG_DATA_HOME: "/xdg" } }))
      .toBe("/xdg/jupyter/kernels");
    expect(kernelsFolder("/venv", { ...linux, env })).toBe("/venv/share/jupyter/kernels");
  });
});

describe("writeKernelspec", () => {
  it("writes a kernel.json that starts this binary and is interrupted by signal", () => {
    const folder = mkdtempSync(join(tmpdir(), "kernels-"));
    try {
      const spec = denoKernelspec("/opt/deno", "Deno here");
      const written = writeKernelspec(folder, "here", spec);
      writeKernelspec(folder, "here", spec);
      const read = JSON.parse(readFileSync(join(written, "kernel.json"), "utf8"));
      expect(read.argv).toEqual([
        "/opt/deno",
        "jupyter",
        "--kernel",
        "--conn",
        "{connection_file}",
      ]);
      expect(read.language).toBe("typescript");
      expect("interrupt_mode" in read).toBe(false);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });

  it("refuses names that Jupyter would not accept", () => {
    const spec = denoKernelspec("/opt/deno", "x");
    for (const name of ["", "a b", "../up", "a/b"]) {
      expect(() => writeKernelspec("/nowhere", name, spec)).toThrow(/kernel name/);
    }
  });
});
