/** Conflict rules by comparing all pairs, in the plainest words. */

/** Pairs [i, j], i < j, whose half-open intervals on one resource are less than the gap apart. */
export function overlappingPairs(
  rows: readonly { start: number; end: number; resource: unknown }[],
  gap: number,
): string[] {
  const pairs: string[] = [];
  rows.forEach((a, i) =>
    rows.forEach((b, j) => {
      if (i >= j || a.resource !== b.resource) return;
      if (a.start < b.end + gap && b.start < a.end + gap) pairs.push(`${i} ${j}`);
    })
  );
  return pairs.sort();
}

/** Pairs at most `within` apart in the plane. */
export function nearPairs(rows: readonly { x: number; y: number }[], within: number): string[] {
  const pairs: string[] = [];
  rows.forEach((a, i) =>
    rows.forEach((b, j) => {
      if (i < j && Math.hypot(a.x - b.x, a.y - b.y) <= within) pairs.push(`${i} ${j}`);
    })
  );
  return pairs.sort();
}

/** Great-circle distance by the haversine formula; degrees, metres. */
export function haversine(
  a: { x: number; y: number },
  b: { x: number; y: number },
  radius: number,
): number {
  const rad = Math.PI / 180;
  const dy = (b.y - a.y) * rad, dx = (b.x - a.x) * rad;
  const h = Math.sin(dy / 2) ** 2 +
    Math.cos(a.y * rad) * Math.cos(b.y * rad) * Math.sin(dx / 2) ** 2;
  return 2 * radius * Math.asin(Math.min(1, Math.sqrt(h)));
}
