import type { Point } from '../point.ts';

/** A map of the plane: x′ = a·x + c·y + e, y′ = b·x + d·y + f. */
export type Affine = {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly d: number;
  readonly e: number;
  readonly f: number;
};

export const identity: Affine = { a: 1, b: 0, c: 0, d: 1, e: 0, f: 0 };

/** The mirror that a normal pointing down (extrusion −Z) puts on plane coordinates: x′ = −x, y′ = y. DXF reference, "Object coordinate systems". */
export const mirrorX: Affine = { a: -1, b: 0, c: 0, d: 1, e: 0, f: 0 };

/** Image of a place. */
export const affinePoint = (m: Affine, p: Point): Point => ({
  x: m.a * p.x + m.c * p.y + m.e,
  y: m.b * p.x + m.d * p.y + m.f,
});

/** Image of a direction, without the shift. */
export const affineVector = (m: Affine, p: Point): Point => ({ x: m.a * p.x + m.c * p.y, y: m.b * p.x + m.d * p.y });

/** First `inner`, then `outer`. */
export function affineCompose(outer: Affine, inner: Affine): Affine {
  const u = affineVector(outer, { x: inner.a, y: inner.b });
  const v = affineVector(outer, { x: inner.c, y: inner.d });
  const o = affinePoint(outer, { x: inner.e, y: inner.f });
  return { a: u.x, b: u.y, c: v.x, d: v.y, e: o.x, f: o.y };
}
