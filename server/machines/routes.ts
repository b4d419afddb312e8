import type { Transaction } from '../../db/database.ts';
import { machineEndpoints } from '../../shared/machines.ts';
import { notFound } from '../errors.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { presentMachine } from './present.ts';
import {
  addMachine,
  addMachineRevision,
  allMachines,
  findMachine,
  lockMachine,
  newestRevision,
  raiseMachineVersion,
} from './repository.ts';

export function machineRoutes({ route }: Mount): void {
  route(machineEndpoints.list, async ({ tx }) => {
    const names = await namesOf(tx);
    return { body: { items: (await allMachines(tx)).map((one) => presentMachine(one, names)) } };
  });

  route(machineEndpoints.get, async ({ tx, params }) => replyWith(tx, params.machineId));

  route(machineEndpoints.add, async ({ tx, actor, body }) => {
    const { plantId, userId } = actor;
    await addMachine(tx, { plantId, id: body.id, name: body.name });
    await addMachineRevision(tx, {
      plantId,
      id: body.revisionId,
      machineId: body.id,
      number: 1,
      profile: body.profile,
      note: body.note,
      madeBy: userId,
    });
    await note(
      tx,
      actor,
      'machine.added',
      { kind: 'machine', id: body.id },
      {
        name: body.name,
        revisionId: body.revisionId,
      },
    );
    return { ...(await replyWith(tx, body.id)), status: 201 };
  });

  route(machineEndpoints.revise, async ({ tx, actor, params, body, unchanged }) => {
    const machine = await lockMachine(tx, params.machineId);
    if (!machine) throw notFound('There is no such machine');
    unchanged(machine.version);
    const number = ((await newestRevision(tx, machine.id))?.number ?? 0) + 1;
    await addMachineRevision(tx, {
      plantId: actor.plantId,
      id: body.id,
      machineId: machine.id,
      number,
      profile: body.profile,
      note: body.note,
      madeBy: actor.userId,
    });
    await raiseMachineVersion(tx, machine);
    await note(tx, actor, 'machine.revised', { kind: 'machine', id: machine.id }, { revisionId: body.id, number });
    return { ...(await replyWith(tx, machine.id)), status: 201 };
  });
}

async function replyWith(tx: Transaction, id: string) {
  const found = await findMachine(tx, id);
  if (!found) throw notFound('There is no such machine');
  return { body: presentMachine(found, await namesOf(tx)), version: found.machine.version };
}
