import { inPlant, type Transaction } from '../../db/database.ts';
import { cornerPlanEndpoints, type CornerPlan } from '../../shared/corner-plans.ts';
import { AppError, notFound } from '../errors.ts';
import { findNozzle } from '../nozzles/routes.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import type { Services } from '../services.ts';
import { unknownOverrides, type Choices, type PlanSource } from './compute.ts';
import { cuttingOf } from './cutting.ts';
import {
  addCornerPlan,
  findCornerPlan,
  lockCornerPlan,
  planSources,
  replaceCornerPlan,
  type PlanOf,
} from './repository.ts';

export function cornerPlanRoutes({ route, services }: Mount): void {
  // An operator reads a plan only while its strategy is approved, like the card that lists it.
  route(cornerPlanEndpoints.get, async ({ tx, actor, params }) =>
    replyWith(tx, params.planId, actor.role === 'operator'),
  );

  // Planning takes seconds for a part of many corners: not while a transaction is open. A part never changes, nor what was handed in.
  route(
    cornerPlanEndpoints.add,
    async ({ actor, body }) => {
      const source = await inPlant(
        services.database,
        actor.plantId,
        (tx) => sourceOf(tx, planOf(body), choicesOf(body), body.revisionId),
        'read',
      );
      return { value: { source, computed: await computedFor(services, source, choicesOf(body)) } };
    },
    async ({ tx, actor, body, prepared: { source, computed } }) => {
      await addCornerPlan(tx, {
        plantId: actor.plantId,
        id: body.id,
        partId: body.partId ?? null,
        layoutId: body.layoutId ?? null,
        layoutVersion: source.planned.layout?.version ?? null,
        changedBy: actor.userId,
        revisionId: body.revisionId,
        ...choicesOf(body),
        skeleton: skeletonOf(source, body),
        ...computed,
      });
      await note(
        tx,
        actor,
        'cornerPlan.added',
        { kind: 'cornerPlan', id: body.id },
        {
          ...planOf(body),
          revisionId: body.revisionId,
          ...choicesOf(body),
        },
      );
      return { ...(await replyWith(tx, body.id)), status: 201 };
    },
  );

  route(
    cornerPlanEndpoints.redo,
    async ({ actor, params, body }) => {
      const { seen, source } = await inPlant(
        services.database,
        actor.plantId,
        async (tx) => {
          const found = await findCornerPlan(tx, params.planId);
          if (!found) throw notFound('There is no such corner plan');
          const { partId, layoutId } = found.plan;
          const of = planOf({ partId: partId ?? undefined, layoutId: layoutId ?? undefined });
          return { seen: found.plan.version, source: await sourceOf(tx, of, choicesOf(body), body.revisionId) };
        },
        'read',
      );
      const asked = {
        ...choicesOf(body),
        skeleton: skeletonOf(source, body),
        overrides: stillThere(source, body.overrides),
      };
      return { value: { seen, source, asked, computed: await computedFor(services, source, asked) } };
    },
    async ({ tx, actor, params, body, unchanged, prepared: { seen, source, asked, computed } }) => {
      const row = await lockCornerPlan(tx, params.planId);
      if (!row) throw notFound('There is no such corner plan');
      unchanged(row.version);
      // The version that was planned from: the caller's If-Match and this say the same, or it is stale.
      if (row.version !== seen) throw new AppError('stale', 'Somebody changed this meanwhile. Read it again.');
      const layoutVersion = source.planned.layout?.version ?? null;
      const choices = { revisionId: body.revisionId, ...asked, layoutVersion };
      await replaceCornerPlan(tx, row, { ...choices, ...computed }, actor.userId);
      await note(
        tx,
        actor,
        'cornerPlan.redone',
        { kind: 'cornerPlan', id: row.id },
        {
          version: row.version + 1,
          ...choices,
        },
      );
      return replyWith(tx, row.id);
    },
  );
}

const choicesOf = ({ plateTemperature, thickness, skeleton, overrides }: Choices): Choices => ({
  plateTemperature,
  thickness,
  skeleton,
  overrides,
});

/** What the request names; the schema has seen to it that it is one of the two. */
function planOf({ partId, layoutId }: { partId?: string | undefined; layoutId?: string | undefined }): PlanOf {
  if (layoutId !== undefined) return { layoutId };
  return { partId: partId ?? '' };
}

/** A layout has its own plate: nothing beside it counts. */
const skeletonOf = (
  { planned: { layout } }: PlanSource,
  { skeleton }: Pick<Choices, 'skeleton'>,
): Choices['skeleton'] => (layout ? { left: 0, right: 0, below: 0, above: 0 } : skeleton);

/** On a layout, choices for pieces that were taken away since then go with them. */
function stillThere({ planned: { layout, contours } }: PlanSource, overrides: Choices['overrides']) {
  if (!layout) return overrides;
  return Object.fromEntries(
    Object.entries(overrides).filter(([corner]) => contours.some(({ id }) => corner.startsWith(`c${id}-`))),
  );
}

async function sourceOf(tx: Transaction, of: PlanOf, choices: Choices, revisionId: string): Promise<PlanSource> {
  const { planned, strategy } = await planSources(tx, of, choices.skeleton, revisionId);
  if (!planned) throw notFound('layoutId' in of ? 'There is no such layout' : 'There is no such part');
  if (planned.contours.length === 0) {
    throw new AppError('wrong-state', 'Nothing lies on this plate yet: there is no corner to plan.');
  }
  if (!strategy) throw notFound('There is no such revision');
  const { revision, profile } = strategy;
  if (revision.state === 'draft') {
    throw new AppError(
      'wrong-state',
      `Revision ${revision.number} is a draft: its numbers may still change, and the plan would not. Plan with one that was handed in.`,
    );
  }
  const nozzle = await findNozzle(tx, revision.content.nozzleId);
  if (!nozzle) throw notFound('There is no such nozzle');
  return {
    planned,
    content: revision.content,
    prediction: revision.prediction,
    profile,
    nozzle,
  };
}

async function computedFor(services: Services, source: PlanSource, choices: Choices) {
  const { thickness, plateTemperature, overrides } = choices;
  const computed = await services.drawings.plan({ source, choices: { thickness, plateTemperature, overrides } });
  const unknown = unknownOverrides(computed.corners, choices.overrides);
  if (unknown.length > 0) {
    throw new AppError('invalid-fields', 'The part has no such corner.', {
      errors: unknown.map((id) => ({ pointer: `/overrides/${id}`, detail: 'The part has no such corner.' })),
    });
  }
  return computed;
}

async function replyWith(
  tx: Transaction,
  id: string,
  onlyApproved = false,
): Promise<{ body: CornerPlan; version: number }> {
  const found = await findCornerPlan(tx, id);
  if (!found || (onlyApproved && found.revision.state !== 'approved')) throw notFound('There is no such corner plan');
  const { plan, planned, newestLayout, revision, strategyName, profile } = found;
  const nozzle = await findNozzle(tx, revision.content.nozzleId);
  if (!nozzle) throw new Error(`corner plan ${id} is for a nozzle that is not there`);
  const names = await namesOf(tx);
  return {
    version: plan.version,
    body: {
      id: plan.id,
      version: plan.version,
      part: {
        id: planned.id,
        name: planned.name,
        contours: planned.contours.map(({ said: _said, ...contour }) => contour),
      },
      layout: planned.layout && { ...planned.layout, newest: newestLayout ?? planned.layout.version },
      revision: {
        id: revision.id,
        number: revision.number,
        strategyId: revision.strategyId,
        strategyName,
        state: revision.state,
        approved: revision.state === 'approved',
      },
      thickness: plan.thickness,
      plateTemperature: plan.plateTemperature,
      skeleton: plan.skeleton,
      overrides: plan.overrides,
      limit: plan.limit,
      cutting: cuttingOf(revision.content, profile, { ...plan, nozzle }),
      corners: plan.corners,
      totals: plan.totals,
      changedAt: plan.changedAt.toISOString(),
      changedBy: names(plan.changedBy),
    },
  };
}
