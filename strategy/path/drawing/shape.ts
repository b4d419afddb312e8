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

/** Lines and arcs within `tolerance` of the shape, and how far they really are from it at most (0 when exact). Same unit throughout. */
export function shapeSegments(shape: Shape, tolerance: number): { segments: Segment[]; deviation: number } {
  switch (shape.kind) {
    case 'line':
      return { segments: [lineBetween(shape.from, shape.to)], deviation: 0 };
    case 'conic':
      return conicSegments(shape, tolerance);
    case 'spline':
      return joined(splinePieces(shape).map((piece) => fitBiarcs(piece, tolerance)));
  }
}

const joined = (fits: { segments: Segment[]; deviation: number }[]) => ({
  segments: fits.flatMap((fit) => fit.segments),
  deviation: fits.reduce((most, fit) => Math.max(most, fit.deviation), 0),
});

function conicSegments({ centre, u, v, start, sweep }: Extract<Shape, { kind: 'conic' }>, tolerance: number) {
  const long = Math.max(pointLength(u), pointLength(v));
  // equal and square to each other within rounding: still a circle
  const round =
    Math.abs(pointLength(u) - pointLength(v)) < 1e-9 * long && Math.abs(pointDot(u, v)) < 1e-9 * long * long;
  if (round) {
    const turn = Math.sign(pointCross(u, v));
    const segments = [arcOf(centre, pointLength(u), Math.atan2(u.y, u.x) + turn * start, turn * sweep)];
    return { segments, deviation: 0 };
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
  return joined(
    Array.from({ length: parts }, (_, i): Curve => {
      const from = start + (sweep * i) / parts;
      const to = start + (sweep * (i + 1)) / parts;
      return { at, along, from, to };
    }).map((curve) => fitBiarcs(curve, tolerance)),
  );
}
