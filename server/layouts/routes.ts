import { inPlant, type Transaction } from '../../db/database.ts';
import { laidOut, laidPart, layoutEndpoints, type LayoutForm } from '../../shared/layouts.ts';
import { limits } from '../../shared/limits.ts';
import {
  plateRectangle,
  plateRemnant,
  type LayoutJudgement,
  type PlacedPart,
  type PlateOutline,
} from '../../strategy/path/plate/index.ts';
import { AppError, notFound } from '../errors.ts';
import { namesOf } from '../people/names.ts';
import { findPlate } from '../plates/repository.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import type { Services } from '../services.ts';
import { laidPartOf, presentLayout, presentLayoutLine } from './present.ts';
import {
  addLayout,
  changeLayout,
  findLayout,
  layoutLines,
  lockLayout,
  partGeometries,
  plansOfLayout,
  type LayoutContent,
} from './repository.ts';

export function layoutRoutes({ route, services }: Mount): void {
  route(layoutEndpoints.list, async ({ tx }) => {
    const names = await namesOf(tx);
    return { body: { items: (await layoutLines(tx)).map((line) => presentLayoutLine(line, names)) } };
  });

  route(layoutEndpoints.get, async ({ tx, params }) => replyWith(tx, params.layoutId));

  // Judged in a worker, before the transaction: parts never change, and a plate's size is kept as it was seen.
  route(
    layoutEndpoints.add,
    async ({ actor, body }) => ({ value: await judged(services, actor.plantId, body) }),
    async ({ tx, actor, body, prepared: content }) => {
      const { id, name } = body;
      await addLayout(tx, { plantId: actor.plantId, id, name, changedBy: actor.userId }, content);
      await note(tx, actor, 'layout.added', { kind: 'layout', id }, factsOf(body, content));
      return { ...(await replyWith(tx, id)), status: 201 };
    },
  );

  route(
    layoutEndpoints.change,
    async ({ actor, params, body }) => {
      const there = await inPlant(services.database, actor.plantId, (tx) => findLayout(tx, params.layoutId), 'read');
      if (!there) throw notFound('There is no such layout');
      return { value: await judged(services, actor.plantId, body) };
    },
    async ({ tx, actor, params, body, unchanged, prepared: content }) => {
      const row = await lockLayout(tx, params.layoutId);
      if (!row) throw notFound('There is no such layout');
      unchanged(row.version);
      await changeLayout(tx, row, body.name, actor.userId, content);
      await note(
        tx,
        actor,
        'layout.changed',
        { kind: 'layout', id: row.id },
        {
          ...factsOf(body, content),
          version: row.version + 1,
        },
      );
      return replyWith(tx, row.id);
    },
  );
}

/** What the record keeps: the version's own row holds where each piece lies. */
const factsOf = ({ name, plate }: LayoutForm, { version: { pieces, orderBy, problems } }: LayoutContent) => ({
  name,
  plate,
  pieces,
  orderBy,
  problems: problems.length,
});

async function judged(services: Services, plantId: string, form: LayoutForm): Promise<LayoutContent> {
  const { outline, parts } = await inPlant(services.database, plantId, (tx) => sourceOf(tx, form), 'read');
  const room = { kerfWidth: form.kerfWidth, clearance: form.clearance, edgeMargin: form.edgeMargin };
  const judgement = await services.drawings.layout({ parts, outline, room, order: form.order });
  const { fault } = judgement;
  if (fault !== null) throw invalid('/order', `This cut order can’t be: ${fault}.`);
  return { version: columnsOf(form, outline, judgement), placements: form.placements };
}

function columnsOf(form: LayoutForm, { box }: PlateOutline, judgement: LayoutJudgement): LayoutContent['version'] {
  const { plate } = form;
  return {
    plateId: plate.kind === 'plate' ? plate.plateId : null,
    remnantId: plate.kind === 'remnant' ? plate.partId : null,
    width: box.maxX - box.minX,
    height: box.maxY - box.minY,
    kerfWidth: form.kerfWidth,
    clearance: form.clearance,
    edgeMargin: form.edgeMargin,
    orderBy: form.order === null ? 'computed' : 'hand',
    cutOrder: [...judgement.order],
    pieces: form.placements.length,
    problems: judgement.problems.map(({ kind, placements, at, why }) => ({
      kind,
      placements: [...placements],
      at,
      why,
    })),
    moreProblems: judgement.moreProblems,
    travel: judgement.travel,
    cutLength: judgement.cutLength,
  };
}

async function sourceOf(tx: Transaction, form: LayoutForm): Promise<{ outline: PlateOutline; parts: PlacedPart[] }> {
  const known = (
    await partGeometries(
      tx,
      form.placements.map(({ partId }) => partId),
    )
  ).map(laidPartOf);
  form.placements.forEach(({ partId }, i) => {
    if (!known.some(({ id }) => id === partId)) throw invalid(`/placements/${i}/partId`, 'There is no such part.');
  });
  const parts = laidOut(known, form.placements);
  const contours = parts.reduce((sum, part) => sum + part.contours.length, 0);
  const segments = parts
    .flatMap((part) => part.contours)
    .reduce((sum, { contour }) => sum + contour.segments.length, 0);
  if (contours > limits.layoutContours || segments > limits.layoutSegments) {
    throw invalid(
      '/placements',
      `These pieces have ${contours} contours of ${segments} lines and arcs; a layout takes ${limits.layoutContours} and ${limits.layoutSegments} at most.`,
    );
  }
  return { outline: await outlineAsked(tx, form.plate), parts };
}

async function outlineAsked(tx: Transaction, plate: LayoutForm['plate']): Promise<PlateOutline> {
  switch (plate.kind) {
    case 'rectangle':
      return plateRectangle(plate.width, plate.height);
    case 'plate': {
      const found = await findPlate(tx, plate.plateId);
      if (!found) throw invalid('/plate/plateId', 'There is no such plate.');
      const { length, width } = found.plate;
      if (length === null || width === null) {
        throw invalid('/plate/plateId', 'The size of this plate is not known. Correct the plate, or type the size.');
      }
      return plateRectangle(length, width);
    }
    case 'remnant': {
      const [found] = await partGeometries(tx, [plate.partId]);
      const outline = found && plateRemnant(laidPart(laidPartOf(found)).contours);
      if (!outline) throw invalid('/plate/partId', 'There is no such drawing.');
      return outline;
    }
  }
}

const invalid = (pointer: string, detail: string) =>
  new AppError('invalid-fields', detail, { errors: [{ pointer, detail }] });

async function replyWith(tx: Transaction, id: string) {
  const found = await findLayout(tx, id);
  if (!found) throw notFound('There is no such layout');
  const body = presentLayout(found, await plansOfLayout(tx, id), await namesOf(tx));
  return { body, version: found.layout.version };
}
