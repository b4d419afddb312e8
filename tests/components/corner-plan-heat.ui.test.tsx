import { act, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { CornerPlanScreen } from '@/components/corners/corner-plan-screen.tsx';
import { planSummary } from '@/components/corners/plan-summary.tsx';
import type { HeatSaid } from '@/components/corners/heat.worker.ts';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import { ids, json, serveWith, show } from '../support/page.tsx';
import { corner, pathOf, planOf } from './corner-plan-fixtures.ts';
import { plateHeatOf } from './corner-heat-fixtures.ts';

afterEach(() => vi.unstubAllGlobals());

/** The heat's worker, which says what a test wants it to. */
class HeldWorker {
  static made: HeldWorker[] = [];
  onmessage: ((event: { readonly data: HeatSaid }) => void) | null = null;
  onerror: ((event: { readonly message: string }) => void) | null = null;
  ended = false;
  constructor() {
    HeldWorker.made.push(this);
  }
  postMessage(): void {}
  terminate(): void {
    this.ended = true;
  }
}
const worker = async () => {
  await waitFor(() => expect(HeldWorker.made.length).toBeGreaterThan(0), { timeout: 10_000 });
  const last = HeldWorker.made.at(-1);
  if (!last) throw new Error('no worker was made');
  return last;
};

function opened(plan: CornerPlan = planOf()) {
  HeldWorker.made = [];
  vi.stubGlobal('Worker', HeldWorker);
  serveWith(({ path }) => {
    if (path.endsWith('/path')) return json(pathOf(plan));
    return json(path.endsWith(ids.report) ? plan : { items: [] });
  });
  show(<CornerPlanScreen id={ids.report} />, 'programmer');
}

describe('the heat behind a plan', () => {
  it('says how far it is, can be stopped, and asked for again', async () => {
    opened();
    const first = await worker();
    act(() => first.onmessage?.({ data: { kind: 'progress', share: 0.3 } }));
    expect(screen.getByRole('progressbar', { name: /plate’s heat/ }).getAttribute('aria-valuenow')).toBe('30');
    await userEvent.click(screen.getByRole('button', { name: 'Stop working out the plate’s heat' }));
    expect(first.ended).toBe(true);
    expect(screen.getByText(/was not worked out to its end/)).toBeTruthy();
    expect(screen.queryByTestId('heat')).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Work out the heat' }));
    expect(HeldWorker.made).toHaveLength(2);
  });

  it('is drawn once it is there, with a temperature at each tip that follows the slider, and can be hidden', async () => {
    opened();
    const { onmessage } = await worker();
    const tips = () => screen.getAllByTestId('tip').map(({ textContent }) => textContent);
    // before the cut runs each tip says what it returns at
    expect(tips()).toContain('177 °C');
    act(() => onmessage?.({ data: { kind: 'done', heat: plateHeatOf() } }));
    expect(screen.getByTestId('heat')).toBeTruthy();
    const slider = screen.getByRole('slider', { name: 'Time of the cut' });
    slider.focus();
    await userEvent.keyboard('{ArrowRight}');
    const early = tips();
    await userEvent.keyboard('{End}');
    expect(tips()).not.toEqual(early);
    await userEvent.click(screen.getByRole('button', { name: 'Hide the heat' }));
    expect(screen.queryByTestId('heat')).toBeNull();
    expect(screen.getByRole('button', { name: 'Show the heat' })).toBeTruthy();
  });

  it('says so when the worker breaks, and everything else of the plan is there', async () => {
    opened();
    const broken = await worker();
    act(() => broken.onerror?.({ message: 'out of memory' }));
    expect(screen.getByText(/broke off on this device/)).toBeTruthy();
    expect(screen.getByRole('slider', { name: 'Time of the cut' })).toBeTruthy();
  });

  it('has a scale with names and figures, for who does not see its colours', async () => {
    opened();
    const scale = await screen.findByRole('group', { name: /Temperature scale/ });
    for (const words of ['straw', '238 °C', 'first red', '514 °C', 'white']) expect(scale.textContent).toContain(words);
  });
});

describe('what a plan comes to, in one glance', () => {
  it('is how many corners would burn, what was done, what is left and what it costs', async () => {
    expect(planSummary(planOf())).toEqual({
      corners: 4,
      burning: 2,
      cured: { loop: 1, dwell: 1, ease: 0, round: 0, leave: 1 },
      trouble: 1,
    });
    opened();
    expect(
      await screen.findByText(
        'Cut as drawn, 2 of 4 corners come back hotter than 250 °C and would burn. Done about it: 1 loop, 1 dwell, for 3.8 s more. 1 is still in trouble.',
        undefined,
        { timeout: 10_000 },
      ),
    ).toBeTruthy();
    expect(screen.getByRole('img', { name: /loop 1, dwell 1, ease 0, round 0, leave 1, in trouble 1/ })).toBeTruthy();
  });

  it('lists what burns most first, and in the drawing’s order when asked', async () => {
    opened(planOf({ corners: [corner(0), corner(1, { untreated: 600 }), corner(2, { untreated: 700 })] }));
    const numbers = () =>
      screen
        .getAllByRole('button', { name: /^Corner \d+,/ })
        .map((row) => Number(/\d+/.exec(row.getAttribute('aria-label') ?? '')?.[0]));
    await screen.findByRole('button', { name: /^Corner 1,/ });
    expect(numbers()).toEqual([3, 2, 1]);
    await userEvent.click(screen.getByRole('radio', { name: 'the drawing' }));
    expect(numbers()).toEqual([1, 2, 3]);
  });

  it('names another order of cutting with what it costs and spares', async () => {
    const order = {
      order: ['2', '0', '1'],
      why: 'the hot tips of part 2 cool meanwhile',
      rapidTime: 3.2,
      addedTime: 7.5,
      overLimit: 2,
    };
    opened(planOf({ totals: { ...planOf().totals, orderSuggestions: [order] } }));
    expect(await screen.findByText('The hot tips of part 2 cool meanwhile.')).toBeTruthy();
    expect(
      screen.getByText('costs 3.2 s more between the cuts; spares 7.5 s of treatments; 2 corners fewer over a limit'),
    ).toBeTruthy();
  });
});

describe('a corner chosen among all', () => {
  it('in the chart is chosen on the drawing and in the list too', async () => {
    opened();
    const chart = await screen.findByRole('slider', { name: 'Corners by time of return' });
    chart.focus();
    await userEvent.keyboard('{Home}');
    expect(screen.getByRole('heading', { name: /Loop, 90° inside the part/ })).toBeTruthy();
    const row = screen.getByRole('button', { name: /^Corner 2,/ });
    expect(row.getAttribute('aria-pressed')).toBe('true');
    fireEvent.click(screen.getByRole('button', { name: /^Corner 4,/ }));
    expect(chart.getAttribute('aria-valuetext')).toMatch(/^Corner 4,/);
  });

  it('opens its return temperature: what it adds up from, with which numbers, whence, and how sure it is', async () => {
    const warmed = corner(1, { treatment: 'loop', untreated: 700, treated: 450, background: 330, returnTime: 9.4 });
    opened(planOf({ corners: [corner(0), warmed] }));
    fireEvent.click(await screen.findByRole('button', { name: /^Corner 2,/ }));
    fireEvent.click(screen.getByRole('button', { name: /Return temperature as planned: 177 °C/ }));
    const sheet = screen.getByRole('dialog', { name: 'Return temperature at corner 2' });
    const said = sheet.textContent.replaceAll('\u00a0', ' ');
    for (const words of [
      '+37 K',
      '+370 K',
      '−250 K',
      '6.5 J per mm² of cut face',
      'Carslaw and Jaeger',
      'EN 1993-1-2',
    ]) {
      expect(said).toContain(words);
    }
    expect(said).toContain('range that test cuts leave opennone yetNo test cuts have been fitted');
    expect(said).toContain('An estimate until a test cut on this machine confirms it');
    expect(said).toContain('Class 4 laser radiation');
  });

  it('opens what the finished edge gets: its burn-back beside a straight edge’s, and how fast it cools', async () => {
    const burning = corner(1, { treated: 900, background: 330, peak: 1750, burnBack: 7e-4 });
    opened(planOf({ corners: [corner(0), burning] }));
    fireEvent.click(await screen.findByRole('button', { name: /^Corner 2,/ }));
    fireEvent.click(screen.getByRole('button', { name: /Return temperature as planned/ }));
    const sheet = screen.getByRole('dialog', { name: 'Return temperature at corner 2' });
    const told = (label: RegExp) =>
      within(within(sheet).getByText(label).closest('[role="listitem"]') as HTMLElement) // the rows are elements
        .getByRole('definition')
        .textContent.replaceAll('\u00a0', ' ');
    expect(told(/^burnt back at this tip/)).toBe('0.7 mm');
    const beside = Number.parseFloat(told(/^burnt back beside a straight edge, where 1\W?371 °C burns/));
    expect(beside).toBeGreaterThan(0.01);
    expect(beside).toBeLessThan(0.7);
    // EN 1011-2 with 6.5 kJ per m and mm of thickness at 20 °C: (4300 − 4.3·20)·10⁵·0.0065²·(1/480² − 1/780²) s
    expect(told(/^a cut edge cools from 800 °C to 500 °C/)).toBe('0.05 s');
    const said = sheet.textContent.replaceAll('\u00a0', ' ');
    for (const words of ['an order of magnitude only', 'arc welds', 'EN 1011-2', '1 to 35 % higher'])
      expect(said).toContain(words);
  });

  it('says nothing of what is burnt at a notch, whose plan does not know it', async () => {
    opened(planOf({ corners: [corner(0), corner(1, { convex: false, peak: null, burnBack: null })] }));
    fireEvent.click(await screen.findByRole('button', { name: /^Corner 2,/ }));
    fireEvent.click(screen.getByRole('button', { name: /Return temperature as planned/ }));
    const sheet = screen.getByRole('dialog', { name: 'Return temperature at corner 2' });
    expect(within(sheet).queryByText(/^burnt back at this tip/)).toBeNull();
    expect(within(sheet).getByText(/^burnt back beside a straight edge/)).toBeTruthy();
  });
});
