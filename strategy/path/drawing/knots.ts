/** Knots nearer than this share of their whole range are equal but for rounding. */
const rounding = 1e-9;

/**
 * Knots a spline of so many control points can be drawn with, and what was put right about them: rounding that lets them fall is taken out, and two
 * missing end knots are added, as some writers leave them off. Null when they are beyond that.
 */
export function knotsMended(
  knots: readonly number[],
  points: number,
  degree: number,
): { knots: readonly number[]; mended: string | null } | null {
  const first = knots[0];
  const last = knots.at(-1);
  if (first === undefined || last === undefined || !(last > first)) return null;
  const wanted = points + degree + 1;
  let mended: string | null = null;
  let whole = knots;
  if (knots.length === wanted - 2) {
    whole = [first, ...knots, last];
    mended = 'two short at the ends';
  }
  if (whole.length !== wanted) return null;
  const rising: number[] = [];
  let highest = first;
  for (const knot of whole) {
    if (knot < highest - rounding * (last - first)) return null;
    if (knot < highest) mended ??= 'not in order by a rounding';
    highest = Math.max(highest, knot);
    rising.push(highest);
  }
  return (rising[points] ?? 0) > (rising[degree] ?? 0) ? { knots: rising, mended } : null;
}
