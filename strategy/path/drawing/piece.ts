import type { Point } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentEnd, segmentStart } from '../segment.ts';

/** A connected piece of drawing, m. */
export type Piece = { readonly segments: readonly Segment[]; readonly layer: string };

/** First and last point of a piece. */
export function pieceEnds({ segments }: Piece): [Point, Point] {
  const first = segments[0];
  const last = segments.at(-1);
  if (!first || !last) throw new RangeError('a piece without segments has no ends');
  return [segmentStart(first), segmentEnd(last)];
}
