import { bigint, index, pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

/** Tries that have not succeeded, counted by account and by address. Keyed hashes: neither can be read back from here. */
export const signInAttempts = pgTable(
  'sign_in_attempts',
  {
    id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    accountKey: text().notNull(),
    addressKey: text().notNull(),
    at: instant().notNull().defaultNow(),
  },
  (t) => [
    index('sign_in_attempts_by_account').on(t.accountKey, t.at),
    index('sign_in_attempts_by_address').on(t.addressKey, t.at),
  ],
);
