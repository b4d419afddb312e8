import type { PlateProperties, ReturnQuestion, ReturnTreatment } from '../../strategy/heat/index.ts';
import {
  cornerFactor,
  cutEndWake,
  cutWakePeak,
  heatedPath,
  pathRise,
  returnOf,
  straightEdgeReturn,
} from '../../strategy/heat/index.ts';
import type { LoopCorner, Point } from '../../strategy/path/index.ts';
import {
  cornerInward,
  flatLoopAt,
  flatLoopDepth,
  flatLoopReach,
  lineBetween,
  loopAt,
  loopExtension,
  loopLength,
  loopReach,
  pathLength,
  pointScale,
  roundDeviation,
} from '../../strategy/path/index.ts';
import type { OutsideCheck } from './check.ts';
import { outsideChecks } from './check.ts';

const FORMULA = 'computed from a published formula' as const;
const PLANE = 'plane geometry of a circle tangent to both edges';
const rad = (degrees: number) => (degrees * Math.PI) / 180;

const tip = (degrees: number): LoopCorner => ({
  point: { x: 0, y: 0 },
  incoming: { x: 1, y: 0 },
  outgoing: { x: Math.cos(Math.PI - rad(degrees)), y: Math.sin(Math.PI - rad(degrees)) },
  angle: rad(degrees),
});
const loopOf = (degrees: number, extension: number) => loopAt(tip(degrees), extension * Math.tan(rad(degrees) / 2));

const SIZES = [
  [90, 5, 5, 33.5619449019],
  [60, 6, 3.46410161514, 26.5103949139],
  [45, 8, 3.31370849898, 29.0129028457],
] as const;

outsideChecks('geometry of a loop', [
  ...SIZES.flatMap(([degrees, e, r, length]): OutsideCheck[] => [
    {
      id: `K01-${degrees}-extension`,
      what: `extension that belongs to ${r} mm at ${degrees}°`,
      unit: 'mm',
      got: () => loopExtension(r * 1e-3, rad(degrees)) * 1e3,
      expected: e,
      tolerance: { rel: 1e-6 },
      source: PLANE,
      standing: FORMULA,
    },
    {
      id: `K01-${degrees}-length`,
      what: `length of the loop at ${degrees}°`,
      unit: 'mm',
      got: () => loopLength(r * 1e-3, e * 1e-3, rad(degrees)) * 1e3,
      expected: length,
      tolerance: { rel: 1e-6 },
      source: PLANE,
      standing: FORMULA,
    },
    {
      id: `K01-${degrees}-path`,
      what: `length of its segments at ${degrees}°`,
      unit: 'mm',
      got: () => pathLength(loopOf(degrees, e * 1e-3).segments) * 1e3,
      expected: length,
      tolerance: { rel: 1e-6 },
      source: PLANE,
      standing: FORMULA,
    },
  ]),
  {
    id: 'K01-90-reach',
    what: 'reach of a loop of 5 mm extension at 90°',
    unit: 'mm',
    got: () => loopReach(5e-3, rad(90)) * 1e3,
    expected: 12.0710678,
    tolerance: { rel: 1e-6 },
    source: PLANE,
    standing: FORMULA,
  },
  ...(
    [
      [0.8, 2.5171458675],
      [1, 2.013716694],
      [1.5, 1.342477796],
    ] as const
  ).map(([feed, expected]): OutsideCheck => ({
    id: `K02-${feed}`,
    what: `time of the loop of 5 mm at 90° at ${feed} m/min`,
    unit: 's',
    got: () => loopOf(90, 5e-3).length / (feed / 60),
    expected,
    tolerance: { rel: 1e-6 },
    source: 'length over feed',
    standing: FORMULA,
  })),
]);

const FLAT = 'plane geometry of two circles and their common tangent; evaluated independently of this program';

/** Degrees, arc radius and extension in mm; length, reach and depth in mm by adding up the figure's pieces from their coordinates. */
const FLATS = [
  [90, 1, 6.9, 26.85625, 7.97209, 6.58614],
  [60, 1.5, 8, 27.68511, 9.63941, 9.1782],
  [45, 2, 12, 37.34287, 14.16553, 13.85192],
] as const;

outsideChecks(
  'geometry of a flat loop',
  FLATS.flatMap(([degrees, r, e, length, reach, depth]): OutsideCheck[] =>
    (
      [
        ['length', length, () => pathLength(flatLoopAt(tip(degrees), r * 1e-3, e * 1e-3).segments)],
        ['reach', reach, () => flatLoopReach(r * 1e-3, e * 1e-3)],
        ['depth', depth, () => flatLoopDepth(r * 1e-3, e * 1e-3, rad(degrees))],
      ] as const
    ).map(([what, expected, got]) => ({
      id: `flat-${degrees}-${what}`,
      what: `${what} of a flat loop at ${degrees}°`,
      unit: 'mm',
      got: () => got() * 1e3,
      expected,
      tolerance: { abs: 1e-4 },
      source: FLAT,
      standing: FORMULA,
    })),
  ),
);

outsideChecks('what a rounded corner is off the drawing', [
  ...(
    [
      [90, 1, 0.41421356],
      [60, 1, 1],
      [30, 0.5, 1.43185165],
    ] as const
  ).map(([degrees, r, expected]): OutsideCheck => ({
    id: `round-${degrees}`,
    what: `deviation of a round of ${r} mm at ${degrees}°`,
    unit: 'mm',
    got: () => roundDeviation(r * 1e-3, rad(degrees)) * 1e3,
    expected,
    tolerance: { rel: 1e-6 },
    source: 'plane geometry: distance of the corner from the circle that touches both edges',
    standing: FORMULA,
  })),
]);

/** Constants of ENV 1993-1-2:1995, simple model, from memory. */
const plate: PlateProperties = { conductivity: 45, density: 7850, specificHeat: 600 };
const q = 1e5; // W/m
const v = 1 / 60; // m/s
const SUPERPOSED =
  'superposition of the instantaneous line source, Carslaw and Jaeger 1959, 10.3(1); infinite plate without a kerf';

/** K08: rise 1 mm from both edges on the bisector with the front 2 mm past the corner, after 100 mm of first edge. */
function unslit(degrees: number, between: 'sharp' | 'loop' | 'dwell'): number {
  const corner = tip(degrees);
  const place = pointScale(cornerInward(corner), 1e-3 / Math.sin(corner.angle / 2));
  const past = lineBetween({ x: 0, y: 0 }, pointScale(corner.outgoing, 2e-3));
  const incoming = lineBetween({ x: -0.1, y: 0 }, { x: 0, y: 0 });
  const path = between === 'loop' ? [incoming, ...loopOf(degrees, 5e-3).segments, past] : [incoming, past];
  if (between !== 'dwell') return pathRise(heatedPath(path, v, 0, q), place, 0, plate);
  const pieces = [...heatedPath([incoming], v, -2 - 2e-3 / v, q), ...heatedPath([past], v, 0, q)];
  return pathRise(pieces, place, 0, plate);
}
const straight = (): number =>
  pathRise(heatedPath([lineBetween({ x: -0.1, y: 0 }, { x: 2e-3, y: 0 })], v, 0, q), { x: 0, y: 1e-3 }, 0, plate);

outsideChecks('heat of a corner in a plate without a kerf', [
  ...(
    [
      [1, 0.707106781187],
      [2, 0.5],
      [4, 0.353553390593],
    ] as const
  ).map(([t, expected]): OutsideCheck => ({
    id: `K03-${t}`,
    what: `cooling from 0.5 s to ${t} s after the cut's end`,
    unit: '1',
    got: () => cutEndWake(6e6, t, plate) / cutEndWake(6e6, 0.5, plate),
    expected,
    tolerance: { rel: 1e-6 },
    source: 'plane source, Carslaw and Jaeger, ch. 10',
    standing: FORMULA,
  })),
  {
    id: 'K08a',
    what: 'beside a straight cut',
    unit: 'K',
    got: straight,
    expected: 245.046767584,
    tolerance: { rel: 1e-4 },
    source: SUPERPOSED,
    standing: FORMULA,
  },
  ...(
    [
      [90, 'sharp', 345.826958011],
      [90, 'loop', 336.577348405],
      [90, 'dwell', 214.069816482],
      [60, 'sharp', 351.200905056],
      [60, 'loop', 308.861333763],
      [60, 'dwell', 210.83202785],
    ] as const
  ).map(([degrees, between, expected]): OutsideCheck => ({
    id: `K08-${degrees}-${between}`,
    what: `in a corner of ${degrees}°, ${between}`,
    unit: 'K',
    got: () => unslit(degrees, between),
    expected,
    tolerance: { rel: 1e-4 },
    source: SUPERPOSED,
    standing: FORMULA,
  })),
]);

const BULK =
  'Di Pietro and Yao, ICALEO 1996, abstract: corners and cutting up to an earlier kerf heat the bulk; power that follows the front helps';
const shopCut = { feed: v, kerfWidth: 6e-4, heatIntoPlate: 6.5e6 };
const risesAt = (
  degrees: number,
  more: Pick<ReturnQuestion, 'before'> & { treatment?: ReturnTreatment } = {},
): number =>
  returnOf({
    corner: tip(degrees),
    treatment: { kind: 'leave' },
    cut: shopCut,
    plateTemperature: 293.15,
    ...more,
  }) - 293.15;
/** How far from a cut its peak reaches a rise, m. */
function reachOf(rise: number): number {
  let [low, high] = [1e-6, 1];
  for (let i = 0; i < 60; i++) {
    const middle = Math.sqrt(low * high);
    if (cutWakePeak(6e6, middle, plate).rise > rise) low = middle;
    else high = middle;
  }
  return low;
}

outsideChecks('heat of a corner, bulk and preheat', [
  ...(
    [
      [180, 40.9306312811],
      [90, 81.8612625623],
      [60, 122.791893843],
      [45, 163.722525125],
    ] as const
  ).map(([degrees, expected]): OutsideCheck => ({
    id: `K06-${degrees}`,
    what: `tip of ${degrees}° with both edges open, 2 s after the front came to it`,
    unit: 'K',
    got: () =>
      cornerFactor(rad(degrees)) *
      pathRise(heatedPath([lineBetween({ x: -0.1, y: 0 }, { x: 0, y: 0 })], v, -2, q), { x: 0, y: 0 }, 0, plate),
    expected,
    tolerance: { rel: 1e-5 },
    source: `${SUPERPOSED}, times π/β`,
    standing: FORMULA,
  })),
  {
    id: 'K09-corner',
    what: 'a corner of 60° returns hotter than a straight edge: ratio of the rises',
    unit: '',
    got: () => risesAt(60) / (straightEdgeReturn(shopCut, 293.15) - 293.15),
    expected: 1,
    tolerance: { bound: 'at least' },
    source: BULK,
    standing: 'published',
  },
  {
    id: 'K09-strip',
    what: 'a corner 5 mm from an edge just cut returns hotter than a lone one: ratio of the rises',
    unit: '',
    got: () =>
      risesAt(90, {
        before: [
          lineBetween({ x: -0.2, y: 5e-3 }, { x: -5e-3, y: 5e-3 }),
          lineBetween({ x: -5e-3, y: 5e-3 }, { x: -5e-3, y: 0 }),
          lineBetween({ x: -5e-3, y: 0 }, { x: 0, y: 0 }),
        ],
      }) / risesAt(90, { before: [lineBetween({ x: -5e-3, y: 0 }, { x: 0, y: 0 })] }),
    expected: 1,
    tolerance: { bound: 'at least' },
    source: BULK,
    standing: 'published',
  },
  {
    id: 'K09-power',
    what: 'power that falls towards the corner with the feed leaves the tip cooler: ratio of the rises',
    unit: '',
    got: () =>
      risesAt(60, { treatment: { kind: 'ease', length: 5e-3, feedShare: 0.4, powerShare: 0.4 } }) / risesAt(60),
    expected: 1,
    tolerance: { bound: 'at most' },
    source: BULK,
    standing: 'published',
  },
  ...(
    [
      [960, 200, 1.23684210526],
      [960, 400, 1.67857142857],
      [1371, 400, 1.39134912461],
    ] as const
  ).map(([ignition, preheat, expected]): OutsideCheck => ({
    id: `K10-${ignition}-${preheat}`,
    what: `zone above ${ignition} °C beside a fast cut of a plate at ${preheat} °C against one at 20 °C`,
    unit: '',
    got: () => reachOf(ignition - preheat) / reachOf(ignition - 20),
    expected,
    tolerance: { rel: 1e-6 },
    source: 'peak beside a fast cut falls as one over the distance: Rykalin, from the plane source',
    standing: FORMULA,
  })),
]);

// 2D finite volumes with a kerf of 0.8 mm that opens and is insulated as the cut passes, cells of 0.4 and 0.2 mm, two independent solvers:
// 19 mm plate, 0.7 m/min, 2.5 kW into the plate, 20 °C; 1.5 mm inside the path's corner, front 1 mm before the contour on its way back.
const GRID_PLATE: PlateProperties = { conductivity: 32, density: 7850, specificHeat: 32 / (7850 * 8e-6) };
const GRID_FEED = 0.7 / 60;
const GRID_POWER = 2500 / 0.019;
const GRID = 'finite volumes with opening kerfs, own arithmetic by two independent solvers agreeing within 2 K';
const HALF_PLANE = 'half plane with image, Carslaw and Jaeger, ch. 10 and 14; evaluated independently of this program';

/** Degrees, extension mm; °C on the grid, with the source stopped, with the extension, with half of the arc too. */
const TABLE = [
  [90, 3, 214, 141, 188, 218],
  [90, 6, 163, 103, 147, 161],
  [60, 5, 215, 139, 202, 214],
  [45, 6, 219, 142, 212, 219],
  [30, 8, 212, 136, 210, 212],
  [120, 4, 151, 97, 126, 152],
] as const;

function closedForm(degrees: number, extension: number, parts: 'edge' | 'extension' | 'arc'): number {
  const loop = loopOf(degrees, extension);
  const at = (loop.length - 1e-3) / GRID_FEED;
  const place: Point = pointScale(cornerInward(tip(degrees)), 1.5e-3);
  const turn = extension / GRID_FEED;
  const [out, arc] = loop.segments;
  const pieces = heatedPath([lineBetween({ x: -0.5, y: 0 }, { x: 0, y: 0 })], GRID_FEED, 0, GRID_POWER);
  if (parts !== 'edge') pieces.push({ segment: out, from: 0, to: turn, powerPerLength: GRID_POWER });
  if (parts === 'arc')
    pieces.push({ segment: arc, from: turn, to: loop.length / GRID_FEED - turn, powerPerLength: GRID_POWER / 2 });
  return 20 + pathRise(pieces, place, at, GRID_PLATE);
}

outsideChecks(
  'closed form of the return temperature against a grid',
  TABLE.flatMap(([degrees, e, grid, stopped, extended, arced]): OutsideCheck[] => {
    const row = (
      id: string,
      what: string,
      got: () => number,
      expected: number,
      abs: number,
      source: string,
    ): OutsideCheck => ({
      id: `return-${degrees}-${e}-${id}`,
      what: `${degrees}°, ${e} mm extension: ${what}`,
      unit: '°C',
      got,
      expected,
      tolerance: { abs },
      source,
      standing: FORMULA,
    });
    const x = e * 1e-3;
    return [
      row('stopped', 'source stops at the corner', () => closedForm(degrees, x, 'edge'), stopped, 1, HALF_PLANE),
      row(
        'extended',
        'source goes on along the extension',
        () => closedForm(degrees, x, 'extension'),
        extended,
        1,
        HALF_PLANE,
      ),
      row('arc', "and half of the arc's heat", () => closedForm(degrees, x, 'arc'), arced, 1, HALF_PLANE),
      row('grid', 'against the grid', () => closedForm(degrees, x, 'arc'), grid, 5, GRID),
    ];
  }),
);

// The product measures from the finished tip, half a kerf deeper, and when the loop is done, 1 mm of path later: cooler than the table.
outsideChecks(
  'the return temperature as the product defines it',
  TABLE.map(([degrees, e, , , , arced]): OutsideCheck => ({
    id: `return-${degrees}-${e}-measure`,
    what: `${degrees}°, ${e} mm extension: deeper and later than the table's measure, so cooler`,
    unit: '°C',
    got: () =>
      returnOf({
        corner: tip(degrees),
        treatment: { kind: 'loop', loop: loopOf(degrees, e * 1e-3) },
        cut: { feed: GRID_FEED, kerfWidth: 8e-4, heatIntoPlate: GRID_POWER / GRID_FEED },
        plateTemperature: 293.15,
        properties: GRID_PLATE,
      }) - 273.15,
    expected: arced + 0.5,
    tolerance: { bound: 'at most' },
    source: HALF_PLANE,
    standing: FORMULA,
  })),
);
