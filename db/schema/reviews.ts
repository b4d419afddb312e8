import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';
import { strategyRevisions } from './strategy-revisions.ts';

/** What happened to a revision: handed in, approved, returned, withdrawn, superseded. Only ever added to. */
export const reviews = pgTable(
  'reviews',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    revisionId: uuid().notNull(),
    /** The version of the revision that was looked at. */
    revisionVersion: integer().notNull(),
    verdict: text().$type<'submitted' | 'approved' | 'returned' | 'withdrawn' | 'superseded'>().notNull(),
    by: uuid('by_user').notNull(),
    at: instant().notNull().defaultNow(),
    words: text().notNull().default(''),
  },
  (t) => [
    primaryKey({ name: 'reviews_key', columns: [t.plantId, t.id] }),
    foreignKey({
      name: 'reviews_revision',
      columns: [t.plantId, t.revisionId],
      foreignColumns: [strategyRevisions.plantId, strategyRevisions.id],
    }),
    foreignKey({
      name: 'reviews_by',
      columns: [t.plantId, t.by],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('reviews_of_revision').on(t.plantId, t.revisionId, t.at),
    check('reviews_verdict', sql`${t.verdict} in ('submitted', 'approved', 'returned', 'withdrawn', 'superseded')`),
    check('reviews_words_length', sql`length(${t.words}) <= 4000`),
  ],
);
