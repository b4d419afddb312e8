import { sql } from 'drizzle-orm';
import { check, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

/** People sign in once and may belong to several plants, so this table is no plant's: a plant sees its own members only. */
export const users = pgTable(
  'users',
  {
    id: uuid().primaryKey(),
    /** Lower case: two spellings of one address are one account. */
    mail: text().notNull(),
    name: text().notNull(),
    passwordHash: text().notNull(),
    createdAt: instant().notNull().defaultNow(),
  },
  (t) => [
    unique('users_mail_once').on(t.mail),
    check('users_mail_lower', sql`${t.mail} = lower(${t.mail}) and length(${t.mail}) between 3 and 254`),
    check('users_name_length', sql`length(${t.name}) between 1 and 120`),
  ],
);
