import { desc, eq, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { approvals } from '../../db/schema/approvals.ts';
import { machines } from '../../db/schema/machines.ts';
import { plates } from '../../db/schema/plates.ts';
import { requests } from '../../db/schema/requests.ts';
import type { Person } from '../../shared/basics.ts';
import { requestEndpoints, type StrategyRequest } from '../../shared/cards.ts';
import { limits } from '../../shared/limits.ts';
import { AppError } from '../errors.ts';
import { findMachine } from '../machines/repository.ts';
import { namesOf } from '../people/names.ts';
import { findPlate } from '../plates/repository.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';

export function requestRoutes({ route }: Mount): void {
  route(requestEndpoints.list, async ({ tx }) => {
    const names = await namesOf(tx);
    const rows = await requestRows(tx).orderBy(desc(requests.at), desc(requests.id)).limit(limits.listRows);
    return { body: { items: rows.map((row) => present(row, names)) } };
  });

  route(requestEndpoints.add, async ({ tx, actor, body }) => {
    const { id, machineId, gradeGroup, thickness, plateId, words } = body;
    const errors = [
      ...((await findMachine(tx, machineId))
        ? []
        : [{ pointer: '/machineId', detail: 'Choose a machine of this plant.' }]),
      ...(plateId === null || (await findPlate(tx, plateId))
        ? []
        : [{ pointer: '/plateId', detail: 'Choose a plate of this plant.' }]),
    ];
    if (errors.length > 0) throw new AppError('invalid-fields', errors[0]?.detail ?? '', { errors });
    await tx
      .insert(requests)
      .values({ plantId: actor.plantId, id, machineId, gradeGroup, thickness, plateId, words, by: actor.userId });
    await note(
      tx,
      actor,
      'request.made',
      { kind: 'request', id },
      { machineId, gradeGroup, thickness, plateId, words },
    );
    const [row] = await requestRows(tx).where(eq(requests.id, id));
    if (!row) throw new Error('the request just made is not there');
    return { body: present(row, await namesOf(tx)), status: 201 };
  });
}

function requestRows(tx: Transaction) {
  return tx
    .select({
      request: requests,
      machineName: machines.name,
      plateTag: plates.tag,
      answered: sql<boolean>`exists (
        select 1 from ${approvals} where ${approvals.endedAt} is null and ${approvals.machineId} = ${requests.machineId}
          and ${approvals.gradeGroup} = ${requests.gradeGroup} and ${approvals.gas} = 'oxygen'
          and int4range(${approvals.thicknessMin}, ${approvals.thicknessMax}, '[)') @> ${requests.thickness}
      )`,
    })
    .from(requests)
    .innerJoin(machines, eq(machines.id, requests.machineId))
    .leftJoin(plates, eq(plates.id, requests.plateId))
    .$dynamic();
}

type Row = {
  request: typeof requests.$inferSelect;
  machineName: string;
  plateTag: string | null;
  answered: boolean;
};

const present = (
  { request, machineName, plateTag, answered }: Row,
  names: (id: string) => Person,
): StrategyRequest => ({
  id: request.id,
  machine: { id: request.machineId, name: machineName },
  gradeGroup: request.gradeGroup,
  thickness: request.thickness,
  plateTag,
  words: request.words,
  by: names(request.by),
  at: request.at.toISOString(),
  answered,
});
