import type { PlatePlanRequest } from '../../../strategy/corners/index.ts';
import { cutPathOf } from '../../../strategy/path/compensation/index.ts';
import type { Point } from '../../../strategy/path/index.ts';
import { lineBetween } from '../../../strategy/path/index.ts';

const kerfWidth = 8e-4;
const polygon = (points: readonly Point[]) => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});

type Change = Partial<Omit<PlatePlanRequest, 'cutPath' | 'drive'>>;

/** A plate's cut of the contours given, in their order, far from the plate's edge when nothing else is said. */
export function cutOf(outlines: readonly (readonly Point[])[], change: Change = {}): PlatePlanRequest {
  const contours = outlines.map((points, i) => ({
    id: String(i + 1),
    role: 'outer' as const,
    contour: polygon(points),
  }));
  const cut = {
    feed: 0.7 / 60,
    peakPower: 4000,
    duty: 1,
    pulseFrequency: null,
    oxygenPressure: 7e4,
    standoff: 1e-3,
    focusPosition: 5e-3,
    kerfWidth,
    heatIntoPlate: 1.1e7,
  };
  const { path } = cutPathOf({
    contours: contours.map((one) => ({ ...one, name: `part ${one.id}`, parent: null })),
    inserts: [],
    kerfWidth,
    outside: { kind: 'sharp', limit: 10 },
    leadIn: { shape: { kind: 'line' }, needed: 4e-3, craterRadius: 1e-3, clearance: 1e-3 },
    plate: null,
  });
  const asked = { ...cut, ...change.cut };
  return {
    contours,
    plate: { min: { x: -0.5, y: -0.5 }, max: { x: 1.2, y: 0.8 } },
    rules: {
      treatBelowAngle: (100 * Math.PI) / 180,
      returnExcessLimit: 90,
      loop: { allowed: true, radius: 4e-3, minExtension: 2e-3, maxExtension: 0.02, clearance: 1e-3 },
      dwell: { allowed: true, maxDuration: 6, restart: 0.5 },
    },
    profile: { axes: { maxFeed: 1, acceleration: 2, jerk: 50 }, smallestArc: 1e-3 },
    thickness: 0.019,
    plateTemperature: 293.15,
    cutPath: path,
    drive: { feed: asked.feed, acceleration: 2, jerk: 50, travel: 1, pierce: 1.5, restart: 0.5 },
    pierceHeat: 4000,
    lossCoefficient: 0,
    ...change,
    cut: asked,
  };
}

export const square = (x: number, y: number, side: number): Point[] => [
  { x, y },
  { x: x + side, y },
  { x: x + side, y: y + side },
  { x, y: y + side },
];

/** Small parts close together, of so many corners at least, whose corners warm each other, under rules of all kinds: the same for a seed. */
export function randomCut(next: () => number, least = 4): PlatePlanRequest {
  const outlines: Point[][] = [];
  let x = 0;
  let corners = 0;
  while (corners < least) {
    const count = 3 + Math.floor(next() * 2);
    const radius = 0.01 + 0.02 * next();
    const turn = 2 * Math.PI * next();
    outlines.push(
      Array.from({ length: count }, (_, i) => {
        const angle = turn + (2 * Math.PI * (i + 0.6 * next())) / count;
        return { x: x + radius * Math.cos(angle), y: radius * Math.sin(angle) };
      }),
    );
    corners += count;
    x += 2 * radius + 0.026;
  }
  const restart = 2 * next();
  return cutOf(outlines, {
    // what the plan is held against sums up heat as if no kerf were in its way
    kerfsStayOpen: false,
    rules: {
      treatBelowAngle: 3.1,
      returnExcessLimit: 60 + 80 * next(),
      loop: { allowed: true, radius: 2e-3 + 3e-3 * next(), minExtension: 2e-3, maxExtension: 0.03, clearance: 1e-3 },
      dwell: { allowed: next() < 0.8, maxDuration: 6, restart },
      ease: { allowed: next() < 0.7, length: 5e-3, feedShare: 0.4, powerShare: 0.3 + 0.1 * next() },
      round: { allowed: next() < 0.5, radius: 1e-3, tolerance: 0.4e-3 },
    },
    cut: { ...cutOf([]).cut, feed: 0.011 + 0.01 * next(), heatIntoPlate: 6.5e6 + 5e6 * next() },
  });
}
