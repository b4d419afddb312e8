import type pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { v7 as newId } from 'uuid';
import { tableGrants } from '../../db/grants.ts';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import { layoutEndpoints } from '../../shared/layouts.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { reportEndpoints } from '../../shared/reports.ts';
import { requestEndpoints } from '../../shared/cards.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makePlant, type TestPlant } from '../support/plant.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
let ours: TestPlant;
let theirs: TestPlant;
/** Every table that holds plants' rows, whatever is added later: read from the database itself. */
let tables: string[];

beforeAll(async () => {
  server = await startTestServer();
  ours = await makePlant(server, 'ours');
  theirs = await makePlant(server, 'theirs');
  for (const plant of [ours, theirs]) await fill(plant);
  tables = await connected(server.database.ownerUrl, async (owner) => {
    const { rows } = await owner.query<{ name: string }>(
      `select table_name as name from information_schema.columns
       where table_schema = 'public' and column_name = 'plant_id' order by 1`,
    );
    return rows.map(({ name }) => name);
  });
});
afterAll(() => server.close());

test('row-level security is enabled and forced on every table', async () => {
  const { rows } = await connected(server.database.ownerUrl, (owner) =>
    owner.query<{ name: string; enabled: boolean; forced: boolean }>(
      `select relname as name, relrowsecurity as enabled, relforcerowsecurity as forced
       from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r'`,
    ),
  );
  expect(rows.length).toBe(28);
  for (const { name, enabled, forced } of rows)
    expect({ name, enabled, forced }).toEqual({ name, enabled: true, forced: true });
});

test('each foreign key between plants’ tables carries the plant', async () => {
  const { rows } = await connected(server.database.ownerUrl, (owner) =>
    owner.query<{ name: string; carries: boolean }>(
      `select c.conname as name, exists (
         select 1 from unnest(c.conkey, c.confkey) as k(own, other)
         join pg_attribute a on a.attrelid = c.conrelid and a.attnum = k.own
         join pg_attribute b on b.attrelid = c.confrelid and b.attnum = k.other
         where a.attname = 'plant_id' and b.attname in ('plant_id', 'id') and (b.attname = 'plant_id' or c.confrelid = 'plants'::regclass)
       ) as carries
       from pg_constraint c where c.contype = 'f' and c.confrelid <> 'users'::regclass`,
    ),
  );
  expect(rows.length).toBeGreaterThan(30);
  for (const row of rows) expect(row, row.name).toMatchObject({ carries: true });
});

describe('as the application’s role', () => {
  test('a plant’s transaction sees rows of its own in every table and of nobody else', async () => {
    const seen: Record<string, string[]> = {};
    for (const table of tables) {
      const plants = await plantsSeen(table, ours.id);
      if (plants !== 'refused') seen[table] = plants;
    }
    const readable = tables.filter((table) => table !== 'sessions');
    expect(seen).toEqual(Object.fromEntries(readable.map((table) => [table, [ours.id]])));
  });

  test('without a plant there is nothing to see', async () => {
    for (const table of [...tables, 'plants', 'users', 'sign_in_attempts']) {
      const column =
        table === 'plants' || table === 'users' ? 'id' : table === 'sign_in_attempts' ? 'account_key' : 'plant_id';
      const rows = await asApp(null, (app) => attempt(app, `select ${column} from ${table}`));
      expect(rows === 'refused' || rows.rowCount === 0, table).toBe(true);
    }
  });

  test('a plant that is no id is an error, not a way in', async () => {
    await expect(asApp("' or true --", (app) => app.query('select 1 from plates'))).rejects.toThrow();
  });

  test('a row for another plant is refused in every table', async () => {
    for (const table of tables) {
      const columns = await connected(server.database.ownerUrl, async (owner) => {
        const { rows } = await owner.query<{ name: string }>(
          `select column_name as name from information_schema.columns
           where table_name = $1 and table_schema = 'public' and is_generated = 'NEVER'`,
          [table],
        );
        return rows.map(({ name }) => name);
      });
      // A row of theirs, to the letter, written from our plant: nothing but the policy or a missing right can refuse it.
      const copy = await connected(server.database.ownerUrl, async (owner) => {
        await owner.query('begin');
        await owner.query("select set_config('app.plant_id', $1, true)", [theirs.id]);
        const { rows } = await owner.query<Record<string, unknown>>(
          `select to_jsonb(t) as row from ${table} t where plant_id = $1 limit 1`,
          [theirs.id],
        );
        return rows[0]?.row;
      });
      expect(copy, `${table} has a row to copy`).toBeTruthy();
      // Triggers come before policies and would refuse some copies for reasons of their own.
      await connected(server.database.ownerUrl, (owner) => owner.query(`alter table ${table} disable trigger user`));
      await expect(
        asApp(ours.id, (app) =>
          app.query(
            `insert into ${table} (${columns.join(', ')}) select ${columns.join(', ')} from jsonb_populate_record(null::public.${table}, $1)`,
            [copy],
          ),
        ),
        table,
      ).rejects.toThrow(/row-level security|permission denied/);
      await connected(server.database.ownerUrl, (owner) => owner.query(`alter table ${table} enable trigger user`));
    }
  });

  test('a row cannot be moved to another plant', async () => {
    for (const table of tables) {
      await expect(
        asApp(ours.id, (app) => app.query(`update ${table} set plant_id = $1`, [theirs.id])),
        table,
      ).rejects.toThrow(/permission denied/);
    }
  });

  test('another plant’s rows cannot be changed in any table that may be changed at all', async () => {
    const changeable = Object.entries(tableGrants).flatMap(([table, rights]) => {
      const column = rights.map((right) => /^UPDATE \(\s*(\w+)/.exec(right)?.[1]).find((found) => found !== undefined);
      return column === undefined ? [] : [{ table, column }];
    });
    expect(changeable.length).toBeGreaterThan(8);
    for (const { table, column } of changeable) {
      const changed = await asApp(ours.id, (app) =>
        app.query(`update ${table} set ${column} = ${column} where plant_id = $1`, [theirs.id]),
      );
      expect({ table, changed: changed.rowCount }).toEqual({ table, changed: 0 });
    }
  });

  test('a foreign key cannot reach into another plant', async () => {
    await expect(
      asApp(ours.id, (app) =>
        app.query(
          `insert into requests (plant_id, id, machine_id, grade_group, thickness, by_user) values ($1, $2, $3, 'S355', 20000, $4)`,
          [ours.id, newId(), theirs.machineId, ours.userId('operator')],
        ),
      ),
    ).rejects.toThrow(/requests_machine/);
  });

  test('nothing is deleted and no table is emptied', async () => {
    for (const table of tables) {
      await expect(
        asApp(ours.id, (app) => app.query(`delete from ${table}`)),
        table,
      ).rejects.toThrow(/permission denied/);
      await expect(
        asApp(ours.id, (app) => app.query(`truncate ${table} cascade`)),
        table,
      ).rejects.toThrow(/permission denied/);
    }
  });

  test('security can’t be turned off, nor policies changed, nor triggers disabled, nor the owner become', async () => {
    for (const statement of [
      'alter table plates disable row level security',
      'alter table plates no force row level security',
      'drop policy own_plant on plates',
      'create policy open_door on plates using (true)',
      'alter table record disable trigger all',
      "set session_replication_role = 'replica'",
      'set role cinderpath_owner',
    ]) {
      await expect(
        asApp(ours.id, (app) => app.query(statement)),
        statement,
      ).rejects.toThrow(/must be owner|permission denied/);
    }
    await asApp(ours.id, async (app) => {
      await app.query('set row_security = off');
      // Off does not mean open: it means an error instead of a filtered answer.
      await expect(app.query('select * from plates')).rejects.toThrow(/row-level security/);
    });
  });

  test('password hashes and sessions can’t be read', async () => {
    await expect(asApp(ours.id, (app) => app.query('select password_hash from users'))).rejects.toThrow(
      /permission denied/,
    );
    await expect(asApp(ours.id, (app) => app.query('select * from sessions'))).rejects.toThrow(/permission denied/);
    await expect(asApp(ours.id, (app) => app.query('select * from sign_in_attempts'))).rejects.toThrow(
      /permission denied/,
    );
  });

  test('a plant sees the names of its own people only', async () => {
    const { rows } = await asApp(ours.id, (app) => app.query<{ name: string }>('select name from users order by name'));
    expect(rows.map(({ name }) => name)).toEqual([
      'ours approver',
      'ours engineer',
      'ours lead',
      'ours operator',
      'ours programmer',
    ]);
  });

  test('the plant is forgotten at the end of the transaction', async () => {
    await connected(server.database.appUrl, async (app) => {
      await app.query('begin');
      await app.query("select set_config('app.plant_id', $1, true)", [ours.id]);
      expect((await app.query('select 1 from plates')).rowCount).toBeGreaterThan(0);
      await app.query('commit');
      expect((await app.query('select 1 from plates')).rowCount).toBe(0);
    });
  });
});

/** A row in every table. */
async function fill(plant: TestPlant): Promise<void> {
  const approved = await makeApproved(plant);
  const programmer = await plant.as('programmer');
  const operator = await plant.as('operator');
  const engineer = await plant.as('engineer');
  const partId = newId();
  const drawing = readFileSync(path.join(import.meta.dirname, '../support/drawings/bracket.dxf'));
  await made(
    programmer.call(partEndpoints.add, {
      body: { id: partId, name: 'Bracket', answers: { unit: 'mm' } },
      file: { name: 'bracket.dxf', bytes: drawing },
    }),
  );
  const free = { left: 0.03, right: 0.03, above: 0.03, below: 0.03 };
  await made(
    programmer.call(cornerPlanEndpoints.add, {
      body: {
        id: newId(),
        partId,
        revisionId: approved.id,
        thickness: 0.0185,
        plateTemperature: 300,
        skeleton: free,
        overrides: {},
      },
    }),
  );
  await made(
    programmer.call(layoutEndpoints.add, {
      body: {
        id: newId(),
        name: 'One bracket',
        plate: { kind: 'rectangle', width: 1, height: 1 },
        kerfWidth: 0,
        clearance: 0,
        edgeMargin: 0,
        placements: [{ number: 1, partId, at: { x: 0.1, y: 0.1 }, turn: 0, mirrored: false }],
        order: null,
      },
    }),
  );
  await made(
    operator.call(reportEndpoints.add, {
      body: {
        id: newId(),
        revisionId: approved.id,
        machineId: plant.machineId,
        plateId: plant.plateId,
        kind: 'erupted',
        words: '',
      },
    }),
  );
  await made(
    operator.call(requestEndpoints.add, {
      body: { id: newId(), machineId: plant.machineId, gradeGroup: 'S355', thickness: 30_000, plateId: null },
    }),
  );
  await made(engineer.call(reportEndpoints.list));
}

/** Runs as the application in a transaction of this plant, or of none, and rolls it back. */
async function asApp<T>(plantId: string | null, work: (app: pg.Client) => Promise<T>): Promise<T> {
  return connected(server.database.appUrl, async (app) => {
    await app.query('begin');
    if (plantId !== null) await app.query("select set_config('app.plant_id', $1, true)", [plantId]);
    return work(app);
  });
}

async function attempt(app: pg.Client, statement: string): Promise<pg.QueryResult | 'refused'> {
  try {
    return await app.query(statement);
  } catch (error) {
    if (error instanceof Error && error.message.includes('permission denied')) return 'refused';
    throw error;
  }
}

async function plantsSeen(table: string, plantId: string): Promise<string[] | 'refused'> {
  const seen = await asApp(plantId, (app) => attempt(app, `select distinct plant_id from ${table}`));
  return seen === 'refused' ? 'refused' : seen.rows.map((row: { plant_id: string }) => row.plant_id);
}
