import { sql } from 'drizzle-orm';
import { boolean, check, foreignKey, integer, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { instant, plantId } from './columns.ts';
import { memberships } from './memberships.ts';
import { plants } from './plants.ts';

/**
 * What a plant asks of every pierce. A rule may be rewritten, each time as its next version, since what it said of a revision is kept
 * whole with that revision; it ends, once, and is never taken away. A plant is founded with two of them, on the reserve (trigger).
 */
export const houseRules = pgTable(
  'house_rules',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    expression: text().notNull(),
    sentence: text().notNull(),
    /** A draft that does not keep it can't be handed in. */
    blocks: boolean().notNull().default(false),
    endedAt: instant(),
    version: integer().notNull().default(1),
    /** Null for what the plant was founded with. */
    changedBy: uuid(),
    changedAt: instant().notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'house_rules_key', columns: [t.plantId, t.id] }),
    uniqueIndex('house_rules_expression_once')
      .on(t.plantId, t.expression)
      .where(sql`${t.endedAt} is null`),
    foreignKey({ name: 'house_rules_plant', columns: [t.plantId], foreignColumns: [plants.id] }),
    foreignKey({
      name: 'house_rules_changed_by',
      columns: [t.plantId, t.changedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    check('house_rules_expression_length', sql`length(${t.expression}) between 1 and 200`),
    check('house_rules_sentence_length', sql`length(${t.sentence}) between 1 and 300`),
    check('house_rules_version_positive', sql`${t.version} > 0`),
  ],
);
