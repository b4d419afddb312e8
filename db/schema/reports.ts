import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import type { Report } from '../../shared/reports.ts';
import { instant, plantId } from './columns.ts';
import { files } from './files.ts';
import { machines } from './machines.ts';
import { memberships } from './memberships.ts';
import { plates } from './plates.ts';
import { strategyRevisions } from './strategy-revisions.ts';

/** It went wrong: what, where, with which revision. */
export const reports = pgTable(
  'reports',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    revisionId: uuid().notNull(),
    machineId: uuid().notNull(),
    plateId: uuid(),
    kind: text().$type<Report['kind']>().notNull(),
    words: text().notNull().default(''),
    thickness: integer(), // µm, as the operator believes
    photoFileId: uuid(),
    photoWidth: integer(), // px
    photoHeight: integer(), // px
    by: uuid('by_user').notNull(),
    at: instant().notNull().defaultNow(),
    closedAt: instant(),
    closedBy: uuid(),
    closedWords: text(),
    version: integer().notNull().default(1),
  },
  (t) => [
    primaryKey({ name: 'reports_key', columns: [t.plantId, t.id] }),
    foreignKey({
      name: 'reports_revision',
      columns: [t.plantId, t.revisionId],
      foreignColumns: [strategyRevisions.plantId, strategyRevisions.id],
    }),
    foreignKey({
      name: 'reports_machine',
      columns: [t.plantId, t.machineId],
      foreignColumns: [machines.plantId, machines.id],
    }),
    foreignKey({ name: 'reports_plate', columns: [t.plantId, t.plateId], foreignColumns: [plates.plantId, plates.id] }),
    foreignKey({
      name: 'reports_photo',
      columns: [t.plantId, t.photoFileId],
      foreignColumns: [files.plantId, files.id],
    }),
    foreignKey({
      name: 'reports_by',
      columns: [t.plantId, t.by],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    foreignKey({
      name: 'reports_closed_by',
      columns: [t.plantId, t.closedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('reports_newest').on(t.plantId, t.at),
    index('reports_open')
      .on(t.plantId, t.revisionId)
      .where(sql`${t.closedAt} is null`),
    check(
      'reports_kind',
      sql`${t.kind} in ('erupted', 'not through', 'corner burnt', 'cut lost', 'nozzle or window damaged', 'something else')`,
    ),
    check('reports_words_length', sql`length(${t.words}) <= 4000`),
    check(
      'reports_photo_is_whole',
      sql`(${t.photoFileId} is null) = (${t.photoWidth} is null) and (${t.photoFileId} is null) = (${t.photoHeight} is null)`,
    ),
    check(
      'reports_end_is_whole',
      sql`(${t.closedAt} is null) = (${t.closedBy} is null) and (${t.closedAt} is null) = (${t.closedWords} is null)`,
    ),
  ],
);
