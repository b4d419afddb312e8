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
  uuid,
} from 'drizzle-orm/pg-core';
import type { CornerPlan } from '../../shared/corner-plans.ts';
import { instant, plantId } from './columns.ts';
import { layoutVersions } from './layout-versions.ts';
import { memberships } from './memberships.ts';
import { parts } from './parts.ts';
import { strategyRevisions } from './strategy-revisions.ts';

/** The corners of a part or a layout planned with a strategy revision: the choices made and what the server computed from them. */
export const cornerPlans = pgTable(
  'corner_plans',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    /** A part, or a version of a layout. */
    partId: uuid(),
    layoutId: uuid(),
    layoutVersion: integer(),
    revisionId: uuid().notNull(),
    thickness: doublePrecision().notNull(), // m
    plateTemperature: doublePrecision().notNull(), // K
    skeleton: jsonb().$type<CornerPlan['skeleton']>().notNull(),
    overrides: jsonb().$type<CornerPlan['overrides']>().notNull(),
    limit: doublePrecision('temperature_limit').notNull(), // K
    corners: jsonb().$type<CornerPlan['corners']>().notNull(),
    totals: jsonb().$type<CornerPlan['totals']>().notNull(),
    version: integer().notNull().default(1),
    changedAt: instant().notNull().defaultNow(),
    changedBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'corner_plans_key', columns: [t.plantId, t.id] }),
    foreignKey({
      name: 'corner_plans_part',
      columns: [t.plantId, t.partId],
      foreignColumns: [parts.plantId, parts.id],
    }),
    foreignKey({
      name: 'corner_plans_layout',
      columns: [t.plantId, t.layoutId, t.layoutVersion],
      foreignColumns: [layoutVersions.plantId, layoutVersions.layoutId, layoutVersions.version],
    }),
    foreignKey({
      name: 'corner_plans_revision',
      columns: [t.plantId, t.revisionId],
      foreignColumns: [strategyRevisions.plantId, strategyRevisions.id],
    }),
    foreignKey({
      name: 'corner_plans_changed_by',
      columns: [t.plantId, t.changedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    index('corner_plans_of_part').on(t.plantId, t.partId),
    index('corner_plans_of_layout').on(t.plantId, t.layoutId),
    index('corner_plans_of_revision').on(t.plantId, t.revisionId),
    check('corner_plans_of_one', sql`(${t.partId} is null) <> (${t.layoutId} is null)`),
    check('corner_plans_layout_version', sql`(${t.layoutId} is null) = (${t.layoutVersion} is null)`),
    check('corner_plans_thickness', sql`${t.thickness} > 0 and ${t.thickness} <= 0.06`),
  ],
);
