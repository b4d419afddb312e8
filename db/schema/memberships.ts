import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Role } from '../../shared/policy.ts';
import { instant, plantId } from './columns.ts';
import { plants } from './plants.ts';
import { users } from './users.ts';

/** A table and not a list on the user, because role, grant and end belong to one person in one plant. */
export const memberships = pgTable(
  'memberships',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    userId: uuid().notNull(),
    role: text().$type<Role>().notNull(),
    mayApprove: boolean().notNull().default(false),
    /** Ended, never deleted: the record and every signature point here. */
    endedAt: instant(),
    version: integer().notNull().default(1),
    createdAt: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'memberships_key', columns: [t.plantId, t.id] }),
    unique('memberships_person_once').on(t.plantId, t.userId),
    foreignKey({ name: 'memberships_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    foreignKey({ name: 'memberships_user', columns: [t.userId], foreignColumns: [users.id] }),
    index('memberships_by_user').on(t.userId),
    check('memberships_role', sql`${t.role} in ('operator', 'programmer', 'engineer', 'lead')`),
  ],
);
