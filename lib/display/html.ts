/**
 * HTML put together from escaped text. Styles are attributes, because notebooks strip `<style>`,
 * `<script>` and inline `<svg>` from outputs they do not trust, while `style=`, `title=`, tables and
 * data images survive.
 */

const ENTITIES: Record<string, string> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** Text that is safe between tags and inside quoted attributes, in HTML and in XML. */
export function escapeHtml(text: string): string {
  // Control characters have no place in either language, entity or not.
  // deno-lint-ignore no-control-regex
  return text.replace(/[\x00-\x08\x0b\x0c\x0e-\x1f\ufffe\uffff]/g, "\ufffd")
    .replace(/[&<>"']/g, (c) => ENTITIES[c]);
}

/** A heading of an output in a notebook. */
export function headingHtml(text: string): string {
  return `<div style="font-size:115%;font-weight:600;margin:.2em 0 .4em">${escapeHtml(text)}</div>`;
}

/** A line of prose in a notebook; `html` is already escaped. */
export function lineHtml(html: string): string {
  return `<div style="margin:.25em 0;max-width:52em;line-height:1.45">${html}</div>`;
}

/** A line of small print in a notebook. */
export function smallHtml(text: string): string {
  return `<div style="font-size:88%;opacity:.75;margin:.25em 0;max-width:58em">${
    escapeHtml(text)
  }</div>`;
}
