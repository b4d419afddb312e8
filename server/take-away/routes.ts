import { inPlant, type Transaction } from '../../db/database.ts';
import { blockFrameEndpoints, cutPathEndpoints, type TakeAwayFormat } from '../../shared/take-away.ts';
import { notFound } from '../errors.ts';
import { lockMachine } from '../machines/repository.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { findBlockFrame, findTakenPlan, writeBlockFrame } from './repository.ts';
import { fileName } from './words.ts';

const contentTypes: Readonly<Record<TakeAwayFormat, string>> = {
  dxf: 'image/vnd.dxf',
  svg: 'image/svg+xml',
  // no type is registered for blocks
  iso: 'text/plain; charset=us-ascii',
  pdf: 'application/pdf',
};

export function takeAwayRoutes({ route, services }: Mount): void {
  // Computing it takes seconds for thousands of corners: not while a transaction is open. An operator sees it as long as the plan.
  route(
    cutPathEndpoints.show,
    async ({ actor, params }) => {
      const taken = await inPlant(services.database, actor.plantId, (tx) => findTakenPlan(tx, params.planId), 'read');
      if (!taken || (actor.role === 'operator' && taken.revision.state !== 'approved')) {
        throw notFound('There is no such corner plan');
      }
      return { value: await services.cutFiles.path(taken) };
    },
    async ({ prepared }) => ({ body: prepared }),
  );

  route(cutPathEndpoints.take, async ({ tx, params, query: { as, unit } }) => {
    const taken = await findTakenPlan(tx, params.planId);
    if (!taken) throw notFound('There is no such corner plan');
    return {
      bytes: () => services.cutFiles.make({ taken, as, unit, at: services.now() }),
      contentType: contentTypes[as],
      saveAs: fileName(taken, as, unit),
    };
  });

  route(blockFrameEndpoints.get, async ({ tx, params }) => replyWith(tx, params.machineId));

  route(blockFrameEndpoints.change, async ({ tx, actor, params, body, unchanged }) => {
    const machine = await lockMachine(tx, params.machineId);
    if (!machine) throw notFound('There is no such machine');
    unchanged(machine.version);
    await writeBlockFrame(tx, machine, body);
    await note(tx, actor, 'machine.blockFrameWritten', { kind: 'machine', id: machine.id }, body);
    return replyWith(tx, machine.id);
  });
}

async function replyWith(tx: Transaction, machineId: string) {
  const frame = await findBlockFrame(tx, machineId);
  if (!frame) throw notFound('There is no such machine');
  return { body: frame, version: frame.version };
}
