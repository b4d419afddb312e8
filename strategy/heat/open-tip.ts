import { cornerInward } from '../path/corner.ts';
import type { LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { pointAdd, pointScale } from '../path/point.ts';
import { bisectorShare, bisectorTable } from './bisector-table.ts';
import type { HeatWeight } from './path-heat.ts';
import { erfc } from './special-functions.ts';

/** A tip between two finished edges, the first one cut and the second as far as `open` m from where the two would meet. */
export type OpenTip = {
  readonly angle: number; // rad
  /** Where the finished edges would meet, m. */
  readonly apex: Point;
  /** Radius of the finished arc, m; 0 for a sharp tip. */
  readonly radius: number;
  /** From the apex to where the second edge begins, m. */
  readonly start: number;
};

/** The tip of a corner of the path, rounded on an arc of `round` m or sharp. */
export function openTip(corner: LoopCorner, round: number | undefined, kerfWidth: number): OpenTip {
  const half = corner.angle / 2;
  const radius = round === undefined ? 0 : Math.max(0, round - kerfWidth / 2);
  return {
    angle: corner.angle,
    apex: pointAdd(corner.point, pointScale(cornerInward(corner), kerfWidth / 2 / Math.sin(half))),
    radius,
    start: radius / Math.tan(half),
  };
}

/**
 * What counts of heat left in the walls of a tip's first edge and of its arc before the second edge began, dimensionless, against half a plane, for a place on the bisector; `cut` m of the second edge
 * have been cut in the `sinceBegun` s since. Null where it is half a plane.
 *
 * While nothing of the second edge is open that is half a plane. Once it is open as far as l from the apex it keeps heat in the tip, a share of what a wedge (Carslaw and Jaeger,
 * ch. 14) gives more than half a plane: ½(1 + erf(b/√4αt)), with which the image in a straight mirror is seen past its end, b from the foot of the place on it (Sommerfeld's penumbra,
 * same chapter), times 1 − exp(−(0.6π/β·l²/4αt)^0.6) for what has not got out past the end since, the longer the sharper the tip. Of heat that lay too near to the tip to be all within
 * the wedge when the second edge began only the wedge's part of the half plane is kept. An arc, hollow towards the part, adds (√π/8)·√(4αt)/R to what a straight wall would give,
 * the first term for a bent wall (see `loopTurnRise`), fading as e^(−√(4αt)/2R), when the wedge says it all. The two fadings are own choices, tried on rounds from 20° to 150° of an own
 * finite-volume solution that is not the reference.
 */
export function openTipWeight(
  { angle, apex, radius, start }: OpenTip,
  at: Point,
  sinceBegun: number,
  cut: number,
  alpha4: number,
): HeatWeight | null {
  const open = start + cut;
  if (open === 0 || angle >= Math.PI) return null;
  const table = bisectorTable(angle);
  const depth = Math.hypot(at.x - apex.x, at.y - apex.y);
  // how far the second edge is open past the place's foot on it
  const opposite = open - depth * Math.cos(angle / 2);
  const keeping = (0.6 * Math.PI) / angle;
  const outside = 1 - angle / Math.PI;
  return (place, age, segment) => {
    const [dx, dy] = [place.x - apex.x, place.y - apex.y];
    const square = dx * dx + dy * dy;
    const wedge = bisectorShare(table, (2 * depth * Math.sqrt(square)) / (alpha4 * age)) / 2;
    // what the half plane already had outside the wedge when the second edge began, for a tip without an arc
    const lost = radius > 0 || sinceBegun <= 0 ? 0 : outside * Math.exp(-square / (alpha4 * (age - sinceBegun)));
    const width = Math.sqrt(alpha4 * age);
    const inSight = 1 - erfc(opposite / width) / 2;
    const kept = -inSight * Math.expm1(-(((keeping * open * open) / (alpha4 * age)) ** 0.6));
    let weight = 1 + (wedge * (1 - lost) - 1) * kept;
    if (radius > 0 && segment.kind === 'arc') {
      const spread = width / radius;
      weight += (Math.sqrt(Math.PI) / 8) * spread * Math.exp(-spread / 2);
    }
    return weight;
  };
}
