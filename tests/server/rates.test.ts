import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { rateEndpoints, type RatesForm } from '../../shared/rates.ts';
import { recordEndpoints } from '../../shared/record.ts';
import { connected } from '../support/database.ts';
import { made, makePlant, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let lead: Caller;
let plants = 0;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

/** Rates are the plant's: each test has a plant of its own. */
beforeEach(async () => {
  plant = await makePlant(server, `rates${++plants}`);
  lead = await plant.as('lead');
});

const text = (change: Partial<RatesForm> = {}): RatesForm => ({
  currency: 'EUR',
  machineHour: 140,
  oxygenKilogram: 0.3,
  electricityKilowattHour: 0.25,
  wallPlugEfficiency: 0.33,
  ...change,
});
const read = async (caller = lead) => (await made(caller.call(rateEndpoints.get))).body;
const write = (change: Partial<RatesForm>, version: number, caller = lead) =>
  caller.call(rateEndpoints.change, { body: text(change), version });

describe('what a plant pays', () => {
  test('is nothing yet at its founding', async () => {
    expect(await read()).toMatchObject({
      currency: '',
      machineHour: null,
      oxygenKilogram: null,
      electricityKilowattHour: null,
      version: 1,
      changedBy: null,
    });
  });

  test('is written by the lead, and the record says what it was', async () => {
    const written = await made(write({}, 1));
    expect(written.body).toMatchObject({ ...text(), version: 2, changedBy: { id: plant.userId('lead') } });
    expect(await read()).toEqual(written.body);
    await made(write({ machineHour: null }, 2));
    const [last] = (await made(lead.call(recordEndpoints.list))).body.items;
    expect(last).toMatchObject({
      event: 'rates.changed',
      subject: { kind: 'rates', id: plant.id },
      facts: { version: 3, from: text(), to: text({ machineHour: null }) },
    });
  });

  test('is read by whoever plans, and written by the lead alone', async () => {
    for (const person of ['programmer', 'engineer'] as const) {
      const caller = await plant.as(person);
      expect(await read(caller)).toMatchObject({ version: 1 });
      expect((await write({}, 1, caller)).status).toBe(403);
    }
    expect((await (await plant.as('operator')).call(rateEndpoints.get)).status).toBe(403);
    expect((await read()).version).toBe(1);
  });

  test('is not another plant’s', async () => {
    const other = await makePlant(server, `others${plants}`);
    await made(write({ machineHour: 999 }, 1, await other.as('lead')));
    expect((await read()).machineHour).toBeNull();
  });

  test('is not written over what somebody else wrote meanwhile', async () => {
    await made(write({}, 1));
    expect((await write({ machineHour: 90 }, 1)).status).toBe(412);
    expect((await lead.call(rateEndpoints.change, { body: text() })).status).toBe(428);
    expect((await read()).machineHour).toBe(140);
  });

  test('names its currency, and holds no amount below 0 and no laser without losses below 1 %', async () => {
    for (const change of [
      { currency: ' ' },
      { machineHour: -1 },
      { wallPlugEfficiency: 0 },
      { wallPlugEfficiency: 1.1 },
    ]) {
      const refused = await write(change, 1);
      expect(refused.status, JSON.stringify(change)).toBe(400);
      expect(refused.problem.errors?.[0]?.pointer).toBe(`/${Object.keys(change)[0] ?? ''}`);
    }
    const none = { machineHour: null, oxygenKilogram: null, electricityKilowattHour: null };
    await made(write({ currency: '', ...none }, 1));
  });
});

describe('in the database', () => {
  test.each([
    ['stay their plant’s', 'update rates set plant_id = gen_random_uuid(), version = version + 1, changed_by = $1'],
    ['take their next version with each change', 'update rates set machine_hour = 1, currency = $1::text'],
    [
      'are changed by somebody',
      `update rates set version = version + 1, changed_by = null, currency = left($1::text, 3)`,
    ],
    ['are never taken away', 'delete from rates where $1::uuid is not null'],
    ['name their currency', `update rates set machine_hour = 1, currency = '', version = version + 1, changed_by = $1`],
  ])('rates %s, whoever writes', async (_law, statement) => {
    await expect(
      connected(server.database.ownerUrl, async (owner) => {
        await owner.query("select set_config('app.plant_id', $1, false)", [plant.id]);
        return owner.query(statement, [plant.userId('lead')]);
      }),
    ).rejects.toThrow(/next version|changed by somebody|never changed or taken away|rates_name_their_currency/);
  });
});
