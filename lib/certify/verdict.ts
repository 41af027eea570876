/** The checker's answer. */
import { Displayable } from "../run/displayable.ts";

/** `valid` only if the certificate proves that nothing better exists in exactly these tables. */
export class Verdict extends Displayable {
  readonly kind = "verdict";

  /**
   * States a verdict.
   *
   * @param valid whether optimality is proved
   * @param reason one sentence: what was proved, or the first thing that is wrong
   */
  constructor(readonly valid: boolean, readonly reason: string) {
    super();
  }

  override toString(): string {
    return `${this.valid ? "Proved" : "Not proved"}: ${this.reason}`;
  }
}
