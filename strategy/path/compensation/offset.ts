import type { Contour } from '../contour.ts';
import { contourArea, contourReverse } from '../contour.ts';
import type { Segment } from '../segment.ts';
import { segmentReverse } from '../segment.ts';
import type { OutsideCorner, ParallelPiece, PathSource } from './parallel.ts';
import { contourParallels, joinedSegments } from './parallel.ts';
import { trimParallels } from './trim.ts';

export type OffsetRule = {
  readonly outside: OutsideCorner;
  /** Corners, by the segment that starts there, which stay sharp however far their meeting place lies: something is put on them. */
  readonly sharpAt?: ReadonlySet<number>;
};

/** A closed path beside a contour; `sources` says for each segment where it comes from. */
export type OffsetLoop = { readonly contour: Contour; readonly sources: readonly PathSource[] };

/** Joints may be open by this share of the distance. */
const openJoint = 1e-2;

/** Where an odd contour leaves the pieces without partners, a distance this little different has them: shares tried in this order. */
const nudges = [0, 1e-7, -1e-7, 5e-7, -5e-7];

/**
 * The paths at `distance` m on the right of a contour, into the scrap when the part lies on its left; into the part when the distance is negative. Lines
 * stay lines and arcs stay arcs, exact to rounding. There is one path as a rule, none when everything is narrower than twice the distance, and several where
 * only necks are. They keep the contour's direction; what a neck shuts off outside an outline runs the other way round. Edges that happen to lie
 * nearer than the distance to others have no path beside them.
 *
 * Throws RangeError for a contour that is empty, open, without area or with a segment without length, for one that crosses itself so that no path closes
 * beside it, and for a distance that is not finite.
 */
export function contourOffset(contour: Contour, distance: number, rule: OffsetRule): OffsetLoop[] {
  const loops = offsetLoops(contour, distance, rule);
  if (loops) return loops;
  throw new RangeError(
    `no path at ${distance} m beside a contour of ${contour.segments.length} segments: it crosses itself`,
  );
}

/** As `contourOffset`; null, where that throws, for a contour that crosses itself so that its path does not close. */
export function offsetLoops(contour: Contour, distance: number, rule: OffsetRule): OffsetLoop[] | null {
  if (!Number.isFinite(distance)) throw new RangeError(`distance ${distance} m is not finite`);
  if (rule.outside.kind === 'sharp' && !(rule.outside.limit >= 1)) {
    throw new RangeError(`limit ${rule.outside.limit} of sharp corners is below 1`);
  }
  if (contour.segments.length === 0) throw new RangeError('a contour without segments has no offset');
  if (distance === 0) {
    return [{ contour, sources: contour.segments.map((_, index) => ({ kind: 'edge', index }) as const) }];
  }
  if (distance < 0) return otherSide(contour, -distance, rule);
  const segments = joinedSegments(contour, openJoint * distance);
  const area = contourArea({ segments });
  if (!(area !== 0)) throw new RangeError(`the contour encloses ${area} m²`);
  for (const nudge of nudges) {
    const by = distance * (1 + nudge);
    const parallels = contourParallels(segments, by, rule.outside, rule.sharpAt);
    const loops = trimParallels(segments, area > 0, parallels, by);
    if (loops) return loops.map(loopOf);
  }
  return null;
}

/** Half a kerf into the scrap: the middle of the kerf that leaves the contour as the finished edge. Part on the left of travel. */
export const kerfOffset = (contour: Contour, kerfWidth: number, rule: OffsetRule): OffsetLoop[] => {
  if (!(kerfWidth > 0)) throw new RangeError(`kerf width ${kerfWidth} m is outside (0, ∞)`);
  return contourOffset(contour, kerfWidth / 2, rule);
};

const loopOf = ({ pieces }: { readonly pieces: readonly ParallelPiece[] }): OffsetLoop => ({
  contour: { segments: pieces.map(({ segment }) => segment) },
  sources: pieces.map(({ source }) => source),
});

/** The same seen from the contour's other side: travelled the other way, segment i is segment n − 1 − i and its start is the end of that. */
function otherSide(contour: Contour, distance: number, rule: OffsetRule): OffsetLoop[] | null {
  const n = contour.segments.length;
  const edge = (index: number) => n - 1 - index;
  const corner = (index: number) => (n - index) % n;
  const sharpAt = rule.sharpAt && new Set([...rule.sharpAt].map(corner));
  const loops = offsetLoops(contourReverse(contour), distance, { ...rule, ...(sharpAt ? { sharpAt } : {}) });
  return (
    loops &&
    loops.map(({ contour: { segments }, sources }) => ({
      contour: { segments: segments.map((s): Segment => segmentReverse(s)).reverse() },
      sources: sources
        .map(({ kind, index }): PathSource => ({ kind, index: kind === 'edge' ? edge(index) : corner(index) }))
        .reverse(),
    }))
  );
}
