import { sql } from 'drizzle-orm';
import { check, doublePrecision, foreignKey, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';
import { plants } from './plants.ts';

/**
 * What a plant pays, in its own currency: estimates turn hours, oxygen and energy into money with it. One row a plant, there from its founding and empty then (trigger);
 * it is rewritten, each time as its next version, and never taken away.
 */
export const rates = pgTable(
  'rates',
  {
    plantId: plantId(),
    /** As the plant writes it; empty while it gives no rates. */
    currency: text().notNull().default(''),
    /** Each null where the plant gives none. */
    machineHour: doublePrecision(),
    oxygenKilogram: doublePrecision(),
    electricityKilowattHour: doublePrecision(),
    /** Light out of the laser over electrical energy into it: a third for a usual fibre laser without its cooler; common practice, no source. */
    wallPlugEfficiency: doublePrecision().notNull().default(0.33),
    version: integer().notNull().default(1),
    /** Null for what the plant was founded with. */
    changedBy: uuid(),
    changedAt: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'rates_key', columns: [t.plantId] }),
    foreignKey({ name: 'rates_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    foreignKey({
      name: 'rates_changed_by',
      columns: [t.plantId, t.changedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    check('rates_currency_length', sql`length(${t.currency}) <= 12`),
    check('rates_machine_hour', sql`${t.machineHour} between 0 and 1e9`),
    check('rates_oxygen_kilogram', sql`${t.oxygenKilogram} between 0 and 1e9`),
    check('rates_electricity_kilowatt_hour', sql`${t.electricityKilowattHour} between 0 and 1e9`),
    check('rates_wall_plug_efficiency', sql`${t.wallPlugEfficiency} > 0 and ${t.wallPlugEfficiency} <= 1`),
    check(
      'rates_name_their_currency',
      sql`length(${t.currency}) > 0 or coalesce(${t.machineHour}, ${t.oxygenKilogram}, ${t.electricityKilowattHour}) is null`,
    ),
    check('rates_version_positive', sql`${t.version} > 0`),
  ],
);
