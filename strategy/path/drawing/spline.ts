import type { Point } from '../point.ts';
import type { Curve } from './biarc.ts';

/** A rational B-spline. */
export type Spline = {
  readonly degree: number;
  readonly knots: readonly number[];
  readonly points: readonly Point[];
  readonly weights: readonly number[];
};

/** The smooth pieces of a spline, cut at its inner knots. De Boor's algorithm on homogeneous coordinates. */
export function splinePieces(spline: Spline): Curve[] {
  const { degree, knots, points } = spline;
  const pieces: Curve[] = [];
  for (let span = degree; span < points.length; span++) {
    const from = knots[span] ?? 0;
    const to = knots[span + 1] ?? 0;
    // a knot that stands more than once begins no piece until its last
    if (!(to > from)) continue;
    pieces.push({
      at: (t) => evaluate(spline, span, t).point,
      along: (t) => evaluate(spline, span, t).derivative,
      from,
      to,
    });
  }
  return pieces;
}

type Homogeneous = { readonly x: number; readonly y: number; readonly w: number };

const mix = (a: Homogeneous, b: Homogeneous, t: number): Homogeneous => ({
  x: a.x + (b.x - a.x) * t,
  y: a.y + (b.y - a.y) * t,
  w: a.w + (b.w - a.w) * t,
});

function evaluate(
  { degree, knots, points, weights }: Spline,
  span: number,
  t: number,
): { point: Point; derivative: Point } {
  let level: Homogeneous[] = [];
  for (let j = 0; j <= degree; j++) {
    const i = span - degree + j;
    const p = points[i] ?? { x: 0, y: 0 };
    const w = weights[i] ?? 1;
    level.push({ x: p.x * w, y: p.y * w, w });
  }
  let slope: Homogeneous = { x: 0, y: 0, w: 0 };
  for (let r = 1; r <= degree; r++) {
    if (r === degree) {
      const [a, b] = level;
      const width = (knots[span + 1] ?? 0) - (knots[span] ?? 0);
      if (a && b)
        slope = {
          x: (degree * (b.x - a.x)) / width,
          y: (degree * (b.y - a.y)) / width,
          w: (degree * (b.w - a.w)) / width,
        };
    }
    const next: Homogeneous[] = [];
    for (let j = 0; j + r <= degree; j++) {
      const i = span - degree + r + j;
      const low = knots[i] ?? 0;
      const high = knots[i + degree - r + 1] ?? 0;
      const a = level[j];
      const b = level[j + 1];
      if (a && b) next.push(mix(a, b, high > low ? (t - low) / (high - low) : 0));
    }
    level = next;
  }
  const h = level[0] ?? { x: 0, y: 0, w: 1 };
  const point = { x: h.x / h.w, y: h.y / h.w };
  return { point, derivative: { x: (slope.x - slope.w * point.x) / h.w, y: (slope.y - slope.w * point.y) / h.w } };
}
