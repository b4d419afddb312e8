import type { Point } from '../point.ts';
import { pointAdd, pointLeft, pointRotate, pointScale } from '../point.ts';
import type { Segment } from '../segment.ts';
import { arcOf, lineBetween, segmentLength, segmentPointAt, segmentTangentAt } from '../segment.ts';

/** How the cut comes from the pierce to its contour. */
export type LeadInShape =
  /** Straight, square to the contour where there is room. */
  | { readonly kind: 'line' }
  /** Straight towards the contour, then round into its direction by a quarter of a circle of this radius, m. */
  | { readonly kind: 'line-and-arc'; readonly radius: number };

/** Where a contour's cut begins: a place on the path, by segment and share of its length. */
export type StartPlace = { readonly segment: Segment; readonly share: number };

export type LeadIn = {
  readonly pierce: Point; // m
  /** From the pierce to the contour's start, end to start. */
  readonly segments: readonly Segment[];
};

/**
 * The lead-in to a place of the path with the scrap on the right of travel: straight from a pierce `distance` m beside the path, slanted by `slant`
 * rad from square (positive leans back against the travel). Throws RangeError for a distance that is not positive and a slant outside ±π/2.
 */
export function straightLeadIn({ segment, share }: StartPlace, distance: number, slant: number): LeadIn {
  if (!(distance > 0)) throw new RangeError(`pierce distance ${distance} m is outside (0, ∞)`);
  if (!(Math.abs(slant) < Math.PI / 2)) throw new RangeError(`slant ${slant} rad is outside ±π/2`);
  const start = segmentPointAt(segment, share);
  const right = pointScale(pointLeft(segmentTangentAt(segment, share)), -1);
  const towards = pointRotate(right, -slant);
  const pierce = pointAdd(start, pointScale(towards, distance / Math.cos(slant)));
  return { pierce, segments: [lineBetween(pierce, start)] };
}

/**
 * The lead-in that ends along the path: a line square to it and a quarter of a circle that touches it, the pierce `distance` m beside the path's tangent.
 * The radius gives way where the distance is smaller.
 */
export function tangentLeadIn({ segment, share }: StartPlace, distance: number, radius: number): LeadIn {
  if (!(distance > 0)) throw new RangeError(`pierce distance ${distance} m is outside (0, ∞)`);
  if (!(radius > 0)) throw new RangeError(`lead-in radius ${radius} m is outside (0, ∞)`);
  const start = segmentPointAt(segment, share);
  const along = segmentTangentAt(segment, share);
  const right = pointScale(pointLeft(along), -1);
  const r = Math.min(radius, distance);
  const centre = pointAdd(start, pointScale(right, r));
  const arc = arcOf(centre, r, Math.atan2(-right.y, -right.x) + Math.PI / 2, -Math.PI / 2);
  const turn = segmentPointAt(arc, 0);
  if (distance - r <= 1e-9 * distance) return { pierce: turn, segments: [arc] };
  const pierce = pointAdd(turn, pointScale(right, distance - r));
  return { pierce, segments: [lineBetween(pierce, turn), arc] };
}

/** Length of a lead-in, m. */
export const leadInLength = ({ segments }: LeadIn): number => segments.reduce((sum, s) => sum + segmentLength(s), 0);
