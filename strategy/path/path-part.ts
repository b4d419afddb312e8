import type { Segment } from './segment.ts';
import { pathLength, segmentLength, segmentPart } from './segment.ts';

/** The pieces of a path between two lengths from its start, m; cut to what the path has. */
export function pathPart(path: readonly Segment[], from: number, to: number): Segment[] {
  const pieces: Segment[] = [];
  let start = 0;
  for (const segment of path) {
    const length = segmentLength(segment);
    const low = Math.max(0, from - start);
    const high = Math.min(length, to - start);
    start += length;
    if (!(high > low)) continue;
    pieces.push(low === 0 && high === length ? segment : segmentPart(segment, low / length, high / length));
  }
  return pieces;
}

/** The path without its last `length` m. */
export const pathWithoutLast = (path: readonly Segment[], length: number): Segment[] =>
  pathPart(path, 0, pathLength(path) - length);
