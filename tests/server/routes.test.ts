import type { Router } from 'express';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { apiRouter } from '../../server/app.ts';
import { endpoints } from '../../shared/api.ts';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import type { Endpoint } from '../../shared/endpoint.ts';
import { layoutEndpoints } from '../../shared/layouts.ts';
import { houseRuleEndpoints } from '../../shared/house-rules.ts';
import { rateEndpoints } from '../../shared/rates.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { can, roles, type Role } from '../../shared/policy.ts';
import { recordEndpoints } from '../../shared/record.ts';
import { reportEndpoints } from '../../shared/reports.ts';
import { blockFrameEndpoints } from '../../shared/take-away.ts';
import { FOUR_KILOWATT } from '../support/machines.ts';
import {
  made,
  makeApproved,
  makeDraft,
  makePlant,
  makeSubmitted,
  testPlate,
  type TestPerson,
  type TestPlant,
} from '../support/plant.ts';
import { startTestServer, type Asked, type TestServer } from '../support/server.ts';

let server: TestServer;
let own: Stocked;
let foreign: Stocked;

beforeAll(async () => {
  server = await startTestServer();
  own = await stock(await makePlant(server, 'own'));
  foreign = await stock(await makePlant(server, 'foreign'));
});
afterAll(() => server.close());

/** Open to a stranger, each with the reason. */
const forAnyone: Readonly<Record<string, string>> = {
  'session.welcome': 'the sign-in page asks before anybody is signed in',
  'session.signIn': 'it is how one stops being a stranger',
  'service.health': 'whoever watches the service holds no account',
  'service.openapi': 'it describes the door, it does not open it',
};

test('the router’s routes are those of shared/, each once', () => {
  const promised = Object.values(endpoints).map(({ method, path: url }) => `${method} ${url}`);
  expect(mountedRoutes(apiRouter(server.services)).sort()).toEqual(promised.sort());
});

test.each(Object.entries(endpoints))('%s turns a stranger away, unless it is for anyone', async (name, endpoint) => {
  const answer = await server.stranger.call(endpoint, { params: idsFor(endpoint), version: 1 });
  if (name in forAnyone) {
    expect(endpoint.access).toBe('anyone');
    expect(answer.status).not.toBe(401);
  } else {
    expect(endpoint.access).not.toBe('anyone');
    expect(answer.status).toBe(401);
    expect(answer.problem.code).toBe('signed-out');
  }
});

describe('route by role, on things of one’s own plant and of another', () => {
  const people: Record<Role, TestPerson> = {
    operator: 'operator',
    programmer: 'programmer',
    engineer: 'engineer',
    lead: 'lead',
  };
  const cells = Object.keys(endpoints)
    .filter((name) => !(name in forAnyone) && name !== 'session.signOut')
    .flatMap((name) => roles.map((role) => ({ name, role })));

  test.each(cells)('$name by the $role', async ({ name, role }) => {
    const endpoint = endpoints[name];
    const cell = matrix[name];
    if (!endpoint || !cell || endpoint.access === 'anyone') throw new Error(`no row for ${name}`);
    // Choosing a plant ends the session it is done in: not the one the other rows share.
    const caller =
      name === 'session.choosePlant'
        ? await server.signIn(own.plant.mail(people[role]))
        : await own.plant.as(people[role]);
    const actor = { userId: own.plant.userId(people[role]), plantId: own.plant.id, role, mayApprove: role === 'lead' };
    const allowed = can(actor, endpoint.access).ok;

    const here = await cell(own);
    const answer = await caller.call(endpoint, here);
    if (!allowed) {
      expect(answer.status).toBe(403);
      expect(answer.problem.code).toBe('not-allowed');
    } else {
      expect([401, 403, 404], JSON.stringify(answer.problem)).not.toContain(answer.status);
      expect(answer.status, JSON.stringify(answer.problem)).toBeLessThan(300);
    }

    if (!endpoint.path.includes(':')) return;
    const there = await cell(foreign);
    const across = await caller.call(endpoint, there);
    expect(across.status).toBe(allowed ? 404 : 403);
  });
});

test('a new route cannot be forgotten in the matrix', () => {
  const needed = Object.keys(endpoints).filter((name) => !(name in forAnyone) && name !== 'session.signOut');
  expect(Object.keys(matrix).sort()).toEqual(needed.sort());
});

describe('what a body or a query names in another plant', () => {
  const naming = [
    'session.choosePlant',
    'strategy.add',
    'revision.judge',
    'plate.add',
    'card.get',
    'request.add',
    'cornerPlan.add',
    'layout.add',
    'report.add',
  ];

  test.each(naming)('is not there for %s', async (name) => {
    const endpoint = endpoints[name];
    const cell = matrix[name];
    if (!endpoint || !cell) throw new Error(`no row for ${name}`);
    const lead = await server.signIn(own.plant.mail('lead'));
    const across = await lead.call(endpoint, await cell(foreign));
    expect([400, 404], JSON.stringify(across.problem)).toContain(across.status);
  });
});

describe('a route that changes something', () => {
  /** Those that need no Idempotency-Key although they are POSTs, each with the reason. */
  const withoutKey: Readonly<Record<string, string>> = {
    'session.signIn': 'its answer is a credential, which must not be stored',
    'revision.judge': 'it changes nothing',
    'houseRule.read': 'it changes nothing',
    'part.read': 'it changes nothing',
  };
  /** Those that need no If-Match although they are about something that is there, each with the reason. */
  const withoutVersion: Readonly<Record<string, string>> = {
    'session.signOut': 'a session is its owner’s alone and ends as it is',
    'session.choosePlant': 'a session is its owner’s alone',
  };
  const named = (holds: (endpoint: Endpoint) => boolean) =>
    Object.entries(endpoints)
      .filter(([, endpoint]) => holds(endpoint))
      .map(([name]) => name);
  const asked = async (name: string) => {
    const endpoint = endpoints[name];
    const cell = matrix[name];
    if (!endpoint || !cell) throw new Error(`no row for ${name}`);
    return { endpoint, given: await cell(own), lead: await own.plant.as('lead') };
  };

  test('takes an Idempotency-Key when it creates or decides, and If-Match when it changes what is there', () => {
    expect(named(({ method, idempotencyKey }) => method === 'POST' && !idempotencyKey).sort()).toEqual(
      Object.keys(withoutKey).sort(),
    );
    const changes = ({ method, path: url }: Endpoint) => (method === 'POST' ? url.includes(':') : method !== 'GET');
    expect(named((endpoint) => changes(endpoint) && !endpoint.ifMatch).sort()).toEqual(
      Object.keys(withoutVersion).sort(),
    );
  });

  test.each(named(({ ifMatch }) => ifMatch))('%s is refused without a version and with an old one', async (name) => {
    const { endpoint, given, lead } = await asked(name);
    const { version, ...blind } = given;
    const without = await lead.call(endpoint, blind);
    expect([without.status, without.problem.code]).toEqual([428, 'version-missing']);
    const stale = await lead.call(endpoint, { ...given, version: (version ?? 0) + 1 });
    expect([stale.status, stale.problem.code]).toEqual([412, 'stale']);
    const seen = await lead.call(endpoint, given);
    expect(seen.status, JSON.stringify(seen.problem)).toBeLessThan(300);
  });

  test.each(named(({ idempotencyKey }) => idempotencyKey))(
    '%s is refused without a key, and done once when it is sent twice with one',
    async (name) => {
      const { endpoint, given, lead } = await asked(name);
      const without = await lead.call(endpoint, { ...given, key: null });
      expect([without.status, without.problem.code]).toEqual([400, 'key-missing']);
      const key = newId();
      const first = await lead.call(endpoint, { ...given, key });
      expect(first.status, JSON.stringify(first.problem)).toBeLessThan(300);
      const entries = async () => (await made(lead.call(recordEndpoints.list))).body.items[0]?.sequence;
      const before = await entries();
      const again = await lead.call(endpoint, { ...given, key });
      expect([again.status, again.version]).toEqual([first.status, first.version]);
      expect(again.body).toEqual(first.body);
      expect(await entries()).toBe(before);
    },
  );
});

test('an id that is no id is nobody’s', async () => {
  const lead = await own.plant.as('lead');
  for (const endpoint of Object.values(endpoints)) {
    if (!endpoint.path.includes(':') || endpoint.access === 'anyone') continue;
    const params = Object.fromEntries(Object.keys(idsFor(endpoint)).map((key) => [key, "1' or '1'='1"]));
    const answer = await lead.call(endpoint, { params, version: 1, body: {} });
    expect(answer.status, endpoint.path).toBe(404);
  }
});

/** A plant with one of everything. */
type Stocked = {
  plant: TestPlant;
  partId: string;
  layoutId: string;
  planId: string;
  reportId: string;
  strategyId: string;
  approvedId: string;
};

async function stock(plant: TestPlant): Promise<Stocked> {
  const approved = await makeApproved(plant, { thickness: { min: 10_000, max: 12_000 } });
  const programmer = await plant.as('programmer');
  const operator = await plant.as('operator');
  const [partId, layoutId, planId, reportId] = [newId(), newId(), newId(), newId()];
  await made(
    programmer.call(partEndpoints.add, {
      body: { id: partId, name: 'Bracket', answers: { unit: 'mm' } },
      file: drawing,
    }),
  );
  await made(programmer.call(layoutEndpoints.add, { body: { id: layoutId, ...layoutOf(partId) } }));
  await made(
    programmer.call(cornerPlanEndpoints.add, { body: { id: planId, partId, revisionId: approved.id, ...choices } }),
  );
  await made(
    operator.call(reportEndpoints.add, {
      body: { id: reportId, ...reportOf(plant, approved.id) },
      file: { name: 'photo.png', bytes: await picture() },
    }),
  );
  return { plant, partId, layoutId, planId, reportId, strategyId: approved.strategyId, approvedId: approved.id };
}

const drawing = {
  name: 'bracket.dxf',
  bytes: readFileSync(path.join(import.meta.dirname, '../support/drawings/bracket.dxf')),
};
const free = { left: 0.03, right: 0.03, above: 0.03, below: 0.03 };
const choices = { thickness: 0.011, plateTemperature: 300, skeleton: free, overrides: {} };
const layoutOf = (partId: string) => ({
  name: 'Two brackets',
  plate: { kind: 'rectangle', width: 1, height: 0.8 },
  kerfWidth: 7e-4,
  clearance: 8e-3,
  edgeMargin: 0.01,
  placements: [1, 2].map((number) => ({ number, partId, at: { x: 0.02, y: number / 3 }, turn: 0, mirrored: false })),
  order: null,
});
const reportOf = (plant: TestPlant, revisionId: string) => ({
  revisionId,
  machineId: plant.machineId,
  plateId: plant.plateId,
  kind: 'erupted',
  words: '',
});

async function picture(): Promise<Buffer> {
  const { default: sharp } = await import('sharp');
  return sharp({ create: { width: 8, height: 8, channels: 3, background: '#804020' } })
    .png()
    .toBuffer();
}

let rules = 0;
/** A rule that says what no other says. */
const newRule = () => ({ expression: `stageCount <= ${20 + ++rules}`, sentence: 'Few stages.', blocks: false });
const makeRule = async (plant: TestPlant): Promise<Asked> => {
  const id = newId();
  const lead = await plant.as('lead');
  const { version } = await made(lead.call(houseRuleEndpoints.add, { body: { id, ...newRule() } }));
  return { params: { ruleId: id }, version };
};

let ranges = 0;
/** A grade group nobody used yet, so that approvals don't meet. */
const fresh = () => ({ gradeGroup: `group ${++ranges}` });

type Cell = (of: Stocked) => Asked | Promise<Asked>;

/** For every route a request that would succeed for whoever may make it. */
const matrix: Readonly<Record<string, Cell>> = {
  'session.current': () => ({}),
  'session.choosePlant': ({ plant }) => ({ body: { plantId: plant.id } }),
  'person.list': () => ({}),
  'person.add': () => ({
    body: {
      id: newId(),
      name: 'New',
      mail: `new-${newId()}@own.example`,
      role: 'operator',
      password: 'a long password',
    },
  }),
  'person.change': async ({ plant }) => {
    const id = newId();
    const lead = await plant.as('lead');
    const mail = `change-${id}@own.example`;
    const person = endpoints['person.add'];
    if (!person) throw new Error('there is no person.add');
    const body = { id, name: 'New', mail, role: 'operator', password: 'a long password' };
    const { version } = await made(lead.call(person, { body }));
    return { params: { memberId: id }, body: { role: 'programmer' }, version };
  },
  'machine.list': () => ({}),
  'machine.get': ({ plant }) => ({ params: { machineId: plant.machineId } }),
  'machine.add': () => ({
    body: { id: newId(), revisionId: newId(), name: `Machine ${newId()}`, profile: FOUR_KILOWATT },
  }),
  'machine.revise': async ({ plant }) => {
    const add = endpoints['machine.add'];
    if (!add) throw new Error('there is no machine.add');
    const machineId = newId();
    const engineer = await plant.as('engineer');
    const body = { id: machineId, revisionId: newId(), name: `Machine ${machineId}`, profile: FOUR_KILOWATT };
    const { version } = await made(engineer.call(add, { body }));
    return { params: { machineId }, body: { id: newId(), profile: FOUR_KILOWATT }, version };
  },
  'nozzle.list': () => ({}),
  'nozzle.add': () => ({ body: { id: newId(), name: `Nozzle ${newId()}`, type: 'double', diameter: 0.002 } }),
  'grade.list': () => ({}),
  'grade.add': () => ({ body: { id: newId(), name: `Grade ${newId()}`, group: 'S235' } }),
  'strategy.list': () => ({}),
  'strategy.get': ({ strategyId }) => ({ params: { strategyId } }),
  'strategy.add': ({ plant }) => ({
    body: { id: newId(), revisionId: newId(), name: `Strategy ${newId()}`, content: plant.content },
  }),
  'strategy.draft': async ({ plant }) => {
    const { strategyId, id } = await makeSubmitted(plant, fresh());
    return { params: { strategyId }, body: { id: newId(), fromRevisionId: id }, version: 1 };
  },
  'revision.get': ({ approvedId }) => ({ params: { revisionId: approvedId } }),
  'revision.save': async ({ plant }) => {
    const { id, version } = await makeDraft(plant);
    return { params: { revisionId: id }, body: { content: plant.content }, version };
  },
  'revision.judge': ({ plant }) => ({ body: { content: plant.content } }),
  'revision.submit': async ({ plant }) => {
    const { id, version } = await makeDraft(plant);
    return { params: { revisionId: id }, body: {}, version };
  },
  'revision.approve': async ({ plant }) => {
    const { id, version } = await makeSubmitted(plant, fresh());
    return { params: { revisionId: id }, body: {}, version };
  },
  'revision.giveBack': async ({ plant }) => {
    const { id, version } = await makeSubmitted(plant, fresh());
    return { params: { revisionId: id }, body: { words: 'Too wide.' }, version };
  },
  'revision.withdraw': async ({ plant }) => {
    const { id, version } = await makeApproved(plant, fresh());
    return { params: { revisionId: id }, body: { words: 'It erupts.' }, version };
  },
  'review.list': () => ({}),
  'houseRule.list': () => ({}),
  'houseRule.example': () => ({}),
  'houseRule.read': () => ({ body: { expression: 'reserveHot >= 2' } }),
  'houseRule.add': () => ({ body: { id: newId(), ...newRule() } }),
  'houseRule.change': async ({ plant }) => ({ ...(await makeRule(plant)), body: newRule() }),
  'houseRule.end': ({ plant }) => makeRule(plant),
  'rate.get': () => ({}),
  'rate.change': async ({ plant }) => {
    const { version } = (await made((await plant.as('lead')).call(rateEndpoints.get))).body;
    return {
      version,
      body: {
        currency: 'EUR',
        machineHour: 100 + version,
        oxygenKilogram: null,
        electricityKilowattHour: 0.2,
        wallPlugEfficiency: 0.3,
      },
    };
  },
  'plate.list': () => ({}),
  'plate.get': ({ plant }) => ({ params: { plateId: plant.plateId } }),
  'plate.add': ({ plant }) => ({ body: { id: newId(), ...testPlate(plant.gradeId) } }),
  'plate.change': async ({ plant }) => {
    const add = endpoints['plate.add'];
    if (!add) throw new Error('there is no plate.add');
    const plateId = newId();
    const engineer = await plant.as('engineer');
    const { version } = await made(engineer.call(add, { body: { id: plateId, ...testPlate(plant.gradeId) } }));
    return { params: { plateId }, body: testPlate(plant.gradeId), version };
  },
  'card.get': ({ plant }) => ({ query: { machineId: plant.machineId, tag: plant.plateTag } }),
  'request.list': () => ({}),
  'request.add': ({ plant }) => ({
    body: { id: newId(), machineId: plant.machineId, gradeGroup: 'S355', thickness: 30_000, plateId: plant.plateId },
  }),
  'part.list': () => ({}),
  'part.get': ({ partId }) => ({ params: { partId } }),
  'part.file': ({ partId }) => ({ params: { partId } }),
  'part.read': () => ({ body: {}, file: drawing }),
  'part.add': () => ({ body: { id: newId(), name: 'Bracket', answers: { unit: 'mm' } }, file: drawing }),
  'layout.list': () => ({}),
  'layout.get': ({ layoutId }) => ({ params: { layoutId } }),
  'layout.add': ({ partId }) => ({ body: { id: newId(), ...layoutOf(partId) } }),
  'layout.change': async ({ plant, partId }) => {
    const layoutId = newId();
    const programmer = await plant.as('programmer');
    const { version } = await made(
      programmer.call(layoutEndpoints.add, { body: { id: layoutId, ...layoutOf(partId) } }),
    );
    return { params: { layoutId }, body: { ...layoutOf(partId), name: 'One bracket' }, version };
  },
  'cornerPlan.get': ({ planId }) => ({ params: { planId } }),
  'cornerPlan.add': ({ partId, approvedId }) => ({ body: { id: newId(), partId, revisionId: approvedId, ...choices } }),
  'cornerPlan.redo': async ({ plant, planId, approvedId }) => {
    const programmer = await plant.as('programmer');
    const { version } = await made(programmer.call(cornerPlanEndpoints.get, { params: { planId } }));
    return { params: { planId }, body: { revisionId: approvedId, ...choices }, version };
  },
  'estimate.plan': ({ planId }) => ({ params: { planId } }),
  'cutPath.show': ({ planId }) => ({ params: { planId } }),
  'cutPath.take': ({ planId }) => ({ params: { planId }, query: { as: 'dxf', unit: 'inch' } }),
  'blockFrame.get': ({ plant }) => ({ params: { machineId: plant.machineId } }),
  'blockFrame.change': async ({ plant }) => {
    const engineer = await plant.as('engineer');
    const params = { machineId: plant.machineId };
    const { version } = await made(engineer.call(blockFrameEndpoints.get, { params }));
    return { params, body: { unit: 'inch', header: 'G70', footer: '' }, version };
  },
  'report.list': () => ({}),
  'report.get': ({ reportId }) => ({ params: { reportId } }),
  'report.photo': ({ reportId }) => ({ params: { reportId } }),
  'report.add': ({ plant, approvedId }) => ({ body: { id: newId(), ...reportOf(plant, approvedId) } }),
  'report.close': async ({ plant, approvedId }) => {
    const id = newId();
    const operator = await plant.as('operator');
    const { version } = await made(
      operator.call(reportEndpoints.add, { body: { id, ...reportOf(plant, approvedId) } }),
    );
    return { params: { reportId: id }, body: { words: 'Nozzle was worn.' }, version };
  },
  'record.list': () => ({}),
  'record.verify': () => ({}),
};

/** Something like an id for each parameter of a path. */
const idsFor = (endpoint: Endpoint): Record<string, string> =>
  Object.fromEntries([...endpoint.path.matchAll(/:(\w+)/g)].map((found) => [found[1] ?? '', newId()]));

type Layer = { route?: { path: string; stack: { method: string }[] }; handle?: { stack?: Layer[] } };

/** Every route of a router, asked of itself. */
function mountedRoutes(router: Router): string[] {
  const layers = router.stack as unknown as Layer[]; // Express types its layers without what they hold
  return layers.flatMap(({ route, handle }) => {
    if (route) return route.stack.map(({ method }) => `${method.toUpperCase()} ${route.path}`);
    return handle?.stack ? mountedRoutes({ stack: handle.stack } as unknown as Router) : [];
  });
}
