import path from 'node:path';
import pg from 'pg';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { startDemoStack, type DemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';

const drawings = path.resolve(import.meta.dirname, '../support/drawings');

describe('what somebody typed', () => {
  let stack: DemoStack;
  let browser: Browser;
  let database: pg.Client;

  beforeAll(async () => {
    const cluster = await startCluster({ kind: 'test' });
    stack = await startDemoStack({ cluster, database: `keeps_${process.pid}` });
    browser = await launchBrowser();
    database = new pg.Client({ connectionString: stack.superUrl });
    await database.connect();
  });
  afterAll(async () => {
    await database?.end();
    await browser?.close();
    await stack?.stop();
  });

  it('is still in a draft when the connection is lost while saving, and saved once it is back', async () => {
    const { page, context } = await signIn('engineer@quay.example');
    const revisionId = await openDraft(page);
    const field = duration(page);
    await field.fill('1.37');
    await context.setOffline(true);
    await save(page).click();
    await page.getByText('No connection').waitFor();
    expect(await field.inputValue()).toBe('1.37');
    expect(await firstDuration(revisionId)).not.toBe(1.37);
    await context.setOffline(false);
    await page.getByRole('button', { name: 'Try again' }).click();
    await page.getByText('Saved.', { exact: true }).first().waitFor();
    expect(await firstDuration(revisionId)).toBe(1.37);
    await context.close();
  });

  it('is still in a report, picture and all, when the connection is lost, and arrives once', async () => {
    const { page, context } = await signIn('operator@quay.example');
    const { rows } = await rowsOf(
      `select a.revision_id, a.machine_id from approvals a join plants p on p.id = a.plant_id
       where a.ended_at is null and p.name like 'Quay%' limit 1`,
    );
    await page.goto(`/report?revision=${String(rows[0]?.revision_id)}&machine=${String(rows[0]?.machine_id)}`);
    const words = `Not through at the third hole, ${process.pid}.`;
    await page.getByLabel('It was not through').check();
    await page.getByLabel('In your words').fill(words);
    const photo = await sharp({ create: { width: 600, height: 400, channels: 3, background: '#703828' } })
      .png()
      .toBuffer();
    await page.getByLabel('Picture').setInputFiles({ name: 'hole.png', mimeType: 'image/png', buffer: photo });
    await context.setOffline(true);
    await page.getByRole('button', { name: 'Tell the engineers' }).click();
    await page.getByText('No connection').waitFor();
    expect(await page.getByLabel('In your words').inputValue()).toBe(words);
    expect(await page.getByLabel('It was not through').isChecked()).toBe(true);
    await page.getByText('hole.png').waitFor();
    await context.setOffline(false);
    await page.getByRole('button', { name: 'Tell the engineers' }).click();
    await page.getByText('The engineers have your report').waitFor();
    const reports = await rowsOf('select photo_file_id is not null as pictured from reports where words = $1', [words]);
    expect(reports.rows).toEqual([{ pictured: true }]);
    await context.close();
  });

  it('is still below the sign-in that a session’s end puts over the page, and can be saved after it', async () => {
    const { page, context } = await signIn('engineer@quay.example');
    const revisionId = await openDraft(page);
    const field = duration(page);
    await rowsOf(`update sessions set revoked_at = now() where revoked_at is null`);
    // The house rules are asked of the new number as soon as the typing pauses: that request hears of it first.
    await field.fill('1.41');
    await signInAgain(page);
    expect(await field.inputValue()).toBe('1.41');
    await save(page).click();
    await page.getByText('Saved.', { exact: true }).first().waitFor();
    expect(await firstDuration(revisionId)).toBe(1.41);
    await context.close();
  });

  it('is still in a form when the sign-in’s cookie is gone', async () => {
    const { page, context } = await signIn('programmer@quay.example');
    await page.goto('/plates/new');
    await page.getByLabel('Tag', { exact: true }).fill('KEPT-1');
    await page.getByLabel('Grade', { exact: true }).selectOption({ label: 'S275JR' });
    await page.getByLabel('Nominal thickness').fill('3/4 in');
    await context.clearCookies();
    await page.getByRole('button', { name: 'Book it in' }).click();
    await signInAgain(page);
    expect(await page.getByLabel('Tag', { exact: true }).inputValue()).toBe('KEPT-1');
    expect(await page.getByLabel('Nominal thickness').inputValue()).toBe('3/4 in');
    await page.getByRole('button', { name: 'Book it in' }).click();
    await page.waitForURL(/\/plates\/[0-9a-f-]{36}$/);
    const plates = await rowsOf('select nominal_thickness from plates where tag = $1', ['KEPT-1']);
    expect(plates.rows).toEqual([{ nominal_thickness: 19050 }]);
    await context.close();
  });

  it('is still there when somebody else saved the draft first, and goes in only when that is meant', async () => {
    const mine = await signIn('engineer@quay.example');
    const theirs = await signIn('approver@quay.example');
    const revisionId = await openDraft(mine.page);
    await theirs.page.goto(`/revisions/${revisionId}`);
    await duration(theirs.page).fill('1.52');
    await duration(mine.page).fill('1.63');
    await save(theirs.page).click();
    await theirs.page.getByText('Saved.', { exact: true }).first().waitFor();
    await save(mine.page).click();
    await mine.page.getByText('Somebody changed this draft meanwhile').waitFor();
    expect(await duration(mine.page).inputValue()).toBe('1.63');
    expect(await firstDuration(revisionId)).toBe(1.52);
    await mine.page.getByRole('button', { name: 'Save mine over theirs' }).click();
    await mine.page.getByText('Saved.', { exact: true }).first().waitFor();
    expect(await firstDuration(revisionId)).toBe(1.63);
    await mine.context.close();
    await theirs.context.close();
  });

  it('stays beside a sentence with the range when it is out of it', async () => {
    const { page, context } = await signIn('engineer@quay.example');
    await page.goto('/plates/new');
    const thickness = page.getByLabel('Nominal thickness');
    await thickness.fill('500');
    await page.getByRole('button', { name: 'Book it in' }).click();
    await expect.poll(() => describedBy(thickness)).toContain('1 to 60 mm');
    expect(await thickness.inputValue()).toBe('500');
    await openDraft(page);
    const pressure = page.getByRole('textbox', { name: /^Oxygen .*stage 1/ }).first();
    await pressure.fill('900');
    await expect.poll(() => describedBy(pressure)).toMatch(/\d.* to .*bar/);
    expect(await pressure.inputValue()).toBe('900');
    expect(await save(page).isDisabled()).toBe(true);
    await context.close();
  });

  it('stays chosen when a drawing is refused, with a sentence that says why, and nothing is stored', async () => {
    const { page, context } = await signIn('programmer@quay.example');
    await page.goto('/parts/new');
    const before = await stored();
    const large = { name: 'large.dxf', mimeType: 'image/vnd.dxf', buffer: Buffer.alloc(11 * 1024 * 1024, '0\n') };
    const picture = {
      name: 'picture.svg',
      mimeType: 'image/svg+xml',
      buffer: Buffer.from('\x89PNG\r\n\x1a\n', 'latin1'),
    };
    const refused: readonly [name: string, file: string | typeof large, sentence: RegExp][] = [
      ['empty.dxf', path.join(drawings, 'empty.dxf'), /empty/i],
      ['not-a-drawing.dxf', path.join(drawings, 'not-a-drawing.dxf'), /neither a DXF/],
      ['picture.svg', picture, /picture of pixels/],
      ['decimal-comma.dxf', path.join(drawings, 'decimal-comma.dxf'), /comma/i],
      ['open-lines.dxf', path.join(drawings, 'open-lines.dxf'), /no closed contour/],
      ['large.dxf', large, /at most 10 MiB/],
    ];
    for (const [name, file, sentence] of refused) {
      await page.getByLabel('Drawing', { exact: true }).setInputFiles(file);
      await page.getByRole('main').getByText(sentence).first().waitFor();
      expect(await page.getByRole('main').innerText()).toContain(name);
      expect(await page.getByRole('button', { name: 'Keep as a part' }).count()).toBe(0);
    }
    // A gap is a question, not a refusal: but until it is answered there is nothing to keep.
    await page.getByLabel('Drawing', { exact: true }).setInputFiles(path.join(drawings, 'bracket-not-closed.dxf'));
    await page.getByRole('button', { name: 'Keep as a part' }).click();
    await page.getByText('Nothing in this drawing closes yet').waitFor();
    expect(await page.getByRole('main').innerText()).toContain('bracket-not-closed.dxf');
    expect(await stored()).toEqual(before);
    await page.getByRole('radio', { name: 'Close gaps of up to 0.05 mm' }).check();
    await page
      .getByText('1 outline')
      .or(page.getByRole('img', { name: /1 outline/ }))
      .first()
      .waitFor();
    await page.getByRole('button', { name: 'Keep as a part' }).click();
    await page.waitForURL(/\/parts\/[0-9a-f-]{36}$/);
    await context.close();
  });

  const rowsOf = (text: string, values: unknown[] = []) => database.query<Record<string, unknown>>(text, values);

  async function stored() {
    const { rows } = await rowsOf(
      'select (select count(*) from parts) as parts, (select count(*) from files) as files',
    );
    return rows[0];
  }

  async function firstDuration(revisionId: string): Promise<unknown> {
    const { rows } = await rowsOf(
      `select content -> 'stages' -> 0 ->> 'duration' as duration from strategy_revisions where id = $1`,
      [revisionId],
    );
    return Number(rows[0]?.duration);
  }

  /** Opens the demo's draft for plates of 12 to 16 mm; its id. */
  async function openDraft(page: Page): Promise<string> {
    const { rows } = await rowsOf(
      `select r.id from strategy_revisions r join strategies s on s.id = r.strategy_id
       where r.state = 'draft' and s.name like 'Bollard%' limit 1`,
    );
    const id = String(rows[0]?.id);
    await page.goto(`/revisions/${id}`);
    await page.getByText('The pierce, stage by stage').waitFor();
    return id;
  }

  async function signIn(mail: string): Promise<{ page: Page; context: BrowserContext }> {
    const context = await browser.newContext({ viewport: { width: 390, height: 844 }, baseURL: stack.address });
    const page = await context.newPage();
    page.setDefaultTimeout(20_000);
    await page.goto('/sign-in');
    await page.getByLabel('Mail address').fill(mail);
    await page.getByLabel('Password', { exact: true }).fill(stack.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL((url) => url.pathname !== '/sign-in');
    return { page, context };
  }

  /** The sign-in asked for over the page: the address is known, the password is asked. */
  async function signInAgain(page: Page) {
    const dialog = page.getByRole('dialog', { name: 'Your sign-in has ended' });
    await dialog.waitFor();
    await dialog.getByLabel('Password', { exact: true }).fill(stack.password);
    await dialog.getByRole('button', { name: 'Sign in' }).click();
    await dialog.waitFor({ state: 'hidden' });
  }
});

/** The number in the stage's sentence; the drawing has a handle for it too. */
const duration = (page: Page) => page.getByRole('textbox', { name: 'Duration of stage 1' });

const save = (page: Page) => page.getByRole('button', { name: 'Save', exact: true });

/** What a reader is told about a field beside its name. */
const describedBy = (field: ReturnType<Page['getByLabel']>): Promise<string> =>
  field.evaluate((input) =>
    (input.getAttribute('aria-describedby') ?? '')
      .split(' ')
      .map((id) => document.getElementById(id)?.textContent ?? '')
      .join(' '),
  );
