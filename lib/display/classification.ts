/** A classification in a notebook: the sentence, each large component, and the witnesses. */
import type { Classification, ClassifiedComponent, Interval } from "../reduce/classify.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { headingHtml, smallHtml } from "./html.ts";
import { type Table, tableHtml, tableText } from "./table.ts";
import { counted, listText, numberText, secondsText } from "./text.ts";

/** Components shown; the others are counted. */
const COMPONENTS = 8;
/** Ids listed of a transversal, and of an odd cycle. */
const LISTED = 6;

/** The bundle of a classification. */
export function renderClassification(classification: Classification): MimeBundle {
  const { components, instance, elapsedMs, sentence } = classification;
  const bySize = [...components].sort((a, b) => b.items.length - a.items.length);
  const shown = bySize.slice(0, COMPONENTS);
  const table: Table = {
    caption: `${instance.name}: ${counted(components.length, "component")}, largest first`,
    columns: [
      "items",
      "kind",
      "odd cycle transversal",
      "disjoint odd cycles",
      "even faces",
      "because",
    ],
    right: [true, false, true, true, false, false],
    rows: shown.map((component) => [
      numberText(component.items.length),
      component.kind,
      intervalText(component.oddCycleTransversal),
      intervalText(component.oddCyclePacking),
      component.evenFace,
      component.because,
    ]),
  };
  const { lower, upper } = classification.oddCyclePacking;
  const notes = [
    `In all: odd cycle transversal ${intervalText(classification.oddCycleTransversal)}, ` +
    `disjoint odd cycles ${intervalText(classification.oddCyclePacking)}, largest ` +
    `subdeterminant of the conflict matrix 2^${lower}${lower === upper ? "" : ` to 2^${upper}`}.`,
    ...shown.flatMap(witnesses).slice(0, COMPONENTS),
  ];
  if (components.length > COMPONENTS) {
    notes.push(`${counted(components.length - COMPONENTS, "smaller component")} not listed`);
  }
  notes.push(`${secondsText(elapsedMs)} · data ${instance.fingerprint.slice(0, 16)}`);
  return {
    "text/html": headingHtml(sentence) + tableHtml(table) + notes.map(smallHtml).join(""),
    "text/plain": [sentence, tableText(table), ...notes].join("\n"),
  };
}

/** What shows that a component is of its kind. */
function witnesses({ kind, oddCyclePacking, oddCycleTransversal }: ClassifiedComponent): string[] {
  if (kind === "bipartite") return [];
  const [first, second] = oddCyclePacking.cycles;
  const notes: string[] = [];
  if (second !== undefined) {
    notes.push(`Two disjoint odd cycles: ${cycleText(first)}; and ${cycleText(second)}`);
  } else if (first !== undefined) notes.push(`An odd cycle: ${cycleText(first)}`);
  if (kind === "near-bipartite") {
    notes.push(`Two-sided without ${listText(oddCycleTransversal.items, LISTED)}`);
  }
  return notes;
}

function cycleText(cycle: readonly string[]): string {
  if (cycle.length <= LISTED + 1) return cycle.join(" – ");
  return `${cycle.slice(0, LISTED).join(" – ")} – … (${numberText(cycle.length)} items)`;
}

/** "5", or "5 to 9". */
function intervalText({ lower, upper }: Interval): string {
  return lower === upper ? numberText(lower) : `${numberText(lower)} to ${numberText(upper)}`;
}
