import type { PlateField } from '../../heat/plate/index.ts';
import { plateField } from '../../heat/plate/index.ts';
import { choose } from './choose.ts';
import type { PlateWay } from './own-ways.ts';
import type { OldHeat, PlateModel, PlateState, WayJudged } from './plate-model.ts';
import { plateModel } from './plate-model.ts';
import type { PreparedPlate } from './prepared.ts';
import type { Schedule } from './schedule.ts';
import { scheduledHeat, scheduleOf } from './schedule.ts';

/** What was decided leg by leg, the cut that it makes, and the plate's heat while that is cut. */
export type DecidedPlate = {
  readonly ways: readonly WayJudged<PlateWay>[];
  readonly before: readonly PlateState<PlateWay>[];
  readonly model: PlateModel<PlateWay>;
  readonly schedule: Schedule;
  readonly field: PlateField;
  /** How often the plate's heat was computed. */
  readonly fields: number;
};

/** A share of the work that is done, 0..1. Answering false ends it. */
export type PlanProgress = (share: number) => boolean | undefined;

/** The plan was given up by whoever asked for it. */
export class PlatePlanCancelled extends Error {
  override name = 'PlatePlanCancelled';
}

/** The plate's heat is computed at most so often; from the second time but one on what was chosen is kept where it can be. */
const mostFields = 4;
const freeFields = 2;
/** Corners ahead that a dearer way is tried with. */
const ahead = 8;
/** Waits that differ by less are the same, s: the heat they leave differs by less than the field is sure of. */
const sameWait = 0.02;

/**
 * The treatments of a plate's cut: decided in the order of cutting with the heat of what is cut before, on a field of the plate for the treatments of the time before,
 * until the field is that of the treatments. First on no field at all, with the heat of the last while alone. What would go on changing is settled by keeping what was
 * chosen where it keeps every limit.
 */
export function decidedPlate(prepared: PreparedPlate, progress?: PlanProgress): DecidedPlate {
  const { request, legs, context, properties, box } = prepared;
  const { plateTemperature, thickness, ambient, lossCoefficient, plate } = request;
  const going = (share: number): void => {
    if (progress?.(Math.min(1, share)) === false) throw new PlatePlanCancelled('the plan was given up');
  };
  const pass = (old: OldHeat | null, held?: readonly WayJudged<PlateWay>[]) => {
    const model = plateModel<PlateWay>({
      legs: legs.legs,
      corners: prepared.corners,
      limit: context.limit,
      ignition: request.rules.burnBack?.ignition ?? Infinity,
      plateTemperature,
      properties,
      plate: box,
      old,
      ahead,
      ...(held ? { held } : {}),
    });
    return { model, ...choose(model) };
  };
  const fieldFor = (ways: readonly WayJudged<PlateWay>[], schedule: Schedule): PlateField =>
    plateField({
      plate: box,
      ...(plate && !('min' in plate) ? { shape: 'edge' in plate ? plate : { edge: plate, openings: [] } } : {}),
      thickness,
      plateTemperature,
      ...(ambient === undefined ? {} : { ambient }),
      ...(lossCoefficient === undefined ? {} : { lossCoefficient }),
      properties,
      ...scheduledHeat(legs, ways, schedule),
      until: prepared.duration + schedule.late,
    });

  let chosen = pass(null);
  for (let fields = 1; ; fields++) {
    going(fields / (mostFields + 1));
    const schedule = scheduleOf(legs, chosen.ways);
    const field = fieldFor(chosen.ways, schedule);
    const next = pass({ field, ...schedule }, fields > freeFields ? chosen.ways : undefined);
    const settled = next.ways.every((way, k) => same(way, chosen.ways[k]));
    chosen = next;
    if (!settled && fields < mostFields) continue;
    going(1);
    const { model, ways, before } = chosen;
    return { model, ways, before, schedule: scheduleOf(legs, ways), field, fields };
  }
}

const same = (a: WayJudged<PlateWay>, b: WayJudged<PlateWay> | undefined): boolean =>
  a.way === b?.way && Math.abs(a.wait - b.wait) < sameWait;
