import type { PlatePlanRequest } from '../../strategy/corners/index.ts';
import { cutPathOf } from '../../strategy/path/compensation/index.ts';
import { contourLength } from '../../strategy/path/index.ts';
import { plateOfParts } from './corner-plate.ts';

/** Pierce of each part, s, and what it leaves in the plate, J. */
const pierce = 1;
const pierceHeat = 4000;
/** From one part to the next, with the head's way up and down, s. */
const between = 0.5;

/**
 * The whole cut of a plate of so many parts of ten corners each, row after row there and back, 200 of them in 20 minutes when no corner gets anything: the same in each run. One tip
 * in three is hotter than the limit. The path is computed once: it does not change with what the corners get.
 */
export function cutOfPlate(parts: number): PlatePlanRequest {
  const base = plateOfParts(parts);
  const { cut, profile, rules } = base;
  const columns = Math.ceil(Math.sqrt(parts * 2));
  const rows = Array.from({ length: Math.ceil(parts / columns) }, (_, row) => {
    const one = base.contours.slice(row * columns, (row + 1) * columns);
    return row % 2 === 0 ? one : one.reverse();
  });
  const contours = rows.flat();
  const length = contours.reduce((sum, { contour }) => sum + contourLength(contour), 0) / parts;
  const feed = length / (1200 / 200 - pierce - between);
  const plate = base.plate && 'min' in base.plate ? base.plate : null;
  const { path } = cutPathOf({
    contours: contours.map((one) => ({ ...one, name: `part ${one.id}`, parent: null })),
    inserts: [],
    kerfWidth: cut.kerfWidth,
    outside: { kind: 'sharp', limit: 10 },
    leadIn: { shape: { kind: 'line' }, needed: 5e-3, craterRadius: 1e-3, clearance: 1e-3 },
    plate: plate && { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y },
  });
  return {
    ...base,
    contours,
    cut: { ...cut, feed },
    rules: { ...rules, returnExcessLimit: 170, dwell: { allowed: true, maxDuration: 6, restart: 0.5 } },
    cutPath: path,
    drive: {
      feed,
      acceleration: profile.axes.acceleration,
      jerk: profile.axes.jerk,
      travel: profile.axes.maxFeed,
      pierce,
      restart: 0.5,
    },
    pierceHeat,
  };
}
