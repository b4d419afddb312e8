import { contourContains } from '../contour.ts';
import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import { segmentStart } from '../segment.ts';
import type { PlacedContour, PlacedPart } from './placement.ts';

/** A change of the order, or why it can't be. */
export type OrderChange =
  { readonly kind: 'ok'; readonly order: readonly string[] } | { readonly kind: 'none'; readonly why: string };

const corner: Point = { x: 0, y: 0 };

/** Distances that differ by less are equal, m: rounding decides nothing. */
const tie = 1e-9;

/**
 * The computed cut order: ids of all contours. Part by part, each time the one whose first contour begins nearest to where the beam is, from the plate's
 * corner on; within a part what lies inside before what lies around it, holes before outlines, again the nearest next. A piece that lies in another's hole
 * comes before that one, whose hole falls out with it. Equal distances go by the number of the placement, then by the drawing.
 */
export function cutOrder(parts: readonly PlacedPart[], from: Point = corner): string[] {
  const holders = holdersOf(parts);
  const waiting = new Map(parts.map(({ number }) => [number, 0]));
  const holding = new Map<number, number[]>();
  for (const [number, hole] of holders) {
    waiting.set(hole.placement, (waiting.get(hole.placement) ?? 0) + 1);
    holding.set(number, [...(holding.get(number) ?? []), hole.placement]);
  }
  const begins = new Map(parts.map((part) => [part, firstContours(part).map(startOf)]));
  const left = new Set([...parts].sort((a, b) => a.number - b.number));
  const order: string[] = [];
  let at = from;
  while (left.size > 0) {
    let next: PlacedPart | null = null;
    let least = Infinity;
    for (const part of left) {
      if ((waiting.get(part.number) ?? 0) > 0) continue;
      let square = Infinity;
      for (const { x, y } of begins.get(part) ?? []) square = Math.min(square, (x - at.x) ** 2 + (y - at.y) ** 2);
      const distance = Math.sqrt(square);
      if (next && !(distance < least - tie)) continue;
      next = part;
      least = distance;
    }
    // pieces that hold each other can't be; then one that waits is as good as another
    next ??= [...left][0] ?? null;
    if (!next) break;
    left.delete(next);
    for (const holder of holding.get(next.number) ?? []) waiting.set(holder, (waiting.get(holder) ?? 0) - 1);
    for (const contour of contoursInOrder(next, at)) {
      order.push(contour.id);
      at = startOf(contour);
    }
  }
  return order;
}

/** Why an order is none for these parts: a contour is missing, named twice, unknown, or cut after the one around it. Null when it is right. */
export function cutOrderFault(parts: readonly PlacedPart[], order: readonly string[]): string | null {
  const contours = contoursOf(parts);
  const places = new Map(order.map((id, i) => [id, i]));
  const unknown = order.find((id) => !contours.has(id));
  if (unknown !== undefined) return `there is no contour ${unknown} on the plate`;
  if (places.size < order.length) return 'a contour stands in the order twice';
  const missing = [...contours.values()].find(({ id }) => !places.has(id));
  if (missing) return `${missing.name}, is missing`;
  for (const [id, before] of firstOf(parts)) {
    const late = before.find((one) => (places.get(one) ?? 0) > (places.get(id) ?? 0));
    if (late !== undefined) return mustComeFirst(contours, late, id);
  }
  return null;
}

/**
 * An order by hand after the parts have changed: what is left of it as it was, new contours after the rest in their computed order, and whatever lies inside
 * before what lies around it.
 */
export function cutOrderKept(parts: readonly PlacedPart[], wanted: readonly string[]): string[] {
  const contours = contoursOf(parts);
  const first = firstOf(parts);
  const order = new Set<string>();
  const take = (id: string) => {
    if (order.has(id)) return;
    for (const before of first.get(id) ?? []) take(before);
    order.add(id);
  };
  for (const id of wanted) if (contours.has(id)) take(id);
  for (const id of cutOrder(parts)) take(id);
  return [...order];
}

/** The order with one contour a place earlier (−1) or later (+1). */
export function contourMoved(
  parts: readonly PlacedPart[],
  order: readonly string[],
  id: string,
  by: -1 | 1,
): OrderChange {
  const i = order.indexOf(id);
  const other = order[i + by];
  if (i < 0 || other === undefined) return { kind: 'none', why: by < 0 ? 'it is the first' : 'it is the last' };
  const moved = [...order];
  moved[i] = other;
  moved[i + by] = id;
  return checked(parts, moved);
}

/** The order with all contours of a part before those of the part that ends before it (−1), or after those of the part that ends after it (+1). */
export function partMoved(
  parts: readonly PlacedPart[],
  order: readonly string[],
  placement: number,
  by: -1 | 1,
): OrderChange {
  const sequence = partSequence(order);
  const i = sequence.indexOf(placement);
  const other = sequence[i + by];
  if (i < 0 || other === undefined) return { kind: 'none', why: by < 0 ? 'it is the first' : 'it is the last' };
  const [own, rest] = [order.filter(isOf(placement)), order.filter((id) => !isOf(placement)(id))];
  const place = by < 0 ? rest.findIndex(isOf(other)) : rest.map(placementOf).lastIndexOf(other) + 1;
  return checked(parts, [...rest.slice(0, place), ...own, ...rest.slice(place)]);
}

/** Numbers of the placements in the order in which they are finished. */
export function partSequence(order: readonly string[]): number[] {
  const last = new Map<number, number>();
  order.forEach((id, i) => last.set(placementOf(id), i));
  return [...last].sort(([, a], [, b]) => a - b).map(([number]) => number);
}

/** Way without cutting, m: from the plate's corner to where the first contour begins, and from each to the next, before lead-ins. */
export function travelLength(parts: readonly PlacedPart[], order: readonly string[], from: Point = corner): number {
  const contours = contoursOf(parts);
  let at = from;
  let length = 0;
  for (const id of order) {
    const contour = contours.get(id);
    if (!contour) continue;
    const start = startOf(contour);
    length += pointDistance(at, start);
    at = start;
  }
  return length;
}

/** Where a contour begins, m; being closed it ends there too. The origin for one without segments. */
export function startOf({ contour }: Pick<PlacedContour, 'contour'>): Point {
  const first = contour.segments[0];
  return first ? segmentStart(first) : corner;
}

const placementOf = (id: string): number => Number(id.slice(0, id.indexOf('.')));
const isOf = (placement: number) => (id: string) => placementOf(id) === placement;
const contoursOf = (parts: readonly PlacedPart[]) =>
  new Map(parts.flatMap(({ contours }) => contours.map((contour) => [contour.id, contour] as const)));

function checked(parts: readonly PlacedPart[], order: readonly string[]): OrderChange {
  const why = cutOrderFault(parts, order);
  return why === null ? { kind: 'ok', order } : { kind: 'none', why };
}

const mustComeFirst = (contours: ReadonlyMap<string, PlacedContour>, inner: string, outer: string): string =>
  `${contours.get(inner)?.name ?? inner}, must be cut before the ${nameless(contours.get(outer))} around it falls out`;

const nameless = (contour: PlacedContour | undefined): string =>
  contour === undefined ? 'contour' : contour.role === 'outer' ? 'outline' : contour.role;

/** For each contour that has any: those that must be cut before it. */
function firstOf(parts: readonly PlacedPart[]): Map<string, string[]> {
  const first = new Map<string, string[]>();
  const add = (id: string, before: string) => {
    const known = first.get(id);
    if (known) known.push(before);
    else first.set(id, [before]);
  };
  for (const { contours } of parts) for (const { id, parent } of contours) if (parent !== null) add(parent, id);
  const known = new Map(parts.map((part) => [part.number, part]));
  for (const [number, hole] of holdersOf(parts)) {
    for (const { id, role } of known.get(number)?.contours ?? []) if (role === 'outer') add(hole.id, id);
  }
  return first;
}

/** For each piece that lies in a hole of another: the smallest such hole. */
function holdersOf(parts: readonly PlacedPart[]): Map<number, PlacedContour> {
  const holes = parts.flatMap(({ contours }) => contours.filter(({ role }) => role === 'hole'));
  const area = ({ box }: PlacedContour) => (box.maxX - box.minX) * (box.maxY - box.minY);
  const holders = new Map<number, PlacedContour>();
  for (const { number, box, contours } of parts) {
    const outline = contours.find(({ role }) => role === 'outer');
    if (!outline) continue;
    for (const hole of holes) {
      const held = hole.box;
      if (box.minX <= held.minX || box.maxX >= held.maxX || box.minY <= held.minY || box.maxY >= held.maxY) continue;
      const known = holders.get(number);
      if (hole.placement === number || (known && area(known) <= area(hole))) continue;
      if (contourContains(hole.contour, startOf(outline))) holders.set(number, hole);
    }
  }
  return holders;
}

/** Contours of the part that nothing lies in: with one of them it begins. Holes when there are any. */
function firstContours({ contours }: PlacedPart): readonly PlacedContour[] {
  const around = new Set(contours.map(({ parent }) => parent));
  const innermost = contours.filter(({ id }) => !around.has(id));
  const inside = innermost.filter(({ role }) => role !== 'outer');
  return inside.length > 0 ? inside : innermost;
}

function contoursInOrder({ contours }: PlacedPart, from: Point): PlacedContour[] {
  const inside = new Map<string, number>();
  for (const { parent } of contours) if (parent !== null) inside.set(parent, (inside.get(parent) ?? 0) + 1);
  const left = new Set(contours);
  const order: PlacedContour[] = [];
  let holesLeft = contours.filter(({ role }) => role !== 'outer').length;
  let at = from;
  while (left.size > 0) {
    let next: PlacedContour | null = null;
    let least = Infinity;
    for (const contour of left) {
      if ((inside.get(contour.id) ?? 0) > 0 || (contour.role === 'outer' && holesLeft > 0)) continue;
      const distance = pointDistance(at, startOf(contour));
      if (next && !(distance < least - tie)) continue;
      next = contour;
      least = distance;
    }
    if (!next) break; // contours that lie in each other are no reading of a drawing
    left.delete(next);
    order.push(next);
    at = startOf(next);
    if (next.role !== 'outer') holesLeft--;
    if (next.parent !== null) inside.set(next.parent, (inside.get(next.parent) ?? 0) - 1);
  }
  return order;
}
