import { sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import pg from 'pg';

export type Database = ReturnType<typeof databaseOn>;
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

const databaseOn = (pool: pg.Pool) => drizzle(pool, { casing: 'snake_case' });

export type OpenDatabase = { readonly database: Database; readonly pool: pg.Pool; readonly close: () => Promise<void> };

/** A pool of connections. A lost idle connection is told to `onLost`; the pool makes new ones by itself. */
export function openDatabase(url: string, onLost: (error: Error) => void, connections = 10): OpenDatabase {
  const pool = new pg.Pool({
    connectionString: url,
    max: connections,
    connectionTimeoutMillis: 5_000,
    idleTimeoutMillis: 30_000,
    statement_timeout: 15_000,
    idle_in_transaction_session_timeout: 30_000,
    application_name: 'cinderpath',
  });
  pool.on('error', onLost);
  return { database: databaseOn(pool), pool, close: () => pool.end() };
}

/** Runs `work` in a transaction that sees this plant's rows and no others. */
export function inPlant<T>(
  database: Database,
  plantId: string,
  work: (tx: Transaction) => Promise<T>,
  how: 'change' | 'read' = 'change',
): Promise<T> {
  return database.transaction(
    async (tx) => {
      await tx.execute(sql`select set_config('app.plant_id', ${plantId}, true)`);
      return work(tx);
    },
    // A screen's several queries must tell of one moment.
    how === 'read' ? { accessMode: 'read only', isolationLevel: 'repeatable read' } : undefined,
  );
}
