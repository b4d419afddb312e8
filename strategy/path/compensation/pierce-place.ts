import { millimetres } from '../../units/said.ts';
import type { Contour } from '../contour.ts';
import { contourContains } from '../contour.ts';
import { smallestBreak } from '../corner.ts';
import { segmentDistance, segmentPointDistance } from '../distance.ts';
import { leavesPlate } from '../loop-fit.ts';
import type { Box, Point } from '../point.ts';
import { pointCross, pointDistance, pointDot } from '../point.ts';
import type { Segment } from '../segment.ts';
import { lineBetween, segmentLength, segmentPart, segmentPointAt, segmentStart, segmentTangentAt } from '../segment.ts';
import type { Circle } from './inscribed.ts';
import { largestCircleInside } from './inscribed.ts';
import type { LeadIn, LeadInShape, StartPlace } from './lead-in.ts';
import { straightLeadIn, tangentLeadIn } from './lead-in.ts';
import type { SegmentIndex } from './segment-index.ts';
import { anyWithin, segmentIndex } from './segment-index.ts';

export type LeadInRule = {
  readonly shape: LeadInShape;
  /** Distance of the pierce from the path that the strategy's pierce needs, m: see `leadInNeeded` of the pierce. */
  readonly needed: number;
  /** Radius of the pierce's crater, m: in a hole too small for what is needed, never nearer than this. */
  readonly craterRadius: number;
  /** Least free width between what is cut, or a crater, and anything else, m. */
  readonly clearance: number;
};

/** What there is to cut from: a rectangle, an outline, or an outline with what was cut out of it before. m */
export type CutPlate = Box | Contour | { readonly edge: Contour; readonly openings: readonly Contour[] };

/** What a lead-in must stay clear of on the plate. Lengths in m. */
export type PierceSurroundings = {
  readonly kerfWidth: number;
  readonly plate: CutPlate | null;
  /** Finished edges of all contours. */
  readonly edges: SegmentIndex<{ readonly contourId: string; readonly name: string }>;
  /** What is cut beside the contours: loops at corners. */
  readonly loops: SegmentIndex<string>;
  /** Lead-ins placed so far. */
  readonly leadIns: readonly { readonly name: string; readonly leadIn: LeadIn }[];
};

/** The closed path that a start is looked for on, and where it must not start: at these of its joints (ends of segments) something else happens. */
export type StartPath = {
  readonly contourId: string;
  readonly name: string;
  readonly segments: readonly Segment[];
  /** Whether a start may lie on the segment: not where a corner's treatment replaces it. */
  readonly free: (segment: number) => boolean;
  readonly busyJoints: ReadonlySet<number>;
  /** The scrap is closed in by the contour: a hole. */
  readonly closedIn: boolean;
  /** Where the programmer wants the start, m. */
  readonly near?: Point;
};

export type PierceBlock = 'own contour' | 'contour' | 'plate' | 'loop' | 'lead-in' | 'too small';

export type PiercePlace =
  | {
      readonly kind: 'place';
      readonly leadIn: LeadIn;
      readonly segment: number;
      readonly share: number;
      /** Set where a small hole left less than what the pierce needs. */
      readonly shortened: string | null;
    }
  | { readonly kind: 'none'; readonly why: string; readonly what: PierceBlock; readonly at: Point };

type Block = Extract<PiercePlace, { kind: 'none' }>;
type Candidate = StartPlace & { readonly index: number };

/** Places tried on a segment: its middle first, then halfway to its ends, and so on. */
const shares = [1 / 2, 1 / 4, 3 / 4, 1 / 8, 7 / 8, 3 / 8, 5 / 8];
/** Slants of a straight lead-in from square, rad. */
const slants = [0, Math.PI / 6, -Math.PI / 6, Math.PI / 4, -Math.PI / 4];
/** Steps in which the distance is shortened in a hole from what is needed to the crater. */
const steps = 6;
/** Candidates tried at most for each distance, no two of them nearer along the path than this share of its length. */
const mostTried = 100;
const spacing = 1 / 250;
/** The path may be this share of half a kerf nearer to its own finished edge than half a kerf: curved edges come in pieces. */
const tangentSlack = 0.02;
/** Rounding of coordinates that is no contact, m. */
const rounding = 1e-9;

/**
 * Where a contour is pierced and how its cut leads in, or the named thing that leaves no room. Places on straight or flat pieces far from corners
 * come first, longer pieces before shorter ones, or what is nearest to where the programmer wants it; the first that keeps clear of everything is taken.
 * Only in a hole is the pierce brought nearer than needed, down to the crater's radius. The same request always has the same answer.
 */
export function piercePlace(path: StartPath, rule: LeadInRule, around: PierceSurroundings): PiercePlace {
  const { needed, craterRadius } = rule;
  if (!(needed > 0 && Number.isFinite(needed))) throw new RangeError(`lead-in ${needed} m is outside (0, ∞)`);
  if (!(craterRadius >= 0)) throw new RangeError(`crater radius ${craterRadius} m is negative`);
  const full = Math.max(needed, craterRadius);
  const own = segmentIndex(path.segments.map((segment) => ({ segment, of: null })));
  const candidates = startCandidates(path, full);
  let first: Block | null = null;
  const attempt = (candidate: Candidate, distance: number): PiercePlace | null => {
    for (const leadIn of leadInsTo(candidate, distance, rule.shape)) {
      const block = inTheWay(leadIn, distance, path, rule, around, own);
      if (block) first ??= block;
      else {
        const shortened =
          distance < full * (1 - 1e-6)
            ? `the lead-in of ${path.name} is ${millimetres(distance)} instead of ${millimetres(full)}: the hole has no room for more`
            : null;
        return { kind: 'place', leadIn, segment: candidate.index, share: candidate.share, shortened };
      }
    }
    return null;
  };
  const shortest = Math.max(craterRadius, around.kerfWidth);
  const tryAll = (distance: number): PiercePlace | null => {
    for (const candidate of candidates) {
      const found = attempt(candidate, distance);
      if (found) return found;
    }
    return null;
  };
  // how far a place in a hole can be from the path at all, to a fiftieth: longer distances need no trial
  const widest = path.closedIn
    ? largestCircleInside({ segments: path.segments }, 0.02 * shortest, { enough: full, share: 0.019 })
    : null;
  if (widest && widest.radius < shortest) return tooSmall(path, widest, craterRadius, around.kerfWidth);
  const distances = [full];
  if (widest && shortest < full) {
    for (let i = 1; i <= steps; i++) distances.push(full * (shortest / full) ** (i / steps));
  }
  for (const distance of distances) {
    const found = widest && distance > widest.radius * 1.02 ? null : tryAll(distance);
    if (found) return found;
  }
  return (
    first ?? {
      kind: 'none',
      what: 'too small',
      at: segmentPointAt(path.segments[0] ?? lineBetween({ x: 0, y: 0 }, { x: 0, y: 0 }), 0),
      why: `${path.name} has no place between its corners to begin at`,
    }
  );
}

function tooSmall({ name }: StartPath, { centre, radius }: Circle, craterRadius: number, kerfWidth: number): Block {
  const counted =
    craterRadius > kerfWidth
      ? `the crater is ${millimetres(craterRadius)} in radius`
      : `the kerf is ${millimetres(kerfWidth)} wide`;
  return {
    kind: 'none',
    what: 'too small',
    at: centre,
    why: `${name} is too small to be pierced in: no place in it is farther than ${millimetres(radius)} from the cut, and ${counted}`,
  };
}

/** Lead-ins to a place whose pierce lies `distance` m from the path there, the wanted shape first. */
function leadInsTo(place: StartPlace, distance: number, shape: LeadInShape): LeadIn[] {
  const straight = slants.map((slant) => straightLeadIn(place, distance, slant));
  if (shape.kind === 'line') return straight;
  const rounds = [shape.radius, shape.radius / 2, shape.radius / 4].flatMap((radius) => {
    const depth = depthBeside(place, distance, radius);
    return depth === null ? [] : [tangentLeadIn(place, depth, radius)];
  });
  // no room for an arc at all? Straight is better than none
  return [...rounds, ...straight];
}

/**
 * Depth below the path's tangent at which a pierce that lies `aside` m along it is `distance` m from the path: on a curve around the scrap
 * more than the distance, and none where the curve is too narrow (null).
 */
function depthBeside({ segment }: StartPlace, distance: number, aside: number): number | null {
  if (segment.kind === 'line' || segment.sweep > 0) return distance;
  const left = (segment.radius - distance) ** 2 - aside ** 2;
  return segment.radius > distance && left >= 0 ? segment.radius - Math.sqrt(left) : null;
}

/** Places to begin at, best first. */
function startCandidates({ segments, busyJoints, free, near }: StartPath, wanted: number): Candidate[] {
  const lengths = segments.map(segmentLength);
  const total = lengths.reduce((a, b) => a + b, 0);
  const ends: number[] = [];
  lengths.reduce((sum, length, i) => (ends[i] = sum + length), 0);
  const breaks = segments.flatMap((segment, i) =>
    busyJoints.has(i) || breaksAfter(segment, segments[(i + 1) % segments.length] ?? segment) ? [ends[i] ?? 0] : [],
  );
  const marginAt = (place: number): number => {
    let [low, high] = [0, breaks.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((breaks[middle] ?? 0) <= place) low = middle + 1;
      else high = middle;
    }
    const last = breaks.at(-1);
    const first = breaks[0];
    if (last === undefined || first === undefined) return Infinity;
    const before = low > 0 ? (breaks[low - 1] ?? 0) : last - total;
    const after = low < breaks.length ? (breaks[low] ?? 0) : first + total;
    return Math.min(place - before, after - place);
  };
  const found = segments.flatMap((segment, index) => {
    if (!free(index)) return [];
    const length = lengths[index] ?? 0;
    const wantedShares = near ? [...shares, shareNearest(segment, near)] : shares;
    return wantedShares.map((share, rank) => {
      const along = (ends[index] ?? 0) - (1 - share) * length;
      const margin = marginAt(along);
      const curvature = segment.kind === 'arc' ? 1 / segment.radius : 0;
      // 1 far from corners on a straight piece; a curve of the wanted distance as radius loses a quarter
      const score = Math.min(1, margin / wanted) - (curvature * wanted) / 4;
      const away = near ? pointDistance(segmentPointAt(segment, share), near) : 0;
      return { segment, share, index, rank, length, along, margin, score, away };
    });
  });
  // rounding must not decide between equals: turned, the part would start elsewhere
  const grade = (value: number, step: number) => Math.round(value / step);
  const sorted = found
    .filter(({ margin }) => margin > 1e-6 * wanted)
    .sort(
      (a, b) =>
        (near ? Number(b.score >= 0.25) - Number(a.score >= 0.25) || grade(a.away - b.away, 1e-6 * wanted) : 0) ||
        grade(b.score, 1e-3) - grade(a.score, 1e-3) ||
        a.rank - b.rank ||
        grade(b.length - a.length, 1e-6 * wanted) ||
        a.index - b.index,
    );
  // one of neighbours is enough: a curve drawn in thousands of pieces has no better places than a circle
  const taken: (typeof sorted)[number][] = [];
  for (const candidate of sorted) {
    const apart = (one: { readonly along: number }): boolean => {
      const between = Math.abs(one.along - candidate.along);
      return Math.min(between, total - between) >= spacing * total;
    };
    if (taken.every(apart)) taken.push(candidate);
    if (taken.length === mostTried) break;
  }
  return taken;
}

function shareNearest(segment: Segment, p: Point): number {
  const count = 64;
  let best = 0.5;
  for (let i = 1; i < count; i++) {
    if (pointDistance(segmentPointAt(segment, i / count), p) < pointDistance(segmentPointAt(segment, best), p)) {
      best = i / count;
    }
  }
  return best;
}

/** Whether the path breaks its direction between two segments. */
function breaksAfter(before: Segment, after: Segment): boolean {
  const [u, w] = [segmentTangentAt(before, 1), segmentTangentAt(after, 0)];
  return Math.abs(Math.atan2(pointCross(u, w), pointDot(u, w))) >= smallestBreak;
}

/** What a lead-in is too near to, or null. */
function inTheWay(
  leadIn: LeadIn,
  distance: number,
  path: StartPath,
  rule: LeadInRule,
  around: PierceSurroundings,
  own: SegmentIndex<null>,
): Block | null {
  const { kerfWidth, plate, edges, loops, leadIns } = around;
  const { clearance, craterRadius } = rule;
  const half = kerfWidth / 2;
  const pierce = lineBetween(leadIn.pierce, leadIn.pierce);
  const crater = Math.max(craterRadius, half);
  const block = (what: PierceBlock, at: Point, why: string): Block => ({
    kind: 'none',
    what,
    at,
    why: `${path.name} has no room to be pierced: ${why}`,
  });

  const away =
    offPlate(pierce, plate, crater + clearance) ??
    leadIn.segments.map((segment) => offPlate(segment, plate, half + clearance)).find((at) => at !== null);
  if (away) return block('plate', away, `the plate's edge is nearer than the crater and ${millimetres(clearance)}`);

  // its own path: the pierce by its distance, the way in by the clearance except where it joins
  const tooNear = anyWithin(own, pierce, distance * (1 - 1e-9) - rounding);
  if (tooNear) {
    return block(
      'own contour',
      tooNear.onSecond,
      `its own contour comes within ${millimetres(tooNear.distance)} of the pierce, and ${millimetres(distance)} are needed`,
    );
  }
  const free = Math.min(half + clearance, distance);
  for (const segment of bodyOf(leadIn, free)) {
    const found = anyWithin(own, segment, free * (1 - 1e-6) - rounding);
    if (found) return block('own contour', found.onSecond, 'its own contour is in the way');
  }
  const isOwn = ({ contourId }: { readonly contourId: string }) => contourId === path.contourId;
  for (const segment of leadIn.segments) {
    const gouged = anyWithin(edges, segment, half * (1 - tangentSlack) - rounding, isOwn);
    if (gouged) return block('own contour', gouged.onSecond, 'the lead-in would cut into its own contour');
    const widest = half + kerfWidth + clearance;
    const other = anyWithin(edges, segment, widest - rounding, (of) => !isOwn(of));
    if (other) return block('contour', other.onSecond, `${other.of.name} is in the way`);
    const loop = anyWithin(loops, segment, kerfWidth + clearance - rounding);
    if (loop) return block('loop', loop.onSecond, `${loop.of} is in the way`);
  }
  const other = anyWithin(edges, pierce, crater + kerfWidth + clearance - rounding, (of) => !isOwn(of));
  if (other) return block('contour', other.onSecond, `${other.of.name} is in the way of the crater`);
  const loop = anyWithin(loops, pierce, crater + half + clearance - rounding);
  if (loop) return block('loop', loop.onSecond, `${loop.of} is in the way of the crater`);

  for (const { name, leadIn: theirs } of leadIns) {
    if (pointDistance(theirs.pierce, leadIn.pierce) < 2 * crater + clearance - rounding) {
      return block('lead-in', theirs.pierce, `the pierce of ${name} is in the way`);
    }
    for (const b of theirs.segments) {
      if (segmentPointDistance(b, leadIn.pierce) < crater + half + clearance - rounding) {
        return block('lead-in', theirs.pierce, `the lead-in of ${name} is in the way of the crater`);
      }
      for (const a of leadIn.segments) {
        if (segmentPointDistance(a, theirs.pierce) < crater + half + clearance - rounding) {
          return block('lead-in', theirs.pierce, `the pierce of ${name} is in the way`);
        }
        const found = segmentDistance(a, b);
        if (found.distance < kerfWidth + clearance - rounding) {
          return block('lead-in', found.onSecond, `the lead-in of ${name} is in the way`);
        }
      }
    }
  }
  return null;
}

/** The lead-in without its end: an arc that touches the path, or the last `end` m of a straight one. */
function bodyOf({ segments }: LeadIn, end: number): Segment[] {
  const last = segments.at(-1);
  if (!last) return [];
  const before = segments.slice(0, -1);
  if (last.kind === 'arc') return before;
  const length = segmentLength(last);
  const slantedEnd = end * 1.5;
  return slantedEnd < length ? [...before, segmentPart(last, 0, 1 - slantedEnd / length)] : before;
}

/** Where a segment is nearer to the plate's edge or to an opening in it than `needed` m, or off the plate; null where it is not. */
function offPlate(segment: Segment, plate: CutPlate | null, needed: number): Point | null {
  if (plate === null || !('edge' in plate)) return leavesPlate(segment, plate, needed);
  const away = leavesPlate(segment, plate.edge, needed);
  if (away) return away;
  for (const opening of plate.openings) {
    if (contourContains(opening, segmentStart(segment))) return segmentStart(segment);
    for (const edge of opening.segments) {
      const found = segmentDistance(segment, edge);
      if (found.distance < needed - rounding) return found.onSecond;
    }
  }
  return null;
}
