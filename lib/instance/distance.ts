/**
 * Conflicts between rows that lie close together, in the plane or on the sphere, by bucketing into
 * columns as wide as the distance.
 */
import { InstanceError } from "../run/errors.ts";
import { closePairs, type Points } from "./close-pairs.ts";
import { type Conflict, shown } from "./item.ts";
import { cell, type Column, columnName, ruleConflict, type RuleOptions, ruleRows } from "./rule.ts";

/** Mean radius of the Earth in metres (International Union of Geodesy and Geophysics, R1). */
export const EARTH_RADIUS_METRES = 6371008.8;

/** What `distanceConflicts` takes beside the rows. */
export interface DistanceOptions extends RuleOptions {
  /** Column of x; on the sphere the longitude in degrees, any full turns allowed. */
  readonly x: Column;
  /** Column of y; on the sphere the latitude in degrees, from -90 to 90. */
  readonly y: Column;
  /** Rows at this distance or less conflict: in the unit of x and y; on the sphere in metres. */
  readonly within: number;
  /** "plane" (Euclidean) if unset; "sphere": great circles on a globe of mean Earth radius. */
  readonly metric?: "plane" | "sphere";
}

/**
 * One conflict for each two rows at most `within` apart. Distances are computed in floating point:
 * pairs that differ from `within` by less than about a part in 10^15 of the coordinates may fall
 * either way (on the sphere, by about a hundred-millionth of a metre).
 *
 * @param rows row objects; coordinates are numbers, or text with a number
 * @param options columns and distance
 * @returns conflicts with reasons such as "412 m apart, within 500 m"
 * @throws {InstanceError} listing all problems. O(n log n + conflicts) time in practice.
 */
export function distanceConflicts(rows: readonly object[], options: DistanceOptions): Conflict[] {
  const { x, y, within, metric = "plane" } = options;
  const problems: string[] = [];
  if (!(Number.isFinite(within) && within >= 0)) {
    problems.push(`within: expected a finite number >= 0, got ${shown(within)}`);
  }
  if (metric !== "plane" && metric !== "sphere") {
    problems.push(`metric: expected "plane" or "sphere", got ${shown(metric)}`);
  }
  const { list, ids, absent } = ruleRows(rows, options, [x, y], problems);
  const n = list.length;
  const xs = new Float64Array(n), ys = new Float64Array(n);
  const read = (i: number, column: Column, what: string): number => {
    const name = columnName(column, what);
    if (absent.has(name)) return 0;
    const value = cell(list[i], column);
    const number = typeof value === "string" && value.trim() !== "" ? Number(value) : value;
    if (typeof number === "number" && Number.isFinite(number)) return number;
    problems.push(`row ${i + 1} (${ids[i]}): ${name} ${shown(value)}; expected a finite number`);
    return 0;
  };
  for (let i = 0; i < n; i++) {
    xs[i] = read(i, x, "x");
    ys[i] = read(i, y, "y");
    if (metric === "sphere" && Math.abs(ys[i]) > 90) {
      problems.push(
        `row ${i + 1} (${ids[i]}): ${columnName(y, "y")} ${ys[i]}; ` +
          `expected a latitude from -90 to 90 degrees`,
      );
    }
  }
  if (problems.length > 0) throw new InstanceError(problems);

  const onSphere = metric === "sphere";
  const points = onSphere ? onUnitSphere(xs, ys) : { x: xs, y: new Float64Array(n), z: ys };
  const half = within / (2 * EARTH_RADIUS_METRES);
  const reach = !onSphere ? within : half >= Math.PI / 2 ? 2 : 2 * Math.sin(half);
  const conflicts: Conflict[] = [];
  closePairs(points, reach, (i, j, chord) => {
    conflicts.push(ruleConflict(list, ids, i, j, options, () => {
      if (!onSphere) return `${rounded(chord)} apart, within ${within}`;
      const metres = 2 * EARTH_RADIUS_METRES * Math.asin(Math.min(1, chord / 2));
      return `${rounded(metres)} m apart, within ${within} m`;
    }));
  });
  return conflicts;
}

/** Longitudes and latitudes in degrees as points of the unit sphere: poles and seams vanish. */
function onUnitSphere(longitudes: Float64Array, latitudes: Float64Array): Points {
  const n = longitudes.length;
  const x = new Float64Array(n), y = new Float64Array(n), z = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const longitude = (longitudes[i] % 360) * Math.PI / 180,
      latitude = latitudes[i] * Math.PI / 180;
    const circle = Math.abs(latitudes[i]) === 90 ? 0 : Math.cos(latitude);
    x[i] = circle * Math.cos(longitude);
    y[i] = circle * Math.sin(longitude);
    z[i] = Math.sin(latitude);
  }
  return { x, y, z };
}

/** Three or four digits, enough for a sentence. */
function rounded(value: number): string {
  return String(value >= 100 ? Math.round(value) : Number(value.toPrecision(3)));
}
