import bcrypt from 'bcryptjs';
import { v7 as newId } from 'uuid';
import { gradeEndpoints, machineEndpoints, nozzleEndpoints } from '../../shared/machines.ts';
import { plateEndpoints } from '../../shared/plates.ts';
import type { Role } from '../../shared/policy.ts';
import { revisionEndpoints, strategyEndpoints, type StrategyContent } from '../../shared/strategies.ts';
import { pierceStageDefaults } from '../../strategy/pierce/index.ts';
import { connected } from './database.ts';
import { FOUR_KILOWATT } from './machines.ts';
import { testPassword, type Caller, type TestServer } from './server.ts';

export type TestPerson = 'operator' | 'programmer' | 'engineer' | 'approver' | 'lead';

/** A plant with one person of each kind, one machine, one nozzle, one grade and one plate. */
export type TestPlant = {
  readonly id: string;
  readonly name: string;
  mail(person: TestPerson): string;
  userId(person: TestPerson): string;
  memberId(person: TestPerson): string;
  /** Signs in once a person. */
  as(person: TestPerson): Promise<Caller>;
  readonly machineId: string;
  readonly machineRevisionId: string;
  readonly nozzleId: string;
  readonly gradeId: string;
  readonly plateId: string;
  readonly plateTag: string;
  readonly content: StrategyContent;
};

const people: Readonly<Record<TestPerson, { role: Role; mayApprove: boolean }>> = {
  operator: { role: 'operator', mayApprove: false },
  programmer: { role: 'programmer', mayApprove: false },
  engineer: { role: 'engineer', mayApprove: false },
  approver: { role: 'engineer', mayApprove: true },
  lead: { role: 'lead', mayApprove: true },
};

const hash = bcrypt.hashSync(testPassword, 4);
const stages = pierceStageDefaults(FOUR_KILOWATT, 0.02);

/** Content that the model predicts to be through, for 18 to below 20 mm unless said otherwise. */
export function testContent(
  of: Pick<TestPlant, 'machineRevisionId' | 'nozzleId'>,
  change: Partial<StrategyContent> = {},
): StrategyContent {
  return {
    machineRevisionId: of.machineRevisionId,
    gradeGroup: 'S355',
    gas: 'oxygen',
    nozzleId: of.nozzleId,
    thickness: { min: 18_000, max: 20_000 },
    hottestPlate: 393.15,
    cut: {
      feed: 0.016,
      peakPower: 3600,
      duty: 1,
      pulseFrequency: null,
      oxygenPressure: 0.6e5,
      standoff: 0.001,
      focusPosition: 0.004,
      kerfWidth: 0.0008,
      heatIntoPlate: 6.5e6,
    },
    stages: [...stages],
    cornerRules: {
      treatBelowAngle: 1.75,
      returnExcessLimit: 50,
      loop: { allowed: true, radius: 0.004, minExtension: 0.002, maxExtension: 0.03, clearance: 0.002 },
      dwell: { allowed: true, maxDuration: 12, restart: 2 },
    },
    ...change,
  };
}

/** A plant named so; its people and things are made by them through the API, the plant and its accounts by the owner. */
export async function makePlant(server: TestServer, name: string): Promise<TestPlant> {
  const id = newId();
  const users = new Map<TestPerson, { userId: string; memberId: string }>();
  const mail = (person: TestPerson) => `${person}@${name}.example`;
  await connected(server.database.ownerUrl, async (owner) => {
    await owner.query('begin');
    await owner.query("select set_config('app.plant_id', $1, true)", [id]);
    await owner.query('insert into plants (id, name) values ($1, $2)', [id, name]);
    for (const [person, { role, mayApprove }] of Object.entries(people) as [
      TestPerson,
      (typeof people)[TestPerson],
    ][]) {
      const made = { userId: newId(), memberId: newId() };
      users.set(person, made);
      await owner.query('insert into users (id, mail, name, password_hash) values ($1, $2, $3, $4)', [
        made.userId,
        mail(person),
        `${name} ${person}`,
        hash,
      ]);
      await owner.query(
        'insert into memberships (plant_id, id, user_id, role, may_approve) values ($1, $2, $3, $4, $5)',
        [id, made.memberId, made.userId, role, mayApprove],
      );
    }
    await owner.query('commit');
  });

  const callers = new Map<TestPerson, Promise<Caller>>();
  const as = (person: TestPerson): Promise<Caller> => {
    const known = callers.get(person) ?? server.signIn(mail(person));
    callers.set(person, known);
    return known;
  };
  const engineer = await as('engineer');
  const [machineId, machineRevisionId, nozzleId, gradeId, plateId] = [newId(), newId(), newId(), newId(), newId()];
  const plateTag = 'T-20-1';
  await made(
    engineer.call(machineEndpoints.add, {
      body: { id: machineId, revisionId: machineRevisionId, name: 'Machine one', profile: FOUR_KILOWATT },
    }),
  );
  await made(
    engineer.call(nozzleEndpoints.add, {
      body: { id: nozzleId, name: 'Single 1.5', type: 'single', diameter: 0.0015 },
    }),
  );
  await made(engineer.call(gradeEndpoints.add, { body: { id: gradeId, name: 'S355J2', group: 'S355' } }));
  await made(engineer.call(plateEndpoints.add, { body: { id: plateId, ...testPlate(gradeId), tag: plateTag } }));
  const of = (person: TestPerson) => users.get(person) ?? { userId: '', memberId: '' };
  return {
    id,
    name,
    mail,
    userId: (person) => of(person).userId,
    memberId: (person) => of(person).memberId,
    as,
    machineId,
    machineRevisionId,
    nozzleId,
    gradeId,
    plateId,
    plateTag,
    content: testContent({ machineRevisionId, nozzleId }),
  };
}

export const testPlate = (gradeId: string) => ({
  tag: `T-${newId().slice(-8)}`,
  gradeId,
  heatNumber: '4471',
  nominalThickness: 18_500,
  measuredThickness: null,
  surface: 'mill scale',
  certificate: '',
  length: 3,
  width: 1.5,
});

/** The answer, when it is a good one. */
export async function made<T extends { status: number; problem: object }>(answer: Promise<T>): Promise<T> {
  const got = await answer;
  if (got.status >= 300) throw new Error(`answered ${got.status}: ${JSON.stringify(got.problem)}`);
  return got;
}

export type TestRevision = { readonly strategyId: string; readonly id: string; readonly version: number };

/** A new strategy with its first draft, by the plant's engineer. */
export async function makeDraft(plant: TestPlant, change: Partial<StrategyContent> = {}): Promise<TestRevision> {
  const engineer = await plant.as('engineer');
  const [strategyId, id] = [newId(), newId()];
  await made(
    engineer.call(strategyEndpoints.add, {
      body: {
        id: strategyId,
        revisionId: id,
        name: `Strategy ${strategyId.slice(-8)}`,
        content: { ...plant.content, ...change },
      },
    }),
  );
  return { strategyId, id, version: 1 };
}

/** The same, handed in. */
export async function makeSubmitted(plant: TestPlant, change: Partial<StrategyContent> = {}): Promise<TestRevision> {
  const draft = await makeDraft(plant, change);
  const engineer = await plant.as('engineer');
  const { version } = await made(
    engineer.call(revisionEndpoints.submit, { params: { revisionId: draft.id }, body: {}, version: draft.version }),
  );
  return { ...draft, version };
}

/** The same, approved by the lead. */
export async function makeApproved(plant: TestPlant, change: Partial<StrategyContent> = {}): Promise<TestRevision> {
  const submitted = await makeSubmitted(plant, change);
  const lead = await plant.as('lead');
  const { version } = await made(
    lead.call(revisionEndpoints.approve, {
      params: { revisionId: submitted.id },
      body: {},
      version: submitted.version,
    }),
  );
  return { ...submitted, version };
}
