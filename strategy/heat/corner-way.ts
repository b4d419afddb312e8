import { easedInto, easedOutOf, easedShare } from '../path/ease.ts';
import { pathWithoutLast } from '../path/path-part.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import { arcRound, roundTangent } from '../path/round.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentLength, segmentPart } from '../path/segment.ts';
import type { HeatedPiece } from './path-heat.ts';
import type { ReturnQuestion } from './return-question.ts';
import { roundOf, straightRun } from './return-question.ts';

/** A piece of path with its feed, m/s, and what it leaves, W per metre of thickness. */
export type Travelled = { readonly segment: Segment; readonly feed: number; readonly power: number };

/** All that is cut before the second edge begins, in order; of a loop the way out of its extension only, which the part's side sees straight. */
export function travelledTo(question: ReturnQuestion): Travelled[] {
  const { corner, treatment, cut, before } = question;
  const round = roundOf(question);
  const { feed } = cut;
  const power = cut.heatIntoPlate * feed;
  const straight = (segment: Segment): Travelled => ({ segment, feed, power });
  const edge = before ?? [
    lineBetween(pointSubtract(corner.point, pointScale(corner.incoming, straightRun)), corner.point),
  ];
  if (treatment.kind === 'loop') return [...edge, treatment.loop.segments[0]].map(straight);
  const rounded = round === undefined ? edge : pathWithoutLast(edge, roundTangent(round, corner.angle));
  const arc = round === undefined ? [] : [arcRound(corner, round)];
  if (treatment.kind !== 'ease') return [...rounded, ...arc].map(straight);
  const { length, feedShare, powerShare } = treatment;
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
export function withoutLast(way: readonly Travelled[], length: number): { counted: HeatedPiece[]; arrival: number } {
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

/** Path of the second edge that is followed after the corner, m: what is cut later comes too late for a peak at the tip. */
const followed = 0.05;

/** What is cut along the second edge, in order, from where it begins. */
export function travelledAfter(question: ReturnQuestion): Travelled[] {
  const { corner, treatment, cut } = question;
  const round = roundOf(question);
  const start = pointAdd(
    corner.point,
    pointScale(corner.outgoing, round === undefined ? 0 : roundTangent(round, corner.angle)),
  );
  const edge = [lineBetween(start, pointAdd(start, pointScale(corner.outgoing, followed)))];
  const { feed } = cut;
  const power = cut.heatIntoPlate * feed;
  if (treatment.kind !== 'ease') return edge.map((segment) => ({ segment, feed, power }));
  const { rest, eased } = easedOutOf(edge, treatment.length);
  return [
    ...eased.map(({ segment, eased: share }) => ({
      segment,
      feed: feed * easedShare(share, treatment.feedShare),
      power: power * easedShare(share, treatment.powerShare),
    })),
    ...rest.map((segment) => ({ segment, feed, power })),
  ];
}
