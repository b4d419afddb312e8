import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';

/** The first answer to a request, written in the transaction that made the change, for whoever asks again with the same key. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    plantId: plantId(),
    userId: uuid().notNull(),
    key: text().notNull(),
    /** SHA-256 of method, path, body and file: the same key with anything else is refused. */
    fingerprint: text().notNull(),
    status: integer().notNull(),
    /** Row version the answer carried as its ETag. */
    answerVersion: integer(),
    answer: jsonb().$type<unknown>(),
    at: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'idempotency_keys_key', columns: [t.plantId, t.userId, t.key] }),
    foreignKey({
      name: 'idempotency_keys_user',
      columns: [t.plantId, t.userId],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('idempotency_keys_by_age').on(t.at),
    check('idempotency_keys_length', sql`length(${t.key}) between 1 and 255`),
  ],
);
