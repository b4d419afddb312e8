import { existsSync } from 'node:fs';
import path from 'node:path';
import pg from 'pg';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { startDemoStack, type DemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';

const root = path.resolve(import.meta.dirname, '../..');
const sizes = { phone: { width: 390, height: 844 }, wide: { width: 1440, height: 900 } } as const;
type Size = keyof typeof sizes;

type Chain = {
  readonly drawing: string;
  readonly part: string;
  readonly tag: string;
  /** mm, as people type them. */
  readonly from: string;
  readonly to: string;
  readonly nominal: string;
  readonly screens: Readonly<Record<'engineer' | 'programmer' | 'lead' | 'operator', Size>>;
};

const own: Chain = {
  drawing: path.join(root, 'db/demo/drawings/lifting-lug.dxf'),
  part: 'Lug for the north quay',
  tag: 'CH-2001',
  from: '18',
  to: '22',
  nominal: '20',
  screens: { engineer: 'wide', programmer: 'wide', lead: 'phone', operator: 'phone' },
};
const others: Chain = {
  drawing: path.join(root, '../shared/drawings/S08_vane.dxf'),
  part: 'A real drawing',
  tag: 'CH-2401',
  from: '22',
  to: '26',
  nominal: '24 mm',
  screens: { engineer: 'phone', programmer: 'phone', lead: 'wide', operator: 'wide' },
};

describe('the whole chain, walked by four people', () => {
  let stack: DemoStack;
  let browser: Browser;
  let database: pg.Client;

  beforeAll(async () => {
    const cluster = await startCluster({ kind: 'test' });
    stack = await startDemoStack({ cluster, database: `chain_${process.pid}` });
    browser = await launchBrowser();
    database = new pg.Client({ connectionString: stack.superUrl });
    await database.connect();
  });
  afterAll(async () => {
    await database?.end();
    await browser?.close();
    await stack?.stop();
  });

  it('runs from a drawing of our own and a plate in hand to a card and back, at the desk and on the phone', () =>
    walk(own));

  it.skipIf(!existsSync(others.drawing))('runs the same on a drawing by somebody else, with the screens swapped', () =>
    walk(others),
  );

  async function walk(chain: Chain) {
    const strategy = `Chain ${chain.tag}`;
    const words = `The tip of corner two burnt on ${chain.tag}.`;

    // An engineer designs.
    const engineer = await signIn('engineer', chain.screens.engineer);
    await engineer.page.goto('/strategies/new');
    await engineer.page.getByLabel('Machine and its revision').selectOption({ label: 'No. 2, 10 kW, revision 1' });
    await choose(engineer.page, 'Grade group', 'S275');
    await engineer.page.getByLabel('Thinnest plate').fill(chain.from);
    await engineer.page.getByLabel('Thickness the range ends before').fill(chain.to);
    await engineer.page.getByLabel('Hottest plate').fill('120');
    await engineer.page.getByLabel('Nozzle', { exact: true }).selectOption({ index: 1 });
    await engineer.page.getByLabel('Name', { exact: true }).fill(strategy);
    await engineer.page.getByRole('button', { name: 'Begin the draft' }).click();
    await engineer.page.waitForURL('**/revisions/*');
    await engineer.page.getByText('The pierce, stage by stage').waitFor();
    const last = engineer.page.getByRole('textbox', { name: /^Duration of stage \d/ }).last();
    const duration = Number.parseFloat((await last.inputValue()).replace(',', '.'));
    expect(duration).toBeGreaterThan(1);
    await last.fill('not a number');
    await last.blur();
    await expect.poll(() => engineer.page.getByRole('button', { name: 'Save', exact: true }).isDisabled()).toBe(true);
    expect(await last.inputValue()).toBe('not a number');
    await last.fill(String(duration + 1));
    await last.blur();
    await engineer.page.getByRole('button', { name: 'Save', exact: true }).click();
    await engineer.page.getByText('Saved.', { exact: true }).first().waitFor();
    await engineer.page.getByRole('button', { name: 'Submit for review' }).first().click();
    const submit = engineer.page.getByRole('dialog');
    await submit.getByLabel('What the reviewer should know').fill('Ten test pierces, all through.');
    await submit.getByRole('button', { name: 'Submit for review' }).click();
    await engineer.page.getByText('In review', { exact: false }).first().waitFor();
    const revisionUrl = new URL(engineer.page.url()).pathname;
    // Nobody decides what they wrote.
    expect(await engineer.page.getByRole('button', { name: 'Approve' }).count()).toBe(0);

    // A programmer reads a drawing, plans its corners and books the plate in.
    const programmer = await signIn('programmer', chain.screens.programmer);
    await programmer.page.goto('/parts/new');
    await programmer.page.getByLabel('Drawing', { exact: true }).setInputFiles(chain.drawing);
    await programmer.page.getByLabel('Name of the part').fill(chain.part);
    await programmer.page.getByRole('button', { name: 'Keep as a part' }).click();
    await programmer.page.waitForURL(/\/parts\/[0-9a-f-]{36}$/);
    await programmer.page
      .getByLabel('Strategy revision')
      .selectOption({ label: `${strategy}, revision 1 (in review)` });
    await programmer.page.getByLabel('Thickness', { exact: true }).fill(chain.nominal);
    for (const side of ['Left', 'Right', 'Below', 'Above'])
      await programmer.page.getByLabel(side, { exact: true }).fill('40');
    await programmer.page.getByRole('button', { name: 'Plan the corners' }).click();
    await programmer.page.waitForURL(/\/corner-plans\//);
    await programmer.page.getByText('hottest untreated').first().waitFor();
    await programmer.page.goto('/plates/new');
    await programmer.page.getByLabel('Tag', { exact: true }).fill(chain.tag);
    await programmer.page.getByLabel('Grade', { exact: true }).selectOption({ label: 'S275JR' });
    await programmer.page.getByLabel('Nominal thickness').fill(chain.nominal);
    await programmer.page.getByRole('button', { name: 'Book it in' }).click();
    await programmer.page.waitForURL(/\/plates\/[0-9a-f-]{36}$/);

    // Before anybody approved, the operator is told so, and shown nothing near it.
    const operator = await signIn('operator', chain.screens.operator);
    await askFor(operator.page, chain.tag);
    await operator.page.getByText('No approved strategy').first().waitFor();

    // The lead approves what was seen.
    const lead = await signIn('lead', chain.screens.lead);
    await lead.page.goto('/reviews');
    await lead.page
      .getByRole('link', { name: new RegExp(strategy) })
      .first()
      .click();
    await lead.page.waitForURL(`**${revisionUrl}`);
    await lead.page.getByRole('button', { name: 'Approve' }).click();
    await lead.page.getByRole('dialog').getByLabel('Words for the record').fill('Seen at the machine.');
    await lead.page.getByRole('dialog').getByRole('button', { name: 'Approve' }).click();
    await lead.page.getByText('Approved by Quay lead').waitFor();

    // The operator finds it, in the numbers of this machine's dial: 5 mm above the plate is typed as −2.27 (slope −2.2).
    await askFor(operator.page, chain.tag);
    await operator.page.getByText('Approved, revision 1').waitFor();
    await operator.page.getByText('Before you start').waitFor();
    const card = await operator.page.getByRole('main').innerText();
    expect(card.indexOf('Before you start')).toBeLessThan(card.indexOf('Stage 1'));
    expect(card).toMatch(/−\d\.\d/);
    expect(card).toContain(chain.part);
    await operator.page.getByLabel('Protective window checked this shift').check();
    await operator.page.getByRole('link', { name: 'It went wrong' }).click();
    await operator.page.getByLabel('A corner burnt').check();
    await operator.page.getByLabel('In your words').fill(words);
    const photo = await sharp({ create: { width: 2400, height: 1200, channels: 3, background: '#803010' } })
      .withExif({ IFD0: { Make: 'A phone' } })
      .jpeg()
      .toBuffer();
    await operator.page
      .getByLabel('Picture')
      .setInputFiles({ name: 'corner.jpg', mimeType: 'image/jpeg', buffer: photo });
    await operator.page.getByRole('button', { name: 'Tell the engineers' }).click();
    await operator.page.getByText('The engineers have your report').waitFor();

    // The engineer and the lead see it, picture and all.
    for (const { page } of [engineer, lead]) {
      await page.goto('/reports');
      await page
        .getByRole('link', { name: new RegExp(chain.tag) })
        .first()
        .click();
      await page.getByText(words).waitFor();
      await expect
        .poll(() => page.evaluate(() => Array.from(document.images).some((image) => image.naturalWidth === 1600)))
        .toBe(true);
    }

    await checkDatabase(chain, strategy, words);
    for (const person of [engineer, programmer, lead, operator]) {
      expect(person.noise).toEqual([]);
      await person.context.close();
    }
  }

  /** What PostgreSQL holds at the end. */
  async function checkDatabase(chain: Chain, strategy: string, words: string) {
    const one = async (text: string, values: unknown[]) =>
      (await database.query<Record<string, unknown>>(text, values)).rows;
    const revisions = await one(
      `select r.state, r.number, r.thickness_min, r.thickness_max, r.model_version, a.ended_at, u.name as approved_by
       from strategy_revisions r join strategies s on s.id = r.strategy_id
       join approvals a on a.revision_id = r.id join users u on u.id = a.approved_by where s.name = $1`,
      [strategy],
    );
    expect(revisions).toMatchObject([
      {
        state: 'approved',
        number: 1,
        thickness_min: Number.parseFloat(chain.from) * 1000,
        thickness_max: Number.parseFloat(chain.to) * 1000,
        approved_by: 'Quay lead',
        ended_at: null,
      },
    ]);
    const plans = await one(
      `select p.name, c.id from corner_plans c join parts p on p.id = c.part_id where p.name = $1`,
      [chain.part],
    );
    expect(plans).toHaveLength(1);
    const reports = await one(
      `select r.words, r.photo_file_id is not null as pictured from reports r where r.words = $1`,
      [words],
    );
    expect(reports).toEqual([{ words, pictured: true }]);
    const events = await one(
      `select e.event from record e where e.subject_id in (
         select r.id::text from strategy_revisions r join strategies s on s.id = r.strategy_id where s.name = $1
       ) order by e.sequence`,
      [strategy],
    );
    expect(events.map(({ event }) => event)).toEqual(
      expect.arrayContaining(['revision.submitted', 'revision.approved']),
    );
  }

  async function signIn(role: string, size: Size): Promise<{ page: Page; context: BrowserContext; noise: string[] }> {
    const context = await browser.newContext({
      viewport: sizes[size],
      baseURL: stack.address,
      hasTouch: size === 'phone',
    });
    const page = await context.newPage();
    page.setDefaultTimeout(20_000);
    const noise: string[] = [];
    page.on('pageerror', (error) => noise.push(error.message));
    await page.goto('/sign-in');
    await page.getByLabel('Mail address').fill(`${role}@quay.example`);
    await page.getByLabel('Password', { exact: true }).fill(stack.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL((url) => url.pathname !== '/sign-in');
    return { page, context, noise };
  }

  async function askFor(page: Page, tag: string) {
    await page.goto('/at-the-machine');
    const machine = page.getByRole('button', { name: 'No. 2, 10 kW' });
    const field = page.getByRole('textbox', { name: 'Plate tag' });
    await machine.or(field).first().waitFor();
    if (await machine.isVisible()) await machine.click();
    await field.fill(tag);
    await page.getByRole('button', { name: 'Show the card' }).click();
  }
});

async function choose(page: Page, label: string, option: string) {
  await page.getByRole('group', { name: label }).getByRole('radio', { name: option, exact: true }).check();
}
