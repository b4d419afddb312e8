import { afterAll, beforeAll, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { peopleEndpoints } from '../../shared/people.ts';
import { made, makePlant, type TestPlant } from '../support/plant.ts';
import { startTestServer, testPassword, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'people');
});
afterAll(() => server.close());

const person = (change: object = {}) => ({
  id: newId(),
  name: 'New colleague',
  mail: `${newId()}@people.example`,
  role: 'programmer',
  password: 'ten characters and more',
  ...change,
});

test('a person who was added can sign in with the password handed over', async () => {
  const lead = await plant.as('lead');
  const body = person({ mail: 'Mixed.Case@People.example' });
  const added = await made(lead.call(peopleEndpoints.add, { body }));
  expect(added.body).toMatchObject({
    mail: 'mixed.case@people.example',
    role: 'programmer',
    mayApprove: false,
    endedAt: null,
  });
  expect(JSON.stringify(added.body)).not.toContain(body.password);
  await server.signIn('mixed.case@people.example', body.password);
});

test('somebody with an account keeps their own name and password', async () => {
  const other = await makePlant(server, 'elsewhere');
  const lead = await plant.as('lead');
  const added = await made(
    lead.call(peopleEndpoints.add, { body: person({ mail: other.mail('engineer'), name: 'Another name' }) }),
  );
  expect(added.body.name).toBe('elsewhere engineer');
  await server.signIn(other.mail('engineer'), testPassword);
  await expect(server.signIn(other.mail('engineer'), 'ten characters and more')).rejects.toThrow('could not sign in');
});

test('nobody is added twice', async () => {
  const lead = await plant.as('lead');
  const answer = await lead.call(peopleEndpoints.add, { body: person({ mail: plant.mail('operator') }) });
  expect(answer.status).toBe(409);
  expect(answer.problem.code).toBe('already-there');
});

test('a password is ten characters at least and 72 bytes at most, as bcrypt reads no more', async () => {
  const lead = await plant.as('lead');
  for (const password of ['nine char', 'ü'.repeat(37)]) {
    const answer = await lead.call(peopleEndpoints.add, { body: person({ password }) });
    expect(answer.problem.errors?.map(({ pointer }) => pointer)).toEqual(['/password']);
  }
});

test('a plant keeps a lead, even when two end each other at once', async () => {
  const small = await makePlant(server, 'small');
  const lead = await small.as('lead');
  const params = { memberId: small.memberId('lead') };
  for (const body of [{ role: 'engineer' }, { ended: true }]) {
    const answer = await lead.call(peopleEndpoints.change, { params, body, version: 1 });
    expect(answer.problem).toMatchObject({
      code: 'wrong-state',
      detail: expect.stringContaining('without a lead') as string,
    });
  }
  const second = { memberId: small.memberId('approver') };
  await made(lead.call(peopleEndpoints.change, { params: second, body: { role: 'lead' }, version: 1 }));
  const approver = await small.as('approver');
  const answers = await Promise.all([
    lead.call(peopleEndpoints.change, { params: second, body: { ended: true }, version: 2 }),
    approver.call(peopleEndpoints.change, { params, body: { ended: true }, version: 1 }),
  ]);
  expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
});
