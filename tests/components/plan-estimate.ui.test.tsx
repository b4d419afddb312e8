import { QueryClientProvider } from '@tanstack/react-query';
import { screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { PlanEstimate } from '@/components/corners/plan-estimate.tsx';
import { RatesPanel } from '@/components/rules/rates-panel.tsx';
import type { PlanComparison } from '@/shared/estimates.ts';
import type { PlantRates } from '@/shared/rates.ts';
import { planEstimate, type PlanVariant, type Rates } from '@/strategy/estimate/index.ts';
import { plateClock } from '@/strategy/motion/index.ts';
import { json, offline, problem, serveWith, show, ids } from '../support/page.tsx';
import { corner, pathOf, planOf } from './corner-plan-fixtures.ts';

afterEach(() => vi.unstubAllGlobals());

const plan = planOf();
const bare = planOf({ corners: plan.corners.map((one) => ({ ...one, treatment: 'leave', loop: null, dwell: null })) });
const paid: Rates = {
  currency: 'EUR',
  machineHour: 135,
  oxygenKilogram: 0.28,
  electricityKilowattHour: 0.24,
  wallPlugEfficiency: 0.35,
};

type Variant = PlanComparison['variants'][number];

function variant(name: PlanVariant, of: typeof plan, overLimit: number, rates: Rates | null): Variant {
  const { cutting } = of;
  const estimate = planEstimate({
    clock: plateClock(pathOf(of), cutting),
    cut: cutting,
    thickness: of.thickness,
    plateTemperature: of.plateTemperature,
    loading: { time: 300, exchange: 30, shuttleTable: true },
    rates,
  });
  return {
    variant: name,
    revision: name === 'previous' ? 2 : 3,
    estimate: { ...estimate, ledger: { ...estimate.ledger, cautions: [...estimate.ledger.cautions] } },
    corners: { loops: 1, dwells: 1, eases: 0, rounds: 0, overLimit, hottestReturn: 700 },
    cautions: name === 'allLoops' ? ['1 contour can’t be cut as drawn and is not counted.'] : [],
  };
}

const comparison = (rates: Rates | null = null, version = 5): PlanComparison => ({
  version,
  variants: [
    variant('untreated', bare, 4, rates),
    variant('allLoops', plan, 0, rates),
    variant('planned', plan, 1, rates),
  ],
  missing: [{ variant: 'previous', why: 'This is the strategy’s first revision.' }],
});

const cells = (name: RegExp | string) =>
  within(screen.getByRole('rowheader', { name }).closest('[role="row"]') as HTMLElement) // a row's header lies in its row
    .getAllByRole('cell')
    .map(({ textContent }) => textContent);

describe('what a plan costs', () => {
  it('stands as bars and in a table beside the other ways, with what is missing and why', async () => {
    serveWith(() => json(comparison()));
    show(<PlanEstimate plan={plan} />, 'programmer');
    const bars = await screen.findByRole('list', { name: 'Time' });
    expect(within(bars).getAllByRole('listitem')).toHaveLength(3);
    expect(within(bars).getByText('4 tips over the limit')).toBeTruthy();
    expect(within(bars).getByText('no tip over the limit')).toBeTruthy();
    expect(
      within(bars).getByRole('img', { name: /^Planned: piercing 1\.5 s, cutting [\d.]+ s, loops [\d.]+ s/ }),
    ).toBeTruthy();
    expect(screen.getByRole('columnheader', { name: 'Planned' })).toBeTruthy();
    // a tip over the limit is three fewer than untreated
    expect(cells('tips over the limit').join(' ')).toContain('1−3');
    // as many pierces take as long, to rounding: no word of a difference
    expect(cells('piercing')).toEqual(['1.5 s', '1.5 s', '1.5 s']);
    expect(screen.getByText(/Revision before: This is the strategy’s first revision/)).toBeTruthy();
    expect(screen.getByText(/No rates given/)).toBeTruthy();
    expect(screen.queryByRole('radio', { name: 'Money' })).toBeNull();
    expect(screen.getByText(/All loops: 1 contour can’t be cut/)).toBeTruthy();
  });

  it('says money once the plant gives rates, and shows it as bars', async () => {
    serveWith(() => json(comparison(paid)));
    show(<PlanEstimate plan={plan} />, 'programmer');
    await userEvent.click(await screen.findByRole('radio', { name: 'Money' }));
    const bars = screen.getByRole('list', { name: 'Money' });
    expect(within(bars).getAllByText(/^\d+\.\d\d EUR$/)).toHaveLength(3);
    expect(screen.getByRole('rowheader', { name: 'cost, EUR' })).toBeTruthy();
    expect(screen.queryByText(/No rates given/)).toBeNull();
  });

  it('is compared against another plan when that is chosen', async () => {
    serveWith(() => json(comparison()));
    show(<PlanEstimate plan={plan} />, 'programmer');
    const against = await screen.findByRole('group', { name: 'Differences from' });
    await userEvent.click(within(against).getByRole('radio', { name: 'All loops' }));
    expect(cells('tips over the limit').join(' ')).toContain('1+1');
  });

  it('keeps the last good figures, marked as old, when the plan’s next ones can’t be worked out', async () => {
    let down = false;
    serveWith(() =>
      down ? problem('unavailable', 'The plan could not be estimated within 40 s.') : json(comparison()),
    );
    const shown = show(<PlanEstimate plan={plan} />, 'programmer');
    await screen.findByRole('list', { name: 'Time' });
    down = true;
    shown.rerender(
      <QueryClientProvider client={shown.client}>
        <PlanEstimate plan={{ ...plan, version: 6 }} />
      </QueryClientProvider>,
    );
    await screen.findByText('The plan could not be estimated within 40 s.');
    expect(screen.getByText('These figures are of the plan as it was before.')).toBeTruthy();
    expect(screen.getByRole('list', { name: 'Time' })).toBeTruthy();
  });

  it('of a plan with very many corners is worked out when asked for', async () => {
    const asked = serveWith(() => json(comparison()));
    const many = { ...plan, corners: Array.from({ length: 700 }, (_, n) => corner(n)) };
    show(<PlanEstimate plan={many} />, 'programmer');
    expect(asked).toEqual([]);
    await userEvent.click(screen.getByRole('button', { name: 'Work out what it costs' }));
    await screen.findByRole('list', { name: 'Time' });
    expect(asked.map(({ path }) => path)).toEqual([`/api/corner-plans/${ids.report}/estimate`]);
  });

  it('need not be waited for, and can be asked for again', async () => {
    let asked = 0;
    serveWith(() => {
      asked += 1;
      return asked === 1 ? new Promise<Response>(() => undefined) : json(comparison());
    });
    show(<PlanEstimate plan={plan} />, 'programmer');
    await screen.findByRole('progressbar');
    await userEvent.click(screen.getByRole('button', { name: 'Don’t wait for it' }));
    expect(screen.queryByRole('progressbar')).toBeNull();
    expect(screen.queryByRole('alert')).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Work out what it costs' }));
    await screen.findByRole('list', { name: 'Time' });
    expect(asked).toBe(2);
  });

  it('says when the server can’t be reached', async () => {
    serveWith(() => offline());
    show(<PlanEstimate plan={plan} />, 'programmer');
    await waitFor(() => expect(screen.getByRole('alert')).toBeTruthy());
  });
});

describe('what the plant pays', () => {
  const empty: PlantRates = {
    currency: '',
    machineHour: null,
    oxygenKilogram: null,
    electricityKilowattHour: null,
    wallPlugEfficiency: 0.33,
    version: 1,
    changedAt: '2031-03-03T14:02:00Z',
    changedBy: null,
  };

  it('is said to be nothing yet, and written from the version that was seen', async () => {
    const asked = serveWith(
      ({ method, body }) => json(method === 'PUT' ? { ...empty, ...(body as object), version: 2 } : empty), // what is sent is a form
    );
    show(<RatesPanel />);
    await screen.findByText(/No rates given: estimates say hours/);
    await userEvent.click(screen.getByRole('button', { name: 'Give rates' }));
    await userEvent.type(screen.getByRole('textbox', { name: /^An hour of the machine/ }), '135');
    await userEvent.click(screen.getByRole('button', { name: 'Save the rates' }));
    await screen.findByText('Say in which currency, as in EUR.');
    await userEvent.type(screen.getByRole('textbox', { name: /^Currency/ }), 'EUR');
    await userEvent.click(screen.getByRole('button', { name: 'Save the rates' }));
    await screen.findByText('135.00 EUR');
    const put = asked.find(({ method }) => method === 'PUT');
    expect(put?.headers.get('if-match')).toBe('"1"');
    expect(put?.body).toEqual({
      currency: 'EUR',
      machineHour: 135,
      oxygenKilogram: null,
      electricityKilowattHour: null,
      wallPlugEfficiency: 0.33,
    });
    expect(screen.getAllByText('not given')).toHaveLength(2);
  });

  it('keeps what was typed when somebody else wrote first', async () => {
    serveWith(({ method }) => (method === 'PUT' ? problem('stale') : json({ ...empty, currency: 'EUR' })));
    show(<RatesPanel />);
    await userEvent.click(await screen.findByRole('button', { name: 'Give rates' }));
    await userEvent.type(screen.getByRole('textbox', { name: /^A kilogram of oxygen/ }), '0.3');
    await userEvent.click(screen.getByRole('button', { name: 'Save the rates' }));
    await screen.findByText(/changed this/i);
    expect(screen.getByRole<HTMLInputElement>('textbox', { name: /^A kilogram of oxygen/ }).value).toBe('0.3');
  });
});
