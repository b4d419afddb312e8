import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import pg from 'pg';
import { afterAll, describe, expect, it } from 'vitest';
import { startFakeS3 } from '../../server/dev/fake-s3.mjs';
import { ensureDatabase, startCluster } from '../../server/dev/postgres.mjs';

const root = path.resolve(import.meta.dirname, '../..');
const house = path.join(root, '.house', `start-test-${process.pid}`);

type Run = { readonly child: ChildProcess; readonly output: () => string; readonly ended: Promise<number | null> };

/** `npm start` in a house of its own, beside whatever else runs from this folder. */
function start(env: Readonly<Record<string, string>> = {}): Run {
  const child = spawn(process.execPath, ['server/dev/start.mjs'], {
    cwd: root,
    env: { ...process.env, CINDERPATH_HOUSE: house, HOST: '', PORT: '0', ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  child.stdout.on('data', (chunk: Buffer) => (output += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (output += chunk.toString()));
  return { child, output: () => output, ended: new Promise((resolve) => child.once('exit', resolve)) };
}

/** Where it serves, once it says so. */
async function addressOf(run: Run): Promise<string> {
  let address: string | undefined;
  await expect
    .poll(() => (address = /Cinderpath is at (\S+)/.exec(run.output())?.[1]), {
      timeout: 180_000,
      message: run.output(),
    })
    .toBeDefined();
  return address ?? '';
}

const answers = (address: string) =>
  fetch(`${address}/api/health`).then(
    ({ ok }) => ok,
    () => false,
  );

const clusterRuns = () => existsSync(path.join(house, 'postgres-product/data/postmaster.pid'));

describe('npm start', () => {
  const runs: Run[] = [];
  const begin = (env?: Readonly<Record<string, string>>) => {
    const run = start(env);
    runs.push(run);
    return run;
  };

  afterAll(async () => {
    for (const { child, ended } of runs) {
      if (child.exitCode === null && child.signalCode === null) child.kill('SIGINT');
      await ended;
    }
    rmSync(house, { recursive: true, force: true });
  });

  it('sets everything up, refuses a second start beside it, survives being killed, keeps what was entered, and stops in order', async () => {
    const first = begin();
    const address = await addressOf(first);
    expect(await answers(address)).toBe(true);
    await expect.poll(first.output).toMatch(/lead@quay\.example +lead/);
    const password = /password for all: ([^)]+)\)/.exec(first.output())?.[1] ?? '';

    const second = begin();
    expect(await second.ended).toBe(1);
    expect(second.output()).toContain('runs from this folder already');
    expect(await answers(address)).toBe(true);

    const cookie = await signIn(address, password);
    const id = crypto.randomUUID();
    const kept = await fetch(`${address}/api/nozzles`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin: address, cookie, 'idempotency-key': id },
      body: JSON.stringify({ id, name: 'Kept through a kill', type: 'double', diameter: 0.0018 }),
    });
    expect(kept.status).toBe(201);

    // Killed, the server goes with it; the database stays behind, and the next start takes it as it is.
    first.child.kill('SIGKILL');
    await first.ended;
    await expect.poll(() => answers(address), { timeout: 15_000 }).toBe(false);
    const third = begin();
    const again = await addressOf(third);
    const nozzles = await fetch(`${again}/api/nozzles`, { headers: { cookie: await signIn(again, password) } });
    expect(await nozzles.text()).toContain('Kept through a kill');
    // Nothing to set up again: no packages, no migration, no build.
    expect(third.output()).not.toMatch(/Installing|migrated|Building/);

    third.child.kill('SIGINT');
    expect(await third.ended).toBe(0);
    expect(await answers(again)).toBe(false);
    expect(clusterRuns()).toBe(false);
    expect(existsSync(path.join(house, 'start.pid'))).toBe(false);
  });

  it('serves real services when they are named: migrated, and nothing filled in', async () => {
    const cluster = await startCluster({ kind: 'test' });
    const database = `real_${process.pid}`;
    await ensureDatabase(cluster, database);
    const s3 = await startFakeS3({ folder: `files-${database}` });
    const services = {
      DATABASE_URL: cluster.appUrl(database),
      DATABASE_OWNER_URL: cluster.ownerUrl(database),
      SESSION_SECRET: 'a secret of the test that is long enough',
      ...s3.env,
    };
    try {
      const run = begin(services);
      const address = await addressOf(run);
      expect(await answers(address)).toBe(true);
      expect(await (await fetch(`${address}/api/welcome`)).json()).toEqual({ demo: null });
      const client = new pg.Client({ connectionString: cluster.superUrl(database) });
      await client.connect();
      const { rows } = await client.query<{ plants: string; users: string }>(
        'select (select count(*) from plants) as plants, (select count(*) from users) as users',
      );
      await client.end();
      expect(rows).toEqual([{ plants: '0', users: '0' }]);
      expect(clusterRuns()).toBe(false);
      run.child.kill('SIGINT');
      expect(await run.ended).toBe(0);

      const open = begin({ ...services, HOST: '0.0.0.0' });
      expect(await open.ended).toBe(1);
      expect(open.output()).toContain('needs TLS_CERT');
    } finally {
      await s3.stop();
    }
  });

  it('names what is missing when real services are named by half', async () => {
    const run = begin({ DATABASE_URL: 'postgres://somebody@127.0.0.1:1/nothing', DATABASE_OWNER_URL: '' });
    expect(await run.ended).toBe(1);
    expect(run.output()).toContain('DATABASE_OWNER_URL is needed too');
  });

  it('installs from a lock file that names no registry', () => {
    const lock = readFileSync(path.join(root, 'package-lock.json'), 'utf8');
    expect(lock).not.toContain('"resolved"');
  });
});

async function signIn(address: string, password: string): Promise<string> {
  const answer = await fetch(`${address}/api/sessions`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', origin: address },
    body: JSON.stringify({ mail: 'engineer@quay.example', password }),
  });
  expect(answer.status).toBe(200);
  return answer.headers.getSetCookie()[0]?.split(';')[0] ?? '';
}
