import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  foreignKey,
  integer,
  pgTable,
  primaryKey,
  text,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Plate } from '../../shared/plates.ts';
import { instant, plantId } from './columns.ts';
import { grades } from './grades.ts';
import { memberships } from './memberships.ts';

export const plates = pgTable(
  'plates',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    tag: text().notNull(),
    gradeId: uuid().notNull(),
    heatNumber: text().notNull().default(''),
    nominalThickness: integer().notNull(), // µm
    measuredThickness: integer(), // µm
    surface: text().$type<Plate['surface']>().notNull(),
    certificate: text().notNull().default(''),
    length: doublePrecision(), // m
    width: doublePrecision(), // m
    version: integer().notNull().default(1),
    changedAt: instant().notNull().defaultNow(),
    changedBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'plates_key', columns: [t.plantId, t.id] }),
    // Painted tags are typed in whatever case the phone offers.
    uniqueIndex('plates_tag_once').on(t.plantId, sql`lower(${t.tag})`),
    foreignKey({
      name: 'plates_grade',
      columns: [t.plantId, t.gradeId],
      foreignColumns: [grades.plantId, grades.id],
    }),
    foreignKey({
      name: 'plates_changed_by',
      columns: [t.plantId, t.changedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    check('plates_tag_length', sql`length(${t.tag}) between 1 and 40`),
    check('plates_nominal_thickness', sql`${t.nominalThickness} between 1000 and 60000`),
    check('plates_measured_thickness', sql`${t.measuredThickness} between 1000 and 60000`),
    check('plates_surface', sql`${t.surface} in ('bright', 'mill scale', 'rust', 'primer')`),
    check('plates_size', sql`${t.length} > 0 and ${t.width} > 0`),
  ],
);
