import type { CutConditions } from '../corners/rules.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { cornerInward } from '../path/corner.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentPart } from '../path/segment.ts';
import type { HeatedPiece } from './path-heat.ts';
import { heatedPath, pathRise } from './path-heat.ts';
import type { PlateProperties } from './properties.ts';
import { midZoneProperties } from './properties.ts';

/** Depth of the measuring place inside the finished tip, along the bisector, m. */
export const measuringDepth = 1.5e-3;

/** Last stretch of path whose heat is left out, m: so near the source no closed form and no grid agrees with another. */
export const leftOutStretch = 2e-3;

/** Straight cut taken before a corner when nothing else is said, m; older heat no longer shows at the front. */
const straightRun = 0.3;

/** What happens between the end of the first edge and the beginning of the second. */
export type ReturnTreatment =
  | { readonly kind: 'leave' }
  | { readonly kind: 'loop'; readonly loop: Loop }
  | { readonly kind: 'dwell'; readonly duration: number }; // s

export type ReturnQuestion = {
  /** Corner of the path (half the kerf outside the finished edges). */
  readonly corner: LoopCorner;
  /** Path cut before the corner, in order of travel, ending in it; a straight cut when left out. */
  readonly before?: readonly Segment[];
  readonly treatment: ReturnTreatment;
  readonly cut: Pick<CutConditions, 'feed' | 'kerfWidth' | 'heatIntoPlate'>;
  readonly plateTemperature: number; // K
  readonly properties?: PlateProperties;
};

/** All in K; `excess` is what the corner with its treatment is hotter than a straight edge at the same feed. */
export type ReturnTemperature = {
  readonly withTreatment: number;
  readonly without: number;
  readonly straightEdge: number;
  readonly excess: number;
};

/**
 * Return temperature of a corner, K, with and without its treatment and of a straight edge: what the plate's own temperature and everything cut
 * before the last 2 mm of path leave at the measuring place (on the bisector, 1.5 mm inside the finished tip) when cutting along the second edge begins.
 *
 * Closed form: line sources of q′ = heat into the plate × feed along the path. The open kerf of the first edge is an insulated edge; half the heat goes to the
 * part's side and its image doubles it, so an edge counts as a whole source in an infinite plate. A loop's extension still heats the part's side like the
 * edge it continues; half of the arc's heat comes round; the way back counts nothing. On 2D finite-volume grids with opening kerfs that choice lies within
 * 4 K from 30° to 120°. Thickness cancels: a through-cut heats the plate evenly through it. Earlier edges count with the heat of an unslit plate,
 * which is too little once both sides of a narrow part are cut. Throws RangeError for a dwell below 0.
 */
export function returnTemperature(question: ReturnQuestion): ReturnTemperature {
  const { treatment, cut, plateTemperature } = question;
  const withTreatment = returnOf(question);
  const without = treatment.kind === 'leave' ? withTreatment : returnOf({ ...question, treatment: { kind: 'leave' } });
  const straightEdge = straightEdgeReturn(cut, plateTemperature, question.properties);
  return { withTreatment, without, straightEdge, excess: withTreatment - straightEdge };
}

/** The same figure beside a straight cut, K: 1.5 mm inside the finished edge, abreast of the cut's end. */
export function straightEdgeReturn(
  cut: ReturnQuestion['cut'],
  plateTemperature: number,
  properties?: PlateProperties,
): number {
  const ahead = { x: 1, y: 0 };
  const corner = { point: { x: 0, y: 0 }, incoming: ahead, outgoing: ahead, angle: Math.PI };
  return returnOf({ corner, treatment: { kind: 'leave' }, cut, plateTemperature, properties });
}

/** Place where the return temperature of a corner is taken, m. */
export function measuringPlace(corner: LoopCorner, kerfWidth: number): Point {
  const depth = kerfWidth / 2 / Math.sin(corner.angle / 2) + measuringDepth;
  return pointAdd(corner.point, pointScale(cornerInward(corner), depth));
}

/** Return temperature, K, for one treatment; see `returnTemperature`. */
export function returnOf(question: ReturnQuestion): number {
  const { corner, treatment, cut, plateTemperature, properties = midZoneProperties } = question;
  if (!(plateTemperature > 0)) throw new RangeError(`plate temperature ${plateTemperature} K is outside (0, ∞)`);
  if (!(cut.heatIntoPlate >= 0))
    throw new RangeError(`heat into the plate ${cut.heatIntoPlate} J/m² is outside [0, ∞)`);
  const power = cut.heatIntoPlate * cut.feed;
  const before = question.before ?? [
    lineBetween(pointSubtract(corner.point, pointScale(corner.incoming, straightRun)), corner.point),
  ];
  const pieces = heatedPath(before, cut.feed, 0, power);
  let arrival = 0;
  let wait = 0;
  if (treatment.kind === 'loop') {
    const [out, arc] = treatment.loop.segments;
    arrival = treatment.loop.length / cut.feed;
    const turn = treatment.loop.extension / cut.feed;
    pieces.push({ segment: out, from: 0, to: turn, powerPerLength: power });
    pieces.push({ segment: arc, from: turn, to: arrival - turn, powerPerLength: power / 2 });
  } else if (treatment.kind === 'dwell') {
    wait = treatment.duration;
    if (!(wait >= 0)) throw new RangeError(`dwell ${wait} s is outside [0, ∞)`);
  }
  const counted = piecesUntil(pieces, arrival - leftOutStretch / cut.feed);
  return plateTemperature + pathRise(counted, measuringPlace(corner, cut.kerfWidth), arrival + wait, properties);
}

/** The pieces with everything after `end` s taken off. */
function piecesUntil(pieces: readonly HeatedPiece[], end: number): HeatedPiece[] {
  return pieces.flatMap((piece) => {
    if (piece.to <= end) return [piece];
    if (piece.from >= end) return [];
    const share = (end - piece.from) / (piece.to - piece.from);
    return [{ ...piece, segment: segmentPart(piece.segment, 0, share), to: end }];
  });
}
