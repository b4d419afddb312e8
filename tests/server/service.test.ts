import { once } from 'node:events';
import http from 'node:http';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createHash } from 'node:crypto';
import { tmpdir } from 'node:os';
import path from 'node:path';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { readConfig } from '../../server/config.ts';
import { refuseTooPowerfulRole, serve } from '../../server/main.ts';
import { openDatabase } from '../../db/database.ts';
import { startFakeS3 } from '../../server/dev/fake-s3.mjs';
import { welcomeSchema } from '../../shared/sessions.ts';
import { emptyDatabase, testDatabase, type TestDatabase } from '../support/database.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

describe('the health', () => {
  let server: TestServer;
  let closing = false;
  beforeAll(async () => {
    server = await startTestServer({ closing: () => closing });
  });
  afterAll(() => server.close());

  test('is good while database and files answer, and bad from the moment the server is on its way out', async () => {
    const good = await request(server.server).get('/api/health');
    expect(good.status).toBe(200);
    expect(good.body).toEqual({ ok: true, database: 'ok', files: 'ok', version: 'test' });
    closing = true;
    const leaving = await request(server.server).get('/api/health');
    expect(leaving.status).toBe(503);
    expect(leaving.body).toMatchObject({ ok: false, database: 'ok' });
    closing = false;
  });

  test('names what does not answer', async () => {
    const files = { ...server.services.files, check: () => Promise.reject(new Error('no bucket')) };
    const other = await startTestServer({ files });
    try {
      const answer = await request(other.server).get('/api/health');
      expect(answer.status).toBe(503);
      expect(answer.body).toMatchObject({ ok: false, database: 'ok', files: 'down' });
    } finally {
      await other.close();
    }
  });

  test('without its database the server says so, and goes on living', async () => {
    const nowhere = openDatabase('postgres://nobody:x@127.0.0.1:1/nothing', () => undefined);
    const other = await startTestServer({ database: nowhere.database });
    try {
      expect((await request(other.server).get('/api/health')).body).toMatchObject({ ok: false, database: 'down' });
      const answer = await request(other.server).post('/api/sessions').send({ mail: 'a@b.example', password: 'x' });
      expect(answer.status).toBe(503);
      expect(answer.type).toBe('application/problem+json');
      expect(answer.headers['retry-after']).toBe('5');
    } finally {
      await other.close();
      await nowhere.close();
    }
  });
});

describe('the welcome', () => {
  test('tells of demo accounts only where the demo plants are', async () => {
    const plain = await startTestServer();
    const demo = await startTestServer({ demoPassword: 'plate-1' });
    try {
      expect((await request(plain.server).get('/api/welcome')).body).toEqual({ demo: null });
      const response = await request(demo.server).get('/api/welcome');
      const { demo: told } = welcomeSchema.parse(response.body);
      expect(told?.password).toBe('plate-1');
      expect(told?.accounts.length).toBeGreaterThan(4);
      for (const { mail } of told?.accounts ?? []) expect(mail).toMatch(/\.example$/);
    } finally {
      await plain.close();
      await demo.close();
    }
  });
});

describe('starting', () => {
  let database: TestDatabase;
  beforeAll(async () => {
    database = await testDatabase();
  });
  afterAll(() => database.drop());

  const good = { DATABASE_URL: 'postgres://app@localhost/x', S3_BUCKET: 'files', SESSION_SECRET: 'x'.repeat(32) };

  test('names every setting that is missing or wrong, at once', () => {
    expect(() => readConfig({ PORT: '99999', TLS_CERT: 'cert.pem', SESSION_SECRET: 'short' })).toThrow(
      /PORT 99999.*SESSION_SECRET is shorter.*TLS_CERT and TLS_KEY.*DATABASE_URL is not set.*S3_BUCKET is not set/s,
    );
  });

  test('listens on loopback unless told otherwise', () => {
    expect(readConfig(good)).toMatchObject({ host: '127.0.0.1', port: 8080, tls: null, demoPassword: null });
  });

  test('opens to other machines only with a certificate', () => {
    expect(() => readConfig({ ...good, HOST: '0.0.0.0' })).toThrow(
      'HOST 0.0.0.0 is reachable from outside, which needs TLS_CERT',
    );
  });

  test('is refused for a role that could see every plant', async () => {
    for (const url of [database.ownerUrl, database.superUrl]) {
      const opened = openDatabase(url, () => undefined);
      await expect(refuseTooPowerfulRole(opened.database)).rejects.toThrow('may pass over row-level security');
      await opened.close();
    }
    const application = openDatabase(database.appUrl, () => undefined);
    await refuseTooPowerfulRole(application.database);
    await application.close();
  });

  test('is refused on a database that was not migrated', async () => {
    const empty = await emptyDatabase();
    const opened = openDatabase(empty.appUrl, () => undefined);
    await expect(refuseTooPowerfulRole(opened.database)).rejects.toThrow('migrate it first');
    await opened.close();
    await empty.drop();
  });

  test('serves until it is stopped, and then finishes what it has', async () => {
    const bucket = await startFakeS3({ folder: 'test-files/serving' });
    const serving = await serve({
      ...good,
      ...bucket.env,
      DATABASE_URL: database.appUrl,
      PORT: '0',
      WEB_FOLDER: '',
      LOG_LEVEL: 'silent',
    });
    // Its head is with the server, its body is not yet: surely a request in flight.
    const asked = http.request(`${serving.address}/api/sessions`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', expect: '100-continue' },
    });
    asked.flushHeaders();
    await once(asked, 'continue');
    const stopped = serving.stop();
    asked.end(JSON.stringify({ mail: 'nobody@doors.example', password: 'x' }));
    const [answer] = (await once(asked, 'response')) as [http.IncomingMessage];
    expect(answer.statusCode).toBe(401);
    answer.resume();
    await stopped;
    await expect(fetch(`${serving.address}/api/health`)).rejects.toThrow();
    await bucket.stop();
  });
});

describe('the web app', () => {
  let folder: string;
  let server: TestServer;
  const script = 'globalThis.started = true;';

  beforeAll(async () => {
    folder = mkdtempSync(path.join(tmpdir(), 'cinderpath-web-'));
    const page = (text: string) => `<html><script>${script}</script><script src="/x.js"></script>${text}</html>`;
    const write = (file: string, text: string) => {
      mkdirSync(path.dirname(path.join(folder, file)), { recursive: true });
      writeFileSync(path.join(folder, file), text);
    };
    write('index.html', page('home'));
    write('strategies/index.html', page('strategies'));
    write('strategies/new.html', page('new strategy'));
    write('strategies/[strategyId].html', page('one strategy'));
    write('(work)/plates.html', page('plates'));
    write('+not-found.html', page('nothing here'));
    write('_expo/static/js/entry-0123456789abcdef0123456789abcdef.js', 'export {};');
    write('favicon.ico', 'icon');
    write('.built-from', 'secret');
    server = await startTestServer({ webFolder: folder });
  });
  afterAll(async () => {
    await server.close();
    rmSync(folder, { recursive: true, force: true });
  });

  test.each([
    ['/', 200, 'home'],
    ['/strategies', 200, 'strategies'],
    ['/strategies/', 200, 'strategies'],
    ['/strategies/new', 200, 'new strategy'],
    ['/strategies/018f2b7e-0000-7000-8000-000000000000', 200, 'one strategy'],
    ['/plates', 200, 'plates'],
    ['/plates/one/two', 404, 'nothing here'],
  ])('%s loads on its own (%i)', async (url, status, text) => {
    const answer = await request(server.server).get(url);
    expect(answer.status).toBe(status);
    expect(answer.text).toContain(text);
    expect(answer.headers['cache-control']).toBe('no-cache');
  });

  test('lets exactly its own inline scripts run', async () => {
    const { headers } = await request(server.server).get('/');
    const hash = createHash('sha256').update(script).digest('base64');
    expect(headers['content-security-policy']).toContain(`script-src 'self' 'sha256-${hash}';`);
  });

  test('keeps files named by their content for ever, others for no time', async () => {
    const hashed = await request(server.server).get('/_expo/static/js/entry-0123456789abcdef0123456789abcdef.js');
    expect(hashed.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    expect((await request(server.server).get('/favicon.ico')).headers['cache-control']).toBe('no-cache');
  });

  test('gives no file that is missing, hidden or outside its folder', async () => {
    for (const url of ['/missing.js', '/.built-from', '/..%2f..%2fetc/passwd', '/%2e%2e/%2e%2e/etc/passwd']) {
      const answer = await request(server.server).get(url);
      expect(answer.status, url).toBeGreaterThanOrEqual(400);
      expect(answer.text, url).not.toContain('secret');
    }
  });
});
