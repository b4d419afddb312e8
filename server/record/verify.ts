import { asc, gt } from 'drizzle-orm';
import { createHash } from 'node:crypto';
import { isDeepStrictEqual } from 'node:util';
import type { Transaction } from '../../db/database.ts';
import { recordHeads } from '../../db/schema/record-heads.ts';
import { record } from '../../db/schema/record.ts';

export type Broken = { readonly sequence: number; readonly why: string };

type Entry = typeof record.$inferSelect;

const batch = 1000;
const start = { sequence: 0, hash: '0'.repeat(64) };

/** Recomputes the chain of the plant's record, entry by entry, and names the first that does not hold. */
export async function verifyRecord(tx: Transaction): Promise<{ entries: number; broken: Broken | null }> {
  let last: { sequence: number; hash: string } = start;
  let entries = 0;
  for (;;) {
    const page = await tx
      .select()
      .from(record)
      .where(gt(record.sequence, last.sequence))
      .orderBy(asc(record.sequence))
      .limit(batch);
    for (const entry of page) {
      const why = faultOf(entry, last);
      if (why) return { entries, broken: { sequence: last.sequence + 1, why } };
      last = entry;
      entries += 1;
    }
    if (page.length < batch) break;
  }
  const [head = start] = await tx.select().from(recordHeads);
  if (head.sequence !== last.sequence || head.hash !== last.hash) {
    return {
      entries,
      broken: { sequence: last.sequence + 1, why: `the record should end with number ${head.sequence}` },
    };
  }
  return { entries, broken: null };
}

function faultOf(entry: Entry, last: { sequence: number; hash: string }): string | null {
  if (entry.sequence !== last.sequence + 1) return 'this entry is missing';
  if (entry.previousHash !== last.hash) return 'the entry does not follow from the one before';
  const hash = createHash('sha256')
    .update(entry.previousHash + entry.canonical)
    .digest('hex');
  if (hash !== entry.hash) return 'the text is not the one that was hashed';
  const said = {
    plantId: entry.plantId,
    sequence: entry.sequence,
    at: entry.at.toISOString(),
    actorId: entry.actorId,
    event: entry.event,
    subject: { kind: entry.subjectKind, id: entry.subjectId },
    facts: entry.facts,
  };
  let text: unknown;
  try {
    text = JSON.parse(entry.canonical);
  } catch {
    return 'the text is not JSON';
  }
  return isDeepStrictEqual(text, said) ? null : 'the columns do not say what the text says';
}
