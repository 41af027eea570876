/** What the engines do, in words for somebody who does not know them. */
import { numberText } from "./text.ts";

const WORDS: Readonly<Record<string, string>> = {
  relaxation: "settled by the half-integral relaxation (one maximum flow)",
  bipartite: "two-sided: maximum flow",
  transversal: "nearly two-sided: every choice among a few items, the rest by maximum flow",
  projective: "drawn in the projective plane: a shortest path in the dual",
  branch: "branch and bound with exact bounds",
  mip: "integer programming solver, checked in exact arithmetic",
  greedy: "greedy choice; the run ended before more was known",
};

/** An engine's method as a phrase; an engine unknown here goes by its own name. */
export function engineWords(engine: string): string {
  return WORDS[engine] ?? engine;
}

/** The figures of a part as a phrase: `{ verticesLeft: 1277 }` gives "vertices left 1,277". */
export function figuresText(figures: Readonly<Record<string, number | string>>): string {
  return Object.entries(figures).map(([name, value]) => {
    const words = name.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
    return `${words} ${typeof value === "number" ? numberText(value) : value}`;
  }).join(", ");
}
