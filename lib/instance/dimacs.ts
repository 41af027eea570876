/**
 * The DIMACS edge format: `c` comments, one `p edge N M` (or `p col`) line, `n V W` lines for the
 * weights of vertices and `e U V` lines for edges, vertices numbered from 1. Source: "Clique and
 * coloring problems graph format", DIMACS, 1993 (from memory); `n` lines with weights are a common
 * extension. O(length) time.
 */
import { assemble, MOST_ITEMS } from "./assemble.ts";
import { Instance } from "./instance.ts";
import type { Conflict } from "./item.ts";

/**
 * Reads a graph in DIMACS edge format. Ids are "1" to "N"; a vertex without an `n` line weighs 1.
 *
 * @param text the whole file
 * @returns the instance; edges given twice are merged and noted
 * @throws {InstanceError} listing all problems, each with its line
 */
export function readDimacs(text: string): Instance {
  const problems: string[] = [], notes: string[] = [];
  const conflicts: Conflict[] = [], conflictLines: number[] = [];
  const weights = new Map<number, { weight: string; line: number }>();
  let n = -1, announced = 0;

  const vertex = (token: string | undefined, line: number): number => {
    const v = /^\d+$/.test(token ?? "") ? Number(token) : NaN;
    if (v >= 1 && v <= n) return v;
    problems.push(`line ${line}: expected a vertex from 1 to ${n}, got ${token ?? "nothing"}`);
    return 0;
  };

  const lines = text.split(/\r\n|\n|\r/);
  for (let at = 0; at < lines.length; at++) {
    const line = at + 1;
    const tokens = lines[at].trim().split(/\s+/);
    const kind = tokens[0];
    if (kind === "" || kind === "c") continue;
    if (kind === "p") {
      const sizes = tokens.slice(2);
      if (n >= 0) problems.push(`line ${line}: a second p line; expected one`);
      else if (
        !/^(edge|edges|col)$/.test(tokens[1] ?? "") || sizes.length !== 2 ||
        !sizes.every((size) => /^\d{1,9}$/.test(size))
      ) {
        problems.push(`line ${line}: expected "p edge VERTICES EDGES", got "${lines[at].trim()}"`);
        n = Math.max(n, 0);
      } else [n, announced] = sizes.map(Number);
      if (n > MOST_ITEMS) {
        problems.push(`line ${line}: expected at most ${MOST_ITEMS} vertices, got ${n}`);
        n = 0;
      }
    } else if (kind !== "e" && kind !== "n") {
      problems.push(`line ${line}: expected a line of kind c, p, n or e, got "${kind}"`);
    } else if (n < 0) {
      problems.push(`line ${line}: expected the p line first`);
    } else if (tokens.length !== 3) {
      const form = kind === "e" ? '"e VERTEX VERTEX"' : '"n VERTEX WEIGHT"';
      problems.push(`line ${line}: expected ${form}, got "${lines[at].trim()}"`);
    } else if (kind === "e") {
      const u = vertex(tokens[1], line), v = vertex(tokens[2], line);
      if (u === 0 || v === 0) continue;
      conflicts.push([String(u), String(v)]);
      conflictLines.push(line);
    } else {
      const v = vertex(tokens[1], line);
      const before = weights.get(v);
      if (before !== undefined) {
        problems.push(
          `line ${line}: a second weight of vertex ${v} (first on line ${before.line})`,
        );
      } else if (v > 0) weights.set(v, { weight: tokens[2], line });
    }
  }
  if (n < 0) problems.push('no p line; expected "p edge VERTICES EDGES"');
  else if (problems.length === 0 && announced !== conflicts.length) {
    notes.push(`the p line announces ${announced} edges, the file has ${conflicts.length}`);
  }
  const items: object[] = [];
  for (let v = 1; v <= n; v++) items.push({ id: String(v), weight: weights.get(v)?.weight ?? 1 });
  return new Instance(assemble({ items, conflicts }, {
    places: {
      item: (i) => {
        const line = weights.get(i + 1)?.line;
        return line === undefined ? `vertex ${i + 1}` : `line ${line}`;
      },
      conflict: (c) => `line ${conflictLines[c]}`,
    },
    problems,
    partial: problems.length > 0,
    notes,
  }));
}

/**
 * Writes an instance in DIMACS edge format, vertices in input order, ids as comments.
 *
 * @param instance any instance whose weights are whole; others are written times their scale, which
 *   a comment states
 * @returns the text; O(n + m) time
 */
export function toDimacs(instance: Instance): string {
  const { graph, weights, scale, size, ids } = instance;
  const lines: string[] = [];
  if (scale !== 1) lines.push(`c weights are times ${scale}`);
  for (let i = 0; i < size; i++) lines.push(`c ${i + 1} is ${JSON.stringify(ids[i])}`);
  lines.push(`p edge ${size} ${graph.m}`);
  for (let i = 0; i < size; i++) lines.push(`n ${i + 1} ${weights[i]}`);
  for (let e = 0; e < graph.m; e++) lines.push(`e ${graph.tails[e] + 1} ${graph.heads[e] + 1}`);
  return lines.join("\n") + "\n";
}
