import { readFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { cardEndpoints } from '../../shared/cards.ts';
import { laidOut, layoutEndpoints, type Layout } from '../../shared/layouts.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { plateEndpoints } from '../../shared/plates.ts';
import { recordEndpoints } from '../../shared/record.ts';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import { cutPathEndpoints } from '../../shared/take-away.ts';
import { cutOrderFault, partMoved, partSequence } from '../../strategy/path/plate/index.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makePlant, testPlate, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let programmer: Caller;
/** A bracket with holes. */
let bracketId: string;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'layouts');
  programmer = await plant.as('programmer');
  bracketId = await keep('bracket.dxf', 'Bracket');
});
afterAll(() => server.close());

async function keep(file: string, name: string): Promise<string> {
  const id = newId();
  const bytes = readFileSync(path.join(import.meta.dirname, '../support/drawings', file));
  await made(
    programmer.call(partEndpoints.add, { body: { id, name, answers: { unit: 'mm' } }, file: { name: file, bytes } }),
  );
  return id;
}

const form = (more: object = {}) => ({
  name: 'Brackets',
  plate: { kind: 'rectangle', width: 3, height: 1.5 },
  kerfWidth: 7e-4,
  clearance: 8e-3,
  edgeMargin: 0.01,
  placements: [piece(1), piece(2, { at: { x: 0.9, y: 0.05 } }), piece(3, { at: { x: 1.7, y: 0.05 } })],
  order: null as readonly string[] | null,
  ...more,
});
const piece = (number: number, more: object = {}) => ({
  number,
  partId: bracketId,
  at: { x: 0.05, y: 0.05 },
  turn: 0,
  mirrored: false,
  ...more,
});
const begin = async (more: object = {}) => {
  const { body } = await made(programmer.call(layoutEndpoints.add, { body: { id: newId(), ...form(more) } }));
  return body;
};
const formOf = ({ name, plate, kerfWidth, clearance, edgeMargin, placements }: Layout) => ({
  name,
  plate,
  kerfWidth,
  clearance,
  edgeMargin,
  placements,
  order: null as readonly string[] | null,
});

describe('a plate layout', () => {
  test('comes back as it was laid, with its parts once, its order computed and nothing wrong', async () => {
    const layout = await begin();
    expect(layout).toMatchObject({ ...form(), order: expect.any(Array) as unknown, orderBy: 'computed', problems: [] });
    expect(layout.parts.map(({ id }) => id)).toEqual([bracketId]);
    expect(layout.outline).toMatchObject({ width: 3, height: 1.5, of: null, openings: [] });
    const lies = laidOut(layout.parts, layout.placements);
    expect(cutOrderFault(lies, layout.order)).toBeNull();
    expect(partSequence(layout.order)).toEqual([1, 2, 3]);
    expect(layout.travel).toBeGreaterThan(1);
    const { items } = (await made(programmer.call(layoutEndpoints.list))).body;
    expect(items.find(({ id }) => id === layout.id)).toMatchObject({ name: 'Brackets', pieces: 3, problems: 0 });
  });

  test('may be empty: it is laid out later', async () => {
    expect(await begin({ placements: [] })).toMatchObject({ parts: [], order: [], travel: 0, cutLength: 0 });
  });

  test('says what overlaps and what lies over the edge, by name', async () => {
    const { problems } = await begin({
      placements: [piece(1), piece(2, { at: { x: 0.06, y: 0.06 } }), piece(7, { at: { x: -0.2, y: 0.9 } })],
    });
    expect(problems.map(({ kind, placements, why }) => [kind, placements, why])).toEqual([
      ['outside', [7], "part 7, Bracket, reaches over the plate's edge"],
      ['overlap', [1, 2], 'part 1, Bracket, and part 2, Bracket, overlap or touch'],
    ]);
  });

  test('is refused with a piece of no part, with a number twice, with more pieces than a plate takes', async () => {
    const answer = async (placements: readonly object[]) =>
      (await programmer.call(layoutEndpoints.add, { body: { id: newId(), ...form({ placements }) } })).problem;
    expect(await answer([piece(1), piece(2, { partId: newId() })])).toMatchObject({
      errors: [{ pointer: '/placements/1/partId', detail: 'There is no such part.' }],
    });
    expect(await answer([piece(1), piece(1)])).toMatchObject({ code: 'invalid-fields' });
    expect(await answer(Array.from({ length: 501 }, (_, i) => piece(i + 1)))).toMatchObject({ code: 'invalid-fields' });
  });

  test('takes the size of a plate in the yard as it is then, and asks for it when nobody measured it', async () => {
    const engineer = await plant.as('engineer');
    const [known, unknown] = [newId(), newId()];
    const sized = testPlate(plant.gradeId);
    const { version } = await made(
      engineer.call(plateEndpoints.add, { body: { id: known, ...sized, length: 2.5, width: 1.25 } }),
    );
    await made(
      engineer.call(plateEndpoints.add, {
        body: { id: unknown, ...testPlate(plant.gradeId), length: null, width: null },
      }),
    );
    const layout = await begin({ plate: { kind: 'plate', plateId: known } });
    expect(layout.outline).toMatchObject({ width: 2.5, height: 1.25, of: sized.tag });
    await made(
      engineer.call(plateEndpoints.change, {
        params: { plateId: known },
        body: { ...sized, length: 1, width: 1 },
        version,
      }),
    );
    const again = await made(programmer.call(layoutEndpoints.get, { params: { layoutId: layout.id } }));
    expect(again.body.outline).toMatchObject({ width: 2.5, height: 1.25 });
    const refused = await programmer.call(layoutEndpoints.add, {
      body: { id: newId(), ...form({ plate: { kind: 'plate', plateId: unknown } }) },
    });
    expect(refused.problem.errors?.[0]).toMatchObject({ pointer: '/plate/plateId' });
  });

  test('lies on a remnant as it was drawn, clear of what was cut from it before', async () => {
    const remnantId = await keep('bollard-base.dxf', 'Rest of a plate');
    const layout = await begin({ plate: { kind: 'remnant', partId: remnantId }, placements: [] });
    expect(layout.outline.of).toBe('Rest of a plate');
    expect(layout.outline.openings.length).toBeGreaterThan(0);
    const { width, height } = layout.outline;
    const middle = piece(1, { at: { x: width / 2 - 0.05, y: height / 2 - 0.05 } });
    const laid = await begin({ plate: { kind: 'remnant', partId: remnantId }, placements: [middle] });
    expect(laid.problems.map(({ kind }) => kind)).toEqual(['outside']);
  });
});

describe('the cut order of a layout', () => {
  test('by hand stands as it was asked for, until it is computed again', async () => {
    const layout = await begin();
    const lies = laidOut(layout.parts, layout.placements);
    const moved = partMoved(lies, layout.order, 3, -1);
    if (moved.kind !== 'ok') throw new Error(moved.why);
    const change = (order: readonly string[] | null, version: number) =>
      made(
        programmer.call(layoutEndpoints.change, {
          params: { layoutId: layout.id },
          body: { ...formOf(layout), order },
          version,
        }),
      );
    const byHand = await change(moved.order, 1);
    expect(byHand.body).toMatchObject({ orderBy: 'hand', order: moved.order });
    expect(partSequence(byHand.body.order)).toEqual([1, 3, 2]);
    expect(byHand.body.travel).toBeGreaterThan(layout.travel);
    expect((await change(null, 2)).body).toMatchObject({ orderBy: 'computed', order: layout.order, version: 3 });
  });

  test('never cuts an outline before its holes', async () => {
    const layout = await begin();
    const outlines = layout.order.filter((id) => id.endsWith('.1'));
    const answer = await programmer.call(layoutEndpoints.change, {
      params: { layoutId: layout.id },
      body: {
        ...formOf(layout),
        order: [...outlines, ...layout.order.filter((id) => !outlines.includes(id))].reverse(),
      },
      version: 1,
    });
    const right = await programmer.call(layoutEndpoints.change, {
      params: { layoutId: layout.id },
      body: { ...formOf(layout), order: layout.order.slice(1) },
      version: 1,
    });
    for (const { problem } of [answer, right].filter(({ status }) => status >= 300)) {
      expect(problem.errors?.[0]).toMatchObject({ pointer: '/order' });
    }
    expect(right.status).toBe(400);
  });
});

describe('a version of a layout', () => {
  test('is kept when the next is laid, and the record says who did it', async () => {
    const layout = await begin();
    const { body } = await made(
      programmer.call(layoutEndpoints.change, {
        params: { layoutId: layout.id },
        body: { ...formOf(layout), name: 'Two brackets', placements: layout.placements.slice(0, 2) },
        version: 1,
      }),
    );
    expect(body).toMatchObject({ version: 2, name: 'Two brackets' });
    const kept = await connected(server.database.superUrl, (client) =>
      client.query('select version, pieces from layout_versions where layout_id = $1 order by version', [layout.id]),
    );
    expect(kept.rows).toEqual([
      { version: 1, pieces: 3 },
      { version: 2, pieces: 2 },
    ]);
    const lead = await plant.as('lead');
    const [entry] = (await made(lead.call(recordEndpoints.list))).body.items;
    expect(entry).toMatchObject({
      event: 'layout.changed',
      subject: { kind: 'layout', id: layout.id },
      actorId: plant.userId('programmer'),
      facts: { name: 'Two brackets', pieces: 2, version: 2 },
    });
  });

  const asOwner = async (layoutId: string, statement: string) =>
    connected(server.database.ownerUrl, async (client) => {
      await client.query('begin');
      await client.query("select set_config('app.plant_id', $1, true)", [plant.id]);
      await client.query(statement, [layoutId]);
      await client.query('commit');
    });

  test.each([
    ['is changed in no way', 'update layout_versions set kerf_width = 0 where layout_id = $1', /never changed/],
    ['is not taken away', 'delete from layout_versions where layout_id = $1', /never changed/],
    ['keeps each piece where it lay', 'update placements set x = 0 where layout_id = $1', /never changed/],
    ['loses no piece', 'delete from placements where layout_id = $1', /never changed/],
    [
      'stays where its layout says it is',
      'update layouts set version = version + 1 where id = $1',
      /layouts_newest_version/,
    ],
    ['is followed by the next alone', 'update layouts set version = version + 2 where id = $1', /next version/],
    ['goes with a layout that stays', 'delete from layouts where id = $1', /never changed/],
    [
      'takes no piece afterwards',
      `insert into placements select plant_id, layout_id, version, 99, part_id, x, y, turn, mirrored
       from placements where layout_id = $1 limit 1`,
      /says 3 pieces and holds 4/,
    ],
  ])('%s, whoever tries', async (_what, statement, why) => {
    const layout = await begin();
    await expect(asOwner(layout.id, statement)).rejects.toThrow(why);
  });
});

describe('a corner plan of a layout', () => {
  const nothing = { left: 0, right: 0, above: 0, below: 0 };
  const choices = { thickness: 0.0185, plateTemperature: 300, skeleton: nothing, overrides: {} };
  let revisionId: string;
  beforeAll(async () => {
    ({ id: revisionId } = await makeApproved(plant, { gradeGroup: 'layouts' }));
  });
  const plan = async (layoutId: string, more: object = {}) =>
    made(
      programmer.call(cornerPlanEndpoints.add, {
        body: { id: newId(), layoutId, revisionId, ...choices, ...more },
      }),
    );

  test('plans the corners of all pieces where they lie, in the order in which they are cut', async () => {
    const layout = await begin();
    const { body } = await plan(layout.id, { skeleton: { ...nothing, left: 0.2 } });
    expect(body.part).toMatchObject({ id: layout.id, name: 'Brackets' });
    expect(body.part.contours.map(({ id }) => id)).toEqual(layout.order);
    expect(body.layout).toMatchObject({ id: layout.id, version: 1, newest: 1, outline: { width: 3, height: 1.5 } });
    // a layout has its own plate
    expect(body.skeleton).toEqual(nothing);
    const pieces = new Set(body.corners.map(({ contourId }) => contourId.split('.')[0]));
    expect([...pieces]).toEqual(['1', '2', '3']);
    expect(body.corners.some(({ treatment }) => treatment !== 'leave')).toBe(true);
    // each corner on the plate as it is by then
    const times = body.corners.map(({ returnTime }) => returnTime ?? 0);
    expect(Math.min(...times)).toBeGreaterThan(0);
    expect(Math.max(...times)).toBeLessThan(body.totals.cutTime ?? 0);
    expect(body.totals.highestBackground).toBe(Math.max(...body.corners.map(({ background }) => background ?? 0)));
    // 27 °C when the cut begins, in air of 20 °C
    expect(body.totals.meanPlateTemperature).toBeGreaterThan(293.15);
    for (const { order } of body.totals.orderSuggestions ?? []) {
      expect([...order].sort()).toEqual([...layout.order].sort());
    }
    const { body: again } = await made(programmer.call(layoutEndpoints.get, { params: { layoutId: layout.id } }));
    expect(again.cornerPlans).toMatchObject([{ id: body.id, layoutVersion: 1 }]);
  });

  test('says by name what stands in a loop’s way', async () => {
    const apart = 4e-3;
    const lies = laidOut((await begin()).parts, [piece(1)]);
    const width = (lies[0]?.box.maxX ?? 0) - (lies[0]?.box.minX ?? 0);
    const layout = await begin({
      placements: [piece(1, { at: { x: 0.1, y: 0.1 } }), piece(2, { at: { x: 0.1 + width + apart, y: 0.1 } })],
    });
    const { body } = await plan(layout.id);
    const whys = body.corners.flatMap(({ options }) => options.map(({ why }) => why)).join(' | ');
    expect(whys).toMatch(/outline of part [12], Bracket/);
  });

  test('stands on what was planned when the plate is laid out anew, until it is planned again', async () => {
    const layout = await begin();
    const first = await plan(layout.id);
    const treated = first.body.corners.find(({ contourId }) => contourId.startsWith('3.'));
    if (!treated) throw new Error('the third piece has no corner');
    const chosen = await made(
      programmer.call(cornerPlanEndpoints.redo, {
        params: { planId: first.body.id },
        body: { revisionId, ...choices, overrides: { [treated.id]: 'leave' } },
        version: first.version,
      }),
    );
    await made(
      programmer.call(layoutEndpoints.change, {
        params: { layoutId: layout.id },
        body: { ...formOf(layout), placements: layout.placements.slice(0, 2) },
        version: 1,
      }),
    );
    const params = { planId: first.body.id };
    const seen = await made(programmer.call(cornerPlanEndpoints.get, { params }));
    expect(seen.body.layout).toMatchObject({ version: 1, newest: 2 });
    expect(seen.body.part.contours).toEqual(first.body.part.contours);
    // what was chosen for a piece that is gone goes with it
    const redone = await made(
      programmer.call(cornerPlanEndpoints.redo, {
        params,
        body: { revisionId, ...choices, overrides: chosen.body.overrides },
        version: chosen.version,
      }),
    );
    expect(redone.body.layout).toMatchObject({ version: 2, newest: 2 });
    expect(redone.body.overrides).toEqual({});
    expect(new Set(redone.body.corners.map(({ contourId }) => contourId.split('.')[0]))).toEqual(new Set(['1', '2']));
  });

  test('is of a part or a layout, of one, and of a layout with something on it', async () => {
    const [layout, empty] = [await begin(), await begin({ placements: [] })];
    const add = (body: object) =>
      programmer.call(cornerPlanEndpoints.add, { body: { id: newId(), revisionId, ...choices, ...body } });
    expect((await add({})).status).toBe(400);
    expect((await add({ layoutId: layout.id, partId: bracketId })).status).toBe(400);
    expect((await add({ layoutId: newId() })).status).toBe(404);
    expect((await add({ layoutId: empty.id })).problem.code).toBe('wrong-state');
    await expect(
      connected(server.database.ownerUrl, async (client) => {
        await client.query('begin');
        await client.query("select set_config('app.plant_id', $1, true)", [plant.id]);
        await client.query('update corner_plans set part_id = null, layout_id = null');
      }),
    ).rejects.toThrow(/corner_plans_of_one|corner_plans_layout_version/);
  });

  test('is named on the card, read by an operator, and taken away as a cut path in its order', async () => {
    const layout = await begin();
    const { body } = await plan(layout.id);
    const operator = await plant.as('operator');
    const query = { machineId: plant.machineId, gradeGroup: 'layouts', thickness: 19_000 };
    const { match } = (await made(operator.call(cardEndpoints.get, { query }))).body;
    if (match.kind !== 'approved') throw new Error('no strategy is approved');
    expect(match.cornerPlans.find(({ id }) => id === body.id)).toMatchObject({ partId: null, partName: 'Brackets' });
    expect((await operator.call(cornerPlanEndpoints.get, { params: { planId: body.id } })).status).toBe(200);
    const taken = await programmer.call(cutPathEndpoints.take, {
      params: { planId: body.id },
      query: { as: 'iso', unit: 'mm' },
    });
    expect(taken.status, JSON.stringify(taken.problem)).toBe(200);
    const text = taken.bytes.toString('ascii');
    const places = layout.order.map((id) => {
      const [number, contour] = id.split('.');
      const name = contour === '1' ? `outline of part ${number}` : `hole ${Number(contour) - 1} of part ${number}`;
      return text.toLowerCase().indexOf(name);
    });
    expect(places.every((place) => place >= 0)).toBe(true);
    expect([...places].sort((a, b) => a - b)).toEqual(places);
  });
});
