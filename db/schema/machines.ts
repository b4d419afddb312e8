import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { plants } from './plants.ts';

/** Printable ASCII and line ends: all that goes into a file for a machine's control. */
const plain = '[^\\u0020-\\u007e\\n]';

export const machines = pgTable(
  'machines',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    name: text().notNull(),
    version: integer().notNull().default(1),
    /** What the plant's own lines around the blocks of a cut path set: blocks in another unit go without them. */
    blockUnit: text().$type<'mm' | 'inch'>().notNull().default('mm'),
    blockHeader: text().notNull().default(''),
    blockFooter: text().notNull().default(''),
    createdAt: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'machines_key', columns: [t.plantId, t.id] }),
    unique('machines_name_once').on(t.plantId, t.name),
    foreignKey({ name: 'machines_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    check('machines_name_length', sql`length(${t.name}) between 1 and 120`),
    check('machines_block_unit', sql`${t.blockUnit} in ('mm', 'inch')`),
    check(
      'machines_block_lines',
      sql`length(${t.blockHeader}) <= 2000 and length(${t.blockFooter}) <= 2000
        and ${t.blockHeader} !~ ${sql.raw(`'${plain}'`)} and ${t.blockFooter} !~ ${sql.raw(`'${plain}'`)}`,
    ),
  ],
);
