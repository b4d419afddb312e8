import { and, asc, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { machines } from '../../db/schema/machines.ts';
import { reports } from '../../db/schema/reports.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import { limits } from '../../shared/limits.ts';

export type StrategyRow = typeof strategies.$inferSelect;

export async function findStrategy(tx: Transaction, id: string): Promise<StrategyRow | null> {
  const [row] = await tx.select().from(strategies).where(eq(strategies.id, id));
  return row ?? null;
}

export async function lockStrategy(tx: Transaction, id: string): Promise<StrategyRow | null> {
  const [row] = await tx.select().from(strategies).where(eq(strategies.id, id)).for('update');
  return row ?? null;
}

export async function addStrategy(
  tx: Transaction,
  row: Pick<StrategyRow, 'plantId' | 'id' | 'name' | 'createdBy'>,
): Promise<void> {
  const { plantId, id, name, createdBy } = row;
  await tx.insert(strategies).values({ plantId, id, name, createdBy });
}

export async function raiseStrategyVersion(tx: Transaction, row: StrategyRow): Promise<void> {
  await tx
    .update(strategies)
    .set({ version: row.version + 1 })
    .where(eq(strategies.id, row.id));
}

export async function newestNumber(tx: Transaction, strategyId: string): Promise<number> {
  const [row] = await tx
    .select({ number: sql<number>`coalesce(max(${strategyRevisions.number}), 0)`.mapWith(Number) })
    .from(strategyRevisions)
    .where(eq(strategyRevisions.strategyId, strategyId));
  return row?.number ?? 0;
}

export async function openDraft(tx: Transaction, strategyId: string): Promise<{ number: number } | null> {
  const [row] = await tx
    .select({ number: strategyRevisions.number })
    .from(strategyRevisions)
    .where(and(eq(strategyRevisions.strategyId, strategyId), eq(strategyRevisions.state, 'draft')));
  return row ?? null;
}

/** A revision without its content and prediction: what a list shows. */
const lineColumns = {
  id: strategyRevisions.id,
  strategyId: strategyRevisions.strategyId,
  number: strategyRevisions.number,
  state: strategyRevisions.state,
  machineId: machines.id,
  machineName: machines.name,
  gradeGroup: strategyRevisions.gradeGroup,
  thicknessMin: strategyRevisions.thicknessMin,
  thicknessMax: strategyRevisions.thicknessMax,
  core: strategyRevisions.core,
  changedAt: strategyRevisions.changedAt,
  changedBy: strategyRevisions.changedBy,
};

/** Strategies with their newest revision. */
export async function strategyLines(tx: Transaction) {
  return tx
    .selectDistinctOn([strategies.name, strategies.id], { strategyName: strategies.name, ...lineColumns })
    .from(strategies)
    .innerJoin(strategyRevisions, eq(strategyRevisions.strategyId, strategies.id))
    .innerJoin(machines, eq(machines.id, strategyRevisions.machineId))
    .orderBy(asc(strategies.name), asc(strategies.id), desc(strategyRevisions.number))
    .limit(limits.listRows);
}

/** Revisions in review, the longest waiting first. */
export async function linesInReview(tx: Transaction) {
  return tx
    .select({ strategyName: strategies.name, ...lineColumns })
    .from(strategyRevisions)
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .innerJoin(machines, eq(machines.id, strategyRevisions.machineId))
    .where(eq(strategyRevisions.state, 'inReview'))
    .orderBy(asc(strategyRevisions.changedAt))
    .limit(limits.listRows);
}

export type StrategyLine = Awaited<ReturnType<typeof strategyLines>>[number];

/** Of each strategy its approved revision and how many reports are open. */
export async function standing(tx: Transaction, strategyIds: readonly string[]) {
  if (strategyIds.length === 0)
    return { approved: new Map<string, { id: string; number: number }>(), open: new Map<string, number>() };
  const ids = [...strategyIds];
  const approved = await tx
    .select({ strategyId: strategyRevisions.strategyId, id: strategyRevisions.id, number: strategyRevisions.number })
    .from(strategyRevisions)
    .where(and(eq(strategyRevisions.state, 'approved'), inArray(strategyRevisions.strategyId, ids)));
  const open = await tx
    .select({ strategyId: strategyRevisions.strategyId, reports: sql<number>`count(*)`.mapWith(Number) })
    .from(reports)
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, reports.revisionId))
    .where(and(isNull(reports.closedAt), inArray(strategyRevisions.strategyId, ids)))
    .groupBy(strategyRevisions.strategyId);
  return {
    approved: new Map(approved.map(({ strategyId, id, number }) => [strategyId, { id, number }])),
    open: new Map(open.map((row) => [row.strategyId, row.reports])),
  };
}
