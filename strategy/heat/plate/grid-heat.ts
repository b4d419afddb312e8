import type { HeatedPiece } from '../path-heat.ts';
import { cellWindow, layWindow, partWindow, reachFrom, shareOf, widestWindow } from './cell-window.ts';
import type { Warm } from './conduction-step.ts';
import { conductionOver } from './conduction-step.ts';
import type { GridPace } from './grid-pace.ts';
import { laidWidth } from './grid-pace.ts';
import type { HeatDrop, PierceHeat } from './heat-drops.ts';
import { dropsBetween } from './heat-drops.ts';
import type { KerfLinks, LinkCut } from './kerf-links.ts';
import type { KerfSides } from './kerf-sides.ts';
import type { PlateGrid } from './plate-grid.ts';

/** The rise of the warm cells at a moment, K, row by row. */
export type KeptRise = Warm & { readonly time: number; readonly values: Float64Array };

export type GridHeatOf = {
  readonly grid: PlateGrid;
  readonly pace: GridPace;
  readonly links: KerfLinks;
  readonly cuts: readonly LinkCut[];
  readonly sides: KerfSides;
  readonly pieces: readonly HeatedPiece[];
  readonly pierces: readonly PierceHeat[];
  readonly thickness: number; // m
  readonly alpha: number; // m²/s
  /** Of the steel, J/(m³ K). */
  readonly capacity: number;
  readonly coolingTime: number; // s
};

/** Length of a drop in widths of its bell (standard deviations): longer ones are lumps to a kerf beside them. */
const dropLength = 0.8;
/** How far from a kerf's middle it is looked which side a cell is on, m. */
const beside = 1e-6;
/** What a bridge between cells that only share a corner carries, as a share of a face. */
const bridgeWidth = 0.5;
/** Values that are kept in one piece of memory: many small ones make more work than what is in them. */
const storeSize = 1 << 19;
/** Times between two progress calls, in steps. */
const progressEvery = 4;

/**
 * The rise of a grid's cells, K, through a cut, at each moment that the pace keeps, the first before the cut: heat is laid on it as the bell it is at the pace's age,
 * and conducted on. `going` is told the share that is done.
 */
export function gridHeat(of: GridHeatOf, going: (share: number) => void): KeptRise[] {
  const { grid, pace, links, cuts, sides, pieces, pierces, thickness, alpha, capacity, coolingTime } = of;
  const { nx, cellX, cellY } = grid;
  const { step, steps, every, age } = pace;
  const conduction = conductionOver(grid, alpha, step, Math.exp(-step / coolingTime));
  const { rise, room, warm } = conduction;
  const bridged = Math.exp((-bridgeWidth * 2 * alpha * step) / (cellX * cellY));
  const perHeat = 1 / (capacity * cellX * cellY);
  const length = dropLength * laidWidth(grid);
  const window = cellWindow();
  const left = new Int32Array(widestWindow);
  const right = new Int32Array(widestWindow);

  const lay = (drop: HeatDrop, time: number): void => {
    const variance = 2 * alpha * (time - drop.time);
    layWindow(window, grid, drop.x, drop.y, variance + drop.alongX, variance + drop.alongY);
    partWindow(window, links, nx, time);
    conduction.warmed(window);
    const amount = drop.heat * perHeat * Math.exp(-(time - drop.time) / coolingTime);
    if (!window.parted) {
      left.fill(-1);
      addBell(amount / shareOf(window, left, room, nx), null);
      return;
    }
    const { x, y, tangent } = drop;
    const [across, along] = tangent ? [-tangent.y * beside, tangent.x * beside] : [0, 0];
    const onLeft = sides.cellBeside(x + across, y + along, time);
    const onRight = tangent ? sides.cellBeside(x - across, y - along, time) : -1;
    const halves = (onLeft >= 0 ? 1 : 0) + (onRight >= 0 ? 1 : 0);
    if (halves === 0) {
      left.fill(-1);
      addBell(amount / shareOf(window, left, room, nx), null);
    }
    for (const [cell, reached] of [
      [onLeft, left],
      [onRight, right],
    ] as const) {
      if (cell < 0) continue;
      reachFrom(window, cell % nx, Math.floor(cell / nx), reached);
      addBell(amount / halves / shareOf(window, reached, room, nx), reached);
    }
  };

  /** Adds the window's bell, or its part in the cells that are reached. */
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

  const kept: KeptRise[] = [];
  let store = new Float64Array(0);
  let used = 0;
  const keep = (time: number): void => {
    const { i0, i1, j0, j1 } = warm;
    const width = Math.max(0, i1 - i0 + 1);
    const size = width * Math.max(0, j1 - j0 + 1);
    if (used + size > store.length) [store, used] = [new Float64Array(Math.max(storeSize, size)), 0];
    const values = store.subarray(used, used + size);
    used += size;
    for (let j = j0; j <= j1; j++) values.set(rise.subarray(j * nx + i0, j * nx + i1 + 1), (j - j0) * width);
    kept.push({ i0, i1, j0, j1, time, values });
  };

  keep(0);
  let nextCut = 0;
  let firstPiece = 0;
  let nextPierce = 0;
  for (let n = 1; n <= steps; n++) {
    const time = n * step;
    for (let cut = cuts[nextCut]; cut && cut.time <= time - step; cut = cuts[++nextCut]) conduction.cut(cut);
    conduction.step();
    for (const { cell, beyond, since } of sides.bridges) if (since <= time) exchange(rise, room, cell, beyond, bridged);
    const until = time - age;
    const after = until - step;
    for (let piece = pieces[firstPiece]; piece && piece.to <= after; piece = pieces[++firstPiece]);
    dropsBetween(pieces, firstPiece, after, until, length, age / 4, (drop) => lay(drop, time));
    for (let pierce = pierces[nextPierce]; pierce && pierce.time < until; pierce = pierces[++nextPierce]) {
      const { at, heat } = pierce;
      lay({ ...at, time: pierce.time, heat: heat / thickness, alongX: 0, alongY: 0, tangent: null }, time);
    }
    if (n % every === 0) keep(time);
    if (n % progressEvery === 0) going(n / steps);
  }
  return kept;
}

/** Brings two cells nearer to each other, to `share` of what parts them; their heat together stays. */
function exchange(rise: Float64Array, room: Float64Array, a: number, b: number, share: number): void {
  const [ra, rb] = [room[a] ?? 0, room[b] ?? 0];
  const mean = (ra * (rise[a] ?? 0) + rb * (rise[b] ?? 0)) / (ra + rb);
  rise[a] = mean + ((rise[a] ?? 0) - mean) * share;
  rise[b] = mean + ((rise[b] ?? 0) - mean) * share;
}
