import Flatbush from 'flatbush';
import type { Contour } from '../contour.ts';
import { contourArea, segmentCrossesRay } from '../contour.ts';
import { segmentDistance, segmentNearestPoint, segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';
import { boxGrow, pointAdd, pointCross, pointDistance, pointDot, pointScale, pointSubtract } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentBox, segmentEnd, segmentLength, segmentPointAt, segmentStart, segmentTangentAt } from '../segment.ts';
import { largestCircleInside } from './inscribed.ts';
import type { OffsetLoop } from './offset.ts';
import { parallelOf } from './parallel.ts';
import type { SegmentIndex } from './segment-index.ts';
import { segmentIndex } from './segment-index.ts';

/** A whole hole, or a gap between two edges that face each other: its free width and where, m. */
type GapFeature = { readonly kind: 'hole' | 'gap'; readonly width: number; readonly at: Point };

/** An inside corner, or the end of a slot that narrows: where, and how far before it the cut ends, m. */
type EndFeature = { readonly kind: 'end'; readonly unreached: number; readonly at: Point };

/** A place of the scrap that the kerf does not fit into. */
export type NarrowFeature = GapFeature | EndFeature;

/** Narrower by less than this share is as wide as the kerf: the path closes all the same. */
const even = 1e-6;
/** A disc between two edges that face each other is this empty, or it lies in a corner. */
const emptiness = 1e-3;

/** Pairs of edges looked at for gaps at most: a contour with more of them so near to each other is nothing for this kerf anyway. */
const mostPairs = 4000;

/** An end that the cut comes nearer to than this many kerfs is like any inside corner, which the kerf rounds. */
const likeAnyCorner = 1;

/**
 * Where the scrap beside a contour is no wider than the kerf (m): the narrowest place of each gap, and ends that the cut does not reach. `loops` is the contour's
 * path at half the kerf. A gap is found by discs that touch both its edges across; an end by its distance from the path.
 */
export function narrowFeatures(contour: Contour, kerfWidth: number, loops: readonly OffsetLoop[]): NarrowFeature[] {
  const { segments } = contour;
  const area = contourArea(contour);
  if (loops.length === 0 && area < 0) {
    const widest = largestCircleInside(contour, 1e-2 * kerfWidth);
    return [{ kind: 'hole', width: 2 * widest.radius, at: widest.centre }];
  }
  const gaps = gapsBetween(segments, kerfWidth, scrapBeside(segments, area > 0), cutShort(segments, kerfWidth, loops));
  const inGap = new Set(gaps.flatMap(({ edges }) => edges));
  const n = segments.length;
  const path = segmentIndex(loops.flatMap((loop) => loop.contour.segments.map((segment) => ({ segment, of: null }))));
  const ends: { readonly feature: EndFeature; readonly edges: readonly number[] }[] = [];
  for (const { edges, corner } of [...lostRuns(n, loops), ...sharpNotches(segments)]) {
    const beside = [((edges[0] ?? 0) + n - 1) % n, ...edges, ((edges.at(-1) ?? 0) + 1) % n];
    if (beside.some((i) => inGap.has(i))) continue;
    const at = corner ?? middleOf(edges, segments);
    if (!at) continue;
    const unreached = distanceFrom(path, at) - kerfWidth / 2;
    // the corners of an end that is known say nothing new
    if (unreached <= likeAnyCorner * kerfWidth || ends.some((end) => end.edges.some((i) => edges.includes(i))))
      continue;
    ends.push({ feature: { kind: 'end', unreached, at }, edges });
  }
  return [...gaps, ...ends].map(({ feature }) => feature);
}

/** Edges that may form an end, in order; with a corner that is one by itself, the two beside it. */
type End = { readonly edges: readonly number[]; readonly corner?: Point };

function middleOf(edges: readonly number[], segments: readonly Segment[]): Point | null {
  const lengths = edges.map((i) => {
    const segment = segments[i];
    return segment ? segmentLength(segment) : 0;
  });
  let rest = lengths.reduce((sum, length) => sum + length, 0) / 2;
  for (const [k, i] of edges.entries()) {
    const [segment, length] = [segments[i], lengths[k] ?? 0];
    if (segment && rest <= length) return segmentPointAt(segment, length > 0 ? rest / length : 0);
    rest -= length;
  }
  return null;
}

function distanceFrom(path: SegmentIndex<null>, p: Point): number {
  return path.items.reduce((least, { segment }) => Math.min(least, segmentPointDistance(segment, p)), Infinity);
}

type Scrap = {
  /** Whether the contour keeps `reach` m away from a place. */
  readonly clear: (place: Point, reach: number) => boolean;
  readonly holds: (place: Point) => boolean;
  readonly near: (segment: Segment, reach: number) => number[];
};

function scrapBeside(segments: readonly Segment[], partIsInside: boolean): Scrap {
  const index = new Flatbush(segments.length);
  for (const segment of segments) {
    const box = segmentBox(segment);
    index.add(box.minX, box.minY, box.maxX, box.maxY);
  }
  index.finish();
  const starts = segments.map(segmentStart);
  return {
    clear: (place, reach) => {
      const { x, y } = place;
      return !index.search(x - reach, y - reach, x + reach, y + reach).some((i) => {
        const segment = segments[i];
        return segment !== undefined && segmentPointDistance(segment, place) < reach;
      });
    },
    holds: (place) => {
      let inside = false;
      const slack = 1e-9;
      for (const i of index.search(place.x, place.y - slack, Infinity, place.y + slack)) {
        const segment = segments[i];
        const to = starts[(i + 1) % starts.length];
        if (segment && to && segmentCrossesRay(segment, to, place)) inside = !inside;
      }
      return inside !== partIsInside;
    },
    near: (segment, reach) => {
      const box = boxGrow(segmentBox(segment), reach);
      return index.search(box.minX, box.minY, box.maxX, box.maxY);
    },
  };
}

/** Whether the path beside an edge is shorter than its parallel: no edge of a gap has all of it. */
function cutShort(
  segments: readonly Segment[],
  kerfWidth: number,
  loops: readonly OffsetLoop[],
): (edge: number) => boolean {
  const kept = new Float64Array(segments.length);
  for (const { contour, sources } of loops) {
    sources.forEach(({ kind, index }, i) => {
      const segment = contour.segments[i];
      if (kind === 'edge' && segment) kept[index] = (kept[index] ?? 0) + segmentLength(segment);
    });
  }
  return (edge) => {
    const segment = segments[edge];
    const parallel = segment ? parallelOf(segment, kerfWidth / 2) : null;
    return !parallel || (kept[edge] ?? 0) < segmentLength(parallel) - even * kerfWidth;
  };
}

/** Two edges that face each other, and how far from all their ends the place is where they do, m. */
type Facing = { readonly i: number; readonly k: number; readonly feature: GapFeature; readonly fromEnds: number };

const fromEnds = (p: Point, a: Segment, b: Segment): number =>
  Math.min(...[a, b].flatMap((s) => [pointDistance(segmentStart(s), p), pointDistance(segmentEnd(s), p)]));

type Gap = { readonly feature: GapFeature; readonly edges: number[] };

/** Gaps across the scrap between edges that are not neighbours; along a slot of many pieces only its narrowest place. */
function gapsBetween(
  segments: readonly Segment[],
  kerfWidth: number,
  scrap: Scrap,
  isCutShort: (edge: number) => boolean,
): Gap[] {
  const n = segments.length;
  const most = kerfWidth * (1 + even);
  let pairs = 0;
  const found = new Map<string, Facing>();
  segments.forEach((a, i) => {
    if (!isCutShort(i)) return;
    for (const k of scrap.near(a, most)) {
      const b = segments[k];
      if (!b || k <= i || k - i === 1 || k - i === n - 1 || !isCutShort(k)) continue;
      if (++pairs > mostPairs) return;
      let feature: GapFeature | null = null;
      for (const [p, q] of facing(a, b)) {
        const width = pointDistance(p, q);
        if (!(width > 0 && width <= most) || width >= (feature?.width ?? Infinity) * (1 - even)) continue;
        const at = { x: (p.x + q.x) / 2, y: (p.y + q.y) / 2 };
        if (!scrap.clear(at, (width / 2) * (1 - emptiness)) || !scrap.holds(at)) continue;
        feature = { kind: 'gap', width, at };
      }
      if (feature) found.set(`${i} ${k}`, { i, k, feature, fromEnds: fromEnds(feature.at, a, b) });
    }
  });
  const gaps: Gap[] = [];
  const seen = new Set<string>();
  for (const [key, start] of found) {
    if (seen.has(key)) continue;
    seen.add(key);
    const open = [start];
    let { feature, fromEnds: furthest } = start;
    const edges: number[] = [];
    for (let at = open.pop(); at; at = open.pop()) {
      // in the middle of the walls rather than between the corners at their mouth
      const narrower = at.feature.width - feature.width;
      const within = even * feature.width;
      if (narrower < -within || (narrower < within && at.fromEnds > furthest)) {
        ({ feature, fromEnds: furthest } = at);
      }
      edges.push(at.i, at.k);
      for (const di of [-1, 0, 1]) {
        for (const dk of [-1, 0, 1]) {
          const [i, k] = [(at.i + di + n) % n, (at.k + dk + n) % n];
          const next = `${Math.min(i, k)} ${Math.max(i, k)}`;
          const one = found.get(next);
          if (!one || seen.has(next)) continue;
          seen.add(next);
          open.push(one);
        }
      }
    }
    gaps.push({ feature, edges });
  }
  return gaps;
}

/** Pairs of places at which two edges may face each other: the middle of where parallel lines overlap, what lies across their middles, their nearest places. */
function* facing(a: Segment, b: Segment): Generator<readonly [Point, Point]> {
  if (a.kind === 'line' && b.kind === 'line') {
    const along = segmentTangentAt(a, 0);
    if (Math.abs(pointCross(along, segmentTangentAt(b, 0))) < 1e-3) {
      const shares = [b.start, b.end].map((p) => pointDot(pointSubtract(p, a.start), along));
      const low = Math.max(0, Math.min(...shares));
      const high = Math.min(segmentLength(a), Math.max(...shares));
      if (high > low) {
        const p = pointAdd(a.start, pointScale(along, (low + high) / 2));
        yield [p, segmentNearestPoint(b, p)];
      }
    }
  }
  const [p, q] = [segmentPointAt(a, 0.5), segmentPointAt(b, 0.5)];
  yield [p, segmentNearestPoint(b, p)];
  yield [segmentNearestPoint(a, q), q];
  const nearest = segmentDistance(a, b);
  yield [nearest.onFirst, nearest.onSecond];
}

/** Runs of neighbouring edges that have no path beside them. */
function lostRuns(n: number, loops: readonly OffsetLoop[]): End[] {
  const kept = new Set(loops.flatMap(({ sources }) => sources.flatMap((s) => (s.kind === 'edge' ? [s.index] : []))));
  if (kept.size === 0) return [];
  const first = Math.min(...kept);
  const runs: number[][] = [];
  for (let k = 1; k <= n; k++) {
    const i = (first + k) % n;
    if (kept.has(i)) continue;
    const last = runs.at(-1);
    if (last && last.at(-1) === (i + n - 1) % n) last.push(i);
    else runs.push([i]);
  }
  return runs.map((edges) => ({ edges }));
}

/** Inside corners so sharp that the path ends more than a kerf before them. */
function sharpNotches(segments: readonly Segment[]): End[] {
  const n = segments.length;
  return segments.flatMap((after, i): End[] => {
    const before = segments[(i + n - 1) % n];
    if (!before || n < 2) return [];
    const [u, w] = [segmentTangentAt(before, 1), segmentTangentAt(after, 0)];
    const turn = Math.atan2(pointCross(u, w), pointDot(u, w));
    // free angle between the edges is π + turn; its bisector meets the path at (kerf/2)/sin of half of that
    const far = turn < 0 && 1 / Math.sin((Math.PI + turn) / 2) > 1 + 2 * likeAnyCorner;
    return far ? [{ edges: [(i + n - 1) % n, i], corner: segmentStart(after) }] : [];
  });
}
