import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { machines } from './machines.ts';
import { memberships } from './memberships.ts';
import { plates } from './plates.ts';

/** A plate that had no approved strategy, and who asked for one. */
export const requests = pgTable(
  'requests',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    machineId: uuid().notNull(),
    gradeGroup: text().notNull(),
    thickness: integer().notNull(), // µm
    plateId: uuid(),
    words: text().notNull().default(''),
    by: uuid('by_user').notNull(),
    at: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'requests_key', columns: [t.plantId, t.id] }),
    foreignKey({
      name: 'requests_machine',
      columns: [t.plantId, t.machineId],
      foreignColumns: [machines.plantId, machines.id],
    }),
    foreignKey({
      name: 'requests_plate',
      columns: [t.plantId, t.plateId],
      foreignColumns: [plates.plantId, plates.id],
    }),
    foreignKey({
      name: 'requests_by',
      columns: [t.plantId, t.by],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('requests_newest').on(t.plantId, t.at),
    check('requests_thickness', sql`${t.thickness} between 1000 and 60000`),
    check('requests_words_length', sql`length(${t.words}) <= 4000`),
  ],
);
