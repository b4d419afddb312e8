import type { Point } from '../path/point.ts';
import { pointDistance } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentEnd, segmentStart } from '../path/segment.ts';
import type { PlannedCorner } from './planned.ts';

/** What a planned corner puts into its contour's path. */
export type PlannedInsert = {
  readonly contourId: string;
  /** The corner stands at the start of this segment of the finished contour. */
  readonly index: number;
  /** How a sentence calls it: "the loop of corner c1-4". */
  readonly name: string;
} & (
  | {
      readonly kind: 'path';
      /** A loop, or a piece of the contour itself that replaces what lies between its ends. */
      readonly as: 'loop' | 'contour';
      /** From where it leaves the path to where it comes back: both the path's corner for the loop of a sharp corner. m */
      readonly segments: readonly Segment[];
    }
  /** The wait, s, with the beam off, and where: in the path's corner, or where the arc around a drawn fillet ends, m. */
  | { readonly kind: 'dwell'; readonly duration: number; readonly at: Point }
  /** The stretch of the path that is eased, m: how long into the corner and out of it, and to which shares of feed and mean power in it. */
  | {
      readonly kind: 'ease';
      readonly from: Point;
      readonly to: Point;
      readonly before: number;
      readonly after: number;
      readonly feedShare: number;
      readonly powerShare: number;
    }
);

/**
 * The pieces of path, m, or the wait, s, that the treatment of a corner puts into its contour's path, or the stretch of it that an ease cuts more slowly; null
 * for a corner that is left.
 */
export function cornerInsert(corner: PlannedCorner): PlannedInsert | null {
  const { id, contourId, index, loop, dwell, ease, round, drawn, pathPoint } = corner;
  const named = { contourId, index, name: `the ${corner.treatment} of corner ${id}` };
  if (loop) {
    const into = drawn && pointDistance(drawn.from, pathPoint) > 0 ? [lineBetween(drawn.from, pathPoint)] : [];
    const outOf = drawn && pointDistance(drawn.to, pathPoint) > 0 ? [lineBetween(pathPoint, drawn.to)] : [];
    return { ...named, kind: 'path', as: 'loop', segments: [...into, ...loop.segments, ...outOf] };
  }
  if (round) return { ...named, kind: 'path', as: 'contour', segments: [round.onPath] };
  const [first, last] = [ease?.pieces[0], ease?.pieces.at(-1)];
  if (ease && first && last) {
    const { before, after, feedShare, powerShare } = ease;
    const [from, to] = [segmentStart(first.segment), segmentEnd(last.segment)];
    return { ...named, kind: 'ease', from, to, before, after, feedShare, powerShare };
  }
  return dwell ? { ...named, kind: 'dwell', duration: dwell.duration, at: drawn?.to ?? pathPoint } : null;
}
