import { foreignKey, pgTable, primaryKey, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';
import { strategyRevisions } from './strategy-revisions.ts';

/** Everybody who wrote any of a revision's content. Rows and not a list in it, so that a trigger can add and nobody can remove. */
export const revisionAuthors = pgTable(
  'revision_authors',
  {
    plantId: plantId(),
    revisionId: uuid().notNull(),
    userId: uuid().notNull(),
    since: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'revision_authors_key', columns: [t.plantId, t.revisionId, t.userId] }),
    foreignKey({
      name: 'revision_authors_revision',
      columns: [t.plantId, t.revisionId],
      foreignColumns: [strategyRevisions.plantId, strategyRevisions.id],
    }),
    foreignKey({
      name: 'revision_authors_user',
      columns: [t.plantId, t.userId],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
  ],
);
