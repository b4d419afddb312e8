import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import type { DrawingAnswers, DrawingReadingWire } from '../../shared/parts.ts';
import { instant, plantId } from './columns.ts';
import { files } from './files.ts';
import { memberships } from './memberships.ts';

/** A drawing kept as a part. The reading is stored with the answers that led to it, so that it stays what was seen. */
export const parts = pgTable(
  'parts',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    fileName: text().notNull(),
    fileId: uuid().notNull(),
    answers: jsonb().$type<DrawingAnswers>().notNull(),
    reading: jsonb().$type<DrawingReadingWire>().notNull(),
    /** What a list tells of the reading, so that it needn't read the whole. */
    width: doublePrecision().notNull(), // m
    height: doublePrecision().notNull(), // m
    outlines: integer().notNull(),
    holes: integer().notNull(),
    version: integer().notNull().default(1),
    addedAt: instant().notNull().defaultNow(),
    addedBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'parts_key', columns: [t.plantId, t.id] }),
    foreignKey({ name: 'parts_file', columns: [t.plantId, t.fileId], foreignColumns: [files.plantId, files.id] }),
    foreignKey({
      name: 'parts_added_by',
      columns: [t.plantId, t.addedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('parts_newest').on(t.plantId, t.addedAt),
    check('parts_name_length', sql`length(${t.name}) between 1 and 120`),
    check('parts_file_name_length', sql`length(${t.fileName}) between 1 and 255`),
  ],
);
