import type { LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { cornerInward } from '../path/corner.ts';
import { pointAdd, pointScale } from '../path/point.ts';
import { cornerHeat, cornerRise } from './corner-heat.ts';
import type { PlateProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { leftOutStretch, measuringDepth, roundOf } from './return-question.ts';

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
 * Closed form, constant properties: q′ = heat into the plate × feed goes in two halves into the kerf's walls, abreast of the front. On the part's side the first edge and a loop's
 * extension are the insulated edge of half a plane, where half the heat counts as a whole source in an infinite plate, with distances from the finished edge, a little ahead of the
 * front (`frontLead`). A loop's arcs send the half of their outer wall back round the kerf (`loopTurnRise`); their inner wall is the slug's, and the way back heats slug and
 * skeleton only. Round a corner the arc's kerf shuts heat in the tip (`openTipWeight`): the edge begins at the arc's end, and the place is measured from the rounded tip. Where the cut is eased, what it leaves per
 * second follows the mean power: own assumption, no source; a front that is kept melting loses more than that at a low feed. Thickness cancels: a through-cut heats the plate
 * evenly through it. A tip close before this one shuts in what both edges leave (`beforeWeight`); edges before that count as walls of half planes. Against a reference solver with an
 * opening kerf the rise is within 2.5 % for sharp corners of 30° to 150° with loops of either kind, waits and eases, and within 7 % for rounds (`npm run reference -- --errors`); on
 * strips of 4 to 15 mm an own finite-volume solution lies up to 15 % above it, with right angles 1 to 5 % below. With properties that follow the temperature (EN 1993-1-2) the reference lies
 * 1 to 35 % higher, most at obtuse corners and straight edges: that is for a calibration to take up. Throws RangeError for values out of range.
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
  const heat = cornerHeat(question, leftOutStretch);
  const place = measuringPlace(question.corner, question.cut.kerfWidth, roundOf(question));
  return question.plateTemperature + cornerRise(heat, place, heat.begins, 0);
}
