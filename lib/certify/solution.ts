/** What `solve` answers, as plain data: the choice, its worth, the bound, the proof, the methods. */
import { Displayable } from "../run/displayable.ts";
import type { Certificate } from "./certificate.ts";

/** Proved best; conflict-free with a bound; or impossible as asked. */
export type SolutionStatus = "optimal" | "feasible" | "infeasible";

/** How one part of the instance was solved. */
export interface SolutionPart {
  /** Number of items and of conflicts inside the part. */
  readonly items: number;
  readonly conflicts: number;
  /** What solved it: "relaxation" for items settled by the half-integral kernel, else an engine. */
  readonly engine: string;
  /** Why this engine: the engines that declined before it, each with its reason. */
  readonly why: readonly string[];
  /** Worth reached and bound proved for this part, in the instance's unit. */
  readonly weight: number;
  readonly upperBound: number;
  readonly optimal: boolean;
  /** Figures of the engine, such as the size of a transversal. */
  readonly figures: Readonly<Record<string, number | string>>;
  readonly elapsedMs: number;
}

/** The data of a solution; what its JSON holds. */
export interface SolutionData {
  readonly status: SolutionStatus;
  /** Why there is no solution (two required items in conflict), or why the run stopped early. */
  readonly reason?: string;
  /** Ids, in the order of the instance's items. */
  readonly chosen: readonly string[];
  /** Worth of the choice and the proven bound, in the instance's unit. */
  readonly weight: number;
  readonly upperBound: number;
  /** A bound from floating-point arithmetic, where it is below `upperBound`; not a proof. */
  readonly floatingBound?: number;
  readonly parts: readonly SolutionPart[];
  /** Present when optimal. */
  readonly certificate?: Certificate;
  readonly elapsedMs: number;
  /** What was asked: items required and items ruled out. */
  readonly choose: readonly string[];
  readonly leave: readonly string[];
  /** The instance: its name, unit, the columns ids and weights were read from, sizes, fingerprint. */
  readonly instance: {
    readonly name: string;
    readonly unit: string;
    readonly columns?: { readonly id: string; readonly weight: string };
    readonly items: number;
    readonly conflicts: number;
    readonly fingerprint: string;
  };
}

/**
 * A solution.
 *
 * - `optimal`: nothing better exists, and `certificate` proves it.
 * - `feasible`: `chosen` has no conflict inside; nothing above `upperBound` exists.
 * - `infeasible`: two items that were required are in conflict; `chosen` is empty.
 */
export class Solution extends Displayable implements SolutionData {
  readonly kind = "solution";
  readonly status: SolutionStatus;
  readonly reason?: string;
  readonly chosen: readonly string[];
  readonly weight: number;
  readonly upperBound: number;
  readonly floatingBound?: number;
  /** (upperBound - weight) / upperBound; 0 when optimal. */
  readonly gap: number;
  readonly parts: readonly SolutionPart[];
  readonly certificate?: Certificate;
  readonly elapsedMs: number;
  readonly choose: readonly string[];
  readonly leave: readonly string[];
  readonly instance: SolutionData["instance"];

  /** Takes what a solver found, or what JSON held, and computes the gap. @param data plain data */
  constructor(data: SolutionData) {
    super();
    this.status = data.status;
    this.chosen = data.chosen;
    this.weight = data.weight;
    this.upperBound = data.upperBound;
    this.gap = data.upperBound > data.weight
      ? (data.upperBound - data.weight) / data.upperBound
      : 0;
    this.parts = data.parts;
    this.elapsedMs = data.elapsedMs;
    this.choose = data.choose;
    this.leave = data.leave;
    this.instance = data.instance;
    if (data.reason !== undefined) this.reason = data.reason;
    if (data.floatingBound !== undefined) this.floatingBound = data.floatingBound;
    if (data.certificate !== undefined) this.certificate = data.certificate;
  }

  /** The answer in a few lines. */
  override toString(): string {
    const { instance } = this;
    const unit = instance.unit === "" ? "" : ` ${instance.unit}`;
    if (this.status === "infeasible") return `No choice is possible: ${this.reason}`;
    const lines = [
      `${this.chosen.length} of ${instance.items} items chosen, worth ${this.weight}${unit}` +
      (this.status === "optimal"
        ? " - proved optimal"
        : `; nothing above ${this.upperBound}${unit} exists (gap ${formatPercent(this.gap)})`),
    ];
    if (this.reason !== undefined) lines.push(this.reason);
    if (this.floatingBound !== undefined) {
      lines.push(`bound in floating point, not proved: ${this.floatingBound}${unit}`);
    }
    for (const [engine, count] of countEngines(this.parts)) {
      lines.push(`${count} ${count === 1 ? "part" : "parts"} by ${engine}`);
    }
    return lines.join("\n");
  }
}

/** Parts by engine, in order of first appearance. */
export function countEngines(parts: readonly SolutionPart[]): Map<string, number> {
  const counts = new Map<string, number>();
  for (const part of parts) counts.set(part.engine, (counts.get(part.engine) ?? 0) + 1);
  return counts;
}

/** A share of one as a percentage, rounded up so that a gap never reads as zero. */
function formatPercent(share: number): string {
  return `${Math.ceil(share * 1e4) / 100} %`;
}
