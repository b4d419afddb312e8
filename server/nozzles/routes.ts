import { asc, eq } from 'drizzle-orm';
import { nozzles } from '../../db/schema/nozzles.ts';
import { limits } from '../../shared/limits.ts';
import { nozzleEndpoints, type NozzleRow } from '../../shared/machines.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import type { Transaction } from '../../db/database.ts';

export function nozzleRoutes({ route }: Mount): void {
  route(nozzleEndpoints.list, async ({ tx }) => {
    const rows = await tx
      .select()
      .from(nozzles)
      .orderBy(asc(nozzles.type), asc(nozzles.diameter), asc(nozzles.name))
      .limit(limits.listRows);
    return { body: { items: rows.map(presentNozzle) } };
  });

  route(nozzleEndpoints.add, async ({ tx, actor, body }) => {
    const { id, name, type, diameter } = body;
    await tx.insert(nozzles).values({ plantId: actor.plantId, id, name, type, diameter });
    await note(tx, actor, 'nozzle.added', { kind: 'nozzle', id }, { name, type, diameter });
    return { body: { id, name, type, diameter }, status: 201 };
  });
}

export const presentNozzle = ({ id, name, type, diameter }: typeof nozzles.$inferSelect): NozzleRow => ({
  id,
  name,
  type,
  diameter,
});

export async function findNozzle(tx: Transaction, id: string): Promise<typeof nozzles.$inferSelect | null> {
  const [row] = await tx.select().from(nozzles).where(eq(nozzles.id, id));
  return row ?? null;
}
