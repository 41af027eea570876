/**
 * Pictures as SVG text: a canvas that collects elements, with numbers rounded to hundredths so that
 * the same picture is the same text everywhere.
 */
import { escapeHtml } from "./html.ts";
import { PALETTE } from "./palette.ts";

/** Attributes of an element; numbers are rounded to hundredths, undefined ones are left out. */
export type Attributes = Readonly<Record<string, string | number | undefined>>;

/** A number with at most two decimals and no minus before zero. */
export function coordinate(x: number): string {
  const rounded = Math.round(x * 100) / 100;
  return String(rounded === 0 ? 0 : rounded);
}

/** A picture in the making. The origin is the upper left corner, y grows downwards, units are px. */
export class Canvas {
  readonly width: number;
  readonly height: number;
  readonly #parts: string[] = [];

  /** @param width @param height size in px, positive */
  constructor(width: number, height: number) {
    this.width = width;
    this.height = height;
  }

  /** Adds an element; `title` becomes its tooltip. */
  add(name: string, attributes: Attributes, title?: string): void {
    const inner = title === undefined ? "" : `<title>${escapeHtml(title)}</title>`;
    this.#parts.push(element(name, attributes, inner));
  }

  /** Adds a line of text. */
  text(x: number, y: number, text: string, attributes: Attributes = {}): void {
    this.#parts.push(element("text", { x, y, ...attributes }, escapeHtml(text)));
  }

  /** Opens a group; close it with `end`. */
  group(attributes: Attributes): void {
    this.#parts.push(element("g", attributes, "", true));
  }

  /** Closes the last group. */
  end(): void {
    this.#parts.push("</g>");
  }

  /**
   * The finished picture.
   *
   * @param title what the picture shows, for readers who cannot see it
   */
  toSvg(title: string): string {
    const { width, height } = this;
    return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${coordinate(width)} ` +
      `${coordinate(height)}" width="${coordinate(width)}" height="${coordinate(height)}" ` +
      `role="img" font-family="system-ui, 'Segoe UI', Helvetica, Arial, sans-serif">` +
      `<title>${escapeHtml(title)}</title>` +
      `<rect width="100%" height="100%" rx="6" fill="${PALETTE.ground}"/>` +
      this.#parts.join("") + "</svg>";
  }
}

function element(name: string, attributes: Attributes, inner: string, open = false): string {
  let text = `<${name}`;
  for (const [key, value] of Object.entries(attributes)) {
    if (value === undefined) continue;
    text += ` ${key}="${typeof value === "number" ? coordinate(value) : escapeHtml(value)}"`;
  }
  if (open) return `${text}>`;
  return inner === "" ? `${text}/>` : `${text}>${inner}</${name}>`;
}
