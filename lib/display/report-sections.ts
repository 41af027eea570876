/** The sections of the report, each a pure function from results to HTML. */
import type { Solution } from "../certify/solution.ts";
import type { Verdict } from "../certify/verdict.ts";
import type { Instance } from "../instance/instance.ts";
import { amountText, answerOf } from "./answer.ts";
import { fixedText, itemTable } from "./chosen-table.ts";
import { type Refusal, refusals } from "./decisive.ts";
import { escapeHtml } from "./html.ts";
import { reasonsTable, worthInAll } from "./instance.ts";
import { partsTable } from "./parts-table.ts";
import { reportTable } from "./report-table.ts";
import { counted, listText, numberText, percentText, secondsText } from "./text.ts";
import { versions } from "./versions.ts";
import { chartWeights, drawChart } from "./weight-chart.ts";

/** Refused items in the section on the conflicts that decided. */
const REFUSALS = 10;

/** A section with its heading. */
export function section(id: string, heading: string, body: string): string {
  return `<section aria-labelledby="${id}">\n<h2 id="${id}">${escapeHtml(heading)}</h2>\n${body}` +
    `</section>\n`;
}

function paragraph(text: string): string {
  return `<p>${escapeHtml(text)}</p>\n`;
}

/** The first screen: what was chosen, what it is worth, what is proved. */
export function answerSection(solution: Solution, verdict: Verdict | undefined): string {
  const answer = answerOf(solution);
  const { instance, status } = solution;
  const good = status === "optimal" ? "good" : "warn";
  const figures: [string, string][] = status === "infeasible" ? [] : [
    ["chosen", `${numberText(solution.chosen.length)} of ${numberText(instance.items)}`],
    ["worth", amountText(solution.weight, instance.unit)],
    ["proven bound", amountText(solution.upperBound, instance.unit)],
    ["gap", status === "optimal" ? "0%" : percentText(solution.gap)],
  ];
  if (verdict !== undefined && (verdict.valid || status === "optimal")) {
    figures.push(["independent check", verdict.valid ? "passed" : "failed"]);
  }
  return `<p class="headline">${escapeHtml(answer.headline)}</p>\n` +
    `<p><strong class="standing ${good}">${escapeHtml(answer.standing)}</strong> ` +
    `${escapeHtml(answer.meaning)}</p>\n` +
    answer.remarks.map((text) => `<p class="remark">${escapeHtml(text)}</p>\n`).join("") +
    (figures.length === 0
      ? ""
      : `<dl class="figures">${
        figures.map(([name, value]) =>
          `<div><dt>${escapeHtml(name)}</dt><dd>${escapeHtml(value)}</dd></div>`
        ).join("")
      }</dl>\n`) +
    (verdict === undefined
      ? ""
      : paragraph(`The independent checker says: ${sentence(verdict.reason)}`)) +
    `<p>The answer is only as good as the list of conflicts: see <a href="#caution">caution</a>.` +
    `</p>\n`;
}

/** A text as the end of a sentence. */
function sentence(text: string): string {
  return /[.!?]$/.test(text) ? text : `${text}.`;
}

/** Refused items of great worth and the conflicts that kept them out. */
export function decisiveSection(instance: Instance, solution: Solution): string {
  const list = refusals(instance, solution.chosen, REFUSALS);
  if (list.length === 0) return "";
  const unit = instance.unit === "" ? "" : ` (${instance.unit})`;
  return paragraph(
    `The refused items of greatest worth, and the chosen items that each of them conflicts with. ` +
      `To choose one of them, all of its blockers have to go, and what depends on them changes too.`,
  ) + reportTable({
    caption: "Refused items of greatest worth",
    columns: ["refused", `worth${unit}`, "blocked by", `worth of blockers${unit}`],
    right: [false, true, false, true],
    rows: list.map((refusal) => [
      refusal.id,
      fixedText(instance, refusal.weight),
      blockerLines(refusal),
      fixedText(instance, refusal.blockers.reduce((sum, b) => sum + b.weight, 0)),
    ]),
  });
}

/** The blockers of an item, those with the same reasons on one line. */
function blockerLines({ blockers }: Refusal): string[] {
  const byReason = new Map<string, string[]>();
  for (const { id, reasons } of blockers) {
    const reason = reasons.length > 0 ? reasons.join("; ") : "no reason given";
    const ids = byReason.get(reason);
    if (ids === undefined) byReason.set(reason, [id]);
    else ids.push(id);
  }
  return [...byReason].map(([reason, ids]) => `${listText(ids)}: ${reason}`);
}

/** The chosen items, all of them, and how their worth compares with what was refused. */
export function chosenSection(instance: Instance | undefined, solution: Solution): string {
  if (solution.chosen.length === 0) return "";
  if (instance === undefined) {
    return reportTable({
      caption: `${counted(solution.chosen.length, "chosen item")}`,
      columns: ["id"],
      rows: solution.chosen.map((id) => [id]),
    });
  }
  const chart = chartWeights(instance, solution);
  const table = itemTable(instance, solution.chosen);
  return `<figure>${drawChart(chart)}<figcaption>${escapeHtml(chart.title)}.</figcaption>` +
    `</figure>\n` +
    reportTable({
      ...table,
      caption: `${counted(solution.chosen.length, "chosen item")}, by worth`,
    });
}

/** How each part was solved. */
export function methodSection(solution: Solution): string {
  if (solution.parts.length === 0) return "";
  const { certificate } = solution;
  const proof = certificate === undefined
    ? solution.status === "optimal"
      ? "The certificate is not at hand here."
      : "There is no certificate, because optimality is not proved."
    : `The certificate has ${counted(certificate.parts.length, "part")}, each with a proof of a ` +
      `bound; the bounds add up to the worth reached.`;
  return paragraph(proof) +
    reportTable({ ...partsTable(solution), caption: "Methods and bounds" });
}

/** What the data are, so that a reader can tell whether theirs are the same. */
export function dataSection(instance: Instance | undefined, solution: Solution): string {
  const { name, items, conflicts, fingerprint } = solution.instance;
  const rows = [
    ["name", name],
    ["items", numberText(items)],
    ["conflicts", numberText(conflicts)],
    ...(instance === undefined ? [] : [["worth in all", worthInAll(instance)]]),
  ];
  const reasons = instance === undefined ? undefined : reasonsTable(instance);
  return reportTable({
    caption: "The instance",
    columns: ["what", "value"],
    right: [false, false],
    rows,
  }) +
    `<p>Fingerprint (SHA-256 of ids, weights and conflicts in canonical order):<br>` +
    `<code>${escapeHtml(fingerprint)}</code></p>\n` +
    (instance?.notes ?? []).map((note) => paragraph(`Note: ${note}`)).join("") +
    (reasons === undefined || reasons.rows.length === 0
      ? ""
      : reportTable({ ...reasons, caption: "Conflicts by reason" }));
}

/** Options as pairs of name and text, without callbacks and signals. */
export function optionRows(options: Readonly<Record<string, unknown>>): string[][] {
  return Object.entries(options)
    .filter(([, value]) =>
      value !== undefined && typeof value !== "function" && !(value instanceof AbortSignal)
    )
    .map(([name, value]) => [name, typeof value === "string" ? value : JSON.stringify(value)]);
}

/** How to get the same answer again. */
export function rerunSection(
  solution: Solution,
  rerun: string | undefined,
  options: Readonly<Record<string, unknown>>,
): string {
  const asked = [
    ...optionRows(options),
    ...(solution.choose.length > 0 ? [["choose", solution.choose.join(", ")]] : []),
    ...(solution.leave.length > 0 ? [["leave", solution.leave.join(", ")]] : []),
  ];
  return paragraph(
    "The same tables, options and version give the same answer. The fingerprint above tells " +
      "whether the tables are the same.",
  ) +
    (rerun === undefined ? "" : `<pre>${escapeHtml(rerun)}</pre>\n`) +
    reportTable({
      caption: "Options",
      columns: ["option", "value"],
      right: [false, false],
      rows: asked.length > 0 ? asked : [["all", "as they are by default"]],
    }) +
    reportTable({
      caption: "Versions",
      columns: ["program", "version"],
      right: [false, false],
      rows: versions(),
    });
}

/** What the answer does not know. */
export function cautionSection(): string {
  return paragraph(
    "The answer is only as good as the conflict list. A conflict that is missing from it will not " +
      "be avoided, and one that is wrong in it costs worth for nothing. The proof says that no " +
      "better choice exists for the tables as they were given; it says nothing about the world.",
  ) + paragraph(
    "Where a choice can hurt somebody, local codes and licensed practice come first: have it " +
      "checked by somebody who is licensed to decide on such things before anyone acts on it.",
  );
}

/** How long it took; the one section that differs from run to run. */
export function timingSection(solution: Solution): string {
  const slowest = solution.parts.map((part, i) => ({ part, i }))
    .sort((a, b) => b.part.elapsedMs - a.part.elapsedMs).slice(0, 5);
  return paragraph(`Solved in ${secondsText(solution.elapsedMs)}.`) +
    reportTable({
      caption: "The parts that took longest",
      columns: ["part", "items", "engine", "time"],
      right: [true, true, false, true],
      rows: slowest.map(({ part, i }) => [
        numberText(i + 1),
        numberText(part.items),
        part.engine,
        secondsText(part.elapsedMs),
      ]),
    });
}
