import { sql } from 'drizzle-orm';
import { check, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

export const plants = pgTable(
  'plants',
  {
    id: uuid().primaryKey(),
    name: text().notNull(),
    createdAt: instant().notNull().defaultNow(),
  },
  (t) => [check('plants_name_length', sql`length(${t.name}) between 1 and 120`)],
);
