import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { cardEndpoints, requestEndpoints } from '../../shared/cards.ts';
import { machineEndpoints } from '../../shared/machines.ts';
import { plateEndpoints } from '../../shared/plates.ts';
import { cardEstimate } from '../../shared/prediction.ts';
import { revisionEndpoints, strategyEndpoints } from '../../shared/strategies.ts';
import { FOUR_KILOWATT, TEN_KILOWATT } from '../support/machines.ts';
import {
  made,
  makeApproved,
  makePlant,
  makeSubmitted,
  testPlate,
  type TestPlant,
  type TestRevision,
} from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let operator: Caller;
let approved: TestRevision;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'cards');
  operator = await plant.as('operator');
  approved = await makeApproved(plant);
});
afterAll(() => server.close());

const cardFor = async (query: Record<string, string | number>) =>
  (await made(operator.call(cardEndpoints.get, { query: { machineId: plant.machineId, ...query } }))).body;
const bookIn = async (change: object) => {
  const plate = { ...testPlate(plant.gradeId), ...change };
  await made((await plant.as('programmer')).call(plateEndpoints.add, { body: { id: newId(), ...plate } }));
  return plate.tag;
};
const cautions = (card: Awaited<ReturnType<typeof cardFor>>) =>
  card.match.kind === 'approved' ? card.match.cautions.map(({ id }) => id) : [];

describe('the plate card', () => {
  test('finds the approved strategy by the plate’s tag, however it is typed, and computes for that plate', async () => {
    const card = await cardFor({ tag: ` ${plant.plateTag.toLowerCase()} ` });
    expect(card.plate?.tag).toBe(plant.plateTag);
    if (card.match.kind !== 'approved') throw new Error(card.match.why);
    expect(card.match).toMatchObject({
      revision: { id: approved.id, number: 1, approvedBy: 'cards lead' },
      nozzle: { name: 'Single 1.5', type: 'single', diameter: 0.0015 },
      thickness: { min: 18_000, max: 20_000 },
      thicknessUsed: 0.0185,
    });
    const ours = cardEstimate({
      content: plant.content,
      profile: FOUR_KILOWATT,
      nozzle: { type: 'single', diameter: 0.0015 },
      thickness: 0.0185,
    });
    expect(card.match.cold.breakthrough).toBe(ours.breakthrough);
    expect(card.match.cold.reserve).toBe(ours.reserve);
    expect(card.match.bands).toEqual(ours.bands);
  });

  test('matches from the range’s beginning to just below its end', async () => {
    const kindAt = async (thickness: number) => (await cardFor({ gradeGroup: 'S355', thickness })).match.kind;
    expect(await kindAt(17_999)).toBe('none');
    expect(await kindAt(18_000)).toBe('approved');
    expect(await kindAt(19_999)).toBe('approved');
    expect(await kindAt(20_000)).toBe('none');
  });

  test('never offers the nearest: no match says so', async () => {
    const card = await cardFor({ gradeGroup: 'S355', thickness: 20_000 });
    expect(card.match).toEqual({
      kind: 'none',
      why: 'No approved strategy for S355, 20 mm, on Machine one.',
      requested: false,
    });
    expect((await cardFor({ gradeGroup: 'S275', thickness: 19_000 })).match.kind).toBe('none');
  });

  test('knows nothing of what is in review, and forgets what was withdrawn', async () => {
    const group = { gradeGroup: 'comes and goes' };
    const query = { ...group, thickness: 19_000 };
    const submitted = await makeSubmitted(plant, group);
    expect((await cardFor(query)).match.kind).toBe('none');
    const lead = await plant.as('lead');
    const params = { revisionId: submitted.id };
    const { version } = await made(
      lead.call(revisionEndpoints.approve, { params, body: {}, version: submitted.version }),
    );
    expect((await cardFor(query)).match.kind).toBe('approved');
    await made(lead.call(revisionEndpoints.withdraw, { params, body: { words: 'It erupts.' }, version }));
    expect((await cardFor(query)).match.kind).toBe('none');
  });

  test('of a tag nobody booked in is not found', async () => {
    const answer = await operator.call(cardEndpoints.get, {
      query: { machineId: plant.machineId, tag: 'no such tag' },
    });
    expect(answer.status).toBe(404);
    expect(answer.problem.detail).toBe('No plate with the tag no such tag is booked in.');
  });

  test('needs a tag, or a grade group and a thickness', async () => {
    const answer = await operator.call(cardEndpoints.get, {
      query: { machineId: plant.machineId, gradeGroup: 'S355' },
    });
    expect(answer.status).toBe(400);
    expect(answer.problem.errors?.length).toBeGreaterThan(0);
  });
});

describe('its cautions', () => {
  test('always say that every number is an estimate', async () => {
    expect(cautions(await cardFor({ tag: plant.plateTag }))).toEqual(['estimate']);
  });

  test('name a measured thickness outside the approved range before anything else, and compute for it', async () => {
    const tag = await bookIn({ nominalThickness: 19_000, measuredThickness: 20_400 });
    const card = await cardFor({ tag });
    if (card.match.kind !== 'approved') throw new Error(card.match.why);
    expect(card.match.cautions[0]).toEqual({
      id: 'measured-thickness',
      state: 'wrong',
      sentence: 'This plate measures 20.4 mm. The strategy is approved for 18 mm to below 20 mm: ask before you cut.',
    });
    expect(card.match.thicknessUsed).toBe(0.0204);
  });

  test('name a focus position the dial can’t reach', async () => {
    const engineer = await plant.as('engineer');
    const [machineId, machineRevisionId] = [newId(), newId()];
    const profile = { ...TEN_KILOWATT, focusScale: { ...TEN_KILOWATT.focusScale, minDial: -0.001, maxDial: 0.001 } };
    await made(
      engineer.call(machineEndpoints.add, {
        body: { id: machineId, revisionId: machineRevisionId, name: 'Short dial', profile },
      }),
    );
    await makeApproved(plant, { machineRevisionId });
    const card = await cardFor({ machineId, gradeGroup: 'S355', thickness: 19_000 });
    if (card.match.kind !== 'approved') throw new Error(card.match.why);
    expect(card.match.cut.dial.kind).toBe('none');
    expect(cautions(card)).toContain('dial');
  });

  test('say that the machine was revised since', async () => {
    const engineer = await plant.as('engineer');
    const [machineId, machineRevisionId] = [newId(), newId()];
    const added = await made(
      engineer.call(machineEndpoints.add, {
        body: { id: machineId, revisionId: machineRevisionId, name: 'Revised', profile: TEN_KILOWATT },
      }),
    );
    await makeApproved(plant, { machineRevisionId });
    const query = { machineId, gradeGroup: 'S355', thickness: 19_000 };
    expect(cautions(await cardFor(query))).not.toContain('machine-revised');
    await made(
      engineer.call(machineEndpoints.revise, {
        params: { machineId },
        body: { id: newId(), profile: TEN_KILOWATT },
        version: added.version,
      }),
    );
    const card = await cardFor(query);
    if (card.match.kind !== 'approved') throw new Error(card.match.why);
    expect(card.match.machineRevision).toMatchObject({ number: 1, newest: 2 });
    expect(cautions(card)).toContain('machine-revised');
  });

  test('say when the reserve is below the rule for this very plate', async () => {
    // The routine cut off short of its last stage: through late or never.
    const stages = plant.content.stages.slice(0, -1);
    await makeApproved(plant, { gradeGroup: 'short', stages });
    const ids = cautions(await cardFor({ gradeGroup: 'short', thickness: 19_000 }));
    expect(ids).toEqual(expect.arrayContaining(['reserve-cold', 'reserve-hot', 'estimate']));
  });
});

describe('dial numbers', () => {
  test('are what this machine’s operator types: reversed and 2.2 to 1 on the second machine', async () => {
    const engineer = await plant.as('engineer');
    const [machineId, machineRevisionId] = [newId(), newId()];
    await made(
      engineer.call(machineEndpoints.add, {
        body: { id: machineId, revisionId: machineRevisionId, name: 'Reversed', profile: TEN_KILOWATT },
      }),
    );
    await makeApproved(plant, { machineRevisionId, cut: { ...plant.content.cut, focusPosition: 0.005 } });
    const card = await cardFor({ machineId, gradeGroup: 'S355', thickness: 19_000 });
    if (card.match.kind !== 'approved') throw new Error(card.match.why);
    // To have the focus 5 mm above the plate, type −2.27 mm.
    expect(card.match.cut.dial).toEqual({ kind: 'ok', typed: -0.005 / 2.2 });
  });
});

describe('a request for a missing strategy', () => {
  test('is seen by the engineers, and answered once a strategy is approved', async () => {
    const wanted = { machineId: plant.machineId, gradeGroup: 'asked for', thickness: 19_000 };
    const body = { id: newId(), ...wanted, plateId: plant.plateId, words: 'For Friday.' };
    const made1 = await made(operator.call(requestEndpoints.add, { body }));
    expect(made1.body).toMatchObject({ plateTag: plant.plateTag, words: 'For Friday.', answered: false });
    expect((await cardFor({ gradeGroup: wanted.gradeGroup, thickness: wanted.thickness })).match).toMatchObject({
      kind: 'none',
      requested: true,
    });
    await makeApproved(plant, { gradeGroup: wanted.gradeGroup });
    const engineer = await plant.as('engineer');
    const { body: list } = await made(engineer.call(requestEndpoints.list));
    expect(list.items.find(({ id }) => id === body.id)?.answered).toBe(true);
  });
});

test('two plants whose revisions have the same id each get their own numbers', async () => {
  const id = newId();
  const names = [`twin-${id.slice(-6)}-a`, `twin-${id.slice(-6)}-b`];
  const times: number[] = [];
  for (const [index, name] of names.entries()) {
    const twin = await makePlant(server, name);
    const engineer = await twin.as('engineer');
    const lead = await twin.as('lead');
    const stages = twin.content.stages.map((stage) => ({ ...stage, duration: stage.duration * (1 + index) }));
    const strategyId = newId();
    await made(
      engineer.call(strategyEndpoints.add, {
        body: { id: strategyId, revisionId: id, name, content: { ...twin.content, stages } },
      }),
    );
    const params = { revisionId: id };
    const { version } = await made(engineer.call(revisionEndpoints.submit, { params, body: {}, version: 1 }));
    await made(lead.call(revisionEndpoints.approve, { params, body: {}, version }));
    const { body } = await made(
      (await twin.as('operator')).call(cardEndpoints.get, { query: { machineId: twin.machineId, tag: twin.plateTag } }),
    );
    if (body.match.kind !== 'approved') throw new Error(body.match.why);
    times.push(body.match.routineTime);
  }
  expect(times[1]).toBeCloseTo(2 * (times[0] ?? 0), 9);
});
