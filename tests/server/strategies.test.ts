import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { predictionOf } from '../../shared/prediction.ts';
import { recordEndpoints } from '../../shared/record.ts';
import { reviewEndpoints, revisionEndpoints, strategyEndpoints } from '../../shared/strategies.ts';
import { FOUR_KILOWATT } from '../support/machines.ts';
import {
  made,
  makeApproved,
  makeDraft,
  makePlant,
  makeSubmitted,
  type TestPerson,
  type TestPlant,
} from '../support/plant.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let groups = 0;
/** A grade group of its own for each test, so that approvals don't meet. */
const fresh = () => ({ gradeGroup: `group ${++groups}` });

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'strategies');
});
afterAll(() => server.close());

const decide = async (
  person: TestPerson,
  what: 'submit' | 'approve' | 'giveBack' | 'withdraw',
  of: { id: string; version: number },
  words = 'because',
) =>
  (await plant.as(person)).call(revisionEndpoints[what], {
    params: { revisionId: of.id },
    body: { words },
    version: of.version,
  });

const read = async (id: string) =>
  (await made((await plant.as('lead')).call(revisionEndpoints.get, { params: { revisionId: id } }))).body;

describe('a draft', () => {
  test('carries the prediction the server computed, never one that was sent', async () => {
    const draft = await makeDraft(plant);
    const { content, prediction } = await read(draft.id);
    const ours = predictionOf({ content, profile: FOUR_KILOWATT, nozzle: { type: 'single', diameter: 0.0015 } });
    expect(prediction).toEqual(JSON.parse(JSON.stringify(ours)));

    const engineer = await plant.as('engineer');
    const forged = await engineer.call(revisionEndpoints.save, {
      params: { revisionId: draft.id },
      body: { content, prediction: { reserve: 9 } },
      version: draft.version,
    });
    expect(forged.status).toBe(400);
    expect(forged.problem.errors).toEqual([{ pointer: '/prediction', detail: 'This field is not known here.' }]);
  });

  test('is saved over and over, each time with a new prediction, and the record says so', async () => {
    const draft = await makeDraft(plant);
    const engineer = await plant.as('engineer');
    const content = { ...plant.content, hottestPlate: 423.15 };
    const saved = await made(
      engineer.call(revisionEndpoints.save, {
        params: { revisionId: draft.id },
        body: { content },
        version: draft.version,
      }),
    );
    expect(saved.body.content).toEqual(content);
    expect(saved.body.prediction.hot.plateTemperature).toBe(423.15);
    const lead = await plant.as('lead');
    const [entry] = (await made(lead.call(recordEndpoints.list))).body.items;
    expect(entry).toMatchObject({
      event: 'revision.saved',
      subject: { kind: 'revision', id: draft.id },
      actorId: plant.userId('engineer'),
    });
  });

  test('for a machine or a nozzle of another plant is refused', async () => {
    const other = await makePlant(server, `other${newId().slice(-6)}`);
    const engineer = await plant.as('engineer');
    const body = { id: newId(), revisionId: newId(), name: `Foreign ${newId()}`, content: other.content };
    const answer = await engineer.call(strategyEndpoints.add, { body });
    expect(answer.status).toBe(400);
    expect(answer.problem.errors?.map(({ pointer }) => pointer)).toEqual([
      '/content/machineRevisionId',
      '/content/nozzleId',
    ]);
  });

  test('is the only one of its strategy', async () => {
    const draft = await makeDraft(plant);
    const engineer = await plant.as('engineer');
    const second = await engineer.call(strategyEndpoints.draft, {
      params: { strategyId: draft.strategyId },
      body: { id: newId(), fromRevisionId: draft.id },
      version: 1,
    });
    expect(second.status).toBe(409);
    expect(second.problem.detail).toBe('Revision 1 is still a draft. Go on with that one.');
  });
});

describe('approval', () => {
  test('is by a second person: whoever wrote any of it can’t approve it, nor return it', async () => {
    const lead = await plant.as('lead');
    const draft = await makeDraft(plant, fresh());
    const { content } = await read(draft.id);
    const touched = await made(
      lead.call(revisionEndpoints.save, {
        params: { revisionId: draft.id },
        body: { content: { ...content, hottestPlate: 400 } },
        version: draft.version,
      }),
    );
    const submitted = await made(decide('engineer', 'submit', { id: draft.id, version: touched.version }));
    expect(submitted.body.touchedBy.map(({ id }) => id).sort()).toEqual(
      [plant.userId('engineer'), plant.userId('lead')].sort(),
    );
    for (const what of ['approve', 'giveBack'] as const) {
      const own = await decide('lead', what, { id: draft.id, version: submitted.version });
      expect(own.status).toBe(403);
      expect(own.problem.code).toBe('own-work');
    }
    expect((await made(decide('approver', 'approve', { id: draft.id, version: submitted.version }))).body.state).toBe(
      'approved',
    );
  });

  test('needs the lead’s grant when an engineer gives it', async () => {
    const submitted = await makeSubmitted(plant, fresh());
    const answer = await decide('engineer', 'approve', submitted);
    expect(answer.status).toBe(403);
    expect(answer.problem.code).toBe('not-allowed');
  });

  test('is of what was seen: a stale version is refused', async () => {
    const submitted = await makeSubmitted(plant, fresh());
    expect((await decide('lead', 'approve', { id: submitted.id, version: submitted.version - 1 })).status).toBe(412);
    expect((await read(submitted.id)).state).toBe('inReview');
  });

  test('supersedes the strategy’s former approval in the same moment', async () => {
    const group = fresh();
    const first = await makeApproved(plant, group);
    const engineer = await plant.as('engineer');
    const second = newId();
    await made(
      engineer.call(strategyEndpoints.draft, {
        params: { strategyId: first.strategyId },
        body: { id: second, fromRevisionId: first.id },
        version: 1,
      }),
    );
    const submitted = await made(decide('engineer', 'submit', { id: second, version: 1 }));
    await made(decide('lead', 'approve', { id: second, version: submitted.version }));
    const [before, after] = [await read(first.id), await read(second)];
    expect(before.state).toBe('superseded');
    expect(before.reviews.map(({ verdict }) => verdict)).toEqual(['submitted', 'approved', 'superseded']);
    expect(after.state).toBe('approved');
    expect(after.number).toBe(2);
    const { body } = await made(engineer.call(strategyEndpoints.list));
    expect(body.items.find(({ id }) => id === first.strategyId)?.approved).toEqual({ id: second, number: 2 });
  });

  test('of a range another approved strategy covers in part is refused, and the other is named', async () => {
    const group = fresh();
    const first = await makeApproved(plant, group);
    const name = (await read(first.id)).strategyName;
    const second = await makeSubmitted(plant, { ...group, thickness: { min: 19_999, max: 22_000 } });
    const answer = await decide('lead', 'approve', second);
    expect(answer.status).toBe(409);
    expect(answer.problem.code).toBe('overlap');
    expect(answer.problem.detail).toContain(`“${name}” (18 to below 20 mm)`);
    expect((await read(second.id)).state).toBe('inReview');
  });

  test('of two overlapping strategies at once leaves one approved', async () => {
    const group = fresh();
    const both = [
      await makeSubmitted(plant, group),
      await makeSubmitted(plant, { ...group, thickness: { min: 19_000, max: 21_000 } }),
    ];
    const answers = await Promise.all([
      decide('lead', 'approve', both[0] ?? failed()),
      decide('approver', 'approve', both[1] ?? failed()),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(answers.find(({ status }) => status === 409)?.problem.code).toBe('overlap');
  });

  test('twice over is one approval', async () => {
    const submitted = await makeSubmitted(plant, fresh());
    const answers = await Promise.all([decide('lead', 'approve', submitted), decide('approver', 'approve', submitted)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
  });
});

describe('who is an author', () => {
  test('the authors of a returned revision stay authors of the draft made from it', async () => {
    const submitted = await makeSubmitted(plant, fresh());
    await made(decide('lead', 'giveBack', submitted));
    const approver = await plant.as('approver');
    const next = newId();
    const begun = await made(
      approver.call(strategyEndpoints.draft, {
        params: { strategyId: submitted.strategyId },
        body: { id: next, fromRevisionId: submitted.id },
        version: 1,
      }),
    );
    expect(begun.body.touchedBy.map(({ id }) => id).sort()).toEqual(
      [plant.userId('engineer'), plant.userId('approver')].sort(),
    );
  });

  test('content that was approved starts afresh: only who changes it from there on is an author', async () => {
    const approved = await makeApproved(plant, fresh());
    const lead = await plant.as('lead');
    const begun = await made(
      lead.call(strategyEndpoints.draft, {
        params: { strategyId: approved.strategyId },
        body: { id: newId(), fromRevisionId: approved.id },
        version: 1,
      }),
    );
    expect(begun.body.touchedBy.map(({ id }) => id)).toEqual([plant.userId('lead')]);
  });
});

describe('a revision’s way', () => {
  test.each([
    ['draft', ['approve', 'giveBack', 'withdraw']],
    ['inReview', ['submit', 'withdraw']],
    ['returned', ['submit', 'approve', 'giveBack', 'withdraw']],
    ['approved', ['submit', 'approve', 'giveBack']],
    ['withdrawn', ['submit', 'approve', 'giveBack', 'withdraw']],
  ] as const)('from %s there is no way by %j', async (state, refused) => {
    const at = await arrivedAt(state);
    for (const what of refused) {
      const answer = await decide('lead', what, at);
      expect(answer.status, what).toBe(409);
      expect(answer.problem.code).toBe('wrong-state');
    }
    const saved = await (
      await plant.as('engineer')
    ).call(revisionEndpoints.save, {
      params: { revisionId: at.id },
      body: { content: plant.content },
      version: at.version,
    });
    expect(saved.status).toBe(state === 'draft' ? 200 : 409);
  });

  test('returning and withdrawing need a reason', async () => {
    const submitted = await makeSubmitted(plant, fresh());
    const answer = await decide('lead', 'giveBack', submitted, '  ');
    expect(answer.problem.errors).toEqual([{ pointer: '/words', detail: 'Say what must change.' }]);
  });

  test('whoever may decide may withdraw, with their own work too', async () => {
    const lead = await plant.as('lead');
    const [strategyId, id] = [newId(), newId()];
    await made(
      lead.call(strategyEndpoints.add, {
        body: { id: strategyId, revisionId: id, name: `By the lead ${id}`, content: { ...plant.content, ...fresh() } },
      }),
    );
    const submitted = await made(decide('lead', 'submit', { id, version: 1 }));
    const approved = await made(decide('approver', 'approve', { id, version: submitted.version }));
    expect((await made(decide('lead', 'withdraw', { id, version: approved.version }))).body.state).toBe('withdrawn');
  });

  test('the list of reviews holds what waits for a decision, and no longer', async () => {
    const submitted = await makeSubmitted(plant, fresh());
    const engineer = await plant.as('engineer');
    const waiting = async () =>
      (await made(engineer.call(reviewEndpoints.list))).body.items.find(({ latest }) => latest.id === submitted.id);
    expect(await waiting()).toMatchObject({
      submittedBy: { id: plant.userId('engineer') },
      touchedBy: [{ id: plant.userId('engineer') }],
    });
    await made(decide('lead', 'approve', submitted));
    expect(await waiting()).toBeUndefined();
  });
});

async function arrivedAt(state: 'draft' | 'inReview' | 'returned' | 'approved' | 'withdrawn') {
  switch (state) {
    case 'draft':
      return makeDraft(plant, fresh());
    case 'inReview':
      return makeSubmitted(plant, fresh());
    case 'approved':
      return makeApproved(plant, fresh());
    case 'returned': {
      const submitted = await makeSubmitted(plant, fresh());
      return { ...submitted, version: (await made(decide('lead', 'giveBack', submitted))).version };
    }
    case 'withdrawn': {
      const approved = await makeApproved(plant, fresh());
      return { ...approved, version: (await made(decide('lead', 'withdraw', approved))).version };
    }
  }
}

function failed(): never {
  throw new Error('there is no such revision');
}
