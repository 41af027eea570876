/** The answer of a solution in sentences: what was chosen, what it is worth, what is proved. */
import type { Solution } from "../certify/solution.ts";
import { counted, numberText, percentText } from "./text.ts";

/** An answer in words. */
export interface Answer {
  /** "110 of 273 items chosen, worth 12,480.5 euros." */
  readonly headline: string;
  /** "Proved optimal", "Not proved optimal" or "No choice possible". */
  readonly standing: string;
  /** What the standing means, with the bound and the gap. */
  readonly meaning: string;
  /** What else must be known before the answer is used: why the run ended, unproved bounds. */
  readonly remarks: readonly string[];
}

/** An amount with its unit. */
export function amountText(value: number, unit: string): string {
  return unit === "" ? numberText(value) : `${numberText(value)} ${unit}`;
}

/** The answer of a solution. */
export function answerOf(solution: Solution): Answer {
  const { status, chosen, weight, upperBound, floatingBound, gap, instance, reason } = solution;
  const unit = instance.unit;
  if (status === "infeasible") {
    return {
      headline: "No choice is possible.",
      standing: "No choice possible",
      meaning: reason ?? "What was required cannot be had together.",
      remarks: asked(solution),
    };
  }
  const headline = `${numberText(chosen.length)} of ${counted(instance.items, "item")} chosen, ` +
    `worth ${amountText(weight, unit)}.`;
  if (status === "optimal") {
    return {
      headline,
      standing: "Proved optimal",
      meaning: "No choice without conflicts is worth more; the certificate proves it in exact " +
        "integer arithmetic.",
      remarks: asked(solution),
    };
  }
  const remarks = asked(solution);
  if (reason !== undefined) remarks.unshift(`The run ended early: ${reason}.`);
  if (floatingBound !== undefined) {
    remarks.push(
      `A floating-point solver puts the bound at ${amountText(floatingBound, unit)}; ` +
        "that is no proof.",
    );
  }
  return {
    headline,
    standing: "Not proved optimal",
    meaning:
      `A better choice may exist. None is worth more than ${
        amountText(upperBound, unit)
      }, so the answer is at most ${amountText(difference(upperBound, weight), unit)} ` +
      `(${percentText(gap)} of the bound) short.`,
    remarks,
  };
}

/** A difference without the noise of binary fractions. */
function difference(a: number, b: number): number {
  return Number((a - b).toPrecision(12));
}

/** What was required and ruled out, in sentences. */
function asked({ choose, leave }: Solution): string[] {
  const out: string[] = [];
  if (choose.length > 0) out.push(`${counted(choose.length, "item was", "items were")} required.`);
  if (leave.length > 0) out.push(`${counted(leave.length, "item was", "items were")} ruled out.`);
  return out;
}
