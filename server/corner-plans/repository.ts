import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { cornerPlans } from '../../db/schema/corner-plans.ts';
import { layouts } from '../../db/schema/layouts.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { parts } from '../../db/schema/parts.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import { limits } from '../../shared/limits.ts';
import { findLayout, partGeometries } from '../layouts/repository.ts';
import { plannedLayout, plannedPart, type Planned } from './planned.ts';

export type CornerPlanRow = typeof cornerPlans.$inferSelect;

export async function findCornerPlan(tx: Transaction, id: string) {
  const [row] = await tx
    .select({
      plan: cornerPlans,
      part: { id: parts.id, name: parts.name, reading: parts.reading },
      revision: strategyRevisions,
      strategyName: strategies.name,
      profile: machineRevisions.profile,
    })
    .from(cornerPlans)
    .leftJoin(parts, eq(parts.id, cornerPlans.partId))
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, cornerPlans.revisionId))
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .where(eq(cornerPlans.id, id));
  if (!row) return null;
  const { plan, part } = row;
  const layout = plan.layoutId === null ? null : await findLayout(tx, plan.layoutId, plan.layoutVersion ?? undefined);
  const planned = layout ? plannedLayout(layout) : part && plannedPart(part, plan.skeleton);
  if (!planned) throw new Error(`corner plan ${id} is of nothing`);
  return { ...row, planned, newestLayout: layout?.layout.version ?? null };
}

/** A part, or a layout in its newest version. */
export type PlanOf = { readonly partId: string } | { readonly layoutId: string };

export async function lockCornerPlan(tx: Transaction, id: string): Promise<CornerPlanRow | null> {
  const [row] = await tx.select().from(cornerPlans).where(eq(cornerPlans.id, id)).for('update');
  return row ?? null;
}

/** What a plan is computed from; null for what is not there. */
export async function planSources(
  tx: Transaction,
  of: PlanOf,
  skeleton: CornerPlanRow['skeleton'],
  revisionId: string,
) {
  const [strategy] = await tx
    .select({ revision: strategyRevisions, profile: machineRevisions.profile })
    .from(strategyRevisions)
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .where(eq(strategyRevisions.id, revisionId));
  return { planned: await plannedOf(tx, of, skeleton), strategy: strategy ?? null };
}

async function plannedOf(tx: Transaction, of: PlanOf, skeleton: CornerPlanRow['skeleton']): Promise<Planned | null> {
  if ('layoutId' in of) {
    const layout = await findLayout(tx, of.layoutId);
    return layout && plannedLayout(layout);
  }
  const [part] = await partGeometries(tx, [of.partId]);
  return part ? plannedPart(part, skeleton) : null;
}

type Computed = Pick<
  CornerPlanRow,
  'revisionId' | 'thickness' | 'plateTemperature' | 'skeleton' | 'overrides' | 'limit' | 'corners' | 'totals'
>;

export async function addCornerPlan(
  tx: Transaction,
  row: Computed & Pick<CornerPlanRow, 'plantId' | 'id' | 'partId' | 'layoutId' | 'layoutVersion' | 'changedBy'>,
): Promise<void> {
  await tx.insert(cornerPlans).values(row);
}

export async function replaceCornerPlan(
  tx: Transaction,
  row: CornerPlanRow,
  computed: Computed & Pick<CornerPlanRow, 'layoutVersion'>,
  by: string,
): Promise<void> {
  await tx
    .update(cornerPlans)
    .set({ ...computed, version: row.version + 1, changedAt: sql`now()`, changedBy: by })
    .where(eq(cornerPlans.id, row.id));
}

/** Plans made with a revision, without their corners: what a plate card lists. */
export async function plansWith(tx: Transaction, revisionId: string) {
  const name = sql<string>`coalesce(${parts.name}, ${layouts.name})`;
  return tx
    .select({ id: cornerPlans.id, partId: cornerPlans.partId, partName: name, totals: cornerPlans.totals })
    .from(cornerPlans)
    .leftJoin(parts, eq(parts.id, cornerPlans.partId))
    .leftJoin(layouts, eq(layouts.id, cornerPlans.layoutId))
    .where(eq(cornerPlans.revisionId, revisionId))
    .orderBy(name, cornerPlans.id)
    .limit(limits.listRows);
}
