import { createHash } from 'node:crypto';
import type { z } from 'zod';
import type { CornerPlan, cornerPlanEndpoints, PlannedCorner } from '../../shared/corner-plans.ts';
import type { Prediction, StrategyContent } from '../../shared/strategies.ts';
import {
  cornerInsert,
  keptPlan,
  planAgain,
  platePlan,
  platePlanWithOrders,
  type KeptPlan,
  type PlateCornerPlan,
  type PlatePlan,
  type PlatePlanRequest,
} from '../../strategy/corners/index.ts';
import type { MachineProfile, Nozzle } from '../../strategy/machine.ts';
import { cutPathOf } from '../../strategy/path/compensation/index.ts';
import { cutOrderFault } from '../../strategy/path/plate/index.ts';
import { oxygenMassFlow, PIERCE_DEFAULTS } from '../../strategy/pierce/index.ts';
import { cutPathRequestOf } from '../take-away/cut-path.ts';
import { cuttingOf } from './cutting.ts';
import type { Planned } from './planned.ts';

/** What the programmer chose. */
export type Choices = Omit<z.output<NonNullable<(typeof cornerPlanEndpoints.redo)['body']>>, 'revisionId'>;

/** What is planned, and the strategy revision with what it runs on. */
export type PlanSource = {
  readonly planned: Planned;
  readonly content: StrategyContent;
  readonly prediction: Prediction;
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
};

/** What the planner decides from. */
export type PlanChoices = Pick<Choices, 'thickness' | 'plateTemperature' | 'overrides'>;

export type PlanAsked = { readonly source: PlanSource; readonly choices: PlanChoices };

/** The corners as they are kept and sent. */
export type PlannedPlate = Pick<CornerPlan, 'limit' | 'corners' | 'totals'>;

/**
 * The corners planned with a strategy's rules and cut on what plate there is, in their order and time. Takes seconds for thousands of corners: for a worker. Throws RangeError with
 * a sentence for what can't be planned.
 */
export const plannedPlate = ({ source, choices }: PlanAsked): PlannedPlate =>
  presentPlate({ source, choices }, ordered(planRequestOf(source, choices), source.planned));

/** Corners up to which a plan is kept: some 15 kB each, of the 384 MB that a worker has. */
const mostKept = 6000;

/**
 * As `plannedPlate`, which keeps the last plan with what it was decided from: asked again with other treatments for the same plate, only what they change is planned anew. One plan
 * is kept, and let go before another plate is planned.
 */
export function platePlanner(): (asked: PlanAsked) => PlannedPlate {
  let last: { readonly asked: string; readonly kept: KeptPlan } | null = null;
  return ({ source, choices }) => {
    if (triesOrders(source.planned)) return plannedPlate({ source, choices });
    const asked = createHash('sha256')
      .update(JSON.stringify([source, { ...choices, overrides: null }]))
      .digest('base64');
    const before = last?.asked === asked ? last.kept : null;
    last = null;
    const kept = before ? planAgain(before, choices.overrides) : keptPlan(planRequestOf(source, choices));
    if (kept.plan.corners.length <= mostKept) last = { asked, kept };
    return presentPlate({ source, choices }, { plan: kept.plan, orders: [] });
  };
}

/** A plan as it is kept and sent. */
function presentPlate({ source, choices }: PlanAsked, { plan, orders }: Ordered): PlannedPlate {
  const { content, nozzle } = source;
  const chosen = new Set(Object.keys(choices.overrides));
  return {
    limit: plan.limit,
    corners: plan.corners.map((corner) => presentCorner(corner, chosen)),
    totals: {
      ...presentTotals(
        plan,
        oxygenMassFlow(nozzle.diameter, content.cut.oxygenPressure, PIERCE_DEFAULTS.dischargeCoefficient),
      ),
      orderSuggestions: orders.map(({ order, ...one }) => ({ ...one, order: [...order] })),
    },
  };
}

/** Corners up to which other orders are tried: each is planned whole. */
const mostForOrders = 600;

/** Whether other orders are tried: those of a layout that isn't too large. */
const triesOrders = ({ layout, placed, contours }: Planned): boolean =>
  layout !== null &&
  placed !== null &&
  contours.reduce((sum, { segments }) => sum + segments.length, 0) <= mostForOrders;

type Ordered = ReturnType<typeof platePlanWithOrders>;

/** The plan, of a layout with orders that would spare treatments; the order of a part's contours follows from how they lie in each other. */
function ordered(request: PlatePlanRequest, planned: Planned): Ordered {
  const { placed } = planned;
  if (!placed || !triesOrders(planned)) return { plan: platePlan(request), orders: [] };
  return platePlanWithOrders(request, {
    pieceOf: (contourId) => contourId.slice(0, contourId.indexOf('.')),
    allowed: (order) => cutOrderFault(placed, order) === null,
  });
}

/** What the planner is asked. */
export function planRequestOf(
  { planned, content, prediction, profile, nozzle }: PlanSource,
  { thickness, plateTemperature, overrides }: PlanChoices,
): PlatePlanRequest {
  const cutting = cuttingOf(content, profile, { thickness, plateTemperature, nozzle });
  // where each contour begins when no corner gets anything: a loop may push its pierce a little aside
  const untreated = cutPathRequestOf({ planned, plan: { corners: [] }, revision: { content, prediction } });
  return {
    contours: planned.contours.map(({ id, role, segments, said }) => ({
      id,
      role,
      contour: { segments },
      ...(said === undefined ? {} : { name: said }),
    })),
    plate: planned.plate,
    rules: content.cornerRules,
    cut: content.cut,
    profile: { axes: profile.axes, smallestArc: profile.smallestArc },
    thickness,
    plateTemperature,
    overrides,
    cutPath: cutPathOf(untreated).path,
    drive: cutting,
    pierceHeat: cutting.pierceHeat ?? 0,
    lossCoefficient: cutting.lossCoefficient,
  };
}

/** A computed corner as it is kept and sent; chosen are the ids of those that a person decided. */
export function presentCorner(corner: PlateCornerPlan, chosen: ReadonlySet<string>): PlannedCorner {
  const { loop, ease, round } = corner;
  const insert = cornerInsert(corner);
  return {
    id: corner.id,
    contourId: corner.contourId,
    at: corner.point,
    angle: corner.angle,
    convex: corner.convex,
    treatment: corner.treatment,
    why: corner.why,
    chosenBy: chosen.has(corner.id) ? 'person' : 'rule',
    untreated: corner.returnWithout,
    treated: corner.returnWith,
    straightEdge: corner.straightEdge,
    addedTime: corner.addedTime,
    dwell: corner.dwell?.duration ?? null,
    ease: ease
      ? {
          before: ease.before,
          after: ease.after,
          feedShare: ease.feedShare,
          powerShare: ease.powerShare,
          segments: ease.pieces.map(({ segment }) => segment),
        }
      : null,
    round: round ? { radius: round.radius, deviation: round.deviation, finished: [round.finished] } : null,
    caution: corner.caution ?? null,
    loop: loop
      ? {
          shape: loop.shape,
          radius: loop.radius,
          extension: loop.extension,
          length: loop.length,
          slugArea: loop.slug?.area ?? 0,
          // as it is put into the path: where the drawing rounds the corner with the way to the loop and from it
          segments: [...(insert?.kind === 'path' ? insert.segments : loop.segments)],
          slug: [...(loop.slug?.contour.segments ?? [])],
        }
      : null,
    options: corner.options.map(({ treatment, fits, returnWith, addedTime, why, at, form, peak, burnBack }) => ({
      treatment,
      fits,
      returnTemperature: returnWith,
      addedTime,
      why,
      at: at ?? null,
      form: form ?? null,
      peak,
      burnBack,
    })),
    trouble: corner.problem ?? null,
    background: corner.background,
    returnTime: corner.returnTime,
    peak: corner.peak,
    burnBack: corner.burnBack,
    intervals: null,
    runnerUp: corner.runnerUp,
  };
}

/** `oxygenFlow` in kg/s: the jet burns on through loops and blows on through dwells. A round that saves time saves oxygen. */
function presentTotals({ totals }: PlatePlan, oxygenFlow: number): CornerPlan['totals'] {
  return {
    corners: totals.corners,
    loops: totals.loops,
    dwells: totals.dwells,
    eases: totals.eases,
    rounds: totals.rounds,
    trouble: totals.problems,
    addedTime: totals.addedTime,
    addedLength: totals.addedLength,
    addedOxygen: totals.addedTime * oxygenFlow,
    hottestUntreated: totals.hottestUntreated,
    hottestTreated: totals.hottestReturn,
    highestBackground: totals.highestBackground,
    meanPlateTemperature: totals.meanPlateTemperature,
    hottestPeak: totals.hottestPeak,
    deepestBurnBack: totals.deepestBurnBack,
    cutTime: totals.cutTime,
  };
}

/** Every corner a person could have chosen for: overrides for others are refused rather than forgotten. */
export const unknownOverrides = (corners: readonly PlannedCorner[], overrides: Choices['overrides']): string[] => {
  const known = new Set(corners.map(({ id }) => id));
  return Object.keys(overrides).filter((id) => !known.has(id));
};
