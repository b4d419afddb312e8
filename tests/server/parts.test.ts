import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { sweepStrayFiles } from '../../server/files/sweep.ts';
import { cardEndpoints } from '../../shared/cards.ts';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import { limits } from '../../shared/limits.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { revisionEndpoints, strategyEndpoints } from '../../shared/strategies.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makeDraft, makePlant, makeSubmitted, type TestPlant } from '../support/plant.ts';
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

  test('with a gap asks whether to close it, and is kept with either answer', async () => {
    const file = drawing('bracket-gap.dxf');
    const { body } = await made(programmer.call(partEndpoints.read, { body: {}, file }));
    const question = body.questions.find(({ kind }) => kind === 'gaps');
    if (question?.kind !== 'gaps') throw new Error('no question about the gap');
    const [gap] = question.gaps;
    expect(gap?.size).toBeCloseTo(0.05e-3, 9);
    expect(body.openChains).toHaveLength(1);

    const name = 'Bracket';
    const refused = await programmer.call(partEndpoints.add, { body: { id: newId(), name, answers: {} }, file });
    expect(refused.status).toBe(400);
    expect(refused.problem.errors).toEqual([{ pointer: '/answers/gapTolerance', detail: question.why }]);
    const kept = async (gapTolerance: number) =>
      (await made(programmer.call(partEndpoints.add, { body: { id: newId(), name, answers: { gapTolerance } }, file })))
        .body.reading.contours.length;
    expect(await kept(question.closesAt)).toBe((await kept((gap?.size ?? 0) / 2)) + 1);
  });

  test('as SVG is read, kept, and given back to be saved, never shown', async () => {
    const file = drawing('window.svg');
    const id = newId();
    const { body } = await made(
      programmer.call(partEndpoints.add, { body: { id, name: 'Window', answers: {} }, file }),
    );
    expect(body.reading.unit).toBe('mm');
    expect([body.reading.bounds.max.x, body.reading.bounds.max.y]).toEqual([
      expect.closeTo(0.08, 9) as number,
      expect.closeTo(0.04, 9) as number,
    ]);
    const given = await programmer.call(partEndpoints.file, { params: { partId: id } });
    expect(given.headers['content-type']).toBe('application/octet-stream');
    expect(given.headers['content-disposition']).toMatch(/^attachment; filename/);
    expect(given.bytes.equals(file.bytes)).toBe(true);
  });

  test('says what was repaired and left out with its places', async () => {
    const { body } = await made(
      programmer.call(partEndpoints.read, { body: { unit: 'mm' }, file: drawing('bracket-duplicates.dxf') }),
    );
    for (const { at, count, largest } of body.repaired)
      expect([at.length, largest ?? 0]).toEqual([count, largest ?? 0]);
    expect(body.repaired.map(({ what }) => what)).toContain('duplicate dropped');
    const framed = await made(
      programmer.call(partEndpoints.read, { body: { unit: 'mm' }, file: drawing('bracket-hidden-frame.dxf') }),
    );
    expect(framed.body.aside).toMatchObject([{ what: 'LWPOLYLINE on the hidden layer "FRAME"' }]);
  });

  test('that takes too long is refused with a sentence, and others are read meanwhile and after it', async () => {
    const [points, degree] = [60_000, 25];
    const coordinates = Array.from({ length: points }, (_, i) => `10\n${(i * 37) % 1000}\n20\n${(i * 91) % 1000}\n`);
    const knots = Array.from({ length: points + degree + 1 }, (_, i) => `40\n${i}\n`);
    const entity = `0\nSPLINE\n71\n${degree}\n${knots.join('')}${coordinates.join('')}`;
    const bytes = Buffer.from(`0\nSECTION\n2\nENTITIES\n${entity}0\nENDSEC\n0\nEOF\n`);
    const slow = programmer.call(partEndpoints.read, { body: { unit: 'mm' }, file: { name: 'slow.dxf', bytes } });
    // the thread that answers is free all the while
    expect((await programmer.call(partEndpoints.list, {})).status).toBe(200);
    const answer = await slow;
    expect(answer.problem).toMatchObject({
      code: 'bad-drawing',
      detail: 'The drawing could not be read within 2 s. Draw the part alone and export it again.',
    });
    await made(programmer.call(partEndpoints.read, { body: { unit: 'mm' }, file: drawing('bracket.dxf') }));
  });

  test('whose only outline has a gap is asked about, and refused only when the gap is to stay', async () => {
    const file = drawing('bracket-not-closed.dxf');
    const add = (answers: object) =>
      programmer.call(partEndpoints.add, { body: { id: newId(), name: 'Bracket', answers }, file });
    expect((await add({})).problem.errors?.map(({ pointer }) => pointer)).toEqual(['/answers/gapTolerance']);
    expect((await add({ gapTolerance: 1e-6 })).problem).toMatchObject({
      code: 'bad-drawing',
      detail: expect.stringContaining('No outline of the drawing is closed') as unknown,
    });
    expect((await add({ gapTolerance: 1e-4 })).status).toBe(201);
  });

  test.each([
    [
      'is an empty file',
      { name: 'empty.dxf', bytes: new Uint8Array() },
      'The file is empty. Export the drawing again.',
    ],
    [
      'is something else with a drawing’s name',
      drawing('not-a-drawing.dxf'),
      'This file is neither a DXF, which begins with the pair 0, SECTION, nor an SVG. Export the part as DXF or SVG.',
    ],
    [
      'has no closed contour',
      drawing('open-lines.dxf'),
      'The drawing has no closed contour: its one line of pieces is open, the first from (0, 0) mm. Close the outline in the drawing and export again.',
    ],
    [
      'has decimal commas',
      drawing('decimal-comma.dxf'),
      'Line 76 reads "173,205081": a decimal comma. DXF numbers have a decimal point; export the drawing with a point.',
    ],
    [
      'is a picture',
      { name: 'picture.dxf', bytes: Buffer.from('\x89PNG\r\n\x1a\n0000', 'latin1') },
      'This file is a picture of pixels, which has no contours; export the drawing as DXF.',
    ],
    [
      'is bytes of no meaning',
      { name: 'noise.dxf', bytes: Buffer.from(Array.from({ length: 5000 }, (_, n) => (n * n * 31) % 251)) },
      'Export the part as DXF or SVG.',
    ],
  ])('that %s is refused with what is wrong, where and what to do, and nothing is kept', async (_what, file, why) => {
    const [keys, parts, files] = [await server.storedKeys(), await rowsOf('parts'), await rowsOf('files')];
    const answer = await programmer.call(partEndpoints.add, {
      body: { id: newId(), name: 'Nothing', answers: {} },
      file,
    });
    expect(answer.status).toBe(422);
    expect(answer.problem.code).toBe('bad-drawing');
    expect(answer.problem.detail).toContain(why);
    expect([await server.storedKeys(), await rowsOf('parts'), await rowsOf('files')]).toEqual([keys, parts, files]);
  });

  test('of more than 10 MiB is refused with 413, and nothing is kept', async () => {
    const [keys, parts] = [await server.storedKeys(), await rowsOf('parts')];
    const file = { name: 'huge.dxf', bytes: Buffer.alloc(limits.drawingBytes + 1, '0\n') };
    const answer = await programmer.call(partEndpoints.add, { body: { id: newId(), name: 'Huge', answers: {} }, file });
    expect(answer.status).toBe(413);
    expect(answer.problem).toMatchObject({
      code: 'too-large',
      detail: 'The file has more than the 10 MiB that are taken. Make it smaller, or choose another.',
    });
    expect([await server.storedKeys(), await rowsOf('parts')]).toEqual([keys, parts]);
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

    // planned again from what is kept: asked for no longer, as it was; on a warmer plate nothing of the colder one's
    const redo = (more: object, of: typeof version) =>
      made(
        programmer.call(cornerPlanEndpoints.redo, {
          params: { planId },
          body: { revisionId, ...choices, ...more },
          version: of,
        }),
      );
    const back = await redo({}, redone.version);
    const decided = (plan: typeof body) =>
      plan.corners.map(({ id, treatment, chosenBy }) => ({ id, treatment, chosenBy }));
    expect(decided(back.body)).toEqual(decided(body));
    expect(back.body.totals.addedTime).toBeCloseTo(body.totals.addedTime, 1);
    const warm = await redo({ plateTemperature: 380 }, back.version);
    expect(warm.body.limit).toBeGreaterThan(body.limit + 50);
    warm.body.corners.forEach(({ background }, i) =>
      expect(background).toBeGreaterThan((back.body.corners[i]?.background ?? 0) + 30),
    );
  });

  test('refuses a choice for a corner the part does not have', async () => {
    const { id: revisionId } = await makeApproved(plant, { gradeGroup: 'no such corner' });
    const answer = await programmer.call(cornerPlanEndpoints.add, {
      body: { id: newId(), partId, revisionId, ...choices, overrides: { 'c9-9': 'loop' } },
    });
    expect(answer.problem.errors).toEqual([{ pointer: '/overrides/c9-9', detail: 'The part has no such corner.' }]);
  });

  test('is not made with a draft, whose numbers may still change under it', async () => {
    const { id: revisionId } = await makeDraft(plant, { gradeGroup: 'plans of drafts' });
    const answer = await programmer.call(cornerPlanEndpoints.add, {
      body: { id: newId(), partId, revisionId, ...choices },
    });
    expect(answer.problem).toMatchObject({
      code: 'wrong-state',
      detail: expect.stringContaining('Revision 1 is a draft') as unknown,
    });
  });

  test('is read by an operator, and named on the card, only while its strategy is approved', async () => {
    const submitted = await makeSubmitted(plant, { gradeGroup: 'for operators' });
    const operator = await plant.as('operator');
    const lead = await plant.as('lead');
    const planId = newId();
    await made(
      programmer.call(cornerPlanEndpoints.add, { body: { id: planId, partId, revisionId: submitted.id, ...choices } }),
    );
    const query = { machineId: plant.machineId, gradeGroup: 'for operators', thickness: 19_000 };
    const named = async () => {
      const { match } = (await made(operator.call(cardEndpoints.get, { query }))).body;
      return match.kind === 'approved' ? match.cornerPlans.map(({ id, partName }) => [id, partName]) : match.kind;
    };
    const seen = async () => [
      (await operator.call(cornerPlanEndpoints.get, { params: { planId } })).status,
      await named(),
    ];
    expect(await seen()).toEqual([404, 'none']);
    const params = { revisionId: submitted.id };
    const approved = await made(lead.call(revisionEndpoints.approve, { params, body: {}, version: submitted.version }));
    expect(await seen()).toEqual([200, [[planId, 'Bracket']]]);
    await made(
      lead.call(revisionEndpoints.withdraw, { params, body: { words: 'It erupts.' }, version: approved.version }),
    );
    expect(await seen()).toEqual([404, 'none']);
  });

  test('of a superseded revision is on no card any more', async () => {
    const group = { gradeGroup: 'superseded' };
    const first = await makeApproved(plant, group);
    const planId = newId();
    await made(
      programmer.call(cornerPlanEndpoints.add, { body: { id: planId, partId, revisionId: first.id, ...choices } }),
    );
    const [engineer, lead, operator] = [await plant.as('engineer'), await plant.as('lead'), await plant.as('operator')];
    const next = { revisionId: newId() };
    await made(
      engineer.call(strategyEndpoints.draft, {
        params: { strategyId: first.strategyId },
        body: { id: next.revisionId, fromRevisionId: first.id },
        version: 1,
      }),
    );
    const { version } = await made(engineer.call(revisionEndpoints.submit, { params: next, body: {}, version: 1 }));
    await made(lead.call(revisionEndpoints.approve, { params: next, body: {}, version }));
    const query = { machineId: plant.machineId, ...group, thickness: 19_000 };
    const { match } = (await made(operator.call(cardEndpoints.get, { query }))).body;
    expect(match).toMatchObject({ kind: 'approved', revision: { id: next.revisionId }, cornerPlans: [] });
    expect((await operator.call(cornerPlanEndpoints.get, { params: { planId } })).status).toBe(404);
  });
});
