/**
 * Evens a drawing without crossings out: faces of like size, edges of like length, and still no
 * crossing. Each face is a star of triangles around a point of its own; the energy is the sum over
 * triangles of -log(area), which keeps every triangle from turning over and is least when all are
 * alike, plus squared lengths of edges. Each point in turn takes a Newton step. O(sweeps · m).
 */

/** A triangulated drawing. Points are numbered from 0. */
export interface Drawing {
  /** Length = number of points; changed in place. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** 1 where a point stays where it is. */
  readonly fixed: Uint8Array;
  /** Triples of points, all turning the same way round; together they cover the drawing. */
  readonly triangles: readonly (readonly [number, number, number])[];
  /** Pairs of points. */
  readonly edges: readonly (readonly [number, number])[];
}

const SWEEPS = 150;
/** Weight of the edges against the triangles. */
const TENSION = 0.35;

/** Evens a drawing out. Corners of triangles that are flat or turned over at the start stay. */
export function evenOut(drawing: Drawing): void {
  const { x, y, fixed } = drawing;
  const twice = ([p, a, b]: readonly number[]) =>
    (x[a] - x[p]) * (y[b] - y[p]) - (y[a] - y[p]) * (x[b] - x[p]);
  const turn = Math.sign(drawing.triangles.reduce((sum, t) => sum + twice(t), 0));
  const triangles: (readonly [number, number, number])[] = [];
  const still = fixed.slice();
  for (const [p, a, b] of drawing.triangles) {
    const triangle = turn > 0 ? [p, a, b] as const : [p, b, a] as const;
    if (twice(triangle) > 1e-12) triangles.push(triangle);
    else still[p] = still[a] = still[b] = 1;
  }
  // The unit disc shared among the triangles gives the length an edge should have.
  const tension = TENSION * triangles.length / (4 * Math.PI);
  const around: [number, number][][] = Array.from(x, () => []);
  for (const [p, a, b] of triangles) {
    around[p].push([a, b]);
    around[a].push([b, p]);
    around[b].push([p, a]);
  }
  const joined: number[][] = Array.from(x, () => []);
  for (const [p, q] of drawing.edges) {
    joined[p].push(q);
    joined[q].push(p);
  }
  const energy = (p: number, px: number, py: number): number => {
    let sum = 0;
    for (const [a, b] of around[p]) {
      const area = (x[a] - px) * (y[b] - py) - (y[a] - py) * (x[b] - px);
      if (area <= 0) return Infinity;
      sum -= Math.log(area);
    }
    for (const q of joined[p]) sum += tension * ((px - x[q]) ** 2 + (py - y[q]) ** 2);
    return sum;
  };
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    for (let p = 0; p < x.length; p++) {
      if (still[p] === 0 && around[p].length > 0) step(p);
    }
  }

  /** One Newton step of point p, halved until the energy falls. */
  function step(p: number): void {
    let gx = 0, gy = 0, xx = 0, xy = 0, yy = 0;
    for (const [a, b] of around[p]) {
      const area = (x[a] - x[p]) * (y[b] - y[p]) - (y[a] - y[p]) * (x[b] - x[p]);
      const ux = (y[b] - y[a]) / area, uy = (x[a] - x[b]) / area;
      gx += ux;
      gy += uy;
      xx += ux * ux;
      xy += ux * uy;
      yy += uy * uy;
    }
    for (const q of joined[p]) {
      gx += 2 * tension * (x[p] - x[q]);
      gy += 2 * tension * (y[p] - y[q]);
      xx += 2 * tension;
      yy += 2 * tension;
    }
    const det = xx * yy - xy * xy;
    if (!(det > 0)) return;
    const dx = -(yy * gx - xy * gy) / det, dy = -(xx * gy - xy * gx) / det;
    const before = energy(p, x[p], y[p]);
    for (let t = 1; t > 1e-3; t /= 2) {
      if (energy(p, x[p] + t * dx, y[p] + t * dy) < before) {
        x[p] += t * dx;
        y[p] += t * dy;
        return;
      }
    }
  }
}
