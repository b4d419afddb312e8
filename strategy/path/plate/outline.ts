import type { Contour } from '../contour.ts';
import { contourArea, contourBox, contourShift } from '../contour.ts';
import type { Box } from '../point.ts';
import { lineBetween } from '../segment.ts';
import type { PartContour } from './placement.ts';

/** What there is to cut from: its edge, and the openings that were cut into it before. Lower left corner of its box at the origin, m. */
export type PlateOutline = { readonly edge: Contour; readonly openings: readonly Contour[]; readonly box: Box };

/** The outline of a whole plate, m. Throws RangeError for a size that is not positive. */
export function plateRectangle(width: number, height: number): PlateOutline {
  if (!(width > 0 && height > 0)) throw new RangeError(`plate ${width} × ${height} m is outside (0, ∞)`);
  const corners = [
    { x: 0, y: 0 },
    { x: width, y: 0 },
    { x: width, y: height },
    { x: 0, y: height },
  ];
  return {
    edge: { segments: corners.map((corner, i) => lineBetween(corner, corners[(i + 1) % 4] ?? corner)) },
    openings: [],
    box: { minX: 0, minY: 0, maxX: width, maxY: height },
  };
}

/** The outline of a remnant as it was drawn: the largest outer contour, with its own holes as openings, m. None when nothing is closed. */
export function plateRemnant(contours: readonly PartContour[]): PlateOutline | null {
  const outer = contours
    .filter(({ role }) => role === 'outer')
    .map((one) => ({ ...one, area: Math.abs(contourArea(one.contour)) }))
    .reduce<(PartContour & { area: number }) | null>((most, one) => (most && most.area >= one.area ? most : one), null);
  if (!outer) return null;
  const { minX, minY, maxX, maxY } = contourBox(outer.contour);
  const by = { x: -minX, y: -minY };
  return {
    edge: contourShift(outer.contour, by),
    openings: contours.filter(({ parent }) => parent === outer.id).map(({ contour }) => contourShift(contour, by)),
    box: { minX: 0, minY: 0, maxX: maxX - minX, maxY: maxY - minY },
  };
}
