import type { z } from 'zod';
import type { CornerPlan, cornerPlanEndpoints, PlannedCorner } from '../../shared/corner-plans.ts';
import type { StrategyContent } from '../../shared/strategies.ts';
import {
  cornerInsert,
  type CornerPlan as Computed,
  type CornerPlanRequest,
  type PlannedCorner as ComputedCorner,
} from '../../strategy/corners/index.ts';
import type { MachineProfile } from '../../strategy/machine.ts';
import { oxygenMassFlow, PIERCE_DEFAULTS } from '../../strategy/pierce/index.ts';
import type { DrawingReader } from '../drawings/reader.ts';
import type { Planned } from './planned.ts';

/** What the programmer chose. */
export type Choices = Omit<z.output<NonNullable<(typeof cornerPlanEndpoints.redo)['body']>>, 'revisionId'>;

export type PlanSource = {
  readonly planned: Planned;
  readonly content: StrategyContent;
  readonly profile: MachineProfile;
  readonly nozzleDiameter: number; // m
};

/** The corners planned with a strategy's rules and cut, on what plate there is. */
export async function computePlan(
  drawings: DrawingReader,
  { planned, content, profile, nozzleDiameter }: PlanSource,
  choices: Choices,
): Promise<Pick<CornerPlan, 'limit' | 'corners' | 'totals'>> {
  const plan = await drawings.plan(planRequestOf({ planned, content, profile }, choices));
  const chosen = new Set(Object.keys(choices.overrides));
  return {
    limit: plan.limit,
    corners: plan.corners.map((corner) => presentCorner(corner, chosen)),
    totals: presentTotals(
      plan,
      oxygenMassFlow(nozzleDiameter, content.cut.oxygenPressure, PIERCE_DEFAULTS.dischargeCoefficient),
    ),
  };
}

/** What the planner is asked. */
export function planRequestOf(
  { planned, content, profile }: Pick<PlanSource, 'planned' | 'content' | 'profile'>,
  choices: Pick<Choices, 'thickness' | 'plateTemperature' | 'overrides'>,
): CornerPlanRequest {
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
    thickness: choices.thickness,
    plateTemperature: choices.plateTemperature,
    overrides: choices.overrides,
  };
}

/** A computed corner as it is kept and sent; chosen are the ids of those that a person decided. */
export function presentCorner(corner: ComputedCorner, chosen: ReadonlySet<string>): PlannedCorner {
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
    options: corner.options.map(({ treatment, fits, returnWith, addedTime, why, at, form }) => ({
      treatment,
      fits,
      returnTemperature: returnWith,
      addedTime,
      why,
      at: at ?? null,
      form: form ?? null,
    })),
    trouble: corner.problem ?? null,
  };
}

/** `oxygenFlow` in kg/s: the jet burns on through loops and blows on through dwells. A round that saves time saves oxygen. */
function presentTotals({ totals }: Computed, oxygenFlow: number): CornerPlan['totals'] {
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
  };
}

/** Every corner a person could have chosen for: overrides for others are refused rather than forgotten. */
export const unknownOverrides = (corners: readonly PlannedCorner[], overrides: Choices['overrides']): string[] => {
  const known = new Set(corners.map(({ id }) => id));
  return Object.keys(overrides).filter((id) => !known.has(id));
};
