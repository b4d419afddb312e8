import type { Point } from '../point.ts';
import type { LayoutPart, Placement } from './placement.ts';
import { partSize } from './placement.ts';

/** Rows and columns of one part. */
export type PlacementArray = {
  readonly rows: number;
  readonly columns: number;
  /** Free width between the boxes of neighbours, m: beside each other and above each other. */
  readonly gap: Point;
  /** Lower left corner of the first, m. */
  readonly at: Point;
  readonly turn: number; // rad
  readonly mirrored: boolean;
  /** Every second one half a turn further, as the squares of a chessboard. */
  readonly alternate: boolean;
};

/**
 * The placements of an array, row by row from the lower left, numbered from `firstNumber`. Throws RangeError for rows or columns that are not
 * positive whole numbers and for a gap below 0.
 */
export function placementArray(part: LayoutPart, array: PlacementArray, firstNumber: number): Placement[] {
  const { rows, columns, gap, at, turn, mirrored, alternate } = array;
  for (const [what, count] of Object.entries({ rows, columns })) {
    if (!Number.isInteger(count) || count < 1) throw new RangeError(`${what} ${count} is no whole number from 1`);
  }
  if (!(gap.x >= 0 && gap.y >= 0)) throw new RangeError(`gap ${gap.x} × ${gap.y} m is outside [0, ∞)`);
  // half a turn further the box is as wide and as high
  const { width, height } = partSize(part, { turn, mirrored });
  return Array.from({ length: rows * columns }, (_, i) => {
    const [row, column] = [Math.floor(i / columns), i % columns];
    return {
      number: firstNumber + i,
      partId: part.id,
      at: { x: at.x + column * (width + gap.x), y: at.y + row * (height + gap.y) },
      turn: alternate && (row + column) % 2 === 1 ? turn + Math.PI : turn,
      mirrored,
    };
  });
}
