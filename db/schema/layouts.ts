import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';

/** A plate layout: its name and which of its versions is the newest. What lies on the plate is each version's own. */
export const layouts = pgTable(
  'layouts',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    version: integer().notNull().default(1),
    changedAt: instant().notNull().defaultNow(),
    changedBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'layouts_key', columns: [t.plantId, t.id] }),
    foreignKey({
      name: 'layouts_changed_by',
      columns: [t.plantId, t.changedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('layouts_newest').on(t.plantId, t.changedAt),
    check('layouts_name_length', sql`length(${t.name}) between 1 and 120`),
    check('layouts_version_positive', sql`${t.version} > 0`),
  ],
);
