import { segmentLength, segmentPointAt } from '../path/segment.ts';
import type { HeatedPiece } from './path-heat.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';

/** Heat let go at single places and moments: five numbers each, `x, y` m, `time` s, `heat` J per m of thickness, and `spread`, m² (see `heatPuffs`). */
export type HeatPuffs = Float64Array;

const fields = 5;

/** Length of path a puff stands for, in its own widths (standard deviations): at a path's ends the sum is within a per cent. */
const spacing = 0.8;

/** A puff further off than so many of its widths adds less than 4e-4 of its middle. */
const reach = 4;

/**
 * The heat of a path between two moments, s, as single puffs (instantaneous line sources), the fewer the older: each is as long as 0.8 times its width at
 * `until`, and no shorter than `grain`, m, below which nothing is told apart. A point source that stands still is one puff. `spread` is the variance that a puff's own
 * length gives it along the path, taken even in all directions, so that a coarse grain blurs instead of rippling.
 */
export function heatPuffs(
  pieces: readonly HeatedPiece[],
  since: number,
  until: number,
  grain: number,
  plate: PlateProperties,
): HeatPuffs {
  if (!(grain > 0)) throw new RangeError(`grain ${grain} m is outside (0, ∞)`);
  const alpha2 = 2 * diffusivity(plate);
  const puffs: number[] = [];
  for (let i = pieces.length - 1; i >= 0; i--) {
    const piece = pieces[i];
    if (!piece) continue;
    if (piece.to <= since) continue;
    const first = Math.max(piece.from, since);
    const last = Math.min(piece.to, until);
    if (!(last > first) || piece.powerPerLength === 0) continue;
    const duration = piece.to - piece.from;
    const speed = segmentLength(piece.segment) / duration;
    let to = last;
    while (to > first) {
      const width = Math.sqrt(alpha2 * (until - to));
      const step = speed > 0 ? Math.max(grain, spacing * width) / speed : Infinity;
      // a remainder of less than half a puff is not worth one of its own
      const from = to - first < 1.5 * step ? first : to - step;
      const middle = (from + to) / 2;
      const at = segmentPointAt(piece.segment, (middle - piece.from) / duration);
      const length = speed * (to - from);
      const blur = grain > spacing * width ? (length * length) / 12 : 0;
      puffs.push(at.x, at.y, middle, piece.powerPerLength * (to - from), blur);
      to = from;
    }
  }
  return Float64Array.from(puffs);
}

/** Rise, K, that puffs leave at a place at `time` s. The sum of instantaneous line sources (Carslaw and Jaeger, ch. 10). */
export function puffsRise(puffs: HeatPuffs, x: number, y: number, time: number, plate: PlateProperties): number {
  const alpha4 = 4 * diffusivity(plate);
  const capacity = plate.density * plate.specificHeat;
  let rise = 0;
  for (let i = 0; i + fields <= puffs.length; i += fields) {
    const age = time - (puffs[i + 2] ?? 0);
    if (!(age > 0)) continue;
    const width = alpha4 * age + 2 * (puffs[i + 4] ?? 0);
    const dx = x - (puffs[i] ?? 0);
    const dy = y - (puffs[i + 1] ?? 0);
    const square = (dx * dx + dy * dy) / width;
    if (square < (reach * reach) / 2) rise += ((puffs[i + 3] ?? 0) * Math.exp(-square)) / (Math.PI * capacity * width);
  }
  return rise;
}

/** A raster of places: columns along x, rows along y; negative `dy` runs downwards. */
export type Raster = {
  readonly x: number; // m, of the first column
  readonly y: number; // m, of the first row
  readonly dx: number; // m
  readonly dy: number; // m
  readonly columns: number;
  readonly rows: number;
};

/** Adds what puffs leave at `time` s to temperatures, K, row by row. A bell is a product of two, so each costs a column and a row of exponentials. */
export function addPuffs(
  target: Float32Array,
  { x, y, dx, dy, columns, rows }: Raster,
  puffs: HeatPuffs,
  time: number,
  plate: PlateProperties,
): void {
  const alpha4 = 4 * diffusivity(plate);
  const capacity = plate.density * plate.specificHeat;
  const across = new Float64Array(columns);
  for (let i = 0; i + fields <= puffs.length; i += fields) {
    const age = time - (puffs[i + 2] ?? 0);
    if (!(age > 0)) continue;
    const width = alpha4 * age + 2 * (puffs[i + 4] ?? 0);
    const far = reach * Math.sqrt(width / 2);
    const column = ((puffs[i] ?? 0) - x) / dx;
    const row = ((puffs[i + 1] ?? 0) - y) / dy;
    const fromColumn = Math.max(0, Math.ceil(column - far / Math.abs(dx)));
    const toColumn = Math.min(columns - 1, Math.floor(column + far / Math.abs(dx)));
    const fromRow = Math.max(0, Math.ceil(row - far / Math.abs(dy)));
    const toRow = Math.min(rows - 1, Math.floor(row + far / Math.abs(dy)));
    if (fromColumn > toColumn || fromRow > toRow) continue;
    for (let c = fromColumn; c <= toColumn; c++) across[c] = Math.exp(-(((c - column) * dx) ** 2) / width);
    const middle = (puffs[i + 3] ?? 0) / (Math.PI * capacity * width);
    for (let r = fromRow; r <= toRow; r++) {
      const share = middle * Math.exp(-(((r - row) * dy) ** 2) / width);
      const start = r * columns;
      for (let c = fromColumn; c <= toColumn; c++)
        target[start + c] = (target[start + c] ?? 0) + share * (across[c] ?? 0);
    }
  }
}
