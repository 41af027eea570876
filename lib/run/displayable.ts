/**
 * How a result shows itself in a notebook without knowing any picture: its class extends
 * `Displayable`, and the renderer of its kind is looked up in a registry that `display/` fills.
 * With an empty registry a result shows its text form.
 */

/** MIME type to content, as Jupyter takes it. */
export type MimeBundle = Record<string, unknown>;

/** Turns a result into what a notebook shows; pure, may be asynchronous. */
export type Renderer<T> = (result: T) => MimeBundle | Promise<MimeBundle>;

const renderers = new Map<string, Renderer<Displayable>>();
let presenter: ((result: Displayable) => Promise<MimeBundle>) | undefined;

/** Names the renderer of one kind of result; a later call replaces an earlier one. */
export function registerRenderer<T extends Displayable>(kind: string, renderer: Renderer<T>): void {
  renderers.set(kind, renderer as unknown as Renderer<Displayable>);
}

/**
 * Names who brings a bundle to the front end when a result is the last expression of a cell;
 * `notebook/` sets it, because the kernel loses output that is only returned.
 */
export function registerPresenter(present: (result: Displayable) => Promise<MimeBundle>): void {
  presenter = present;
}

/** The bundle of a result: its renderer's, or its text. */
export async function render(result: Displayable): Promise<MimeBundle> {
  const renderer = renderers.get(result.kind);
  return renderer === undefined ? { "text/plain": result.toString() } : await renderer(result);
}

/** Base of all results: plain data with a `kind`. */
export abstract class Displayable {
  /** Names the renderer, and the shape of the data. */
  abstract readonly kind: string;

  /** A few lines of text; what a terminal shows. */
  abstract toString(): string;

  /** Called by the kernel for the last expression of a cell. */
  [Symbol.for("Jupyter.display")](): Promise<MimeBundle> {
    return presenter === undefined ? render(this) : presenter(this);
  }
}
