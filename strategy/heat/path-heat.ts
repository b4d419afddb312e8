import type { Point } from '../path/point.ts';
import type { Line, Segment } from '../path/segment.ts';
import { segmentPointDistance } from '../path/distance.ts';
import { segmentLength } from '../path/segment.ts';
import { gaussNodes, gaussWeights } from './gauss-legendre.ts';
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

/** Past this exponent a contribution is below 1e-12 of what it could be. */
const negligible = 28;

/** What counts of heat left at a place, m, `age` s ago, on a segment; dimensionless. The place is only valid during the call. */
export type HeatWeight = (place: Point, age: number, segment: Segment) => number;

/** Widest panel over the logarithm of the age, and how many widths of the bell over the path one may span. */
const widest = 2;
const bells = 4;

/**
 * Temperature rise, K, at a point of an infinite plate at `time` s from everything the source left on its way: the integral of the
 * instantaneous line source along the path (Carslaw and Jaeger, ch. 10). Taken over the logarithm of the heat's age in Gauss-Legendre panels no wider
 * than four times the distance heat has spread at that age. The part of a piece after `time` is left out. Throws RangeError when the source stands in
 * the point at that very time.
 */
export function pathRise(pieces: readonly HeatedPiece[], at: Point, time: number, plate: PlateProperties): number {
  let rise = 0;
  for (const piece of pieces) rise += pieceRise(piece, at, time, plate, null);
  return rise;
}

/** The same with each place's heat counted by a weight. */
export function weightedPathRise(
  pieces: readonly HeatedPiece[],
  at: Point,
  time: number,
  plate: PlateProperties,
  weight: HeatWeight,
): number {
  let rise = 0;
  for (const piece of pieces) rise += pieceRise(piece, at, time, plate, weight);
  return rise;
}

function pieceRise(
  { segment, from, to: end, powerPerLength }: HeatedPiece,
  at: Point,
  time: number,
  plate: PlateProperties,
  weight: HeatWeight | null,
): number {
  const duration = end - from;
  const to = Math.min(end, time);
  if (!(to > from) || powerPerLength === 0) return 0;
  const alpha4 = 4 * diffusivity(plate);
  const since = time - from;
  const speed = segmentLength(segment) / duration;
  const oldest = segment.kind === 'line' ? Math.min(since, feltFor(segment, at, since, speed, alpha4)) : since;
  const nearest = segmentPointDistance(segment, at);
  if ((nearest * nearest) / (alpha4 * oldest) > negligible) return 0;
  const youngest = Math.max(time - to, (nearest * nearest) / (alpha4 * negligible));
  if (!(youngest > 0))
    throw new RangeError('the source stands in the point at that very time: its temperature is not finite');
  if (youngest >= oldest) return 0;
  const place = placing(segment);
  let sum = 0;
  let low = Math.log(youngest);
  const high = Math.log(oldest);
  while (low < high) {
    // the bell over the path is √(4αt) wide in length, that over v·t in the logarithm
    const width = Math.min(widest, speed > 0 ? (bells * Math.sqrt(alpha4 / Math.exp(low))) / speed : widest);
    // a remainder of a few per cent is not worth a panel of its own
    const next = high - low < 1.1 * width ? high : low + width;
    const half = (next - low) / 2;
    const middle = (next + low) / 2;
    for (let i = 0; i < gaussNodes.length; i++) {
      const age = Math.exp(middle + half * (gaussNodes[i] ?? 0));
      const from_ = place((since - age) / duration);
      const dx = from_.x - at.x;
      const dy = from_.y - at.y;
      const share = Math.exp(-(dx * dx + dy * dy) / (alpha4 * age));
      sum += half * (gaussWeights[i] ?? 0) * (weight === null ? share : share * weight(from_, age, segment));
    }
    low = next;
  }
  return (powerPerLength / (4 * Math.PI * plate.conductivity)) * sum;
}

/** Age, s, past which what a line left no longer comes to a place, m: it was left too far behind where the source would be now. */
function feltFor({ start, end }: Line, at: Point, since: number, speed: number, alpha4: number): number {
  const length = Math.hypot(end.x - start.x, end.y - start.y);
  const ahead = (since * speed) / length;
  const apart = Math.hypot(start.x + ahead * (end.x - start.x) - at.x, start.y + ahead * (end.y - start.y) - at.y);
  // v·age − apart = √(28·4α·age)
  const reach = Math.sqrt(negligible * alpha4);
  const root = (reach + Math.sqrt(reach * reach + 4 * speed * apart)) / (2 * speed);
  return root * root;
}

/** The place at a share of a segment, as `segmentPointAt`, in one object that is written again. */
function placing(segment: Segment): (share: number) => Point {
  const place = { x: 0, y: 0 };
  if (segment.kind === 'line') {
    const { start, end } = segment;
    const [dx, dy] = [end.x - start.x, end.y - start.y];
    return (share) => {
      place.x = start.x + share * dx;
      place.y = start.y + share * dy;
      return place;
    };
  }
  const { centre, radius, startAngle, sweep } = segment;
  return (share) => {
    const angle = startAngle + share * sweep;
    place.x = centre.x + radius * Math.cos(angle);
    place.y = centre.y + radius * Math.sin(angle);
    return place;
  };
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
