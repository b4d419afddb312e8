import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { v7 as newId } from 'uuid';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { migrateDatabase, roleOf } from '../../db/migrate.ts';
import { tableGrants } from '../../db/grants.ts';
import { connected, emptyDatabase, type TestDatabase } from '../support/database.ts';

const migrations = path.join(import.meta.dirname, '../../db/migrations');

let database: TestDatabase;
beforeAll(async () => {
  database = await emptyDatabase();
});
afterAll(() => database.drop());

test('an empty database is brought up to date, and a second time changes nothing', async () => {
  const role = roleOf(database.appUrl);
  await migrateDatabase(database.ownerUrl, role);
  const before = await shape(database.ownerUrl);
  await migrateDatabase(database.ownerUrl, role);
  expect(await shape(database.ownerUrl)).toEqual(before);
  expect(before.length).toBeGreaterThan(100);
});

test('a plant from before house rules gets the usual ones on the reserve, as a new one does', async () => {
  const older = await emptyDatabase();
  try {
    const expressions = await connected(older.ownerUrl, async (owner) => {
      const files = readdirSync(migrations)
        .filter((file) => file.endsWith('.sql'))
        .sort();
      const at = files.findIndex((file) => file.includes('house-rules'));
      expect(at).toBeGreaterThan(0);
      const run = async (some: readonly string[]) => {
        for (const file of some) await owner.query(readFileSync(path.join(migrations, file), 'utf8'));
      };
      await run(files.slice(0, at));
      const [before, after] = [newId(), newId()];
      await owner.query(`insert into plants (id, name) values ($1, 'Before')`, [before]);
      await run(files.slice(at));
      await owner.query(`insert into plants (id, name) values ($1, 'After')`, [after]);
      const found: string[][] = [];
      for (const plant of [before, after]) {
        await owner.query("select set_config('app.plant_id', $1, false)", [plant]);
        const { rows } = await owner.query<{ expression: string }>('select expression from house_rules order by 1');
        found.push(rows.map(({ expression }) => expression));
      }
      return found;
    });
    expect(expressions).toEqual([
      ['reserveCold >= 2', 'reserveHot >= 2.2'],
      ['reserveCold >= 2', 'reserveHot >= 2.2'],
    ]);
  } finally {
    await older.drop();
  }
});

test('the owner of the tables is refused as the application', async () => {
  await expect(migrateDatabase(database.ownerUrl, roleOf(database.ownerUrl))).rejects.toThrow('must be two roles');
});

test('every table is either in the list of rights or reached through functions alone', async () => {
  const tables = await connected(database.ownerUrl, async (owner) => {
    const { rows } = await owner.query<{ name: string }>(
      `select tablename as name from pg_tables where schemaname = 'public'`,
    );
    return rows.map(({ name }) => name).sort();
  });
  expect(tables).toEqual([...Object.keys(tableGrants), 'sessions', 'sign_in_attempts'].sort());
});

test('the application may delete, empty or reference nothing', async () => {
  const rights = await connected(database.ownerUrl, async (owner) => {
    const { rows } = await owner.query<{ privilege_type: string }>(
      `select distinct privilege_type from information_schema.table_privileges where grantee = $1`,
      [roleOf(database.appUrl)],
    );
    return rows.map((row) => row.privilege_type).sort();
  });
  expect(rights).toEqual(['INSERT', 'SELECT']);
});

test('functions that run as the owner have a fixed search path and are nobody’s but the application’s', async () => {
  const functions = await connected(database.ownerUrl, async (owner) => {
    const { rows } = await owner.query<{ name: string; config: string[] | null; everybody: boolean }>(
      `select proname as name, proconfig as config, has_function_privilege('public', oid, 'EXECUTE') as everybody
       from pg_proc where pronamespace = 'public'::regnamespace and prosecdef`,
    );
    return rows;
  });
  expect(functions.length).toBeGreaterThan(5);
  for (const { name, config, everybody } of functions) {
    expect(config, name).toEqual(['search_path=pg_catalog, public, pg_temp']);
    // A trigger's function can't be called, so who may is of no account.
    if (name !== 'chain_record') expect(everybody, name).toBe(false);
  }
});

/** Columns with their types, and constraints, as lines. */
async function shape(url: string): Promise<string[]> {
  return connected(url, async (owner) => {
    const columns = await owner.query<{ line: string }>(
      `select table_name || '.' || column_name || ' ' || data_type || ' ' || is_nullable as line
       from information_schema.columns where table_schema = 'public' order by 1`,
    );
    const constraints = await owner.query<{ line: string }>(
      `select conrelid::regclass || ' ' || conname || ' ' || pg_get_constraintdef(oid) as line
       from pg_constraint where connamespace = 'public'::regnamespace order by 1`,
    );
    return [...columns.rows, ...constraints.rows].map((row) => row.line);
  });
}
