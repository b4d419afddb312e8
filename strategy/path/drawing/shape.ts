import type { Point } from '../point.ts';
import { pointCross, pointDot, pointLength } from '../point.ts';
import type { Segment } from '../segment.ts';
import { arcOf, lineBetween } from '../segment.ts';
import type { Affine } from './affine.ts';
import { affinePoint, affineVector } from './affine.ts';
import type { Curve } from './biarc.ts';
import { fitBiarcs } from './biarc.ts';
import { splinePieces } from './spline.ts';

/** Geometry of an entity before it becomes lines and arcs, in the file's units; closed under maps of the plane. */
export type Shape =
  | { readonly kind: 'line'; readonly from: Point; readonly to: Point }
  /** centre + u·cos t + v·sin t for t from `start` over `sweep`: circles, ellipses and their pieces. */
  | {
      readonly kind: 'conic';
      readonly centre: Point;
      readonly u: Point;
      readonly v: Point;
      readonly start: number;
      readonly sweep: number;
    }
  | {
      readonly kind: 'spline';
      readonly degree: number;
      readonly knots: readonly number[];
      readonly points: readonly Point[];
      readonly weights: readonly number[];
    };

/** Image of a shape under a map of the plane. */
export function shapeMap(m: Affine, shape: Shape): Shape {
  switch (shape.kind) {
    case 'line':
      return { kind: 'line', from: affinePoint(m, shape.from), to: affinePoint(m, shape.to) };
    case 'conic':
      return {
        ...shape,
        centre: affinePoint(m, shape.centre),
        u: affineVector(m, shape.u),
        v: affineVector(m, shape.v),
      };
    case 'spline':
      return { ...shape, points: shape.points.map((p) => affinePoint(m, p)) };
  }
}

/** An upper bound of how far the shape's places lie from the origin, in its unit. */
export function shapeReach(shape: Shape): number {
  switch (shape.kind) {
    case 'line':
      return Math.max(pointLength(shape.from), pointLength(shape.to));
    case 'conic':
      return pointLength(shape.centre) + pointLength(shape.u) + pointLength(shape.v);
    case 'spline':
      return shape.points.reduce((most, p) => Math.max(most, pointLength(p)), 0);
  }
}

/** Puts lines and arcs within `tolerance` of the shape behind `into`; how far they really are from it at most (0 when exact). Same unit throughout. */
export function shapeInto(shape: Shape, tolerance: number, into: Segment[]): number {
  switch (shape.kind) {
    case 'line':
      into.push(lineBetween(shape.from, shape.to));
      return 0;
    case 'conic':
      return conicInto(shape, tolerance, into);
    case 'spline':
      return fitted(splinePieces(shape), tolerance, into);
  }
}

function fitted(curves: readonly Curve[], tolerance: number, into: Segment[]): number {
  let deviation = 0;
  for (const curve of curves) {
    const fit = fitBiarcs(curve, tolerance);
    for (const segment of fit.segments) into.push(segment);
    deviation = Math.max(deviation, fit.deviation);
  }
  return deviation;
}

function conicInto(
  { centre, u, v, start, sweep }: Extract<Shape, { kind: 'conic' }>,
  tolerance: number,
  into: Segment[],
): number {
  const long = Math.max(pointLength(u), pointLength(v));
  // equal and square to each other within rounding: still a circle
  const round =
    Math.abs(pointLength(u) - pointLength(v)) < 1e-9 * long && Math.abs(pointDot(u, v)) < 1e-9 * long * long;
  if (round) {
    const turn = Math.sign(pointCross(u, v));
    into.push(arcOf(centre, pointLength(u), Math.atan2(u.y, u.x) + turn * start, turn * sweep));
    return 0;
  }
  const at = (t: number): Point => ({
    x: centre.x + u.x * Math.cos(t) + v.x * Math.sin(t),
    y: centre.y + u.y * Math.cos(t) + v.y * Math.sin(t),
  });
  const along = (t: number): Point => ({
    x: -u.x * Math.sin(t) + v.x * Math.cos(t),
    y: -u.y * Math.sin(t) + v.y * Math.cos(t),
  });
  // quarters, so that no piece has its ends on top of each other
  const parts = Math.max(1, Math.ceil(Math.abs(sweep) / (Math.PI / 2) - 1e-9));
  const quarters = Array.from({ length: parts }, (_, i): Curve => {
    const from = start + (sweep * i) / parts;
    const to = start + (sweep * (i + 1)) / parts;
    return { at, along, from, to };
  });
  return fitted(quarters, tolerance, into);
}
