import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { rates } from '../../db/schema/rates.ts';
import type { RatesForm } from '../../shared/rates.ts';

export type RatesRow = typeof rates.$inferSelect;

/** The plant's own row: it is there from the plant's founding. */
export async function findRates(tx: Transaction): Promise<RatesRow> {
  return one(await tx.select().from(rates));
}

export async function lockRates(tx: Transaction): Promise<RatesRow> {
  return one(await tx.select().from(rates).for('update'));
}

/** The rates' next version. */
export async function writeRates(
  tx: Transaction,
  before: RatesRow,
  { currency, machineHour, oxygenKilogram, electricityKilowattHour, wallPlugEfficiency }: RatesForm,
  by: string,
): Promise<RatesRow> {
  return one(
    await tx
      .update(rates)
      .set({
        currency,
        machineHour,
        oxygenKilogram,
        electricityKilowattHour,
        wallPlugEfficiency,
        version: before.version + 1,
        changedBy: by,
        changedAt: sql`now()`,
      })
      .where(eq(rates.plantId, before.plantId))
      .returning(),
  );
}

function one(rows: readonly RatesRow[]): RatesRow {
  const [row] = rows;
  if (!row) throw new Error('a plant has no row of rates');
  return row;
}
