import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Browser, Locator, Page } from 'playwright-core';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { startDemoStack, type DemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';

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

    await page.goto('/strategies/new');
    await page.getByLabel('Machine and its revision').selectOption({ label: 'No. 2, 10 kW, revision 1' });
    await page.getByRole('group', { name: 'Grade group' }).getByRole('radio', { name: 'S355', exact: true }).check();
    await page.getByLabel('Thinnest plate').fill('19.5');
    await page.getByLabel('Thickness the range ends before').fill('20.5');
    await page.getByLabel('Hottest plate').fill('150');
    await page.getByLabel('Nozzle', { exact: true }).selectOption({ index: 1 });
    await page.getByLabel('Name', { exact: true }).fill('Designed on a phone');
    await page.getByRole('button', { name: 'Begin the draft' }).click();
    await page.waitForURL('**/revisions/*');

    // The designer proposes in a worker; the proposal is drawn behind the draft before it is taken.
    await page.getByRole('button', { name: 'Propose', exact: true }).click();
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
    await context.close();
  });
});

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
