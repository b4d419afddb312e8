import { eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { Transaction } from '../../db/database.ts';
import { grades } from '../../db/schema/grades.ts';
import { plates } from '../../db/schema/plates.ts';
import { plateEndpoints, type plateFormSchema } from '../../shared/plates.ts';
import { AppError, notFound } from '../errors.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { findPlate, lockPlate, platesTagged, presentPlate } from './repository.ts';

export function plateRoutes({ route }: Mount): void {
  route(plateEndpoints.list, async ({ tx, query }) => ({
    body: { items: (await platesTagged(tx, query.tag)).map(presentPlate) },
  }));

  route(plateEndpoints.get, async ({ tx, params }) => replyWith(tx, params.plateId));

  route(plateEndpoints.add, async ({ tx, actor, body }) => {
    await gradeMustExist(tx, body.gradeId);
    await tx
      .insert(plates)
      .values({ plantId: actor.plantId, id: body.id, ...columnsOf(body), changedBy: actor.userId });
    await note(tx, actor, 'plate.added', { kind: 'plate', id: body.id }, columnsOf(body));
    return { ...(await replyWith(tx, body.id)), status: 201 };
  });

  route(plateEndpoints.change, async ({ tx, actor, params, body, unchanged }) => {
    const row = await lockPlate(tx, params.plateId);
    if (!row) throw notFound('There is no such plate');
    unchanged(row.version);
    await gradeMustExist(tx, body.gradeId);
    await tx
      .update(plates)
      .set({ ...columnsOf(body), version: row.version + 1, changedAt: sql`now()`, changedBy: actor.userId })
      .where(eq(plates.id, row.id));
    await note(
      tx,
      actor,
      'plate.changed',
      { kind: 'plate', id: row.id },
      {
        from: columnsOf(row),
        to: columnsOf(body),
        version: row.version + 1,
      },
    );
    return replyWith(tx, row.id);
  });
}

type Form = z.output<typeof plateFormSchema>;

const columnsOf = (form: Form): Form => ({
  tag: form.tag,
  gradeId: form.gradeId,
  heatNumber: form.heatNumber,
  nominalThickness: form.nominalThickness,
  measuredThickness: form.measuredThickness,
  surface: form.surface,
  certificate: form.certificate,
  length: form.length,
  width: form.width,
});

async function gradeMustExist(tx: Transaction, gradeId: string): Promise<void> {
  const [row] = await tx.select({ id: grades.id }).from(grades).where(eq(grades.id, gradeId));
  if (row) return;
  throw new AppError('invalid-fields', 'Choose a grade of this plant.', {
    errors: [{ pointer: '/gradeId', detail: 'Choose a grade of this plant.' }],
  });
}

async function replyWith(tx: Transaction, id: string) {
  const row = await findPlate(tx, id);
  if (!row) throw notFound('There is no such plate');
  return { body: presentPlate(row), version: row.plate.version };
}
