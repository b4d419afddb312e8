import type { Contour } from '../../path/contour.ts';
import { contourContains } from '../../path/contour.ts';
import type { Box, Point } from '../../path/point.ts';

/** Rows of equal cells that fill a box; cell (0, 0) in the lower left corner, row by row upwards. */
export type PlateGrid = {
  readonly minX: number; // m
  readonly minY: number; // m
  /** As asked, m. A whole number of cells fills the plate, so they are `cellX` by `cellY`, within a few per cent of it. */
  readonly cell: number;
  readonly cellX: number; // m
  readonly cellY: number; // m
  readonly nx: number;
  readonly ny: number;
};

/** What there is of the plate inside its box: its edge, and what was cut out of it before. */
export type PlateShape = { readonly edge: Contour; readonly openings: readonly Contour[] };

/** Cell of a plate that is large enough, m. */
const usualCell = 0.01;
/** Cells across a plate's shorter side that its field needs at least. */
const fewestAcross = 12;
/** Cells that a cell asked for must leave across the shorter side, and all in all. */
const fewestAsked = 4;
const mostCells = 1_000_000;

/**
 * The grid of a plate, cells as asked or 10 mm, smaller on plates that 12 of them don't fit across. Throws RangeError for a box or a cell that isn't
 * positive, for a plate smaller than `reach`, m (the distance heat spreads within a second: such a plate has one temperature), and for cells too large or too many.
 */
export function plateGrid(plate: Box, reach: number, asked?: number): PlateGrid {
  const width = plate.maxX - plate.minX;
  const height = plate.maxY - plate.minY;
  const shorter = Math.min(width, height);
  if (!(shorter > 0 && Number.isFinite(width) && Number.isFinite(height)))
    throw new RangeError(`plate ${width} × ${height} m is outside (0, ∞)`);
  if (shorter < reach)
    throw new RangeError(
      `plate ${width} × ${height} m is smaller than the ${reach.toPrecision(2)} m that heat spreads within a second: it has one temperature, not a field`,
    );
  if (asked !== undefined && !(asked > 0 && Number.isFinite(asked)))
    throw new RangeError(`cell ${asked} m is outside (0, ∞)`);
  if (asked !== undefined && asked * fewestAsked > shorter * (1 + 1e-9))
    throw new RangeError(
      `cell ${asked} m is outside (0, ${shorter / fewestAsked}] m: ${fewestAsked} must fit across the plate`,
    );
  const cell = asked ?? Math.min(usualCell, shorter / fewestAcross);
  const nx = Math.max(1, Math.round(width / cell));
  const ny = Math.max(1, Math.round(height / cell));
  if (nx * ny > mostCells)
    throw new RangeError(`${nx} × ${ny} cells of ${cell} m are more than ${mostCells}: ask for larger ones`);
  return { minX: plate.minX, minY: plate.minY, cell, cellX: width / nx, cellY: height / ny, nx, ny };
}

/** Middle of a cell, m. */
export const cellMiddle = ({ minX, minY, cellX, cellY }: PlateGrid, i: number, j: number): Point => ({
  x: minX + (i + 0.5) * cellX,
  y: minY + (j + 0.5) * cellY,
});

/** 1 for cells whose middle is steel, 0 for those outside the edge or in an opening. */
export function steelCells(grid: PlateGrid, { edge, openings }: PlateShape): Uint8Array {
  const steel = new Uint8Array(grid.nx * grid.ny);
  for (let j = 0; j < grid.ny; j++) {
    for (let i = 0; i < grid.nx; i++) {
      const middle = cellMiddle(grid, i, j);
      if (contourContains(edge, middle) && !openings.some((opening) => contourContains(opening, middle)))
        steel[j * grid.nx + i] = 1;
    }
  }
  return steel;
}
