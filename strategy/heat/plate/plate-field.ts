import { contourContains } from '../../path/contour.ts';
import type { Box, Point } from '../../path/point.ts';
import { addPuffs } from '../heat-puffs.ts';
import { diffusionLength, diffusivity, midZoneProperties } from '../properties.ts';
import { plateCoolingTime } from '../surface-loss.ts';
import { gridHeat } from './grid-heat.ts';
import type { KeptRise } from './grid-heat.ts';
import { gridPace } from './grid-pace.ts';
import { gridReading, heatOn, hottestOf } from './grid-reading.ts';
import { piecesInside } from './heat-drops.ts';
import { joinedPieces } from './joined-pieces.ts';
import { kerfLinks, roomAt } from './kerf-links.ts';
import { kerfSides } from './kerf-sides.ts';
import type { PlateGrid } from './plate-grid.ts';
import { plateGrid, steelCells } from './plate-grid.ts';
import type { PlateQuestion } from './plate-question.ts';
import { checkQuestion, roomTemperature, usualLoss } from './plate-question.ts';
import { youngHeat } from './young-heat.ts';

/** The temperature of a plate while it is cut; see `plateField`. */
export type PlateField = {
  readonly grid: PlateGrid;
  /** Moments of `frame`, s, even from the beginning to the end. */
  readonly times: Float64Array;
  /** Temperatures of the cells' middles at `times[i]`, K, row by row; what is no steel as the plate were had nothing been cut. */
  frame(i: number): Float32Array;
  /** As `frame`, but without what was let go at `since`, s, and after, for whoever draws that finer than the grid is. */
  settledFrame(i: number): { readonly since: number; readonly temperatures: Float32Array };
  /** Temperature, K, at a place of the plate at a time up to the end, of all heat let go before. */
  at(point: Point, time: number): number;
  /** Temperature, K, at a place at `time` of the plate's own and of all heat let go before `since`, s; nothing after counts. */
  background(point: Point, since: number, time: number): number;
  /** The latest `since` up to a time for which `background` needs nothing but the grid once `settles` is gone; −∞ when there is none. */
  splitBefore(time: number): number;
  /** How long before a time `since` must be for `background` to need nothing but the grid, s; a little more as moments are kept. */
  readonly settles: number;
  /** Where and when the settled heat was hottest. */
  readonly hottest: { readonly temperature: number; readonly at: Point; readonly time: number };
  /** Mean temperature of the plate, K. */
  mean(time: number): number;
  /** Heat of paths and pierces outside the plate, J: it isn't counted. */
  readonly lost: number;
};

/** A share of the work that is done, 0..1. Answering false ends it. */
export type PlateProgress = (share: number) => boolean | undefined;

/** The field was given up by whoever asked for it. */
export class PlateFieldCancelled extends Error {
  override name = 'PlateFieldCancelled';
}

/** Moments that are shown when nothing else is asked. */
const usualMoments = 60;
/** Length below which young heat is not told apart in a frame, m. */
const frameGrain = 5e-4;
/** By how much the source of joined pieces may be too soon or too late, as a share of the age at which heat is laid on the grid. */
const joinedWithin = 0.01;
/** By what a time may be past the end, as a share of it: rounding. */
const rounding = 1e-12;

/**
 * The temperature, K, of a plate at every place and moment of its cut: two-dimensional conduction in a plate with insulated edge that loses heat from its faces (every rise
 * falls by e^(−t/τ), τ = ρcd/2h), with line sources along the cut and at the pierces. Heat is laid on a coarse grid once it has spread over more than a cell,
 * as the bell it then is; younger heat is the closed form's (`pathRise`), which the grid is joined to without a gap. An open kerf carries no heat on the grid;
 * for young heat it isn't there. Half of what a cut lays goes to each side of its kerf.
 *
 * Throws RangeError with a sentence for values outside their ranges, for pieces out of order, for a plate too small for a field, and when read outside plate or time;
 * `PlateFieldCancelled` when `progress` answers false.
 */
export function plateField(question: PlateQuestion, progress?: PlateProgress): PlateField {
  const { plate, shape, thickness, plateTemperature, properties = midZoneProperties } = question;
  const { ambient = roomTemperature, lossCoefficient = usualLoss, pierces: allPierces = [] } = question;
  checkQuestion(question);
  const alpha = diffusivity(properties);
  const capacity = properties.density * properties.specificHeat;
  const coolingTime = lossCoefficient > 0 ? plateCoolingTime(thickness, lossCoefficient, properties) : Infinity;
  const grid = plateGrid(plate, diffusionLength(properties, 1), question.cell);
  const { nx, ny, cellX, cellY } = grid;
  const steel = shape ? steelCells(grid, shape) : null;
  const steelShare = steel ? steel.reduce((sum, one) => sum + one, 0) / (nx * ny) : 1;
  if (steelShare === 0) throw new RangeError('no cell of the grid lies in the plate: ask for smaller ones');
  const area = (plate.maxX - plate.minX) * (plate.maxY - plate.minY) * steelShare;

  const steelAt = shape
    ? (p: Point) => contourContains(shape.edge, p) && !shape.openings.some((opening) => contourContains(opening, p))
    : null;
  const holds = (p: Point): boolean => holdsPlace(plate, p) && (!steelAt || steelAt(p));
  const end = Math.max(question.until ?? 0, question.heat.at(-1)?.to ?? 0, allPierces.at(-1)?.time ?? 0);
  const pace = gridPace(grid, alpha, end, question.step);
  const { age, readAge } = pace;
  const { inside: pieces, lost: lostPerLength } = piecesInside(
    joinedPieces(question.heat, joinedWithin * age),
    plate,
    steelAt,
  );
  const pierces = allPierces.filter(({ at }) => holds(at));
  const lost = lostPerLength * thickness + allPierces.reduce((sum, { at, heat }) => sum + (holds(at) ? 0 : heat), 0);
  const kerfs = question.kerfs ?? pieces;
  const { links, cuts } = kerfLinks(grid, kerfs, steel);
  const sides = kerfSides(grid, kerfs, links);

  const last = pace.steps * pace.step;
  const cadence = pace.every * pace.step;
  const kept = gridHeat(
    { grid, pace, links, cuts, sides, pieces, pierces, thickness, alpha, capacity, coolingTime },
    (share) => {
      if (progress?.(share) === false) throw new PlateFieldCancelled('the plate’s field was given up');
    },
  );
  const read = gridReading(grid, links, sides, roomAt(nx * ny, cuts, nx, Infinity));
  const young = youngHeat({ plate, thickness, properties, coolingTime, pieces, pierces });
  let hottest: ReturnType<typeof hottestOf> | null = null;

  /** Temperature, K, of the plate had nothing been cut. */
  const own = (time: number): number => ambient + (plateTemperature - ambient) * Math.exp(-time / coolingTime);
  const stateAt = (time: number): KeptRise | undefined =>
    kept[Math.min(kept.length - 1, Math.floor(time / cadence + 1e-9))];
  const within = (time: number): void => {
    if (!(time >= 0 && time <= last * (1 + rounding))) throw new RangeError(`time ${time} s is outside [0, ${last}] s`);
  };

  const background = (point: Point, since: number, time: number): number => {
    if (!holdsPlace(plate, point)) throw new RangeError(`place ${point.x}, ${point.y} m is outside the plate`);
    if (!(time >= 0 && Number.isFinite(time))) throw new RangeError(`time ${time} s is outside [0, ∞)`);
    if (!(since <= time)) throw new RangeError(`since ${since} s is after the time ${time} s`);
    const state = stateAt(Math.min(time - readAge, since + age));
    if (!state) return own(time) + young.rise(point, -Infinity, since, time);
    const later = time - state.time;
    const settled = read(state, point, 2 * alpha * later) * Math.exp(-later / coolingTime);
    return own(time) + settled + young.rise(point, state.time - age, since, time);
  };

  const count = Math.max(1, Math.min(question.moments ?? usualMoments, kept.length));
  const shown = Array.from({ length: count }, (_, i) =>
    count > 1 ? Math.round((i * (kept.length - 1)) / (count - 1)) : 0,
  );
  const settledFrame = (i: number): { since: number; temperatures: Float32Array } => {
    const state = kept[shown[i] ?? -1];
    if (!state) throw new RangeError(`frame ${i} is outside [0, ${count - 1}]`);
    const temperatures = new Float32Array(nx * ny).fill(own(state.time));
    const width = state.i1 - state.i0 + 1;
    for (let j = state.j0; j <= state.j1; j++) {
      for (let x = state.i0; x <= state.i1; x++)
        temperatures[j * nx + x] =
          (temperatures[j * nx + x] ?? 0) + (state.values[(j - state.j0) * width + x - state.i0] ?? 0);
    }
    return { since: state.time - age, temperatures };
  };

  return {
    grid,
    times: Float64Array.from(shown, (k) => kept[k]?.time ?? 0),
    settledFrame,
    frame(i) {
      const { since, temperatures } = settledFrame(i);
      const time = since + age;
      const raster = {
        x: grid.minX + cellX / 2,
        y: grid.minY + cellY / 2,
        dx: cellX,
        dy: cellY,
        columns: nx,
        rows: ny,
      };
      addPuffs(temperatures, raster, young.puffs(since, time, frameGrain), time, properties);
      return temperatures;
    },
    at: (point, time) => {
      within(time);
      return background(point, time, time);
    },
    background,
    splitBefore: (time) => {
      const k = Math.min(kept.length - 1, Math.floor((time + age) / cadence + 1e-9));
      return k > 0 && time > 0 ? k * cadence - age : -Infinity;
    },
    settles: age + readAge,
    get hottest() {
      hottest ??= hottestOf(grid, kept);
      const { rise: most, at, time } = hottest;
      return { temperature: own(time) + most, at, time };
    },
    mean(time) {
      within(time);
      const state = stateAt(time);
      const sum = state ? heatOn(state, roomAt(nx * ny, cuts, nx, state.time - pace.step), nx) : 0;
      const settled = state ? (sum * cellX * cellY * Math.exp(-(time - state.time) / coolingTime)) / area : 0;
      return own(time) + settled + young.heat(state ? state.time - age : -Infinity, time) / (capacity * area);
    },
    lost,
  };
}

const holdsPlace = ({ minX, minY, maxX, maxY }: Box, { x, y }: Point): boolean =>
  x >= minX && x <= maxX && y >= minY && y <= maxY;
