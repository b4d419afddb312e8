import type { HeatedPiece } from '@/strategy/heat/index.ts';
import { addPuffs, heatPuffs, puffsRise, type HeatPuffs, type Raster } from '@/strategy/heat/heat-puffs.ts';
import type { PlateProperties } from '@/strategy/heat/properties.ts';
import type { Point } from '@/strategy/path/index.ts';

/**
 * The plate at a moment, s, on the raster, K, row by row: what its start temperature and all heat let go before `since` leave. Heat let go after that is too young
 * for the raster and is added in its closed form.
 */
export type HeatFrame = { readonly time: number; readonly since: number; readonly temperatures: Float32Array };

/** Heat of a pierce, J per m of thickness, at a place, m, and a moment, s. */
export type PierceHeat = { readonly at: Point; readonly time: number; readonly heat: number };

/** The plate's temperature through the whole cut, as the worker sends it. */
export type PlateHeat = {
  readonly raster: Raster;
  /** From the cut's beginning to its end; seldom further apart than the age at which heat comes onto the raster. */
  readonly frames: readonly HeatFrame[];
  /** In the order of time. */
  readonly heat: readonly HeatedPiece[];
  readonly pierces: readonly PierceHeat[];
  readonly properties: PlateProperties;
  /** Before the cut, K. */
  readonly plateTemperature: number;
};

/** The plate at one moment: ready to be asked for any place. */
export type HeatMoment = {
  readonly time: number;
  readonly raster: Raster;
  /** Without the young heat, K. */
  readonly old: Float32Array;
  readonly puffs: HeatPuffs;
  readonly properties: PlateProperties;
};

/** The plate at a time, s, held at both ends of the cut; null where there is no frame. `grain`, m, is what is told apart. */
export function heatMoment(plate: PlateHeat, at: number, grain: number): HeatMoment | null {
  const { frames, raster, heat, pierces, properties } = plate;
  const time = Math.min(frames.at(-1)?.time ?? 0, Math.max(frames[0]?.time ?? 0, at));
  const i = frameAt(frames, time);
  const before = frames[i];
  if (!before) return null;
  const after = frames[i + 1] ?? before;
  // a frame may hold heat that is not let go yet: before that it does not count
  const from = Math.max(before.time, after.since);
  const share = after.time > from ? Math.min(1, Math.max(0, (time - from) / (after.time - from))) : 0;
  const old = new Float32Array(before.temperatures.length);
  for (let k = 0; k < old.length; k++) {
    const first = before.temperatures[k] ?? 0;
    old[k] = first + share * ((after.temperatures[k] ?? 0) - first);
  }
  // what the later frame holds and the earlier does not counts as young, as far as the later one does not count yet
  const between = Math.min(time, Math.max(before.since, after.since));
  const fading = heatPuffs(heat, before.since, between, grain, properties);
  for (let k = 3; k < fading.length; k += 5) fading[k] = (fading[k] ?? 0) * (1 - share);
  const young = heatPuffs(heat, between, time, grain, properties);
  const deposits = pierces
    .filter((pierce) => pierce.time >= before.since && pierce.time < time)
    .flatMap((pierce) => [
      pierce.at.x,
      pierce.at.y,
      pierce.time,
      pierce.time < between ? pierce.heat * (1 - share) : pierce.heat,
      pierceSpread,
    ]);
  const puffs = new Float64Array(fading.length + young.length + deposits.length);
  puffs.set(fading);
  puffs.set(young, fading.length);
  puffs.set(deposits, fading.length + young.length);
  return { time, raster, old, puffs, properties };
}

/** A pierce lets its heat go within its crater, not in a point: variance of a disk of 3 mm radius, m². */
const pierceSpread = 3e-3 ** 2 / 4;

/** Temperature, K, at a place; beyond the raster's edge that of the edge. */
export function temperatureAt({ raster, old, puffs, time, properties }: HeatMoment, { x, y }: Point): number {
  return onRaster(old, raster, x, y) + puffsRise(puffs, x, y, time, properties);
}

/** Temperatures, K, on a finer raster, row by row, with the young heat. */
export function temperaturesOn({ raster, old, puffs, time, properties }: HeatMoment, target: Raster): Float32Array {
  const { columns, rows } = target;
  const found = new Float32Array(columns * rows);
  const { columns: width, rows: height } = raster;
  // the same for each row: the column to the left of each place, and how far beyond it
  const left = new Int32Array(columns);
  const beyond = new Float32Array(columns);
  for (let c = 0; c < columns; c++) {
    const across = clamp((target.x + c * target.dx - raster.x) / raster.dx, width - 1);
    left[c] = Math.min(Math.floor(across), Math.max(0, width - 2));
    beyond[c] = across - (left[c] ?? 0);
  }
  const step = width > 1 ? 1 : 0;
  for (let r = 0; r < rows; r++) {
    const up = clamp((target.y + r * target.dy - raster.y) / raster.dy, height - 1);
    const row = Math.min(Math.floor(up), Math.max(0, height - 2));
    const share = up - row;
    const below = row * width;
    const above = height > 1 ? below + width : below;
    for (let c = 0, at = r * columns; c < columns; c++, at++) {
      const i = left[c] ?? 0;
      const over = beyond[c] ?? 0;
      const low = old[below + i] ?? 0;
      const high = old[above + i] ?? 0;
      const lower = low + over * ((old[below + i + step] ?? 0) - low);
      const upper = high + over * ((old[above + i + step] ?? 0) - high);
      found[at] = lower + share * (upper - lower);
    }
  }
  addPuffs(found, target, puffs, time, properties);
  return found;
}

function onRaster(old: Float32Array, { x: x0, y: y0, dx, dy, columns, rows }: Raster, x: number, y: number): number {
  const across = clamp((x - x0) / dx, columns - 1);
  const up = clamp((y - y0) / dy, rows - 1);
  const [c, r] = [
    Math.min(Math.floor(across), Math.max(0, columns - 2)),
    Math.min(Math.floor(up), Math.max(0, rows - 2)),
  ];
  const at = (column: number, row: number) =>
    old[Math.min(rows - 1, row) * columns + Math.min(columns - 1, column)] ?? 0;
  const lower = at(c, r) + (across - c) * (at(c + 1, r) - at(c, r));
  const upper = at(c, r + 1) + (across - c) * (at(c + 1, r + 1) - at(c, r + 1));
  return lower + (up - r) * (upper - lower);
}

const clamp = (value: number, most: number): number => Math.min(Math.max(0, most), Math.max(0, value));

/** The last frame that is not after a time; the first before all. */
function frameAt(frames: readonly HeatFrame[], time: number): number {
  let low = 0;
  let high = Math.max(0, frames.length - 2);
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((frames[middle]?.time ?? 0) <= time) low = middle;
    else high = middle - 1;
  }
  return low;
}
