import { createHash, randomBytes } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import pg from 'pg';
import { migrateDatabase, roleOf } from '../../db/migrate.ts';

export type TestDatabase = {
  /** As who owns the tables, as the application, as the cluster's superuser. */
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly superUrl: string;
  drop(): Promise<void>;
};

/** Any number: those who make the template wait for each other by it. */
const lockNumber = 7_204_119;

/** A database of its own for one test file: a clone of the template that holds all migrations. */
export async function testDatabase(): Promise<TestDatabase> {
  const template = await readyTemplate();
  return clone(`cinderpath_test_${randomBytes(6).toString('hex')}`, template);
}

/** A database without any tables. */
export async function emptyDatabase(): Promise<TestDatabase> {
  return clone(`cinderpath_empty_${randomBytes(6).toString('hex')}`, 'template0');
}

async function clone(name: string, template: string): Promise<TestDatabase> {
  await asOwner(async (owner) => {
    await owner.query(`create database ${name} template ${template}`);
  });
  return {
    ownerUrl: urlFor('TEST_OWNER_URL', name),
    appUrl: urlFor('TEST_APP_URL', name),
    superUrl: urlFor('TEST_SUPER_URL', name),
    // As superuser: a backend of the application's may still be on its way out, and the owner may not end it.
    drop: () =>
      connected(urlFor('TEST_SUPER_URL', 'postgres'), async (superuser) => {
        await superuser.query(`drop database if exists ${name} with (force)`);
      }),
  };
}

/** The template for exactly these migrations and grants, made by whichever test file comes first. */
async function readyTemplate(): Promise<string> {
  const name = `cinderpath_template_${sourcesHash()}`;
  await asOwner(async (owner) => {
    await owner.query('select pg_advisory_lock($1)', [lockNumber]);
    const { rowCount } = await owner.query('select 1 from pg_database where datname = $1', [name]);
    if (rowCount) return;
    // Under another name until it is whole: a run that was stopped half-way leaves nothing that looks ready.
    await owner.query(`drop database if exists ${name}_making with (force)`);
    await owner.query(`create database ${name}_making template template0`);
    await migrateDatabase(urlFor('TEST_OWNER_URL', `${name}_making`), roleOf(urlFor('TEST_APP_URL', name)));
    await owner.query(`alter database ${name}_making rename to ${name}`);
  });
  return name;
}

function sourcesHash(): string {
  const folder = path.join(import.meta.dirname, '../../db');
  const hash = createHash('sha256');
  for (const file of [
    'grants.ts',
    'migrate.ts',
    ...readdirSync(path.join(folder, 'migrations')).filter(isSql).sort().map(inMigrations),
  ]) {
    hash.update(file).update(readFileSync(path.join(folder, file)));
  }
  return hash.digest('hex').slice(0, 12);
}

const isSql = (file: string) => file.endsWith('.sql');
const inMigrations = (file: string) => path.join('migrations', file);

async function asOwner(work: (owner: pg.Client) => Promise<void>): Promise<void> {
  const owner = new pg.Client({ connectionString: urlFor('TEST_OWNER_URL', 'postgres') });
  await owner.connect();
  try {
    await work(owner);
  } finally {
    await owner.end();
  }
}

function urlFor(variable: 'TEST_OWNER_URL' | 'TEST_APP_URL' | 'TEST_SUPER_URL', database: string): string {
  const env = process.env as Readonly<Record<string, string | undefined>>; // the app framework's types make it any
  const given = env[variable];
  if (!given) throw new Error(`${variable} is not set: the tests' cluster was not started`);
  const url = new URL(given);
  url.pathname = `/${database}`;
  return url.href;
}

/** Runs statements on a connection of its own, then closes it. */
export async function connected<T>(url: string, work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}
