import type { CutConditions } from '../corners/rules.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { cornerInward } from '../path/corner.ts';
import { easedInto, easedShare } from '../path/ease.ts';
import { pathWithoutLast } from '../path/path-part.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import { arcRound, roundTangent } from '../path/round.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentLength, segmentPart } from '../path/segment.ts';
import type { HeatedPiece } from './path-heat.ts';
import { pathRise } from './path-heat.ts';
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
  | { readonly kind: 'dwell'; readonly duration: number } // s
  /** Feed and mean power fall evenly over the last `length` m to these shares of the straight cut's. */
  | { readonly kind: 'ease'; readonly length: number; readonly feedShare: number; readonly powerShare: number };

export type ReturnQuestion = {
  /** Corner of the path (half the kerf outside the finished edges). */
  readonly corner: LoopCorner;
  /** Radius of the arc on which the path goes round the corner, m; sharp when left out. A loop runs on to the corner itself. */
  readonly round?: number;
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
 * edge it continues; half of the heat of its far side comes round; the way back counts nothing. On 2D finite-volume grids with opening kerfs that choice lies within
 * 4 K from 30° to 120° for the loop of one arc; for the flat one it is carried over, untried. Round a corner the edge begins at the arc's end, and the
 * place is measured from the rounded tip. Where the cut is eased, what it leaves per second follows the mean power: own assumption, no source; a front that
 * is kept melting loses more than that at a low feed. Thickness cancels: a through-cut heats the plate evenly through it. Earlier edges count with the heat of an unslit plate,
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

/** Place where the return temperature of a corner is taken, m; with a round of the path that radius, inside the rounded tip. */
export function measuringPlace(corner: LoopCorner, kerfWidth: number, round?: number): Point {
  const s = Math.sin(corner.angle / 2);
  // the path's arc lies as far from its corner as its centre does, less its radius; from there the finished tip is half a kerf
  const tip = round === undefined ? kerfWidth / 2 / s : round / s - round + kerfWidth / 2;
  return pointAdd(corner.point, pointScale(cornerInward(corner), tip + measuringDepth));
}

/** A piece of path with its feed, m/s, and what it leaves, W per metre of thickness. */
type Travelled = { readonly segment: Segment; readonly feed: number; readonly power: number };

/** Return temperature, K, for one treatment; see `returnTemperature`. */
export function returnOf(question: ReturnQuestion): number {
  const { corner, treatment, cut, plateTemperature, properties = midZoneProperties } = question;
  if (!(plateTemperature > 0)) throw new RangeError(`plate temperature ${plateTemperature} K is outside (0, ∞)`);
  if (!(cut.heatIntoPlate >= 0))
    throw new RangeError(`heat into the plate ${cut.heatIntoPlate} J/m² is outside [0, ∞)`);
  if (!(cut.feed > 0)) throw new RangeError(`feed ${cut.feed} m/s is outside (0, ∞)`);
  const round = treatment.kind === 'loop' ? undefined : question.round;
  const wait = treatment.kind === 'dwell' ? treatment.duration : 0;
  if (!(wait >= 0)) throw new RangeError(`dwell ${wait} s is outside [0, ∞)`);
  const pieces = withoutLast(travelledTo(question, round), leftOutStretch);
  const place = measuringPlace(corner, cut.kerfWidth, round);
  return plateTemperature + pathRise(pieces.counted, place, pieces.arrival + wait, properties);
}

/** All that is cut before the second edge begins, in order. */
function travelledTo({ corner, treatment, cut, before }: ReturnQuestion, round: number | undefined): Travelled[] {
  const { feed } = cut;
  const power = cut.heatIntoPlate * feed;
  const straight = (segment: Segment): Travelled => ({ segment, feed, power });
  const edge = before ?? [
    lineBetween(pointSubtract(corner.point, pointScale(corner.incoming, straightRun)), corner.point),
  ];
  if (treatment.kind === 'loop') {
    const [out, ...far] = treatment.loop.segments.slice(0, -1);
    const way = treatment.loop.segments.slice(-1);
    return [
      ...[...edge, ...(out ? [out] : [])].map(straight),
      ...far.map((segment) => ({ segment, feed, power: power / 2 })),
      ...way.map((segment) => ({ segment, feed, power: 0 })),
    ];
  }
  const rounded = round === undefined ? edge : pathWithoutLast(edge, roundTangent(round, corner.angle));
  const arc = round === undefined ? [] : [arcRound(corner, round)];
  if (treatment.kind !== 'ease') return [...rounded, ...arc].map(straight);
  const { length, feedShare, powerShare } = treatment;
  if (!(feedShare > 0 && feedShare <= 1 && powerShare >= 0 && powerShare <= 1))
    throw new RangeError(`shares of feed ${feedShare} and power ${powerShare} are outside (0, 1]`);
  const { rest, eased } = easedInto(rounded, length);
  const slowly = ({ segment, share }: { segment: Segment; share: number }): Travelled => ({
    segment,
    feed: feed * easedShare(share, feedShare),
    power: power * easedShare(share, powerShare),
  });
  return [
    ...rest.map(straight),
    ...eased.map(({ segment, eased: share }) => slowly({ segment, share })),
    ...arc.map((segment) => slowly({ segment, share: 1 })),
  ];
}

/** The pieces with their times from the start, s, without the last `length` m of them, and when the whole way is done. */
function withoutLast(way: readonly Travelled[], length: number): { counted: HeatedPiece[]; arrival: number } {
  let left = way.reduce((sum, { segment }) => sum + segmentLength(segment), 0) - length;
  let time = 0;
  const counted: HeatedPiece[] = [];
  for (const { segment, feed, power } of way) {
    const whole = segmentLength(segment);
    const to = time + whole / feed;
    if (left >= whole) counted.push({ segment, from: time, to, powerPerLength: power });
    else if (left > 0) {
      const share = left / whole;
      counted.push({
        segment: segmentPart(segment, 0, share),
        from: time,
        to: time + (to - time) * share,
        powerPerLength: power,
      });
    }
    left -= whole;
    time = to;
  }
  return { counted, arrival: time };
}
