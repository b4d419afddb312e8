import type { PlateGrid } from './plate-grid.ts';

/** How a grid is stepped through a cut, all in s. */
export type GridPace = {
  readonly step: number;
  readonly steps: number;
  /** Each so many-th moment is kept. */
  readonly every: number;
  /** How old heat is when it is laid on the grid. */
  readonly age: number;
  /** How long before a moment the grid must be taken for a reading at it. */
  readonly readAge: number;
};

/** Variance of the bell as which heat is laid on the grid, in cells²: narrower ones a grid of fourth order carries with errors above a per cent. */
const laidVariance = 1;
/** Variance that a step adds, in cells²: twice the Fourier number. */
const stepVariance = 1;
/** Shortest step in those: the compact scheme needs more than a half. */
const leastVariance = 0.6;
/** Variance that a reading adds, in cells², at least: narrower bells can't be summed over cells. */
const readVariance = 0.5;
/** Values that are kept for readings, at most: 80 MB. */
const keptValues = 1e7;
/** Fewer steps aren't fitted to the cut's end but go beyond it: fitted, they could be too short. */
const fewestFitted = 8;

/** The steps of a grid up to `end`, s, of diffusivity `alpha`, m²/s. Throws RangeError when the step asked for is too short for the cells. */
export function gridPace({ nx, ny, cellX, cellY }: PlateGrid, alpha: number, end: number, asked?: number): GridPace {
  const smaller = Math.min(cellX, cellY) ** 2 / (2 * alpha);
  const larger = Math.max(cellX, cellY) ** 2 / (2 * alpha);
  if (asked !== undefined && !(asked >= leastVariance * larger))
    throw new RangeError(
      `step ${asked} s is too short for cells of ${cellX} × ${cellY} m: at least ${leastVariance * larger} s, or smaller cells`,
    );
  const longest = Math.min(asked ?? Infinity, stepVariance * smaller);
  const wanted = Math.max(1, Math.ceil(end / longest));
  const every = Math.max(1, Math.ceil((wanted * nx * ny) / keptValues));
  const steps = Math.ceil(wanted / every) * every;
  const step = asked !== undefined || steps < fewestFitted ? longest : end / steps;
  return { step, steps, every, age: laidVariance * larger, readAge: readVariance * larger };
}

/** Width, m, of the bell as which heat is laid on a grid: its standard deviation across the smaller side of a cell. */
export const laidWidth = ({ cellX, cellY }: PlateGrid): number => Math.sqrt(laidVariance) * Math.min(cellX, cellY);
