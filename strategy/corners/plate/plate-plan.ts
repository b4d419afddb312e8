import { ignitionThreshold } from '../../heat/burn-back.ts';
import type { Candidate, CornerOption } from '../case.ts';
import type { PlannedCorner } from '../planned.ts';
import { plannedCorner } from '../planned.ts';
import type { CornerPlanTotals } from '../totals.ts';
import { totalsOf } from '../totals.ts';
import { planCorner } from '../plan.ts';
import { bestAlone } from './choose.ts';
import type { OrderQuestion, OrderSuggestion } from './order.ts';
import { orderSuggestions } from './order.ts';
import type { PlateWay } from './own-ways.ts';
import type { DecidedPlate, PlanProgress } from './passes.ts';
import { decidedAgain, decidedPlate } from './passes.ts';
import type { PlacedWay, WayJudged } from './plate-model.ts';
import { loopsNear } from './plate-model.ts';
import type { PlateCorner, PlatePlanRequest, PreparedPlate } from './prepared.ts';
import { isWay, preparedAgain, preparedPlate } from './prepared.ts';
import type { Schedule } from './schedule.ts';
import type { Limits, RunnerUp } from './tell.ts';
import { candidateOn, runnerUpOf, told } from './tell.ts';

/** A corner with what the plate's own heat does to it. */
export type PlateCornerPlan = Omit<PlannedCorner, 'options'> & {
  /** Temperature of the plate at the measuring place when the cut comes back, of all that was cut before the corner's own edge, K; null where no cut comes to it. */
  readonly background: number | null;
  /** When cutting along the second edge begins, s from the start of the cut; null likewise. */
  readonly returnTime: number | null;
  /** Hottest at the measuring place afterwards, K, and how deep inside the finished tip the ignition threshold is passed, m; null for a notch. */
  readonly peak: number | null;
  readonly burnBack: number | null;
  readonly runnerUp: RunnerUp;
  readonly options: readonly PlateOption[];
};

export type PlateOption = CornerOption & { readonly peak: number | null; readonly burnBack: number | null };

export type PlatePlanTotals = CornerPlanTotals & {
  /** K; null when there is no corner. */
  readonly highestBackground: number | null;
  /** K and m; null when there is no tip. */
  readonly hottestPeak: number | null;
  readonly deepestBurnBack: number | null;
  /** Mean of the plate when the cut ends, K. */
  readonly meanPlateTemperature: number;
  /** When the last cut ends, s. */
  readonly cutTime: number;
};

export type PlatePlan = {
  /** The straight edge on the plate as it comes and the excess allowed over it, K. It does not rise with the heat of the cut. */
  readonly limit: number;
  /** In the order of the contours asked for. */
  readonly corners: readonly PlateCornerPlan[];
  readonly totals: PlatePlanTotals;
};

/**
 * The corner plan of a whole cut in its order and in time: as `cornerPlan`, on the plate as everything cut before has warmed it, K, s and m.
 *
 * Fewest corners over a limit first, then the least added time; where nothing keeps a corner under its limits it gets what leaves it least over. The limit is that
 * of the plate as it comes: what the cut itself warms is judged, not forgiven. Deterministic.
 */
export function platePlan(request: PlatePlanRequest, progress?: PlanProgress): PlatePlan {
  return keptPlan(request, progress).plan;
}

/** A plan with what it was decided from, to plan again from. */
export type KeptPlan = {
  readonly plan: PlatePlan;
  readonly prepared: PreparedPlate;
  readonly decided: DecidedPlate;
  readonly told: readonly ToldCorner[];
};

/** As `platePlan`, the plan kept with what it was decided from: tens of MB for thousands of corners. */
export function keptPlan(request: PlatePlanRequest, progress?: PlanProgress): KeptPlan {
  const prepared = preparedPlate(request);
  const decided = decidedPlate(prepared, progress);
  return { ...toldPlan(prepared, decided), prepared, decided };
}

/**
 * The plan of the same cut with other treatments asked for, K, s and m: what `platePlan` decides from scratch, from the heat that the kept plan was decided on as long as
 * the cut stays within a hundredth of its time, and the kept plan itself when nothing else is asked for. What a few other treatments leave as it was is neither computed nor told again. Throws as
 * `platePlan`. Deterministic.
 */
export function planAgain(kept: KeptPlan, overrides: PlatePlanRequest['overrides'], progress?: PlanProgress): KeptPlan {
  const { prepared, changed } = preparedAgain(kept.prepared, overrides);
  if (changed.length === 0) return kept;
  const others = new Set(changed);
  const first = prepared.legs.legs.findIndex(({ corner }) => others.has(corner));
  const decided = decidedAgain(prepared, kept.decided, first < 0 ? prepared.legs.legs.length + 1 : first, progress);
  return { ...toldPlan(prepared, decided, kept), prepared, decided };
}

/** The plan with other orders of its cut that come back later to what is hot; as `platePlan` and `orderSuggestions`. */
export function platePlanWithOrders(
  request: PlatePlanRequest,
  question: OrderQuestion,
  progress?: PlanProgress,
): { readonly plan: PlatePlan; readonly orders: readonly OrderSuggestion[] } {
  const prepared = preparedPlate(request);
  const decided = decidedPlate(prepared, progress);
  return { plan: planOf(prepared, decided), orders: orderSuggestions(prepared, decided, question) };
}

/** The plan of what was decided, told. */
export const planOf = (prepared: PreparedPlate, decided: DecidedPlate): PlatePlan => toldPlan(prepared, decided).plan;

/** A corner as it was told, and what it was told of. */
type ToldCorner = {
  readonly of: PlateCorner;
  readonly judged: readonly WayJudged<PlateWay>[];
  readonly loops: readonly PlacedWay<PlateWay>[];
  readonly plan: PlateCornerPlan;
};

/** K and s below which nothing is told anew: what rounding leaves where the whole cut is later. */
const rounding = 1e-6;

const sameJudged = (a: WayJudged<PlateWay>, b: WayJudged<PlateWay> | undefined): boolean =>
  a === b ||
  (b !== undefined &&
    a.way === b.way &&
    a.over > 0 === b.over > 0 &&
    Math.abs(a.wait - b.wait) < rounding &&
    Math.abs(a.returnsAt - b.returnsAt) < rounding &&
    Math.abs(a.background - b.background) < rounding);

const sameLoop = (a: PlacedWay<PlateWay>, b: PlacedWay<PlateWay> | undefined): boolean =>
  a === b || (b !== undefined && a.corner === b.corner && a.way === b.way);

const allSame = <T>(a: readonly T[], b: readonly T[], same: (x: T, y: T | undefined) => boolean): boolean =>
  a === b || (a.length === b.length && a.every((x, i) => same(x, b[i])));

function toldPlan(
  prepared: PreparedPlate,
  decided: DecidedPlate,
  known?: KeptPlan,
): { readonly plan: PlatePlan; readonly told: readonly ToldCorner[] } {
  const { request, context, legs, duration } = prepared;
  const { ways, schedule } = decided;
  const limits: Limits = { limit: context.limit, plateTemperature: request.plateTemperature, rules: request.rules };
  const legOf = new Map(legs.legs.map(({ corner }, k) => [corner, k]));
  const told = prepared.corners.map((corner, i): ToldCorner => {
    const k = legOf.get(i);
    const chosen = k === undefined ? undefined : ways[k];
    const state = k === undefined ? undefined : decided.before[k];
    const judged = k === undefined || !chosen ? [] : [chosen, ...(decided.open[k] ?? [])];
    const loops = state && corner.near.size > 0 ? loopsNear(state, corner.near) : [];
    const before = known?.told[i];
    if (before?.of === corner && allSame(judged, before.judged, sameJudged) && allSame(loops, before.loops, sameLoop))
      return k === undefined || !chosen
        ? before
        : { ...before, plan: cutAt(before.plan, returnTimeOf(schedule, k, chosen)) };
    // a contour that can't be cut warms nothing and is come to never
    const plan =
      k === undefined || !chosen ? uncut(corner, prepared) : cornerOf(corner, k, chosen, prepared, decided, limits);
    return { of: corner, judged, loops, plan };
  });
  const corners = told.map(({ plan }) => plan);
  const cutTime = duration + schedule.late;
  const plan: PlatePlan = {
    limit: context.limit,
    corners,
    totals: {
      ...totalsOf(corners, request),
      highestBackground: greatest(corners, ({ background }) => background),
      hottestPeak: greatest(corners, ({ peak }) => peak),
      deepestBurnBack: greatest(corners, ({ burnBack }) => burnBack),
      meanPlateTemperature: decided.meanAtEnd,
      cutTime,
    },
  };
  return { plan, told };
}

/** When cutting along a corner's second edge begins, s. */
const returnTimeOf = ({ arrives }: Schedule, k: number, { delay }: WayJudged<PlateWay>): number =>
  (arrives[k] ?? 0) + delay;

const cutAt = (plan: PlateCornerPlan, returnTime: number): PlateCornerPlan =>
  plan.returnTime === returnTime ? plan : { ...plan, returnTime };

const greatest = (corners: readonly PlateCornerPlan[], of: (corner: PlateCornerPlan) => number | null): number | null =>
  corners.reduce<number | null>((most, corner) => {
    const value = of(corner);
    return value === null ? most : Math.max(most ?? value, value);
  }, null);

/** What comes after a corner is come back to. */
function afterwards({ peaks, request }: PreparedPlate, { way, wait, returnsAt }: WayJudged<PlateWay>) {
  const tip = way.tip?.(wait);
  if (!tip) return { peak: null, burnBack: null };
  const ignition = request.rules.burnBack?.ignition ?? ignitionThreshold;
  return { peak: returnsAt + peaks.over(tip), burnBack: peaks.burnBack(tip, returnsAt, ignition) };
}

function cornerOf(
  corner: PlateCorner,
  k: number,
  chosen: WayJudged<PlateWay>,
  prepared: PreparedPlate,
  { model, open, before, schedule }: DecidedPlate,
  limits: Limits,
): PlateCornerPlan {
  const { request, context } = prepared;
  const { found, sharp, near, tried } = corner;
  const wanted = request.overrides?.[found.id];
  const state = before[k];
  const lookedAt = state !== undefined && (sharp || (wanted !== undefined && wanted !== 'leave'));
  const judged = open[k] ?? [chosen];
  // what was asked for, or needs nothing, was not compared when it was decided
  const every = lookedAt && judged.length === 1 ? [chosen, ...model.beside(k, state, chosen)] : judged;
  const refusals = lookedAt ? tried(loopsNear(state, near)).filter((one): one is Candidate => !isWay(one)) : [];
  const own = candidateOn(chosen, limits);
  const after: ReturnType<typeof afterwards>[] = [];
  const candidates = orderOfOptions.flatMap((treatment) => {
    const fitting =
      treatment === chosen.way.treatment ? chosen : bestOf(every.filter(({ way }) => way.treatment === treatment));
    const some = fitting
      ? [fitting === chosen ? own : candidateOn(fitting, limits)]
      : refusals.filter((one) => one.treatment === treatment);
    for (const _ of some) after.push(fitting ? afterwards(prepared, fitting) : { peak: null, burnBack: null });
    return some;
  });
  const leave = every.find(({ way }) => way.treatment === 'leave') ?? chosen;
  const { why, problem } = told(corner, chosen, candidates, every, wanted, limits);
  const planned = plannedCorner(found, { candidates, chosen: own, why, problem, without: leave.returnsAt }, context);
  return {
    ...planned,
    options: planned.options.map((option, i) => ({ ...option, peak: null, burnBack: null, ...after[i] })),
    ...afterwards(prepared, chosen),
    background: chosen.background,
    returnTime: returnTimeOf(schedule, k, chosen),
    runnerUp: runnerUpOf(chosen, every, candidates, limits),
  };
}

const orderOfOptions = ['leave', 'loop', 'dwell', 'ease', 'round'] as const;

/** Of several ways of one treatment, as loops of two shapes, the one that is best alone. */
const bestOf = (ways: readonly WayJudged<PlateWay>[]): WayJudged<PlateWay> | null =>
  ways.length > 0 ? bestAlone(ways) : null;

function uncut({ found }: PlateCorner, { context }: PreparedPlate): PlateCornerPlan {
  const { planned } = planCorner(found, context);
  const why = 'no cut comes to this corner: its contour is left out of the path';
  return {
    ...planned,
    problem: planned.problem ?? why,
    options: planned.options.map((option) => ({ ...option, peak: null, burnBack: null })),
    background: null,
    returnTime: null,
    peak: null,
    burnBack: null,
    runnerUp: { treatment: null, costsMore: null, why },
  };
}
