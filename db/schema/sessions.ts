import { sql } from 'drizzle-orm';
import { check, foreignKey, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';

/** A sign-in. The cookie carries the random id; only its hash is kept, so a read of this table signs nobody in. */
export const sessions = pgTable(
  'sessions',
  {
    id: uuid().primaryKey().defaultRandom(),
    /** SHA-256 of the random id, hex. */
    tokenHash: text().notNull(),
    userId: uuid().notNull(),
    plantId: plantId(),
    createdAt: instant().notNull().defaultNow(),
    seenAt: instant().notNull().defaultNow(),
    expiresAt: instant().notNull(),
    revokedAt: instant(),
  },
  (t) => [
    unique('sessions_token_once').on(t.tokenHash),
    foreignKey({
      name: 'sessions_membership',
      columns: [t.plantId, t.userId],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('sessions_by_user').on(t.userId),
    check('sessions_token_hash', sql`${t.tokenHash} ~ '^[0-9a-f]{64}$'`),
  ],
);
