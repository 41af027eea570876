/**
 * The independent checker. It shares no algorithm with the solvers: it recomputes the worth of the
 * choice, looks every conflict up, and adds up the bounds that the certificate's proofs prove.
 */
import type { Instance } from "../instance/instance.ts";
import type { Certificate, CertificatePart, Numbers } from "./certificate.ts";
import { neighbourLists, type Play, requireBound, scratchFor } from "./play.ts";
import { provenBound } from "./proof.ts";
import { Rejected, within } from "./rejected.ts";
import { requireList } from "./shape.ts";
import type { SolutionData } from "./solution.ts";
import { Verdict } from "./verdict.ts";

/**
 * Checks that a solution is the best there is for exactly this instance.
 *
 * @param instance the items and conflicts, read afresh
 * @param solution a solution, or its JSON once parsed, or the JSON text itself
 * @returns the verdict; `valid` only when the choice is free of conflict, has the worth stated, and
 *   the certificate proves that nothing better exists. Anything malformed is a verdict, not an error.
 *   What the solution tells of its parts, its time and the names of things is not looked at.
 *   O(n + m + size of the certificate) for the relaxation's parts; a part by cases or by an
 *   embedding adds what `certify/cases.ts` and its neighbours say.
 */
export function check(instance: Instance, solution: SolutionData | string | unknown): Verdict {
  try {
    return new Verdict(true, proveOptimal(instance, asData(solution)));
  } catch (error) {
    if (error instanceof Rejected) return new Verdict(false, asSentence(error.message));
    // Data of the wrong shape; whatever the cause, nothing has been proved.
    if (error instanceof TypeError || error instanceof RangeError) {
      return new Verdict(false, asSentence(`the solution is malformed: ${error.message}`));
    }
    throw error;
  }
}

/**
 * A reason fit to be printed: it quotes the data, which may be long, or hold what would move the
 * cursor of a terminal and write over the verdict.
 */
function asSentence(reason: string): string {
  const cut = reason.length > 1000 ? `${reason.slice(0, 1000)} …` : reason;
  return cut.replace(/[\p{Cc}\u202a-\u202e\u2066-\u2069]/gu, "\ufffd");
}

function asData(solution: unknown): SolutionData {
  let data = solution;
  if (typeof data === "string") {
    try {
      data = JSON.parse(data);
    } catch (error) {
      throw new Rejected(`the solution is not JSON: ${(error as Error).message}`);
    }
  }
  if (
    typeof data !== "object" || data === null || (data as { kind?: unknown }).kind !== "solution"
  ) {
    throw new Rejected('expected an object with "kind": "solution"');
  }
  const { chosen, choose, leave } = data as Partial<SolutionData>;
  for (const [name, list] of Object.entries({ chosen, choose, leave })) {
    if (!Array.isArray(list) || list.some((id) => typeof id !== "string")) {
      throw new Rejected(`"${name}": expected a list of ids`);
    }
  }
  return data as SolutionData;
}

/** Returns the sentence of a valid verdict. @throws {Rejected} */
function proveOptimal(instance: Instance, data: SolutionData): string {
  const { rank, order } = instance.canonical;
  const n = instance.size;
  const { tails, heads } = instance.graph;
  const rankedTails = Int32Array.from(tails, (v) => rank[v]);
  const rankedHeads = Int32Array.from(heads, (v) => rank[v]);
  const nameOf = (v: number) => JSON.stringify(instance.ids[order[v]]);
  const weights = Float64Array.from(order, (i) => instance.weights[i]);
  const lists = neighbourLists(n, rankedTails, rankedHeads);

  const { chosen, weight } = checkChoice();
  if (data.weight !== weight / instance.scale) {
    throw new Rejected(
      `the choice is worth ${weight / instance.scale}, but the solution states ${data.weight}`,
    );
  }
  if (data.status !== "optimal") {
    throw new Rejected(
      `the choice is free of conflict and worth ${data.weight}, but its status is ` +
        `${JSON.stringify(data.status)}: it does not claim to be the best`,
    );
  }
  const certificate = requireCertificate(instance, data.certificate);
  const choose = requireGiven("choose", data.choose, certificate.choose);
  const leave = requireGiven("leave", data.leave, certificate.leave);
  requirePartition(certificate.parts);
  const bound = addUp(certificate);
  if (bound !== BigInt(weight)) {
    throw new Rejected(`the proofs add up to ${bound}, but the choice is worth ${weight}`);
  }
  if (data.upperBound !== undefined && data.upperBound !== data.weight) {
    throw new Rejected(
      `the choice is worth ${data.weight}, but the solution states the bound ${data.upperBound}`,
    );
  }
  const asked = choose.length + leave.length === 0
    ? ""
    : ` with ${choose.length} items required and ${leave.length} ruled out`;
  return `no conflict-free choice is worth more than ${data.weight}${asked}; ` +
    `${n} items accounted for (parts: ${certificate.parts.length})`;

  function checkChoice(): { chosen: Uint8Array; weight: number } {
    const chosen = new Uint8Array(n);
    let weight = 0;
    for (const id of data.chosen) {
      const i = instance.indexOf(id);
      if (i < 0) throw new Rejected(`chosen item ${JSON.stringify(id)} is not in these tables`);
      if (chosen[rank[i]] !== 0) throw new Rejected(`item ${JSON.stringify(id)} is chosen twice`);
      chosen[rank[i]] = 1;
      weight += instance.weights[i];
    }
    for (let e = 0; e < rankedTails.length; e++) {
      if (chosen[rankedTails[e]] !== 0 && chosen[rankedHeads[e]] !== 0) {
        throw new Rejected(
          `${nameOf(rankedTails[e])} and ${nameOf(rankedHeads[e])} are both chosen, ` +
            "but they are in conflict",
        );
      }
    }
    return { chosen, weight };
  }

  /** The vertices asked for, once the certificate and the solution agree on them. */
  function requireGiven(
    name: "choose" | "leave",
    ids: readonly string[],
    numbers: Numbers,
  ): readonly number[] {
    // Each once, so that nothing counts twice.
    const asked = [...new Set(ids)].map((id) => {
      const i = instance.indexOf(id);
      if (i < 0) throw new Rejected(`"${name}": ${JSON.stringify(id)} is not in these tables`);
      if ((chosen[rank[i]] !== 0) !== (name === "choose")) {
        throw new Rejected(
          `"${name}": ${JSON.stringify(id)} is ${name === "choose" ? "not chosen" : "chosen"}`,
        );
      }
      return rank[i];
    });
    requireList(numbers, `certificate, "${name}"`);
    const stated = new Set<number>(numbers);
    if (stated.size !== asked.length || asked.some((v) => !stated.has(v))) {
      throw new Rejected(`"${name}": the certificate speaks of other items than the solution`);
    }
    return asked;
  }

  /** Checks that no vertex is in two parts, and that each open one is in one. */
  function requirePartition(parts: readonly CertificatePart[]): void {
    const settled = new Uint8Array(n);
    for (const v of leave) settled[v] = 1;
    for (const v of choose) {
      settled[v] = 1;
      for (let a = lists.offsets[v]; a < lists.offsets[v + 1]; a++) {
        settled[lists.neighbours[a]] = 1;
      }
    }
    const seen = new Uint8Array(n);
    parts.forEach((part, p) => {
      requireList(part.vertices, `part ${p}, "vertices"`);
      for (let i = 0; i < part.vertices.length; i++) {
        const v = part.vertices[i];
        if (!Number.isInteger(v) || v < 0 || v >= n) {
          throw new Rejected(`part ${p}: expected vertices from 0 to ${n - 1}, got ${v}`);
        }
        if (seen[v] !== 0) throw new Rejected(`part ${p}: ${nameOf(v)} is in two parts`);
        seen[v] = 1;
      }
    });
    for (let v = 0; v < n; v++) {
      if (seen[v] === 0 && settled[v] === 0) {
        throw new Rejected(`${nameOf(v)} is in no part of the certificate`);
      }
    }
  }

  /** The sum of the proven bounds and of the items required. */
  function addUp(certificate: Certificate): bigint {
    let sum = 0n;
    for (const v of choose) sum += BigInt(weights[v]);
    const scratch = scratchFor(n);
    certificate.parts.forEach((part, p) => {
      const play: Play = { n, ...lists, weights, vertices: part.vertices, nameOf, scratch };
      const proved = within(`part ${p}`, () => provenBound(play, part.proof));
      requireBound(part.bound, proved, `part ${p}`);
      sum += proved;
    });
    if (!Number.isInteger(certificate.bound) || sum !== BigInt(certificate.bound)) {
      throw new Rejected(
        `the bounds of the parts add up to ${sum}, the certificate states ${certificate.bound}`,
      );
    }
    return sum;
  }
}

function requireCertificate(instance: Instance, certificate: Certificate | undefined): Certificate {
  if (certificate === undefined) throw new Rejected("the solution carries no certificate");
  if (certificate.kind !== "certificate" || certificate.version !== 1) {
    throw new Rejected('expected a certificate of version 1 with "kind": "certificate"');
  }
  if (certificate.fingerprint !== instance.fingerprint) {
    throw new Rejected(
      `the certificate speaks of an instance with fingerprint ${certificate.fingerprint}, ` +
        `these tables have ${instance.fingerprint}`,
    );
  }
  if (!Array.isArray(certificate.parts)) throw new Rejected('"parts": expected a list');
  return certificate;
}
