import type { Transaction } from '../../db/database.ts';
import { users } from '../../db/schema/users.ts';
import type { Person } from '../../shared/basics.ts';

/** Names of everybody who is or was of this plant: a few dozen rows, read once for an answer that names several people. */
export async function namesOf(tx: Transaction): Promise<(userId: string) => Person> {
  const rows = await tx.select({ id: users.id, name: users.name }).from(users);
  const byId = new Map(rows.map((row) => [row.id, row.name]));
  return (userId) => ({ id: userId, name: byId.get(userId) ?? 'somebody no longer here' });
}
