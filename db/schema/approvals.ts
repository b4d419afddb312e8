import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';
import { strategyRevisions } from './strategy-revisions.ts';

/**
 * That a revision may be used, from when until when. A row of its own, so that an exclusion constraint over the rows not ended can
 * forbid two approved strategies for one plate on one machine (approvals_no_overlap, in the hand-written migration).
 */
export const approvals = pgTable(
  'approvals',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    revisionId: uuid().notNull(),
    strategyId: uuid().notNull(),
    machineId: uuid().notNull(),
    gradeGroup: text().notNull(),
    gas: text().$type<'oxygen'>().notNull(),
    thicknessMin: integer().notNull(), // µm
    thicknessMax: integer().notNull(), // µm, itself not included
    approvedBy: uuid().notNull(),
    approvedAt: instant().notNull().defaultNow(),
    endedAt: instant(),
    endedBy: uuid(),
    endedWhy: text().$type<'superseded' | 'withdrawn'>(),
  },
  (t) => [
    primaryKey({ name: 'approvals_key', columns: [t.plantId, t.id] }),
    foreignKey({
      name: 'approvals_are_what_the_revision_says',
      columns: [
        t.plantId,
        t.revisionId,
        t.strategyId,
        t.machineId,
        t.gradeGroup,
        t.gas,
        t.thicknessMin,
        t.thicknessMax,
      ],
      foreignColumns: [
        strategyRevisions.plantId,
        strategyRevisions.id,
        strategyRevisions.strategyId,
        strategyRevisions.machineId,
        strategyRevisions.gradeGroup,
        strategyRevisions.gas,
        strategyRevisions.thicknessMin,
        strategyRevisions.thicknessMax,
      ],
    }),
    foreignKey({
      name: 'approvals_approved_by',
      columns: [t.plantId, t.approvedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    foreignKey({
      name: 'approvals_ended_by',
      columns: [t.plantId, t.endedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('approvals_of_revision').on(t.plantId, t.revisionId),
    check(
      'approvals_end_is_whole',
      sql`(${t.endedAt} is null) = (${t.endedBy} is null) and (${t.endedAt} is null) = (${t.endedWhy} is null)`,
    ),
    check('approvals_ended_why', sql`${t.endedWhy} in ('superseded', 'withdrawn')`),
  ],
);
