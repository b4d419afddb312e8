import { v7 as newId } from 'uuid';
import type { Transaction } from '../../db/database.ts';
import { partEndpoints, type DrawingAnswers, type DrawingReadingWire } from '../../shared/parts.ts';
import { AppError, notFound } from '../errors.ts';
import { addFile } from '../files/repository.ts';
import type { UploadedFile } from '../files/upload.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { presentPart, presentPartLine } from './present.ts';
import { addPart, findPart, partLines, plansOfPart } from './repository.ts';

export function partRoutes({ route, services }: Mount): void {
  const { drawings, files } = services;

  route(partEndpoints.list, async ({ tx }) => {
    const names = await namesOf(tx);
    return { body: { items: (await partLines(tx)).map((line) => presentPartLine(line, names)) } };
  });

  route(partEndpoints.get, async ({ tx, params }) => replyWith(tx, params.partId));

  route(partEndpoints.file, async ({ tx, params }) => {
    const found = await findPart(tx, params.partId);
    if (!found) throw notFound('There is no such part');
    // Saved, never shown: what somebody uploaded is not to run as a page of ours.
    return {
      bytes: () => files.get(found.file.key),
      contentType: 'application/octet-stream',
      saveAs: found.part.fileName,
    };
  });

  route(
    partEndpoints.read,
    async ({ file, body }) => ({ value: await drawings.read(bytesOf(file), body) }),
    async ({ prepared }) => ({ body: prepared }),
  );

  route(
    partEndpoints.add,
    async ({ body, file }) => {
      const bytes = bytesOf(file);
      const reading = await drawings.read(bytes, body.answers);
      mustBeDecided(reading, body.answers);
      const stored = await files.put(bytes, 'application/octet-stream');
      return { value: { reading, stored }, undo: () => files.remove(stored.key) };
    },
    async ({ tx, actor, body, file, prepared: { reading, stored } }) => {
      const fileId = newId();
      await addFile(tx, actor.plantId, fileId, stored);
      await addPart(tx, {
        plantId: actor.plantId,
        id: body.id,
        name: body.name,
        fileName: file?.name ?? 'drawing',
        fileId,
        addedBy: actor.userId,
        answers: body.answers,
        reading,
      });
      await note(
        tx,
        actor,
        'part.added',
        { kind: 'part', id: body.id },
        {
          name: body.name,
          sha256: stored.sha256,
          answers: body.answers,
        },
      );
      return { ...(await replyWith(tx, body.id)), status: 201 };
    },
  );
}

const bytesOf = (file: UploadedFile | null): Uint8Array => file?.bytes ?? new Uint8Array();

/** A part is kept only when nothing about its drawing is left to guess. */
function mustBeDecided(reading: DrawingReadingWire, answers: DrawingAnswers): void {
  const errors = reading.questions.flatMap((question) => {
    if (question.kind === 'unit' && !answers.unit) return [{ pointer: '/answers/unit', detail: question.why }];
    if (question.kind === 'gaps' && answers.gapTolerance === undefined) {
      return [{ pointer: '/answers/gapTolerance', detail: question.why }];
    }
    return [];
  });
  // What an answer may still mend is asked before it is refused.
  if (errors.length > 0)
    throw new AppError('invalid-fields', 'The drawing leaves something to be decided.', { errors });
  if (reading.contours.length === 0) {
    throw new AppError(
      'bad-drawing',
      'No outline of the drawing is closed. Close its gaps with a tolerance, or close the outline in the drawing and export it again.',
    );
  }
  if (reading.crossings.length > 0) {
    const places = reading.crossings.length === 1 ? 'one place' : `${reading.crossings.length} places`;
    throw new AppError(
      'bad-drawing',
      `Contours cross in ${places}: that is no part yet. Mend the drawing and export it again.`,
    );
  }
}

async function replyWith(tx: Transaction, id: string) {
  const found = await findPart(tx, id);
  if (!found) throw notFound('There is no such part');
  const body = presentPart(found, await plansOfPart(tx, id), await namesOf(tx));
  return { body, version: found.part.version };
}
