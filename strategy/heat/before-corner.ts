import type { LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { pointAdd, pointCross, pointDot, pointLeft, pointScale, pointSubtract } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { pathLength, segmentEnd, segmentLength, segmentStart, segmentTangentAt } from '../path/segment.ts';
import { erfc } from './special-functions.ts';

/** The tip of the part cut before a corner: with the first edge it shuts the heat of both in. */
export type BeforeCorner = {
  /** Where its finished edges meet, m, and the angle inside the part, rad. */
  readonly apex: Point;
  readonly angle: number;
  /** From the apex to the end of the first edge along it, m. */
  readonly length: number;
  /** Path before the corner that was cut when the front turned into the first edge, m. */
  readonly cut: number;
};

/** So far behind a break the direction of the edge before is taken, m: past the largest fillet that still counts as a corner. */
const pastFillet = 3e-3;

/** Breaks that turn less are a bent edge, rad, and more a spike. */
const leastTurn = (25 * Math.PI) / 180;
const mostTurn = (165 * Math.PI) / 180;

/** How straight the first edge must be, rad. */
const straightness = 1e-3;

/** The tip before a corner on the path that leads to it, or null where the edge begins in a bend, a notch or nowhere. */
export function beforeCorner(corner: LoopCorner, before: readonly Segment[], kerfWidth: number): BeforeCorner | null {
  const ahead = corner.incoming;
  let i = before.length - 1;
  for (; i >= 0; i--) {
    const segment = before[i];
    if (!segment || segmentLength(segment) === 0) continue;
    if (segment.kind === 'arc' || Math.abs(pointCross(segmentTangentAt(segment, 0), ahead)) > straightness) break;
  }
  const cut = pathLength(before.slice(0, i + 1));
  let back = 0;
  for (; i >= 0; i--) {
    const segment = before[i];
    const piece = segment ? segmentLength(segment) : 0;
    back += piece;
    if (!segment || piece === 0 || (back < pastFillet && i > 0)) continue;
    const direction = segmentTangentAt(segment, Math.max(0, (back - pastFillet) / piece));
    const turn = Math.atan2(pointCross(direction, ahead), pointDot(direction, ahead));
    if (!(turn > leastTurn && turn < mostTurn)) return null;
    const half = kerfWidth / 2;
    const there = pointAdd(
      segment.kind === 'line' ? segmentEnd(segment) : segmentStart(segment),
      pointScale(pointLeft(direction), half),
    );
    const here = pointAdd(corner.point, pointScale(pointLeft(ahead), half));
    // where the wall before meets the wall of the first edge
    const behind = pointCross(pointSubtract(here, there), direction) / pointCross(ahead, direction);
    if (!(behind > 0)) return null;
    return { apex: pointSubtract(here, pointScale(ahead, behind)), angle: Math.PI - turn, length: behind, cut };
  }
  return null;
}

/** Half the width over which an image fades as it goes out of sight behind the tip, rad. */
const penumbra = 0.3;

/**
 * What the tip before a corner makes of a place's heat, dimensionless, against half a plane, for a place of the part at `at`: the images in its two walls (Carslaw and Jaeger, ch. 14),
 * each counted while it is in sight and fading as it goes out of it, which sums to π/β near the tip and is exact for 90°. `edge` heat was left in the first edge; heat of the
 * edge before that lay near to the tip when the front turned there, `sinceTurn` s ago, has partly gone into the skeleton. Past the end of the first edge's kerf, `open` m
 * from the place, heat gets out again: only ½(1 + erf(open/√4αt)) of what the images add is counted.
 */
export function beforeWeight(
  { apex, angle }: BeforeCorner,
  along: Point,
  at: Point,
  open: number,
  place: Point,
  edge: boolean,
  age: number,
  sinceTurn: number,
  alpha4: number,
): number {
  const [px, py] = [at.x - apex.x, at.y - apex.y];
  const r = Math.sqrt(px * px + py * py);
  const theta = Math.atan2(along.x * py - along.y * px, along.x * px + along.y * py);
  const [sx, sy] = [place.x - apex.x, place.y - apex.y];
  const square = sx * sx + sy * sy;
  const z = (2 * r * Math.sqrt(square)) / (alpha4 * age);
  const own = edge ? theta : angle - theta;
  const direct = Math.cos(own);
  let images = 1;
  for (let k = 1; 2 * k * angle - Math.abs(own) < Math.PI + penumbra; k++) {
    for (const turned of [own + 2 * k * angle, own - 2 * k * angle]) {
      const share = Math.min(1, (Math.PI + penumbra - Math.abs(turned)) / (2 * penumbra));
      if (share > 0) images += share * Math.exp(z * (Math.cos(turned) - direct));
    }
  }
  if (!edge) images *= 1 - (1 - angle / Math.PI) * Math.exp(-square / (alpha4 * Math.max(age - sinceTurn, 1e-9)));
  return 1 + (images - 1) * (1 - erfc(open / Math.sqrt(alpha4 * age)) / 2);
}
