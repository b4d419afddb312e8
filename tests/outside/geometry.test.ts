import {
  contourOffset,
  kerfOffset,
  largestCircleInside,
  narrowFeatures,
} from '../../strategy/path/compensation/index.ts';
import type { Contour, Point } from '../../strategy/path/index.ts';
import {
  circleOf,
  contourArea,
  contourLength,
  contourReverse,
  cornerOfPath,
  contourCorners,
  pointDistance,
  segmentFromBulge,
  segmentPointDistance,
  segmentStart,
} from '../../strategy/path/index.ts';
import type { OutsideCheck } from './check.ts';
import { outsideChecks } from './check.ts';

const FORMULA = 'computed from a published formula' as const;
const STEINER =
  "Steiner's formula for parallel bodies of convex sets: A + L·d + π·d², L + 2π·d; Schneider, Convex Bodies, 4.2 (from memory)";
const GREEN = "Green's theorem on lines and arcs";
const APOLLONIUS = 'plane geometry: two lines and a circle that touches both';

const contour = (points: readonly Point[], bulges: readonly number[] = []): Contour => ({
  segments: points.map((p, i) => segmentFromBulge(p, points[(i + 1) % points.length] ?? p, bulges[i] ?? 0)),
});
const regular = (sides: number, side: number): Contour => {
  const radius = side / 2 / Math.sin(Math.PI / sides);
  return contour(
    Array.from({ length: sides }, (_, i) => ({
      x: radius * Math.cos((2 * Math.PI * i) / sides),
      y: radius * Math.sin((2 * Math.PI * i) / sides),
    })),
  );
};
const areaOf = (found: readonly { readonly contour: Contour }[]) =>
  found.reduce((sum, one) => sum + contourArea(one.contour), 0);
const lengthOf = (found: readonly { readonly contour: Contour }[]) =>
  found.reduce((sum, one) => sum + contourLength(one.contour), 0);
const round = { outside: { kind: 'arc' } } as const;
const sharp = { outside: { kind: 'sharp', limit: 20 } } as const;
const mm = 1e-3;

const value = (
  id: string,
  what: string,
  unit: string,
  got: () => number,
  expected: number,
  tolerance: OutsideCheck['tolerance'],
  source: string,
): OutsideCheck => ({ id: `offset-${id}`, what, unit, got, expected, tolerance, source, standing: FORMULA });

// side 100 mm, 2 mm outside; values by hand with a desk calculator's π
const POLYGONS = [
  [3, 4330.127018922193, 300],
  [4, 10000, 400],
  [6, 25980.76211353316, 600],
] as const;

outsideChecks('paths beside convex contours', [
  ...POLYGONS.flatMap(([sides, area, length]): OutsideCheck[] => {
    const path = () => contourOffset(regular(sides, 100 * mm), 2 * mm, round);
    return [
      value(
        `steiner-area-${sides}`,
        `area within the path 2 mm round a regular figure of ${sides} sides of 100 mm`,
        'mm²',
        () => areaOf(path()) * 1e6,
        area + 2 * length + 12.566370614359172,
        { rel: 1e-12 },
        STEINER,
      ),
      value(
        `steiner-length-${sides}`,
        `length of that path with ${sides} sides`,
        'mm',
        () => lengthOf(path()) * 1e3,
        length + 12.566370614359172,
        { rel: 1e-12 },
        STEINER,
      ),
      value(
        `sharp-area-${sides}`,
        `area with sharp corners: A + L·d + n·d²·tan(π/n), ${sides} sides`,
        'mm²',
        () => areaOf(contourOffset(regular(sides, 100 * mm), 2 * mm, sharp)) * 1e6,
        area + 2 * length + { 3: 20.784609690826528, 4: 16, 6: 13.856406460551018 }[sides],
        { rel: 1e-12 },
        'plane geometry of similar figures',
      ),
    ];
  }),
  // two half circles of 20 mm and two straights of 50 mm: a slotted hole; 0.8 mm inside it
  value(
    'slotted-hole',
    'area within the path 0.8 mm inside a slotted hole of 20 mm radius and 50 mm straights',
    'mm²',
    () => {
      const hole = contour(
        [
          { x: 0, y: -20 * mm },
          { x: 50 * mm, y: -20 * mm },
          { x: 50 * mm, y: 20 * mm },
          { x: 0, y: 20 * mm },
        ],
        [0, 1, 0, 1],
      );
      return -areaOf(kerfOffset(contourReverse(hole), 1.6 * mm, sharp)) * 1e6;
    },
    Math.PI * 19.2 * 19.2 + 50 * 38.4,
    { rel: 1e-12 },
    GREEN,
  ),
  value(
    'inside-arc',
    'radius of the path 0.8 mm inside an inside rounding of 5 mm',
    'mm',
    () => {
      const t = -Math.tan(Math.PI / 8);
      const angle = contour(
        [
          { x: 0, y: 0 },
          { x: 0.1, y: 0 },
          { x: 0.1, y: 0.05 },
          { x: 0.055, y: 0.05 },
          { x: 0.05, y: 0.055 },
          { x: 0.05, y: 0.1 },
          { x: 0, y: 0.1 },
        ],
        [0, 0, 0, t],
      );
      const [path] = kerfOffset(angle, 1.6 * mm, sharp);
      const arc = path?.contour.segments.find((s) => s.kind === 'arc');
      return arc?.kind === 'arc' ? arc.radius * 1e3 : Number.NaN;
    },
    4.2,
    { abs: 1e-9 },
    APOLLONIUS,
  ),
]);

outsideChecks(
  'corners of the path',
  (
    [
      [30, 3.0909626441],
      [60, 1.6],
      [90, 1.1313708499],
      [120, 0.9237604307],
    ] as const
  ).map(([degrees, expected]): OutsideCheck => {
    const angle = (degrees * Math.PI) / 180;
    const tip = contour([
      { x: 0, y: 0 },
      { x: 0.1, y: 0 },
      { x: 0.1 + 0.05 * Math.cos(Math.PI - angle), y: 0.05 * Math.sin(Math.PI - angle) },
    ]);
    return value(
      `tip-${degrees}`,
      `distance of the path's corner from a finished tip of ${degrees}° with a kerf of 1.6 mm: (kerf/2)/sin(β/2)`,
      'mm',
      () => {
        const [path] = kerfOffset(tip, 1.6 * mm, sharp);
        const corner = contourCorners(tip, 0.1, 0).find(({ index }) => index === 1);
        if (!path || !corner) return Number.NaN;
        const expectedAt = cornerOfPath(corner, 1.6 * mm);
        const starts = path.contour.segments.map(segmentStart);
        const at = starts.reduce((a, b) => (pointDistance(b, expectedAt) < pointDistance(a, expectedAt) ? b : a));
        return pointDistance(at, corner.point) * 1e3;
      },
      expected,
      { abs: 1e-9 },
      APOLLONIUS,
    );
  }),
);

const triangle = contour([
  { x: 0, y: 0 },
  { x: 40 * mm, y: 0 },
  { x: 0, y: 30 * mm },
]);

outsideChecks('widths of scrap', [
  value(
    'inscribed-345',
    'radius of the circle in a triangle of 30, 40 and 50 mm: (a + b − c)/2',
    'mm',
    () => largestCircleInside(triangle, 1e-4).radius * 1e3,
    10,
    { abs: 1e-3 },
    'incircle of a right triangle, Euclid IV.4',
  ),
  value(
    'bore',
    'width of a bore of 1.2 mm that a kerf of 1.6 mm does not fit into',
    'mm',
    () => {
      const bore = contourReverse({ segments: [circleOf({ x: 0.2, y: 0.1 }, 0.6 * mm)] });
      const [found] = narrowFeatures(bore, 1.6 * mm, kerfOffset(bore, 1.6 * mm, sharp));
      return found && found.kind !== 'end' ? found.width * 1e3 : Number.NaN;
    },
    1.2,
    { abs: 1e-6 },
    'its diameter',
  ),
  // of a notch with the free angle α the path ends (kerf/2)/sin(α/2) from the tip
  value(
    'notch',
    'how far before the tip of a notch of 20° the cut ends with a kerf of 1.6 mm',
    'mm',
    () => {
      const half = Math.tan((10 * Math.PI) / 180) * 0.05;
      const notched = contour([
        { x: 0, y: 0 },
        { x: 0.2, y: 0 },
        { x: 0.2, y: 0.1 },
        { x: 0.1 + half, y: 0.1 },
        { x: 0.1, y: 0.05 },
        { x: 0.1 - half, y: 0.1 },
        { x: 0, y: 0.1 },
      ]);
      const loops = kerfOffset(notched, 1.6 * mm, sharp);
      const tip = { x: 0.1, y: 0.05 };
      const path = loops.flatMap((loop) => loop.contour.segments);
      const nearest = path.reduce((least, s) => Math.min(least, segmentPointDistance(s, tip)), Infinity);
      const [found] = narrowFeatures(notched, 1.6 * mm, loops);
      if (found?.kind !== 'end' || Math.abs(nearest - 0.8 * mm - found.unreached) > 1e-12) return Number.NaN;
      return found.unreached * 1e3;
    },
    0.8 / 0.17364817766693 - 0.8,
    { abs: 1e-9 },
    APOLLONIUS,
  ),
]);
