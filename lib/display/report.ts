/**
 * The report: one HTML file that needs no network, reads on paper and on a phone, and is the same
 * byte for byte when it is made again from the same results without the timing section.
 */
import { Solution } from "../certify/solution.ts";
import { Verdict } from "../certify/verdict.ts";
import { Instance } from "../instance/instance.ts";
import { Displayable, render } from "../run/displayable.ts";
import { escapeHtml } from "./html.ts";
import { answerOf } from "./answer.ts";
import {
  answerSection,
  cautionSection,
  chosenSection,
  dataSection,
  decisiveSection,
  methodSection,
  rerunSection,
  section,
  timingSection,
} from "./report-sections.ts";
import { REPORT_STYLE } from "./report-style.ts";
import { sourceOf } from "./sources.ts";
import { secondsText } from "./text.ts";

/** What a report says beside its results. */
export interface ReportOptions {
  /** Heading; the name of the instance if unset. */
  readonly title?: string;
  /** How to get the same again: a command, or lines of code. Shown as it is. */
  readonly rerun?: string;
  /** The options that were passed to `solve`; callbacks and signals are left out. */
  readonly options?: object;
  /** Whether to say how long it took; true if unset. Without it a rerun gives the same bytes. */
  readonly timing?: boolean;
}

/**
 * Makes the report of a solution and whatever goes with it.
 *
 * @param results one solution first of all; the instance it speaks of, the verdict of the checker,
 *   and further results (classification, pictures, what-if tables, more solutions), which are shown
 *   in the order given
 * @param options heading, how to rerun, timing
 * @returns an HTML document in UTF-8; nothing in it is fetched from elsewhere
 * @throws {TypeError} when there is no solution among the results
 * @throws {RangeError} when instance and solution have different fingerprints
 *
 * Complexity: linear in the size of the results.
 */
export async function report(
  results: Displayable | readonly Displayable[],
  options: ReportOptions = {},
): Promise<string> {
  const list = results instanceof Displayable ? [results] : [...results];
  const solution = list.find((result) => result instanceof Solution);
  if (solution === undefined) {
    throw new TypeError(
      `report: expected a solution among the results, got ${
        list.map((result) => result?.kind ?? typeof result).join(", ") || "none"
      }`,
    );
  }
  const instance = list.find((result) => result instanceof Instance) ?? sourceOf(solution);
  if (instance !== undefined && instance.fingerprint !== solution.instance.fingerprint) {
    throw new RangeError(
      `report: the solution speaks of data ${solution.instance.fingerprint.slice(0, 16)}, ` +
        `the instance is ${instance.fingerprint.slice(0, 16)}`,
    );
  }
  const verdict = list.find((result) => result instanceof Verdict);
  const others = list.filter((result) =>
    result !== solution && result !== verdict && !(result instanceof Instance)
  );
  return await documentOf(solution, instance, verdict, others, options);
}

async function documentOf(
  solution: Solution,
  instance: Instance | undefined,
  verdict: Verdict | undefined,
  others: readonly Displayable[],
  options: ReportOptions,
): Promise<string> {
  const title = options.title ?? solution.instance.name;
  const description = `${answerOf(solution).headline} ${answerOf(solution).standing}.`;
  const sections: [id: string, heading: string, body: string][] = [
    ["decided", "Conflicts that decided", instance ? decisiveSection(instance, solution) : ""],
    ["chosen", "Chosen items", chosenSection(instance, solution)],
    ["structure", "Structure and further results", await furtherSection(others)],
    ["method", "How it was solved", methodSection(solution)],
    ["data", "Data", dataSection(instance, solution)],
    [
      "rerun",
      "How to get this again",
      rerunSection(solution, options.rerun, { ...options.options }),
    ],
    ["caution", "Caution", cautionSection()],
    ["timing", "Timing", options.timing === false ? "" : timingSection(solution)],
  ];
  const present = sections.filter(([, , body]) => body !== "");
  const body = [
    `<main>\n<h1>${escapeHtml(title)}</h1>\n`,
    answerSection(solution, verdict),
    contents(present),
    ...present.map(([id, heading, body]) => section(id, heading, body)),
    "</main>\n",
  ];
  return `<!DOCTYPE html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n` +
    `<meta name="viewport" content="width=device-width, initial-scale=1">\n` +
    `<meta name="description" content="${escapeHtml(description)}">\n` +
    `<title>${escapeHtml(title)}</title>\n<style>\n${REPORT_STYLE}\n</style>\n</head>\n<body>\n` +
    `${body.join("")}</body>\n</html>\n`;
}

/** Links to the sections, for a reader on a phone. */
function contents(sections: readonly (readonly [id: string, heading: string, body: string])[]) {
  const links = sections.map(([id, heading]) =>
    `<li><a href="#${id}">${escapeHtml(heading)}</a></li>`
  );
  return `<nav aria-label="Sections"><ul>${links.join("\n")}</ul></nav>\n`;
}

/** Results that have no section of their own, as their notebook form; without the time they took. */
async function furtherSection(others: readonly Displayable[]): Promise<string> {
  const parts: string[] = [];
  for (const result of others) {
    const bundle = await render(result);
    const html = bundle["text/html"], svg = bundle["image/svg+xml"];
    if (typeof html === "string") {
      parts.push(`<div class="scroll">${timeless(html, result)}</div>\n`);
    } else if (typeof svg === "string") {
      parts.push(
        `<figure>${svg}<figcaption>${escapeHtml(result.toString())}</figcaption></figure>\n`,
      );
    } else parts.push(`<pre>${escapeHtml(result.toString())}</pre>\n`);
  }
  return parts.join("");
}

/** Takes the time a result took out of its notebook form, where it stands before "data …". */
function timeless(html: string, result: Displayable): string {
  const { elapsedMs } = result as { elapsedMs?: unknown };
  return typeof elapsedMs === "number" ? html.replaceAll(`${secondsText(elapsedMs)} · `, "") : html;
}
