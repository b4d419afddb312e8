import type { CutEase } from '../cut-path.ts';
import { segmentPointDistance } from '../distance.ts';
import { easedShare, easeSteps } from '../ease.ts';
import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentEnd, segmentLength, segmentPart } from '../segment.ts';
import { shareAt } from './share.ts';

/**
 * A stretch of a path that is eased from place to place, m: into a corner over `before` m and out of it over `after` m, in the corner down to these shares of the
 * cut's feed and mean power. What lies between, as a drawn fillet, is cut at them.
 */
export type EaseStretch = {
  readonly from: Point;
  readonly to: Point;
  readonly before: number;
  readonly after: number;
} & CutEase;

type Item = {
  readonly segment: Segment;
  /** What is put into the path here: it is not eased. */
  readonly insert: object | null;
  readonly ease: CutEase | null;
  /** Seconds waited at its end. */
  readonly dwell: number;
};

/** The way between the stretch's ends is no longer than this many times what is eased: a fillet between may be as long as both. */
const longestWay = 4;

/**
 * A closed path with a stretch of it eased in even steps, begun where the stretch begins; null where its ends are farther than `slack` m from the path, or what is
 * put in lies between them.
 */
export function easedAlong<T extends Item>(ring: readonly T[], stretch: EaseStretch, slack: number): T[] | null {
  const { from, to, before, after } = stretch;
  const n = ring.length;
  const most = longestWay * (before + after);
  for (const [i, first] of ring.entries()) {
    if (!startsOn(first.segment, from, slack)) continue;
    const leaves = shareAt(first.segment, from);
    let way = -leaves * segmentLength(first.segment);
    for (let skip = 0; skip < n && way <= most; skip++) {
      const item = ring[(i + skip) % n];
      if (!item || item.insert !== null) break;
      const comes = endsOn(item.segment, to, slack) ? shareAt(item.segment, to) : 0;
      if (comes > (skip === 0 ? leaves : 0)) {
        const length = way + comes * segmentLength(item.segment);
        if (length >= (before + after) * (1 - 1e-6) - slack) return split(ring, i, leaves, skip, comes, stretch);
      }
      way += segmentLength(item.segment);
    }
  }
  return null;
}

/**
 * The same about a corner of the path, where the stretch's ends are not on it: beside inside corners the path is shorter than the edges' parallels. As much before
 * the corner and after it, as far as nothing is put in; null where the corner is not on the path either.
 */
export function easedAbout<T extends Item>(
  ring: readonly T[],
  corner: Point,
  stretch: EaseStretch,
  slack: number,
): T[] | null {
  const n = ring.length;
  const i = ring.findIndex(({ segment, insert }) => !insert && pointDistance(segmentEnd(segment), corner) <= slack);
  if (i < 0) return null;
  // how many segments a way takes from the corner, the share of the last, and its length
  const wayOf = (step: 1 | -1, wanted: number) => {
    let length = 0;
    for (let k = 0; k < n / 2; k++) {
      const item = ring[(step === 1 ? i + 1 + k : i - k + n) % n];
      const own = item && item.insert === null ? segmentLength(item.segment) : 0;
      if (own === 0) return k === 0 ? null : { count: k, share: 1, length };
      if (length + own >= wanted) return { count: k + 1, share: (wanted - length) / own, length: wanted };
      length += own;
    }
    return null;
  };
  const [back, on] = [wayOf(-1, stretch.before), wayOf(1, stretch.after)];
  if (!back || !on || back.count + on.count > n) return null;
  const start = (i - back.count + 1 + n) % n;
  const actual = { ...stretch, before: back.length, after: on.length };
  return split(ring, start, 1 - back.share, back.count + on.count - 1, on.share, actual);
}

const startsOn = (segment: Segment, p: Point, slack: number): boolean =>
  segmentPointDistance(segment, p) <= slack && pointDistance(segmentEnd(segment), p) > slack;

const endsOn = (segment: Segment, p: Point, slack: number): boolean => segmentPointDistance(segment, p) <= slack;

/** The ring from the stretch's start, with the stretch in pieces that are each eased alike. */
function split<T extends Item>(
  ring: readonly T[],
  i: number,
  leaves: number,
  skip: number,
  comes: number,
  stretch: EaseStretch,
): T[] {
  const n = ring.length;
  const covered: T[] = [];
  for (let s = 0; s <= skip; s++) {
    const item = ring[(i + s) % n];
    if (item) covered.push(...partOf(item, s === 0 ? leaves : 0, s === skip ? comes : 1));
  }
  const rest: T[] = [];
  const [first, last] = [ring[i], ring[(i + skip) % n]];
  if (last) rest.push(...partOf(last, comes, 1));
  for (let s = skip + 1; s < n; s++) {
    const item = ring[(i + s) % n];
    if (item) rest.push(item);
  }
  if (first) rest.push(...partOf(first, 0, leaves));
  return [...inSteps(covered, stretch), ...rest];
}

/** A part of an item between two shares of its length, nothing where that is no length; its wait stays at its end. */
function partOf<T extends Item>(item: T, from: number, to: number): T[] {
  if ((to - from) * segmentLength(item.segment) <= shortest) return [];
  if (from === 0 && to === 1) return [item];
  return [{ ...item, segment: segmentPart(item.segment, from, to), dwell: to === 1 ? item.dwell : 0 }];
}

/** Shorter than what any file can say, m. */
const shortest = 1e-9;

function inSteps<T extends Item>(items: readonly T[], { before, after, feedShare, powerShare }: EaseStretch): T[] {
  const whole = items.reduce((sum, { segment }) => sum + segmentLength(segment), 0);
  const stops = [
    ...Array.from({ length: easeSteps }, (_, k) => (before * (k + 1)) / easeSteps),
    ...Array.from({ length: easeSteps }, (_, k) => whole - after * (1 - k / easeSteps)),
  ];
  const easeAt = (along: number): CutEase => {
    const into = along < before ? (Math.floor((along / before) * easeSteps) + 0.5) / easeSteps : 1;
    const left = whole - along;
    const outOf = left < after ? (Math.floor((left / after) * easeSteps) + 0.5) / easeSteps : 1;
    const eased = Math.min(into, outOf);
    return { feedShare: easedShare(eased, feedShare), powerShare: easedShare(eased, powerShare) };
  };
  let along = 0;
  return items.flatMap((item) => {
    const length = segmentLength(item.segment);
    const start = along;
    along += length;
    // a step of nothing beside a segment's own end is rounding
    const inner = stops
      .filter((stop) => stop > start + slightly && stop < start + length - slightly)
      .sort((a, b) => a - b)
      .map((stop) => (stop - start) / length);
    const shares = [0, ...inner, 1];
    return shares.slice(1).flatMap((to, k) => {
      const from = shares[k] ?? 0;
      const ease = easeAt(start + ((from + to) / 2) * length);
      return partOf(item, from, to).map((part) => ({ ...part, ease }));
    });
  });
}

/** Nearer than this to a segment's end a step ends with it, m. */
const slightly = 1e-7;
