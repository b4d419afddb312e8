import { segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';
import {
  pointAdd,
  pointCross,
  pointDistance,
  pointDot,
  pointLength,
  pointScale,
  pointSubtract,
  pointUnit,
} from '../point.ts';
import type { Segment } from '../segment.ts';
import { arcOf, lineBetween, segmentReverse } from '../segment.ts';

/** A smooth curve: place and derivative over a parameter. */
export type Curve = {
  readonly at: (t: number) => Point;
  readonly along: (t: number) => Point;
  readonly from: number;
  readonly to: number;
};

/** Halvings before a piece is taken as it is. */
const deepest = 16;
/** Places between the ends where the distance to the curve is taken. */
const samples = 9;

/**
 * Lines and arcs that follow a curve within `tolerance` (unit of the curve) and touch it with its own direction at the joints, so that no corner appears
 * where the curve has none; and the greatest distance found. Each piece is a biarc with equal tangent lengths (Bolton, Computer-Aided Design 7 (1975) 89,
 * from memory), halved until it fits.
 */
export function fitBiarcs(curve: Curve, tolerance: number): { segments: Segment[]; deviation: number } {
  const segments: Segment[] = [];
  let deviation = 0;
  const fit = (from: number, to: number, depth: number): void => {
    const a = curve.at(from);
    const b = curve.at(to);
    // knots that are equal but for rounding leave a piece of no length, whose direction means nothing
    if (curveSpan(curve, from, to) < tolerance * 1e-3) return;
    const pieces = biarc(a, direction(curve, from, to), b, direction(curve, to, from));
    const off = pieces ? distanceFrom(curve, from, to, pieces) : Infinity;
    if (off > tolerance && depth < deepest) {
      const middle = (from + to) / 2;
      fit(from, middle, depth + 1);
      fit(middle, to, depth + 1);
      return;
    }
    // halved to the last without a fit, as at a cusp? Then its chord stands for it, and the distance is the chord's
    const used = pieces && off <= tolerance ? pieces : [lineBetween(a, b)];
    segments.push(...used);
    deviation = Math.max(deviation, used === pieces ? off : distanceFrom(curve, from, to, used));
  };
  fit(curve.from, curve.to, 0);
  return { segments, deviation };
}

/** Distance over the start, the middle and the end, so that a closed piece is not taken for an empty one. */
function curveSpan(curve: Curve, from: number, to: number): number {
  const middle = curve.at((from + to) / 2);
  return pointDistance(curve.at(from), middle) + pointDistance(middle, curve.at(to));
}

/** Unit tangent in the sense of a growing parameter; taken a little inside when control points coincide and the derivative vanishes. */
function direction(curve: Curve, t: number, inside: number): Point {
  for (const share of [0, 1e-4, 1e-2, 0.1]) {
    const d = curve.along(t + share * (inside - t));
    if (pointLength(d) > 1e-12) return pointUnit(d);
  }
  const chord = pointSubtract(curve.at(Math.max(t, inside)), curve.at(Math.min(t, inside)));
  return pointLength(chord) > 0 ? pointUnit(chord) : { x: 1, y: 0 };
}

function distanceFrom(curve: Curve, from: number, to: number, pieces: readonly Segment[]): number {
  let most = 0;
  for (let i = 1; i <= samples; i++) {
    const p = curve.at(from + ((to - from) * i) / (samples + 1));
    most = Math.max(most, Math.min(...pieces.map((s) => segmentPointDistance(s, p))));
  }
  return most;
}

/** Two arcs (or lines) from a to b with the given unit tangents, or null when the tangents turn too far for that. */
function biarc(a: Point, ta: Point, b: Point, tb: Point): Segment[] | null {
  const v = pointSubtract(b, a);
  const chord = pointLength(v);
  if (!(chord > 0)) return null;
  if (pointDot(ta, v) <= 0 || pointDot(tb, v) <= 0) return null;
  const straight = 1e-9;
  if (Math.abs(pointCross(ta, v)) < straight * chord && Math.abs(pointCross(tb, v)) < straight * chord)
    return [lineBetween(a, b)];
  const t = pointAdd(ta, tb);
  // tangent length d of both arcs: 2d²(1 − ta·tb) + 2d v·t − v·v = 0
  const square = 2 * (1 - pointDot(ta, tb));
  const linear = 2 * pointDot(v, t);
  const discriminant = Math.sqrt(linear * linear + 4 * square * chord * chord);
  const d = (2 * chord * chord) / (linear + discriminant);
  const joint = pointScale(pointAdd(pointAdd(a, b), pointScale(pointSubtract(ta, tb), d)), 0.5);
  const first = arcFrom(a, ta, joint);
  // the second is built backwards from b, whose tangent is known
  const second = arcFrom(b, pointScale(tb, -1), joint);
  if (!first || !second) return null;
  return [first, segmentReverse(second)];
}

/** Arc or line that leaves `from` along the unit tangent and ends in `to`. */
function arcFrom(from: Point, tangent: Point, to: Point): Segment | null {
  const v = pointSubtract(to, from);
  const chord = pointLength(v);
  if (!(chord > 0)) return null;
  const sine = pointCross(tangent, v) / chord;
  if (Math.abs(sine) < 1e-9) return lineBetween(from, to);
  const radius = chord / (2 * sine); // signed: positive turns left
  const centre = { x: from.x - tangent.y * radius, y: from.y + tangent.x * radius };
  const sweep = 2 * Math.atan2(pointCross(tangent, v), pointDot(tangent, v));
  return arcOf(centre, Math.abs(radius), Math.atan2(from.y - centre.y, from.x - centre.x), sweep);
}
