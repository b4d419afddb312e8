import http from 'node:http';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { openDatabase } from '../../db/database.ts';
import { createApp } from '../../server/app.ts';
import { limits } from '../../shared/limits.ts';
import { peopleEndpoints } from '../../shared/people.ts';
import { machineEndpoints } from '../../shared/machines.ts';
import { sessionEndpoints } from '../../shared/sessions.ts';
import { connected } from '../support/database.ts';
import { made, makePlant, type TestPlant } from '../support/plant.ts';
import {
  callerOn,
  cookieFrom,
  startTestServer,
  testPassword,
  type Caller,
  type TestServer,
} from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'doors');
});
afterAll(() => server.close());
beforeEach(() =>
  connected(server.database.ownerUrl, async (owner) => {
    await owner.query('delete from sign_in_attempts');
  }),
);

const signIn = (mail: string, password: string, headers: Record<string, string> = {}) =>
  server.stranger.call(sessionEndpoints.signIn, { body: { mail, password }, headers });

describe('signing in', () => {
  test('answers who one is, where, and as what', async () => {
    const { body } = await made(signIn(plant.mail('approver'), testPassword));
    expect(body).toMatchObject({
      user: { name: 'doors approver', mail: plant.mail('approver') },
      plant: { id: plant.id, name: 'doors' },
      role: 'engineer',
      mayApprove: true,
      memberships: [{ plantId: plant.id, plantName: 'doors', role: 'engineer' }],
    });
  });

  test('takes the mail address in any case', async () => {
    expect((await signIn(`  ${plant.mail('lead').toUpperCase()} `, testPassword)).status).toBe(200);
  });

  test('answers the same to an unknown address as to a wrong password', async () => {
    const unknown = await signIn('nobody@doors.example', testPassword);
    const wrong = await signIn(plant.mail('lead'), 'not the password');
    expect(unknown.status).toBe(401);
    expect(unknown.problem).toEqual(wrong.problem);
    expect(Object.keys(unknown.headers).sort()).toEqual(Object.keys(wrong.headers).sort());
    expect(unknown.headers['set-cookie']).toBeUndefined();
  });

  test('asks the hash for an unknown address as well, so that time tells nothing', async () => {
    const asked: (string | null)[] = [];
    const passwords = {
      ...server.services.passwords,
      matches: async (_: string, hash: string | null) => (asked.push(hash), false),
    };
    const other = await startTestServer({ passwords });
    try {
      await other.stranger.call(sessionEndpoints.signIn, { body: { mail: 'nobody@doors.example', password: 'x' } });
      expect(asked).toEqual([null]);
    } finally {
      await other.close();
    }
  });

  test('gives a cookie that scripts and other sites can’t use', async () => {
    const answer = await made(signIn(plant.mail('lead'), testPassword));
    const [cookie] = answer.headers['set-cookie'] as unknown as string[]; // a list of headers
    expect(cookie).toMatch(/^cinderpath=[\w-]+\.[\w-]+\.[\w-]+; Path=\/; Expires=.*; HttpOnly; SameSite=Strict$/);
  });

  test('over TLS the cookie is the host’s own', async () => {
    const secure = await startTestServer({ secure: true });
    try {
      const hill = await makePlant(secure, 'hill');
      const answer = await secure.stranger.call(sessionEndpoints.signIn, {
        body: { mail: hill.mail('lead'), password: testPassword },
      });
      const [cookie] = answer.headers['set-cookie'] as unknown as string[]; // a list of headers
      expect(cookie).toMatch(/^__Host-cinderpath=.*; Path=\/; .*HttpOnly; Secure; SameSite=Strict$/);
    } finally {
      await secure.close();
    }
  });

  test('keeps nothing in the database that could be used to sign in', async () => {
    const answer = await made(signIn(plant.mail('lead'), testPassword));
    const token = cookieFrom(answer).split('=')[1] ?? '';
    const [, payload = ''] = token.split('.');
    const { sid } = JSON.parse(Buffer.from(payload, 'base64url').toString()) as { sid: string };
    expect(Buffer.from(sid, 'base64url')).toHaveLength(32);
    const rows = await connected(
      server.database.ownerUrl,
      async (owner) => (await owner.query<object>('select * from sessions')).rows,
    );
    expect(JSON.stringify(rows)).not.toContain(sid);
    expect(JSON.stringify(rows)).not.toContain(token);
  });

  test('an older session of the same browser ends', async () => {
    const first = cookieFrom(await made(signIn(plant.mail('lead'), testPassword)));
    await made(signIn(plant.mail('lead'), testPassword, { Cookie: first }));
    expect((await callerOn(server.server, first).call(sessionEndpoints.current)).status).toBe(401);
  });
});

describe('a session', () => {
  test('ends with signing out, wherever its cookie is kept', async () => {
    const caller = await server.signIn(plant.mail('operator'));
    expect((await caller.call(sessionEndpoints.signOut)).status).toBe(204);
    const after = await caller.call(sessionEndpoints.current);
    expect(after.status).toBe(401);
    expect(after.problem.code).toBe('signed-out');
  });

  test('is nobody’s when its token was changed, not signed, or never one', async () => {
    const cookie = cookieFrom(await made(signIn(plant.mail('lead'), testPassword)));
    const [header = '', payload = '', signature = ''] = (cookie.split('=')[1] ?? '').split('.');
    const none = Buffer.from('{"alg":"none"}').toString('base64url');
    const forged = [
      `${header}.${payload}.${signature.slice(0, -2)}AA`,
      `${none}.${payload}.`,
      `${header}.${payload}.`,
      'nonsense',
    ];
    for (const token of forged) {
      const caller = callerOn(server.server, `cinderpath=${token}`);
      expect((await caller.call(sessionEndpoints.current)).status, token).toBe(401);
    }
  });

  test('is over when its time is, whatever the token says', async () => {
    const caller = await server.signIn(plant.mail('operator'));
    await connected(server.database.ownerUrl, (owner) =>
      owner.query(`update sessions set expires_at = now() - interval '1 second' where user_id = $1`, [
        plant.userId('operator'),
      ]),
    );
    expect((await caller.call(sessionEndpoints.current)).status).toBe(401);
  });

  test('is cut the moment the membership ends, and a changed role holds from the next request on', async () => {
    const lead = await plant.as('lead');
    const caller = await server.signIn(plant.mail('programmer'));
    const change = async (body: object) => {
      const people = (await made(lead.call(peopleEndpoints.list))).body.items;
      const member = people.find(({ mail }) => mail === plant.mail('programmer'));
      if (!member) throw new Error('the programmer is gone');
      await made(lead.call(peopleEndpoints.change, { params: { memberId: member.id }, body, version: member.version }));
    };
    await change({ role: 'operator' });
    expect((await caller.call(sessionEndpoints.current)).body.role).toBe('operator');
    await change({ ended: true });
    expect((await caller.call(machineEndpoints.list)).status).toBe(401);
    expect((await signIn(plant.mail('programmer'), testPassword)).problem.code).toBe('wrong-credentials');
    await change({ ended: false, role: 'programmer' });
    expect((await caller.call(machineEndpoints.list)).status).toBe(200);
  });

  test('moves to another plant of one’s own under a new token, and to no other', async () => {
    const hill = await makePlant(server, 'second');
    const lead = await hill.as('lead');
    await made(
      lead.call(peopleEndpoints.add, {
        body: {
          id: crypto.randomUUID(),
          name: 'ignored',
          mail: plant.mail('engineer'),
          role: 'engineer',
          password: 'ignored as well',
        },
      }),
    );
    const cookie = cookieFrom(await made(signIn(plant.mail('engineer'), testPassword)));
    const caller = callerOn(server.server, cookie);
    const there = (await made(caller.call(sessionEndpoints.current))).body;
    expect(there.memberships).toHaveLength(2);
    const other = there.plant.id === plant.id ? hill.id : plant.id;
    const moved = await made(caller.call(sessionEndpoints.choosePlant, { body: { plantId: other } }));
    expect(moved.body.plant.id).toBe(other);
    expect((await caller.call(sessionEndpoints.current)).status).toBe(401);
    const next = callerOn(server.server, cookieFrom(moved));
    expect((await made(next.call(sessionEndpoints.current))).body.plant.id).toBe(other);

    const third = await makePlant(server, 'third');
    expect((await next.call(sessionEndpoints.choosePlant, { body: { plantId: third.id } })).status).toBe(404);
  });
});

describe('trying passwords', () => {
  test('an account must wait after too many failures, even with the right password', async () => {
    for (let n = 0; n < limits.signInFailuresByAccount; n += 1) {
      expect((await signIn(plant.mail('lead'), `guess ${n}`)).status).toBe(401);
    }
    const stopped = await signIn(plant.mail('lead'), testPassword);
    expect(stopped.status).toBe(429);
    expect(stopped.problem.code).toBe('too-many');
    const wait = Number(stopped.headers['retry-after']);
    expect(wait).toBeGreaterThan(limits.signInWindowSeconds - 60);
    expect(wait).toBeLessThanOrEqual(limits.signInWindowSeconds);
    // Another account from the same address may still try.
    expect((await signIn(plant.mail('operator'), testPassword)).status).toBe(200);
  });

  test('an account nobody has must wait just the same', async () => {
    for (let n = 0; n < limits.signInFailuresByAccount; n += 1) await signIn('nobody@doors.example', `guess ${n}`);
    expect((await signIn('nobody@doors.example', 'x')).status).toBe(429);
  });

  test('an address that tries many accounts must wait', async () => {
    for (let n = 0; n < limits.signInFailuresByAddress; n += 1) await signIn(`guess-${n}@doors.example`, 'x');
    expect((await signIn(plant.mail('operator'), testPassword)).status).toBe(429);
  });

  test('many tries at once are no way past the limit', async () => {
    const tries = await Promise.all(
      Array.from({ length: limits.signInFailuresByAccount * 2 }, (_, n) =>
        signIn(plant.mail('approver'), `guess ${n}`),
      ),
    );
    expect(tries.filter(({ status }) => status === 401)).toHaveLength(limits.signInFailuresByAccount);
    expect(tries.filter(({ status }) => status === 429)).toHaveLength(limits.signInFailuresByAccount);
  });

  test('two servers count the same tries, since PostgreSQL counts them', async () => {
    const pool = openDatabase(server.database.appUrl, () => undefined);
    const second = http.createServer(createApp({ ...server.services, database: pool.database }));
    await new Promise<void>((resolve) => second.listen(0, '127.0.0.1', resolve));
    const doors = [server.stranger, callerOn(second, null)];
    const tryAt = (door: Caller | undefined, password: string) =>
      door?.call(sessionEndpoints.signIn, { body: { mail: plant.mail('lead'), password } });
    try {
      for (let n = 0; n < limits.signInFailuresByAccount; n += 1) {
        expect((await tryAt(doors[n % 2], `guess ${n}`))?.status).toBe(401);
      }
      for (const door of doors) expect((await tryAt(door, testPassword))?.status).toBe(429);
    } finally {
      await new Promise<void>((resolve) => second.close(() => resolve()));
      await pool.close();
    }
  });

  test('the right password forgets the failures before it', async () => {
    for (let n = 0; n < limits.signInFailuresByAccount - 1; n += 1) await signIn(plant.mail('lead'), `guess ${n}`);
    expect((await signIn(plant.mail('lead'), testPassword)).status).toBe(200);
    expect((await signIn(plant.mail('lead'), 'guess')).status).toBe(401);
  });

  test('failures count for their window only', async () => {
    for (let n = 0; n < limits.signInFailuresByAccount; n += 1) await signIn(plant.mail('lead'), `guess ${n}`);
    await connected(server.database.ownerUrl, (owner) =>
      owner.query(`update sign_in_attempts set at = at - make_interval(secs => $1)`, [limits.signInWindowSeconds]),
    );
    expect((await signIn(plant.mail('lead'), testPassword)).status).toBe(200);
  });
});

describe('a request from another site’s page', () => {
  const add = (headers: Record<string, string>) =>
    server.stranger.call(sessionEndpoints.signIn, { body: { mail: 'x@doors.example', password: 'x' }, headers });

  test.each([
    ['that the browser names cross-site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['that the browser names same-site', { 'Sec-Fetch-Site': 'same-site' }],
    ['with another origin', { Origin: 'https://elsewhere.example' }],
    ['with no origin of its own', { Origin: 'null' }],
  ])('%s is refused', async (_what, headers) => {
    const answer = await add(headers);
    expect(answer.status).toBe(403);
    expect(answer.problem.code).toBe('not-allowed');
  });

  test('does not keep our own pages and programs out', async () => {
    const { port } = server.server.address() as { port: number }; // a TCP server's address
    for (const headers of [{ 'Sec-Fetch-Site': 'same-origin' }, { Origin: `http://127.0.0.1:${port}` }, {}]) {
      expect((await add(headers as Record<string, string>)).status).toBe(401);
    }
  });
});
