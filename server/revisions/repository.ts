import { and, asc, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { approvals } from '../../db/schema/approvals.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { machines } from '../../db/schema/machines.ts';
import { nozzles } from '../../db/schema/nozzles.ts';
import { reviews } from '../../db/schema/reviews.ts';
import { revisionAuthors } from '../../db/schema/revision-authors.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import type { HouseRuleVerdict } from '../../shared/house-rules.ts';
import type { Prediction, StrategyContent } from '../../shared/strategies.ts';
import { coreOf } from './core.ts';

export type RevisionRow = typeof strategyRevisions.$inferSelect;
export type ApprovalRow = typeof approvals.$inferSelect;
export type ReviewRow = typeof reviews.$inferSelect;

/** A revision with all that is told of it. */
export type WholeRevision = {
  readonly revision: RevisionRow;
  readonly strategyName: string;
  readonly machine: { readonly id: string; readonly name: string; readonly revisionNumber: number };
  readonly nozzle: typeof nozzles.$inferSelect;
  readonly authors: readonly string[];
  readonly reviews: readonly ReviewRow[];
};

/** Whole revisions of one strategy, newest first; or the one named. */
export async function wholeRevisions(
  tx: Transaction,
  by: { readonly strategyId: string } | { readonly id: string },
): Promise<WholeRevision[]> {
  const rows = await tx
    .select({
      revision: strategyRevisions,
      strategyName: strategies.name,
      machine: { id: machines.id, name: machines.name, revisionNumber: machineRevisions.number },
      nozzle: nozzles,
    })
    .from(strategyRevisions)
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .innerJoin(machines, eq(machines.id, strategyRevisions.machineId))
    .innerJoin(nozzles, eq(nozzles.id, strategyRevisions.nozzleId))
    .where('id' in by ? eq(strategyRevisions.id, by.id) : eq(strategyRevisions.strategyId, by.strategyId))
    .orderBy(desc(strategyRevisions.number));
  if (rows.length === 0) return [];
  const ids = rows.map(({ revision }) => revision.id);
  const authors = await tx
    .select()
    .from(revisionAuthors)
    .where(inArray(revisionAuthors.revisionId, ids))
    .orderBy(asc(revisionAuthors.since), asc(revisionAuthors.userId));
  const decided = await tx
    .select()
    .from(reviews)
    .where(inArray(reviews.revisionId, ids))
    .orderBy(asc(reviews.at), asc(reviews.revisionVersion));
  return rows.map((row) => ({
    ...row,
    authors: authors.filter((author) => author.revisionId === row.revision.id).map((author) => author.userId),
    reviews: decided.filter((review) => review.revisionId === row.revision.id),
  }));
}

export async function findRevision(tx: Transaction, id: string): Promise<RevisionRow | null> {
  const [row] = await tx.select().from(strategyRevisions).where(eq(strategyRevisions.id, id));
  return row ?? null;
}

/** The revision and its strategy, locked in this order always: first the strategy, so that decisions about one strategy queue. */
export async function lockRevision(tx: Transaction, id: string): Promise<RevisionRow | null> {
  const found = await findRevision(tx, id);
  if (!found) return null;
  await tx.select({ id: strategies.id }).from(strategies).where(eq(strategies.id, found.strategyId)).for('update');
  const [row] = await tx.select().from(strategyRevisions).where(eq(strategyRevisions.id, id)).for('update');
  return row ?? null;
}

export async function authorsOf(tx: Transaction, revisionId: string): Promise<string[]> {
  const rows = await tx.select().from(revisionAuthors).where(eq(revisionAuthors.revisionId, revisionId));
  return rows.map((row) => row.userId);
}

/** The content as the columns that rows are found and kept apart by. */
export function contentColumns(content: StrategyContent, machineId: string, prediction: Prediction) {
  return {
    content,
    machineId,
    machineRevisionId: content.machineRevisionId,
    gradeGroup: content.gradeGroup,
    gas: content.gas,
    nozzleId: content.nozzleId,
    thicknessMin: content.thickness.min,
    thicknessMax: content.thickness.max,
    hottestPlate: content.hottestPlate,
    prediction,
    modelVersion: prediction.modelVersion,
    core: coreOf(prediction, content.stages),
  };
}

export async function addRevision(
  tx: Transaction,
  row: ReturnType<typeof contentColumns> & Pick<RevisionRow, 'plantId' | 'id' | 'strategyId' | 'number' | 'changedBy'>,
): Promise<void> {
  await tx.insert(strategyRevisions).values({ ...row, state: 'draft' });
}

/** Those who wrote a draft's content before it was copied into this one. */
export async function addAuthors(
  tx: Transaction,
  { plantId, revisionId, userIds }: { plantId: string; revisionId: string; userIds: readonly string[] },
): Promise<void> {
  if (userIds.length === 0) return;
  await tx
    .insert(revisionAuthors)
    .values(userIds.map((userId) => ({ plantId, revisionId, userId })))
    .onConflictDoNothing();
}

export async function saveContent(
  tx: Transaction,
  revision: RevisionRow,
  columns: ReturnType<typeof contentColumns>,
  by: string,
): Promise<void> {
  await tx
    .update(strategyRevisions)
    .set({ ...columns, version: revision.version + 1, changedAt: sql`now()`, changedBy: by })
    .where(eq(strategyRevisions.id, revision.id));
}

export async function moveRevision(
  tx: Transaction,
  revision: RevisionRow,
  state: RevisionRow['state'],
  by: string,
  /** What the rules said, when it is handed in. */
  houseRules?: readonly HouseRuleVerdict[],
): Promise<void> {
  await tx
    .update(strategyRevisions)
    .set({
      state,
      version: revision.version + 1,
      changedAt: sql`now()`,
      changedBy: by,
      ...(houseRules === undefined ? {} : { houseRules }),
    })
    .where(eq(strategyRevisions.id, revision.id));
}

export async function addReview(
  tx: Transaction,
  row: Pick<ReviewRow, 'plantId' | 'id' | 'revisionId' | 'revisionVersion' | 'verdict' | 'by' | 'words'>,
): Promise<void> {
  // The clock and not the transaction's start: one approval supersedes and approves, and their order is told by time.
  await tx.insert(reviews).values({ ...row, at: sql`clock_timestamp()` });
}

/** The approval of a revision that has not ended. */
export async function liveApproval(tx: Transaction, revisionId: string): Promise<ApprovalRow | null> {
  const [row] = await tx
    .select()
    .from(approvals)
    .where(and(eq(approvals.revisionId, revisionId), isNull(approvals.endedAt)));
  return row ?? null;
}

/** The approved revision of a strategy. */
export async function approvedRevision(tx: Transaction, strategyId: string): Promise<RevisionRow | null> {
  const [row] = await tx
    .select()
    .from(strategyRevisions)
    .where(and(eq(strategyRevisions.strategyId, strategyId), eq(strategyRevisions.state, 'approved')))
    .for('update');
  return row ?? null;
}

/** Approved strategies other than this one's that cover part of the revision's range on its machine. */
export async function overlapping(
  tx: Transaction,
  revision: RevisionRow,
): Promise<{ name: string; min: number; max: number }[]> {
  return tx
    .select({ name: strategies.name, min: approvals.thicknessMin, max: approvals.thicknessMax })
    .from(approvals)
    .innerJoin(strategies, eq(strategies.id, approvals.strategyId))
    .where(
      and(
        isNull(approvals.endedAt),
        eq(approvals.machineId, revision.machineId),
        eq(approvals.gradeGroup, revision.gradeGroup),
        eq(approvals.gas, revision.gas),
        sql`${approvals.strategyId} <> ${revision.strategyId}`,
        sql`int4range(${approvals.thicknessMin}, ${approvals.thicknessMax}, '[)')
          && int4range(${revision.thicknessMin}, ${revision.thicknessMax}, '[)')`,
      ),
    )
    .orderBy(asc(approvals.thicknessMin));
}

export async function addApproval(tx: Transaction, id: string, revision: RevisionRow, by: string): Promise<void> {
  await tx.insert(approvals).values({
    plantId: revision.plantId,
    id,
    revisionId: revision.id,
    strategyId: revision.strategyId,
    machineId: revision.machineId,
    gradeGroup: revision.gradeGroup,
    gas: revision.gas,
    thicknessMin: revision.thicknessMin,
    thicknessMax: revision.thicknessMax,
    approvedBy: by,
  });
}

export async function endApproval(
  tx: Transaction,
  approval: ApprovalRow,
  why: 'superseded' | 'withdrawn',
  by: string,
): Promise<void> {
  await tx
    .update(approvals)
    .set({ endedAt: sql`now()`, endedBy: by, endedWhy: why })
    .where(eq(approvals.id, approval.id));
}
