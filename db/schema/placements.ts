import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  uuid,
} from 'drizzle-orm/pg-core';
import { plantId } from './columns.ts';
import { layoutVersions } from './layout-versions.ts';
import { parts } from './parts.ts';

/** Where each piece lies in a version of a layout. Rows and not JSON, so that PostgreSQL holds each to a part of its own plant. */
export const placements = pgTable(
  'placements',
  {
    plantId: plantId(),
    layoutId: uuid().notNull(),
    version: integer().notNull(),
    number: integer().notNull(),
    partId: uuid().notNull(),
    x: doublePrecision().notNull(), // m
    y: doublePrecision().notNull(), // m
    turn: doublePrecision().notNull(), // rad
    mirrored: boolean().notNull(),
  },
  (t) => [
    primaryKey({ name: 'placements_key', columns: [t.plantId, t.layoutId, t.version, t.number] }),
    foreignKey({
      name: 'placements_version',
      columns: [t.plantId, t.layoutId, t.version],
      foreignColumns: [layoutVersions.plantId, layoutVersions.layoutId, layoutVersions.version],
    }),
    foreignKey({
      name: 'placements_part',
      columns: [t.plantId, t.partId],
      foreignColumns: [parts.plantId, parts.id],
    }),
    index('placements_of_part').on(t.plantId, t.partId),
    check('placements_number', sql`${t.number} between 1 and 9999`),
  ],
);
