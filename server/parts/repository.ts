import { count, desc, eq, inArray } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { cornerPlans } from '../../db/schema/corner-plans.ts';
import { files } from '../../db/schema/files.ts';
import { parts } from '../../db/schema/parts.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import { limits } from '../../shared/limits.ts';
import type { DrawingAnswers, DrawingReadingWire } from '../../shared/parts.ts';

export type PartRow = typeof parts.$inferSelect;

/** Parts without their readings, newest first. */
export async function partLines(tx: Transaction) {
  const rows = await tx
    .select({
      id: parts.id,
      name: parts.name,
      fileName: parts.fileName,
      width: parts.width,
      height: parts.height,
      outlines: parts.outlines,
      holes: parts.holes,
      addedAt: parts.addedAt,
      addedBy: parts.addedBy,
    })
    .from(parts)
    .orderBy(desc(parts.addedAt), desc(parts.id))
    .limit(limits.listRows);
  if (rows.length === 0) return [];
  const plans = await tx
    .select({ partId: cornerPlans.partId, plans: count() })
    .from(cornerPlans)
    .where(
      inArray(
        cornerPlans.partId,
        rows.map((row) => row.id),
      ),
    )
    .groupBy(cornerPlans.partId);
  const counts = new Map(plans.map((row) => [row.partId, row.plans]));
  return rows.map((row) => ({ ...row, cornerPlans: counts.get(row.id) ?? 0 }));
}

export async function findPart(
  tx: Transaction,
  id: string,
): Promise<{ part: PartRow; file: typeof files.$inferSelect } | null> {
  const [row] = await tx
    .select({ part: parts, file: files })
    .from(parts)
    .innerJoin(files, eq(files.id, parts.fileId))
    .where(eq(parts.id, id));
  return row ?? null;
}

export async function plansOfPart(tx: Transaction, partId: string) {
  return tx
    .select({
      id: cornerPlans.id,
      strategyName: strategies.name,
      revisionNumber: strategyRevisions.number,
      changedAt: cornerPlans.changedAt,
    })
    .from(cornerPlans)
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, cornerPlans.revisionId))
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .where(eq(cornerPlans.partId, partId))
    .orderBy(desc(cornerPlans.changedAt));
}

export async function addPart(
  tx: Transaction,
  row: Pick<PartRow, 'plantId' | 'id' | 'name' | 'fileName' | 'fileId' | 'addedBy'> & {
    answers: DrawingAnswers;
    reading: DrawingReadingWire;
  },
): Promise<void> {
  const { plantId, id, name, fileName, fileId, addedBy, answers, reading } = row;
  const { min, max } = reading.bounds;
  await tx.insert(parts).values({
    plantId,
    id,
    name,
    fileName,
    fileId,
    addedBy,
    answers,
    reading,
    width: max.x - min.x,
    height: max.y - min.y,
    outlines: reading.contours.filter(({ role }) => role === 'outer').length,
    holes: reading.contours.filter(({ role }) => role === 'hole').length,
  });
}
