import { readFileSync, realpathSync } from 'node:fs';
import { fileURLToPath, URL } from 'node:url';
import pg from 'pg';
import { pino } from 'pino';
import { openDatabase } from '../../db/database.ts';
import { demoHouseRules } from '../../db/demo/house-rules.ts';
import { demoRates } from '../../db/demo/rates.ts';
import { demoGrades, demoNozzles, demoPlates } from '../../db/demo/materials.ts';
import { demoMachines } from '../../db/demo/machines.ts';
import { demoLayout } from '../../db/demo/layouts.ts';
import { demoCornerPlans, demoParts } from '../../db/demo/parts.ts';
import { demoId } from '../../db/demo/ids.ts';
import { demoMembers, demoPlants } from '../../db/demo/people.ts';
import { demoStrategies, type DemoStrategy } from '../../db/demo/strategies.ts';
import { requestEndpoints } from '../../shared/cards.ts';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import { houseRuleEndpoints } from '../../shared/house-rules.ts';
import { laidPart, layoutEndpoints, type PlacementWire } from '../../shared/layouts.ts';
import { gradeEndpoints, machineEndpoints, nozzleEndpoints } from '../../shared/machines.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { peopleEndpoints } from '../../shared/people.ts';
import { plateEndpoints } from '../../shared/plates.ts';
import { rateEndpoints } from '../../shared/rates.ts';
import { reportEndpoints } from '../../shared/reports.ts';
import { sessionEndpoints } from '../../shared/sessions.ts';
import { revisionEndpoints, strategyEndpoints } from '../../shared/strategies.ts';
import { placementArray } from '../../strategy/path/plate/index.ts';
import { createApp } from '../app.ts';
import { createPasswords } from '../auth/passwords.ts';
import { createTokens } from '../auth/token.ts';
import { readConfig, type Environment } from '../config.ts';
import { createDrawingReader } from '../drawings/reader.ts';
import { createCutFiles } from '../take-away/cut-files.ts';
import { createFileStore } from '../files/store.ts';
import { createClient, listenPrivately, type Client } from './client.ts';

type Plant = keyof typeof demoPlants;

/**
 * Fills in the two demo plants, once: what is there already stays as people have left it. Only plants and their leads are written by the
 * owner; all else goes through the API as the person whose work it is, so that demo data obeys every rule and stands in the record.
 */
export async function seedDemo(env: Environment): Promise<void> {
  const config = readConfig({ ...env, WEB_FOLDER: '' });
  const ownerUrl = env.DATABASE_OWNER_URL;
  const password = config.demoPassword;
  if (!ownerUrl || !password) throw new Error('Set DATABASE_OWNER_URL and DEMO_PASSWORD to fill in the demo plants.');
  const passwords = createPasswords();
  const drawings = createDrawingReader();
  const cutFiles = createCutFiles();
  const files = createFileStore(config.s3);
  const log = pino({ level: 'warn' });
  const { database, close } = openDatabase(config.databaseUrl, (error) => log.warn({ err: error }, 'connection lost'));
  const app = createApp({
    database,
    files,
    passwords,
    tokens: createTokens(config.sessionSecret),
    drawings,
    cutFiles,
    log,
    now: () => new Date(),
    secure: false,
    webFolder: null,
    demoPassword: null,
    version: 'demo',
    closing: () => false,
    checkAnswers: true,
  });
  const door = await listenPrivately(app);
  try {
    await foundPlants(ownerUrl, await passwords.hash(password));
    // The plate hall last: who works in both is met there, since signing in leads to where one was last.
    for (const plant of ['upland', 'quay'] as const) await fillPlant(plant, door.base, password);
  } finally {
    await door.close();
    await Promise.all([close(), passwords.close(), drawings.close(), cutFiles.close()]);
    files.close();
  }
}

/** What no route can do: plants, and a first lead in each. */
async function foundPlants(ownerUrl: string, passwordHash: string): Promise<void> {
  const owner = new pg.Client({ connectionString: ownerUrl });
  await owner.connect();
  try {
    for (const [key, { id, name }] of Object.entries(demoPlants)) {
      const lead = demoMembers.find((member) => member.plant === key && member.role === 'lead');
      if (!lead) throw new Error(`the demo plant ${key} has no lead`);
      await owner.query('begin');
      await owner.query("select set_config('app.plant_id', $1, true)", [id]);
      await owner.query('insert into plants (id, name) values ($1, $2) on conflict do nothing', [id, name]);
      await owner.query(
        'insert into users (id, mail, name, password_hash) values ($1, $2, $3, $4) on conflict (id) do nothing',
        [demoId(`user ${lead.mail}`), lead.mail, lead.name, passwordHash],
      );
      await owner.query(
        `insert into memberships (plant_id, id, user_id, role, may_approve) values ($1, $2, $3, $4, $5) on conflict do nothing`,
        [id, demoId(`member ${key} ${lead.mail}`), demoId(`user ${lead.mail}`), lead.role, lead.mayApprove],
      );
      await owner.query('commit');
    }
  } finally {
    await owner.end();
  }
}

/** People of a plant by the part they play in filling it in, signed in when first needed. */
function cast(base: string, password: string, plant: Plant) {
  const signedIn = new Map<string, Promise<Client>>();
  return (mail: string): Promise<Client> => {
    const known = signedIn.get(mail);
    if (known) return known;
    const made = (async () => {
      const client = createClient(base);
      const session = await client.call(sessionEndpoints.signIn, { body: { mail, password } });
      const { id } = demoPlants[plant];
      if (session?.plant.id !== id) await client.call(sessionEndpoints.choosePlant, { body: { plantId: id } });
      return client;
    })();
    signedIn.set(mail, made);
    return made;
  };
}

type Cast = ReturnType<typeof cast>;

async function fillPlant(plant: Plant, base: string, password: string): Promise<void> {
  const as = cast(base, password, plant);
  const lead = await as(`lead@${plant}.example`);
  const there = await lead.call(peopleEndpoints.list);
  for (const member of demoMembers.filter((one) => one.plant === plant)) {
    if (there?.items.some(({ mail }) => mail === member.mail)) continue;
    const { mail, name, role, mayApprove } = member;
    const id = demoId(`member ${plant} ${mail}`);
    await lead.call(peopleEndpoints.add, { body: { id, mail, name, role, mayApprove, password } });
  }
  // Before the strategies: what is handed in is judged by them.
  const rules = (await lead.call(houseRuleEndpoints.list))?.items ?? [];
  for (const rule of demoHouseRules[plant]) {
    const known = rules.some(
      ({ id, expression, endedAt }) => id === rule.id || (endedAt === null && expression === rule.expression),
    );
    if (!known) await lead.call(houseRuleEndpoints.add, { body: rule });
  }
  const paid = await lead.call(rateEndpoints.get);
  const rates = demoRates[plant];
  // Somebody who tries the demo may have written others: those stay.
  if (rates && paid?.version === 1) await lead.call(rateEndpoints.change, { body: rates, version: paid.version });
  const engineer = await as('engineer@quay.example');
  await addMaterials(engineer, plant);
  for (const { id, revisionId, name, profile, note } of demoMachines[plant]) {
    if (await engineer.find(machineEndpoints.get, { machineId: id })) continue;
    await engineer.call(machineEndpoints.add, { body: { id, revisionId, name, profile, note } });
  }
  for (const strategy of demoStrategies()[plant]) await addStrategy(strategy, engineer, as, plant);
  if (plant === 'quay') await addWork(as);
}

async function addMaterials(engineer: Client, plant: Plant): Promise<void> {
  const grades = (await engineer.call(gradeEndpoints.list))?.items ?? [];
  for (const grade of demoGrades(plant)) {
    if (!grades.some(({ name }) => name === grade.name)) await engineer.call(gradeEndpoints.add, { body: grade });
  }
  const nozzles = (await engineer.call(nozzleEndpoints.list))?.items ?? [];
  for (const nozzle of demoNozzles(plant)) {
    if (!nozzles.some(({ name }) => name === nozzle.name)) await engineer.call(nozzleEndpoints.add, { body: nozzle });
  }
  for (const plate of demoPlates[plant]) {
    if (await engineer.find(plateEndpoints.get, { plateId: plate.id })) continue;
    await engineer.call(plateEndpoints.add, { body: plate });
  }
}

async function addStrategy(strategy: DemoStrategy, engineer: Client, as: Cast, plant: Plant): Promise<void> {
  for (const [index, { id, content, fate }] of strategy.revisions.entries()) {
    let revision = await engineer.find(revisionEndpoints.get, { revisionId: id });
    if (!revision && index === 0) {
      await engineer.call(strategyEndpoints.add, {
        body: { id: strategy.id, revisionId: id, name: strategy.name, content },
      });
    } else if (!revision) {
      const params = { strategyId: strategy.id };
      const whole = await engineer.call(strategyEndpoints.get, { params });
      const fromRevisionId = strategy.revisions[index - 1]?.id ?? '';
      // Somebody went on with the strategy in another way: leave it to them.
      if (!whole || whole.revisions[0]?.id !== fromRevisionId) return;
      await engineer.call(strategyEndpoints.draft, { params, body: { id, fromRevisionId }, version: whole.version });
      const params2 = { revisionId: id };
      const draft = await engineer.call(revisionEndpoints.get, { params: params2 });
      await engineer.call(revisionEndpoints.save, { params: params2, body: { content }, version: draft?.version ?? 0 });
    }
    revision = await engineer.call(revisionEndpoints.get, { params: { revisionId: id } });
    if (revision?.state === 'draft' && fate.submit !== undefined) {
      revision = await engineer.call(revisionEndpoints.submit, {
        params: { revisionId: id },
        body: { words: fate.submit },
        version: revision.version,
      });
    }
    const decision = fate.approve ?? fate.giveBack;
    if (revision?.state !== 'inReview' || !decision) continue;
    const decider = await as(decision.by === 'lead' ? `lead@${plant}.example` : 'approver@quay.example');
    await decider.call(fate.approve ? revisionEndpoints.approve : revisionEndpoints.giveBack, {
      params: { revisionId: id },
      body: { words: decision.words },
      version: revision.version,
    });
  }
}

/** Parts with their corner plans, a report of something that went wrong, and a plate without a strategy. */
async function addWork(as: Cast): Promise<void> {
  const programmer = await as('programmer@quay.example');
  for (const { id, name, file } of Object.values(demoParts)) {
    if (await programmer.find(partEndpoints.get, { partId: id })) continue;
    const bytes = readFileSync(new URL(`../../db/demo/drawings/${file}`, import.meta.url));
    await programmer.call(partEndpoints.add, { body: { id, name, answers: {} }, file: { name: file, bytes } });
  }
  for (const { id, partId, revisionId, thickness, plateTemperature, skeleton: free } of demoCornerPlans()) {
    if (await programmer.find(cornerPlanEndpoints.get, { planId: id })) continue;
    const skeleton = { left: free, right: free, below: free, above: free };
    await programmer.call(cornerPlanEndpoints.add, {
      body: { id, partId, revisionId, thickness, plateTemperature, skeleton, overrides: {} },
    });
  }
  await addLayout(programmer);

  const operator = await as('operator@quay.example');
  const engineer = await as('engineer@quay.example');
  const [one, two] = demoMachines.quay;
  const [, , , rusty] = demoPlates.quay;
  const approved = demoStrategies().quay[0]?.revisions[0];
  const reportId = demoId('quay report 1');
  if (approved && rusty && !(await engineer.find(reportEndpoints.get, { reportId }))) {
    await operator.call(reportEndpoints.add, {
      body: {
        id: reportId,
        revisionId: approved.id,
        machineId: one.id,
        plateId: rusty.id,
        kind: 'erupted',
        words: 'Third pierce threw up, spatter on the nozzle. Plate is rusty and thicker than it says.',
        thickness: rusty.measuredThickness,
      },
    });
  }
  const requestId = demoId('quay request 1');
  const asked = (await engineer.call(requestEndpoints.list))?.items ?? [];
  const thick = demoPlates.quay.at(-1);
  if (thick && !asked.some(({ id }) => id === requestId)) {
    await operator.call(requestEndpoints.add, {
      body: {
        id: requestId,
        machineId: two.id,
        gradeGroup: 'S355',
        thickness: thick.nominalThickness,
        plateId: thick.id,
        words: 'Six bollard bases for the north quay, wanted by Friday.',
      },
    });
  }
}

/** A plate layout of the parts above, and its corners planned. */
async function addLayout(programmer: Client): Promise<void> {
  const { id, name, plateId, kerfWidth, clearance, edgeMargin, arrays, plan } = demoLayout();
  if (!(await programmer.find(layoutEndpoints.get, { layoutId: id }))) {
    const placements: PlacementWire[] = [];
    for (const { partId, array } of arrays) {
      const part = await programmer.call(partEndpoints.get, { params: { partId } });
      if (!part) throw new Error(`the demo part ${partId} is not there`);
      const laid = laidPart({ id: part.id, name: part.name, contours: part.reading.contours });
      placements.push(...placementArray(laid, array, placements.length + 1));
    }
    const plate = { kind: 'plate' as const, plateId };
    await programmer.call(layoutEndpoints.add, {
      body: { id, name, plate, kerfWidth, clearance, edgeMargin, placements, order: null },
    });
  }
  if (await programmer.find(cornerPlanEndpoints.get, { planId: plan.id })) return;
  const skeleton = { left: 0, right: 0, below: 0, above: 0 };
  await programmer.call(cornerPlanEndpoints.add, {
    body: { ...plan, layoutId: id, plateTemperature: 313.15, skeleton, overrides: {} },
  });
}

// Run as a program?
if (process.argv[1] && realpathSync(process.argv[1]) === fileURLToPath(import.meta.url)) {
  try {
    await seedDemo(process.env);
    console.log('The demo plants are filled in.');
  } catch (error) {
    console.error(error instanceof Error ? (error.stack ?? error.message) : error);
    process.exit(1);
  }
}
