/** A place or a vector in the drawing's plane, m. */
export type Point = { readonly x: number; readonly y: number };

/** An axis-aligned rectangle, m. */
export type Box = { readonly minX: number; readonly minY: number; readonly maxX: number; readonly maxY: number };

/** Sum of two vectors. */
export const pointAdd = (a: Point, b: Point): Point => ({ x: a.x + b.x, y: a.y + b.y });

/** Vector from b to a. */
export const pointSubtract = (a: Point, b: Point): Point => ({ x: a.x - b.x, y: a.y - b.y });

/** The vector times a factor. */
export const pointScale = (a: Point, factor: number): Point => ({ x: a.x * factor, y: a.y * factor });

/** Scalar product. */
export const pointDot = (a: Point, b: Point): number => a.x * b.x + a.y * b.y;

/** Third component of the vector product; positive when b lies counter-clockwise of a. */
export const pointCross = (a: Point, b: Point): number => a.x * b.y - a.y * b.x;

/** Length of the vector. Plain, since Math.hypot takes ten times as long and no place of a plate overflows a square. */
export const pointLength = (a: Point): number => Math.sqrt(a.x * a.x + a.y * a.y);

/** Distance between two places, m. */
export function pointDistance(a: Point, b: Point): number {
  const [dx, dy] = [a.x - b.x, a.y - b.y];
  return Math.sqrt(dx * dx + dy * dy);
}

/** The vector turned counter-clockwise by `angle` rad about the origin. */
export function pointRotate(a: Point, angle: number): Point {
  const c = Math.cos(angle);
  const s = Math.sin(angle);
  return { x: c * a.x - s * a.y, y: s * a.x + c * a.y };
}

/** The vector turned counter-clockwise by a right angle: the left side of a direction of travel. */
export const pointLeft = (a: Point): Point => ({ x: -a.y, y: a.x });

/** Unit vector in the same direction. Throws RangeError for the zero vector. */
export function pointUnit(a: Point): Point {
  const length = pointLength(a);
  if (!(length > 0)) throw new RangeError(`vector (${a.x}, ${a.y}) has no direction`);
  return { x: a.x / length, y: a.y / length };
}

/** The smallest box that holds both. */
export function boxUnion(a: Box, b: Box): Box {
  return {
    minX: Math.min(a.minX, b.minX),
    minY: Math.min(a.minY, b.minY),
    maxX: Math.max(a.maxX, b.maxX),
    maxY: Math.max(a.maxY, b.maxY),
  };
}

/** The box that holds nothing: neutral for boxUnion. */
export const emptyBox: Box = { minX: Infinity, minY: Infinity, maxX: -Infinity, maxY: -Infinity };

/** The box widened by `by` m on every side. */
export const boxGrow = (box: Box, by: number): Box => ({
  minX: box.minX - by,
  minY: box.minY - by,
  maxX: box.maxX + by,
  maxY: box.maxY + by,
});
