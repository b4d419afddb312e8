import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { cornersInward } from '@/components/corners/corner-inward.ts';
import { CornerPlanScreen } from '@/components/corners/corner-plan-screen.tsx';
import { ids, json, problem, serveWith, show } from '../support/page.tsx';
import { pathOf, planOf } from './corner-plan-fixtures.ts';

afterEach(() => vi.unstubAllGlobals());

/** The plan, its path, and nothing of anything else. */
const answerTo = (path: string) => {
  if (path.endsWith('/path')) return pathOf(planOf());
  return path.startsWith('/api/corner-plans') ? planOf() : { items: [] };
};

const rowOf = (number: number) => screen.findByRole('button', { name: new RegExp(`^Corner ${number},`) });

describe('a corner plan', () => {
  it('lists each corner with angle, treatment and both return temperatures, trouble included', async () => {
    serveWith(({ path }) => json(answerTo(path)));
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
    serveWith(({ path }) => json(answerTo(path)));
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await rowOf(1));
    expect(await screen.findByRole('heading', { name: 'Leave, 90° inside the part' })).toBeTruthy();
    // in the sheet, and below the drawing where the place is marked
    expect(screen.getAllByText('The loop would come within 1 mm of the plate’s edge.')).toHaveLength(2);
    expect(screen.getByText('In the way of a loop at corner 1')).toBeTruthy();
    expect(screen.getByTestId('in-the-way')).toBeTruthy();
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Choose the loop' }).disabled).toBe(true);
  });

  it('plans again with what a person chose for a corner, from the version that was seen', async () => {
    const requests = serveWith(({ method, path }) => {
      if (!path.startsWith('/api/corner-plans') || path.endsWith('/path')) return json(answerTo(path));
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
      if (!path.startsWith('/api/corner-plans') || path.endsWith('/path')) return json(answerTo(path));
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
    const requests = serveWith(({ path }) => json(answerTo(path)));
    show(<CornerPlanScreen id={ids.report} />, 'operator');
    await userEvent.click(await rowOf(1));
    expect(screen.queryByRole('button', { name: 'Choose the dwell' })).toBeNull();
    expect(screen.queryByRole('button', { name: 'Plan with these' })).toBeNull();
    expect(screen.queryByRole('heading', { name: 'Take the cut path away' })).toBeNull();
    expect(requests.map(({ path }) => path)).toEqual([
      `/api/corner-plans/${ids.report}`,
      `/api/corner-plans/${ids.report}/path`,
    ]);
  });

  it('warns that a plan of an unapproved revision is on no card', async () => {
    const revision = { ...planOf().revision, state: 'inReview' as const, approved: false };
    serveWith(({ path }) => json(path.endsWith(ids.report) ? planOf({ revision }) : answerTo(path)));
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
