/**
 * Writes the quay market's tables. All of it is invented; the seed makes every run write the same
 * bytes.
 *
 *     deno run --allow-write=. generate.ts       (in this folder)
 */
import { writeFileSync } from "node:fs";
import {
  type Conflict,
  distanceConflicts,
  overlapConflicts,
  type Row,
  sharedConflicts,
  toCsv,
} from "../../../lib/instance/mod.ts";
import { Random } from "../../../lib/run/random.ts";

/** Seed of the committed tables. */
export const SEED = 36;

const PITCHES = 21;
const EVENINGS = 13;

/** A stand of a barge's deck, by column and row, and a request of the quay: they share a cabinet. */
interface Tie {
  readonly stand: readonly [number, number];
  readonly pitch: number;
  readonly evening: number;
}

/** Barges with a deck plan of columns by rows, stands three metres apart. */
const BARGES: readonly { name: string; columns: number; rows: number; ties: readonly Tie[] }[] = [
  {
    name: "Heron",
    columns: 4,
    rows: 3,
    ties: [
      { stand: [0, 0], pitch: 6, evening: 4 },
      { stand: [3, 0], pitch: 7, evening: 4 },
      { stand: [1, 2], pitch: 6, evening: 5 },
    ],
  },
  {
    name: "Otter",
    columns: 5,
    rows: 3,
    ties: [
      { stand: [0, 0], pitch: 15, evening: 9 },
      { stand: [4, 1], pitch: 16, evening: 9 },
    ],
  },
  {
    name: "Petrel",
    columns: 4,
    rows: 3,
    ties: [
      { stand: [0, 0], pitch: 21, evening: 4 },
      { stand: [2, 0], pitch: 21, evening: 6 },
      { stand: [3, 2], pitch: 21, evening: 9 },
    ],
  },
];

const TRADES = [
  "dumplings",
  "lanterns",
  "grilled corn",
  "tea",
  "second-hand books",
  "candles",
  "oysters",
  "waffles",
  "ceramics",
  "flat bread",
  "knitwear",
  "ices",
];

const two = (n: number) => String(n).padStart(2, "0");

/** The requests without offers. */
function layOut(random: Random): Record<string, string | number>[] {
  const requests: Record<string, string | number>[] = [];
  const trade = () => TRADES[random.below(TRADES.length)];
  for (let pitch = 1; pitch <= PITCHES; pitch++) {
    for (let evening = 1; evening <= EVENINGS; evening++) {
      const id = `p${two(pitch)}-e${two(evening)}`;
      requests.push({ id, where: "quay", pitch, evening, trade: trade() });
    }
  }
  for (const [b, { name, columns, rows, ties }] of BARGES.entries()) {
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        const jitter = () => (random.below(41) - 20) / 100;
        const x = (60 * b + 3 * column + jitter()).toFixed(2);
        const y = (3 * row + jitter()).toFixed(2);
        const id = `${name.toLowerCase()}-${row * columns + column + 1}`;
        const tie = ties.findIndex(({ stand }) => stand[0] === column && stand[1] === row);
        requests.push({ id, where: name, x, y, trade: trade() });
        if (tie < 0) continue;
        const cabinet = `${name[0]}${tie + 1}`;
        requests[requests.length - 1].cabinet = cabinet;
        const { pitch, evening } = ties[tie];
        requests[(pitch - 1) * EVENINGS + evening - 1].cabinet = cabinet;
      }
    }
  }
  return requests;
}

/**
 * The house rules, as the notebook builds them.
 *
 * @param requests rows of requests.csv, numbers as numbers or as text
 * @returns the conflicts with their reasons
 */
export function houseRules(requests: readonly Row[]): Conflict[] {
  const quay = requests.filter((r) => r.where === "quay");
  const barges = requests.filter((r) => r.where !== "quay");
  return [
    ...sharedConflicts(quay, {
      by: (r) => [Number(r.pitch) - 1, Number(r.pitch)].map((g) => `${g} on ${r.evening}`),
      reason: (a) => `share a generator on evening ${a.evening}`,
    }),
    ...overlapConflicts(quay, {
      resource: "pitch",
      start: "evening",
      end: (r) => Number(r.evening) + 1,
      gap: 1,
      reason: (a) => `pitch ${a.pitch} rests the evening after`,
    }),
    ...sharedConflicts(quay, {
      by: (r) =>
        Number(r.evening) === EVENINGS
          ? r.pitch
          : Number(r.evening) === 1
          ? PITCHES + 1 - Number(r.pitch)
          : "",
      reason: "the season repeats mirrored",
    }),
    ...distanceConflicts(barges, { x: "x", y: "y", within: 3.5 }),
    ...sharedConflicts(requests, { by: "cabinet" }),
  ];
}

/**
 * All requests with their offers, in steps of five euros. Most of an offer is a sum over the request's
 * conflicts, so that it is worth about half of what it excludes, and nothing is obvious; one trader in
 * seven is keener than that.
 *
 * @param seed any integer
 */
export function requestsOf(seed: number): Row[] {
  const random = new Random(seed);
  const requests = layOut(random);
  const place = new Map(requests.map((r, i) => [r.id, i]));
  const steps = new Float64Array(requests.length);
  for (const conflict of houseRules(requests)) {
    const [a, b] = "between" in conflict ? conflict.between : conflict;
    const rivalry = 1 + random.below(8);
    steps[place.get(a)!] += rivalry;
    steps[place.get(b)!] += rivalry;
  }
  return requests.map((r, i) => {
    const keen = random.below(7) === 0 ? random.below(30) : 0;
    return { ...r, offer: 5 * (steps[i] + random.below(2) + keen) };
  });
}

/** The two files, by name. */
export function files(seed: number): Record<string, string> {
  const requests = requestsOf(seed);
  const columns = ["id", "where", "pitch", "evening", "x", "y", "cabinet", "trade", "offer"];
  const conflicts = houseRules(requests).map((conflict) => {
    const { between: [a, b], reason } = conflict as Exclude<Conflict, readonly [string, string]>;
    return { a, b, reason };
  });
  return {
    "requests.csv": toCsv(columns, requests),
    "conflicts.csv": toCsv(["a", "b", "reason"], conflicts),
  };
}

if (import.meta.main) {
  for (const [name, text] of Object.entries(files(SEED))) {
    writeFileSync(new URL(name, import.meta.url), text);
  }
}
