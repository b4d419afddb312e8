import { readFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { cornerPlanEndpoints, type CornerPlan } from '../../shared/corner-plans.ts';
import { estimateEndpoints, type PlanComparison } from '../../shared/estimates.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { rateEndpoints } from '../../shared/rates.ts';
import { revisionEndpoints, strategyEndpoints } from '../../shared/strategies.ts';
import { comparePlans, type PlanVariant } from '../../strategy/estimate/index.ts';
import { heatOfClock, plateClock } from '../../strategy/motion/index.ts';
import { cutPathEndpoints } from '../../shared/take-away.ts';
import { made, makeApproved, makePlant, type TestPlant, type TestRevision } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let programmer: Caller;
let partId: string;
let first: TestRevision;
let plan: CornerPlan;
let compared: PlanComparison;

const room = { left: 0.06, right: 0.06, above: 0.06, below: 0.06 };
const choices = { thickness: 0.0185, plateTemperature: 300, skeleton: room, overrides: {} };

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'estimates');
  programmer = await plant.as('programmer');
  partId = newId();
  await made(
    programmer.call(partEndpoints.add, {
      body: { id: partId, name: 'Bracket', answers: { unit: 'mm' } },
      file: {
        name: 'bracket.dxf',
        bytes: readFileSync(path.join(import.meta.dirname, '../support/drawings/bracket.dxf')),
      },
    }),
  );
  const { cornerRules } = plant.content;
  first = await makeApproved(plant, {
    gradeGroup: 'estimated',
    // every tip is over the limit, and a loop is what there is
    cornerRules: {
      ...cornerRules,
      treatBelowAngle: Math.PI,
      returnExcessLimit: 1,
      loop: { ...cornerRules.loop, allowed: true },
      dwell: { ...cornerRules.dwell, allowed: true, restart: 0.5 },
    },
  });
  plan = await planned(first.id);
  compared = await estimateOf(plan.id);
});
afterAll(() => server.close());

async function planned(revisionId: string, change: object = {}): Promise<CornerPlan> {
  const id = newId();
  const body = { id, partId, revisionId, ...choices, ...change };
  return (await made(programmer.call(cornerPlanEndpoints.add, { body }))).body;
}

const ask = (planId: string, caller = programmer) => caller.call(estimateEndpoints.plan, { params: { planId } });
const estimateOf = async (planId: string) => (await made(ask(planId))).body;
const of = (comparison: PlanComparison, variant: PlanVariant) => {
  const found = comparison.variants.find((one) => one.variant === variant);
  if (!found) throw new Error(`nothing of ${variant}: ${JSON.stringify(comparison.missing)}`);
  return found;
};

describe('what a plan costs', () => {
  test('is the clock and the heat of its path, as the screen computes them', async () => {
    const { body: shown } = await made(programmer.call(cutPathEndpoints.show, { params: { planId: plan.id } }));
    const clock = plateClock(shown, plan.cutting);
    const { estimate } = of(compared, 'planned');
    const { loading, total } = estimate.time;
    expect(total - loading).toBeCloseTo(clock.duration, 6);
    const { heat } = heatOfClock(clock, { heatIntoPlate: plan.cutting.heatIntoPlate, pierceHeat: 0 });
    const left = heat.reduce((sum, { from, to, powerPerLength }) => sum + powerPerLength * (to - from), 0);
    expect(estimate.heat.cutting).toBeCloseTo(left * plan.thickness, 2);
    expect(estimate.pierces).toBe(shown.runs.length);
    expect(estimate.heat.pierces).toBeCloseTo((plan.cutting.pierceHeat ?? 0) * shown.runs.length, 6);
    expect(estimate.background?.mean).toBeGreaterThan(choices.plateTemperature);
    expect(estimate.background?.highest).toBeGreaterThan(estimate.background?.mean ?? Infinity);
  });

  test('stands beside the untreated cut and loops wherever one fits', () => {
    const [untreated, allLoops, own] = (['untreated', 'allLoops', 'planned'] as const).map((one) => of(compared, one));
    expect(untreated?.corners).toMatchObject({ loops: 0, dwells: 0, eases: 0, rounds: 0 });
    expect(untreated?.estimate.time).toMatchObject({ loop: 0, dwell: 0, restart: 0 });
    expect(untreated?.corners.overLimit).toBeGreaterThan(0);
    expect(own?.corners.loops).toBe(plan.totals.loops);
    expect(own?.corners.dwells).toBe(plan.totals.dwells);
    expect(own?.corners.overLimit).toBeLessThan(untreated?.corners.overLimit ?? 0);
    expect(allLoops?.corners.loops).toBeGreaterThanOrEqual(own?.corners.loops ?? Infinity);
    expect(allLoops?.corners.loops).toBeGreaterThan(0);
    expect(allLoops?.estimate.length.loop).toBeGreaterThan(0);
    // a treatment costs time; where it loops, heat as well
    expect(own?.estimate.time.total).toBeGreaterThan(untreated?.estimate.time.total ?? Infinity);
    expect(allLoops?.estimate.heat.cutting).toBeGreaterThan(untreated?.estimate.heat.cutting ?? Infinity);
    const rows = comparePlans(compared.variants);
    expect(rows.find(({ figure }) => figure === 'overLimit')?.differences[0]).toBe(0);
  });

  test('says that there is no revision before, and no rates', () => {
    expect(compared.missing).toEqual([{ variant: 'previous', why: 'This is the strategy’s first revision.' }]);
    expect(of(compared, 'planned').estimate.money).toEqual({ kind: 'none', why: 'The plant gives no rates.' });
    expect(compared.version).toBe(plan.version);
  });

  test('says money once the plant gives rates', async () => {
    const lead = await plant.as('lead');
    const { version } = (await made(lead.call(rateEndpoints.get))).body;
    const body = {
      currency: 'EUR',
      machineHour: 120,
      oxygenKilogram: null,
      electricityKilowattHour: 0.2,
      wallPlugEfficiency: 0.4,
    };
    await made(lead.call(rateEndpoints.change, { body, version }));
    const { estimate } = of(await estimateOf(plan.id), 'planned');
    if (estimate.money.kind === 'none') throw new Error(estimate.money.why);
    expect(estimate.money.machine).toBeCloseTo((120 * estimate.time.total) / 3600, 9);
    expect(estimate.money.oxygen).toBeNull();
    expect(estimate.money.electricity).toBeCloseTo((0.2 * estimate.laser.total) / 0.4 / 3.6e6, 9);
  });

  test('stands beside the same part planned with the revision before', async () => {
    const engineer = await plant.as('engineer');
    const id = newId();
    const strategy = await made(engineer.call(strategyEndpoints.get, { params: { strategyId: first.strategyId } }));
    const begun = await made(
      engineer.call(strategyEndpoints.draft, {
        params: { strategyId: first.strategyId },
        body: { id, fromRevisionId: first.id },
        version: strategy.body.version,
      }),
    );
    const { content } = begun.body;
    const slower = { ...content, cut: { ...content.cut, feed: content.cut.feed * 0.8 } };
    const saved = await made(
      engineer.call(revisionEndpoints.save, {
        params: { revisionId: id },
        body: { content: slower },
        version: begun.body.version,
      }),
    );
    await made(
      engineer.call(revisionEndpoints.submit, { params: { revisionId: id }, body: {}, version: saved.body.version }),
    );
    const second = await planned(id);
    const comparison = await estimateOf(second.id);
    const [now, before] = [of(comparison, 'planned'), of(comparison, 'previous')];
    expect([now.revision, before.revision]).toEqual([2, 1]);
    expect(now.estimate.time.cut).toBeGreaterThan(before.estimate.time.cut);
    // planned the same way, the revision before gives what its own plan gives
    expect(before.estimate.time).toEqual(of(await estimateOf(plan.id), 'planned').estimate.time);
    expect(comparison.missing).toEqual([]);
  });

  test('is told to whoever plans, in their own plant', async () => {
    expect((await ask(plan.id, await plant.as('operator'))).status).toBe(403);
    const other = await makePlant(server, 'estimates elsewhere');
    expect((await ask(plan.id, await other.as('programmer'))).status).toBe(404);
    expect((await ask(newId())).status).toBe(404);
  });
});
