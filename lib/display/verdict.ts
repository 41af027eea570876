/** The checker's verdict in a notebook: one line. */
import type { Verdict } from "../certify/verdict.ts";
import type { MimeBundle } from "../run/displayable.ts";
import { escapeHtml, lineHtml } from "./html.ts";

/** The bundle of a verdict. */
export function renderVerdict(verdict: Verdict): MimeBundle {
  return {
    "text/html": lineHtml(
      `<strong style="border:1.5px solid currentColor;border-radius:4px;padding:.05em .45em;` +
        `margin-right:.5em;white-space:nowrap">${verdict.valid ? "✓ Proved" : "✗ Not proved"}` +
        `</strong>${escapeHtml(verdict.reason)}`,
    ),
    "text/plain": verdict.toString(),
  };
}
