/**
 * Checks the floors of lib/: a floor imports only floors that stand before it in the list, never a
 * floor's barrel from outside, and no cycle of files exists. Reads the module graph that
 * `deno info --json` prints, so type imports count too.
 *
 * Run with `deno task floors`.
 */
const FLOORS = [
  "run",
  "graph",
  "parity",
  "instance",
  "certify",
  "polytope",
  "reduce",
  "solve",
  "whatif",
  "display",
  "notebook",
  "commands",
];

/** Files of lib/ itself: the public face and the worker's entry may import every floor. */
const ROOF = ["mod.ts", "worker.ts"];

/**
 * The checker trusts no solver's algorithm: what certify/ may import of the floors before it. The
 * queue is a plain container whose order and completeness the checker verifies as it goes.
 */
const CERTIFY_MAY_USE = /^(run|instance)\/|^graph\/(graph|components|two-colouring|heap)\.ts$/;

interface Module {
  specifier: string;
  dependencies?: {
    specifier: string;
    code?: { specifier?: string };
    type?: { specifier?: string };
  }[];
}

const root = new URL("../lib/", import.meta.url).href;

async function moduleGraph(entry: string): Promise<Module[]> {
  const { stdout, success } = await new Deno.Command(Deno.execPath(), {
    args: ["info", "--json", entry],
    stdout: "piped",
    stderr: "inherit",
  }).output();
  if (!success) throw new Error(`deno info failed for ${entry}`);
  return JSON.parse(new TextDecoder().decode(stdout)).modules;
}

function* sources(folder: string): Generator<string> {
  for (const entry of Deno.readDirSync(new URL(folder, root))) {
    if (entry.isDirectory) yield* sources(`${folder}${entry.name}/`);
    else if (entry.name.endsWith(".ts")) yield `${folder}${entry.name}`;
  }
}

const files = [...sources("./")].map((path) => path.slice(2)).sort();
const imports = new Map<string, Set<string>>();
const pending = new Set(files);
while (pending.size > 0) {
  const [file] = pending;
  for (const { specifier, dependencies = [] } of await moduleGraph(new URL(file, root).href)) {
    if (!specifier.startsWith(root)) continue;
    const from = specifier.slice(root.length);
    pending.delete(from);
    const targets = dependencies.flatMap(({ code, type }) =>
      [code?.specifier, type?.specifier].filter((s) => s?.startsWith(root)) as string[]
    );
    imports.set(from, new Set(targets.map((s) => s.slice(root.length))));
  }
  pending.delete(file);
}

const problems: string[] = [];
for (const [from, targets] of imports) {
  if (ROOF.includes(from)) continue;
  const floor = from.split("/")[0];
  const height = FLOORS.indexOf(floor);
  if (height < 0) problems.push(`lib/${from}: no floor is called ${floor}`);
  for (const to of targets) {
    const other = to.split("/")[0];
    if (other === floor) {
      if (to === `${floor}/mod.ts`) problems.push(`lib/${from} imports its own barrel`);
      continue;
    }
    // Commands and the roof are what a user calls; they stand on the public face.
    if (floor === "commands" && to === "mod.ts") continue;
    const below = FLOORS.indexOf(other);
    if (below < 0 || below > height) {
      problems.push(`lib/${from} imports lib/${to}, which is above it`);
    } else if (to.endsWith("/mod.ts")) problems.push(`lib/${from} imports the barrel lib/${to}`);
    if (floor === "certify" && !CERTIFY_MAY_USE.test(to)) {
      problems.push(`lib/${from} imports lib/${to}: the checker uses no solver's algorithm`);
    }
  }
}

/** Cycles of files, by depth-first search with an explicit stack. */
const state = new Map<string, "open" | "closed">();
for (const start of imports.keys()) {
  if (state.has(start)) continue;
  const path: { file: string; rest: string[] }[] = [];
  const open = (file: string) => {
    state.set(file, "open");
    path.push({ file, rest: [...(imports.get(file) ?? [])] });
  };
  open(start);
  while (path.length > 0) {
    const top = path[path.length - 1];
    const next = top.rest.pop();
    if (next === undefined) {
      state.set(top.file, "closed");
      path.pop();
    } else if (state.get(next) === "open") {
      const from = path.findIndex((step) => step.file === next);
      const cycle = path.slice(from).map((step) => step.file);
      problems.push(`a cycle of imports: ${[...cycle, next].join(" -> ")}`);
    } else if (!state.has(next)) {
      open(next);
    }
  }
}

if (problems.length > 0) {
  console.error(problems.join("\n"));
  Deno.exit(1);
}
console.log(`floors: ${imports.size} files, ${FLOORS.length} floors, no import goes up, no cycle`);
