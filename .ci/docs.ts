/**
 * Checks the documentation of everything the floors export. `deno doc --lint` also complains about
 * the types of packages; only what stands in lib/ counts here.
 *
 * Run with `deno task docs`, which then runs the examples as well.
 */
const root = new URL("../lib/", import.meta.url);
const barrels = [...Deno.readDirSync(root)]
  .filter((entry) => entry.isDirectory)
  .map((entry) => new URL(`${entry.name}/mod.ts`, root))
  .filter((barrel) => {
    try {
      return Deno.statSync(barrel).isFile;
    } catch {
      return false;
    }
  });

function isField(finding: string): boolean {
  const [, path, line] = /--> (\S+?):(\d+):\d+/.exec(finding) ?? [];
  const text = Deno.readTextFileSync(path).split("\n")[Number(line) - 1];
  return /^\s+((override|readonly|get) )*\w+\??(:|;| =|\(\): )/.test(text);
}

const { stderr } = await new Deno.Command(Deno.execPath(), {
  args: ["doc", "--lint", new URL("mod.ts", root).href, ...barrels.map((barrel) => barrel.href)],
  env: { NO_COLOR: "1" },
  stdout: "null",
  stderr: "piped",
}).output();
const findings = new TextDecoder().decode(stderr).split(/\n(?=error\[)/)
  .filter((finding) => finding.startsWith("error[") && finding.includes(`--> ${root.pathname}`))
  // A type of a package is documented by its package.
  .filter((finding) => !/private type '(AbstractGraph|UndirectedGraph)'/.test(finding))
  // A field may speak for itself; whatever can be called, and every type, has to say what it does.
  .filter((finding) => !(finding.startsWith("error[missing-jsdoc]") && isField(finding)));
if (findings.length > 0) {
  console.error(findings.join("\n"));
  console.error(`docs: ${findings.length} findings`);
  Deno.exit(1);
}
console.log(`docs: everything that lib/mod.ts and ${barrels.length} floors export is documented`);
