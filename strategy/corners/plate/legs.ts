import type { HeatPuffs } from '../../heat/heat-puffs.ts';
import { heatPuffs } from '../../heat/heat-puffs.ts';
import type { HeatedPiece } from '../../heat/path-heat.ts';
import type { PlateProperties } from '../../heat/properties.ts';
import type { ClockHeat, PierceDeposit, PlateClock } from '../../motion/index.ts';
import { timeOfSegments } from '../../motion/index.ts';
import { shareAt } from '../../path/compensation/share.ts';
import { segmentPointDistance } from '../../path/distance.ts';
import type { Box, Point } from '../../path/point.ts';
import { boxUnion, emptyBox, pointDistance } from '../../path/point.ts';
import type { Segment } from '../../path/segment.ts';
import { segmentEnd, segmentPart, segmentStart } from '../../path/segment.ts';

/** Where a corner's second edge begins on the path, m. */
export type CornerPlace = { readonly contourId: string; readonly at: Point };

/** What is cut from one corner to the next on the untreated path, in the order of cutting. Times in s from the start of that cut. */
export type Leg = {
  /** Number of the corner it ends in, among those asked for. */
  readonly corner: number;
  /** When the front is in the corner. */
  readonly arrives: number;
  /** When the front begins the corner's own path. */
  readonly ownFrom: number;
  /** Path of the corner's own contour since the corner before or the lead-in's start, in order of travel, m. */
  readonly own: readonly Segment[];
  /** What was cut without a break right before that: its own contour's path to the corner before; empty behind a lead-in. */
  readonly earlier: readonly Segment[];
  /** All its heat as puffs, pierces too, with times as they are on the untreated path. */
  readonly puffs: HeatPuffs;
  /** What of that is not on the corner's own path: the rest of a contour before, a pierce. */
  readonly apart: HeatPuffs;
  /** When the leg begins, s: the corner before, or the cut. */
  readonly begins: number;
  /** Around its puffs, m. */
  readonly box: Box;
  /** The same heat before it became puffs. */
  readonly heat: readonly HeatedPiece[];
  readonly pierces: readonly PierceDeposit[];
};

/** The legs of a cut in order, and the corners that no path comes to. */
export type CutLegs = {
  readonly legs: readonly Leg[];
  readonly missed: readonly number[];
  /** What is cut behind the last corner. */
  readonly tail: ClockHeat;
};

/** A path's corner and its plan's are computed from the same drawing, m. */
const samePlace = 1e-6;
/** Beyond this from the path a corner is not on it, m: a tip sharper than the path follows is passed on an arc. */
const beside = 5e-3;
/** Youngest age, s, and shortest length of path, m, at which a puff is told from the path it stands for: at the next corner the heat is older. */
const puffAge = 0.2;
const puffLength = 1e-3;

type Passing = { readonly corner: number; readonly time: number };

/**
 * The legs of an untreated cut: corner by corner in the order in which the path comes to them, with the heat let go on the way. `thickness` in m shares out what a
 * pierce leaves.
 */
export function cutLegs(
  clock: PlateClock,
  { heat, pierces }: ClockHeat,
  places: readonly CornerPlace[],
  thickness: number,
  properties: PlateProperties,
): CutLegs {
  const byContour = new Map<string, number[]>();
  places.forEach(({ contourId }, i) => {
    const known = byContour.get(contourId);
    if (known) known.push(i);
    else byContour.set(contourId, [i]);
  });
  const passed: Passing[] = [];
  const found = new Set<number>();
  clock.runs.forEach(({ contourId, segments }, run) => {
    for (const { corner, segment, share } of onPath(segments, byContour.get(contourId) ?? [], places)) {
      if (found.has(corner)) continue;
      found.add(corner);
      passed.push({ corner, time: timeOfSegments(clock, run, segment, share) });
    }
  });
  passed.sort((a, b) => a.time - b.time || a.corner - b.corner);

  let piece = 0;
  let pierce = 0;
  let rest: HeatedPiece | null = null;
  let ownBefore: readonly HeatedPiece[] = [];
  const legs = passed.map(({ corner, time }, k): Leg => {
    // a leg's heat is first asked about at the next corner: no sooner need its puffs be told apart
    const asked = Math.max(time + puffAge, passed[k + 1]?.time ?? 0);
    const pieces: HeatedPiece[] = rest && rest.to > rest.from ? [rest] : [];
    rest = null;
    for (let next = heat[piece]; next && next.from < time; next = heat[++piece]) {
      if (next.to <= time + tick) pieces.push(next);
      else {
        const share = (time - next.from) / (next.to - next.from);
        pieces.push({ ...next, segment: segmentPart(next.segment, 0, share), to: time });
        rest = { ...next, segment: segmentPart(next.segment, share, 1), from: time };
        piece++;
        break;
      }
    }
    const spots: PierceDeposit[] = [];
    for (let next = pierces[pierce]; next && next.time <= time; next = pierces[++pierce]) spots.push(next);
    const first = firstOfOwn(pieces);
    const [other, last] = [pieces.slice(0, first), pieces.slice(first)];
    const [goneOn, goesOn] = [ownBefore.at(-1), last[0]];
    const earlier = first === 0 && goneOn && goesOn && follows(goneOn, goesOn) ? ownBefore : [];
    ownBefore = last;
    const asPuffs = (some: readonly HeatedPiece[], when: number) =>
      heatPuffs(some, -Infinity, when, puffLength, properties);
    const pierced = spots.flatMap(({ at, time: when, heat: amount }) => [at.x, at.y, when, amount / thickness, 0]);
    // what is not on the corner's own path it meets itself, a little older
    const apart = Float64Array.from([...asPuffs(other, time + puffAge), ...pierced]);
    const puffs = Float64Array.from([...asPuffs(last, asked), ...apart]);
    return {
      corner,
      arrives: time,
      ownFrom: last[0]?.from ?? time,
      own: last.map(({ segment }) => segment),
      earlier: earlier.map(({ segment }) => segment),
      puffs,
      begins: passed[k - 1]?.time ?? 0,
      box: puffsBox(puffs),
      apart,
      heat: pieces,
      pierces: spots,
    };
  });
  const after: HeatedPiece[] = rest ? [rest] : [];
  const tail = { heat: [...after, ...heat.slice(piece)], pierces: pierces.slice(pierce) };
  return { legs, tail, missed: places.flatMap((_, i) => (found.has(i) ? [] : [i])) };
}

/** The box around puffs, m. */
export function puffsBox(puffs: HeatPuffs): Box {
  let box = emptyBox;
  for (let i = 0; i < puffs.length; i += 5) {
    const [x, y] = [puffs[i] ?? 0, puffs[i + 1] ?? 0];
    box = boxUnion(box, { minX: x, minY: y, maxX: x, maxY: y });
  }
  return box;
}

/** Rounding of times that were added up, s. */
const tick = 1e-9;

/** From which piece on the pieces join without a gap in time and place, up to the last. */
function firstOfOwn(pieces: readonly HeatedPiece[]): number {
  for (let i = pieces.length - 1; i > 0; i--) {
    const [before, after] = [pieces[i - 1], pieces[i]];
    if (!before || !after || !follows(before, after)) return i;
  }
  return 0;
}

const follows = (a: HeatedPiece, b: HeatedPiece): boolean =>
  b.from - a.to <= tick && pointDistance(segmentEnd(a.segment), segmentStart(b.segment)) < samePlace;

type OnPath = { readonly corner: number; readonly segment: number; readonly share: number };

/** Where corners of a contour lie on the segments of its run: so many whole ones and a share of the next. Those beside the path are left out. */
function onPath(segments: readonly Segment[], corners: readonly number[], places: readonly CornerPlace[]): OnPath[] {
  const found: OnPath[] = [];
  let from = 0;
  for (const corner of corners) {
    const at = places[corner]?.at;
    if (!at) continue;
    const exact = endingIn(segments, at, from);
    if (exact >= 0) {
      from = exact + 1;
      found.push({ corner, segment: exact + 1, share: 0 });
      continue;
    }
    const near = nearest(segments, at);
    if (near) found.push({ corner, ...near });
  }
  return found;
}

/** The segment that ends in a place, looked for from one on and then from the first; −1 for none. */
function endingIn(segments: readonly Segment[], at: Point, from: number): number {
  const count = segments.length;
  for (let k = 0; k < count; k++) {
    const i = (from + k) % count;
    const segment = segments[i];
    if (segment && pointDistance(segmentEnd(segment), at) < samePlace) return i;
  }
  return -1;
}

function nearest(segments: readonly Segment[], at: Point): { readonly segment: number; readonly share: number } | null {
  let least = beside;
  let best = -1;
  segments.forEach((segment, i) => {
    const distance = segmentPointDistance(segment, at);
    if (distance >= least) return;
    least = distance;
    best = i;
  });
  const segment = segments[best];
  return segment ? { segment: best, share: shareAt(segment, at) } : null;
}
