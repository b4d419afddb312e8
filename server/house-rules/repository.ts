import { asc, eq, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { houseRules } from '../../db/schema/house-rules.ts';
import { limits } from '../../shared/limits.ts';

export type HouseRuleRow = typeof houseRules.$inferSelect;
type Written = Pick<HouseRuleRow, 'expression' | 'sentence' | 'blocks'>;

/** All rules, those in force first. */
export async function allRules(tx: Transaction): Promise<HouseRuleRow[]> {
  return tx
    .select()
    .from(houseRules)
    .orderBy(sql`${houseRules.endedAt} is not null`, ...inOrder)
    .limit(limits.listRows);
}

export async function rulesInForce(tx: Transaction): Promise<HouseRuleRow[]> {
  return tx
    .select()
    .from(houseRules)
    .where(isNull(houseRules.endedAt))
    .orderBy(...inOrder);
}

export async function lockRule(tx: Transaction, id: string): Promise<HouseRuleRow | null> {
  const [row] = await tx.select().from(houseRules).where(eq(houseRules.id, id)).for('update');
  return row ?? null;
}

export async function addRule(
  tx: Transaction,
  {
    plantId,
    id,
    expression,
    sentence,
    blocks,
    changedBy,
  }: Written & Pick<HouseRuleRow, 'plantId' | 'id' | 'changedBy'>,
): Promise<HouseRuleRow> {
  return one(await tx.insert(houseRules).values({ plantId, id, expression, sentence, blocks, changedBy }).returning());
}

/** The rule's next version. */
export async function rewriteRule(
  tx: Transaction,
  rule: HouseRuleRow,
  { expression, sentence, blocks }: Written,
  by: string,
): Promise<HouseRuleRow> {
  return one(
    await tx
      .update(houseRules)
      .set({ expression, sentence, blocks, version: rule.version + 1, changedBy: by, changedAt: sql`now()` })
      .where(eq(houseRules.id, rule.id))
      .returning(),
  );
}

export async function endRule(tx: Transaction, rule: HouseRuleRow, by: string): Promise<HouseRuleRow> {
  return one(
    await tx
      .update(houseRules)
      .set({ endedAt: sql`now()`, version: rule.version + 1, changedBy: by, changedAt: sql`now()` })
      .where(eq(houseRules.id, rule.id))
      .returning(),
  );
}

// Rules about the same result stand together.
const inOrder = [asc(houseRules.expression), asc(houseRules.id)];

function one(rows: readonly HouseRuleRow[]): HouseRuleRow {
  const [row] = rows;
  if (!row) throw new Error('the house rule was written but not returned');
  return row;
}
