import { pointAdd, pointDot, pointScale, pointSubtract } from '../path/point.ts';
import { cornerInward } from '../path/corner.ts';
import { segmentLength, segmentStart } from '../path/segment.ts';
import type { CornerHeat } from './corner-heat.ts';
import { cornerHeat, cornerRise } from './corner-heat.ts';
import { travelledAfter } from './corner-way.ts';
import { frontLead } from './part-wall.ts';
import { diffusivity } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { checkReturnQuestion, measuringDepth, roundOf } from './return-question.ts';
import { measuringPlace } from './return-temperature.ts';
import type { EdgeStretch } from './tip-wedge.ts';
import { edgeRise } from './tip-wedge.ts';

/** A greatest temperature, K, and how long after cutting along the second edge began it is reached, s. */
export type TipPeak = { readonly temperature: number; readonly time: number };

/** A corner with all its heat. */
export type TipHistory = { readonly heat: CornerHeat; readonly edge: readonly EdgeStretch[] };

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
 * after cutting along the second edge has begun, and when, s. What was cut before is shut in the tip as the second edge opens (`openTipWeight`); the second edge heats the tip as a
 * wedge with both edges open, with half of its heat, from where the finished tip begins. A stretch of 50 mm is followed. Throws RangeError as `returnOf` and for a
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
  const zero = history.heat.begins - returnDelay(question);
  return times.map((time) => temperatureAt(history, measuringDepth, zero + time));
}

/** All the heat a corner gets, before and after the second edge begins, for `temperatureAt`. Throws RangeError as `returnOf`. */
export function historyOf(question: ReturnQuestion): TipHistory {
  const heat = cornerHeat(question, 0);
  const { corner, cut } = question;
  // the finished tip lies this much further along the second edge than the path's corner
  const tip = cut.kerfWidth / 2 / Math.tan(corner.angle / 2);
  const coming = Math.max(0, tip - heat.tip.start);
  const alpha = diffusivity(heat.properties);
  let time = heat.begins;
  const edge: EdgeStretch[] = [];
  for (const { segment, feed, power } of travelledAfter(question)) {
    const length = segmentLength(segment);
    const start = pointDot(pointSubtract(segmentStart(segment), corner.point), corner.outgoing) - tip;
    // before that the front is in the first edge's kerf and only partly in steel
    const skipped = Math.min(length, Math.max(0, -start));
    const end = time + length / feed;
    // what carries the heat of a straight cut ahead begins at the tip itself
    const lead = Math.max(0, frontLead(cut.kerfWidth, feed, alpha) - coming);
    const [from, to] = [start + skipped + lead, start + length + lead];
    if (skipped < length) edge.push({ from, to, start: time + skipped / feed, end, powerPerLength: power });
    time = end;
  }
  return { heat, edge };
}

/** Temperature, K, on the bisector at a depth below the finished tip, m, at a time of the history, s. */
export function temperatureAt({ heat, edge }: TipHistory, depth: number, time: number): number {
  const { corner, cut, plateTemperature } = heat.question;
  const deeper = pointScale(cornerInward(corner), depth - measuringDepth);
  const place = pointAdd(measuringPlace(corner, cut.kerfWidth, roundOf(heat.question)), deeper);
  const before = cornerRise(heat, place, time, edgeCut(edge, time));
  return plateTemperature + before + edgeRise(edge, corner.angle, depth + sharpDepth(heat), time, heat.properties);
}

/** How much of the second edge is cut at a time, m. */
function edgeCut(edge: readonly EdgeStretch[], time: number): number {
  return edge.reduce((cut, { from, to, start, end }) => {
    const share = Math.min(1, Math.max(0, (time - start) / (end - start)));
    return cut + share * (to - from);
  }, 0);
}

/** How far a rounded tip lies inside the one its edges would make, m. */
function sharpDepth({ tip: { radius, angle } }: CornerHeat): number {
  return radius / Math.sin(angle / 2) - radius;
}

/** Steps of √2 in time that a peak is followed at most either way. */
const mostSteps = 24;

/** Highest temperature, K, on the bisector at a depth, m, after the second edge has begun; see `peakAfter`. */
export function peakOf(history: TipHistory, depth: number): TipPeak {
  if (!(depth > 0 && depth < Infinity)) throw new RangeError(`depth ${depth} m is outside (0, ∞)`);
  const { heat, edge } = history;
  const { question, properties, begins } = heat;
  const half = question.corner.angle / 2;
  const place = depth + sharpDepth(heat);
  const aside = place * Math.sin(half);
  const alpha = diffusivity(properties);
  const first = edge[0];
  // the front is abreast of the place after `passes`; the peak follows it by about aside²/2α
  const passes = first
    ? first.start - begins + Math.max(0, place * Math.cos(half) - first.from) / question.cut.feed
    : 0;
  const at = (time: number) => temperatureAt(history, depth, begins + time);
  // the peak of a fast cut beside its path follows the front by aside²/2α, at a tip somewhat later: from there uphill in steps of √2
  const expected = (0.8 * aside * aside) / alpha;
  const timeOf = (i: number) => passes + expected * 2 ** (i / 2);
  let [best, highest] = [0, at(timeOf(0))];
  let [before, after] = [at(timeOf(-1)), at(timeOf(1))];
  for (let i = 0; i < mostSteps && before > highest; i++)
    [best, after, highest, before] = [best - 1, highest, before, at(timeOf(best - 2))];
  for (let i = 0; i < mostSteps && after > highest; i++)
    [best, before, highest, after] = [best + 1, highest, after, at(timeOf(best + 2))];
  // a parabola over the logarithm of the time through the highest and its neighbours, which lie a fixed factor apart
  const bend = before - 2 * highest + after;
  const shift = bend < 0 ? Math.max(-1, Math.min(1, (before - after) / (2 * bend))) : 0;
  const there = at(timeOf(best + shift));
  const peak =
    there > highest ? { temperature: there, time: timeOf(best + shift) } : { temperature: highest, time: timeOf(best) };
  // what was left before can be hotter than what the second edge brings
  const atOnce = at(0);
  return atOnce > peak.temperature ? { temperature: atOnce, time: 0 } : peak;
}
