import { returnOf } from '../heat/return-temperature.ts';
import { easedInto, easedOutOf } from '../path/ease.ts';
import { arcRound, cornerRound, roundRadius, roundTangent } from '../path/round.ts';
import type { CornerRound } from '../path/round.ts';
import type { Segment } from '../path/segment.ts';
import { pathWithoutLast } from '../path/path-part.ts';
import { celsius, millimetres, percent, seconds } from '../units/said.ts';
import { easeAddedTime, roundAddedTime } from './added-time.ts';
import type { Candidate, Case, Context, CornerPlanRequest, EasedPath, Prospect, Way } from './case.ts';
import { leastDwell } from './dwell.ts';
import { hundredths } from './hundredths.ts';
import { refused, ruledOut } from './refused.ts';
import type { CornerRules } from './rules.ts';

/** Leaving the corner as it is. */
export const leaveOption = ({ without }: Pick<Case, 'without'>, limit: number): Candidate => ({
  treatment: 'leave',
  fits: true,
  returnWith: without,
  addedTime: 0,
  why: leaveSaid(without, limit),
});

/** The sentence about leaving a corner that returns at a temperature, K. */
export const leaveSaid = (without: number, limit: number): string =>
  `untreated the tip returns at ${celsius(without)}, ${without <= limit ? 'under' : 'over'} the limit of ${celsius(limit)}`;

/** What is asked about the heat of a corner that is left as it is. */
export const leftAlone = (found: Prospect): Way['asks'] => ({
  treatment: { kind: 'leave' },
  ...roundAsked(found.drawnRound),
});

const roundAsked = (round: number | undefined) => (round === undefined ? {} : { round });

/** The least wait that brings the tip under the limit, or the longest allowed; the restart adds time, and its cooling is left out. */
export function dwellOption(found: Case, context: Context): Candidate {
  const { rules, cut, plateTemperature, properties } = context.request;
  if (!rules.dwell.allowed) return ruledOut('dwell', 'dwell');
  if (found.without <= context.limit) return refused('dwell', 'the tip is under the limit without waiting');
  const { onPath: corner, before, drawnRound: round } = found;
  const after = (duration: number) =>
    returnOf({ corner, before, round, treatment: { kind: 'dwell', duration }, cut, plateTemperature, properties });
  const duration = leastDwell(after, context.limit, rules.dwell.maxDuration);
  const returnWith = after(duration);
  return {
    treatment: 'dwell',
    fits: true,
    returnWith,
    addedTime: duration + rules.dwell.restart,
    why: dwellSaid(duration, returnWith <= context.limit, celsius(returnWith), rules),
    dwell: duration,
  };
}

/** The sentence about a wait, s: least to get under the limits, or the longest allowed. */
export const dwellSaid = (duration: number, under: boolean, returnsAt: string, { dwell }: CornerRules): string =>
  under
    ? `after waiting ${seconds(duration)} the tip is at ${returnsAt}; ${seconds(dwell.restart)} more get the cut going again`
    : `after ${seconds(duration)}, the longest wait allowed, the tip is still at ${returnsAt}`;

/** Feed and mean power eased into the corner and out of it, over as much path as lies halfway to the corners beside it. */
export function easeWay(
  found: Prospect & Pick<Case, 'before'>,
  after: readonly Segment[],
  request: CornerPlanRequest,
): Way | Candidate {
  const rule = request.rules.ease;
  if (!rule?.allowed) return ruledOut('ease', 'ease');
  const { feedShare, powerShare } = rule;
  const lengths = { before: Math.min(rule.length, found.room.before), after: Math.min(rule.length, found.room.after) };
  const pieces = easedPieces(found, after, lengths);
  const over =
    lengths.before < rule.length
      ? `${millimetres(lengths.before)}, halfway from the corner before`
      : millimetres(rule.length);
  return {
    treatment: 'ease',
    addedTime: easeAddedTime(pieces, feedShare, request),
    asks: {
      treatment: { kind: 'ease', length: lengths.before, feedShare, powerShare },
      ...roundAsked(found.drawnRound),
    },
    say: (returnsAt) =>
      `eased over ${over} to ${percent(feedShare)} of the feed and ${percent(powerShare)} of the mean power the tip returns at ${returnsAt}`,
    ease: { ...lengths, feedShare, powerShare, pieces },
  };
}

function easedPieces(
  { onPath, drawnRound, before }: Prospect & Pick<Case, 'before'>,
  after: readonly Segment[],
  lengths: { readonly before: number; readonly after: number },
): EasedPath['pieces'] {
  const into = drawnRound === undefined ? before : pathWithoutLast(before, roundTangent(drawnRound, onPath.angle));
  const round = drawnRound === undefined ? [] : [{ segment: arcRound(onPath, drawnRound), eased: 1 }];
  return [...easedInto(into, lengths.before).eased, ...round, ...easedOutOf(after, lengths.after).eased];
}

/** The corner rounded by the design's radius, or by as much as the tolerance allows. */
export function roundWay(found: Prospect, request: CornerPlanRequest): Way | Candidate {
  const { rules, cut, profile } = request;
  const { corner, onPath, contour } = found;
  const rule = rules.round;
  if (!rule?.allowed) return ruledOut('round', 'rounding');
  if (!corner.convex) return refused('round', 'the corner is concave: rounding would leave steel in it');
  if (corner.fillet)
    return refused('round', `the drawing rounds this corner already, with ${hundredths(corner.fillet.radius)}`);
  const allowed = roundRadius(rule.tolerance, corner.angle);
  const round = withinTolerance(found, Math.min(rule.radius, allowed), rule.tolerance);
  if (!round)
    return refused('round', 'the edges beside the corner are too short to be rounded into each other', corner.point);
  const radius = round.radius + cut.kerfWidth / 2;
  if (radius < profile.smallestArc) {
    return refused(
      'round',
      `the path would turn on ${hundredths(radius)}, and the machine's smallest arc is ${hundredths(profile.smallestArc)}; a larger round is more than ${hundredths(rule.tolerance)} off the drawing`,
    );
  }
  const smaller = round.radius < rule.radius * (1 - 1e-9) ? `, less than the ${hundredths(rule.radius)} asked for` : '';
  return {
    treatment: 'round',
    addedTime: roundAddedTime(onPath, radius, request),
    asks: { treatment: { kind: 'leave' }, round: radius },
    say: (returnsAt) =>
      `rounded with ${hundredths(round.radius)}${smaller} the corner of ${nameOf(contour)} is ${hundredths(round.deviation)} off the drawing, ${hundredths(rule.tolerance)} are allowed; the tip returns at ${returnsAt}`,
    round,
  };
}

const nameOf = ({ name, id }: Prospect['contour']): string => name ?? `contour ${id}`;

/** The round whose deviation, exact on curved edges, is within the tolerance and that leaves half of each edge; null when none is. */
function withinTolerance({ contour, corner }: Prospect, wished: number, tolerance: number): CornerRound | null {
  let radius = wished;
  // beside curved edges the deviation grows a little otherwise than with straight ones: a few corrections bring it in
  for (let tries = 0; tries < 6 && radius > 0; tries++) {
    const round = cornerRound(contour.contour, corner, radius);
    if (!round || round.from < 0.5 || round.to > 0.5) return null;
    if (round.deviation <= tolerance * (1 + 1e-9)) return round;
    radius *= (tolerance / round.deviation) * (1 - 1e-6);
  }
  return null;
}
