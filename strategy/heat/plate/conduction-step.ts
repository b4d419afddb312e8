import type { CellRoom, LinkCut } from './kerf-links.ts';
import { roomGiven } from './kerf-links.ts';
import type { PlateGrid } from './plate-grid.ts';

/** The rectangle of cells that heat has come to: columns `i0..i1`, rows `j0..j1`, both included; empty while i1 < i0. */
export type Warm = { i0: number; i1: number; j0: number; j1: number };

/** Conducts heat over a grid, step by step of equal length. Holds what it needs for that; `rise` is the temperature rise of the cells, K. */
export type Conduction = {
  readonly rise: Float64Array;
  /** What a cell holds per kelvin, in whole cells. */
  readonly room: CellRoom;
  readonly warm: Warm;
  /** Heat comes to cells: the warm rectangle takes them in, with room about them. */
  warmed(cells: Warm): void;
  /** One step on. */
  step(): void;
  /** From now on no heat goes this way. */
  cut(link: LinkCut): void;
};

/** A cell at the border of the warm rectangle that is warmer than this lets it grow, K. */
const warmth = 1e-10;
/** Cells by which it grows. */
const growth = 8;
/** Steps between two looks at the border: heat crosses fewer cells in a step than the border has room. */
const lookEvery = 4;

/**
 * Conduction over the grid in steps of `time` s: each step goes over the rows and then over the columns, the next the other way round, by Crank and Nicolson's rule with
 * the mass of the compact scheme (1 + δ²/12), which makes it of fourth order in the cell and second in the step wherever no kerf is near (Mitchell and
 * Fairweather, Numer. Math. 6 (1964) 285). Ways that are cut carry nothing; whatever is cut, the heat of all cells together stays the same,
 * but for the share `fade` to which every rise falls with each step.
 * Needs α·time/cell² above 1/4 in both directions: throws RangeError below.
 */
export function conductionOver(grid: PlateGrid, alpha: number, time: number, fade: number): Conduction {
  const { nx, ny, cellX, cellY } = grid;
  const rise = new Float64Array(nx * ny);
  const room = new Float64Array(nx * ny).fill(1);
  const warm: Warm = { i0: nx, i1: -1, j0: ny, j1: -1 };
  const rows = direction(room, 1, nx, (alpha * time) / (cellX * cellX));
  const columns = direction(room, nx, ny, (alpha * time) / (cellY * cellY));
  for (let j = 0; j < ny; j++) rows.factor(j * nx);
  for (let i = 0; i < nx; i++) columns.factor(i);
  const lateRows = new Uint8Array(ny);
  const lateColumns = new Uint8Array(nx);
  const swept = new Float64Array(4 * Math.max(nx, ny));
  let rowsFirst = true;
  let steps = 0;

  /** Room goes from one cell to another with the heat that is in it. */
  const hand = (from: number, to: number, given: number): void => {
    const had = room[to] ?? 0;
    rise[to] = (had * (rise[to] ?? 0) + given * (rise[from] ?? 0)) / (had + given);
    room[to] = had + given;
    room[from] = (room[from] ?? 0) - given;
  };

  const grow = (): void => {
    const { i0, i1, j0, j1 } = warm;
    const warmRow = (j: number): boolean => {
      for (let i = i0; i <= i1; i++) if (Math.abs(rise[j * nx + i] ?? 0) > warmth) return true;
      return false;
    };
    const warmColumn = (i: number): boolean => {
      for (let j = j0; j <= j1; j++) if (Math.abs(rise[j * nx + i] ?? 0) > warmth) return true;
      return false;
    };
    if (i0 > 0 && warmColumn(i0)) warm.i0 = Math.max(0, i0 - growth);
    if (i1 < nx - 1 && warmColumn(i1)) warm.i1 = Math.min(nx - 1, i1 + growth);
    if (j0 > 0 && warmRow(j0)) warm.j0 = Math.max(0, j0 - growth);
    if (j1 < ny - 1 && warmRow(j1)) warm.j1 = Math.min(ny - 1, j1 + growth);
  };

  return {
    rise,
    room,
    warm,
    warmed({ i0, i1, j0, j1 }) {
      warm.i0 = Math.min(warm.i0, Math.max(0, i0 - growth));
      warm.i1 = Math.max(warm.i1, Math.min(nx - 1, i1 + growth));
      warm.j0 = Math.min(warm.j0, Math.max(0, j0 - growth));
      warm.j1 = Math.max(warm.j1, Math.min(ny - 1, j1 + growth));
    },
    step() {
      for (let j = 0; j < ny; j++) if (lateRows[j]) rows.factor(j * nx);
      for (let i = 0; i < nx; i++) if (lateColumns[i]) columns.factor(i);
      lateRows.fill(0);
      lateColumns.fill(0);
      if (warm.i1 < warm.i0) return;
      if (steps++ % lookEvery === 0) grow();
      const { i0, i1, j0, j1 } = warm;
      const corner = j0 * nx + i0;
      const alongRows = () => sweep(rise, room, swept, rows, corner, nx, j1 - j0 + 1, 1, i1 - i0 + 1, 1);
      if (rowsFirst) alongRows();
      sweep(rise, room, swept, columns, corner, 1, i1 - i0 + 1, nx, j1 - j0 + 1, fade);
      if (!rowsFirst) alongRows();
      rowsFirst = !rowsFirst;
    },
    cut(link) {
      const { index, upwards } = link;
      (upwards ? columns : rows).closed[index] = 1;
      const next = index + (upwards ? nx : 1);
      const given = roomGiven(room, link, nx);
      if (given > 0) hand(next, index, given);
      else if (given < 0) hand(index, next, -given);
      for (const cell of [index, next]) {
        lateColumns[cell % nx] = 1;
        lateRows[Math.floor(cell / nx)] = 1;
      }
    },
  };
}

/**
 * One direction's tridiagonal systems (R − cδ²), R the room of the cells and c = (r − 1/6)/2, each as L·D·Lᵀ: `ahead` of a cell is the share it hands to the next, `pivot` 1/D. A step is
 * (1 + gain)·(R − cδ²)⁻¹R − gain with gain = (r + 1/6)/(r − 1/6), which is (R − cδ²)⁻¹·(R + (r + 1/6)/2·δ²) without a product of its own.
 */
function direction(room: CellRoom, stride: number, count: number, r: number) {
  if (!(r > 0.25)) throw new RangeError(`step of ${r} cells² of spread is outside (0.25, ∞)`);
  const c = (r - 1 / 6) / 2;
  const ahead = new Float64Array(room.length);
  const pivot = new Float64Array(room.length);
  const closed = new Uint8Array(room.length);
  const factor = (first: number): void => {
    let before = 0;
    let handed = 0;
    for (let k = 0, at = first; k < count; k++, at += stride) {
      const after = k < count - 1 && closed[at] === 0 ? c : 0;
      const diagonal = (room[at] ?? 0) + before + after - before * handed;
      handed = after / diagonal;
      ahead[at] = handed;
      pivot[at] = 1 / diagonal;
      before = after;
    }
  };
  return { ahead, pivot, closed, factor, gain: (r + 1 / 6) / (r - 1 / 6) };
}

/**
 * One step along `lines` lines of `count` cells each, `across` and `along` apart in the arrays, the first from `corner` on: down the line L, up it D and Lᵀ. Four lines at
 * a time: in a line each sum waits for the one before it, four lines don't wait for each other, and of columns four lie in one piece of memory.
 */
function sweep(
  rise: Float64Array,
  room: CellRoom,
  swept: Float64Array,
  { ahead, pivot, gain }: ReturnType<typeof direction>,
  corner: number,
  across: number,
  lines: number,
  along: number,
  count: number,
  fade: number,
): void {
  const keep = (1 + gain) * fade;
  const less = gain * fade;
  let line = 0;
  for (; line + 3 < lines; line += 4) {
    let o0 = corner + line * across;
    let o1 = o0 + across;
    let o2 = o1 + across;
    let o3 = o2 + across;
    let [y0, y1, y2, y3] = [0, 0, 0, 0];
    let [a0, a1, a2, a3] = [0, 0, 0, 0];
    let at = 0;
    for (let k = 0; k < count; k++) {
      y0 = (rise[o0] ?? 0) * (room[o0] ?? 0) + a0 * y0;
      y1 = (rise[o1] ?? 0) * (room[o1] ?? 0) + a1 * y1;
      y2 = (rise[o2] ?? 0) * (room[o2] ?? 0) + a2 * y2;
      y3 = (rise[o3] ?? 0) * (room[o3] ?? 0) + a3 * y3;
      a0 = ahead[o0] ?? 0;
      a1 = ahead[o1] ?? 0;
      a2 = ahead[o2] ?? 0;
      a3 = ahead[o3] ?? 0;
      swept[at] = y0;
      swept[at + 1] = y1;
      swept[at + 2] = y2;
      swept[at + 3] = y3;
      at += 4;
      o0 += along;
      o1 += along;
      o2 += along;
      o3 += along;
    }
    y0 = y1 = y2 = y3 = 0;
    for (let k = 0; k < count; k++) {
      at -= 4;
      o0 -= along;
      o1 -= along;
      o2 -= along;
      o3 -= along;
      y0 = (swept[at] ?? 0) * (pivot[o0] ?? 0) + (ahead[o0] ?? 0) * y0;
      y1 = (swept[at + 1] ?? 0) * (pivot[o1] ?? 0) + (ahead[o1] ?? 0) * y1;
      y2 = (swept[at + 2] ?? 0) * (pivot[o2] ?? 0) + (ahead[o2] ?? 0) * y2;
      y3 = (swept[at + 3] ?? 0) * (pivot[o3] ?? 0) + (ahead[o3] ?? 0) * y3;
      rise[o0] = keep * y0 - less * (rise[o0] ?? 0);
      rise[o1] = keep * y1 - less * (rise[o1] ?? 0);
      rise[o2] = keep * y2 - less * (rise[o2] ?? 0);
      rise[o3] = keep * y3 - less * (rise[o3] ?? 0);
    }
  }
  for (; line < lines; line++) {
    let o = corner + line * across;
    let y = 0;
    let a = 0;
    for (let k = 0; k < count; k++, o += along) {
      y = (rise[o] ?? 0) * (room[o] ?? 0) + a * y;
      a = ahead[o] ?? 0;
      swept[k] = y;
    }
    y = 0;
    for (let k = count - 1; k >= 0; k--) {
      o -= along;
      y = (swept[k] ?? 0) * (pivot[o] ?? 0) + (ahead[o] ?? 0) * y;
      rise[o] = keep * y - less * (rise[o] ?? 0);
    }
  }
}
