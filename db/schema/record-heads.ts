import { bigint, foreignKey, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { plantId } from './columns.ts';
import { plants } from './plants.ts';

/** The last link of each plant's record: locked while the next is added, and proof that none was cut off the end. */
export const recordHeads = pgTable(
  'record_heads',
  {
    plantId: plantId(),
    sequence: bigint({ mode: 'number' }).notNull(),
    hash: text().notNull(),
  },
  (t) => [
    primaryKey({ name: 'record_heads_key', columns: [t.plantId] }),
    foreignKey({ name: 'record_heads_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
  ],
);
