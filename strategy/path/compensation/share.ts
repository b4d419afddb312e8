import type { Point } from '../point.ts';
import { pointDot, pointSubtract } from '../point.ts';
import type { Segment } from '../segment.ts';

/** Share of the segment's length at which a place on it lies, 0..1; beyond its ends the nearer one. */
export function shareAt(segment: Segment, p: Point): number {
  if (segment.kind === 'line') {
    const along = pointSubtract(segment.end, segment.start);
    const square = pointDot(along, along);
    return square === 0 ? 0 : Math.min(1, Math.max(0, pointDot(pointSubtract(p, segment.start), along) / square));
  }
  const turn = 2 * Math.PI;
  const angle = Math.atan2(p.y - segment.centre.y, p.x - segment.centre.x);
  const past = Math.sign(segment.sweep) * (angle - segment.startAngle);
  const on = (((past % turn) + turn) % turn) / Math.abs(segment.sweep);
  if (on <= 1) return on;
  return on - 1 < turn / Math.abs(segment.sweep) - on ? 1 : 0;
}
