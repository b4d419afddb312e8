import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { CornerSheet } from '@/components/corners/corner-sheet.tsx';
import { PlanTotals } from '@/components/corners/plan-totals.tsx';
import { forgetDraft } from '@/components/pierce/kept-drafts.ts';
import { RevisionScreen } from '@/components/pierce/revision-screen.tsx';
import { cornerText } from '@/components/text/corners.ts';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import { arcOf, lineBetween } from '@/strategy/path/index.ts';
import { ids, json, problem, serveWith, show } from '../support/page.tsx';
import { corner, planOf } from './corner-plan-fixtures.ts';
import { grades, machine, nozzle, revisionOf } from './strategy-fixtures.ts';

afterEach(() => {
  vi.unstubAllGlobals();
  forgetDraft(ids.user, ids.revision);
});

const treated: CornerPlan['corners'] = [
  corner(0, {
    treatment: 'ease',
    treated: 420,
    addedTime: 0.6,
    ease: {
      before: 5e-3,
      after: 3e-3,
      feedShare: 0.4,
      powerShare: 0.5,
      segments: [lineBetween({ x: 0, y: 5e-3 }, { x: 0, y: 0 })],
    },
  }),
  corner(1, {
    treatment: 'round',
    treated: 500,
    addedTime: -0.1,
    round: {
      radius: 1e-3,
      deviation: 4.14e-4,
      finished: [arcOf({ x: 0.099, y: 1e-3 }, 1e-3, -Math.PI / 2, Math.PI / 2)],
    },
    options: [
      { treatment: 'leave', fits: true, returnTemperature: 480, addedTime: 0, why: 'untreated', at: null },
      { treatment: 'round', fits: true, returnTemperature: 500, addedTime: -0.1, why: 'rounded', at: null },
    ],
  }),
  corner(2, {
    treatment: 'loop',
    treated: 430,
    addedTime: 2,
    caution: 'the slug, 12.0 mm wide, can tip on a slat',
    loop: {
      shape: 'flat',
      radius: 1e-3,
      extension: 7e-3,
      length: 0.027,
      slugArea: 3e-5,
      segments: [lineBetween({ x: 0.1, y: 0.1 }, { x: 0.1, y: 0.107 })],
      slug: [],
    },
  }),
  corner(3),
];

const open = (number: number) =>
  show(
    <CornerSheet
      corner={treated[number - 1] ?? corner(0)}
      number={number}
      plan={planOf()}
      onOverride={null}
      busy={false}
      onTurn={() => undefined}
      first={number === 1}
      last={number === treated.length}
      onShow={() => undefined}
      onClose={() => undefined}
    />,
    'programmer',
  );

describe('the sheet of a corner', () => {
  it('that is eased says over what length on each side and down to what feed and power', async () => {
    open(1);
    expect(await screen.findByRole('heading', { name: 'Ease, 90° inside the part' })).toBeTruthy();
    expect(screen.getByText('5 mm into, 3 mm out of it')).toBeTruthy();
    expect(screen.getByText('40 % of the feed, 50 % of the mean power')).toBeTruthy();
  });

  it('that is rounded says with what radius, how far off the drawing, and that it takes less time', async () => {
    open(2);
    expect(await screen.findByRole('heading', { name: 'Round, 90° inside the part' })).toBeTruthy();
    expect(screen.getByText('radius 1 mm, 0.414 mm off the drawing')).toBeTruthy();
    // among the figures and at the option itself
    expect(screen.getAllByText('−0.1 s')).toHaveLength(2);
  });

  it('with a flat loop says so, and cautions about a slug that can tip', async () => {
    open(3);
    expect(await screen.findByText('flat, arcs of 1 mm, runs on 7 mm, 27 mm long')).toBeTruthy();
    expect(screen.getByText('The slug, 12.0 mm wide, can tip on a slat.')).toBeTruthy();
  });
});

describe('the title block of a corner plan', () => {
  it('counts eases and rounds beside loops and dwells, and so does what is read aloud of the drawing', async () => {
    const totals = { ...planOf().totals, eases: 1, rounds: 2 };
    show(<PlanTotals plan={planOf({ corners: treated, totals })} />, 'programmer');
    expect(await screen.findByText('eases')).toBeTruthy();
    expect(screen.getByText('rounds')).toBeTruthy();
    expect(cornerText.drawing('Bracket', totals)).toContain('1 loop, 1 dwell, 1 ease, 2 rounds, 1 in trouble');
    expect(cornerText.drawing('Bracket', planOf().totals)).toContain('1 loop, 1 dwell, 1 in trouble');
  });
});

describe('the corner rules of a draft', () => {
  it('allow eases and rounds with numbers to start from, which older strategies have not', async () => {
    const revision = revisionOf();
    const requests = serveWith(({ method, path }) => {
      if (path === '/api/machines') return json({ items: [machine] });
      if (path === '/api/nozzles') return json({ items: [nozzle] });
      if (path === '/api/grades') return json({ items: grades });
      if (path === `/api/revisions/${revision.id}`)
        return json(method === 'GET' ? revision : { ...revision, version: 9 });
      if (path === `/api/strategies/${revision.strategyId}`)
        return json({ id: revision.strategyId, version: 2, name: revision.strategyName, revisions: [revision] });
      return problem('not-found');
    });
    show(<RevisionScreen id={ids.revision} />, 'engineer');
    const eases = await screen.findByRole('checkbox', { name: 'Corners may be eased' });
    expect(eases.getAttribute('aria-checked') ?? String((eases as HTMLInputElement).checked)).toBe('false');
    await userEvent.click(eases);
    expect(await screen.findByRole('textbox', { name: 'Length of the ease, mm' })).toBeTruthy();
    await userEvent.click(screen.getByRole('checkbox', { name: 'Corners may be rounded' }));
    const tolerance = await screen.findByRole<HTMLInputElement>('textbox', { name: 'Allowed off the drawing, mm' });
    await userEvent.clear(tolerance);
    await userEvent.type(tolerance, '0.3');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    const saves = () => requests.filter(({ method, path }) => method === 'PUT' && path.startsWith('/api/revisions'));
    await waitFor(() => expect(saves()).toHaveLength(1));
    const [saved] = saves();
    expect(saved?.body).toMatchObject({
      content: {
        cornerRules: { ease: { allowed: true, length: 5e-3 }, round: { allowed: true, tolerance: 3e-4 } },
      },
    });
  });
});
