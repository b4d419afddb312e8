import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import { realpathSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { functionGrants, tableGrants } from './grants.ts';

const folder = path.join(path.dirname(fileURLToPath(import.meta.url)), 'migrations');

/** Any number; two migrations of one database at once wait for each other by it. */
const lockNumber = 7_204_118;

/** Brings the database up to date as its owner, then gives the application's role exactly the rights of grants.ts. */
export async function migrateDatabase(ownerUrl: string, applicationRole: string): Promise<void> {
  const client = new pg.Client({ connectionString: ownerUrl, application_name: 'cinderpath migrate' });
  await client.connect();
  try {
    const { rows } = await client.query<{ name: string }>('select current_user as name');
    if (rows[0]?.name === applicationRole) {
      throw new Error(
        `The owner and the application must be two roles, or nothing keeps plants apart; both are ${applicationRole}.`,
      );
    }
    await client.query('select pg_advisory_lock($1)', [lockNumber]);
    await migrate(drizzle(client), { migrationsFolder: folder });
    await giveRights(client, applicationRole);
  } finally {
    await client.end();
  }
}

/** The user of a database URL: the application connects as that role. */
export function roleOf(url: string): string {
  const role = decodeURIComponent(new URL(url).username);
  if (!role) throw new Error('DATABASE_URL names no user.');
  return role;
}

async function giveRights(client: pg.Client, applicationRole: string): Promise<void> {
  const role = client.escapeIdentifier(applicationRole);
  const statements = [
    'BEGIN',
    `REVOKE ALL ON ALL TABLES IN SCHEMA public FROM ${role}`,
    `REVOKE ALL ON ALL TABLES IN SCHEMA public FROM PUBLIC`,
    `REVOKE CREATE ON SCHEMA public FROM PUBLIC`,
    `GRANT USAGE ON SCHEMA public TO ${role}`,
    ...Object.entries(tableGrants).map(([table, rights]) => `GRANT ${rights.join(', ')} ON ${table} TO ${role}`),
    ...functionGrants.map((one) => `GRANT EXECUTE ON FUNCTION ${one} TO ${role}`),
    'COMMIT',
  ];
  for (const statement of statements) await client.query(statement);
}

// Run as a program?
if (process.argv[1] && realpathSync(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const env = process.env as Readonly<Record<string, string | undefined>>; // the app framework's types make it any
  const ownerUrl = env.DATABASE_OWNER_URL;
  const applicationUrl = env.DATABASE_URL;
  if (!ownerUrl || !applicationUrl) {
    console.error('Set DATABASE_OWNER_URL (who owns the tables) and DATABASE_URL (who the application is).');
    process.exit(2);
  }
  await migrateDatabase(ownerUrl, roleOf(applicationUrl));
  console.log('The database is up to date.');
}
