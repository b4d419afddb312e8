import Flatbush from 'flatbush';
import type { Contour } from '../contour.ts';
import { segmentMeetings } from '../distance.ts';
import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import { segmentBox, segmentEnd, segmentStart } from '../segment.ts';

/** Crossings returned at most, and pairs of segments tried at most: what is found after that many would add nothing. */
const most = 100;
const mostPairs = 1_000_000;

/** Places where segments of the contours cross, m; ends that touch within `tolerance` m are no crossing. */
export function contourCrossings(contours: readonly Contour[], tolerance: number): Point[] {
  const segments = contours.flatMap((c) => c.segments);
  if (segments.length === 0) return [];
  const index = new Flatbush(segments.length);
  const boxes = segments.map(segmentBox);
  for (const box of boxes) index.add(box.minX, box.minY, box.maxX, box.maxY);
  index.finish();
  const found: Point[] = [];
  let pairs = 0;
  for (let i = 0; i < segments.length && found.length < most && pairs < mostPairs; i++) {
    const [a, box] = [segments[i], boxes[i]];
    if (!a || !box) continue;
    for (const k of index.search(box.minX, box.minY, box.maxX, box.maxY, (other) => other > i)) {
      const b = segments[k];
      if (!b) continue;
      pairs++;
      const ends = [segmentStart(a), segmentEnd(a), segmentStart(b), segmentEnd(b)];
      found.push(...segmentMeetings(a, b).filter((p) => ends.every((end) => pointDistance(end, p) > tolerance)));
    }
  }
  return found.slice(0, most);
}
