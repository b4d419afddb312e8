import { sql } from 'drizzle-orm';
import { check, foreignKey, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { plantId } from './columns.ts';
import { plants } from './plants.ts';

export const grades = pgTable(
  'grades',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    /** What strategies are made for; several grades of like chemistry share one. */
    group: text('grade_group').notNull(),
  },
  (t) => [
    primaryKey({ name: 'grades_key', columns: [t.plantId, t.id] }),
    unique('grades_name_once').on(t.plantId, t.name),
    foreignKey({ name: 'grades_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    check('grades_lengths', sql`length(${t.name}) between 1 and 120 and length(${t.group}) between 1 and 120`),
  ],
);
