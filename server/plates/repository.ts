import { asc, eq, sql, type SQL } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { grades } from '../../db/schema/grades.ts';
import { plates } from '../../db/schema/plates.ts';
import { limits } from '../../shared/limits.ts';
import type { Plate } from '../../shared/plates.ts';

export type PlateRow = { readonly plate: typeof plates.$inferSelect; readonly grade: typeof grades.$inferSelect };

export async function platesTagged(tx: Transaction, part: string | undefined): Promise<PlateRow[]> {
  // Position and not LIKE: a tag may hold % and _.
  const matches = part === undefined ? undefined : sql`position(lower(${part.trim()}) in lower(${plates.tag})) > 0`;
  return joined(tx, matches).orderBy(asc(plates.tag)).limit(limits.listRows);
}

export async function findPlate(tx: Transaction, id: string): Promise<PlateRow | null> {
  return (await joined(tx, eq(plates.id, id)))[0] ?? null;
}

export async function findPlateByTag(tx: Transaction, tag: string): Promise<PlateRow | null> {
  return (await joined(tx, sql`lower(${plates.tag}) = lower(${tag})`))[0] ?? null;
}

export async function lockPlate(tx: Transaction, id: string): Promise<typeof plates.$inferSelect | null> {
  const [row] = await tx.select().from(plates).where(eq(plates.id, id)).for('update');
  return row ?? null;
}

function joined(tx: Transaction, where: SQL | undefined) {
  return tx
    .select({ plate: plates, grade: grades })
    .from(plates)
    .innerJoin(grades, eq(grades.id, plates.gradeId))
    .where(where)
    .$dynamic();
}

export function presentPlate({ plate, grade }: PlateRow): Plate {
  return {
    id: plate.id,
    version: plate.version,
    tag: plate.tag,
    gradeId: plate.gradeId,
    grade: { id: grade.id, name: grade.name, group: grade.group },
    heatNumber: plate.heatNumber,
    nominalThickness: plate.nominalThickness,
    measuredThickness: plate.measuredThickness,
    surface: plate.surface,
    certificate: plate.certificate,
    length: plate.length,
    width: plate.width,
    changedAt: plate.changedAt.toISOString(),
  };
}
