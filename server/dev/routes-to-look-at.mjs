// Every route of the product by role, with ids taken from the demo plant: for the screenshots and for the tests that walk all pages.

/** Who looks: null is a stranger. */
export const lookers = [null, 'operator', 'programmer', 'engineer', 'lead'];
export const sizes = { phone: { width: 390, height: 844 }, wide: { width: 1440, height: 900 } };
export const themes = ['light', 'night'];

/** The tag of a plate that nobody booked in. */
const unknownTag = 'NOBODY-KNOWS';

const strangersRoutes = [
  ['sign-in', '/sign-in'],
  ['not-found', '/no-such-page'],
];

/** A browser context of somebody on a phone or at a desk, signed in at the plate hall. */
export async function contextOf(browser, stack, who, size) {
  const context = await browser.newContext({
    viewport: sizes[size],
    baseURL: stack.address,
    hasTouch: size === 'phone',
    // What moves is never at the same place in two pictures.
    reducedMotion: 'reduce',
  });
  if (who === null) return context;
  const headers = { origin: stack.address };
  const signedIn = await context.request.post('/api/sessions', {
    data: { mail: `${who}@quay.example`, password: stack.password },
    headers,
  });
  if (!signedIn.ok()) throw new Error(`${who} can't sign in: ${await signedIn.text()}`);
  // Somebody who works in both plants is looked at in the first.
  const { memberships } = await signedIn.json();
  const quay = memberships.find((one) => one.plantName.startsWith('Quay'));
  await context.request.put('/api/sessions/current/plant', { data: { plantId: quay.plantId }, headers });
  return context;
}

/** Name and address of every route this person can open. */
export async function routesOf(context, who) {
  if (who === null) return strangersRoutes;
  const get = async (url) => {
    const answer = await context.request.get(url);
    return answer.ok() ? answer.json() : { items: [] };
  };
  const [machines, plates, strategies, parts, layouts, reports] = await Promise.all(
    ['/api/machines', '/api/plates', '/api/strategies', '/api/parts', '/api/layouts', '/api/reports'].map(
      async (url) => (await get(url)).items,
    ),
  );
  const routes = [
    ['start', '/'],
    ['at-the-machine', '/at-the-machine'],
  ];
  // One card with an approved strategy and one without for each of two machines, and a plate that nobody booked in.
  let approved = null;
  for (const machine of machines.slice(0, 2)) {
    const shown = new Set();
    for (const plate of plates) {
      const asked = `tag=${encodeURIComponent(plate.tag)}`;
      const card = await get(`/api/card?machineId=${machine.id}&${asked}`);
      if (!card.match || shown.has(card.match.kind)) continue;
      shown.add(card.match.kind);
      if (card.match.kind === 'approved') approved ??= card;
      routes.push([
        `card-${machine.name}-${plate.tag}`.replace(/[^\w-]+/g, '-'),
        `/card?machine=${machine.id}&${asked}`,
      ]);
    }
  }
  routes.push(['card-unknown-tag', `/card?machine=${machines[0]?.id}&tag=${unknownTag}`]);
  routes.push(['card-by-hand', `/card?machine=${machines[0]?.id}&gradeGroup=S355&thickness=12000`]);
  if (approved) {
    const { revision } = approved.match;
    routes.push(['report-new', `/report?revision=${revision.id}&machine=${approved.machine.id}`]);
    const plan = approved.match.cornerPlans[0];
    if (plan) routes.push(['card-corner-plan', `/corner-plans/${plan.id}`]);
  }
  routes.push(['plates', '/plates'], ['machines', '/machines']);
  if (plates[0]) routes.push(['plate', `/plates/${plates[0].id}`]);
  if (machines[0]) routes.push(['machine', `/machines/${machines[0].id}`]);
  if (who === 'operator') return routes;
  routes.push(
    ['strategies', '/strategies'],
    ['parts', '/parts'],
    ['part-new', '/parts/new'],
    ['layouts', '/layouts'],
    ['layout-new', '/layouts/new'],
    ['plate-new', '/plates/new'],
  );
  for (const state of ['draft', 'inReview', 'returned', 'approved']) {
    const found = strategies.find((one) => one.latest.state === state);
    if (found) routes.push([`revision-${state}`, `/revisions/${found.latest.id}`]);
  }
  if (strategies[0]) routes.push(['strategy', `/strategies/${strategies[0].id}`]);
  if (parts[0]) {
    routes.push(['part', `/parts/${parts[0].id}`]);
    const whole = await Promise.all(parts.map(({ id }) => get(`/api/parts/${id}`)));
    const plan = whole.flatMap((part) => part.cornerPlans ?? [])[0];
    if (plan) routes.push(['corner-plan', `/corner-plans/${plan.id}`]);
  }
  if (layouts[0]) {
    routes.push(['layout', `/layouts/${layouts[0].id}`]);
    const plan = (await get(`/api/layouts/${layouts[0].id}`)).cornerPlans?.[0];
    if (plan) routes.push(['layout-corner-plan', `/corner-plans/${plan.id}`]);
  }
  if (who === 'programmer') return routes;
  routes.push(
    ['strategy-new', '/strategies/new'],
    ['machine-new', '/machines/new'],
    ['reviews', '/reviews'],
    ['reports', '/reports'],
  );
  if (reports[0]) routes.push(['report', `/reports/${reports[0].id}`]);
  if (who === 'lead') routes.push(['house-rules', '/house-rules'], ['people', '/people'], ['record', '/record']);
  return routes;
}

/** Waits until a page shows what it is of: a heading, nothing that still loads, its letters. */
export async function settled(page) {
  await page.waitForFunction(
    () => document.querySelector('main h1') !== null && document.querySelector('[role=progressbar]') === null,
    null,
    { timeout: 30_000 },
  );
  await page.evaluate(() => document.fonts.ready);
  // Charts are drawn once their width is known, and predictions a moment after what they are made of.
  await page.waitForTimeout(250);
}

/** The browser notes every refused request; a stranger's question who is signed in, a page that isn't there and a plate that nobody booked in are meant to be refused. */
export function isOwnNote(text, from, page) {
  const status = /status of (401|404)/.exec(text)?.[1];
  if (!status) return false;
  const { pathname, searchParams } = new URL(from);
  if (status === '401') return pathname === '/api/sessions/current';
  return pathname === page || (pathname === '/api/card' && searchParams.get('tag') === unknownTag);
}
