/**
 * How the parts of an instance were solved, as a table. Parts solved the same way with nothing to
 * tell apart are one row, so that ten thousand small parts do not make ten thousand rows.
 */
import type { Solution, SolutionPart } from "../certify/solution.ts";
import { amountText } from "./answer.ts";
import { engineWords, figuresText } from "./engine-words.ts";
import type { Table } from "./table.ts";
import { numberText } from "./text.ts";

/** Parts up to which each has a row of its own. */
const ONE_EACH = 12;

/** The table of methods. */
export function partsTable(solution: Solution): Table {
  const unit = solution.instance.unit;
  const groups = grouped(solution.parts);
  return {
    columns: ["parts", "items", "conflicts", "method", "why", "worth", "bound"],
    right: [true, true, true, false, false, true, true],
    rows: groups.map((list) => {
      const [first] = list;
      const figures = list.length === 1 ? figuresText(first.figures) : "";
      return [
        numberText(list.length),
        numberText(total(list, (p) => p.items)),
        numberText(total(list, (p) => p.conflicts)),
        engineWords(first.engine) + (figures === "" ? "" : ` (${figures})`),
        first.why.join("; "),
        amountText(total(list, (p) => p.weight), unit),
        first.optimal ? "met" : amountText(total(list, (p) => p.upperBound), unit),
      ];
    }),
  };
}

function grouped(parts: readonly SolutionPart[]): SolutionPart[][] {
  if (parts.length <= ONE_EACH) return parts.map((part) => [part]);
  const groups = new Map<string, SolutionPart[]>();
  for (const part of parts) {
    const key = JSON.stringify([part.engine, part.optimal, part.why]);
    const list = groups.get(key);
    if (list === undefined) groups.set(key, [part]);
    else list.push(part);
  }
  return [...groups.values()];
}

function total(parts: readonly SolutionPart[], of: (part: SolutionPart) => number): number {
  // Worth in units may carry binary fractions; twelve digits are what a reader can use.
  return Number(parts.reduce((sum, part) => sum + of(part), 0).toPrecision(15));
}
