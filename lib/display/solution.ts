/** A solution in a notebook: the answer first, then the chosen items, then the methods. */
import type { Solution } from "../certify/solution.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { type Answer, answerOf } from "./answer.ts";
import { itemTable } from "./chosen-table.ts";
import { escapeHtml, lineHtml, smallHtml } from "./html.ts";
import { partsTable } from "./parts-table.ts";
import { sourceOf } from "./sources.ts";
import { tableHtml, tableText } from "./table.ts";
import { listText, numberText, secondsText } from "./text.ts";

/** Chosen items shown in a notebook; a report has them all. */
const SHOWN = 10;
/** Ids listed where the rows are not at hand. */
const LISTED = 40;

/** The bundle of a solution. */
export function renderSolution(solution: Solution): MimeBundle {
  const answer = answerOf(solution);
  const html = [answerHtml(answer)], text = [`${answer.headline} ${answer.standing}.`];
  text.push(answer.meaning, ...answer.remarks);
  const source = sourceOf(solution);
  const { chosen } = solution;
  if (chosen.length > 0 && source !== undefined) {
    const table = itemTable(source, chosen, SHOWN);
    const rest = chosen.length > SHOWN
      ? `the ${SHOWN} of greatest worth; ${numberText(chosen.length - SHOWN)} more are chosen`
      : "";
    html.push(tableHtml({ ...table, caption: "Chosen" }), rest === "" ? "" : smallHtml(rest));
    text.push(
      "",
      tableText({ ...table, caption: "Chosen" }),
      ...(rest === "" ? [] : [`(${rest})`]),
    );
  } else if (chosen.length > 0) {
    html.push(lineHtml(`Chosen: ${escapeHtml(listText(chosen, LISTED))}`));
    text.push(`Chosen: ${listText(chosen, LISTED)}`);
  }
  if (solution.parts.length > 0) {
    const table = { ...partsTable(solution), caption: "How it was solved" };
    html.push(tableHtml(table));
    text.push("", tableText(table));
  }
  const print = `${secondsText(solution.elapsedMs)} · data ${
    solution.instance.fingerprint.slice(0, 16)
  }`;
  html.push(smallHtml(print));
  text.push(print);
  return { "text/html": html.join(""), "text/plain": text.join("\n") };
}

/** The answer as the head of an output. */
export function answerHtml(answer: Answer): string {
  const good = answer.standing === "Proved optimal";
  const mark = good ? "✓" : "!";
  return `<div style="font-size:130%;font-weight:600;margin:.2em 0">${
    escapeHtml(answer.headline)
  }</div>` +
    lineHtml(
      `<strong style="border:1.5px solid currentColor;border-radius:4px;padding:.05em .45em;` +
        `margin-right:.5em;white-space:nowrap">${mark} ${escapeHtml(answer.standing)}</strong>` +
        escapeHtml(answer.meaning),
    ) +
    answer.remarks.map((remark) => lineHtml(escapeHtml(remark))).join("");
}
