// `npm run look`: signs in as each role and saves a screenshot of every route, phone and wide, light and night, in .look/.
import fs from 'node:fs';
import path from 'node:path';
import { ensureChromium } from './chromium.mjs';
import { root } from './folders.mjs';
import { ensurePackages } from './packages.mjs';
import { startCluster } from './postgres.mjs';
import { runCommand, say, seconds } from './say.mjs';

const since = Date.now();
const only = process.argv.slice(2);
const sizes = { phone: { width: 390, height: 844 }, wide: { width: 1440, height: 900 } };
const themes = ['light', 'night'];

await runCommand(async () => {
  ensurePackages();
  ensureChromium();
  const { buildWeb } = await import('./web.mjs');
  await buildWeb();
  const { startDemoStack } = await import('./demo-stack.mjs');
  const { launchBrowser } = await import('./browser.mjs');
  const cluster = await startCluster({ kind: 'test' });
  const stack = await startDemoStack({ cluster, database: `look_${process.pid}` });
  const browser = await launchBrowser();
  const out = path.join(root, '.look');
  fs.mkdirSync(out, { recursive: true });
  let count = 0;
  try {
    for (const who of [null, 'operator', 'programmer', 'engineer', 'lead']) {
      for (const [size, viewport] of Object.entries(sizes)) {
        const context = await browser.newContext({ viewport, baseURL: stack.address, hasTouch: size === 'phone' });
        const page = await context.newPage();
        const noise = [];
        page.on('pageerror', (error) => noise.push(`page error: ${error.message}`));
        page.on('console', (message) => message.type() === 'error' && noise.push(`console: ${message.text()}`));
        const routes = who
          ? await signedInRoutes(page, who)
          : [
              ['sign-in', '/sign-in'],
              ['not-found', '/no-such-page'],
            ];
        for (const theme of themes) {
          await page.emulateMedia({ colorScheme: theme === 'night' ? 'dark' : 'light' });
          for (const [name, url] of routes) {
            if (only.length && !only.some((word) => `${who ?? 'stranger'}-${name}`.includes(word))) continue;
            await page.goto(url, { waitUntil: 'networkidle' });
            await page.waitForTimeout(150);
            await page.screenshot({
              path: path.join(out, `${who ?? 'stranger'}-${name}-${size}-${theme}.png`),
              fullPage: true,
            });
            count += 1;
            for (const line of noise.splice(0)) say(`${who ?? 'stranger'} ${url} ${size} ${theme}: ${line}`);
          }
        }
        await context.close();
      }
    }
  } finally {
    await browser.close();
    await stack.stop();
  }
  say(`${count} screenshots in .look/ (${seconds(since)})`);

  /** Every route this person can open, ids taken from the demo plant. */
  async function signedInRoutes(page, who) {
    const accounts = (await (await page.request.get('/api/welcome')).json()).demo.accounts;
    const account = accounts.find((one) => one.role === who && one.mail.endsWith('@quay.example'));
    const signedIn = await page.request.post('/api/sessions', {
      data: { mail: account.mail, password: stack.password },
      headers: { origin: stack.address },
    });
    if (!signedIn.ok()) throw new Error(`${who} can't sign in: ${await signedIn.text()}`);
    // Somebody who works in both plants is looked at in the first.
    const { memberships } = await signedIn.json();
    const quay = memberships.find((one) => one.plantName.startsWith('Quay'));
    await page.request.put('/api/sessions/current/plant', { data: { plantId: quay.plantId }, headers: { origin: stack.address } });
    const items = async (url) => {
      const answer = await page.request.get(url);
      return answer.ok() ? (await answer.json()).items : [];
    };
    const [machines, plates, strategies, parts, reports] = await Promise.all(
      ['/api/machines', '/api/plates', '/api/strategies', '/api/parts', '/api/reports'].map(items),
    );
    const routes = [
      ['start', '/'],
      ['at-the-machine', '/at-the-machine'],
    ];
    for (const machine of machines.slice(0, 2)) {
      for (const plate of plates.slice(0, 2)) {
        routes.push([
          `card-${machine.name}-${plate.tag}`.replace(/[^\w-]+/g, '-'),
          `/card?machine=${machine.id}&tag=${encodeURIComponent(plate.tag)}`,
        ]);
      }
    }
    routes.push(['plates', '/plates'], ['machines', '/machines']);
    if (plates[0]) routes.push(['plate', `/plates/${plates[0].id}`]);
    if (machines[0]) routes.push(['machine', `/machines/${machines[0].id}`]);
    if (who === 'operator') return routes;
    routes.push(
      ['strategies', '/strategies'],
      ['parts', '/parts'],
      ['part-new', '/parts/new'],
      ['plate-new', '/plates/new'],
    );
    for (const state of ['draft', 'inReview', 'approved']) {
      const found = strategies.find((one) => one.latest.state === state);
      if (found) routes.push([`revision-${state}`, `/revisions/${found.latest.id}`]);
    }
    if (strategies[0]) routes.push(['strategy', `/strategies/${strategies[0].id}`]);
    if (parts[0]) {
      routes.push(['part', `/parts/${parts[0].id}`]);
      const part = await (await page.request.get(`/api/parts/${parts[0].id}`)).json();
      if (part.cornerPlans[0]) routes.push(['corner-plan', `/corner-plans/${part.cornerPlans[0].id}`]);
    }
    if (who === 'programmer') return routes;
    routes.push(
      ['strategy-new', '/strategies/new'],
      ['machine-new', '/machines/new'],
      ['reviews', '/reviews'],
      ['reports', '/reports'],
    );
    if (reports[0]) routes.push(['report', `/reports/${reports[0].id}`]);
    if (who === 'lead') routes.push(['people', '/people'], ['record', '/record']);
    return routes;
  }
});
