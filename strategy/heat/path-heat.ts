import type { Point } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { segmentPointDistance } from '../path/distance.ts';
import { segmentLength, segmentPointAt } from '../path/segment.ts';
import { panelIntegral } from './gauss-legendre.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';

/** A piece of path with the heat it leaves and the times at which the source was at its ends, s. */
export type HeatedPiece = {
  readonly segment: Segment;
  readonly from: number; // s
  readonly to: number; // s
  /** W per metre of thickness while the source is on it. */
  readonly powerPerLength: number;
};

/** Past this exponent a contribution is below 1e-17 of what it could be. */
const negligible = 40;

/**
 * Temperature rise, K, at a point of an infinite plate at `time` s from everything the source left on its way: the integral of the
 * instantaneous line source along the path (Carslaw and Jaeger, ch. 10). Taken over the logarithm of the heat's age in Gauss-Legendre panels no wider
 * than the distance heat has spread at that age. The part of a piece after `time` is left out. Throws RangeError when the source stands in
 * the point at that very time.
 */
export function pathRise(pieces: readonly HeatedPiece[], at: Point, time: number, plate: PlateProperties): number {
  let rise = 0;
  for (const piece of pieces) rise += pieceRise(piece, at, time, plate);
  return rise;
}

function pieceRise(piece: HeatedPiece, at: Point, time: number, plate: PlateProperties): number {
  const { segment, from, powerPerLength } = piece;
  const duration = piece.to - from;
  const to = Math.min(piece.to, time);
  if (!(to > from) || powerPerLength === 0) return 0;
  const alpha4 = 4 * diffusivity(plate);
  const oldest = time - from;
  const nearest = segmentPointDistance(segment, at);
  if ((nearest * nearest) / (alpha4 * oldest) > negligible) return 0;
  const youngest = Math.max(time - to, (nearest * nearest) / (alpha4 * negligible));
  if (!(youngest > 0))
    throw new RangeError('the source stands in the point at that very time: its temperature is not finite');
  if (youngest >= oldest) return 0;
  const speed = segmentLength(segment) / duration;
  const integrand = (logAge: number): number => {
    const age = Math.exp(logAge);
    const place = segmentPointAt(segment, (oldest - age) / duration);
    const dx = place.x - at.x;
    const dy = place.y - at.y;
    return Math.exp(-(dx * dx + dy * dy) / (alpha4 * age));
  };
  let sum = 0;
  let low = Math.log(youngest);
  const high = Math.log(oldest);
  while (low < high) {
    const age = Math.exp(low);
    // the bell over the path is √(4αt) wide in length, that over v·t in the logarithm; two of them a panel
    const width = Math.min(0.7, speed > 0 ? (2 * Math.sqrt(alpha4 / age)) / speed : 0.7);
    // a remainder of a few per cent is not worth a panel of its own
    const next = high - low < 1.1 * width ? high : low + width;
    sum += panelIntegral(integrand, low, next);
    low = next;
  }
  return (powerPerLength / (4 * Math.PI * plate.conductivity)) * sum;
}

/** The pieces of a path run at a constant feed, m/s, that ends at `end` s, each leaving `powerPerLength` W per metre of thickness. */
export function heatedPath(path: readonly Segment[], feed: number, end: number, powerPerLength: number): HeatedPiece[] {
  if (!(feed > 0)) throw new RangeError(`feed ${feed} m/s is outside (0, ∞)`);
  const pieces: HeatedPiece[] = [];
  let to = end;
  for (let i = path.length - 1; i >= 0; i--) {
    const segment = path[i];
    if (!segment) continue;
    const from = to - segmentLength(segment) / feed;
    pieces.push({ segment, from, to, powerPerLength });
    to = from;
  }
  return pieces.reverse();
}
