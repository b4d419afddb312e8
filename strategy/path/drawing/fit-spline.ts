import type { Point } from '../point.ts';
import { pointAdd, pointDistance, pointScale, pointSubtract, pointUnit } from '../point.ts';
import type { Shape } from './shape.ts';

type Ends = {
  /** Directions at the ends, of any length; null where none is given. */
  readonly start: Point | null;
  readonly end: Point | null;
  readonly closed: boolean;
};

/** Points of a closed curve repeated on either side; what happens at the far ends has died out by then: a factor of 3.7 a point. */
const wrapped = 30;

/**
 * The curve through fit points: cubic pieces with continuous second derivative over the lengths of the chords, which is how CAD draws a spline that is given by
 * its fit points (common practice). Along given directions at the ends, otherwise without curvature there; closed ones go round smoothly. de Boor, A Practical
 * Guide to Splines, chapter IV (from memory).
 */
export function fitSpline(given: readonly Point[], { start, end, closed }: Ends): Shape[] {
  const points = given.filter((p, i) => i === 0 || pointDistance(p, given[i - 1] ?? p) > 0);
  const first = points[0];
  const last = points.at(-1);
  if (!first || !last || points.length < 2) return [];
  if (closed && points.length > 2) {
    if (pointDistance(first, last) === 0) points.pop();
    const count = points.length;
    const round = Array.from({ length: count + 1 + 2 * wrapped }, (_, i) => points[mod(i - wrapped, count)] ?? first);
    return pieces(round, slopes(round, null, null), wrapped, wrapped + count);
  }
  return pieces(points, slopes(points, start, end), 0, points.length - 1);
}

const mod = (i: number, n: number): number => ((i % n) + n) % n;

/** Derivatives over the chord length that make the second derivative continuous: a tridiagonal system, solved in one sweep down and one up. */
function slopes(points: readonly Point[], start: Point | null, end: Point | null): Point[] {
  const n = points.length - 1;
  const chord = (i: number) => pointDistance(pointOf(points, i), pointOf(points, i + 1));
  const rise = (i: number) => pointScale(pointSubtract(pointOf(points, i + 1), pointOf(points, i)), 1 / chord(i));
  // each row: before·m[i−1] + here·m[i] + after·m[i+1] = right, reduced to m[i] + ratio·m[i+1] = rest
  const ratios: number[] = [];
  const rests: Point[] = [];
  const reduce = (before: number, here: number, after: number, right: Point) => {
    const pivot = here - before * (ratios.at(-1) ?? 0);
    const above = rests.at(-1) ?? { x: 0, y: 0 };
    rests.push(pointScale(pointSubtract(right, pointScale(above, before)), 1 / pivot));
    ratios.push(after / pivot);
  };
  if (start) reduce(0, 1, 0, pointUnit(start));
  else reduce(0, 2, 1, pointScale(rise(0), 3));
  for (let i = 1; i < n; i++) {
    const [left, right] = [chord(i - 1), chord(i)];
    const sum = pointAdd(pointScale(rise(i - 1), right), pointScale(rise(i), left));
    reduce(right, 2 * (left + right), left, pointScale(sum, 3));
  }
  if (end) reduce(0, 1, 0, pointUnit(end));
  else reduce(1, 2, 0, pointScale(rise(n - 1), 3));
  const found: Point[] = [];
  for (let i = n; i >= 0; i--) {
    const next = found[i + 1] ?? { x: 0, y: 0 };
    found[i] = pointSubtract(rests[i] ?? next, pointScale(next, ratios[i] ?? 0));
  }
  return found;
}

/** The cubic pieces from one fit point to another as one spline of degree 3. */
function pieces(points: readonly Point[], along: readonly Point[], from: number, to: number): Shape[] {
  const control: Point[] = [pointOf(points, from)];
  const knots: number[] = [0, 0, 0, 0];
  let at = 0;
  for (let i = from; i < to; i++) {
    const [a, b] = [pointOf(points, i), pointOf(points, i + 1)];
    const third = pointDistance(a, b) / 3;
    control.push(pointAdd(a, pointScale(pointOf(along, i), third)));
    control.push(pointSubtract(b, pointScale(pointOf(along, i + 1), third)));
    control.push(b);
    at += 3 * third;
    knots.push(at, at, at);
  }
  knots.push(at);
  return [{ kind: 'spline', degree: 3, knots, points: control, weights: control.map(() => 1) }];
}

function pointOf(points: readonly Point[], i: number): Point {
  const p = points[i];
  if (!p) throw new RangeError(`point ${i} is outside [0, ${points.length})`);
  return p;
}
