import { sql } from 'drizzle-orm';
import type { Database } from '../../db/database.ts';
import type { FileStore } from './store.ts';

/** An upload's transaction is over long before this, ms. */
const grace = 3600 * 1000;

/**
 * Removes files that no row knows: left when a server died between storing a file and writing its row. Gives how many.
 */
export async function sweepStrayFiles(database: Database, files: FileStore, now: Date): Promise<number> {
  let removed = 0;
  let batch: string[] = [];
  const sweep = async () => {
    // An array parameter of its own: the query builder would spread it into a list.
    const { rows } = await database.execute<{ key: string }>(
      sql`select stray_file_keys(${sql.param(batch)}::text[]) as key`,
    );
    for (const { key } of rows) await files.remove(key);
    removed += rows.length;
    batch = [];
  };
  for await (const { key, modifiedAt } of files.list()) {
    if (now.getTime() - modifiedAt.getTime() < grace) continue;
    batch.push(key);
    if (batch.length === 500) await sweep();
  }
  if (batch.length > 0) await sweep();
  return removed;
}
