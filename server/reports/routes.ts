import { desc, eq, sql } from 'drizzle-orm';
import { v7 as newId } from 'uuid';
import type { Transaction } from '../../db/database.ts';
import { machines } from '../../db/schema/machines.ts';
import { plates } from '../../db/schema/plates.ts';
import { reports } from '../../db/schema/reports.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import type { Person } from '../../shared/basics.ts';
import { limits } from '../../shared/limits.ts';
import type { Actor } from '../../shared/policy.ts';
import { reportEndpoints, type Report } from '../../shared/reports.ts';
import { AppError, notFound } from '../errors.ts';
import { photoFrom } from '../files/photo.ts';
import { addFile, findFile } from '../files/repository.ts';
import { findMachine } from '../machines/repository.ts';
import { namesOf } from '../people/names.ts';
import { findPlate } from '../plates/repository.ts';
import { note } from '../record/note.ts';
import { findRevision } from '../revisions/repository.ts';
import type { Mount } from '../route.ts';

export function reportRoutes({ route, services }: Mount): void {
  const { files } = services;

  route(reportEndpoints.list, async ({ tx }) => {
    const names = await namesOf(tx);
    const rows = await reportRows(tx).orderBy(desc(reports.at), desc(reports.id)).limit(limits.listRows);
    return { body: { items: rows.map((row) => present(row, names)) } };
  });

  route(reportEndpoints.get, async ({ tx, params }) => replyWith(tx, params.reportId));

  route(reportEndpoints.photo, async ({ tx, params }) => {
    const [row] = await tx.select().from(reports).where(eq(reports.id, params.reportId));
    const file = row?.photoFileId ? await findFile(tx, row.photoFileId) : null;
    if (!file) throw notFound('The report has no picture');
    return { bytes: () => files.get(file.key), contentType: file.contentType };
  });

  route(
    reportEndpoints.add,
    async ({ file }) => {
      if (!file) return { value: null };
      const photo = await photoFrom(file.bytes);
      const stored = await files.put(photo.bytes, photo.contentType);
      return { value: { photo, stored }, undo: () => files.remove(stored.key) };
    },
    async ({ tx, actor, body, prepared: picture }) => {
      await mustBeHere(tx, actor, body);
      const { id, revisionId, machineId, plateId, kind, words, thickness } = body;
      const photoFileId = picture ? newId() : null;
      if (picture && photoFileId) await addFile(tx, actor.plantId, photoFileId, picture.stored);
      await tx.insert(reports).values({
        plantId: actor.plantId,
        id,
        revisionId,
        machineId,
        plateId,
        kind,
        words,
        thickness,
        photoFileId,
        photoWidth: picture?.photo.width ?? null,
        photoHeight: picture?.photo.height ?? null,
        by: actor.userId,
      });
      await note(
        tx,
        actor,
        'report.made',
        { kind: 'report', id },
        {
          revisionId,
          machineId,
          plateId,
          kind,
          words,
          thickness,
          photo: picture?.stored.sha256 ?? null,
        },
      );
      return { ...(await replyWith(tx, id)), status: 201 };
    },
  );

  route(reportEndpoints.close, async ({ tx, actor, params, body, unchanged }) => {
    const [row] = await tx.select().from(reports).where(eq(reports.id, params.reportId)).for('update');
    if (!row) throw notFound('There is no such report');
    unchanged(row.version);
    if (row.closedAt) throw new AppError('wrong-state', 'The report is closed already.');
    await tx
      .update(reports)
      .set({ closedAt: sql`now()`, closedBy: actor.userId, closedWords: body.words, version: row.version + 1 })
      .where(eq(reports.id, row.id));
    await note(tx, actor, 'report.closed', { kind: 'report', id: row.id }, { words: body.words });
    return replyWith(tx, row.id);
  });
}

/** An operator knows approved strategies only, and those that were: the card in their hand may be an hour old. */
async function mustBeHere(
  tx: Transaction,
  actor: Actor,
  { revisionId, machineId, plateId }: { revisionId: string; machineId: string; plateId: string | null },
): Promise<void> {
  const revision = await findRevision(tx, revisionId);
  const known =
    revision && (actor.role !== 'operator' || ['approved', 'superseded', 'withdrawn'].includes(revision.state));
  if (!known) throw notFound('There is no such revision');
  if (!(await findMachine(tx, machineId))) throw notFound('There is no such machine');
  if (plateId !== null && !(await findPlate(tx, plateId))) throw notFound('There is no such plate');
}

function reportRows(tx: Transaction) {
  return tx
    .select({
      report: reports,
      strategy: { id: strategies.id, name: strategies.name },
      revision: { id: strategyRevisions.id, number: strategyRevisions.number },
      machine: { id: machines.id, name: machines.name },
      plateTag: plates.tag,
    })
    .from(reports)
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, reports.revisionId))
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .innerJoin(machines, eq(machines.id, reports.machineId))
    .leftJoin(plates, eq(plates.id, reports.plateId))
    .$dynamic();
}

type Row = Awaited<ReturnType<typeof reportRows>>[number];

function present({ report, strategy, revision, machine, plateTag }: Row, names: (id: string) => Person): Report {
  return {
    id: report.id,
    version: report.version,
    kind: report.kind,
    words: report.words,
    by: names(report.by),
    at: report.at.toISOString(),
    strategy: { id: strategy.id, name: strategy.name },
    revision: { id: revision.id, number: revision.number },
    machine: { id: machine.id, name: machine.name },
    plateTag,
    photo:
      report.photoWidth !== null && report.photoHeight !== null
        ? { width: report.photoWidth, height: report.photoHeight }
        : null,
    closed:
      report.closedAt && report.closedBy
        ? { by: names(report.closedBy), at: report.closedAt.toISOString(), words: report.closedWords ?? '' }
        : null,
  };
}

async function replyWith(tx: Transaction, id: string) {
  const [row] = await reportRows(tx).where(eq(reports.id, id));
  if (!row) throw notFound('There is no such report');
  return { body: present(row, await namesOf(tx)), version: row.report.version };
}
