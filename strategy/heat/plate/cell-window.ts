import type { CellRoom, KerfLinks } from './kerf-links.ts';
import type { PlateGrid } from './plate-grid.ts';

/** Cells across a window at most: a row of it is a word of bits. */
export const widestWindow = 31;

/**
 * A window of the grid about a place with a bell in it: the weights of its columns and rows (heat that the plate's edge throws back folded in), and which of its
 * cells are reached from given ones without crossing an open kerf. One object is filled again and again: windows are looked at by the ten thousand.
 */
export type CellWindow = {
  i0: number;
  i1: number;
  j0: number;
  j1: number;
  readonly across: Float64Array;
  readonly upwards: Float64Array;
  /** For each row of the window the cells, as bits, that conduct to their right, and to above. */
  readonly right: Int32Array;
  readonly up: Int32Array;
  /** Is a way cut anywhere in the window? */
  parted: boolean;
};

export const cellWindow = (): CellWindow => ({
  i0: 0,
  i1: -1,
  j0: 0,
  j1: -1,
  across: new Float64Array(widestWindow),
  upwards: new Float64Array(widestWindow),
  right: new Int32Array(widestWindow),
  up: new Int32Array(widestWindow),
  parted: false,
});

/** Half the width of a bell's window in its standard deviations: what lies beyond is 6e-5 of it. */
const reach = 4;

/**
 * Lays the window about a place, m, with bells of variances `varianceX` and `varianceY`, m². The window is at most 31 cells wide: false, and nothing else, when the bell
 * is too wide for that.
 */
export function layWindow(
  window: CellWindow,
  grid: PlateGrid,
  x: number,
  y: number,
  varianceX: number,
  varianceY: number,
): boolean {
  const u = (x - grid.minX) / grid.cellX - 0.5;
  const v = (y - grid.minY) / grid.cellY - 0.5;
  const su = varianceX / (grid.cellX * grid.cellX);
  const sv = varianceY / (grid.cellY * grid.cellY);
  const ru = Math.ceil(reach * Math.sqrt(su));
  const rv = Math.ceil(reach * Math.sqrt(sv));
  if (2 * ru + 1 > widestWindow || 2 * rv + 1 > widestWindow) return false;
  const i = Math.round(u);
  const j = Math.round(v);
  window.i0 = Math.max(0, i - ru);
  window.i1 = Math.min(grid.nx - 1, i + ru);
  window.j0 = Math.max(0, j - rv);
  window.j1 = Math.min(grid.ny - 1, j + rv);
  bell(window.across, window.i0, window.i1, u, su, grid.nx);
  bell(window.upwards, window.j0, window.j1, v, sv, grid.ny);
  return true;
}

/** Weights of the cells from..to of a row of `count` that add up to 1. What passes an end of the row comes back as from a mirror. */
function bell(weights: Float64Array, from: number, to: number, at: number, variance: number, count: number): void {
  const scale = -0.5 / variance;
  let sum = 0;
  const [low, high] = [-1 - at, 2 * count - 1 - at];
  const folded = from === 0 || to === count - 1;
  for (let k = from; k <= to; k++) {
    let weight = Math.exp(scale * (k - at) * (k - at));
    if (folded) weight += Math.exp(scale * (low - k) * (low - k)) + Math.exp(scale * (high - k) * (high - k));
    weights[k - from] = weight;
    sum += weight;
  }
  for (let k = 0; k <= to - from; k++) weights[k] = (weights[k] ?? 0) / sum;
}

/** Notes which ways of the window conduct at `time`, s. */
export function partWindow(window: CellWindow, links: KerfLinks, nx: number, time: number): void {
  const { i0, i1, j0, j1, right, up } = window;
  let parted = false;
  for (let j = j0; j <= j1; j++) {
    let [toRight, toAbove] = [0, 0];
    const o = j * nx;
    for (let i = i0; i < i1; i++) {
      if ((links.right[o + i] ?? 0) > time) toRight |= 1 << (i - i0);
      else parted = true;
    }
    if (j < j1) {
      for (let i = i0; i <= i1; i++) {
        if ((links.up[o + i] ?? 0) > time) toAbove |= 1 << (i - i0);
        else parted = true;
      }
    }
    right[j - j0] = toRight;
    up[j - j0] = toAbove;
  }
  window.parted = parted;
}

/**
 * Marks in `reached`, a word a row, the cells that heat comes to from cell (i, j) within the window without crossing an open kerf or turning back: what lies behind the end of a kerf
 * is not reached around it.
 */
export function reachFrom(window: CellWindow, i: number, j: number, reached: Int32Array): void {
  const { i0, j0, j1, right, up } = window;
  const rows = j1 - j0 + 1;
  const column = i - i0;
  const middle = j - j0;
  reached[middle] = along(1 << column, right[middle] ?? 0, column);
  for (let row = middle + 1; row < rows; row++)
    reached[row] = along((reached[row - 1] ?? 0) & (up[row - 1] ?? 0), right[row] ?? 0, column);
  for (let row = middle - 1; row >= 0; row--)
    reached[row] = along((reached[row + 1] ?? 0) & (up[row] ?? 0), right[row] ?? 0, column);
}

/** The cells of a row that are reached from some of them away from a column: bits doubled up over ways that conduct, to the right of it and to the left. */
function along(cells: number, toRight: number, column: number): number {
  const above = -1 << column;
  let ahead = cells & above;
  let open = (toRight & above) << 1;
  ahead |= open & (ahead << 1);
  open &= open << 1;
  ahead |= open & (ahead << 2);
  open &= open << 2;
  ahead |= open & (ahead << 4);
  open &= open << 4;
  ahead |= open & (ahead << 8);
  open &= open << 8;
  ahead |= open & (ahead << 16);
  const below = (1 << column) - 1;
  let behind = cells & (below | (1 << column));
  let back = toRight & below;
  behind |= back & (behind >>> 1);
  back &= back >>> 1;
  behind |= back & (behind >>> 2);
  back &= back >>> 2;
  behind |= back & (behind >>> 4);
  back &= back >>> 4;
  behind |= back & (behind >>> 8);
  back &= back >>> 8;
  behind |= back & (behind >>> 16);
  return ahead | behind;
}

/** Share of the window's bell that lies in cells, each counted by its room, 0..1 and a little. */
export function shareOf(
  { i0, i1, j0, j1, across, upwards }: CellWindow,
  cells: Int32Array,
  room: CellRoom,
  nx: number,
): number {
  let share = 0;
  for (let j = j0; j <= j1; j++) {
    const word = cells[j - j0] ?? 0;
    if (word === 0) continue;
    const o = j * nx + i0;
    let row = 0;
    for (let i = 0; i <= i1 - i0; i++) if ((word >>> i) & 1) row += (across[i] ?? 0) * (room[o + i] ?? 0);
    share += row * (upwards[j - j0] ?? 0);
  }
  return share;
}
