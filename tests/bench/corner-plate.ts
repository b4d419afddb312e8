import type { CornerPlanRequest } from '../../strategy/corners/index.ts';
import type { Contour, Point } from '../../strategy/path/index.ts';
import { arcOf, lineBetween, pointRotate } from '../../strategy/path/index.ts';
import { seededNumbers } from './line.ts';

const kerfWidth = 8e-4;
const clearance = 2e-3;
/** Distance between the middles of parts, m: some loops fit, some only smaller or flat, some not at all. */
const pitch = 0.132;

/** A plate of so many parts in a grid, of ten corners each, two of the edges arcs: the same in each run. */
export function plateOfParts(parts: number): CornerPlanRequest {
  const next = seededNumbers(20_261_201);
  const columns = Math.ceil(Math.sqrt(parts * 2));
  const contours = Array.from({ length: parts }, (_, i) => ({
    id: String(i + 1),
    role: 'outer' as const,
    contour: partAt({ x: pitch * (i % columns), y: pitch * Math.floor(i / columns) }, next),
  }));
  const margin = 0.068;
  return {
    contours,
    plate: {
      min: { x: -margin, y: -margin },
      max: { x: pitch * (columns - 1) + margin, y: pitch * Math.floor((parts - 1) / columns) + margin },
    },
    rules: {
      treatBelowAngle: Math.PI * 0.99,
      returnExcessLimit: 30,
      loop: { allowed: true, radius: 4e-3, minExtension: 2e-3, maxExtension: 0.03, clearance },
      dwell: { allowed: true, maxDuration: 12, restart: 2 },
    },
    cut: {
      feed: 0.016,
      peakPower: 3600,
      duty: 1,
      pulseFrequency: null,
      oxygenPressure: 0.6e5,
      standoff: 1e-3,
      focusPosition: 4e-3,
      kerfWidth,
      heatIntoPlate: 6.5e6,
    },
    profile: { axes: { maxFeed: 1, acceleration: 2, jerk: 50 }, smallestArc: 1e-3 },
    thickness: 0.02,
    plateTemperature: 293.15,
  };
}

/** Five tips about a middle with notches between them; two of the ten edges are flat arcs. */
function partAt(middle: Point, next: () => number): Contour {
  const turn = 2 * Math.PI * next();
  const corners = Array.from({ length: 10 }, (_, k) => {
    // five tips with notches between them
    const reach = k % 2 === 0 ? 0.056 + 0.012 * next() : 0.03 + 0.01 * next();
    const p = pointRotate({ x: reach, y: 0 }, turn + (2 * Math.PI * (k + 0.5 * next())) / 10);
    return { x: middle.x + p.x, y: middle.y + p.y };
  });
  return {
    segments: corners.map((from, k) => {
      const to = corners[(k + 1) % 10] ?? from;
      return k % 5 === 2 ? bowed(from, to) : lineBetween(from, to);
    }),
  };
}

/** A counter-clockwise arc between two places that bows out by a twentieth of its chord. */
function bowed(from: Point, to: Point) {
  const sweep = 4 * Math.atan(0.1);
  const chord = Math.hypot(to.x - from.x, to.y - from.y);
  const radius = chord / 2 / Math.sin(sweep / 2);
  const inward = { x: -(to.y - from.y) / chord, y: (to.x - from.x) / chord };
  const deep = radius * Math.cos(sweep / 2);
  const centre = { x: (from.x + to.x) / 2 + inward.x * deep, y: (from.y + to.y) / 2 + inward.y * deep };
  return arcOf(centre, radius, Math.atan2(from.y - centre.y, from.x - centre.x), sweep);
}
