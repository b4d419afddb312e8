import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { sweepStrayFiles } from '../../server/files/sweep.ts';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import { limits } from '../../shared/limits.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { revisionEndpoints } from '../../shared/strategies.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makePlant, makeSubmitted, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let programmer: Caller;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'parts');
  programmer = await plant.as('programmer');
});
afterAll(() => server.close());

const drawing = (name: string) => ({
  name,
  bytes: readFileSync(path.join(import.meta.dirname, '../support/drawings', name)),
});
const rowsOf = (table: string) =>
  connected(server.database.superUrl, async (client) =>
    Number((await client.query<{ count: string }>(`select count(*) from ${table}`)).rows[0]?.count),
  );

describe('a drawing', () => {
  test('is read and forgotten', async () => {
    const keys = await server.storedKeys();
    const { body } = await made(
      programmer.call(partEndpoints.read, { body: { unit: 'mm' }, file: drawing('bracket.dxf') }),
    );
    expect(body.contours.some(({ role }) => role === 'outer')).toBe(true);
    expect(body.unit).toBe('mm');
    expect(await server.storedKeys()).toEqual(keys);
    expect(await rowsOf('parts')).toBe(0);
  });

  test('without a unit asks for one, with the size it would have in each', async () => {
    const { body } = await made(
      programmer.call(partEndpoints.read, { body: {}, file: drawing('bearing-plate-unitless.dxf') }),
    );
    const question = body.questions.find(({ kind }) => kind === 'unit');
    if (question?.kind !== 'unit') throw new Error('no question about the unit');
    const [mm, inch] = question.readings;
    expect(mm?.unit).toBe('mm');
    expect((inch?.width ?? 0) / (mm?.width ?? 1)).toBeCloseTo(25.4, 9);
    expect(body.unit).toBeNull();

    const id = newId();
    const add = { body: { id, name: 'Plate', answers: {} }, file: drawing('bearing-plate-unitless.dxf') };
    const refused = await programmer.call(partEndpoints.add, add);
    expect(refused.status).toBe(400);
    expect(refused.problem.errors?.map(({ pointer }) => pointer)).toContain('/answers/unit');
    await made(programmer.call(partEndpoints.add, { ...add, body: { ...add.body, answers: { unit: 'mm' } } }));
  });

  test.each([
    ['an empty file', { name: 'empty.dxf', bytes: new Uint8Array() }],
    ['something else with a drawing’s name', drawing('not-a-drawing.dxf')],
    ['a picture', { name: 'picture.dxf', bytes: Buffer.from('\x89PNG\r\n\x1a\n0000', 'latin1') }],
    [
      'bytes of no meaning',
      { name: 'noise.dxf', bytes: Buffer.from(Array.from({ length: 5000 }, (_, n) => (n * n * 31) % 251)) },
    ],
  ])('that is %s is refused with a sentence, and nothing is kept', async (_what, file) => {
    const [keys, parts, files] = [await server.storedKeys(), await rowsOf('parts'), await rowsOf('files')];
    const answer = await programmer.call(partEndpoints.add, {
      body: { id: newId(), name: 'Nothing', answers: {} },
      file,
    });
    expect(answer.status).toBe(422);
    expect(answer.problem.code).toBe('bad-drawing');
    expect(answer.problem.detail?.length).toBeGreaterThan(20);
    expect([await server.storedKeys(), await rowsOf('parts'), await rowsOf('files')]).toEqual([keys, parts, files]);
  });

  test('of more than 10 MiB is refused with 413, and nothing is kept', async () => {
    const keys = await server.storedKeys();
    const file = { name: 'huge.dxf', bytes: Buffer.alloc(limits.drawingBytes + 1, '0\n') };
    const answer = await programmer.call(partEndpoints.add, { body: { id: newId(), name: 'Huge', answers: {} }, file });
    expect(answer.status).toBe(413);
    expect(answer.problem.code).toBe('too-large');
    expect(await server.storedKeys()).toEqual(keys);
  });

  test('that is missing is asked for', async () => {
    const answer = await programmer.call(partEndpoints.add, { body: { id: newId(), name: 'None', answers: {} } });
    expect(answer.problem.errors).toEqual([{ pointer: '/drawing', detail: 'Choose a file.' }]);
  });
});

describe('a part', () => {
  test('gives back its drawing byte for byte, to be saved and never shown', async () => {
    const file = drawing('lifting-lug.dxf');
    const id = newId();
    const part = await made(
      programmer.call(partEndpoints.add, {
        body: { id, name: 'Lug', answers: { unit: 'mm' } },
        file: { ...file, name: 'C:\\drawings\\Öse 25 "rechts".dxf' },
      }),
    );
    expect(part.body).toMatchObject({
      name: 'Lug',
      fileName: 'Öse 25 "rechts".dxf',
      fileBytes: file.bytes.length,
      sha256: createHash('sha256').update(file.bytes).digest('hex'),
    });
    const read = await programmer.call(partEndpoints.file, { params: { partId: id } });
    expect(read.bytes.equals(file.bytes)).toBe(true);
    expect(read.headers['content-disposition']).toMatch(/^attachment; filename/);
    expect(read.headers['content-type']).toBe('application/octet-stream');
  });

  test('whose row can’t be written leaves nothing in the bucket', async () => {
    const file = drawing('lifting-lug.dxf');
    const body = { id: newId(), name: 'Lug', answers: { unit: 'mm' } };
    await made(programmer.call(partEndpoints.add, { body, file }));
    const keys = await server.storedKeys();
    const again = await programmer.call(partEndpoints.add, { body, file });
    expect(again.problem.code).toBe('already-there');
    expect(await server.storedKeys()).toEqual(keys);
  });
});

describe('the sweep', () => {
  test('takes away files an hour old that no row knows, and no others', async () => {
    await made(
      programmer.call(partEndpoints.add, {
        body: { id: newId(), name: 'Lug', answers: { unit: 'mm' } },
        file: drawing('lifting-lug.dxf'),
      }),
    );
    const known = await server.storedKeys();
    const { key } = await server.services.files.put(Buffer.from('stray'), 'text/plain');
    const { database, files } = server.services;
    expect(await sweepStrayFiles(database, files, new Date())).toBe(0);
    expect(await server.storedKeys()).toContain(key);
    expect(await sweepStrayFiles(database, files, new Date(Date.now() + 3601_000))).toBe(1);
    expect(await server.storedKeys()).toEqual(known);
  });
});

describe('a corner plan', () => {
  const free = { left: 0.03, right: 0.03, above: 0.03, below: 0.03 };
  const choices = { thickness: 0.0185, plateTemperature: 300, skeleton: free, overrides: {} };
  let partId: string;

  beforeAll(async () => {
    partId = newId();
    await made(
      programmer.call(partEndpoints.add, {
        body: { id: partId, name: 'Bracket', answers: { unit: 'mm' } },
        file: drawing('bracket.dxf'),
      }),
    );
  });

  test('treats what the strategy’s rules say, and a person’s choice over them', async () => {
    const { id: revisionId } = await makeApproved(plant, { gradeGroup: 'plans' });
    const planId = newId();
    const { body, version } = await made(
      programmer.call(cornerPlanEndpoints.add, { body: { id: planId, partId, revisionId, ...choices } }),
    );
    expect(body.corners.length).toBe(body.totals.corners);
    const edge = body.corners[0]?.straightEdge ?? Number.NaN;
    expect(body.limit).toBeCloseTo(edge + plant.content.cornerRules.returnExcessLimit, 9);
    expect(body.part.contours.length).toBeGreaterThan(0);
    const treated = body.corners.find(({ treatment }) => treatment !== 'leave');
    if (!treated) throw new Error('the rules treat no corner of the bracket');
    const overrides = { [treated.id]: 'leave' };
    const redone = await made(
      programmer.call(cornerPlanEndpoints.redo, {
        params: { planId },
        body: { revisionId, ...choices, overrides },
        version,
      }),
    );
    expect(redone.body.corners.find(({ id }) => id === treated.id)).toMatchObject({
      treatment: 'leave',
      chosenBy: 'person',
    });
    expect(redone.body.totals.addedTime).toBeLessThan(body.totals.addedTime);
    const { body: part } = await made(programmer.call(partEndpoints.get, { params: { partId } }));
    expect(part.cornerPlans.map(({ id }) => id)).toContain(planId);
  });

  test('refuses a choice for a corner the part does not have', async () => {
    const { id: revisionId } = await makeApproved(plant, { gradeGroup: 'no such corner' });
    const answer = await programmer.call(cornerPlanEndpoints.add, {
      body: { id: newId(), partId, revisionId, ...choices, overrides: { 'c9-9': 'loop' } },
    });
    expect(answer.problem.errors).toEqual([{ pointer: '/overrides/c9-9', detail: 'The part has no such corner.' }]);
  });

  test('is read by an operator only while its strategy is approved', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'for operators' });
    const operator = await plant.as('operator');
    const lead = await plant.as('lead');
    const planId = newId();
    await made(
      programmer.call(cornerPlanEndpoints.add, { body: { id: planId, partId, revisionId: submitted.id, ...choices } }),
    );
    const seen = async () => (await operator.call(cornerPlanEndpoints.get, { params: { planId } })).status;
    expect(await seen()).toBe(404);
    const params = { revisionId: submitted.id };
    const approved = await made(lead.call(revisionEndpoints.approve, { params, body: {}, version: submitted.version }));
    expect(await seen()).toBe(200);
    await made(
      lead.call(revisionEndpoints.withdraw, { params, body: { words: 'It erupts.' }, version: approved.version }),
    );
    expect(await seen()).toBe(404);
  });
});
