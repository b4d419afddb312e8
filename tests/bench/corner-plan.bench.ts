import {
  area,
  EndType,
  FillRule,
  inflatePaths,
  intersect,
  isPositive,
  JoinType,
  pointInPolygon,
  PointInPolygonResult,
  type Path64,
  type Paths64,
} from 'clipper2-ts';
import Flatbush from 'flatbush';
import { contextOf, loopPlaces } from '../../strategy/corners/context.ts';
import type { Prospect } from '../../strategy/corners/case.ts';
import { prospectsOf } from '../../strategy/corners/prospects.ts';
import { fittingLoops, mostReach } from '../../strategy/corners/loop-option.ts';
import type { CornerPlanRequest } from '../../strategy/corners/index.ts';
import type { Box, Contour, Loop, Segment } from '../../strategy/path/index.ts';
import {
  boxGrow,
  contourBox,
  contourCorners,
  cornerOfPath,
  flatExtensions,
  flatLoopAt,
  loopAt,
  loopRadii,
  segmentBox,
  segmentLength,
  segmentPart,
  segmentPointAt,
} from '../../strategy/path/index.ts';
import { plateOfParts } from './corner-plate.ts';
import { sayLine, timeOf } from './line.ts';

const request = plateOfParts(200);
const { rules, cut, profile, plate } = request;
if (plate === null || !('min' in plate)) throw new Error('the plate is a rectangle');
const plateBox: Box = { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y };

/** What a corner gets: the radius of the tangent loop and the extension of the flat one that fit, m, 0 for none. */
type Answer = readonly [tangent: number, flat: number];

const tip = ({ convex }: { readonly convex: boolean }): boolean => convex;

/** Ours: the loops of each corner in the cut order, those placed in the way of the next. */
function ours(request: CornerPlanRequest): Answer[] {
  const { contours } = request;
  const prospects = contours.flatMap((contour) => prospectsOf(contour, request)).filter(({ corner }) => tip(corner));
  const places = loopPlaces(
    prospects.map(({ onPath, corner }) => ({ at: onPath.point, reach: mostReach(corner, request) })),
  );
  const context = contextOf(request, places.near);
  return prospects.map((prospect: Prospect, i): Answer => {
    const found = fittingLoops(prospect, context);
    if ('kind' in found) return [0, 0];
    const loop = found.tangent ?? found.flat;
    if (loop) places.put(i, { name: prospect.id, loop });
    return [found.tangent?.radius ?? 0, found.flat?.extension ?? 0];
  });
}

/** Whole units a metre for the polygon package: a hundredth of a micrometre. */
const scale = 1e8;
/** How far the peer's chords are off their arcs at most, m, and overlaps that are rounding, m². */
const chord = 2e-6;
const contact = 1e-11;

const half = cut.kerfWidth / 2;
const needed = half + rules.loop.clearance;
const slack = 0.98;

function flattened(path: readonly Segment[]): Path64 {
  return path.flatMap((segment) => {
    const steps =
      segment.kind === 'line'
        ? 1
        : Math.max(1, Math.ceil(Math.abs(segment.sweep) / (2 * Math.acos(1 - chord / segment.radius))));
    return Array.from({ length: steps + 1 }, (_, i) => {
      const { x, y } = segmentPointAt(segment, i / steps);
      return { x: Math.round(x * scale), y: Math.round(y * scale) };
    });
  });
}

const swept = (path: readonly Segment[], by: number): Paths64 =>
  inflatePaths([flattened(path)], by * scale, JoinType.Round, EndType.Round, 2, chord * scale);

function overlap(a: Paths64, b: Paths64): boolean {
  const common = intersect(a, b, FillRule.NonZero).reduce((sum, path) => sum + Math.abs(area(path)), 0);
  return common / scale ** 2 > contact;
}

type PeerPart = { readonly contour: Contour; readonly polygon: Path64; readonly box: Box };
type PeerLoop = { readonly band: Paths64; readonly box: Box };

/** The peer: swept loops against whole part polygons and against each other, found through an index of their boxes. */
function peer({ contours }: CornerPlanRequest): Answer[] {
  const parts = contours.map(({ contour }): PeerPart => {
    const polygon = flattened(contour.segments);
    return { contour, polygon: isPositive(polygon) ? polygon : polygon.reverse(), box: contourBox(contour) };
  });
  const index = new Flatbush(parts.length);
  for (const { box } of parts) index.add(box.minX, box.minY, box.maxX, box.maxY);
  index.finish();
  const corners = parts.flatMap((part, own) =>
    contourCorners(part.contour)
      .filter(tip)
      .map((corner) => ({ own, corner, onPath: { ...corner, point: cornerOfPath(corner, cut.kerfWidth) } })),
  );
  const bounds = { ...rules.loop, smallestArc: profile.smallestArc };
  const places = corners.map(({ corner, onPath }) => {
    const reach = mostReach(corner, request) + cut.kerfWidth + rules.loop.clearance;
    const { x, y } = onPath.point;
    return { minX: x - reach, minY: y - reach, maxX: x + reach, maxY: y + reach };
  });
  const near = new Flatbush(places.length);
  for (const box of places) near.add(box.minX, box.minY, box.maxX, box.maxY);
  near.finish();
  const placed = new Map<number, PeerLoop>();

  const fits = (loop: Loop, own: number, others: readonly PeerLoop[]): boolean => {
    const box = loop.segments.map(segmentBox).reduce((a, b) => ({
      minX: Math.min(a.minX, b.minX),
      minY: Math.min(a.minY, b.minY),
      maxX: Math.max(a.maxX, b.maxX),
      maxY: Math.max(a.maxY, b.maxY),
    }));
    const grown = boxGrow(box, needed - 1e-9);
    if (
      grown.minX < plateBox.minX ||
      grown.minY < plateBox.minY ||
      grown.maxX > plateBox.maxX ||
      grown.maxY > plateBox.maxY
    )
      return false;
    const wide = boxGrow(box, needed + cut.kerfWidth);
    const hits = index.search(wide.minX, wide.minY, wide.maxX, wide.maxY);
    const band = swept(loop.segments, needed + cut.kerfWidth);
    for (const i of hits) {
      const part = parts[i];
      if (!part) continue;
      if (i !== own) {
        if (overlap(band, [part.polygon])) return false;
        continue;
      }
      const { beside, rest } = piecesOf(loop);
      if (beside.some((segment) => overlap(swept([segment], half * slack), [part.polygon]))) return false;
      if (overlap(swept(rest, needed), [part.polygon])) return false;
    }
    const ownBand = swept(loop.segments, (cut.kerfWidth + rules.loop.clearance) / 2);
    return !others.some((other) => apartNot(other.box, wide) && overlap(other.band, ownBand));
  };

  return corners.map(({ own, corner, onPath }, n): Answer => {
    const { x, y } = onPath.point;
    const start = { x: Math.round(x * scale), y: Math.round(y * scale) };
    const inside = index
      .search(x, y, x, y)
      .filter((i) => pointInPolygon(start, parts[i]?.polygon ?? []) === PointInPolygonResult.IsInside);
    if (inside.length % 2 === 1) return [0, 0];
    const sizes = loopRadii(corner.angle, bounds);
    if (sizes.kind === 'none') return [0, 0];
    const box = places[n] ?? plateBox;
    const others = near
      .search(box.minX, box.minY, box.maxX, box.maxY, (i) => placed.has(i))
      .flatMap((i) => placed.get(i) ?? []);
    const radius = sizes.radii.find((size) => fits(loopAt(onPath, size), own, others)) ?? 0;
    let extension = 0;
    if (radius !== sizes.radii[0]) {
      const flats = flatExtensions(corner.angle, bounds);
      if (flats.kind === 'extensions')
        extension = flats.extensions.find((size) => fits(flatLoopAt(onPath, flats.radius, size), own, others)) ?? 0;
    }
    if (radius > 0 || extension > 0) {
      const loop = radius > 0 ? loopAt(onPath, radius) : flatLoopAt(onPath, profile.smallestArc, extension);
      const band = swept(loop.segments, (cut.kerfWidth + rules.loop.clearance) / 2);
      placed.set(n, { band, box });
    }
    return [radius, extension];
  });
}

const apartNot = (a: Box, b: Box): boolean =>
  a.minX <= b.maxX && b.minX <= a.maxX && a.minY <= b.maxY && b.minY <= a.maxY;

/** Beside its own corner a loop is as near to the part as its kerf is wide; the rest keeps the clearance. */
function piecesOf(loop: Loop): { readonly beside: readonly Segment[]; readonly rest: readonly Segment[] } {
  const { segments } = loop;
  const [out, back] = [segments[0], segments[segments.length - 1] ?? segments[0]];
  const turn = loop.shape === 'tangent' ? Math.abs(loop.segments[1].sweep) : 2 * Math.abs(loop.segments[1].sweep);
  const slope = turn - Math.PI > Math.PI / 2 ? Math.sin(turn - Math.PI) : 1;
  const share = Math.min(1, needed / slope / segmentLength(out));
  const far = segments.slice(1, -1);
  return {
    beside: [segmentPart(out, 0, share), segmentPart(back, 1 - share, 1)],
    rest: share < 1 ? [segmentPart(out, share, 1), ...far, segmentPart(back, 0, 1 - share)] : far,
  };
}

const alike = ([a, b]: Answer, [c, d]: Answer): boolean => Math.abs(a - c) < 1e-12 && Math.abs(b - d) < 1e-12;

/** Ours with a clearance that is larger or smaller by what the peer's chords and contacts take or give. */
const shifted = [-1, 1].map((sign) =>
  ours({
    ...request,
    rules: { ...rules, loop: { ...rules.loop, clearance: rules.loop.clearance + sign * 4 * chord } },
  }),
);
const mine = ours(request);
const theirs = peer(request);
const none: Answer = [NaN, NaN];
const otherwise = mine.flatMap((answer, i) => (alike(answer, theirs[i] ?? none) ? [] : [i]));
const wrong = otherwise.filter((i) => !shifted.some((answers) => alike(answers[i] ?? none, theirs[i] ?? none)));
if (mine.length !== theirs.length || wrong.length > 0)
  throw new Error(`${wrong.length} of ${mine.length} corners are answered otherwise by the peer`);
// the decision is one only when all ways out of it are taken
const counts = [
  mine.filter(([radius, extension]) => radius > 0 && extension === 0),
  mine.filter(([radius, extension]) => radius > 0 && extension > 0),
  mine.filter(([, extension]) => extension > 0),
  mine.filter(([radius, extension]) => radius === 0 && extension === 0),
].map(({ length }) => length);
if (counts.some((count) => count < 20)) throw new Error(`no mix of answers: ${counts.join(', ')}`);

const sum = (answers: readonly Answer[]) => answers.reduce((total, [a, b]) => total + a + b, 0);
const oursTime = timeOf(() => sum(ours(request)), { warmUp: 5, rounds: 9, calls: 3 });
const peerTime = timeOf(() => sum(peer(request)), { warmUp: 0, rounds: 3, calls: 1 });
sayLine({
  case: 'corner-plan',
  ours: oursTime,
  peer: peerTime,
  unit: 'ms',
  ratio: peerTime / oursTime,
  // share of corners that the peer answers otherwise, all within its chords' width of the clearance
  errorMean: otherwise.length / mine.length,
  errorMax: null,
  exponent: null,
});
