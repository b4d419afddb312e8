import type { Point } from '../path/point.ts';
import { pointDot, pointSubtract } from '../path/point.ts';
import { pathLength } from '../path/segment.ts';
import type { BeforeCorner } from './before-corner.ts';
import { beforeCorner, beforeWeight } from './before-corner.ts';
import { travelledTo, withoutLast } from './corner-way.ts';
import { loopTurnRise } from './loop-turn.ts';
import { frontLead, partWall } from './part-wall.ts';
import type { HeatedPiece, HeatWeight } from './path-heat.ts';
import { heatedPath, pathRise, weightedPathRise } from './path-heat.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity, midZoneProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { checkReturnQuestion, roundOf } from './return-question.ts';
import type { OpenTip } from './open-tip.ts';
import { openTip, openTipWeight } from './open-tip.ts';

/** What heats the part's side of a corner before the second edge is cut; times in s from the start of the path before it. */
export type CornerHeat = {
  readonly question: ReturnQuestion;
  readonly properties: PlateProperties;
  /** Along the walls on the part's side: they count as whole sources in an infinite plate. */
  readonly walls: readonly HeatedPiece[];
  /** Walls cut before those, at times below 0, where a tip before shuts their heat in; and the path, as which the plate has that heat already. */
  readonly earlier: { readonly walls: readonly HeatedPiece[]; readonly path: readonly HeatedPiece[] };
  /** When the front is at the end of those walls; a loop turns away there. */
  readonly turns: number;
  /** When cutting along the second edge begins. */
  readonly begins: number;
  readonly tip: OpenTip;
  /** The tip before this one on the path, and when the front turned there. */
  readonly before: { readonly corner: BeforeCorner; readonly turned: number } | null;
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
  const wallsOf = (pieces: readonly HeatedPiece[]) =>
    pieces
      .filter(({ from, to }) => to > from)
      .map((piece) => ({
        ...piece,
        segment: partWall(piece.segment, kerfWidth, frontLead(kerfWidth, speedOf(piece), alpha)),
      }));
  const walls = wallsOf(counted);
  const loop = treatment.kind === 'loop' ? (treatment.loop.length - treatment.loop.extension) / feed : 0;
  const wait = treatment.kind === 'dwell' ? treatment.duration : 0;
  const { before, earlier: cutEarlier = [] } = question;
  const tipBefore = before ? beforeCorner(corner, [...cutEarlier, ...before], kerfWidth) : null;
  const path = tipBefore ? heatedPath(cutEarlier, feed, 0, cut.heatIntoPlate * feed) : [];
  return {
    question,
    properties,
    walls,
    earlier: { walls: wallsOf(path), path },
    turns: arrival,
    begins: arrival + loop + wait,
    tip: openTip(corner, roundOf(question), kerfWidth),
    before: tipBefore && { corner: tipBefore, turned: timeAfter([...path, ...counted], tipBefore.cut) },
  };
}

const speedOf = ({ segment, from, to }: HeatedPiece): number => pathLength([segment]) / (to - from);

/** When the first `length` m of pieces have been cut, s; of less, when all have. */
function timeAfter(pieces: readonly HeatedPiece[], length: number): number {
  let left = length;
  for (const { segment, from, to } of pieces) {
    const own = pathLength([segment]);
    if (own > left) return from + (left / own) * (to - from);
    left -= own;
  }
  return pieces.at(-1)?.to ?? 0;
}

/** Temperature rise, K, at a place on the bisector at a time, s, from all that, when `edgeCut` m of the second edge have been cut. */
export function cornerRise(heat: CornerHeat, at: Point, time: number, edgeCut: number): number {
  const { question, properties, walls, earlier, turns, begins, tip } = heat;
  const { corner, treatment, cut } = question;
  const alpha4 = 4 * diffusivity(properties);
  const closing = openTipWeight(tip, at, time - begins, edgeCut, alpha4);
  const shut = shutIn(heat, at, time, alpha4);
  const weight: HeatWeight | null = closing && shut ? (...of) => closing(...of) * shut(...of) : (closing ?? shut);
  let rise = weight ? weightedPathRise(walls, at, time, properties, weight) : pathRise(walls, at, time, properties);
  if (weight && shut) {
    rise += weightedPathRise(earlier.walls, at, time, properties, weight);
    rise -= pathRise(earlier.path, at, time, properties);
  }
  if (treatment.kind !== 'loop') return rise;
  const power = cut.heatIntoPlate * cut.feed;
  return rise + loopTurnRise(corner, treatment.loop, cut.kerfWidth, cut.feed, power, at, time - turns, properties);
}

/** Past this exponent heat from the tip before no longer comes to the corner. */
const negligible = 9;

/** What the tip before the corner adds, or null where it is too far to matter. */
function shutIn({ question, before }: CornerHeat, at: Point, time: number, alpha4: number): HeatWeight | null {
  if (!before || time <= before.turned) return null;
  const { corner: tip, turned } = before;
  if (tip.length * tip.length > negligible * alpha4 * (time - turned)) return null;
  const { corner, treatment } = question;
  const ahead = corner.incoming;
  const foot = pointDot(pointSubtract(at, corner.point), ahead);
  const open = (treatment.kind === 'loop' ? treatment.loop.extension : 0) - foot;
  return (place, age) => beforeWeight(tip, ahead, at, open, place, time - age >= turned, age, time - turned, alpha4);
}
