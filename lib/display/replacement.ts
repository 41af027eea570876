/** A replacement in a notebook: what is left, and the tables of the largest blocks replaced. */
import type { GadgetInfo, Replacement } from "../reduce/replacement.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { headingHtml, smallHtml } from "./html.ts";
import { type Table, tableHtml, tableText } from "./table.ts";
import { counted, listText, numberText, secondsText } from "./text.ts";

/** Tables shown; the others are counted. */
const TABLES = 4;

/** The bundle of a replacement. */
export function renderReplacement(replacement: Replacement): MimeBundle {
  const { gadgets, instance, settled, offset, unitsPer, elapsedMs } = replacement;
  const heading = `${counted(gadgets.length, "block")} replaced: ${
    counted(instance.size, "item")
  } and ${counted(instance.conflictCount, "conflict")} left`;
  const bySize = [...gadgets].sort((a, b) => b.block.items.length - a.block.items.length);
  const tables = bySize.slice(0, TABLES).map(gadgetTable);
  const notes = [
    ...(gadgets.length > TABLES
      ? [`tables of the ${TABLES} largest blocks; ${numberText(gadgets.length - TABLES)} more`]
      : []),
    `${counted(settled, "item")} settled by the half-integral kernel`,
    `optimum = ${numberText(offset)} + optimum of what is left / ${numberText(unitsPer)}`,
    secondsText(elapsedMs),
  ];
  return {
    "text/html": headingHtml(heading) + tables.map(tableHtml).join("") +
      notes.map(smallHtml).join(""),
    "text/plain": [heading, ...tables.map(tableText), ...notes].join("\n"),
  };
}

/** What a block loses in each state of its attachments. */
function gadgetTable({ kind, block, items, table }: GadgetInfo): Table {
  const { attachments } = block;
  const stand = kind === "nothing"
    ? "nothing stands"
    : kind === "edge"
    ? "a cost on their conflict stands"
    : `a ${kind} of ${counted(items.length, "item")} stands`;
  const place = attachments.length === 0 ? "" : ` on ${listText(attachments, 3)}`;
  return {
    caption: `For ${counted(block.items.length, "item")}${place} ${stand}`,
    columns: [...attachments, "lost inside the block"],
    right: [...attachments.map(() => false), true],
    rows: table.map(({ chosen, cost }) => [
      ...attachments.map((id) => chosen.includes(id) ? "chosen" : "left"),
      numberText(cost),
    ]),
  };
}
