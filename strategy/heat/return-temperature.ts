import type { LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { cornerInward } from '../path/corner.ts';
import { pointAdd, pointScale } from '../path/point.ts';
import { travelledTo, withoutLast } from './corner-way.ts';
import { pathRise } from './path-heat.ts';
import type { PlateProperties } from './properties.ts';
import { midZoneProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { checkReturnQuestion, leftOutStretch, measuringDepth, roundOf } from './return-question.ts';

export type { ReturnQuestion, ReturnTreatment } from './return-question.ts';

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

/** Return temperature, K, for one treatment; see `returnTemperature`. */
export function returnOf(question: ReturnQuestion): number {
  checkReturnQuestion(question);
  const { corner, treatment, cut, plateTemperature, properties = midZoneProperties } = question;
  const round = roundOf(question);
  const wait = treatment.kind === 'dwell' ? treatment.duration : 0;
  const pieces = withoutLast(travelledTo(question), leftOutStretch);
  const place = measuringPlace(corner, cut.kerfWidth, round);
  return plateTemperature + pathRise(pieces.counted, place, pieces.arrival + wait, properties);
}
