/**
 * A finished picture as a result that shows itself. It travels as a data image inside HTML, which
 * notebooks show whether they trust the output or not; the words stand beside it.
 */
import { Buffer } from "node:buffer";
import { Displayable, type MimeBundle } from "../run/displayable.ts";
import { escapeHtml } from "./html.ts";

/** A picture with a title; `svg` is a complete SVG document. */
export class Picture extends Displayable {
  /** Names the renderer. */
  readonly kind = "picture";

  /**
   * Wraps a finished picture.
   *
   * @param svg a complete SVG document
   * @param title one or two sentences that say what is to be seen
   */
  constructor(
    /** A complete SVG document. */
    readonly svg: string,
    /** What is to be seen, in words. */
    readonly title: string,
  ) {
    super();
  }

  /** The words alone. */
  override toString(): string {
    return this.title;
  }
}

/** A picture in a notebook: the image, and its words below it. */
export function renderPicture(picture: Picture): MimeBundle {
  return {
    "text/html": figureHtml(picture),
    "text/plain": picture.title,
  };
}

/** A picture with its words below it, for a notebook. */
export function figureHtml(picture: Picture): string {
  return `<figure style="margin:.4em 0">${imageHtml(picture)}` +
    `<figcaption style="font-size:90%;opacity:.8;max-width:52em">${escapeHtml(picture.title)}` +
    `</figcaption></figure>`;
}

/** A picture as an image element that carries its own data. */
export function imageHtml({ svg, title }: Picture): string {
  const data = Buffer.from(svg, "utf8").toString("base64");
  return `<img src="data:image/svg+xml;base64,${data}" alt="${escapeHtml(title)}" ` +
    `style="max-width:100%;height:auto">`;
}
