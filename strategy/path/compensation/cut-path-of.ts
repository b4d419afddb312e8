import type { Contour } from '../contour.ts';
import { contourArea } from '../contour.ts';
import { contourCorners, cornerWait } from '../corner.ts';
import type { CutEase, CutPath, CutPiece, CutRun } from '../cut-path.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentEnd, segmentLength, segmentPart, segmentStart } from '../segment.ts';
import { besidePlate } from './beside-plate.ts';
import type { LeadIn } from './lead-in.ts';
import type { EaseStretch } from './eased-along.ts';
import { easedAbout, easedAlong } from './eased-along.ts';
import { narrowFeatures } from './narrow.ts';
import { gapsBetweenContours, narrowSentence } from './narrow-said.ts';
import type { OffsetLoop } from './offset.ts';
import { offsetLoops } from './offset.ts';
import type { OutsideCorner } from './parallel.ts';
import type { CutPlate, LeadInRule, StartPath } from './pierce-place.ts';
import { piercePlace } from './pierce-place.ts';
import { segmentIndex } from './segment-index.ts';
import { shareAt } from './share.ts';

/** A finished contour as it lies on the plate, the part on the left of travel. */
export type CutContour = {
  readonly id: string;
  /** How a sentence calls it: "hole 3 of bracket 2". */
  readonly name: string;
  readonly contour: Contour;
  readonly role: 'outer' | 'hole' | 'island';
  /** Id of the contour around it within its part. */
  readonly parent: string | null;
};

/** What a corner of a contour gets: pieces of path put in, a wait, or a stretch of its path eased. The corner stands at the start of the contour's segment `index`. */
export type CornerInsert = {
  readonly contourId: string;
  readonly index: number;
  /** How a sentence calls it: "the loop of corner c1-4". */
  readonly name: string;
} & (
  | {
      readonly kind: 'path';
      /** A loop begins and ends in the path's corner; a round ends farther along than it begins, and replaces what lies between. */
      readonly as: 'loop' | 'contour';
      readonly segments: readonly Segment[];
    }
  /** The wait, s, with the beam off: in the path's corner when no other place of the path is given. */
  | { readonly kind: 'dwell'; readonly duration: number; readonly at?: Point }
  | ({ readonly kind: 'ease' } & EaseStretch)
);

export type CutPathRequest = {
  /** In the order of cutting; what lies inside a contour is brought before it. */
  readonly contours: readonly CutContour[];
  readonly inserts: readonly CornerInsert[];
  readonly kerfWidth: number; // m
  /** How the path goes round corners without an insert. */
  readonly outside: OutsideCorner;
  readonly leadIn: LeadInRule;
  /** What there is to cut from, m, or null when nothing need keep to it. */
  readonly plate: CutPlate | null;
  /** Cut this far past the start again, m; 0 ends where it began. */
  readonly overcut?: number;
  /** Where the programmer wants a contour's cut to begin, m, by contour id. */
  readonly starts?: Readonly<Record<string, Point>>;
};

/** Something the programmer must look at; a contour that can't be cut is left out of the path. */
export type CutPathProblem = {
  readonly contourId: string;
  /**
   * The scrap is narrower than the kerf, or the contour crosses itself; a treatment has no path; no room for a pierce; a lead-in shorter than needed; the path
   * runs outside the plate, which is cut all the same: on a remnant an edge may be meant to.
   */
  readonly kind: 'narrow' | 'corner' | 'pierce' | 'lead-in' | 'plate';
  readonly at: Point; // m
  readonly why: string;
  /** Whether the contour is left out of the path for it. */
  readonly leftOut: boolean;
};

export type CutPathPlan = { readonly path: CutPath; readonly problems: readonly CutPathProblem[] };

/** The path round a contour: segments as they are cut, what they are, and the waits after them. */
type Ring = {
  readonly segments: readonly Segment[];
  /** For each segment the insert it belongs to, or null for the contour's own. */
  readonly inserts: readonly (CornerInsert | null)[];
  /** For each segment what it is eased to, or null. */
  readonly eases: readonly (CutEase | null)[];
  /** Seconds waited at the end of a segment, by its place. */
  readonly dwells: ReadonlyMap<number, number>;
};

/** An insert must begin and end this near to the path, m: it is computed from the same corner. */
const onPath = 1e-7;

/**
 * All that is cut on a plate, in order: each contour's path at half a kerf from the finished edge with its lead-in and what its corners get. The pieces of a run join
 * within rounding. With it, what could not be done as asked, each with its place: features narrower than the kerf, corners whose treatment found no
 * path, contours without room for a pierce, paths that leave the plate. Throws RangeError for a kerf width or a lead-in that is not positive, an overcut below 0 and a
 * contour that is open or without area.
 */
export function cutPathOf(request: CutPathRequest): CutPathPlan {
  const { kerfWidth, leadIn: rule, plate, overcut = 0, starts } = request;
  if (!(kerfWidth > 0)) throw new RangeError(`kerf width ${kerfWidth} m is outside (0, ∞)`);
  if (!(overcut >= 0)) throw new RangeError(`overcut ${overcut} m is below 0`);
  const problems: CutPathProblem[] = [];
  const contours = insideFirst(request.contours);
  const rings = contours.flatMap((contour) => ringsOf(contour, request, problems));
  const edges = segmentIndex(
    contours.flatMap(({ id, name, contour }) =>
      contour.segments.map((segment) => ({ segment, of: { contourId: id, name } })),
    ),
  );
  problems.push(...gapsBetweenContours(contours, edges, kerfWidth), ...besidePlate(contours, plate, kerfWidth));
  const loops = segmentIndex(
    rings.flatMap(({ ring }) =>
      ring.segments.flatMap((segment, i) => {
        const insert = ring.inserts[i];
        return insert?.kind === 'path' && insert.as === 'loop' ? [{ segment, of: insert.name }] : [];
      }),
    ),
  );
  const leadIns: { name: string; leadIn: LeadIn }[] = [];
  const runs: CutRun[] = [];
  for (const { contour, ring, name, closedIn } of rings) {
    const near = starts?.[contour.id];
    const path: StartPath = {
      contourId: contour.id,
      name,
      segments: ring.segments,
      free: (i) => ring.inserts[i] === null,
      busyJoints: busyJoints(ring),
      closedIn,
      ...(near ? { near } : {}),
    };
    const around = { kerfWidth, plate, edges, loops, leadIns };
    // where the feed changes only if there is room nowhere else
    const atFullFeed = (i: number): boolean => path.free(i) && ring.eases[i] === null;
    const first = ring.eases.some((ease) => ease) ? piercePlace({ ...path, free: atFullFeed }, rule, around) : null;
    const place = first?.kind === 'place' ? first : piercePlace(path, rule, around);
    if (place.kind === 'none') {
      problems.push({ contourId: contour.id, kind: 'pierce', at: place.at, why: place.why, leftOut: true });
      continue;
    }
    const { leadIn, shortened } = place;
    if (shortened) {
      problems.push({ contourId: contour.id, kind: 'lead-in', at: leadIn.pierce, why: shortened, leftOut: false });
    }
    leadIns.push({ name, leadIn });
    runs.push({
      contourId: contour.id,
      name,
      pierce: leadIn.pierce,
      pieces: [
        { kind: 'lead-in', segments: leadIn.segments },
        ...piecesFrom(ring, place.segment, place.share, overcut),
      ],
    });
  }
  return { path: { runs }, problems };
}

/** Whatever lies inside a contour before it, otherwise in the order given. */
function insideFirst(contours: readonly CutContour[]): CutContour[] {
  const within = new Map<string, CutContour[]>();
  for (const contour of contours) {
    if (contour.parent === null) continue;
    within.set(contour.parent, [...(within.get(contour.parent) ?? []), contour]);
  }
  const order = new Set<CutContour>();
  const asked = new Set<CutContour>();
  const take = (contour: CutContour): void => {
    if (asked.has(contour)) return;
    asked.add(contour);
    for (const inner of within.get(contour.id) ?? []) take(inner);
    order.add(contour);
  };
  contours.forEach(take);
  return [...order];
}

type NamedRing = {
  readonly contour: CutContour;
  readonly ring: Ring;
  readonly name: string;
  readonly closedIn: boolean;
};

function ringsOf(contour: CutContour, request: CutPathRequest, problems: CutPathProblem[]): NamedRing[] {
  const { kerfWidth, outside } = request;
  const own = request.inserts.filter(({ contourId }) => contourId === contour.id);
  const sharpAt = new Set(own.map(({ index }) => index));
  const loops = offsetLoops(contour.contour, kerfWidth / 2, { outside, sharpAt });
  if (loops === null) {
    problems.push({
      contourId: contour.id,
      kind: 'narrow',
      at: segmentStart(contour.contour.segments[0] ?? never()),
      why: `${contour.name} crosses itself: no path closes beside it`,
      leftOut: true,
    });
    return [];
  }
  for (const feature of narrowFeatures(contour.contour, kerfWidth, loops)) {
    const why = narrowSentence(contour.name, feature, kerfWidth);
    problems.push({ contourId: contour.id, kind: 'narrow', at: feature.at, why, leftOut: feature.kind === 'hole' });
  }
  const placed = new Set<CornerInsert>();
  const rings = loops.map((loop): Omit<NamedRing, 'name'> => ({
    contour,
    ring: ringOf(contour, loop, own, kerfWidth, placed),
    // the scrap lies within: a hole, or what a neck shuts off outside an outline
    closedIn: contourArea(loop.contour) < 0,
  }));
  for (const insert of loops.length > 0 ? own : []) {
    if (placed.has(insert)) continue;
    problems.push({
      contourId: contour.id,
      kind: 'corner',
      at: segmentStart(contour.contour.segments[insert.index] ?? contour.contour.segments[0] ?? never()),
      why: `${insert.name} is left out: the path of ${contour.name} does not come there`,
      leftOut: false,
    });
  }
  // what a neck shuts off is cut before what lies around it
  return rings
    .sort((a, b) => Number(b.closedIn) - Number(a.closedIn))
    .map((ring, i) => ({
      ...ring,
      name: rings.length > 1 ? `${contour.name}, piece ${i + 1} of ${rings.length}` : contour.name,
    }));
}

function never(): never {
  throw new RangeError('a contour without segments can not be cut');
}

/** The loop's segments with the inserts of its corners; those that found their place are added to `placed`. */
function ringOf(
  { contour }: CutContour,
  loop: OffsetLoop,
  inserts: readonly CornerInsert[],
  kerfWidth: number,
  placed: Set<CornerInsert>,
): Ring {
  const corners = new Map(contourCorners(contour).map((corner) => [corner.index, corner]));
  let segments: readonly RingItem[] = loop.contour.segments.map((segment) => ({
    segment,
    insert: null,
    ease: null,
    dwell: 0,
  }));
  // what is eased lies between what is put in
  const inOrder = [...inserts].sort((a, b) => Number(a.kind === 'ease') - Number(b.kind === 'ease'));
  for (const insert of inOrder) {
    const corner = corners.get(insert.index);
    const expected = corner?.convex ? cornerWait(corner, kerfWidth) : null;
    if (insert.kind === 'ease') {
      const eased =
        easedAlong(segments, insert, onPath) ?? (expected && easedAbout(segments, expected, insert, onPath));
      if (!eased) continue;
      placed.add(insert);
      segments = eased;
      continue;
    }
    const [from, to] =
      insert.kind === 'path'
        ? [segmentStart(insert.segments[0] ?? never()), segmentEnd(insert.segments.at(-1) ?? never())]
        : [insert.at ?? expected, insert.at ?? expected];
    if (!from || !to) continue;
    const changed =
      insert.kind === 'dwell' ? withDwell(segments, insert.duration, from) : withInsert(segments, insert, from, to);
    if (!changed) continue;
    placed.add(insert);
    segments = changed;
  }
  return {
    segments: segments.map(({ segment }) => segment),
    inserts: segments.map(({ insert }) => insert),
    eases: segments.map(({ ease }) => ease),
    dwells: new Map(segments.flatMap(({ dwell }, i) => (dwell > 0 ? [[i, dwell] as const] : []))),
  };
}

type PathInsert = Extract<CornerInsert, { kind: 'path' }>;

type RingItem = {
  readonly segment: Segment;
  readonly insert: CornerInsert | null;
  readonly ease: CutEase | null;
  readonly dwell: number;
};

/** The ring with a wait at a place of it, its end or in the middle of a segment; null when the place is not on it. */
function withDwell(ring: readonly RingItem[], duration: number, at: Point): RingItem[] | null {
  const i = ring.findIndex(
    ({ segment }) => segmentPointDistance(segment, at) <= onPath && pointDistance(segmentStart(segment), at) > onPath,
  );
  const item = ring[i];
  if (!item) return null;
  const share = pointDistance(segmentEnd(item.segment), at) <= onPath ? 1 : shareAt(item.segment, at);
  const waiting: RingItem = {
    ...item,
    segment: share < 1 ? segmentPart(item.segment, 0, share) : item.segment,
    dwell: item.dwell > 0 && share === 1 ? item.dwell + duration : duration,
  };
  const rest: RingItem[] = share < 1 ? [{ ...item, segment: segmentPart(item.segment, share, 1) }] : [];
  return [...ring.slice(0, i), waiting, ...rest, ...ring.slice(i + 1)];
}

/** The ring with an insert that leaves it at `from` and comes back at `to`, a little further on or the same place; null when they are not on it. */
function withInsert(ring: readonly RingItem[], insert: PathInsert, from: Point, to: Point): RingItem[] | null {
  const n = ring.length;
  const holds = (item: RingItem | undefined, p: Point): boolean =>
    item !== undefined && item.insert === null && segmentPointDistance(item.segment, p) <= onPath;
  // the last segment that reaches `from` and the first after it that `to` lies on
  for (let i = 0; i < n; i++) {
    const before = ring[i];
    if (!before || !holds(before, from)) continue;
    const leaves = shareAt(before.segment, from);
    if (pointDistance(segmentStart(before.segment), from) <= onPath) continue;
    for (let skip = 1; skip <= Math.min(n, 8); skip++) {
      const k = (i + skip) % n;
      const after = ring[k];
      if (!after || after.insert !== null) break;
      if (!holds(after, to) || pointDistance(segmentEnd(after.segment), to) <= onPath) continue;
      return spliced(ring, i, leaves, k, shareAt(after.segment, to), insert);
    }
  }
  return null;
}

function spliced(
  ring: readonly RingItem[],
  i: number,
  leaves: number,
  k: number,
  comes: number,
  insert: PathInsert,
): RingItem[] | null {
  const [before, after] = [ring[i], ring[k]];
  if (!before || !after) return null;
  const n = ring.length;
  const head: RingItem = {
    ...before,
    segment: leaves >= 1 - 1e-12 ? before.segment : segmentPart(before.segment, 0, leaves),
    dwell: 0,
  };
  const put = insert.segments.map((segment): RingItem => ({ segment, insert, ease: null, dwell: 0 }));
  const tail: RingItem = {
    ...after,
    segment: comes <= 1e-12 ? after.segment : segmentPart(after.segment, comes, 1),
  };
  if (i === k) {
    // one segment all round, as a drop's arc: it starts behind the insert and ends before it
    return null;
  }
  // from behind the insert round to before it
  const rest: RingItem[] = [];
  for (let at = (k + 1) % n; at !== i; at = (at + 1) % n) {
    const item = ring[at];
    if (item) rest.push(item);
  }
  return [tail, ...rest, head, ...put];
}

/** Joints where a start would be in the way: where a wait is, and where an insert begins or ends. */
function busyJoints({ segments, inserts, dwells }: Ring): Set<number> {
  const busy = new Set(dwells.keys());
  segments.forEach((_, i) => {
    if (inserts[i] !== inserts[(i + 1) % segments.length]) busy.add(i);
  });
  return busy;
}

/** The ring from a place on it round to the same place, and `overcut` m further, as pieces of a cut. */
function piecesFrom(ring: Ring, start: number, share: number, overcut: number): CutPiece[] {
  const n = ring.segments.length;
  const pieces: CutPiece[] = [];
  const open: ({ readonly kind: 'contour' | 'loop'; readonly segments: Segment[] } & Partial<CutEase>)[] = [];
  const add = (kind: 'contour' | 'loop', segment: Segment, ease: CutEase | null): void => {
    const last = open.at(-1);
    if (last && last === pieces.at(-1) && last.kind === kind && sameEase(last, ease)) last.segments.push(segment);
    else {
      const piece = { kind, segments: [segment], ...ease };
      open.push(piece);
      pieces.push(piece);
    }
  };
  const kindOf = (i: number): 'contour' | 'loop' => {
    const insert = ring.inserts[i];
    return insert?.kind === 'path' && insert.as === 'loop' ? 'loop' : 'contour';
  };
  const waitAfter = (i: number): void => {
    const duration = ring.dwells.get(i);
    const segment = ring.segments[i];
    if (duration !== undefined && segment) pieces.push({ kind: 'dwell', at: segmentEnd(segment), duration });
  };
  const first = ring.segments[start];
  if (!first) return [];
  const firstEase = ring.eases[start] ?? null;
  add('contour', segmentPart(first, share, 1), firstEase);
  waitAfter(start);
  for (let k = 1; k < n; k++) {
    const i = (start + k) % n;
    const segment = ring.segments[i];
    if (!segment) continue;
    add(kindOf(i), segment, ring.eases[i] ?? null);
    waitAfter(i);
  }
  add('contour', segmentPart(first, 0, share), firstEase);
  // past the start as far as asked, but not into the next corner
  const rest = (1 - share) * segmentLength(first);
  if (overcut > 0) {
    add('contour', segmentPart(first, share, share + (1 - share) * Math.min(1, overcut / rest)), firstEase);
  }
  return pieces;
}

const sameEase = (a: Partial<CutEase>, b: CutEase | null): boolean =>
  a.feedShare === b?.feedShare && a.powerShare === b?.powerShare;
