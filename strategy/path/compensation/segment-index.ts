import Flatbush from 'flatbush';
import type { Nearest } from '../distance.ts';
import { segmentDistance } from '../distance.ts';
import { boxGrow } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentBox } from '../segment.ts';

/** Segments that something must keep away from, found by their boxes. `T` is what a finding is told by. */
export type SegmentIndex<T> = {
  readonly items: readonly { readonly segment: Segment; readonly of: T }[];
  readonly boxes: Flatbush | null;
};

/** An index of segments. */
export function segmentIndex<T>(items: readonly { readonly segment: Segment; readonly of: T }[]): SegmentIndex<T> {
  if (items.length === 0) return { items, boxes: null };
  const boxes = new Flatbush(items.length);
  for (const { segment } of items) {
    const box = segmentBox(segment);
    boxes.add(box.minX, box.minY, box.maxX, box.maxY);
  }
  boxes.finish();
  return { items, boxes };
}

/** The indexed segment nearest to another, or null when none is nearer than `least` m. `counts` leaves some out. */
export function nearestWithin<T>(
  { items, boxes }: SegmentIndex<T>,
  segment: Segment,
  least: number,
  counts: (of: T) => boolean = () => true,
): (Nearest & { readonly of: T }) | null {
  const box = boxGrow(segmentBox(segment), least);
  let best: (Nearest & { readonly of: T }) | null = null;
  for (const i of boxes?.search(box.minX, box.minY, box.maxX, box.maxY) ?? []) {
    const item = items[i];
    if (!item || !counts(item.of)) continue;
    const found = segmentDistance(segment, item.segment);
    if (found.distance < (best?.distance ?? least)) best = { ...found, of: item.of };
  }
  return best;
}

/** An indexed segment nearer to another than `least` m, or null when there is none: the first that is met, not the nearest. */
export function anyWithin<T>(
  { items, boxes }: SegmentIndex<T>,
  segment: Segment,
  least: number,
  counts: (of: T) => boolean = () => true,
): (Nearest & { readonly of: T }) | null {
  const box = boxGrow(segmentBox(segment), least);
  for (const i of boxes?.search(box.minX, box.minY, box.maxX, box.maxY) ?? []) {
    const item = items[i];
    if (!item || !counts(item.of)) continue;
    const found = segmentDistance(segment, item.segment);
    if (found.distance < least) return { ...found, of: item.of };
  }
  return null;
}
