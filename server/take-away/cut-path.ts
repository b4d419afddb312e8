import type { PlannedCorner } from '../../shared/corner-plans.ts';
import { segmentEnd, segmentStart, type Segment } from '../../strategy/path/segment.ts';
import { leadInNeeded } from '../../strategy/pierce/index.ts';
import type { CornerInsert, CutPathRequest } from '../../strategy/path/compensation/index.ts';
import type { TakenPlan } from './repository.ts';

/** Up to a tip of some 11° the path runs on to the meeting of both edges' paths, where loops and dwells begin; beyond, round it. */
const sharpLimit = 10;

const roleNames = { outer: 'outline', hole: 'hole', island: 'island' } as const;

/** What a cut path follows from. */
export type CutSource = {
  readonly plan: Pick<TakenPlan['plan'], 'corners'>;
  readonly planned: TakenPlan['planned'];
  readonly revision: Pick<TakenPlan['revision'], 'content' | 'prediction'>;
};

/** What a stored plan asks of the cut path: its contours in their order, what its corners got, its strategy's kerf and pierce, its plate. */
export function cutPathRequestOf({ plan, planned, revision }: CutSource): CutPathRequest {
  const { cut, cornerRules } = revision.content;
  return {
    contours: planned.contours.map(({ id, role, parent, segments, said }) => ({
      id,
      name: said ?? `${roleNames[role]} ${id}`,
      role,
      parent,
      contour: { segments },
    })),
    inserts: plan.corners.flatMap((corner) => insertsOf(corner, cut.kerfWidth / 2)),
    kerfWidth: cut.kerfWidth,
    outside: { kind: 'sharp', limit: sharpLimit },
    leadIn: {
      shape: { kind: 'line' },
      needed: leadInLengthOf(revision),
      craterRadius: revision.prediction.craterRadius,
      clearance: cornerRules.loop.clearance,
    },
    plate: plateOf(planned.plate),
  };
}

function plateOf(plate: TakenPlan['planned']['plate']): CutPathRequest['plate'] {
  if (!('min' in plate)) return plate;
  return { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y };
}

/** What a corner puts into the path `beside` m from the finished edge, and the stretch of it that is eased. */
function insertsOf(
  { id, contourId, treatment, loop, dwell, ease, round }: PlannedCorner,
  beside: number,
): CornerInsert[] {
  const index = cornerIndex(id, contourId);
  if (treatment === 'loop' && loop !== null) {
    return [{ contourId, index, name: `the loop of corner ${id}`, kind: 'path', as: 'loop', segments: loop.segments }];
  }
  if (treatment === 'dwell' && dwell !== null) {
    return [{ contourId, index, name: `the dwell of corner ${id}`, kind: 'dwell', duration: dwell }];
  }
  if (treatment === 'round' && round) {
    const segments = round.finished.map((arc) => arcBeside(arc, beside));
    return [{ contourId, index, name: `the round of corner ${id}`, kind: 'path', as: 'contour', segments }];
  }
  const [first, last] = [ease?.segments[0], ease?.segments.at(-1)];
  if (treatment === 'ease' && ease && first && last) {
    const { before, after, feedShare, powerShare } = ease;
    const [from, to] = [segmentStart(first), segmentEnd(last)];
    const name = `the ease of corner ${id}`;
    return [{ contourId, index, name, kind: 'ease', from, to, before, after, feedShare, powerShare }];
  }
  return [];
}

/** The path's arc beside a finished one, on its right: the part is on the left of travel. */
function arcBeside(finished: Segment, beside: number): Segment {
  if (finished.kind === 'line') throw new Error('a round is an arc');
  return { ...finished, radius: finished.radius + Math.sign(finished.sweep) * beside };
}

/** As the planner names a corner: by its contour and the segment that starts there. */
export const cornerId = (contourId: string, index: number | ''): string => `c${contourId}-${index}`;

function cornerIndex(id: string, contourId: string): number {
  const start = cornerId(contourId, '');
  const index = id.startsWith(start) ? Number(id.slice(start.length)) : Number.NaN;
  if (!Number.isInteger(index)) throw new Error(`corner ${id} is not one of contour ${contourId}`);
  return index;
}

/** As the strategy's own check says; by the crater alone where the plate is too hot for any, or its heat was not kept. */
function leadInLengthOf({ prediction }: CutSource['revision']): number {
  const { craterRadius, heatPerThickness, routineTime, hot } = prediction;
  const needed = leadInNeeded({
    craterRadius,
    heat: { perLength: heatPerThickness ?? 0, duration: routineTime },
    plateTemperature: hot.plateTemperature,
  });
  if (needed.kind === 'ok') return needed.length;
  const onColdPlate = leadInNeeded({
    craterRadius,
    heat: { perLength: 0, duration: routineTime },
    plateTemperature: 293.15,
  });
  if (onColdPlate.kind === 'none') throw new Error(onColdPlate.why);
  return onColdPlate.length;
}
