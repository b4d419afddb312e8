import { screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { AtTheMachineScreen } from '@/components/card/at-the-machine-screen.tsx';
import { rampFigure } from '@/components/card/card-figures.ts';
import { CardScreen } from '@/components/card/card-screen.tsx';
import { ReportNewScreen } from '@/components/card/report-new-screen.tsx';
import { agoText } from '@/components/text/moments.ts';
import { cardOf } from '../support/cards.ts';
import { router } from '../support/expo-router.tsx';
import { ids, json, offline, problem, serveWith, show } from '../support/page.tsx';
import { approvedCard, grades, machine } from './strategy-fixtures.ts';

beforeEach(() => router.push.mockClear());
afterEach(() => vi.unstubAllGlobals());

const second = { ...machine, id: ids.other, name: 'No. 1, 4 kW' };

describe('at the machine', () => {
  it('asks which machine, remembers it, and goes to the plate’s card', async () => {
    serveWith(() => json({ items: [machine, second] }));
    const first = show(<AtTheMachineScreen />, 'operator');
    await userEvent.click(await screen.findByRole('button', { name: 'No. 2, 10 kW' }));
    await userEvent.type(await screen.findByRole('textbox', { name: 'Plate tag' }), ' B-2207 {Enter}');
    expect(router.push).toHaveBeenCalledWith({ pathname: '/card', params: { machine: ids.machine, tag: 'B-2207' } });
    first.unmount();
    show(<AtTheMachineScreen />, 'operator');
    expect(await screen.findByRole('heading', { name: 'No. 2, 10 kW' })).toBeTruthy();
    expect(screen.getByRole('textbox', { name: 'Plate tag' })).toBeTruthy();
  });

  it('does not go anywhere without a tag, and says so', async () => {
    serveWith(() => json({ items: [machine] }));
    show(<AtTheMachineScreen />, 'operator');
    await userEvent.click(await screen.findByRole('button', { name: 'Show the card' }));
    expect(screen.getByText('Type the plate’s tag.')).toBeTruthy();
    expect(router.push).not.toHaveBeenCalled();
  });

  it('takes grade and thickness by hand for a plate without a tag, in inches too', async () => {
    serveWith(({ path }) => json({ items: path === '/api/grades' ? grades : [machine] }));
    show(<AtTheMachineScreen />, 'operator');
    await userEvent.click(await screen.findByRole('button', { name: 'The plate has no tag' }));
    await userEvent.click(await screen.findByRole('radio', { name: 'S355' }));
    await userEvent.type(screen.getByRole('textbox', { name: 'Nominal thickness' }), '3/4 in');
    await userEvent.click(screen.getByRole('button', { name: 'Show the card' }));
    expect(router.push).toHaveBeenCalledWith({
      pathname: '/card',
      params: { machine: ids.machine, gradeGroup: 'S355', thickness: '19050' },
    });
  });
});

describe('the plate card', () => {
  it('says cautions before checks, and both before the numbers', async () => {
    serveWith(() => json(approvedCard()));
    const { container } = show(<CardScreen machineId={ids.machine} tag="B-2207" />, 'operator');
    await screen.findByRole('heading', { name: 'S355J2, 20 mm' });
    const text = container.textContent;
    const order = [
      'Measured at 22.3 mm, outside',
      'Before you start',
      'Stage 1',
      'The cut',
      'Estimates for this plate',
    ];
    const places = order.map((words) => text.indexOf(words));
    expect(places).not.toContain(-1);
    expect(places).toEqual([...places].sort((a, b) => a - b));
  });

  it('gives focus as the number to type on this machine’s reversed dial, not as the focus position', async () => {
    serveWith(() => json(approvedCard()));
    show(<CardScreen machineId={ids.machine} tag="B-2207" />, 'operator');
    const stage = await screen.findByRole('group', { name: 'Stage 1' });
    expect(stage.textContent).toContain('−2.27');
    expect(stage.textContent).not.toContain('+5');
  });

  it('names the nozzle and the hottest plate to be ticked, and shows the numbers without any tick', async () => {
    serveWith(() => json(approvedCard()));
    show(<CardScreen machineId={ids.machine} tag="B-2207" />, 'operator');
    const nozzle = await screen.findByRole<HTMLInputElement>('checkbox', { name: /Nozzle fitted: double, 1.5 mm/ });
    expect(nozzle.checked).toBe(false);
    expect(screen.getByRole('checkbox', { name: 'Plate below 200 °C' })).toBeTruthy();
    expect(screen.getByRole('group', { name: 'Stage 4' })).toBeTruthy();
    await userEvent.click(nozzle);
    expect(nozzle.checked).toBe(true);
  });

  it('keeps the way to say that it went wrong at hand, with revision, machine and plate', async () => {
    serveWith(() => json(approvedCard()));
    show(<CardScreen machineId={ids.machine} tag="B-2207" />, 'operator');
    const link = await screen.findByRole('link', { name: 'It went wrong' });
    const address = new URL(link.getAttribute('href') ?? '', 'http://here');
    expect(address.pathname).toBe('/report');
    expect(address.searchParams.get('revision')).toBe(ids.revision);
    expect(address.searchParams.get('plate')).toBe(ids.plate);
    expect(address.searchParams.get('thickness')).toBe('20000');
  });

  it('says loudly when the card is one kept on the device, and from when', async () => {
    serveWith(() => json(approvedCard()));
    const first = show(<CardScreen machineId={ids.machine} tag="B-2207" />, 'operator');
    await screen.findByRole('group', { name: 'Stage 1' });
    expect(screen.queryByText(/No connection/)).toBeNull();
    first.unmount();
    serveWith(() => offline());
    show(<CardScreen machineId={ids.machine} tag="B-2207" />, 'operator');
    expect(await screen.findByText('No connection: this card was kept on this device')).toBeTruthy();
    expect(screen.getByText(/It may have been withdrawn since/)).toBeTruthy();
    expect(screen.getByRole('group', { name: 'Stage 1' })).toBeTruthy();
  });

  it('says plainly that a tag is unknown and offers grade and thickness by hand', async () => {
    serveWith(({ path }) => (path.startsWith('/api/card') ? problem('not-found') : json({ items: grades })));
    show(<CardScreen machineId={ids.machine} tag="X-1" />, 'operator');
    expect(await screen.findByRole('heading', { name: 'No plate “X-1” is booked in' })).toBeTruthy();
    expect(await screen.findByRole('radio', { name: 'S275' })).toBeTruthy();
    expect(screen.getByRole('textbox', { name: 'Nominal thickness' })).toBeTruthy();
  });

  it('never shows a neighbour’s numbers: without an approved strategy it says so and asks the engineers once', async () => {
    const requests = serveWith(({ method, body }) =>
      method === 'POST'
        ? json({
            ...(body as object), // the client's own request
            machine: { id: ids.machine, name: 'No. 2' },
            plateTag: null,
            by: { id: ids.user, name: 'Operator' },
            at: '2031-03-03T14:02:00Z',
            answered: false,
          })
        : json(cardOf()),
    );
    show(<CardScreen machineId={ids.machine} gradeGroup="S355" thickness={20_000} />, 'operator');
    expect(await screen.findByText('No approved strategy')).toBeTruthy();
    expect(screen.queryByRole('group', { name: /Stage/ })).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Ask the engineers' }));
    expect(await screen.findByText('The engineers have been asked.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Ask the engineers' })).toBeNull();
    expect(requests.filter(({ method }) => method === 'POST').map(({ body }) => body)).toMatchObject([
      { machineId: ids.machine, gradeGroup: 'S355', thickness: 20_000, plateId: null },
    ]);
  });
});

describe('a report that it went wrong', () => {
  it('keeps kind, words and picture when the connection is lost, and sends them as one attempt', async () => {
    let up = false;
    const requests = serveWith(() => (up ? json(reportAnswer) : offline()));
    show(<ReportNewScreen revisionId={ids.revision} machineId={ids.machine} plateId={ids.plate} />, 'operator');
    await userEvent.click(screen.getByRole('button', { name: 'Tell the engineers' }));
    expect(screen.getByText('Choose what happened.')).toBeTruthy();
    await userEvent.click(screen.getByRole('radio', { name: 'It erupted' }));
    await userEvent.type(screen.getByRole('textbox', { name: /In your words/ }), 'At the third hole');
    await userEvent.click(screen.getByRole('button', { name: 'Tell the engineers' }));
    expect(await screen.findByText('No connection')).toBeTruthy();
    expect(screen.getByRole<HTMLTextAreaElement>('textbox', { name: /In your words/ }).value).toBe('At the third hole');
    expect(screen.getByRole<HTMLInputElement>('radio', { name: 'It erupted' }).checked).toBe(true);
    up = true;
    await userEvent.click(screen.getByRole('button', { name: 'Tell the engineers' }));
    expect(await screen.findByRole('heading', { name: 'Sent' })).toBeTruthy();
    const keys = requests.map(({ headers }) => headers.get('idempotency-key'));
    expect(keys).toHaveLength(2);
    expect(new Set(keys).size).toBe(1);
  });
});

const reportAnswer = {
  id: ids.report,
  version: 1,
  kind: 'erupted',
  words: 'At the third hole',
  by: { id: ids.user, name: 'Operator' },
  at: '2031-03-03T14:02:00Z',
  strategy: { id: ids.strategy, name: 'Bearing plate' },
  revision: { id: ids.revision, number: 3 },
  machine: { id: ids.machine, name: 'No. 2' },
  plateTag: 'B-2207',
  photo: null,
  closed: null,
};

describe('figures on the card', () => {
  it('shows a ramp in one unit, and one number where nothing changes', () => {
    expect(rampFigure(80, 1400, 'power', 'metric')).toEqual({ value: '0.08 → 1.4', unit: 'kW' });
    expect(rampFigure(4e-3, 4e-3, 'length', 'metric')).toEqual({ value: '4', unit: 'mm' });
  });

  it('tells how old a card is in the words of the hall', () => {
    const now = Date.parse('2031-03-03T14:05:10Z');
    expect(agoText('2031-03-03T14:05:00Z', now)).toBe('just now');
    expect(agoText('2031-03-03T14:02:00Z', now)).toBe('3 min ago');
    expect(agoText('2031-03-03T09:00:00Z', now)).toBe('5 h ago');
    expect(agoText('2031-02-27T14:00:00Z', now)).toBe('4 days ago');
    // a device whose clock is behind the server's
    expect(agoText('2031-03-03T14:06:00Z', now)).toBe('just now');
  });
});
