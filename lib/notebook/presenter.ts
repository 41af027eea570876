/**
 * Results as the last expression of a cell. The kernel often reports `idle` before the last output
 * has gone out, and front ends drop what comes later; so the display hook sends the output itself,
 * waits until it is out, and hands the kernel an empty bundle.
 */
import { type MimeBundle, registerPresenter, render } from "../run/displayable.ts";
import { display, kernel } from "./kernel.ts";

/** Makes every `Displayable` present itself through the kernel, where there is one. */
export function presentThroughKernel(): void {
  registerPresenter(async (result) => present(await render(result)));
}

/**
 * Presents a bundle from within a display hook.
 *
 * @param bundle what to show
 * @returns the bundle to return from the hook: empty when the kernel has shown it already
 */
export async function present(bundle: MimeBundle): Promise<MimeBundle> {
  const to = kernel();
  if (to === undefined) return bundle;
  await display(to, bundle);
  return {};
}
