import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, jsonb, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import type { MachineProfile } from '../../strategy/machine.ts';
import { instant, plantId } from './columns.ts';
import { machines } from './machines.ts';
import { memberships } from './memberships.ts';

/** What a machine was like from one moment on. Never changes: strategies were designed for exactly this. */
export const machineRevisions = pgTable(
  'machine_revisions',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    machineId: uuid().notNull(),
    number: integer().notNull(),
    profile: jsonb().$type<MachineProfile>().notNull(),
    note: text().notNull().default(''),
    madeAt: instant().notNull().defaultNow(),
    madeBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'machine_revisions_key', columns: [t.plantId, t.id] }),
    unique('machine_revisions_number_once').on(t.plantId, t.machineId, t.number),
    unique('machine_revisions_of_machine').on(t.plantId, t.machineId, t.id),
    foreignKey({
      name: 'machine_revisions_machine',
      columns: [t.plantId, t.machineId],
      foreignColumns: [machines.plantId, machines.id],
    }),
    foreignKey({
      name: 'machine_revisions_made_by',
      columns: [t.plantId, t.madeBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    check('machine_revisions_number_positive', sql`${t.number} > 0`),
  ],
);
