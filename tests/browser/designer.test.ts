import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Browser, Locator, Page } from 'playwright-core';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { startDemoStack, type DemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';
import type { ProposeAsked, ProposeSaid } from '../../components/pierce/propose.worker.ts';
import { machineEndpoints } from '../../shared/machines.ts';
import { strategyPrediction, type PierceProposal } from '../../strategy/pierce/index.ts';
import { NOZZLE_1_5 } from '../support/machines.ts';

describe('the pierce designer on a phone', () => {
  let stack: DemoStack;
  let browser: Browser;

  beforeAll(async () => {
    const cluster = await startCluster({ kind: 'test' });
    stack = await startDemoStack({ cluster, database: `designer_${process.pid}` });
    browser = await launchBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await stack?.stop();
  });

  it('leads from a new strategy for 20 mm S355 to a proposed, dragged, checked and saved pierce', async () => {
    const { page, noise } = await signIn();

    await beginStrategy(page, { name: 'Designed on a phone', from: '19.5', to: '20.5' });

    // The draft is a proposal already: the shortest pierce that keeps the plant's rules.
    await page.getByText(/^All \d+ checks are in order\.$/).waitFor();

    // More reserve is wished for. The designer proposes in a worker; it is drawn behind the draft before it is taken.
    await page.getByRole('button', { name: 'Propose', exact: true }).click();
    await page.getByLabel('Reserve on a cold plate, at least').fill('2.6');
    await page.getByRole('button', { name: 'Work it out' }).click();
    await page.getByText(/^Proposed: \d stages over/).waitFor();
    await page.getByTestId('section-ghost').waitFor();
    const before = await sectionWords(page);
    await page.getByRole('button', { name: 'Accept the proposal' }).click();
    await expect.poll(() => sectionWords(page)).not.toBe(before);

    // A finger takes a knot higher without the page scrolling under it.
    const knot = page.getByRole('slider', { name: 'Power where stage 1 meets stage 2' });
    const proposed = await peakOf(knot);
    const predicted = await sectionWords(page);
    await knot.evaluate((element) => element.scrollIntoView({ block: 'center' }));
    const scrolled = await page.evaluate(() => window.scrollY);
    await dragByTouch(page, knot, -24);
    const dragged = await peakOf(knot);
    expect(dragged).toBeGreaterThan(proposed);
    expect(dragged % 100).toBe(0);
    expect(await page.evaluate(() => window.scrollY)).toBe(scrolled);
    expect(await sectionWords(page)).not.toBe(predicted);

    // The whole drag is one step; keys move the same knot.
    await page.getByRole('button', { name: 'Undo' }).click();
    expect(await peakOf(knot)).toBe(proposed);
    await page.getByRole('button', { name: 'Redo' }).click();
    expect(await peakOf(knot)).toBe(dragged);
    await knot.focus();
    await page.keyboard.press('ArrowDown');
    const adjusted = await peakOf(knot);
    expect(adjusted).toBe(dragged - 50);

    // Why it is through when it is, and what the checks say.
    await page.getByRole('button', { name: /^through, cold: .*How it is worked out/ }).click();
    const sheet = page.getByRole('dialog', { name: 'Through on a cold plate' });
    await sheet.getByText(/The bottom sinks as fast as the heat that reaches it melts steel/).waitFor();
    // a long sheet is read from its beginning, though the button that closes it stands at its end
    expect(await sheet.evaluate((dialog) => [dialog.scrollTop, dialog.scrollHeight > dialog.clientHeight])).toEqual([
      0,
      true,
    ]);
    await sheet.getByRole('button', { name: 'Close' }).click();
    await page.getByRole('heading', { name: 'Checks' }).waitFor();
    expect(await page.getByRole('main').innerText()).not.toMatch(/NaN|Infinity|undefined/);

    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await page.getByText('Saved.').first().waitFor();
    const shown = await sectionWords(page);
    await page.reload();
    await page.getByRole('slider', { name: 'Power where stage 1 meets stage 2' }).waitFor();
    expect(await sectionWords(page)).toBe(shown);
    expect(await peakOf(knot)).toBe(adjusted);
    expect(noise).toEqual([]);
    await page.context().close();
  });

  it('computes in Chromium, in the worker it ships, what the server computes, each number to a billionth of itself', async () => {
    const { page } = await signIn();
    const shipped = new Promise<string>((found) => page.once('worker', (worker) => found(worker.url())));
    await beginStrategy(page, { name: 'Computed in both places', from: '16', to: '18' });
    const code = await shipped;

    const read = await page.context().request.get('/api/machines');
    const machines = machineEndpoints.list.answer.parse(await read.json()).items;
    const profiles = machines.flatMap(({ revisions }) => revisions.slice(0, 1).map((revision) => revision.profile));
    expect(profiles.length).toBeGreaterThan(1);
    let compared = 0;
    for (const profile of profiles) {
      for (const plate of [0.012, 0.0195]) {
        const asked: ProposeAsked = {
          profile,
          nozzle: NOZZLE_1_5,
          thickness: { min: plate, max: plate + 0.002 },
          hottestPlateTemperature: 430,
          reserve: { cold: 2, hot: 2.2 },
          houseRules: [],
        };
        const proposal = await proposedInBrowser(page, code, asked);
        if (proposal.kind !== 'ok') continue;
        const { stages, prediction } = proposal;
        compared += numbersAlike(prediction, strategyPrediction({ ...asked, stages }));
      }
    }
    // traces of depth among them, cold and hot
    expect(compared).toBeGreaterThan(1000);
    await page.context().close();
  });

  async function signIn() {
    const context = await browser.newContext({
      viewport: { width: 390, height: 844 },
      baseURL: stack.address,
      hasTouch: true,
    });
    const page = await context.newPage();
    page.setDefaultTimeout(30_000);
    const noise: string[] = [];
    page.on('pageerror', (error) => noise.push(error.message));
    await page.goto('/sign-in');
    await page.getByLabel('Mail address').fill('engineer@quay.example');
    await page.getByLabel('Password', { exact: true }).fill(stack.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL((url) => url.pathname !== '/sign-in');
    return { page, noise };
  }
});

/** A new strategy for S355 on the 10 kW machine, up to its draft. */
async function beginStrategy(page: Page, { name, from, to }: { name: string; from: string; to: string }) {
  await page.goto('/strategies/new');
  await page.getByLabel('Machine and its revision').selectOption({ label: 'No. 2, 10 kW, revision 1' });
  await page.getByRole('group', { name: 'Grade group' }).getByRole('radio', { name: 'S355', exact: true }).check();
  await page.getByLabel('Thinnest plate').fill(from);
  await page.getByLabel('Thickness the range ends before').fill(to);
  await page.getByLabel('Hottest plate').fill('150');
  await page.getByLabel('Nozzle', { exact: true }).selectOption({ index: 1 });
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByRole('button', { name: 'Begin the draft' }).click();
  await page.waitForURL('**/revisions/*');
}

/** What the built worker at this address answers, computed by the browser. */
const proposedInBrowser = (page: Page, code: string, asked: ProposeAsked): Promise<PierceProposal> =>
  page.evaluate(
    ([address, question]) =>
      new Promise<PierceProposal>((answered, failed) => {
        const worker = new Worker(address);
        worker.onerror = (event) => failed(new Error(event.message));
        worker.onmessage = ({ data }: MessageEvent<ProposeSaid>) => {
          if (data.kind === 'done') answered(data.proposal);
          if (data.kind === 'refused') failed(new Error(data.why));
        };
        worker.postMessage(question);
      }),
    [code, asked] as const,
  );

/** Expects every number of both, wherever it stands, to be the same to 1e-9 of itself; how many there were. */
function numbersAlike(browser: unknown, server: unknown, at = 'prediction'): number {
  if (typeof server === 'number') {
    const apart = Math.abs(Number(browser) - server);
    expect(apart, `${at}: ${String(browser)} and ${server}`).toBeLessThanOrEqual(1e-9 * Math.abs(server));
    return 1;
  }
  if (typeof server !== 'object' || server === null) {
    expect(browser, at).toBe(server);
    return 0;
  }
  const entries = Object.entries(server);
  expect(Object.keys(browser ?? {}), at).toEqual(entries.map(([name]) => name));
  const other = new Map(Object.entries(browser ?? {}));
  return entries.reduce((sum, [name, value]) => sum + numbersAlike(other.get(name), value, `${at}.${name}`), 0);
}

const sectionWords = (page: Page) =>
  page
    .getByRole('img', { name: /^Section of/ })
    .first()
    .getAttribute('aria-label');

const peakOf = async (knot: Locator) => Number(await knot.getAttribute('aria-valuenow'));

/** A finger put on the middle of something, moved down by so many pixels in a few steps, and lifted. */
async function dragByTouch(page: Page, on: Locator, down: number) {
  const box = await on.boundingBox();
  if (!box) throw new Error('The knot is not on the page.');
  const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
  const finger = await page.context().newCDPSession(page);
  await finger.send('Input.dispatchTouchEvent', { type: 'touchStart', touchPoints: [{ x, y }] });
  for (const share of [0.25, 0.5, 0.75, 1]) {
    await finger.send('Input.dispatchTouchEvent', { type: 'touchMove', touchPoints: [{ x, y: y + share * down }] });
    await page.evaluate(() => new Promise((drawn) => requestAnimationFrame(() => drawn(undefined))));
  }
  await finger.send('Input.dispatchTouchEvent', { type: 'touchEnd', touchPoints: [] });
  await finger.detach();
}
