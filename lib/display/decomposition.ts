/** A decomposition in a notebook: each component in a sentence, then the largest blocks. */
import type { Decomposition } from "../reduce/decomposition.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { headingHtml, smallHtml } from "./html.ts";
import { type Table, tableHtml, tableText } from "./table.ts";
import { counted, listText, numberText, secondsText } from "./text.ts";

/** Components and blocks shown; the others are counted. */
const COMPONENTS = 5, BLOCKS = 10;
/** Ids listed in a cell. */
const LISTED = 4;

/** The bundle of a decomposition. */
export function renderDecomposition(decomposition: Decomposition): MimeBundle {
  const { components, instance, elapsedMs } = decomposition;
  const blocks = components.flatMap((component) => component.blocks);
  const heading = `${instance.name}: ${counted(components.length, "component")}, ${
    counted(blocks.length, "block")
  } with ${counted(blocks.reduce((sum, { items }) => sum + items.length, 0), "item")}`;
  const bySize = [...components].sort((a, b) => b.items.length - a.items.length);
  const notes = bySize.slice(0, COMPONENTS).map((component) => component.note);
  if (components.length > COMPONENTS) {
    notes.push(`${counted(components.length - COMPONENTS, "smaller component")} not listed`);
  }
  const largest = [...blocks].sort((a, b) => b.items.length - a.items.length);
  const table: Table = {
    caption: "Blocks: items that hang on at most three others, without an odd cycle",
    columns: ["items", "hangs on", "one side", "other side"],
    right: [true, false, false, false],
    rows: largest.slice(0, BLOCKS).map(({ items, attachments, sides }) => [
      numberText(items.length),
      attachments.length === 0 ? "nothing" : listText(attachments, LISTED),
      listText(sides[0], LISTED),
      listText(sides[1], LISTED),
    ]),
  };
  const tables = blocks.length === 0 ? [] : [table];
  if (blocks.length > BLOCKS) {
    notes.push(`the ${BLOCKS} largest blocks are listed, ${numberText(blocks.length)} were found`);
  }
  notes.push(`${secondsText(elapsedMs)} · data ${instance.fingerprint.slice(0, 16)}`);
  return {
    "text/html": headingHtml(heading) + tables.map(tableHtml).join("") +
      notes.map(smallHtml).join(""),
    "text/plain": [heading, ...tables.map(tableText), ...notes].join("\n"),
  };
}
