/**
 * Certificates as plain data, and the independent checker. Loads without the solvers, so that a
 * proof can be checked by somebody who trusts none of them.
 *
 * @example
 * ```ts
 * import { check } from "./mod.ts";
 * import { Instance } from "../instance/mod.ts";
 * const instance = Instance.from({ items: [{ id: "a", weight: 1 }], conflicts: [] });
 * const verdict = check(instance, { kind: "solution", chosen: ["b"], choose: [], leave: [] });
 * console.assert(!verdict.valid && verdict.reason.includes("not in these tables"));
 * ```
 * @module
 */
export { check } from "./check.ts";
export type {
  BlockReplacement,
  BlocksProof,
  CaseNode,
  CasesProof,
  Certificate,
  CertificatePart,
  Numbers,
  PackingProof,
  ProjectiveProof,
  Proof,
} from "./certificate.ts";
export { fromJson, toJson } from "./json.ts";
export { Solution, type SolutionData, type SolutionPart, type SolutionStatus } from "./solution.ts";
export { Verdict } from "./verdict.ts";
