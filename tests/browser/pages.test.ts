import { AxeBuilder } from '@axe-core/playwright';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { startDemoStack, type DemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';
import {
  contextOf,
  isOwnNote,
  lookers,
  routesOf,
  settled,
  sizes,
  type Looker,
  type Size,
} from '../../server/dev/routes-to-look-at.mjs';

/** Pages at once: more than the cores would only wait for each other. */
const atOnce = 3;
/** The lead sees all that a programmer and an engineer see, in the same controls: only there and at the operator's is every rule of reading asked. */
const readers: readonly Looker[] = [null, 'operator', 'lead'];

describe('every page of every role, loaded by its own address', () => {
  let stack: DemoStack;
  let browser: Browser;

  beforeAll(async () => {
    const cluster = await startCluster({ kind: 'test' });
    stack = await startDemoStack({ cluster, database: `pages_${process.pid}` });
    browser = await launchBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await stack?.stop();
  });

  for (const who of lookers) {
    for (const size of Object.keys(sizes).filter((name): name is Size => name in sizes)) {
      it(`shows ${who === null ? 'a stranger' : `the ${who}`} on a ${size} screen no error, nothing cut off, nothing that can't be read`, async () => {
        await walk(who, size);
      });
    }
  }

  async function walk(who: Looker, size: Size) {
    const context = await contextOf(browser, stack, who, size);
    const routes = [...(await routesOf(context, who))];
    expect(routes.length).toBeGreaterThan(1);
    const found: string[] = [];
    await Promise.all(
      Array.from({ length: atOnce }, async () => {
        for (let next = routes.shift(); next; next = routes.shift()) {
          const [name, url] = next;
          for (const fault of await faultsOf(context, url, who, size)) found.push(`${name}: ${fault}`);
        }
      }),
    );
    await context.close();
    expect(found).toEqual([]);
  }

  async function faultsOf(context: BrowserContext, url: string, who: Looker, size: Size): Promise<string[]> {
    const page = await context.newPage();
    const faults: string[] = [];
    page.on('pageerror', (error) => faults.push(`page error: ${error.message}`));
    page.on('console', (message) => {
      if (message.type() === 'error' && !isOwnNote(message.text(), message.location().url, url))
        faults.push(`console: ${message.text()}`);
    });
    await page.goto(url, { waitUntil: 'load' });
    await settled(page);
    if (!/^.+ – Cinderpath$/.test(await page.title())) faults.push(`title “${await page.title()}”`);
    const beyond = await overflow(page);
    if (size === 'phone' && beyond.length > 0) faults.push(`wider than the phone: ${beyond.join('; ')}`);
    if (readers.includes(who)) faults.push(...(await unreadable(page)));
    await page.close();
    return faults;
  }
});

/** What breaks axe's rules, and by night, which changes nothing but colours, its rule of contrast. */
async function unreadable(page: Page): Promise<string[]> {
  const light = await new AxeBuilder({ page }).setLegacyMode().analyze();
  await page.emulateMedia({ colorScheme: 'dark' });
  const night = await new AxeBuilder({ page }).setLegacyMode().withRules(['color-contrast']).analyze();
  return [...light.violations, ...night.violations].map(
    ({ id, nodes }) => `axe ${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`,
  );
}

/** What reaches beyond the window's right edge and makes the page scroll sideways. */
const overflow = (page: Page): Promise<string[]> =>
  page.evaluate(() => {
    const width = document.documentElement.clientWidth;
    if (document.documentElement.scrollWidth <= width) return [];
    return Array.from(document.querySelectorAll('main *'))
      .filter((element) => element.getBoundingClientRect().right > width + 1)
      .slice(0, 3)
      .map((element) => `${element.tagName} ${element.textContent.slice(0, 40)}`);
  });
