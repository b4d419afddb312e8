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
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import type { HouseRuleVerdict } from '../../shared/house-rules.ts';
import type { Prediction, RevisionState, StrategyContent } from '../../shared/strategies.ts';
import { instant, plantId } from './columns.ts';
import { machineRevisions } from './machine-revisions.ts';
import { memberships } from './memberships.ts';
import { nozzles } from './nozzles.ts';
import { strategies } from './strategies.ts';

export type Core = {
  readonly reserveCold: number | null;
  readonly reserveHot: number | null;
  /** Depth at each stage's end on a cold plate, as a share of the thickness. */
  readonly bands: readonly number[];
};

/**
 * The content whole as JSON, since it is read and judged whole; beside it, as columns, what rows are found and kept apart by.
 * A check holds the two together. After submission neither can change (trigger).
 */
export const strategyRevisions = pgTable(
  'strategy_revisions',
  {
    plantId: plantId(),
    id: uuid().notNull(),
    strategyId: uuid().notNull(),
    number: integer().notNull(),
    state: text().$type<RevisionState>().notNull().default('draft'),
    version: integer().notNull().default(1),
    content: jsonb().$type<StrategyContent>().notNull(),
    machineId: uuid().notNull(),
    machineRevisionId: uuid().notNull(),
    gradeGroup: text().notNull(),
    gas: text().$type<'oxygen'>().notNull(),
    nozzleId: uuid().notNull(),
    /** Half-open [min, max), µm. */
    thicknessMin: integer().notNull(),
    thicknessMax: integer().notNull(),
    hottestPlate: doublePrecision().notNull(), // K
    prediction: jsonb().$type<Prediction>().notNull(),
    modelVersion: text().notNull(),
    /** What a list draws of the prediction, so that it needn't read the whole. */
    core: jsonb().$type<Core>().notNull(),
    /** What the plant's rules said when it was handed in; null while it is a draft, which is judged each time it is read. */
    houseRules: jsonb().$type<readonly HouseRuleVerdict[]>(),
    changedAt: instant().notNull().defaultNow(),
    changedBy: uuid().notNull(),
  },
  (t) => [
    primaryKey({ name: 'strategy_revisions_key', columns: [t.plantId, t.id] }),
    unique('strategy_revisions_number_once').on(t.plantId, t.strategyId, t.number),
    // An approval points at all of these, so it can't be for anything but what the revision says.
    unique('strategy_revisions_what_is_approved').on(
      t.plantId,
      t.id,
      t.strategyId,
      t.machineId,
      t.gradeGroup,
      t.gas,
      t.thicknessMin,
      t.thicknessMax,
    ),
    uniqueIndex('strategy_revisions_one_draft')
      .on(t.plantId, t.strategyId)
      .where(sql`${t.state} = 'draft'`),
    uniqueIndex('strategy_revisions_one_approved')
      .on(t.plantId, t.strategyId)
      .where(sql`${t.state} = 'approved'`),
    index('strategy_revisions_in_review')
      .on(t.plantId)
      .where(sql`${t.state} = 'inReview'`),
    foreignKey({
      name: 'strategy_revisions_strategy',
      columns: [t.plantId, t.strategyId],
      foreignColumns: [strategies.plantId, strategies.id],
    }),
    foreignKey({
      name: 'strategy_revisions_machine_revision',
      columns: [t.plantId, t.machineId, t.machineRevisionId],
      foreignColumns: [machineRevisions.plantId, machineRevisions.machineId, machineRevisions.id],
    }),
    foreignKey({
      name: 'strategy_revisions_nozzle',
      columns: [t.plantId, t.nozzleId],
      foreignColumns: [nozzles.plantId, nozzles.id],
    }),
    foreignKey({
      name: 'strategy_revisions_changed_by',
      columns: [t.plantId, t.changedBy],
      foreignColumns: [memberships.plantId, memberships.userId],
    }),
    check('strategy_revisions_number_positive', sql`${t.number} > 0`),
    check(
      'strategy_revisions_state',
      sql`${t.state} in ('draft', 'inReview', 'returned', 'approved', 'superseded', 'withdrawn')`,
    ),
    check('strategy_revisions_gas', sql`${t.gas} = 'oxygen'`),
    check(
      'strategy_revisions_thickness',
      sql`${t.thicknessMin} >= 1000 and ${t.thicknessMin} < ${t.thicknessMax} and ${t.thicknessMax} <= 60000`,
    ),
    check(
      'strategy_revisions_keeps_what_blocks',
      sql`${t.houseRules} is null or not jsonb_path_exists(${t.houseRules}, '$[*] ? (@.blocks == true && @.state != "holds")')`,
    ),
    check(
      'strategy_revisions_columns_are_content',
      sql`coalesce((${t.content} ->> 'machineRevisionId')::uuid = ${t.machineRevisionId}
        and ${t.content} ->> 'gradeGroup' = ${t.gradeGroup}
        and ${t.content} ->> 'gas' = ${t.gas}
        and (${t.content} ->> 'nozzleId')::uuid = ${t.nozzleId}
        and (${t.content} #>> '{thickness,min}')::integer = ${t.thicknessMin}
        and (${t.content} #>> '{thickness,max}')::integer = ${t.thicknessMax}
        and (${t.content} ->> 'hottestPlate')::double precision = ${t.hottestPlate}, false)`,
    ),
  ],
);
