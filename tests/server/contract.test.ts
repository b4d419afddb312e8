import bcrypt from 'bcryptjs';
import { randomUUID } from 'node:crypto';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { endpoints } from '../../shared/api.ts';
import { problemSchema } from '../../shared/errors.ts';
import { limits } from '../../shared/limits.ts';
import { gradeEndpoints } from '../../shared/machines.ts';
import { plateEndpoints, surfaces } from '../../shared/plates.ts';
import { recordEndpoints } from '../../shared/record.ts';
import { connected } from '../support/database.ts';
import { made, makePlant, testPlate, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let programmer: Caller;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'contract');
  programmer = await plant.as('programmer');
});
afterAll(() => server.close());

const bookIn = async () => {
  const body = { id: newId(), ...testPlate(plant.gradeId) };
  return made(programmer.call(plateEndpoints.add, { body }));
};
const platesCalled = async (tag: string) =>
  (await made(programmer.call(plateEndpoints.list, { query: { tag } }))).body.items.filter((plate) => plate.tag === tag)
    .length;

describe('a change', () => {
  test('without If-Match is refused with 428, and nothing changes', async () => {
    const { body } = await bookIn();
    const answer = await programmer.call(plateEndpoints.change, {
      params: { plateId: body.id },
      body: testPlate(plant.gradeId),
    });
    expect(answer.status).toBe(428);
    expect(answer.problem.code).toBe('version-missing');
  });

  test('of what somebody changed meanwhile is refused with 412, and theirs stays', async () => {
    const { body, version } = await bookIn();
    const params = { plateId: body.id };
    const theirs = { ...testPlate(plant.gradeId), tag: body.tag, heatNumber: 'theirs' };
    expect((await made(programmer.call(plateEndpoints.change, { params, body: theirs, version }))).version).toBe(
      version + 1,
    );
    const stale = await programmer.call(plateEndpoints.change, {
      params,
      body: { ...theirs, heatNumber: 'ours' },
      version,
    });
    expect(stale.status).toBe(412);
    expect(stale.problem.code).toBe('stale');
    expect((await made(programmer.call(plateEndpoints.get, { params }))).body.heatNumber).toBe('theirs');
  });

  test('of two at once exactly one wins', async () => {
    const { body, version } = await bookIn();
    const params = { plateId: body.id };
    const answers = await Promise.all(
      ['a', 'b', 'c', 'd'].map((heatNumber) =>
        programmer.call(plateEndpoints.change, {
          params,
          body: { ...testPlate(plant.gradeId), tag: body.tag, heatNumber },
          version,
        }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412, 412, 412]);
  });

  test.each([
    ['*', 428],
    ['W/"1"', 412],
    ['"one"', 412],
    ['1', 412],
    ['"7", "1"', 200],
  ])('with If-Match %s answers %i', async (header, status) => {
    const { body } = await bookIn();
    const answer = await programmer.call(plateEndpoints.change, {
      params: { plateId: body.id },
      body: testPlate(plant.gradeId),
      headers: { 'If-Match': header },
    });
    expect(answer.status).toBe(status);
  });

  test('answers with the new version as its ETag, as a read does', async () => {
    const { body, headers } = await bookIn();
    expect(headers.etag).toBe('"1"');
    const read = await programmer.call(plateEndpoints.get, { params: { plateId: body.id } });
    expect(read.headers.etag).toBe(`"${read.body.version}"`);
    expect(read.headers['cache-control']).toBe('no-store');
  });
});

describe('a request with an Idempotency-Key', () => {
  test('that was answered gets the same answer again, and nothing is done twice', async () => {
    const key = randomUUID();
    const body = { id: newId(), ...testPlate(plant.gradeId) };
    const first = await made(programmer.call(plateEndpoints.add, { body, key }));
    const entries = async () =>
      (await made((await plant.as('lead')).call(recordEndpoints.list))).body.items[0]?.sequence;
    const before = await entries();
    const again = await programmer.call(plateEndpoints.add, { body, key });
    expect(again.status).toBe(201);
    expect(again.body).toEqual(first.body);
    expect(again.headers.etag).toBe(first.headers.etag);
    expect(await entries()).toBe(before);
    expect(await platesCalled(body.tag)).toBe(1);
  });

  test('is refused without the key', async () => {
    const body = { id: newId(), ...testPlate(plant.gradeId) };
    const answer = await programmer.call(plateEndpoints.add, { body, key: null });
    expect(answer.status).toBe(400);
    expect(answer.problem.code).toBe('key-missing');
    expect(await platesCalled(body.tag)).toBe(0);
  });

  test('is refused with another body under the same key', async () => {
    const key = randomUUID();
    await made(programmer.call(plateEndpoints.add, { body: { id: newId(), ...testPlate(plant.gradeId) }, key }));
    const other = await programmer.call(plateEndpoints.add, {
      body: { id: newId(), ...testPlate(plant.gradeId) },
      key,
    });
    expect(other.status).toBe(422);
    expect(other.problem.code).toBe('key-reused');
  });

  test('is refused on another route under the same key', async () => {
    const key = randomUUID();
    const engineer = await plant.as('engineer');
    await made(engineer.call(gradeEndpoints.add, { body: { id: newId(), name: `G ${key}`, group: 'S235' }, key }));
    const other = await engineer.call(plateEndpoints.add, { body: { id: newId(), ...testPlate(plant.gradeId) }, key });
    expect(other.problem.code).toBe('key-reused');
  });

  test('sent many times at once makes one row', async () => {
    const key = randomUUID();
    const body = { id: newId(), ...testPlate(plant.gradeId) };
    const answers = await Promise.all(
      Array.from({ length: 8 }, () => programmer.call(plateEndpoints.add, { body, key })),
    );
    expect(answers.some(({ status }) => status === 201)).toBe(true);
    for (const { status, problem } of answers) {
      if (status !== 201) expect({ status, code: problem.code }).toEqual({ status: 409, code: 'in-progress' });
    }
    expect(await platesCalled(body.tag)).toBe(1);
  });

  test('that failed may be sent again under the same key', async () => {
    const key = randomUUID();
    const good = testPlate(plant.gradeId);
    const id = newId();
    expect((await programmer.call(plateEndpoints.add, { body: { id, ...good, gradeId: newId() }, key })).status).toBe(
      400,
    );
    expect((await programmer.call(plateEndpoints.add, { body: { id, ...good }, key })).status).toBe(201);
  });

  test('is another request when another person sends it', async () => {
    const key = randomUUID();
    await made(programmer.call(plateEndpoints.add, { body: { id: newId(), ...testPlate(plant.gradeId) }, key }));
    const engineer = await plant.as('engineer');
    await made(engineer.call(plateEndpoints.add, { body: { id: newId(), ...testPlate(plant.gradeId) }, key }));
  });

  test('is a new request once the answer has had its time', async () => {
    const key = randomUUID();
    await made(programmer.call(plateEndpoints.add, { body: { id: newId(), ...testPlate(plant.gradeId) }, key }));
    await connected(server.database.superUrl, (client) =>
      client.query('update idempotency_keys set at = at - make_interval(secs => $1) where key = $2', [
        limits.idempotencySeconds,
        key,
      ]),
    );
    await made(programmer.call(plateEndpoints.add, { body: { id: newId(), ...testPlate(plant.gradeId) }, key }));
  });

  test.each(['ключ', 'two words', 'x'.repeat(256)])('needs a key of visible characters, not %s', async (key) => {
    // Sent as bytes: the client's own check of headers would stop some of them.
    const answer = await programmer.call(plateEndpoints.add, { body: {}, key: Buffer.from(key).toString('latin1') });
    expect(answer.status).toBe(400);
  });
});

describe('a problem', () => {
  test('names each field that is wrong by a JSON pointer', async () => {
    const answer = await programmer.call(plateEndpoints.add, {
      body: { id: newId(), ...testPlate(plant.gradeId), tag: '  ', nominalThickness: 900, colour: 'red' },
    });
    expect(answer.status).toBe(400);
    expect(answer.problem.code).toBe('invalid-fields');
    expect(answer.problem.errors).toEqual(
      expect.arrayContaining([
        { pointer: '/tag', detail: 'Type the plate’s tag.' },
        { pointer: '/nominalThickness', detail: 'Thickness must be within 1 to 60 mm.' },
        { pointer: '/colour', detail: 'This field is not known here.' },
      ]),
    );
  });

  test.each([
    ['an unknown route', 'get', '/api/nothing'],
    ['a method a route does not have', 'delete', '/api/plates'],
    ['a page there is not', 'get', '/no/such/page'],
    ['an address that can’t be decoded', 'get', '/api/plates/%E0%A4%A'],
  ] as const)('is the answer to %s', async (_what, method, url) => {
    const response = await request(server.server)[method](url);
    expect(response.status).toBeGreaterThanOrEqual(400);
    expect(response.type).toBe('application/problem+json');
    const problem = problemSchema.parse(response.body);
    expect(problem.status).toBe(response.status);
    expect(problem.type).toBe(`urn:cinderpath:problem:${problem.code}`);
  });

  test.each([
    ['torn JSON', 'application/json', '{"id": ', 'bad-request', 400],
    ['a body of another kind', 'text/plain', 'id=1', 'bad-request', 400],
    [
      'a body larger than is taken',
      'application/json',
      JSON.stringify({ words: 'x'.repeat(limits.jsonBytes) }),
      'too-large',
      413,
    ],
  ])('is the answer to %s', async (_what, type, body, code, status) => {
    const answer = await request(server.server).post('/api/sessions').set('Content-Type', type).send(body);
    expect(answer.status).toBe(status);
    expect(problemSchema.parse(answer.body).code).toBe(code);
  });

  test('is the answer to text that can’t be stored', async () => {
    const answer = await programmer.call(plateEndpoints.add, {
      body: { id: newId(), ...testPlate(plant.gradeId), heatNumber: 'a\u0000b' },
    });
    expect(answer.status).toBe(400);
    expect(answer.problem.code).toBe('bad-request');
  });

  test('is the answer to a name or tag that is taken', async () => {
    const { body } = await bookIn();
    const answer = await programmer.call(plateEndpoints.add, {
      body: { id: newId(), ...testPlate(plant.gradeId), tag: body.tag.toLowerCase() },
    });
    expect(answer.status).toBe(409);
    expect(answer.problem).toMatchObject({
      code: 'already-there',
      detail: 'A plate with this tag is booked in already. Look at the tag again, or correct that plate.',
      errors: [{ pointer: '/tag', detail: expect.stringContaining('already') as unknown }],
    });
  });

  test('says nothing of what went wrong inside, only where it is logged', async () => {
    const logged: unknown[] = [];
    const log = Object.assign(Object.create(server.services.log) as typeof server.services.log, {
      error: (facts: unknown) => void logged.push(facts),
    });
    const broken = await startTestServer({
      log,
      now: () => {
        throw new Error('the secret inside');
      },
    });
    try {
      const there = await signInWithoutClock(broken);
      expect(there.status).toBe(500);
      expect(there.type).toBe('application/problem+json');
      expect(there.text).not.toContain('secret');
      const problem = problemSchema.parse(there.body);
      expect(problem).toMatchObject({ code: 'server-error', status: 500 });
      expect(problem.instance).toMatch(/^urn:uuid:/);
      const entry = logged.find((facts) => typeof facts === 'object' && facts !== null && 'problem' in facts);
      expect(entry).toMatchObject({ problem: problem.instance?.replace('urn:uuid:', '') });
      expect(entry).toHaveProperty('err.message', 'the secret inside');
    } finally {
      await broken.close();
    }
  });
});

describe('every answer', () => {
  test('carries the headers that keep a page to itself', async () => {
    const { headers } = await request(server.server).get('/api/welcome');
    expect(headers['content-security-policy']).toContain("script-src 'self';");
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['x-powered-by']).toBeUndefined();
    expect(headers['strict-transport-security']).toBeUndefined();
    expect(headers['cache-control']).toBe('no-store');
  });
});

describe('the description of the API', () => {
  type Described = {
    parameters?: { name: string; in: string; required?: boolean }[];
    requestBody?: { content: Record<string, { schema: unknown }> };
  };
  const described = async () => {
    const response = await request(server.server).get('/api/openapi.json');
    return (response.body as { paths: Record<string, Record<string, Described>> }).paths; // supertest makes it any
  };

  test('has every route and no other', async () => {
    const paths = await described();
    const told = Object.entries(paths).flatMap(([url, methods]) =>
      Object.keys(methods).map((method) => `${method.toUpperCase()} ${url}`),
    );
    const promised = Object.values(endpoints).map(({ method, path }) => `${method} ${path.replace(/:(\w+)/g, '{$1}')}`);
    expect(told.sort()).toEqual(promised.sort());
  });

  test('tells of a body what its schema refuses: the range, the length, a field that is not known', async () => {
    const { '/api/plates': plates } = await described();
    expect(plates?.post?.requestBody?.content['application/json']?.schema).toMatchObject({
      additionalProperties: false,
      properties: {
        tag: { type: 'string', maxLength: limits.tag },
        nominalThickness: { type: 'integer', minimum: limits.thicknessMin, maximum: limits.thicknessMax },
        surface: { enum: [...surfaces] },
        length: { minimum: 0.01, maximum: 50 },
      },
    });
  });

  test('asks for the headers that each route asks for', async () => {
    const paths = await described();
    for (const { method, path, ifMatch, idempotencyKey } of Object.values(endpoints)) {
      const one = paths[path.replace(/:(\w+)/g, '{$1}')]?.[method.toLowerCase()];
      const headers = (one?.parameters ?? []).filter((parameter) => parameter.in === 'header' && parameter.required);
      expect(headers.map(({ name }) => name).sort(), `${method} ${path}`).toEqual([
        ...(idempotencyKey ? ['Idempotency-Key'] : []),
        ...(ifMatch ? ['If-Match'] : []),
      ]);
    }
  });
});

/** Signing in asks the clock. */
const signInWithoutClock = async (broken: TestServer) => {
  const mail = 'lead@clock.example';
  await connected(broken.database.ownerUrl, (owner) =>
    owner.query(`insert into users (id, mail, name, password_hash) values ($1, $2, 'Lead', $3)`, [
      newId(),
      mail,
      bcrypt.hashSync('x', 4),
    ]),
  );
  return request(broken.server).post('/api/sessions').send({ mail, password: 'x' });
};
