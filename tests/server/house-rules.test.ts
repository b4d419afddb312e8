import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { houseRuleEndpoints, type HouseRule } from '../../shared/house-rules.ts';
import { limits } from '../../shared/limits.ts';
import { recordEndpoints } from '../../shared/record.ts';
import { revisionEndpoints, strategyEndpoints } from '../../shared/strategies.ts';
import { LONGEST_RULE } from '../../strategy/rules/index.ts';
import { made, makeDraft, makePlant, makeSubmitted, type TestPerson, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Answer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let lead: Caller;
let plants = 0;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

/** Rules are the plant's: each test has a plant of its own. */
beforeEach(async () => {
  plant = await makePlant(server, `rules${++plants}`);
  lead = await plant.as('lead');
});

const ruleText = (change: Partial<HouseRule> = {}) => ({
  expression: 'craterRadius <= 1.5 mm',
  sentence: 'The crater stays within 1.5 mm.',
  blocks: false,
  ...change,
});
const add = (change: Partial<HouseRule> = {}) =>
  lead.call(houseRuleEndpoints.add, { body: { id: newId(), ...ruleText(change) } });
const rulesOf = async (caller = lead) => (await made(caller.call(houseRuleEndpoints.list))).body.items;
const ruleSaying = async (expression: string): Promise<HouseRule> => {
  const found = (await rulesOf()).find((rule) => rule.expression === expression);
  if (!found) throw new Error(`there is no rule ${expression}`);
  return found;
};
const end = ({ id, version }: Pick<HouseRule, 'id' | 'version'>) =>
  lead.call(houseRuleEndpoints.end, { params: { ruleId: id }, version });
const read = async (id: string, as: TestPerson = 'engineer') =>
  (await made((await plant.as(as)).call(revisionEndpoints.get, { params: { revisionId: id } }))).body;
const submit = async ({ id, version }: { id: string; version: number }) =>
  (await plant.as('engineer')).call(revisionEndpoints.submit, { params: { revisionId: id }, body: {}, version });
const lastEvent = async () => (await made(lead.call(recordEndpoints.list))).body.items[0];
/** Cut off short of its last stage: through late or never. */
const tooShort = () => ({ stages: plant.content.stages.slice(0, -1) });

describe('a plant’s rules', () => {
  test('begin with the two on the reserve, which nobody wrote', async () => {
    expect(await rulesOf()).toMatchObject([
      { expression: 'reserveCold >= 2', blocks: false, changedBy: null, endedAt: null, version: 1 },
      { expression: 'reserveHot >= 2.2', blocks: false, changedBy: null, endedAt: null, version: 1 },
    ]);
  });

  test('are written by the lead, and the record says what they were', async () => {
    const added = await made(add({ blocks: true }));
    expect(added.status).toBe(201);
    expect(added.body).toMatchObject({ ...ruleText({ blocks: true }), version: 1, endedAt: null });
    expect(added.body.changedBy?.id).toBe(plant.userId('lead'));
    expect(await lastEvent()).toMatchObject({
      event: 'houseRule.added',
      subject: { kind: 'houseRule', id: added.body.id },
      facts: ruleText({ blocks: true }),
    });
    const params = { ruleId: added.body.id };
    const text = ruleText({ expression: 'craterRadius <= 2 mm', sentence: 'Two will do.' });
    const changed = await made(lead.call(houseRuleEndpoints.change, { params, body: text, version: added.version }));
    expect(changed.body).toMatchObject({ ...text, version: 2 });
    expect(await lastEvent()).toMatchObject({
      event: 'houseRule.changed',
      facts: { version: 2, from: ruleText({ blocks: true }), to: text },
    });
    const ended = await made(end({ id: added.body.id, version: changed.version }));
    expect(ended.body.endedAt).not.toBeNull();
    expect(await lastEvent()).toMatchObject({ event: 'houseRule.ended', facts: text });
    expect((await rulesOf()).at(-1)?.id).toBe(added.body.id);
  });

  test('are read by whoever reads strategies, and changed by the lead alone', async () => {
    for (const person of ['engineer', 'approver', 'programmer'] as const) {
      const caller = await plant.as(person);
      expect(await rulesOf(caller)).toHaveLength(2);
      const rule = await ruleSaying('reserveCold >= 2');
      const params = { ruleId: rule.id };
      const { version } = rule;
      for (const answer of [
        await caller.call(houseRuleEndpoints.add, { body: { id: newId(), ...ruleText() } }),
        await caller.call(houseRuleEndpoints.change, { params, body: ruleText(), version }),
        await caller.call(houseRuleEndpoints.end, { params, version }),
        await caller.call(houseRuleEndpoints.read, { body: { expression: 'stalls == 0' } }),
      ]) {
        expect(answer.status, person).toBe(403);
      }
    }
    expect((await (await plant.as('operator')).call(houseRuleEndpoints.list)).status).toBe(403);
    expect(await rulesOf()).toHaveLength(2);
  });

  test('are nobody else’s to see, to change or to be judged by', async () => {
    const { body: ours } = await made(add({ blocks: true, expression: 'stageCount <= 1' }));
    const other = await makePlant(server, `other${plants}`);
    const theirLead = await other.as('lead');
    expect((await rulesOf(theirLead)).some(({ id }) => id === ours.id)).toBe(false);
    const params = { ruleId: ours.id };
    const across = [
      await theirLead.call(houseRuleEndpoints.change, { params, body: ruleText(), version: 1 }),
      await theirLead.call(houseRuleEndpoints.end, { params, version: 1 }),
    ];
    expect(across.map(({ status }) => status)).toEqual([404, 404]);
    expect((await made(lead.call(houseRuleEndpoints.list))).body.items.find(({ id }) => id === ours.id)?.version).toBe(
      1,
    );
    await makeSubmitted(other);
  });

  test('say each thing once, until it has ended', async () => {
    const { body } = await made(add());
    const again = await add();
    expect(again.status).toBe(409);
    expect(again.problem).toMatchObject({
      code: 'already-there',
      detail: 'A rule that says just this is in force already.',
    });
    await made(end(body));
    await made(add());
  });

  test('of what was seen: a stale version is refused, and an ended rule is not rewritten', async () => {
    const { body } = await made(add());
    const params = { ruleId: body.id };
    const text = ruleText({ sentence: 'Otherwise.' });
    await made(lead.call(houseRuleEndpoints.change, { params, body: text, version: 1 }));
    expect((await lead.call(houseRuleEndpoints.change, { params, body: text, version: 1 })).status).toBe(412);
    await made(end({ id: body.id, version: 2 }));
    const late = await lead.call(houseRuleEndpoints.change, { params, body: text, version: 3 });
    expect(late.problem).toMatchObject({ code: 'wrong-state', status: 409 });
  });

  test('are so many and no more', async () => {
    for (let count = 2; count < limits.rules; count += 1) await made(add({ expression: `stageCount <= ${count}` }));
    const answer = await add({ expression: 'stageCount <= 99' });
    expect(answer.problem).toMatchObject({ code: 'wrong-state' });
    expect(answer.problem.detail).toContain(`at most ${limits.rules} rules`);
  });
});

describe('an expression', () => {
  test('may be as long here as its reader takes', () => {
    expect(limits.ruleExpression).toBe(LONGEST_RULE);
  });

  test.each([
    ['constructor.constructor("return process")()', /has no meaning in a rule/],
    ['import({ reserveCold: 9 }, {})', /has no meaning in a rule/],
    ['reserveCold = 9', /none of them|no meaning/],
    ['f(x) = x; f(reserveCold) > 1', /no meaning/],
    ['eval(reserveCold) > 1', /none of them|no meaning/],
    ['cos(reserveCold) > 0', /none of them|no meaning/],
    ['createUnit(reserveCold) > 1', /none of them|no meaning/],
    ['toString > 1', /no result and no unit/],
    ['__proto__ > 1', /no result and no unit/],
    ['reserveCold ^ 9999999 > 1', /no meaning/],
    ['reserveCold! > 1', /no meaning/],
    ['craterRadius <= 1.5', /a length and a plain number/],
    ['reserveCold', /no comparison/],
    ['1 < 2', /names no result/],
    ['password >= 2', /"password" is no result/],
    ['reserveCold >= ', /cannot be read/],
    ['('.repeat(100) + 'reserveCold > 1' + ')'.repeat(100), /At most 200 characters/],
  ])('that is no rule is refused with a sentence on its field: %s', async (expression, why) => {
    const answer = await add({ expression });
    expect(answer.status).toBe(400);
    expect(answer.problem.code).toBe('invalid-fields');
    expect(answer.problem.errors).toEqual([{ pointer: '/expression', detail: expect.stringMatching(why) as string }]);
    const reading = await made(lead.call(houseRuleEndpoints.read, { body: { expression } }));
    expect(reading.body).toMatchObject({ kind: 'none' });
    expect(await rulesOf()).toHaveLength(2);
  });

  test('is read as one types: what it uses, and what it says of the revision changed last', async () => {
    const before = await made(lead.call(houseRuleEndpoints.read, { body: { expression: 'reserveCold >= 2' } }));
    expect(before.body).toEqual({ kind: 'ok', uses: ['reserveCold'], example: null });
    expect((await made(lead.call(houseRuleEndpoints.example))).body).toEqual({ example: null });

    const draft = await makeDraft(plant);
    const after = await made(
      lead.call(houseRuleEndpoints.read, { body: { expression: 'reserveCold >= 9 and craterRadius < 3 mm' } }),
    );
    expect(after.body).toMatchObject({ kind: 'ok', uses: ['reserveCold', 'craterRadius'] });
    const { example } = after.body as { example?: { state: string; why: string } }; // the other kind has none
    expect(example?.state).toBe('broken');
    expect(example?.why).toMatch(/^Here reserveCold is 2\.\d+, craterRadius is [\d.]+ mm\.$/);

    const { body } = await made(lead.call(houseRuleEndpoints.example));
    expect(body.example).toMatchObject({ revisionId: draft.id, number: 1 });
    const { prediction } = await read(draft.id);
    const value = (name: string) => body.example?.results.find((one) => one.name === name)?.value;
    expect(value('craterRadius')).toBe(prediction.craterRadius);
    expect(value('routineTime')).toBe(prediction.routineTime);
    expect(value('reserveCold')).toBe(prediction.cold.reserve.kind === 'ok' ? prediction.cold.reserve.value : null);
  });
});

describe('a draft', () => {
  test('is judged anew by the rules in force each time it is read', async () => {
    const draft = await makeDraft(plant);
    expect((await read(draft.id)).houseRules).toMatchObject([
      { expression: 'reserveCold >= 2', state: 'holds', blocks: false },
      { expression: 'reserveHot >= 2.2', state: 'holds', blocks: false },
    ]);
    const { body: few } = await made(add({ expression: 'stageCount <= 1', sentence: 'One stage.' }));
    const { houseRules } = await read(draft.id, 'programmer');
    expect(houseRules.find(({ ruleId }) => ruleId === few.id)).toEqual({
      ruleId: few.id,
      expression: 'stageCount <= 1',
      sentence: 'One stage.',
      blocks: false,
      state: 'broken',
      why: `Here stageCount is ${plant.content.stages.length}.`,
    });
    await made(end(few));
    expect((await read(draft.id)).houseRules).toHaveLength(2);
  });

  test('is judged by what is saved, and the answer to saving says so', async () => {
    const draft = await makeDraft(plant);
    const engineer = await plant.as('engineer');
    const saved = await made(
      engineer.call(revisionEndpoints.save, {
        params: { revisionId: draft.id },
        body: { content: { ...plant.content, ...tooShort() } },
        version: draft.version,
      }),
    );
    const states = saved.body.houseRules.map(({ state }) => state);
    expect(states).not.toContain('holds');
    const { body } = await made(engineer.call(strategyEndpoints.get, { params: { strategyId: draft.strategyId } }));
    expect(body.revisions[0]?.houseRules).toEqual(saved.body.houseRules);
  });

  test('is judged before it is saved, and nothing is kept of that', async () => {
    const draft = await makeDraft(plant);
    const engineer = await plant.as('engineer');
    const unsaved = { ...plant.content, ...tooShort() };
    const { body } = await made(engineer.call(revisionEndpoints.judge, { body: { content: unsaved } }));
    expect(body.items.map(({ state }) => state)).not.toContain('holds');
    expect((await read(draft.id)).houseRules.map(({ state }) => state)).toEqual(['holds', 'holds']);
    expect((await lastEvent())?.event).toBe('strategy.added');
    const other = await makePlant(server, `judge${plants}`);
    const foreign = await engineer.call(revisionEndpoints.judge, { body: { content: other.content } });
    expect(foreign.status).toBe(400);
    expect(foreign.problem.errors?.map(({ pointer }) => pointer)).toContain('/content/machineRevisionId');
  });

  test('that breaks a rule may be handed in; one that breaks a rule that blocks may not, and each is named', async () => {
    const draft = await makeDraft(plant);
    const { body: loose } = await made(add({ expression: 'stageCount <= 1', sentence: 'One stage.' }));
    const { body: firm } = await made(
      add({ expression: 'routineTime <= 1 s', sentence: 'A pierce takes a second.', blocks: true }),
    );
    const { body: firm2 } = await made(add({ expression: 'peakPower <= 10 W', sentence: 'Ten watts.', blocks: true }));
    const refused = await submit(draft);
    expect(refused.status).toBe(409);
    expect(refused.problem.code).toBe('wrong-state');
    expect(refused.problem.detail).toContain('A pierce takes a second.');
    expect(refused.problem.detail).toContain('Ten watts.');
    expect(refused.problem.detail).not.toContain('One stage.');
    expect(refused.problem.errors?.map(({ pointer }) => pointer).sort()).toEqual(
      [firm, firm2].map(({ id }) => `/houseRules/${id}`).sort(),
    );
    expect(refused.problem.errors?.[0]?.detail).toMatch(/^(A pierce takes a second|Ten watts)\. Here \w+ is /);
    expect((await read(draft.id)).state).toBe('draft');

    await made(end(firm));
    await made(end(firm2));
    const submitted = await made(submit(draft));
    expect(submitted.body.state).toBe('inReview');
    expect(submitted.body.houseRules.find(({ ruleId }) => ruleId === loose.id)?.state).toBe('broken');
  });

  test('of which a rule that blocks can say nothing is not handed in: a pierce never through has no reserve', async () => {
    const rule = await ruleSaying('reserveCold >= 2');
    await made(
      lead.call(houseRuleEndpoints.change, {
        params: { ruleId: rule.id },
        body: ruleText({ expression: rule.expression, sentence: rule.sentence, blocks: true }),
        version: rule.version,
      }),
    );
    const draft = await makeDraft(plant, { stages: plant.content.stages.slice(0, 1) });
    const verdict = (await read(draft.id)).houseRules.find(({ ruleId }) => ruleId === rule.id);
    expect(verdict).toMatchObject({ state: 'unclear', why: 'There is no reserveCold here.' });
    const refused = await submit(draft);
    expect(refused.problem).toMatchObject({ code: 'wrong-state' });
    expect(refused.problem.errors).toHaveLength(1);
  });

  test('is checked against the reserve that the plant itself asks for', async () => {
    const checkOf = async (id: string) => (await read(id)).prediction.checks.find((one) => one.id === 'reserve-cold');
    expect((await checkOf((await makeDraft(plant)).id))?.state).toBe('ok');
    const rule = await ruleSaying('reserveCold >= 2');
    await made(
      lead.call(houseRuleEndpoints.change, {
        params: { ruleId: rule.id },
        body: ruleText({ expression: 'reserveCold >= 3', sentence: 'Three.' }),
        version: rule.version,
      }),
    );
    const strict = await checkOf((await makeDraft(plant)).id);
    expect(strict?.state).not.toBe('ok');
    expect(strict?.sentence).toContain('3');
  });
});

describe('a revision handed in', () => {
  test('keeps what the rules said then, whatever becomes of them', async () => {
    const submitted = await makeSubmitted(plant);
    const then = (await read(submitted.id)).houseRules;
    expect(then).toHaveLength(2);
    const entry = await lastEvent();
    expect(entry).toMatchObject({ event: 'revision.submitted' });
    expect(entry?.facts.houseRules).toMatchObject([{ state: 'holds' }, { state: 'holds' }]);
    for (const rule of await rulesOf()) await made(end(rule));
    await made(add({ expression: 'stageCount <= 1', blocks: true }));
    expect((await read(submitted.id)).houseRules).toEqual(then);
    const approved = await made(
      lead.call(revisionEndpoints.approve, {
        params: { revisionId: submitted.id },
        body: {},
        version: submitted.version,
      }),
    );
    expect(approved.body.houseRules).toEqual(then);
  });

  test('at the moment a rule is added is judged with it or without it, never half', async () => {
    const draft = await makeDraft(plant);
    const [rule, handed] = await Promise.all([
      add({ expression: 'stageCount <= 1', blocks: true }),
      submit(draft) as Promise<Answer<{ houseRules: unknown[] }>>,
    ]);
    await made(Promise.resolve(rule));
    if (handed.status === 200) expect(handed.body.houseRules).toHaveLength(2);
    else expect(handed.problem.code).toBe('wrong-state');
  });
});
