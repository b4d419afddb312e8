import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  doublePrecision,
  foreignKey,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Layout } from '../../shared/layouts.ts';
import { plantId } from './columns.ts';
import { layouts } from './layouts.ts';
import { parts } from './parts.ts';
import { plates } from './plates.ts';

/**
 * A layout as it was saved once: never changed, so that a corner plan can be shown with the very contours it was made for. With what the server computed
 * from it. The plate's size is kept as it was then, since a plate may be corrected; the drawing of a remnant never changes.
 */
export const layoutVersions = pgTable(
  'layout_versions',
  {
    plantId: plantId(),
    layoutId: uuid().notNull(),
    version: integer().notNull(),
    /** A plate in the yard, a remnant's drawing, or neither: a sheet of a size. */
    plateId: uuid(),
    remnantId: uuid(),
    width: doublePrecision().notNull(), // m
    height: doublePrecision().notNull(), // m
    kerfWidth: doublePrecision().notNull(), // m
    clearance: doublePrecision().notNull(), // m
    edgeMargin: doublePrecision().notNull(), // m
    orderBy: text().$type<Layout['orderBy']>().notNull(),
    cutOrder: jsonb().$type<Layout['order']>().notNull(),
    pieces: integer().notNull(),
    problems: jsonb().$type<Layout['problems']>().notNull(),
    moreProblems: boolean().notNull(),
    travel: doublePrecision().notNull(), // m
    cutLength: doublePrecision().notNull(), // m
  },
  (t) => [
    primaryKey({ name: 'layout_versions_key', columns: [t.plantId, t.layoutId, t.version] }),
    foreignKey({
      name: 'layout_versions_layout',
      columns: [t.plantId, t.layoutId],
      foreignColumns: [layouts.plantId, layouts.id],
    }),
    foreignKey({
      name: 'layout_versions_plate',
      columns: [t.plantId, t.plateId],
      foreignColumns: [plates.plantId, plates.id],
    }),
    foreignKey({
      name: 'layout_versions_remnant',
      columns: [t.plantId, t.remnantId],
      foreignColumns: [parts.plantId, parts.id],
    }),
    check('layout_versions_one_outline', sql`${t.plateId} is null or ${t.remnantId} is null`),
    check('layout_versions_size', sql`${t.width} > 0 and ${t.height} > 0`),
    check('layout_versions_room', sql`${t.kerfWidth} >= 0 and ${t.clearance} >= 0 and ${t.edgeMargin} >= 0`),
    check('layout_versions_order_by', sql`${t.orderBy} in ('computed', 'hand')`),
    check('layout_versions_pieces', sql`${t.pieces} between 0 and 500`),
  ],
);
