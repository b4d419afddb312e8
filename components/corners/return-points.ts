import type { CornerPlan, Treatment } from '@/shared/corner-plans.ts';
import type { PlateClock } from '@/strategy/motion/index.ts';
import { timeOfSegments } from '@/strategy/motion/index.ts';
import { pointDistance, segmentEnd, type Point } from '@/strategy/path/index.ts';

/** A corner as it stands in time and temperature. */
export type ReturnPoint = {
  readonly id: string;
  /** As it is counted on the screen, from 1. */
  readonly number: number;
  /** When the cut comes back to it, s. */
  readonly time: number;
  readonly untreated: number; // K
  readonly treated: number; // K
  readonly treatment: Treatment;
  readonly trouble: boolean;
};

/** Every corner whose return the cut's clock knows, in the order of time. */
export function returnPoints({ corners }: Pick<CornerPlan, 'corners'>, clock: PlateClock): readonly ReturnPoint[] {
  const ends = contourEnds(clock);
  return corners
    .flatMap(({ id, contourId, at, returnTime, untreated, treated, treatment, trouble }, i) => {
      const time = returnTime ?? timeNear(clock, ends.get(contourId) ?? [], at);
      return time === null
        ? []
        : [{ id, number: i + 1, time, untreated, treated, treatment, trouble: trouble !== null }];
    })
    .sort((a, b) => a.time - b.time || a.number - b.number);
}

type End = { readonly run: number; readonly segments: number; readonly at: Point };

/** Where the contours' own segments end on the path. */
function contourEnds({ runs }: PlateClock): ReadonlyMap<string, readonly End[]> {
  const found = new Map<string, End[]>();
  runs.forEach(({ contourId, segments, kinds }, run) => {
    const ends = found.get(contourId) ?? [];
    found.set(contourId, ends);
    segments.forEach((segment, i) => {
      if (kinds[i] !== 'lead-in') ends.push({ run, segments: i + 1, at: segmentEnd(segment) });
    });
  });
  return found;
}

/** The path runs beside the finished corner, by half the kerf and more at a sharp one, m. */
const beside = 5e-3;

/** When the path has last come by a corner, s; null when it never does. Not known in plans made before it was kept. */
function timeNear(clock: PlateClock, ends: readonly End[], at: Point): number | null {
  let nearest = beside;
  let found: End | null = null;
  for (const end of ends) {
    const distance = pointDistance(end.at, at);
    // of a loop's two passages through the corner the later counts
    if (distance > nearest + 1e-9) continue;
    nearest = distance;
    found = end;
  }
  return found && timeOfSegments(clock, found.run, found.segments);
}
