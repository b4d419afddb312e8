import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { plants } from './plants.ts';

export const machines = pgTable(
  'machines',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    version: integer().notNull().default(1),
    createdAt: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'machines_key', columns: [t.plantId, t.id] }),
    unique('machines_name_once').on(t.plantId, t.name),
    foreignKey({ name: 'machines_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    check('machines_name_length', sql`length(${t.name}) between 1 and 120`),
  ],
);
