import { contourContains } from '../../path/contour.ts';
import type { Box, Point } from '../../path/point.ts';
import { addPuffs } from '../heat-puffs.ts';
import type { HeatedPiece } from '../path-heat.ts';
import type { PlateProperties } from '../properties.ts';
import { diffusionLength, diffusivity, midZoneProperties } from '../properties.ts';
import { plateCoolingTime } from '../surface-loss.ts';
import { cellWindow, layWindow, partWindow, reachFrom, shareOf, widestWindow } from './cell-window.ts';
import type { Warm } from './conduction-step.ts';
import { conductionOver } from './conduction-step.ts';
import type { HeatDrop, PierceHeat } from './heat-drops.ts';
import { dropsBetween, piecesInside } from './heat-drops.ts';
import { kerfLinks } from './kerf-links.ts';
import { kerfSides } from './kerf-sides.ts';
import type { PlateGrid, PlateShape } from './plate-grid.ts';
import { cellMiddle, plateGrid, steelCells } from './plate-grid.ts';
import { youngHeat } from './young-heat.ts';

/** What a plate's field is computed from. */
export type PlateQuestion = {
  /** The box around the plate, m. Its edge is insulated. */
  readonly plate: Box;
  /** The plate's own outline where it isn't its box: a remnant. */
  readonly shape?: PlateShape;
  readonly thickness: number; // m
  /** The whole plate's before the cut, K. */
  readonly plateTemperature: number;
  /** Of the air, K; 20 °C when left out. */
  readonly ambient?: number;
  /** What each face gives off, W/(m² K): `usualLoss` when left out. */
  readonly lossCoefficient?: number;
  readonly properties?: PlateProperties;
  /** What is cut, in order of time and nothing at the same time. */
  readonly heat: readonly HeatedPiece[];
  /** Behind which pieces a kerf stays open: behind those of `heat` when left out, behind none when empty. */
  readonly kerfs?: readonly HeatedPiece[];
  readonly pierces?: readonly PierceHeat[];
  /** Side of a cell, m; 10 mm when left out, less on small plates. */
  readonly cell?: number;
  /** Time of a step, s, at most; when left out what the cell needs. */
  readonly step?: number;
  /** End of what is computed, s; the end of the heat when left out. */
  readonly until?: number;
  /** How many moments, at most, the field's `times` are: 60 when left out. */
  readonly moments?: number;
};

/** The temperature of a plate while it is cut; see `plateField`. */
export type PlateField = {
  readonly grid: PlateGrid;
  /** Moments of `frame`, s, even from the beginning to the end. */
  readonly times: Float64Array;
  /** Temperatures of the cells' middles at `times[i]`, K, row by row; what is no steel is at the ambient temperature. */
  frame(i: number): Float32Array;
  /** As `frame`, but without what was let go at `since`, s, and after, for whoever draws that finer than the grid is. */
  settledFrame(i: number): { readonly since: number; readonly temperatures: Float32Array };
  /** Temperature, K, at a place of the plate at a time up to the end, of all heat let go before. */
  at(point: Point, time: number): number;
  /** Temperature, K, at a place at `time` of the plate's own and of all heat let go before `since`, s; nothing after counts. */
  background(point: Point, since: number, time: number): number;
  /** The latest `since` up to a time for which `background` needs nothing but the grid once some seconds are gone; −∞ when there is none. */
  splitBefore(time: number): number;
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

/**
 * Loss of a face, W/(m² K): free convection on a horizontal plate and radiation of dull steel at 100 to 200 °C add up to about this; common practice, no source. A
 * plate of 20 mm then cools with a time constant of about 40 minutes.
 */
export const usualLoss = 20;

const roomTemperature = 293.15;
/** Variance of the bell as which heat is laid on the grid, in cells²: narrower ones a grid of fourth order carries with errors above a per cent. */
const laidVariance = 2;
/** Length of a drop in widths of its bell (standard deviations): of a straight row of them the ripple is 5e-9. */
const dropLength = 1;
/** Variance that a step adds, in cells²: twice the Fourier number. */
const stepVariance = 1;
/** Variance that a reading adds, in cells², at least: narrower bells can't be summed over cells. */
const readVariance = 0.5;
/** How far from a kerf's middle it is looked which side a cell is on, m. */
const beside = 1e-6;
/** What a bridge between cells that only share a corner carries, as a share of a face. */
const bridgeWidth = 0.5;
/** Values that are kept for readings, at most. */
const keptValues = 8e6;
const usualMoments = 60;
/** Length below which young heat is not told apart in a frame, m. */
const frameGrain = 5e-4;
/** Times between two progress calls, in steps. */
const progressEvery = 4;

type Kept = Warm & { readonly time: number; readonly values: Float64Array };

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
  const { ambient = roomTemperature, lossCoefficient = usualLoss, pierces = [] } = question;
  checked(question);
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
  const { inside: pieces, lost: lostPerLength } = piecesInside(question.heat, plate, steelAt);
  const holds = ({ x, y }: Point): boolean =>
    x >= plate.minX && x <= plate.maxX && y >= plate.minY && y <= plate.maxY && (!steelAt || steelAt({ x, y }));
  const spots = pierces.filter(({ at }) => holds(at));
  const lost = lostPerLength * thickness + pierces.reduce((sum, { at, heat }) => sum + (holds(at) ? 0 : heat), 0);
  const kerfs = question.kerfs ?? pieces;
  const { links, cuts } = kerfLinks(grid, kerfs, steel);
  const sides = kerfSides(grid, kerfs, links);

  const end = Math.max(
    question.until ?? 0,
    pieces.reduce((latest, { to }) => Math.max(latest, to), 0),
    spots.reduce((latest, { time }) => Math.max(latest, time), 0),
  );
  const cellSquare = Math.min(cellX, cellY) ** 2;
  const widest = Math.max(cellX, cellY) ** 2;
  const age = (laidVariance * widest) / (2 * alpha);
  const longest = Math.min(question.step ?? Infinity, (stepVariance * cellSquare) / (2 * alpha));
  const wantedSteps = Math.max(1, Math.ceil(end / longest));
  const every = Math.max(1, Math.ceil((wantedSteps * nx * ny) / keptValues));
  const steps = Math.ceil(wantedSteps / every) * every;
  // a few steps alone would be too short for the scheme when they had to end with the cut
  const step = steps < 8 ? longest : end / steps;
  const readAge = (readVariance * widest) / (2 * alpha);

  const conduction = conductionOver(grid, alpha, step, Math.exp(-step / coolingTime));
  const { rise, warm } = conduction;
  const bridged = Math.exp((-bridgeWidth * 2 * alpha * step) / (cellX * cellY));
  const perHeat = 1 / (capacity * cellX * cellY);
  const window = cellWindow();
  const left = new Int32Array(widestWindow);
  const right = new Int32Array(widestWindow);
  const length = dropLength * Math.sqrt(laidVariance * cellSquare);
  const kept: Kept[] = [];

  const lay = (drop: HeatDrop, time: number): void => {
    const variance = 2 * alpha * (time - drop.time);
    layWindow(window, grid, drop.x, drop.y, variance + drop.alongX, variance + drop.alongY);
    partWindow(window, links, nx, time);
    const { i0, i1, j0, j1 } = window;
    const amount = drop.heat * perHeat * Math.exp(-(time - drop.time) / coolingTime);
    warm.i0 = Math.min(warm.i0, i0);
    warm.i1 = Math.max(warm.i1, i1);
    warm.j0 = Math.min(warm.j0, j0);
    warm.j1 = Math.max(warm.j1, j1);
    if (!window.parted) {
      addBell(amount, null);
      return;
    }
    const { x, y, tangent } = drop;
    const [across, along] = tangent ? [-tangent.y * beside, tangent.x * beside] : [0, 0];
    const onLeft = sides.cellBeside(x + across, y + along, time);
    const onRight = tangent ? sides.cellBeside(x - across, y - along, time) : -1;
    const halves = (onLeft >= 0 ? 1 : 0) + (onRight >= 0 ? 1 : 0);
    if (halves === 0) addBell(amount, null);
    for (const [cell, reached] of [
      [onLeft, left],
      [onRight, right],
    ] as const) {
      if (cell < 0) continue;
      reachFrom(window, cell % nx, Math.floor(cell / nx), reached);
      addBell(amount / halves / shareOf(window, reached), reached);
    }
  };

  const addBell = (amount: number, reached: Int32Array | null): void => {
    const { i0, i1, j0, j1, across, upwards } = window;
    for (let j = j0; j <= j1; j++) {
      const cells = reached ? (reached[j - j0] ?? 0) : (1 << (i1 - i0 + 1)) - 1;
      if (cells === 0) continue;
      const weight = amount * (upwards[j - j0] ?? 0);
      const first = 31 - Math.clz32(cells & -cells);
      const last = 31 - Math.clz32(cells);
      const o = j * nx + i0;
      if (cells >>> first === (1 << (last - first + 1)) - 1) {
        for (let i = first; i <= last; i++) rise[o + i] = (rise[o + i] ?? 0) + weight * (across[i] ?? 0);
      } else {
        for (let i = first; i <= last; i++)
          if ((cells >>> i) & 1) rise[o + i] = (rise[o + i] ?? 0) + weight * (across[i] ?? 0);
      }
    }
  };

  const keep = (time: number): void => {
    const { i0, i1, j0, j1 } = warm;
    const width = Math.max(0, i1 - i0 + 1);
    const values = new Float64Array(width * Math.max(0, j1 - j0 + 1));
    for (let j = j0; j <= j1; j++) values.set(rise.subarray(j * nx + i0, j * nx + i1 + 1), (j - j0) * width);
    kept.push({ i0, i1, j0, j1, time, values });
  };

  keep(0);
  let nextCut = 0;
  let firstPiece = 0;
  let nextSpot = 0;
  for (let n = 1; n <= steps; n++) {
    const time = n * step;
    for (let cut = cuts[nextCut]; cut && cut.time <= time - step; cut = cuts[++nextCut]) conduction.cut(cut);
    conduction.step();
    for (const { cell, beyond, since } of sides.bridges) if (since <= time) exchange(rise, cell, beyond, bridged);
    const until = time - age;
    const after = until - step;
    for (let piece = pieces[firstPiece]; piece && piece.to <= after; piece = pieces[++firstPiece]);
    dropsBetween(pieces, firstPiece, after, until, length, age / 4, (drop) => lay(drop, time));
    for (let spot = spots[nextSpot]; spot && spot.time < until; spot = spots[++nextSpot]) {
      const { at, heat } = spot;
      lay({ ...at, time: spot.time, heat: heat / thickness, alongX: 0, alongY: 0, tangent: null }, time);
    }
    if (n % every === 0) keep(time);
    if (progress && n % progressEvery === 0 && progress(n / steps) === false)
      throw new PlateFieldCancelled('the plate’s field was given up');
  }
  const last = steps * step;

  let hottest: ReturnType<typeof hottestOf> | null = null;

  const own = (time: number): number => ambient + (plateTemperature - ambient) * Math.exp(-time / coolingTime);
  const cadence = step * every;
  const young = youngHeat({ plate, thickness, properties, coolingTime, pieces, pierces: spots });

  /** Rise, K, at a place `later` s after a kept moment, of what lay on the grid then. */
  const readRise = (state: Kept, point: Point, later: number): number => {
    if (state.i1 < state.i0) return 0;
    const variance = 2 * alpha * later;
    const faded = Math.exp(-later / coolingTime);
    if (!layWindow(window, grid, point.x, point.y, variance, variance))
      return faded * readWide(grid, state, point, variance);
    partWindow(window, links, nx, state.time);
    if (window.parted) {
      const seed = sides.cellBeside(point.x, point.y, state.time);
      const i = seed >= 0 ? seed % nx : Math.min(nx - 1, Math.floor((point.x - grid.minX) / cellX));
      const j = seed >= 0 ? Math.floor(seed / nx) : Math.min(ny - 1, Math.floor((point.y - grid.minY) / cellY));
      reachFrom(window, i, j, left);
    } else left.fill(-1);
    const { across, upwards } = window;
    const width = state.i1 - state.i0 + 1;
    const [i0, i1] = [Math.max(window.i0, state.i0), Math.min(window.i1, state.i1)];
    const [j0, j1] = [Math.max(window.j0, state.j0), Math.min(window.j1, state.j1)];
    let sum = 0;
    for (let j = j0; j <= j1; j++) {
      const cells = left[j - window.j0] ?? 0;
      const o = (j - state.j0) * width - state.i0;
      let row = 0;
      for (let i = i0; i <= i1; i++)
        if ((cells >>> (i - window.i0)) & 1) row += (across[i - window.i0] ?? 0) * (state.values[o + i] ?? 0);
      sum += row * (upwards[j - window.j0] ?? 0);
    }
    return (faded * sum) / (window.parted ? shareOf(window, left) : 1);
  };

  const stateAt = (time: number): Kept | undefined =>
    kept[Math.min(kept.length - 1, Math.floor(time / cadence + 1e-9))];

  const background = (point: Point, since: number, time: number): number => {
    if (!holdsPlace(plate, point)) throw new RangeError(`place ${point.x}, ${point.y} m is outside the plate`);
    if (!(time >= 0 && Number.isFinite(time))) throw new RangeError(`time ${time} s is outside [0, ∞)`);
    if (!(since <= time)) throw new RangeError(`since ${since} s is after the time ${time} s`);
    const state = stateAt(Math.min(time - readAge, since + age));
    if (!state) return own(time) + young.rise(point, -Infinity, since, time);
    return own(time) + readRise(state, point, time - state.time) + young.rise(point, state.time - age, since, time);
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
      if (!(time <= last * (1 + 1e-12))) throw new RangeError(`time ${time} s is outside [0, ${last}] s`);
      return background(point, time, time);
    },
    background,
    splitBefore: (time) => {
      const k = Math.min(kept.length - 1, Math.floor((time + age) / cadence + 1e-9));
      return k > 0 && time > 0 ? k * cadence - age : -Infinity;
    },
    get hottest() {
      hottest ??= hottestOf(grid, kept);
      const { rise: most, at, time } = hottest;
      return { temperature: own(time) + most, at, time };
    },
    mean(time) {
      if (!(time >= 0 && time <= last * (1 + 1e-12))) throw new RangeError(`time ${time} s is outside [0, ${last}] s`);
      const state = stateAt(time);
      const sum = state ? state.values.reduce((all, one) => all + one, 0) : 0;
      const settled = state ? (sum * cellX * cellY * Math.exp(-(time - state.time) / coolingTime)) / area : 0;
      return own(time) + settled + young.heat(state ? state.time - age : -Infinity, time) / (capacity * area);
    },
    lost,
  };
}

function checked({
  thickness,
  plateTemperature,
  ambient,
  lossCoefficient,
  heat,
  pierces,
  step,
  moments,
  until,
}: PlateQuestion): void {
  if (!(thickness > 0 && Number.isFinite(thickness)))
    throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  for (const [name, kelvin] of [
    ['plate temperature', plateTemperature],
    ['ambient temperature', ambient ?? roomTemperature],
  ] as const) {
    if (!(kelvin > 0 && Number.isFinite(kelvin))) throw new RangeError(`${name} ${kelvin} K is outside (0, ∞)`);
  }
  if (lossCoefficient !== undefined && !(lossCoefficient >= 0 && Number.isFinite(lossCoefficient)))
    throw new RangeError(`loss coefficient ${lossCoefficient} W/(m² K) is outside [0, ∞)`);
  if (step !== undefined && !(step > 0)) throw new RangeError(`step ${step} s is outside (0, ∞)`);
  if (moments !== undefined && !(moments >= 1)) throw new RangeError(`${moments} moments are outside [1, ∞)`);
  if (until !== undefined && !(until >= 0 && Number.isFinite(until)))
    throw new RangeError(`end ${until} s is outside [0, ∞)`);
  let latest = 0;
  for (const { from, to, powerPerLength } of heat) {
    // a nanosecond is rounding of times that were added up
    if (!(from >= latest - 1e-9 && to >= from && Number.isFinite(to)))
      throw new RangeError(
        `a piece is cut from ${from} to ${to} s, after one that ends at ${latest} s: times must rise`,
      );
    if (!(powerPerLength >= 0 && Number.isFinite(powerPerLength)))
      throw new RangeError(`power ${powerPerLength} W/m of a piece is outside [0, ∞)`);
    latest = to;
  }
  let pierced = 0;
  for (const { time, heat: amount } of pierces ?? []) {
    if (!(time >= pierced && Number.isFinite(time)))
      throw new RangeError(`a pierce at ${time} s comes after one at ${pierced} s: times must rise from 0`);
    if (!(amount >= 0 && Number.isFinite(amount)))
      throw new RangeError(`heat ${amount} J of a pierce is outside [0, ∞)`);
    pierced = time;
  }
}

const holdsPlace = ({ minX, minY, maxX, maxY }: Box, { x, y }: Point): boolean =>
  x >= minX && x <= maxX && y >= minY && y <= maxY;

/** Brings two cells nearer to each other, to `share` of what parts them; their heat together stays. */
function exchange(rise: Float64Array, a: number, b: number, share: number): void {
  const mean = ((rise[a] ?? 0) + (rise[b] ?? 0)) / 2;
  const half = (((rise[a] ?? 0) - (rise[b] ?? 0)) / 2) * share;
  rise[a] = mean + half;
  rise[b] = mean - half;
}

/** The greatest rise among kept ones, K. */
function hottestOf(grid: PlateGrid, kept: readonly Kept[]): { rise: number; at: Point; time: number } {
  let found = { rise: -Infinity, at: cellMiddle(grid, 0, 0), time: 0 };
  for (const { i0, i1, j0, time, values } of kept) {
    let most = found.rise;
    let index = -1;
    for (let k = 0; k < values.length; k++) {
      const value = values[k] ?? 0;
      if (value > most) [most, index] = [value, k];
    }
    const width = i1 - i0 + 1;
    if (index >= 0)
      found = { rise: most, at: cellMiddle(grid, i0 + (index % width), j0 + Math.floor(index / width)), time };
  }
  return found.rise === -Infinity ? { ...found, rise: 0 } : found;
}

/** Rise, K, at a place from a kept moment by a bell wider than a window: kerfs are left out, the plate's edges throw back. */
function readWide(grid: PlateGrid, state: Kept, point: Point, variance: number): number {
  const bell = (from: number, to: number, at: number, square: number, count: number): Float64Array => {
    const weights = new Float64Array(to - from + 1);
    const scale = -0.5 / square;
    const turns = Math.ceil((5 * Math.sqrt(square)) / (2 * count));
    const front = 1 / Math.sqrt(2 * Math.PI * square);
    for (let k = from; k <= to; k++) {
      for (let n = -turns; n <= turns; n++) {
        const shift = 2 * n * count;
        weights[k - from] =
          (weights[k - from] ?? 0) +
          front * (Math.exp(scale * (k - at + shift) ** 2) + Math.exp(scale * (k + 1 + at + shift) ** 2));
      }
    }
    return weights;
  };
  const { i0, i1, j0, j1, values } = state;
  const u = (point.x - grid.minX) / grid.cellX - 0.5;
  const v = (point.y - grid.minY) / grid.cellY - 0.5;
  const across = bell(i0, i1, u, variance / grid.cellX ** 2, grid.nx);
  const upwards = bell(j0, j1, v, variance / grid.cellY ** 2, grid.ny);
  const width = i1 - i0 + 1;
  let sum = 0;
  for (let j = j0; j <= j1; j++) {
    const weight = upwards[j - j0] ?? 0;
    if (weight < 1e-12) continue;
    let row = 0;
    for (let i = i0; i <= i1; i++) row += (across[i - i0] ?? 0) * (values[(j - j0) * width + i - i0] ?? 0);
    sum += row * weight;
  }
  return sum;
}
