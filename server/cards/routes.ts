import type { Transaction } from '../../db/database.ts';
import { cardEndpoints, type Card } from '../../shared/cards.ts';
import { reserveRulesOf } from '../../shared/prediction.ts';
import { plansWith } from '../corner-plans/repository.ts';
import { notFound } from '../errors.ts';
import { rulesInForce } from '../house-rules/repository.ts';
import { findMachine } from '../machines/repository.ts';
import { namesOf } from '../people/names.ts';
import { findPlateByTag, presentPlate } from '../plates/repository.ts';
import type { Mount } from '../route.ts';
import { cardMatch } from './card.ts';
import { approvedFor, isRequested, type Wanted } from './repository.ts';

export function cardRoutes({ route, services }: Mount): void {
  route(cardEndpoints.get, async ({ tx, query }) => {
    const found = await findMachine(tx, query.machineId);
    if (!found) throw notFound('There is no such machine');
    const { machine, revisions } = found;
    const row = 'tag' in query ? await findPlateByTag(tx, query.tag) : null;
    if ('tag' in query && !row) throw notFound(`No plate with the tag ${query.tag} is booked in`);
    const plate = row ? presentPlate(row) : null;
    const wanted: Wanted = {
      machineId: machine.id,
      ...('tag' in query
        ? { gradeGroup: plate?.grade.group ?? '', nominalThickness: plate?.nominalThickness ?? 0 }
        : { gradeGroup: query.gradeGroup, nominalThickness: query.thickness }),
    };
    const card: Card = {
      asOf: services.now().toISOString(),
      machine: { id: machine.id, name: machine.name },
      plate,
      gradeGroup: wanted.gradeGroup,
      nominalThickness: wanted.nominalThickness,
      match: await matchFor(tx, wanted, plate, machine.name, revisions[0]?.number ?? 0),
    };
    return { body: card };
  });
}

async function matchFor(
  tx: Transaction,
  wanted: Wanted,
  plate: Card['plate'],
  machineName: string,
  newestMachineRevision: number,
): Promise<Card['match']> {
  const found = await approvedFor(tx, wanted);
  if (!found) {
    return {
      kind: 'none',
      why: `No approved strategy for ${wanted.gradeGroup}, ${wanted.nominalThickness / 1000} mm, on ${machineName}.`,
      requested: await isRequested(tx, wanted),
    };
  }
  const names = await namesOf(tx);
  const plans = await plansWith(tx, found.revision.id);
  const rules = await rulesInForce(tx);
  return cardMatch({
    found,
    newestMachineRevision,
    approvedBy: names(found.approval.approvedBy).name,
    plate,
    reserve: reserveRulesOf(rules.map(({ expression }) => expression)),
    nominalThickness: wanted.nominalThickness,
    cornerPlans: plans.map(({ id, partId, partName, totals }) => ({
      id,
      partId,
      partName,
      corners: totals.corners,
      loops: totals.loops,
      dwells: totals.dwells,
      addedTime: totals.addedTime,
    })),
  });
}
