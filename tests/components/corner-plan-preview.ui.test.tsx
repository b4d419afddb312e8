import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { CornerPlanScreen } from '@/components/corners/corner-plan-screen.tsx';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import { planOfStars } from '../support/many-corners.ts';
import { ids, json, problem, serveWith, show } from '../support/page.tsx';
import { pathOf, planOf } from './corner-plan-fixtures.ts';

afterEach(() => {
  vi.unstubAllGlobals();
  setWidth(1440);
});

const setWidth = (width: number) => {
  Object.defineProperty(window, 'innerWidth', { value: width, configurable: true, writable: true });
  fireEvent(window, new Event('resize'));
};

/** Plans as asked, a version on each time. */
function serve(first: CornerPlan = planOf()) {
  let now = first;
  return serveWith(({ method, path, body }) => {
    if (path.endsWith('/path')) return json(pathOf(now));
    if (!path.startsWith('/api/corner-plans')) return json({ items: [] });
    if (method === 'PUT') {
      // the body is what the screen has sent, and the requests' own schema is tested with the server
      const { overrides } = body as Pick<CornerPlan, 'overrides'>;
      now = { ...now, version: now.version + 1, overrides };
    }
    return json(now);
  });
}

const rowOf = (number: number) => screen.findByRole('button', { name: new RegExp(`^Corner ${number},`) });
const drawing = () => screen.getByRole('group', { name: /Arrow keys move it/ });
const scaleOf = () =>
  Number(/scale\(([\d.]+)\)/.exec(document.querySelector('g[transform^=scale]')?.getAttribute('transform') ?? '')?.[1]);
const putsOf = (requests: ReturnType<typeof serve>) =>
  requests.filter(({ method }) => method === 'PUT').map(({ headers, body }) => [headers.get('if-match'), body]);

describe('choosing a corner', () => {
  it('in the list enlarges the drawing around it; the next is a press away', async () => {
    serve();
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    const row = await rowOf(2);
    const whole = scaleOf();
    await userEvent.click(row);
    expect(scaleOf()).toBeGreaterThan(whole);
    expect((await rowOf(2)).getAttribute('aria-pressed')).toBe('true');
    await userEvent.click(screen.getByRole('button', { name: 'The corner after' }));
    expect((await rowOf(3)).getAttribute('aria-pressed')).toBe('true');
  });

  it('on a plate of many corners opens its page of the list, which is turned and narrowed by kind', async () => {
    serve(planOfStars(planOf(), 12));
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await rowOf(1);
    expect(screen.queryByRole('button', { name: /^Corner 41,/ })).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Later' }));
    await userEvent.click(await rowOf(41));
    expect(screen.getByText('41 to 80 of 120')).toBeTruthy();
    await userEvent.selectOptions(screen.getByLabelText('Show'), 'Dwell (12)');
    const rows = within(screen.getByRole('list', { name: 'Corners' })).getAllByRole('listitem');
    expect(rows).toHaveLength(12);
  });

  it('on a phone opens a sheet that leaves the drawing free, and Escape closes it', async () => {
    setWidth(390);
    serve();
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await screen.findByRole('button', { name: '4 corners in a list' }));
    const sheet = screen.getByRole('dialog', { name: 'Corners' });
    expect(sheet.contains(document.activeElement)).toBe(true);
    await userEvent.click(await rowOf(2));
    expect(screen.getByRole('dialog', { name: 'Corner 2' })).toBeTruthy();
    await userEvent.keyboard('{Escape}');
    expect(screen.queryByRole('dialog')).toBeNull();
  });
});

describe('a treatment chosen by hand', () => {
  it('is taken back and made again by buttons and keys, each time from the version that is seen', async () => {
    const requests = serve();
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await rowOf(1));
    await userEvent.click(await screen.findByRole('button', { name: 'Choose the dwell' }));
    await screen.findByText('1 corner chosen by hand');
    await userEvent.click(screen.getByRole('button', { name: 'Undo' }));
    await waitFor(() => expect(screen.queryByText('1 corner chosen by hand')).toBeNull());
    drawing().focus();
    await userEvent.keyboard('{Control>}{Shift>}z{/Shift}{/Control}');
    await screen.findByText('1 corner chosen by hand');
    expect(putsOf(requests)).toMatchObject([
      ['"5"', { overrides: { 'c0-0': 'dwell' } }],
      ['"6"', { overrides: {} }],
      ['"7"', { overrides: { 'c0-0': 'dwell' } }],
    ]);
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Redo' }).disabled).toBe(true);
  });

  it('leaves a form’s own keys alone, and an operator without steps', async () => {
    const requests = serve();
    show(<CornerPlanScreen id={ids.report} />, 'operator');
    await rowOf(1);
    expect(screen.queryByRole('button', { name: 'Undo' })).toBeNull();
    await userEvent.keyboard('{Control>}z{/Control}');
    expect(putsOf(requests)).toEqual([]);
  });

  it('is still there when somebody else was first, and what is theirs can’t be taken back', async () => {
    const requests = serveWith(({ method, path }) => {
      if (path.endsWith('/path')) return json(pathOf(planOf()));
      if (!path.startsWith('/api/corner-plans')) return json({ items: [] });
      return method === 'PUT' ? problem('stale') : json(planOf({ version: 9, overrides: { 'c0-2': 'leave' } }));
    });
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await userEvent.click(await rowOf(1));
    await userEvent.click(await screen.findByRole('button', { name: 'Choose the dwell' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Show their plan' }));
    await waitFor(() => expect(screen.queryByRole('button', { name: 'Show their plan' })).toBeNull());
    expect(requests.filter(({ method }) => method === 'PUT')).toHaveLength(1);
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Undo' }).disabled).toBe(true);
  });
});

describe('measuring', () => {
  it('goes from corner to corner by keys, and says distance, across and up', async () => {
    serve();
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await rowOf(1);
    await userEvent.click(screen.getByRole('button', { name: 'Measure' }));
    const frame = screen.getByRole('group', { name: /Enter takes the place/ });
    // 140 mm with its skeleton in 520 px less the margins: corners lie 50 mm from the middle
    const pixels = (0.05 * (520 - 56)) / 0.14;
    const press = (x: number, y: number) => {
      fireEvent.pointerDown(frame, { pointerId: 1, clientX: 320 + x, clientY: 260 + y });
      fireEvent.pointerUp(frame, { pointerId: 1, clientX: 320 + x, clientY: 260 + y });
    };
    press(-pixels + 3, pixels - 4);
    expect(screen.getByText(/^From: corner/)).toBeTruthy();
    press(pixels, -pixels + 5);
    expect(screen.getByText('141.42 mm')).toBeTruthy();
    expect(screen.getAllByText('100 mm')).toHaveLength(2);
    expect(screen.getByText('corner to corner')).toBeTruthy();
    frame.focus();
    await userEvent.keyboard('{Enter}');
    expect(screen.getByText(/^From: free place/)).toBeTruthy();
    expect(screen.queryByTestId('in-the-way')).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Stop measuring' }));
    expect(screen.queryByTestId('measure')).toBeNull();
  });
});

describe('the run of the cut', () => {
  it('is set by keys on the slider, says time and share, and draws what is cut, the head and what has dropped out', async () => {
    serve();
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await rowOf(1);
    const slider = await screen.findByRole('slider', { name: 'Time of the cut' });
    await screen.findByTestId('pierces');
    expect(screen.queryByText(/Run along the finished edges/)).toBeNull();
    expect(screen.queryByTestId('run-head')).toBeNull();
    slider.focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(slider.getAttribute('aria-valuetext')).toMatch(/^1.0 s of [\d.]+ s, \d+ %, piercing outline 0/);
    await userEvent.keyboard('{Shift>}{ArrowRight}{/Shift}');
    expect(slider.getAttribute('aria-valuetext')).toMatch(/^11.0 s of .*cutting outline 0, nothing has dropped out/);
    expect(screen.getByTestId('run-head')).toBeTruthy();
    expect(screen.getAllByTestId('run-cut').length).toBeGreaterThan(0);
    await userEvent.keyboard('{End}');
    expect(slider.getAttribute('aria-valuetext')).toMatch(/100 %, all is cut, 1 piece dropped out/);
    expect(screen.getByTestId('run-dropped')).toBeTruthy();
    await userEvent.keyboard('{PageDown}');
    expect(slider.getAttribute('aria-valuenow')).toBe('0');
  });

  it('says what is not cut as planned, and can be asked for again when it could not be worked out', async () => {
    let asked = 0;
    serveWith(({ path }) => {
      // what it costs is still being worked out
      if (path.endsWith('/estimate')) return new Promise<Response>(() => undefined);
      if (!path.endsWith('/path')) return json(path.startsWith('/api/corner-plans') ? planOf() : { items: [] });
      asked += 1;
      if (asked === 1) return problem('unavailable', 'Too many files at once.');
      const why = 'hole 3 is left out: it is narrower than the kerf';
      return json({ runs: [], problems: [{ contourId: '3', at: { x: 0, y: 0 }, why, leftOut: true }] });
    });
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    // until it is known the cut is run along the edges
    expect(await screen.findByText(/Run along the finished edges/)).toBeTruthy();
    expect(screen.getByRole('slider', { name: 'Time of the cut' })).toBeTruthy();
    await userEvent.click(await screen.findByRole('button', { name: 'Try again' }));
    expect(await screen.findByText('Hole 3 is left out: it is narrower than the kerf.')).toBeTruthy();
    expect(screen.getByText('There is nothing to cut in this plan.')).toBeTruthy();
  });

  it('goes in steps of a second for who wants less movement, and stops when told', async () => {
    vi.stubGlobal('matchMedia', (query: string) => ({
      matches: query.includes('reduced-motion'),
      addEventListener: () => undefined,
      removeEventListener: () => undefined,
    }));
    serve();
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    await rowOf(1);
    const now = () => Number(screen.getByRole('slider', { name: 'Time of the cut' }).getAttribute('aria-valuenow'));
    await userEvent.click(await screen.findByRole('button', { name: 'Run the cut' }));
    expect(now()).toBe(0);
    await waitFor(() => expect(now()).toBeGreaterThanOrEqual(1), { timeout: 4000 });
    expect(now() % 1).toBe(0);
    await userEvent.click(screen.getByRole('button', { name: 'Stop' }));
    expect(screen.getByRole('button', { name: 'Run the cut' })).toBeTruthy();
  });
});
