import type { Point } from '../path/point.ts';
import { pathLength } from '../path/segment.ts';
import { travelledTo, withoutLast } from './corner-way.ts';
import { loopTurnRise } from './loop-turn.ts';
import { frontLead, partWall } from './part-wall.ts';
import type { HeatedPiece } from './path-heat.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity, midZoneProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { checkReturnQuestion, roundOf } from './return-question.ts';
import type { OpenTip } from './open-tip.ts';
import { openTip, openTipRise } from './open-tip.ts';

/** What heats the part's side of a corner before the second edge is cut; times in s from the start of the path before it. */
export type CornerHeat = {
  readonly question: ReturnQuestion;
  readonly properties: PlateProperties;
  /** Along the walls on the part's side: they count as whole sources in an infinite plate. */
  readonly walls: readonly HeatedPiece[];
  /** When the front is at the end of those walls; a loop turns away there. */
  readonly turns: number;
  /** When cutting along the second edge begins. */
  readonly begins: number;
  readonly tip: OpenTip;
};

/** The heat of a corner, without that of the last `leftOut` m of path. Throws RangeError for a question that has no answer. */
export function cornerHeat(question: ReturnQuestion, leftOut: number): CornerHeat {
  checkReturnQuestion(question);
  const { corner, treatment, cut, properties = midZoneProperties } = question;
  const { kerfWidth, feed } = cut;
  const alpha = diffusivity(properties);
  // of a loop the last stretch is its way back, whose walls are the slug's and the skeleton's
  const { counted, arrival } = withoutLast(travelledTo(question), treatment.kind === 'loop' ? 0 : leftOut);
  // a piece of no length has no direction, and no heat
  const walls = counted
    .filter(({ from, to }) => to > from)
    .map((piece) => ({
      ...piece,
      segment: partWall(piece.segment, kerfWidth, frontLead(kerfWidth, speedOf(piece), alpha)),
    }));
  const loop = treatment.kind === 'loop' ? (treatment.loop.length - treatment.loop.extension) / feed : 0;
  const wait = treatment.kind === 'dwell' ? treatment.duration : 0;
  return {
    question,
    properties,
    walls,
    turns: arrival,
    begins: arrival + loop + wait,
    tip: openTip(corner, roundOf(question), kerfWidth),
  };
}

const speedOf = ({ segment, from, to }: HeatedPiece): number => pathLength([segment]) / (to - from);

/** Temperature rise, K, at a place on the bisector at a time, s, from all that, when `edgeCut` m of the second edge have been cut. */
export function cornerRise(heat: CornerHeat, at: Point, time: number, edgeCut: number): number {
  const { question, properties, walls, turns, begins, tip } = heat;
  const { corner, treatment, cut } = question;
  const rise = openTipRise(walls, tip, at, time, begins, edgeCut, properties);
  if (treatment.kind !== 'loop') return rise;
  const power = cut.heatIntoPlate * cut.feed;
  return rise + loopTurnRise(corner, treatment.loop, cut.kerfWidth, cut.feed, power, at, time - turns, properties);
}
