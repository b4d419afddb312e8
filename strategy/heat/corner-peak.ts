import { pointAdd, pointDot, pointScale, pointSubtract } from '../path/point.ts';
import { cornerInward } from '../path/corner.ts';
import { segmentLength, segmentStart } from '../path/segment.ts';
import { travelledAfter, travelledTo, withoutLast } from './corner-way.ts';
import type { HeatedPiece } from './path-heat.ts';
import { pathRise } from './path-heat.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity, midZoneProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { checkReturnQuestion, measuringDepth, roundOf } from './return-question.ts';
import { measuringPlace } from './return-temperature.ts';
import type { EdgeStretch } from './tip-wedge.ts';
import { edgeRise } from './tip-wedge.ts';

/** A greatest temperature, K, and how long after cutting along the second edge began it is reached, s. */
export type TipPeak = { readonly temperature: number; readonly time: number };

/** A corner with all its heat, with times counted from the start of the path before it. */
export type TipHistory = {
  readonly question: ReturnQuestion;
  readonly properties: PlateProperties;
  readonly before: readonly HeatedPiece[];
  /** When the second edge begins, s. */
  readonly begins: number;
  readonly edge: readonly EdgeStretch[];
};

/**
 * How long after the front has come to the end of the first edge cutting along the second begins, s: the way of a loop at the cut's feed, a dwell, the
 * arc of a round, otherwise 0. Throws RangeError as `returnOf`.
 */
export function returnDelay(question: ReturnQuestion): number {
  checkReturnQuestion(question);
  const { treatment, cut, corner } = question;
  if (treatment.kind === 'loop') return treatment.loop.length / cut.feed;
  const round = roundOf(question);
  const share = treatment.kind === 'ease' ? treatment.feedShare : 1;
  const arc = round === undefined ? 0 : (round * (Math.PI - corner.angle)) / (cut.feed * share);
  return arc + (treatment.kind === 'dwell' ? treatment.duration : 0);
}

/**
 * Highest temperature, K, that a place on the bisector, `depth` m inside the finished tip (where the return temperature is measured when left out), reaches
 * after cutting along the second edge has begun, and when, s. What was cut before spreads on as it did; the second edge heats the tip as a wedge with both
 * edges open, with all of its heat from where the front is full in steel. A stretch of 50 mm is followed. Throws RangeError as `returnOf` and for a
 * depth that is not positive.
 */
export function peakAfter(question: ReturnQuestion, depth: number = measuringDepth): TipPeak {
  return peakOf(historyOf(question), depth);
}

/**
 * Temperature, K, at the measuring place at each of `times` s, counted from when the front is at the end of the first edge (negative before): the corner
 * as it is cut, with the heat of the last 2 mm that the return temperature leaves out. Shape as `times`. Cutting along the second edge begins after
 * `returnDelay`. Throws RangeError as `returnOf`.
 */
export function coolingCurve(question: ReturnQuestion, times: readonly number[]): number[] {
  const history = historyOf(question);
  const zero = history.begins - returnDelay(question);
  return times.map((time) => temperatureAt(history, measuringDepth, zero + time));
}

/** All the heat a corner gets, before and after the second edge begins, for `temperatureAt`. Throws RangeError as `returnOf`. */
export function historyOf(question: ReturnQuestion): TipHistory {
  checkReturnQuestion(question);
  const { corner, treatment, cut, properties = midZoneProperties } = question;
  const { counted, arrival } = withoutLast(travelledTo(question), 0);
  const begins = arrival + (treatment.kind === 'dwell' ? treatment.duration : 0);
  const round = roundOf(question);
  // the finished tip lies this much further along the second edge than the path's corner
  const tip = cut.kerfWidth / 2 / Math.tan(corner.angle / 2);
  let time = begins;
  const edge: EdgeStretch[] = [];
  for (const { segment, feed, power } of travelledAfter(question)) {
    const length = segmentLength(segment);
    const from = pointDot(pointSubtract(segmentStart(segment), corner.point), corner.outgoing) - tip;
    const skipped = Math.min(length, Math.max(0, -from));
    const end = time + length / feed;
    if (skipped < length)
      edge.push({ from: from + skipped, to: from + length, start: time + skipped / feed, end, powerPerLength: power });
    time = end;
  }
  return {
    question: round === undefined ? { ...question, round: undefined } : question,
    properties,
    before: counted,
    begins,
    edge,
  };
}

/** Temperature, K, on the bisector at a depth below the finished tip, m, at a time of the history, s. */
export function temperatureAt(history: TipHistory, depth: number, time: number): number {
  const { question, properties, before, edge } = history;
  const { corner, cut, plateTemperature, round } = question;
  const deeper = pointScale(cornerInward(corner), depth - measuringDepth);
  const place = pointAdd(measuringPlace(corner, cut.kerfWidth, round), deeper);
  return (
    plateTemperature +
    pathRise(before, place, time, properties) +
    edgeRise(edge, corner.angle, depth + sharpDepth(history), time, properties)
  );
}

/** How far a rounded tip lies inside the one its edges would make, m. */
function sharpDepth({ question: { corner, cut, round } }: TipHistory): number {
  if (round === undefined) return 0;
  const finished = Math.max(0, round - cut.kerfWidth / 2);
  return finished / Math.sin(corner.angle / 2) - finished;
}

/** Steps per factor of two in time in which the peak is looked for. */
const octave = 2;

/** Highest temperature, K, on the bisector at a depth, m, after the second edge has begun; see `peakAfter`. */
export function peakOf(history: TipHistory, depth: number): TipPeak {
  if (!(depth > 0 && depth < Infinity)) throw new RangeError(`depth ${depth} m is outside (0, ∞)`);
  const { question, properties, begins, edge } = history;
  const half = question.corner.angle / 2;
  const place = depth + sharpDepth(history);
  const aside = place * Math.sin(half);
  const alpha = diffusivity(properties);
  const first = edge[0];
  // the front is abreast of the place after `passes`; the peak follows it by about aside²/2α
  const passes = first
    ? first.start - begins + Math.max(0, place * Math.cos(half) - first.from) / question.cut.feed
    : 0;
  const shortest = (0.05 * aside * aside) / alpha;
  const longest = (4 * place * place) / alpha + (4 * place) / question.cut.feed;
  const at = (time: number) => temperatureAt(history, depth, begins + time);
  const steps = Math.ceil(octave * Math.log2(longest / shortest));
  const timeOf = (i: number) => (i < 0 ? 0 : passes + shortest * 2 ** (i / octave));
  let best = -1;
  let highest = at(0);
  let fallen = 0;
  for (let i = 0; i <= steps && fallen < 3; i++) {
    const temperature = at(timeOf(i));
    if (temperature > highest) {
      highest = temperature;
      best = i;
      fallen = 0;
    } else fallen = best >= 0 ? fallen + 1 : fallen;
  }
  if (best < 0) return { temperature: highest, time: 0 };
  let [low, high] = [timeOf(best - 1), timeOf(best + 1)];
  // golden section, to a hundredth of the bracket
  const ratio = (Math.sqrt(5) - 1) / 2;
  let [c, d] = [high - ratio * (high - low), low + ratio * (high - low)];
  let [atC, atD] = [at(c), at(d)];
  for (let i = 0; i < 8; i++) {
    if (atC > atD) {
      [high, d, atD] = [d, c, atC];
      c = high - ratio * (high - low);
      atC = at(c);
    } else {
      [low, c, atC] = [c, d, atD];
      d = low + ratio * (high - low);
      atD = at(d);
    }
  }
  return atC > atD ? { temperature: atC, time: c } : { temperature: atD, time: d };
}
