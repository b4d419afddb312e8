import type { PlateField } from '../../heat/plate/index.ts';
import { plateField } from '../../heat/plate/index.ts';
import { roomTemperature, usualLoss } from '../../heat/plate/plate-question.ts';
import type { PlateProperties } from '../../heat/properties.ts';
import { diffusionLength, diffusivity } from '../../heat/properties.ts';
import { plateCoolingTime } from '../../heat/surface-loss.ts';
import { contourBox } from '../../path/contour.ts';
import type { Box } from '../../path/point.ts';
import { boxGrow, boxUnion, emptyBox } from '../../path/point.ts';
import type { Chosen } from './choose.ts';
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
  /** What was open at each corner, and what was done before it. */
  readonly open: readonly (readonly WayJudged<PlateWay>[])[];
  readonly before: readonly PlateState<PlateWay>[];
  readonly model: PlateModel<PlateWay>;
  readonly schedule: Schedule;
  readonly field: PlateField;
  /** The cut that the field was computed for. */
  readonly heat: OldHeat;
  /** Whether what was chosen before was held to where it could be. */
  readonly held: boolean;
  /** How often the plate's heat was computed. */
  readonly fields: number;
  /** Mean temperature of the whole plate when the cut ends, K. */
  readonly meanAtEnd: number;
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
/**
 * Share of the cut's time by which its treatments may change all in all without the plate's heat being computed again. What was cut lately counts as it was decided
 * anyway; of older heat a second more or less is some tenths of a kelvin.
 */
const sameCut = 1e-2;

/**
 * The treatments of a plate's cut: decided in the order of cutting with the heat of what is cut before, on a field of the plate for the treatments of the time before,
 * until the field is that of the treatments. First on no field at all, with the heat of the last while alone. What would go on changing is settled by keeping what was
 * chosen where it keeps every limit.
 */
export function decidedPlate(prepared: PreparedPlate, progress?: PlanProgress): DecidedPlate {
  return settled(prepared, passFor(prepared)(null), progress);
}

/**
 * The treatments once more when corners from leg `changed` on ask for something else than when `kept` was decided: on its field as long as the cut stays the one that was
 * computed for, by the same measure as between two passes; what is decided before the changed corners come into sight stays.
 */
export function decidedAgain(
  prepared: PreparedPlate,
  kept: DecidedPlate,
  changed: number,
  progress?: PlanProgress,
): DecidedPlate {
  going(progress, 0);
  // what is held to where it can be is decided anew as a whole: what was free before may be held no more
  const from = kept.held ? 0 : Math.max(0, changed - ahead);
  const chosen = passFor(prepared)(kept.heat, undefined, kept, from);
  if (changedBy(chosen, kept.heat) > sameCut * prepared.duration) return settled(prepared, chosen, progress);
  going(progress, 1);
  const { field, heat, meanAtEnd } = kept;
  return {
    ...chosen,
    schedule: scheduleOf(prepared.legs, chosen.ways),
    field,
    heat,
    held: false,
    fields: 0,
    meanAtEnd,
  };
}

function going(progress: PlanProgress | undefined, share: number): void {
  if (progress?.(Math.min(1, share)) === false) throw new PlatePlanCancelled('the plan was given up');
}

type Pass = Chosen<WayJudged<PlateWay>, PlateState<PlateWay>> & { readonly model: PlateModel<PlateWay> };

/** By how much treatments were changed all in all, s. */
const changedBy = ({ ways }: Pass, { addedTime }: Pick<OldHeat, 'addedTime'>): number =>
  ways.reduce((sum, way, k) => sum + Math.abs(way.addedTime - (addedTime[k] ?? 0)), 0);

/** One choice at all corners, or at those `from` on, on a field's heat. */
function passFor(prepared: PreparedPlate) {
  const { request, legs, context, properties } = prepared;
  const box = heatedBox(prepared);
  return (
    old: OldHeat | null,
    held?: readonly WayJudged<PlateWay>[],
    known?: Chosen<WayJudged<PlateWay>, PlateState<PlateWay>>,
    from?: number,
  ): Pass => {
    const model = plateModel<PlateWay>({
      legs: legs.legs,
      corners: prepared.corners,
      limit: context.limit,
      ignition: request.rules.burnBack?.ignition ?? Infinity,
      plateTemperature: request.plateTemperature,
      properties,
      plate: box,
      old,
      ahead,
      ...(held ? { held } : {}),
    });
    return { model, ...choose(model, known, from) };
  };
}

/** Choices and fields by turns from a choice on, until the field is that of the choice. */
function settled(prepared: PreparedPlate, first: Pass, progress?: PlanProgress): DecidedPlate {
  const { request, legs, properties } = prepared;
  const { plateTemperature, thickness, ambient, lossCoefficient, plate } = request;
  const box = heatedBox(prepared);
  const pass = passFor(prepared);
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
      ...(request.kerfsStayOpen === false ? { kerfs: [] } : {}),
      until: prepared.duration + schedule.late,
      ...cellOf(box, prepared.duration),
    });

  let chosen = first;
  for (let fields = 1; ; fields++) {
    going(progress, fields / (mostFields + 1));
    const schedule = scheduleOf(legs, chosen.ways);
    const field = fieldFor(chosen.ways, schedule);
    const heat: OldHeat = { field, settled: settledAfter(field, properties), ...schedule };
    const held = fields > freeFields;
    chosen = pass(heat, held ? chosen.ways : undefined);
    if (changedBy(chosen, heat) > sameCut * prepared.duration && fields < mostFields) continue;
    going(progress, 1);
    const meanAtEnd = meanOf(prepared, box, field, prepared.duration + schedule.late);
    return { ...chosen, schedule: scheduleOf(legs, chosen.ways), field, heat, held, fields, meanAtEnd };
  }
}

/** Beyond so many times the length over which heat spreads in a cut, √(4αt), the plate is cold. */
const coldBeyond = 3;

/** The plate as far as the cut can warm it: a part lies in a skeleton that may be much larger. */
function heatedBox({ box, request: { contours, plate }, properties, duration }: PreparedPlate): Box {
  if (contours.length === 0 || (plate !== null && !('min' in plate))) return box;
  // treatments may make the cut longer, seldom twice as long
  const reach = coldBeyond * diffusionLength(properties, 2 * duration + 60);
  const cut = boxGrow(
    contours.reduce((all, { contour }) => boxUnion(all, contourBox(contour)), emptyBox),
    reach,
  );
  return {
    minX: Math.max(box.minX, Math.min(cut.minX, box.maxX)),
    minY: Math.max(box.minY, Math.min(cut.minY, box.maxY)),
    maxX: Math.min(box.maxX, Math.max(cut.maxX, box.minX)),
    maxY: Math.min(box.maxY, Math.max(cut.maxY, box.minY)),
  };
}

const areaOf = ({ minX, minY, maxX, maxY }: Box): number => (maxX - minX) * (maxY - minY);

/**
 * Area times duration, m² s, up to which a field takes its own cell of 10 mm: a plate of 4 × 2.5 m and a cut of 20 minutes. Beyond, its cells grow with the fourth root, so that the work
 * (cells times steps, as the cell to the power −4) grows no faster than the plate.
 */
const usualWork = 12_000;
const usualCell = 0.01;

function cellOf(box: Box, duration: number): { readonly cell?: number } {
  const work = areaOf(box) * duration;
  return work > usualWork ? { cell: usualCell * (work / usualWork) ** 0.25 } : {};
}

/** Least age, s, from which on heat is read from the grid; and the variance, in cells², that it then has when it was laid and is read. */
const leastSettled = 16;
const readVariance = 2.5;

function settledAfter({ grid: { cellX, cellY } }: PlateField, properties: PlateProperties): number {
  return Math.max(leastSettled, (readVariance * Math.max(cellX, cellY) ** 2) / (2 * diffusivity(properties)));
}

/** Mean of the whole plate, K, at a time of the field, which may be of a part of it. */
function meanOf({ box: whole, request, properties }: PreparedPlate, box: Box, field: PlateField, time: number): number {
  const { plateTemperature, thickness, ambient = roomTemperature, lossCoefficient = usualLoss } = request;
  const cooling = lossCoefficient > 0 ? time / plateCoolingTime(thickness, lossCoefficient, properties) : 0;
  const cold = ambient + (plateTemperature - ambient) * Math.exp(-cooling);
  return cold + ((field.mean(time) - cold) * areaOf(box)) / areaOf(whole);
}
