import type { Point, Segment } from '@/strategy/path/index.ts';
import { svgPathData } from '@/strategy/path/index.ts';

/** Drawing units a metre of path text holds: millimetres keep three digits at a micrometre. */
const textScale = 1000;

/**
 * Where things stand on a drawn sheet. Marks are placed in px from the drawing's middle, which moving doesn't change; path texts are written once, in
 * their own unit, and enlarged by `zoom`.
 */
export type DrawingSpace = {
  /** px a metre. */
  readonly scale: number;
  /** px a unit of the path texts. */
  readonly zoom: number;
  /** px from the drawing's middle, y down. */
  readonly at: (place: Point) => Point;
  readonly write: (path: readonly Segment[]) => string;
};

/** Writes path texts about a drawing's middle. */
export const pathWriter =
  (origin: Point) =>
  (path: readonly Segment[]): string =>
    svgPathData(path, { scale: textScale, origin });

export const drawingSpace = (
  origin: Point,
  scale: number,
  write: (path: readonly Segment[]) => string,
): DrawingSpace => ({
  scale,
  zoom: scale / textScale,
  at: (place) => ({ x: (place.x - origin.x) * scale, y: (origin.y - place.y) * scale }),
  write,
});

/** The drawn sheet, px: twice as wide and as high as the frame around whose middle it lies, with the drawing's middle at `x` and `y` of it. */
export type DrawnSheet = { readonly width: number; readonly height: number; readonly x: number; readonly y: number };
