import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';

export const strategies = pgTable(
  'strategies',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    version: integer().notNull().default(1),
    createdAt: instant().notNull().defaultNow(),
    createdBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'strategies_key', columns: [t.plantId, t.id] }),
    unique('strategies_name_once').on(t.plantId, t.name),
    foreignKey({
      name: 'strategies_created_by',
      columns: [t.plantId, t.createdBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    check('strategies_name_length', sql`length(${t.name}) between 1 and 120`),
  ],
);
