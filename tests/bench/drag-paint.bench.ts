import type { Browser, BrowserContext, CDPSession, Page } from 'playwright-core';
import { firstContent } from '../../components/pierce/first-content.ts';
import { launchBrowser } from '../../server/dev/browser.mjs';
import { ensureChromium } from '../../server/dev/chromium.mjs';
import { startDemoStack } from '../../server/dev/demo-stack.mjs';
import { startCluster } from '../../server/dev/postgres.mjs';
import { contextOf, settled, type Size } from '../../server/dev/routes-to-look-at.mjs';
import { buildWeb } from '../../server/dev/web.mjs';
import { machineEndpoints, nozzleEndpoints } from '../../shared/machines.ts';
import { stageQuantitiesAt, type Stage } from '../../strategy/pierce/index.ts';
import { sayLine } from './line.ts';

/** How much slower than this machine the page's processor is made. */
const SLOWER = 4;
/** Moves of a drag, and steps by key; about as often as a screen draws. */
const INPUTS = 150;
const EVERY = 17; // ms
/** A pierce of five stages: what an editor has to bear. */
const STAGES = 5;

/** ms from an input to the frame that shows it, of the inputs that a frame shows. */
type Times = { readonly p95: number; readonly worst: number; readonly count: number };

ensureChromium();
await buildWeb();
const cluster = await startCluster({ kind: 'test' });
const stack = await startDemoStack({ cluster, database: `bench_${process.pid}` });
const browser = await launchBrowser();
try {
  const sizes: readonly Size[] = ['phone', 'wide'];
  const found: { size: Size; drag: Times; keys: Times }[] = [];
  for (const size of sizes) {
    const context = await contextOf(browser, stack, 'engineer', size);
    const page = await context.newPage();
    await page.goto(`/revisions/${await fiveStages(context, size)}`);
    await settled(page);
    const inputs = await context.newCDPSession(page);
    await inputs.send('Emulation.setCPUThrottlingRate', { rate: SLOWER });
    await drag(page, inputs, size, 30); // warmed up: the page's code is compiled by then
    found.push({
      size,
      drag: await timesOf(browser, /^(TOUCH_MOVED|MOUSE_DRAGGED)$/, () => drag(page, inputs, size, INPUTS)),
      keys: await timesOf(browser, /KEY_PRESSED$/, () => keySteps(page)),
    });
    await context.close();
  }
  for (const { size, drag: dragged, keys } of found) {
    console.error(`${size}: drag ${told(dragged)}; keys ${told(keys)}`);
  }
  const ours = Math.max(...found.map((one) => one.drag.p95));
  const peer = Math.max(...found.map((one) => one.keys.p95));
  sayLine({
    case: 'drag-paint',
    ours,
    peer,
    unit: 'ms',
    ratio: peer / ours,
    errorMean: null,
    errorMax: null,
    exponent: null,
  });
} finally {
  await browser.close();
  await stack.stop();
}

function told({ p95, worst, count }: Times): string {
  return `p95 ${p95.toFixed(1)} ms, worst ${worst.toFixed(1)} ms of ${count} that were drawn`;
}

/** A draft of its own with a pierce of five stages; its id. */
async function fiveStages(context: BrowserContext, size: Size): Promise<string> {
  const get = async (address: string): Promise<unknown> => (await context.request.get(address)).json();
  const machines = machineEndpoints.list.answer.parse(await get('/api/machines')).items;
  const nozzle = nozzleEndpoints.list.answer.parse(await get('/api/nozzles')).items[0];
  const machine = machines.find(({ name }) => name.startsWith('No. 2'))?.revisions[0];
  if (!machine || !nozzle) throw new Error('The demo plant has no such machine or no nozzle.');
  const choices = {
    machineRevisionId: machine.id,
    gradeGroup: 'S355',
    nozzleId: nozzle.id,
    thickness: { min: 20_000, max: 21_000 },
    hottestPlate: 423.15,
  };
  const first = firstContent(choices, machine.profile, nozzle);
  const ids = { id: crypto.randomUUID(), revisionId: crypto.randomUUID() };
  const added = await context.request.post('/api/strategies', {
    headers: { origin: stack.address, 'idempotency-key': crypto.randomUUID() },
    data: {
      ...ids,
      name: `Dragged, ${size}`,
      content: firstContent(choices, machine.profile, nozzle, splitTo(STAGES, first.stages)),
    },
  });
  if (!added.ok()) throw new Error(`The draft was not taken: ${await added.text()}`);
  return ids.revisionId;
}

/** The same course in so many stages: the longest is halved until there are enough. */
function splitTo(count: number, stages: readonly Stage[]): readonly Stage[] {
  if (stages.length >= count) return stages;
  const longest = stages.reduce(
    (best, stage, index) => (stage.duration > (stages[best]?.duration ?? 0) ? index : best),
    0,
  );
  const whole = stages[longest];
  if (!whole) return stages;
  const middle = stageQuantitiesAt(whole, 0.5);
  const half = whole.duration / 2;
  return splitTo(count, [
    ...stages.slice(0, longest),
    { duration: half, from: whole.from, to: middle },
    { duration: half, from: middle, to: whole.to },
    ...stages.slice(longest + 1),
  ]);
}

function knotOf(page: Page) {
  return page.getByRole('slider', { name: 'Power where stage 1 meets stage 2' });
}

/** Up and down with a knot, by finger or mouse, as often as a screen draws or, where the page is slower, as it takes them. */
async function drag(page: Page, inputs: CDPSession, size: Size, moves: number): Promise<void> {
  const knot = knotOf(page);
  await knot.evaluate((element) => element.scrollIntoView({ block: 'center' }));
  await drawn(page);
  const box = await knot.boundingBox();
  if (!box) throw new Error('The knot is not on the page.');
  const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
  const finger = (type: 'touchStart' | 'touchMove' | 'touchEnd', down: number) =>
    inputs.send('Input.dispatchTouchEvent', { type, touchPoints: type === 'touchEnd' ? [] : [{ x, y: y + down }] });
  const mouse = (type: 'mousePressed' | 'mouseMoved' | 'mouseReleased', down: number) =>
    inputs.send('Input.dispatchMouseEvent', {
      type,
      x,
      y: y + down,
      button: 'left',
      buttons: type === 'mouseReleased' ? 0 : 1,
      clickCount: 1,
    });
  const phone = size === 'phone';
  await (phone ? finger('touchStart', 0) : mouse('mousePressed', 0));
  for (let i = 1; i <= moves; i++) {
    const down = -25 * Math.sin(i / 8);
    // taken, not drawn: the next waits for the frame that this one is being drawn in
    const taken = phone ? finger('touchMove', down) : mouse('mouseMoved', down);
    await Promise.all([taken, new Promise((later) => setTimeout(later, EVERY))]);
  }
  await (phone ? finger('touchEnd', 0) : mouse('mouseReleased', 0));
  await drawn(page);
}

/** The same knot by key, up and down, each step after the one before has been drawn: the whole page is made anew at each. */
async function keySteps(page: Page): Promise<void> {
  await knotOf(page).focus();
  for (let i = 0; i < INPUTS / 3; i++) {
    await page.keyboard.press(i % 2 === 0 ? 'ArrowUp' : 'ArrowDown');
    await drawn(page);
  }
}

function drawn(page: Page) {
  return page.evaluate(() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done))));
}

/**
 * What Chromium says of its own events of a kind: from when the browser had the input to when the frame that shows it was handed to the
 * screen. What the debugging protocol holds back of a finger before that is not the page's.
 */
async function timesOf(within: Browser, kind: RegExp, work: () => Promise<void>): Promise<Times> {
  await within.startTracing(undefined, { categories: ['cc', 'benchmark', 'input'] });
  await work();
  const trace = JSON.parse((await within.stopTracing()).toString()) as { traceEvents: TraceEvent[] }; // Chromium's own format
  const begun = new Map<string, number>();
  const times: number[] = [];
  for (const { name, ph, ts, pid, id2, args } of trace.traceEvents) {
    if (id2 === undefined) continue;
    const id = `${pid} ${id2.local ?? id2.global}`;
    if (name === 'GenerationToBrowserMain' && ph === 'e' && begun.has(id)) begun.set(id, ts);
    if (name !== 'EventLatency') continue;
    const event = args?.event_latency;
    // an input that changed nothing on the screen has no frame of its own
    if (ph === 'b' && event?.display_trace_id !== undefined && kind.test(event.event_type)) begun.set(id, ts);
    const from = begun.get(id);
    if (ph !== 'e' || from === undefined) continue;
    begun.delete(id);
    times.push((ts - from) / 1000);
  }
  times.sort((a, b) => a - b);
  const at = (share: number) => times[Math.min(times.length - 1, Math.floor(share * times.length))];
  const [p95, worst] = [at(0.95), at(1)];
  if (p95 === undefined || worst === undefined) throw new Error(`Chromium showed no ${kind.source}.`);
  return { p95, worst, count: times.length };
}

type TraceEvent = {
  readonly name: string;
  readonly ph: string;
  readonly ts: number; // µs
  readonly pid: number;
  readonly id2?: { readonly local?: string; readonly global?: string };
  readonly args?: { readonly event_latency?: { readonly event_type: string; readonly display_trace_id?: number } };
};
