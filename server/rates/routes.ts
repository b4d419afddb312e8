import type { Transaction } from '../../db/database.ts';
import { rateEndpoints, type PlantRates, type RatesForm } from '../../shared/rates.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { findRates, lockRates, writeRates, type RatesRow } from './repository.ts';

export function rateRoutes({ route }: Mount): void {
  route(rateEndpoints.get, async ({ tx }) => replyWith(tx, await findRates(tx)));

  route(rateEndpoints.change, async ({ tx, actor, body, unchanged }) => {
    const before = await lockRates(tx);
    unchanged(before.version);
    const after = await writeRates(tx, before, body, actor.userId);
    // a plant's one row: it is called by the plant
    await note(
      tx,
      actor,
      'rates.changed',
      { kind: 'rates', id: actor.plantId },
      { version: after.version, from: written(before), to: written(after) },
    );
    return replyWith(tx, after);
  });
}

const written = ({
  currency,
  machineHour,
  oxygenKilogram,
  electricityKilowattHour,
  wallPlugEfficiency,
}: RatesRow): RatesForm => ({ currency, machineHour, oxygenKilogram, electricityKilowattHour, wallPlugEfficiency });

async function replyWith(tx: Transaction, row: RatesRow): Promise<{ body: PlantRates; version: number }> {
  const names = await namesOf(tx);
  return {
    version: row.version,
    body: {
      ...written(row),
      version: row.version,
      changedAt: row.changedAt.toISOString(),
      changedBy: row.changedBy === null ? null : names(row.changedBy),
    },
  };
}
