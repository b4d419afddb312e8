import { sql } from 'drizzle-orm';
import { bigint, check, foreignKey, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { plants } from './plants.ts';

/** A file in the bucket. It is stored there under a random key before its row is written; keys without a row are swept. */
export const files = pgTable(
  'files',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    key: text().notNull(),
    contentType: text().notNull(),
    bytes: bigint({ mode: 'number' }).notNull(),
    sha256: text().notNull(),
    storedAt: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'files_key', columns: [t.plantId, t.id] }),
    unique('files_key_once').on(t.key),
    foreignKey({ name: 'files_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    check('files_sha256', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`),
    check('files_bytes', sql`${t.bytes} >= 0`),
  ],
);
