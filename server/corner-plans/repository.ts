import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { cornerPlans } from '../../db/schema/corner-plans.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { parts } from '../../db/schema/parts.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import { limits } from '../../shared/limits.ts';

export type CornerPlanRow = typeof cornerPlans.$inferSelect;

export async function findCornerPlan(tx: Transaction, id: string) {
  const [row] = await tx
    .select({
      plan: cornerPlans,
      part: parts,
      revision: strategyRevisions,
      strategyName: strategies.name,
      profile: machineRevisions.profile,
    })
    .from(cornerPlans)
    .innerJoin(parts, eq(parts.id, cornerPlans.partId))
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, cornerPlans.revisionId))
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .where(eq(cornerPlans.id, id));
  return row ?? null;
}

export async function lockCornerPlan(tx: Transaction, id: string): Promise<CornerPlanRow | null> {
  const [row] = await tx.select().from(cornerPlans).where(eq(cornerPlans.id, id)).for('update');
  return row ?? null;
}

/** What a plan is computed from. */
export async function planSources(tx: Transaction, partId: string, revisionId: string) {
  const [part] = await tx.select().from(parts).where(eq(parts.id, partId));
  const [strategy] = await tx
    .select({ revision: strategyRevisions, profile: machineRevisions.profile })
    .from(strategyRevisions)
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .where(eq(strategyRevisions.id, revisionId));
  return { part: part ?? null, strategy: strategy ?? null };
}

type Computed = Pick<
  CornerPlanRow,
  'revisionId' | 'thickness' | 'plateTemperature' | 'skeleton' | 'overrides' | 'limit' | 'corners' | 'totals'
>;

export async function addCornerPlan(
  tx: Transaction,
  row: Computed & Pick<CornerPlanRow, 'plantId' | 'id' | 'partId' | 'changedBy'>,
): Promise<void> {
  await tx.insert(cornerPlans).values(row);
}

export async function replaceCornerPlan(
  tx: Transaction,
  row: CornerPlanRow,
  computed: Computed,
  by: string,
): Promise<void> {
  await tx
    .update(cornerPlans)
    .set({ ...computed, version: row.version + 1, changedAt: sql`now()`, changedBy: by })
    .where(eq(cornerPlans.id, row.id));
}

/** Plans made with a revision, without their corners: what a plate card lists. */
export async function plansWith(tx: Transaction, revisionId: string) {
  return tx
    .select({ id: cornerPlans.id, partId: parts.id, partName: parts.name, totals: cornerPlans.totals })
    .from(cornerPlans)
    .innerJoin(parts, eq(parts.id, cornerPlans.partId))
    .where(eq(cornerPlans.revisionId, revisionId))
    .orderBy(parts.name, cornerPlans.id)
    .limit(limits.listRows);
}
