import { eq } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { files } from '../../db/schema/files.ts';
import type { StoredFile } from './store.ts';

export async function addFile(tx: Transaction, plantId: string, id: string, stored: StoredFile): Promise<void> {
  const { key, contentType, bytes, sha256 } = stored;
  await tx.insert(files).values({ plantId, id, key, contentType, bytes, sha256 });
}

export async function findFile(tx: Transaction, id: string): Promise<typeof files.$inferSelect | null> {
  const [row] = await tx.select().from(files).where(eq(files.id, id));
  return row ?? null;
}
