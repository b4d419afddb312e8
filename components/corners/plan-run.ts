import type { CornerPlan } from '@/shared/corner-plans.ts';
import type { CutPath } from '@/strategy/path/cut-path.ts';
import { plateClock, timeOfLoop, type PlateClock } from '@/strategy/motion/index.ts';
import { segmentStart } from '@/strategy/path/index.ts';
import type { Dropped } from './run-layer.tsx';

/**
 * The cut of a plan in time, and what drops out when: the slug of each loop when the loop is cut, what a hole leaves when the hole is, and
 * the part itself when its outline is.
 */
export function planRun(
  { part, corners, cutting }: Pick<CornerPlan, 'part' | 'corners' | 'cutting'>,
  path: CutPath,
): { timeline: PlateClock; dropped: Dropped[] } {
  const timeline = plateClock(path, cutting);
  // a contour with necks is cut in pieces: it falls with the last of them
  const ends = new Map(timeline.runs.map(({ contourId, end }) => [contourId, end]));
  const dropped: Dropped[] = part.contours.flatMap(({ id, role, segments }) => {
    const time = ends.get(id);
    return time === undefined ? [] : [{ time, scrap: role === 'hole', segments }];
  });
  for (const { contourId, loop } of corners) {
    const first = loop?.segments[0];
    if (!loop || !first || loop.slug.length === 0) continue;
    const time = timeOfLoop(timeline, contourId, segmentStart(first), loop.segments.length);
    if (time !== null) dropped.push({ time, scrap: true, segments: loop.slug });
  }
  return { timeline, dropped: dropped.sort((a, b) => a.time - b.time) };
}
