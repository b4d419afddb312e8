import type { Point } from '../../path/point.ts';
import { cellWindow, layWindow, partWindow, reachFrom, shareOf, widestWindow } from './cell-window.ts';
import type { KeptRise } from './grid-heat.ts';
import type { CellRoom, KerfLinks } from './kerf-links.ts';
import type { KerfSides } from './kerf-sides.ts';
import type { PlateGrid } from './plate-grid.ts';
import { cellMiddle } from './plate-grid.ts';

/** Rise, K, at a place as a kept moment's cells leave it when they have spread on by `variance`, m², without what kerfs part from it. */
export type GridReading = (state: KeptRise, point: Point, variance: number) => number;

/** Readings of a grid's kept moments. */
export function gridReading(grid: PlateGrid, links: KerfLinks, sides: KerfSides, room: CellRoom): GridReading {
  const { nx, ny, minX, minY, cellX, cellY } = grid;
  const window = cellWindow();
  const reached = new Int32Array(widestWindow);
  /** What `reached` is of: a place is often asked for several times on end. */
  const seen: { state?: KeptRise; x: number; y: number; cells: number } = { x: NaN, y: NaN, cells: 0 };

  const look = (state: KeptRise, x: number, y: number): void => {
    const cells = (window.i1 - window.i0) * widestWindow + window.j1 - window.j0;
    if (seen.state === state && seen.x === x && seen.y === y && seen.cells === cells) return;
    partWindow(window, links, nx, state.time);
    if (window.parted) {
      const beside = sides.cellBeside(x, y, state.time);
      const i = beside >= 0 ? beside % nx : Math.min(nx - 1, Math.floor((x - minX) / cellX));
      const j = beside >= 0 ? Math.floor(beside / nx) : Math.min(ny - 1, Math.floor((y - minY) / cellY));
      reachFrom(window, i, j, reached);
    } else reached.fill(-1);
    Object.assign(seen, { state, x, y, cells });
  };

  return (state, { x, y }, variance) => {
    if (state.i1 < state.i0) return 0;
    if (!layWindow(window, grid, x, y, variance, variance)) return readWide(grid, state, { x, y }, variance);
    look(state, x, y);
    const { across, upwards } = window;
    const width = state.i1 - state.i0 + 1;
    const [i0, i1] = [Math.max(window.i0, state.i0), Math.min(window.i1, state.i1)];
    const [j0, j1] = [Math.max(window.j0, state.j0), Math.min(window.j1, state.j1)];
    let sum = 0;
    for (let j = j0; j <= j1; j++) {
      const cells = reached[j - window.j0] ?? 0;
      const o = (j - state.j0) * width - state.i0;
      let row = 0;
      for (let i = i0; i <= i1; i++)
        if ((cells >>> (i - window.i0)) & 1)
          row += (across[i - window.i0] ?? 0) * (room[j * nx + i] ?? 0) * (state.values[o + i] ?? 0);
      sum += row * (upwards[j - window.j0] ?? 0);
    }
    return sum / shareOf(window, reached, room, nx);
  };
}

/** What a kept moment's cells hold together, K times cells. */
export function heatOn({ i0, i1, j0, j1, values }: KeptRise, room: CellRoom, nx: number): number {
  let sum = 0;
  let k = 0;
  for (let j = j0; j <= j1; j++) for (let i = i0; i <= i1; i++) sum += (values[k++] ?? 0) * (room[j * nx + i] ?? 0);
  return sum;
}

/** The greatest rise among kept ones, K. */
export function hottestOf(grid: PlateGrid, kept: readonly KeptRise[]): { rise: number; at: Point; time: number } {
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
function readWide(grid: PlateGrid, state: KeptRise, point: Point, variance: number): number {
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
