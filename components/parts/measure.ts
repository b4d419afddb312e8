import { pointDistance, segmentEnd, segmentStart, type Point, type Segment } from '@/strategy/path/index.ts';

export type SnapKind = 'corner' | 'end' | 'centre' | 'free';

/** A place that was meant by a tap: at something of the drawing, or where the finger was. */
export type Snap = { readonly at: Point; readonly kind: SnapKind };

type Shown = {
  readonly paths: readonly { readonly segments: readonly Segment[] }[];
  /** Planned corners. */
  readonly corners: readonly Point[];
};

/** Among places as near as this to each other the first kind counts, m. */
const samePlace = 1e-6;

/** What lies nearest to a place within a finger's reach, m: a planned corner, an end of a piece, the centre of an arc. Else the place itself. */
export function snapAt(place: Point, reach: number, { paths, corners }: Shown): Snap {
  let best: Snap = { at: place, kind: 'free' };
  let least = reach;
  const offer = (at: Point, kind: SnapKind) => {
    const distance = pointDistance(at, place);
    if (distance < least - samePlace) {
      least = distance;
      best = { at, kind };
    }
  };
  for (const corner of corners) offer(corner, 'corner');
  for (const { segments } of paths) {
    for (const segment of segments) {
      offer(segmentStart(segment), 'end');
      if (segment.kind === 'arc') offer(segment.centre, 'centre');
    }
    const last = segments.at(-1);
    if (last) offer(segmentEnd(last), 'end');
  }
  return best;
}

/** From one place to another: the distance, and how far across and up, m. */
export const measured = (from: Point, to: Point) => ({
  distance: pointDistance(from, to),
  dx: to.x - from.x,
  dy: to.y - from.y,
});
