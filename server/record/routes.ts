import { desc, lt } from 'drizzle-orm';
import { record } from '../../db/schema/record.ts';
import { recordEndpoints, type RecordEntry } from '../../shared/record.ts';
import { namesOf } from '../people/names.ts';
import type { Mount } from '../route.ts';
import { verifyRecord } from './verify.ts';

const pageRows = 100;

export function recordRoutes({ route }: Mount): void {
  route(recordEndpoints.list, async ({ tx, query }) => {
    const rows = await tx
      .select()
      .from(record)
      .where(query.before === undefined ? undefined : lt(record.sequence, query.before))
      .orderBy(desc(record.sequence))
      .limit(pageRows);
    const names = await namesOf(tx);
    return {
      body: {
        items: rows.map((row): RecordEntry => ({
          sequence: row.sequence,
          at: row.at.toISOString(),
          actorId: row.actorId,
          actorName: row.actorId === null ? null : names(row.actorId).name,
          event: row.event,
          subject: { kind: row.subjectKind, id: row.subjectId },
          facts: row.facts,
          hash: row.hash,
        })),
      },
    };
  });

  route(recordEndpoints.verify, async ({ tx }) => ({ body: await verifyRecord(tx) }));
}
