import type { LinkCut } from './kerf-links.ts';
import type { PlateGrid } from './plate-grid.ts';

/** The rectangle of cells that heat has come to: columns `i0..i1`, rows `j0..j1`, both included; empty while i1 < i0. */
export type Warm = { i0: number; i1: number; j0: number; j1: number };

/** Conducts heat over a grid, step by step of equal length. Holds what it needs for that; `rise` is the temperature rise of the cells, K. */
export type Conduction = {
  readonly rise: Float64Array;
  readonly warm: Warm;
  /** One step on. */
  step(): void;
  /** From now on no heat goes this way. */
  cut(link: LinkCut): void;
};

/** A cell at the border of the warm rectangle that is warmer than this lets it grow, K. */
const warmth = 1e-10;
/** Cells by which it grows. */
const growth = 4;

/**
 * Conduction over the grid in steps of `time` s: each step goes over the rows and then over the columns, the next the other way round, by Crank and Nicolson's rule with
 * the mass of the compact scheme (1 + δ²/12), which makes it of fourth order in the cell and second in the step wherever no kerf is near (Mitchell and
 * Fairweather, Numer. Math. 6 (1964) 285). Ways that are cut carry nothing; whatever is cut, the heat of all cells together stays the same.
 * Needs α·time/cell² above 1/4 in both directions: throws RangeError below.
 */
export function conductionOver(grid: PlateGrid, alpha: number, time: number): Conduction {
  const { nx, ny, cellX, cellY } = grid;
  const rise = new Float64Array(nx * ny);
  const warm: Warm = { i0: nx, i1: -1, j0: ny, j1: -1 };
  const rows = direction(rise.length, 1, nx, (alpha * time) / (cellX * cellX));
  const columns = direction(rise.length, nx, ny, (alpha * time) / (cellY * cellY));
  for (let j = 0; j < ny; j++) rows.factor(j * nx);
  for (let i = 0; i < nx; i++) columns.factor(i);
  const late = { rows: new Set<number>(), columns: new Set<number>() };
  const swept = new Float64Array(nx * ny);
  const line = new Float64Array(nx);
  let rowsFirst = true;

  const alongRows = (): void => {
    const { ahead, pivot, gain } = rows;
    const { i0, i1, j0, j1 } = warm;
    const keep = 1 + gain;
    let j = j0;
    // four rows at a time: each sum waits for the one before it, four don't wait for each other
    for (; j + 3 <= j1; j += 4) {
      const [o0, o1, o2, o3] = [j * nx, (j + 1) * nx, (j + 2) * nx, (j + 3) * nx];
      let [y0, y1, y2, y3] = [0, 0, 0, 0];
      let [a0, a1, a2, a3] = [0, 0, 0, 0];
      for (let i = i0; i <= i1; i++) {
        y0 = (rise[o0 + i] ?? 0) + a0 * y0;
        y1 = (rise[o1 + i] ?? 0) + a1 * y1;
        y2 = (rise[o2 + i] ?? 0) + a2 * y2;
        y3 = (rise[o3 + i] ?? 0) + a3 * y3;
        a0 = ahead[o0 + i] ?? 0;
        a1 = ahead[o1 + i] ?? 0;
        a2 = ahead[o2 + i] ?? 0;
        a3 = ahead[o3 + i] ?? 0;
        swept[o0 + i] = y0;
        swept[o1 + i] = y1;
        swept[o2 + i] = y2;
        swept[o3 + i] = y3;
      }
      y0 = y1 = y2 = y3 = 0;
      for (let i = i1; i >= i0; i--) {
        y0 = (swept[o0 + i] ?? 0) * (pivot[o0 + i] ?? 0) + (ahead[o0 + i] ?? 0) * y0;
        y1 = (swept[o1 + i] ?? 0) * (pivot[o1 + i] ?? 0) + (ahead[o1 + i] ?? 0) * y1;
        y2 = (swept[o2 + i] ?? 0) * (pivot[o2 + i] ?? 0) + (ahead[o2 + i] ?? 0) * y2;
        y3 = (swept[o3 + i] ?? 0) * (pivot[o3 + i] ?? 0) + (ahead[o3 + i] ?? 0) * y3;
        rise[o0 + i] = keep * y0 - gain * (rise[o0 + i] ?? 0);
        rise[o1 + i] = keep * y1 - gain * (rise[o1 + i] ?? 0);
        rise[o2 + i] = keep * y2 - gain * (rise[o2 + i] ?? 0);
        rise[o3 + i] = keep * y3 - gain * (rise[o3 + i] ?? 0);
      }
    }
    for (; j <= j1; j++) {
      const o = j * nx;
      let y = 0;
      let a = 0;
      for (let i = i0; i <= i1; i++) {
        y = (rise[o + i] ?? 0) + a * y;
        a = ahead[o + i] ?? 0;
        swept[o + i] = y;
      }
      y = 0;
      for (let i = i1; i >= i0; i--) {
        y = (swept[o + i] ?? 0) * (pivot[o + i] ?? 0) + (ahead[o + i] ?? 0) * y;
        rise[o + i] = keep * y - gain * (rise[o + i] ?? 0);
      }
    }
  };

  const alongColumns = (): void => {
    const { ahead, pivot, gain } = columns;
    const { i0, i1, j0, j1 } = warm;
    const keep = 1 + gain;
    for (let i = i0; i <= i1; i++) swept[j0 * nx + i] = rise[j0 * nx + i] ?? 0;
    for (let j = j0 + 1; j <= j1; j++) {
      const o = j * nx;
      for (let k = o + i0; k <= o + i1; k++) swept[k] = (rise[k] ?? 0) + (ahead[k - nx] ?? 0) * (swept[k - nx] ?? 0);
    }
    line.fill(0);
    for (let j = j1; j >= j0; j--) {
      const o = j * nx;
      for (let i = i0; i <= i1; i++) {
        const k = o + i;
        const y = (swept[k] ?? 0) * (pivot[k] ?? 0) + (ahead[k] ?? 0) * (line[i] ?? 0);
        line[i] = y;
        rise[k] = keep * y - gain * (rise[k] ?? 0);
      }
    }
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
    warm,
    step() {
      for (const row of late.rows) rows.factor(row * nx);
      for (const column of late.columns) columns.factor(column);
      late.rows.clear();
      late.columns.clear();
      if (warm.i1 < warm.i0) return;
      grow();
      if (rowsFirst) alongRows();
      alongColumns();
      if (!rowsFirst) alongRows();
      rowsFirst = !rowsFirst;
    },
    cut({ index, upwards }) {
      (upwards ? columns : rows).closed[index] = 1;
      if (upwards) late.columns.add(index % nx);
      else late.rows.add(Math.floor(index / nx));
    },
  };
}

/**
 * One direction's tridiagonal systems (1 − cδ²), c = (r − 1/6)/2, each as L·D·Lᵀ: `ahead` of a cell is the share it hands to the next, `pivot` 1/D. A step is
 * (1 + gain)·(1 − cδ²)⁻¹ − gain with gain = (r + 1/6)/(r − 1/6), which is (1 − cδ²)⁻¹·(1 + (r + 1/6)/2·δ²) without a product of its own.
 */
function direction(cells: number, stride: number, count: number, r: number) {
  if (!(r > 0.25)) throw new RangeError(`step of ${r} cells² of spread is outside (0.25, ∞)`);
  const c = (r - 1 / 6) / 2;
  const ahead = new Float64Array(cells);
  const pivot = new Float64Array(cells);
  const closed = new Uint8Array(cells);
  const factor = (first: number): void => {
    let before = 0;
    let handed = 0;
    for (let k = 0, at = first; k < count; k++, at += stride) {
      const after = k < count - 1 && closed[at] === 0 ? c : 0;
      const diagonal = 1 + before + after - before * handed;
      handed = after / diagonal;
      ahead[at] = handed;
      pivot[at] = 1 / diagonal;
      before = after;
    }
  };
  return { ahead, pivot, closed, factor, gain: (r + 1 / 6) / (r - 1 / 6) };
}
