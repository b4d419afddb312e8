import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { cornersInward } from '@/components/corners/corner-inward.ts';
import { CornerPlanScreen } from '@/components/corners/corner-plan-screen.tsx';
import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import { arcOf, lineBetween } from '@/strategy/path/index.ts';
import { ids, json, problem, serveWith, show } from '../support/page.tsx';

afterEach(() => vi.unstubAllGlobals());

const square = [
  { x: 0, y: 0 },
  { x: 0.1, y: 0 },
  { x: 0.1, y: 0.1 },
  { x: 0, y: 0.1 },
];
const segments = square.map((start, i) => lineBetween(start, square[(i + 1) % 4] ?? start));

const corner = (n: number, more: Partial<PlannedCorner> = {}): PlannedCorner => ({
  id: `c0-${n}`,
  contourId: 'c0',
  at: square[n] ?? { x: 0, y: 0 },
  angle: Math.PI / 2,
  convex: true,
  treatment: 'leave',
  why: 'the tip returns at 180 °C, under the limit',
  chosenBy: 'rule',
  untreated: 453.15,
  treated: 453.15,
  straightEdge: 330,
  addedTime: 0,
  dwell: null,
  loop: null,
  options: [
    {
      treatment: 'leave',
      fits: true,
      returnTemperature: 453.15,
      addedTime: 0,
      why: 'the tip returns at 180 °C',
      at: null,
    },
    {
      treatment: 'loop',
      fits: false,
      returnTemperature: null,
      addedTime: null,
      why: 'the loop would come within 1 mm of the plate’s edge',
      at: { x: 0.12, y: -0.005 },
    },
    { treatment: 'dwell', fits: true, returnTemperature: 400, addedTime: 1.2, why: 'after waiting 1.2 s', at: null },
  ],
  trouble: null,
  ...more,
});

const planOf = (more: Partial<CornerPlan> = {}): CornerPlan => ({
  id: ids.report,
  version: 5,
  part: {
    id: ids.plate,
    name: 'Bracket',
    contours: [{ id: 'c0', depth: 0, role: 'outer', parent: null, layer: 'CUT', segments }],
  },
  revision: {
    id: ids.revision,
    number: 3,
    strategyId: ids.strategy,
    strategyName: 'Bearing plate',
    state: 'approved',
    approved: true,
  },
  thickness: 0.02,
  plateTemperature: 293.15,
  skeleton: { left: 0.02, right: 0.02, below: 0.02, above: 0.02 },
  overrides: {},
  limit: 523.15,
  cutting: { feed: 0.02, acceleration: 2, jerk: 50, travel: 1, pierce: 1.5, kerfWidth: 5e-4 },
  corners: [
    corner(0),
    corner(1, {
      treatment: 'loop',
      untreated: 700,
      treated: 450,
      addedTime: 2.6,
      loop: {
        radius: 5e-3,
        extension: 5e-3,
        length: 0.0336,
        slugArea: 4e-5,
        segments: [arcOf({ x: 0.105, y: -0.005 }, 5e-3, 0, 4)],
        slug: [],
      },
    }),
    corner(2, { trouble: 'nothing keeps this tip under the limit', treated: 700, untreated: 700 }),
    corner(3, { treatment: 'dwell', dwell: 1.2, treated: 400, addedTime: 1.2 }),
  ],
  totals: {
    corners: 4,
    loops: 1,
    dwells: 1,
    trouble: 1,
    addedTime: 3.8,
    addedLength: 0.0336,
    addedOxygen: 0.004,
    hottestUntreated: 700,
    hottestTreated: 700,
  },
  changedAt: '2031-03-03T14:02:00Z',
  changedBy: { id: ids.user, name: 'Programmer' },
  ...more,
});

const rowOf = (number: number) => screen.findByRole('button', { name: new RegExp(`^Corner ${number},`) });

describe('a corner plan', () => {
  it('lists each corner with angle, treatment and both return temperatures, trouble included', async () => {
    serveWith(({ path }) => json(path.startsWith('/api/corner-plans') ? planOf() : { items: [] }));
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    expect((await rowOf(2)).getAttribute('aria-label')).toBe(
      'Corner 2, 90° inside the part: loop, back at 177 °C instead of 427 °C',
    );
    expect((await rowOf(3)).getAttribute('aria-label')).toContain('Trouble: nothing keeps this tip');
    expect(screen.getByRole('img', { name: /4 corners: 1 loop, 1 dwell, 1 in trouble/ })).toBeTruthy();
    expect(screen.getAllByTestId('drawing-loop')).toHaveLength(1);
    expect(screen.getAllByTestId('drawing-mark')).toHaveLength(4);
  });

  it('opens a corner’s sheet with what else would do and why it would not', async () => {
    serveWith(({ path }) => json(path.startsWith('/api/corner-plans') ? planOf() : { items: [] }));
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await rowOf(1));
    expect(await screen.findByRole('heading', { name: 'Leave, 90° inside the part' })).toBeTruthy();
    expect(screen.getByText('The loop would come within 1 mm of the plate’s edge.')).toBeTruthy();
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Choose the loop' }).disabled).toBe(true);
  });

  it('plans again with what a person chose for a corner, from the version that was seen', async () => {
    const requests = serveWith(({ method, path }) => {
      if (!path.startsWith('/api/corner-plans')) return json({ items: [] });
      return json(method === 'PUT' ? planOf({ version: 6, overrides: { 'c0-0': 'dwell' } }) : planOf());
    });
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await rowOf(1));
    await userEvent.click(await screen.findByRole('button', { name: 'Choose the dwell' }));
    await screen.findByText('1 corner chosen by hand');
    const put = requests.find(({ method }) => method === 'PUT');
    expect(put?.headers.get('if-match')).toBe('"5"');
    expect(put?.body).toMatchObject({ overrides: { 'c0-0': 'dwell' }, thickness: 0.02, revisionId: ids.revision });
  });

  it('asks what to do when somebody else planned first, and can plan again over theirs', async () => {
    let puts = 0;
    const requests = serveWith(({ method, path }) => {
      if (!path.startsWith('/api/corner-plans')) return json({ items: [] });
      if (method !== 'PUT') return json(planOf({ version: puts > 0 ? 9 : 5 }));
      puts += 1;
      return puts === 1 ? problem('stale') : json(planOf({ version: 10, overrides: { 'c0-0': 'dwell' } }));
    });
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await rowOf(1));
    await userEvent.click(await screen.findByRole('button', { name: 'Choose the dwell' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Plan again with mine' }));
    await waitFor(() => expect(puts).toBe(2));
    expect(requests.filter(({ method }) => method === 'PUT')[1]?.headers.get('if-match')).toBe('"9"');
  });

  it('is read only for an operator, who is not asked for strategies', async () => {
    const requests = serveWith(() => json(planOf()));
    show(<CornerPlanScreen id={ids.report} />, 'operator');
    await userEvent.click(await rowOf(1));
    expect(screen.queryByRole('button', { name: 'Choose the dwell' })).toBeNull();
    expect(screen.queryByRole('button', { name: 'Plan with these' })).toBeNull();
    expect(screen.queryByRole('heading', { name: 'Take the cut path away' })).toBeNull();
    expect(requests.map(({ path }) => path)).toEqual([`/api/corner-plans/${ids.report}`]);
  });

  it('warns that a plan of an unapproved revision is on no card', async () => {
    const revision = { ...planOf().revision, state: 'inReview' as const, approved: false };
    serveWith(({ path }) => json(path.startsWith('/api/corner-plans') ? planOf({ revision }) : { items: [] }));
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    expect(await screen.findByText(/not approved \(In review\). It is not shown on a card/)).toBeTruthy();
  });
});

describe('the place of a corner’s badge', () => {
  it('is on the part’s side of the corner', () => {
    const inward = cornersInward(planOf().corners, planOf().part.contours);
    const first = inward.get('c0-0');
    expect(first?.x).toBeCloseTo(Math.SQRT1_2);
    expect(first?.y).toBeCloseTo(Math.SQRT1_2);
    const third = inward.get('c0-2');
    expect(third?.x).toBeCloseTo(-Math.SQRT1_2);
  });
});
