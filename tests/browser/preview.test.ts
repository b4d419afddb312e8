import type { Browser, BrowserContext, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { startDemoStack, type DemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';
import { contextOf, type Size } from '../../server/dev/routes-to-look-at.mjs';
import { cornerPlanSchema } from '../../shared/corner-plans.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { planOfStars } from '../support/many-corners.ts';

describe('the preview of a corner plan', () => {
  let stack: DemoStack;
  let browser: Browser;

  beforeAll(async () => {
    const cluster = await startCluster({ kind: 'test' });
    stack = await startDemoStack({ cluster, database: `preview_${process.pid}` });
    browser = await launchBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await stack?.stop();
  });

  it('is moved, measured and run by mouse and keys on a wide screen, and a choice is taken back and made again', async () => {
    const { page, context, noise } = await opened('wide');
    const frame = frameOf(page);
    const whole = await scaleOf(page);

    // Keys move and enlarge; the wheel does once the drawing was clicked, without the page scrolling away.
    await frame.focus();
    await page.keyboard.press('+');
    const nearer = await scaleOf(page);
    expect(nearer).toBeGreaterThan(whole);
    const box = await boxOf(frame);
    await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
    const scrolled = await page.evaluate(() => window.scrollY);
    await page.mouse.wheel(0, -240);
    await expect.poll(() => scaleOf(page)).toBeGreaterThan(nearer);
    expect(await page.evaluate(() => window.scrollY)).toBe(scrolled);

    // Pushed by the mouse the drawing follows, is drawn anew once let go, and is all there again with 0.
    const before = await drawnAt(page);
    await page.mouse.down();
    await page.mouse.move(box.x + box.width / 2 - 90, box.y + box.height / 2 - 40, { steps: 6 });
    await expect.poll(() => pushOf(page)).not.toBe('0.00px, 0.00px');
    expect(await drawnAt(page)).toBe(before);
    await page.mouse.up();
    await expect.poll(() => drawnAt(page)).not.toBe(before);
    await page.keyboard.press('0');
    await expect.poll(() => scaleOf(page)).toBe(whole);

    // A corner chosen in the list is shown; its treatment changed, taken back by keys, and made again by the button.
    const row = page.getByRole('button', { name: /^Corner 2,/ });
    await row.click();
    await expect.poll(() => scaleOf(page)).toBeGreaterThan(whole);
    const planned = await row.getAttribute('aria-label');
    await page
      .getByRole('button', { name: /^Choose the |^Leave it as it is/, disabled: false })
      .first()
      .click();
    await page.getByText('1 corner chosen by hand').waitFor();
    const byHand = await row.getAttribute('aria-label');
    expect(byHand).not.toBe(planned);
    await frame.focus();
    await page.keyboard.press('Control+z');
    await expect.poll(() => row.getAttribute('aria-label')).toBe(planned);
    await page.getByRole('button', { name: 'Redo' }).click();
    await expect.poll(() => row.getAttribute('aria-label')).toBe(byHand);

    // Two taps measure between corners.
    await page
      .getByRole('button', { name: 'Fit', exact: true })
      .or(page.getByLabel('Show the whole drawing'))
      .first()
      .click();
    await page.getByRole('button', { name: 'Measure' }).click();
    const marks = await page.getByTestId('drawing-mark').all();
    for (const mark of marks.slice(0, 2)) {
      const at = await boxOf(mark);
      await page.mouse.click(at.x + at.width / 2, at.y + at.height / 2);
    }
    expect(await page.getByText(/^(corner|end of a piece) to /).count()).toBe(1);
    await page.getByRole('button', { name: 'Stop measuring' }).click();

    // The slider runs the cut: in the middle the head is somewhere, at the end all has dropped out.
    const slider = page.getByRole('slider', { name: 'Time of the cut' });
    await slider.scrollIntoViewIfNeeded();
    const track = await boxOf(slider);
    await page.mouse.click(track.x + track.width * 0.6, track.y + track.height / 2);
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/^[\d.]+ s of [\d.]+ s, (59|60|61) %/);
    await page.getByTestId('run-head').waitFor();
    // Behind it the plate's heat is another at each moment.
    const heat = page.getByTestId('heat');
    await heat.waitFor({ state: 'attached' });
    await expect.poll(() => warmPoints(heat)).toBeGreaterThan(0);
    const then = await warmPoints(heat);
    await page.keyboard.press('End');
    expect(await slider.getAttribute('aria-valuetext')).toContain('100 %, all is cut');
    await expect.poll(() => warmPoints(heat)).not.toBe(then);
    await page.keyboard.press('Home');
    await page.getByRole('button', { name: 'Run the cut' }).click();
    await expect.poll(async () => Number(await slider.getAttribute('aria-valuenow'))).toBeGreaterThan(0);
    await page.getByRole('button', { name: 'Stop', exact: true }).click();
    expect(noise).toEqual([]);
    await context.close();
  });

  it('is pinched, pushed and measured by fingers on a phone, beside the sheet with its corners', async () => {
    const { page, context, noise } = await opened('phone');
    const frame = frameOf(page);
    await frame.evaluate((element) => element.scrollIntoView({ block: 'center' }));
    const whole = await scaleOf(page);
    const scrolled = await page.evaluate(() => window.scrollY);
    const box = await boxOf(frame);
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];

    // Two fingers apart enlarge; then one finger pushes the drawing, and the page stays.
    const fingers = await page.context().newCDPSession(page);
    const touch = (type: string, points: readonly { x: number; y: number }[]) =>
      fingers.send('Input.dispatchTouchEvent', {
        type: type as 'touchStart', // the protocol's own names, written below
        touchPoints: points.map((point, id) => ({ ...point, id })),
      });
    await touch('touchStart', [
      { x: x - 30, y },
      { x: x + 30, y },
    ]);
    for (const apart of [45, 60, 80, 100])
      await touch('touchMove', [
        { x: x - apart, y },
        { x: x + apart, y },
      ]);
    await touch('touchEnd', []);
    await expect.poll(() => scaleOf(page)).toBeGreaterThan(2 * whole);
    const before = await drawnAt(page);
    await touch('touchStart', [{ x, y }]);
    for (const by of [15, 30, 45, 60]) await touch('touchMove', [{ x, y: y - by }]);
    await touch('touchEnd', []);
    await expect.poll(() => drawnAt(page)).not.toBe(before);
    expect(await page.evaluate(() => window.scrollY)).toBe(scrolled);

    // Nothing needs two fingers.
    await page.getByRole('button', { name: 'Show the whole drawing' }).tap();
    await expect.poll(() => scaleOf(page)).toBe(whole);
    await page.getByRole('button', { name: 'Enlarge the drawing' }).tap();
    await expect.poll(() => scaleOf(page)).toBeGreaterThan(whole);

    // The list is a sheet over the lower half; a corner chosen in it is shown above it.
    await page.getByRole('button', { name: /corners in a list$/ }).tap();
    await page
      .getByRole('dialog', { name: 'Corners' })
      .getByRole('button', { name: /^Corner 2,/ })
      .tap();
    const sheet = page.getByRole('dialog', { name: 'Corner 2' });
    await sheet.waitFor();
    await expect
      .poll(async () => (await boxOf(frame)).y + (await boxOf(frame)).height / 2)
      .toBeLessThan((await boxOf(sheet)).y);
    await sheet.getByRole('button', { name: 'Close' }).tap();
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);

    await page.getByRole('button', { name: 'Measure' }).tap();
    const at = await boxOf(frame);
    await page.touchscreen.tap(at.x + 60, at.y + 60);
    await page.touchscreen.tap(at.x + 160, at.y + 200);
    await page.getByText('distance', { exact: true }).waitFor();
    expect(noise).toEqual([]);
    await context.close();
  });

  it('draws nothing anew while 2,000 corners are pushed about, and shows them as dots until they can be told apart', async () => {
    const { page, context, noise } = await opened('wide', 200);
    const frame = frameOf(page);
    // the plate's heat comes from a worker: only once it stands behind the drawing is there nothing to draw
    await page.getByTestId('heat').waitFor({ state: 'attached' });
    expect(await page.getByTestId('drawing-mark').count()).toBeLessThan(20);
    expect(await page.getByTestId('drawing-dots').count()).toBeGreaterThan(0);
    const box = await boxOf(frame);
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
    await page.mouse.move(x, y);
    await page.mouse.down();
    await page.mouse.move(x + 10, y, { steps: 2 });
    const changed = await frame.evaluate(async (element) => {
      const drawing = element.querySelector('svg');
      if (!drawing) throw new Error('there is no drawing');
      let changes = 0;
      const observer = new MutationObserver((list) => (changes += list.length));
      observer.observe(drawing, { subtree: true, childList: true, attributes: true });
      for (let i = 0; i < 40; i++) {
        const at = { pointerId: 1, clientX: 700 + 150 * Math.sin(i / 6), clientY: 300 + 80 * Math.cos(i / 6) };
        element.dispatchEvent(new PointerEvent('pointermove', { ...at, bubbles: true, buttons: 1 }));
        await new Promise((drawn) => requestAnimationFrame(drawn));
      }
      observer.disconnect();
      return changes;
    });
    await page.mouse.up();
    expect(changed).toBe(0);
    for (let step = 0; step < 5; step++) await page.getByRole('button', { name: 'Enlarge the drawing' }).click();
    expect(await page.getByTestId('drawing-mark').count()).toBeGreaterThan(20);
    expect(noise).toEqual([]);
    await context.close();
  });

  /** The bracket's plan, or one with so many stars in its place, as the programmer sees it. */
  async function opened(size: Size, stars = 0): Promise<{ page: Page; context: BrowserContext; noise: string[] }> {
    const context = await contextOf(browser, stack, 'programmer', size);
    const parts = partEndpoints.list.answer.parse(await (await context.request.get('/api/parts')).json()).items;
    const part = parts.find(({ name, cornerPlans }) => name === 'Slew-ring bracket' && cornerPlans > 0);
    const read = await context.request.get(`/api/parts/${part?.id}`);
    const planId = partEndpoints.get.answer.parse(await read.json()).cornerPlans[0]?.id;
    const page = await context.newPage();
    page.setDefaultTimeout(30_000);
    const noise: string[] = [];
    page.on('pageerror', (error) => noise.push(error.message));
    if (stars > 0) {
      await page.route(`**/api/corner-plans/${planId}`, async (route) => {
        const plan = cornerPlanSchema.parse(await (await route.fetch()).json());
        await route.fulfill({ json: planOfStars(plan, stars) });
      });
    }
    await page.goto(`/corner-plans/${planId}`);
    await page.getByRole('slider', { name: 'Time of the cut' }).waitFor();
    return { page, context, noise };
  }
});

const frameOf = (page: Page) => page.getByRole('group', { name: /^Drawing\. / });

/** px a unit of the path texts, as it is drawn. */
const scaleOf = (page: Page) =>
  frameOf(page)
    .locator('g[transform^=scale]')
    .first()
    .getAttribute('transform')
    .then((text) => Number(/scale\(([\d.]+)\)/.exec(text ?? '')?.[1]));

/** Where the drawing's middle is drawn. */
const drawnAt = (page: Page) => frameOf(page).locator('svg > g').first().getAttribute('transform');

/** How many points of the heat's picture are warm enough to be seen, weighed by how much. */
const warmPoints = (heat: Locator) =>
  heat.evaluate((canvas) => {
    if (!(canvas instanceof HTMLCanvasElement)) throw new Error('the heat is no canvas');
    const { data } = canvas.getContext('2d')?.getImageData(0, 0, canvas.width, canvas.height) ?? { data: [] };
    let sum = 0;
    for (let i = 3; i < data.length; i += 4) sum += data[i] ?? 0;
    return sum;
  });

/** How far what is drawn is pushed. */
const pushOf = (page: Page) =>
  frameOf(page)
    .locator('> div')
    .first()
    .evaluate((layers) => /translate\((.*?)\)/.exec(layers.getAttribute('style') ?? '')?.[1] ?? '');

async function boxOf(element: Locator) {
  const box = await element.boundingBox();
  if (!box) throw new Error('it is not on the page');
  return box;
}
