import { sql } from 'drizzle-orm';
import { bigint, check, foreignKey, index, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { plants } from './plants.ts';

/**
 * Who decided what, numbered from 1 in each plant and chained by hash. A trigger fills sequence, canonical text and hashes; nothing
 * can be changed or taken away. It names people by id, so that a name can be corrected or forgotten without breaking the chain.
 */
export const record = pgTable(
  'record',
  {
    plantId: plantId(),
    sequence: bigint({ mode: 'number' }).notNull().default(0),
    at: instant().notNull().defaultNow(),
    actorId: uuid(),
    event: text().notNull(),
    subjectKind: text().notNull(),
    subjectId: text().notNull(),
    facts: jsonb().$type<Record<string, unknown>>().notNull(),
    /** The text that was hashed; the columns say the same. */
    canonical: text().notNull().default(''),
    previousHash: text().notNull().default(''),
    /** SHA-256 of the previous hash followed by the canonical text, hex. */
    hash: text().notNull().default(''),
  },
  (t) => [
    primaryKey({ name: 'record_key', columns: [t.plantId, t.sequence] }),
    foreignKey({ name: 'record_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    index('record_by_subject').on(t.plantId, t.subjectId),
    check('record_event_length', sql`length(${t.event}) between 1 and 80`),
  ],
);
