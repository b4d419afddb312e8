import { sql } from 'drizzle-orm';
import { check, doublePrecision, foreignKey, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { plantId } from './columns.ts';
import { plants } from './plants.ts';

export const nozzles = pgTable(
  'nozzles',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    type: text().$type<'single' | 'double'>().notNull(),
    diameter: doublePrecision().notNull(), // m
  },
  (t) => [
    primaryKey({ name: 'nozzles_key', columns: [t.plantId, t.id] }),
    unique('nozzles_name_once').on(t.plantId, t.name),
    foreignKey({ name: 'nozzles_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    check('nozzles_type', sql`${t.type} in ('single', 'double')`),
    check('nozzles_diameter', sql`${t.diameter} > 0 and ${t.diameter} < 0.1`),
  ],
);
