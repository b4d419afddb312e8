// `npm run look`: signs in as each role and saves a screenshot of every route, phone and wide, light and night, in .look/.
// Words after it choose pictures by name: `npm run look -- engineer-revision`.
import fs from 'node:fs';
import path from 'node:path';
import { ensureChromium } from './chromium.mjs';
import { root } from './folders.mjs';
import { ensurePackages } from './packages.mjs';
import { startCluster } from './postgres.mjs';
import { runCommand, say, seconds } from './say.mjs';

const since = Date.now();
const only = process.argv.slice(2);
/** Pages at once: two cores are kept busy, more only wait for each other. */
const atOnce = 3;

await runCommand(async () => {
  ensurePackages();
  ensureChromium();
  const { buildWeb } = await import('./web.mjs');
  await buildWeb();
  const { startDemoStack } = await import('./demo-stack.mjs');
  const { launchBrowser } = await import('./browser.mjs');
  const { contextOf, isOwnNote, lookers, routesOf, settled, sizes, themes } = await import('./routes-to-look-at.mjs');
  const cluster = await startCluster({ kind: 'test' });
  const stack = await startDemoStack({ cluster, database: `look_${process.pid}` });
  const browser = await launchBrowser();
  const out = path.join(root, '.look');
  fs.mkdirSync(out, { recursive: true });
  let count = 0;
  try {
    const work = [];
    for (const who of lookers) {
      for (const size of Object.keys(sizes)) {
        const context = await contextOf(browser, stack, who, size);
        for (const [name, url] of await routesOf(context, who)) {
          const picture = `${who ?? 'stranger'}-${name}-${size}`;
          if (only.length === 0 || only.some((word) => picture.includes(word))) work.push({ context, url, picture });
        }
      }
    }
    await Promise.all(
      Array.from({ length: atOnce }, async () => {
        for (let next = work.shift(); next; next = work.shift()) await look(next);
      }),
    );
  } finally {
    await browser.close();
    await stack.stop();
  }
  say(`${count} screenshots in .look/ (${seconds(since)})`);

  async function look({ context, url, picture }) {
    const page = await context.newPage();
    page.on('pageerror', (error) => say(`${picture}: page error: ${error.message}`));
    page.on('console', (message) => {
      if (message.type() !== 'error' || isOwnNote(message.text(), message.location().url, url)) return;
      say(`${picture}: console: ${message.text()}`);
    });
    try {
      await page.goto(url, { waitUntil: 'load' });
      await settled(page);
      // The theme follows the system without a reload: one visit gives both pictures.
      for (const theme of themes) {
        await page.emulateMedia({ colorScheme: theme === 'night' ? 'dark' : 'light' });
        await page.screenshot({ path: path.join(out, `${picture}-${theme}.png`), fullPage: true });
        count += 1;
      }
    } catch (error) {
      say(`${picture}: ${error.message.split('\n')[0]}`);
    } finally {
      await page.close();
    }
  }
});
