import { asc } from 'drizzle-orm';
import { grades } from '../../db/schema/grades.ts';
import { limits } from '../../shared/limits.ts';
import { gradeEndpoints } from '../../shared/machines.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';

export function gradeRoutes({ route }: Mount): void {
  route(gradeEndpoints.list, async ({ tx }) => {
    const rows = await tx.select().from(grades).orderBy(asc(grades.group), asc(grades.name)).limit(limits.listRows);
    return { body: { items: rows.map(({ id, name, group }) => ({ id, name, group })) } };
  });

  route(gradeEndpoints.add, async ({ tx, actor, body: { id, name, group } }) => {
    await tx.insert(grades).values({ plantId: actor.plantId, id, name, group });
    await note(tx, actor, 'grade.added', { kind: 'grade', id }, { name, group });
    return { body: { id, name, group }, status: 201 };
  });
}
