import { useQuery } from '@tanstack/react-query';
import { act, screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { cardQuery } from '@/components/data/cards.ts';
import { cornerPlanQuery } from '@/components/data/corner-plans.ts';
import { setExpired } from '@/components/data/expiry.ts';
import { machinesQuery } from '@/components/data/machines.ts';
import { sessionQuery } from '@/components/data/sessions.ts';
import { RequireActor } from '@/components/shell/actor.tsx';
import { Frame } from '@/components/shell/frame.tsx';
import { isWithin, placesOf } from '@/components/shell/places.ts';
import { TextField } from '@/components/ui/text-field.tsx';
import { cardOf } from '../support/cards.ts';
import { place } from '../support/expo-router.tsx';
import { ids, json, offline, problem, serveWith, sessionOf, show } from '../support/page.tsx';
import { planOf } from './corner-plan-fixtures.ts';

const actorOf = (role: Parameters<typeof sessionOf>[0]) => ({
  userId: ids.user,
  plantId: ids.plant,
  role,
  mayApprove: false,
});

beforeEach(() => {
  setExpired(false);
  place.pathname = '/machines';
});
afterEach(() => vi.unstubAllGlobals());

describe('the list of pages beside a corner plan', () => {
  const current = () => document.querySelector('[aria-current]')?.textContent ?? '';
  const outline = { edge: [], openings: [], width: 3, height: 1.5, of: null };

  it('stands at the layouts for the plan of a layout, at the parts for that of a part', async () => {
    const laid = planOf({ layout: { id: ids.plant, version: 1, newest: 1, outline } });
    place.pathname = `/corner-plans/${laid.id}`;
    const shown = show(<Frame>{null}</Frame>, 'programmer', (client) =>
      client.setQueryData(cornerPlanQuery(laid.id).queryKey, laid),
    );
    await waitFor(() => expect(current()).toContain('layouts'));
    shown.unmount();
    show(<Frame>{null}</Frame>, 'programmer', (client) =>
      client.setQueryData(cornerPlanQuery(laid.id).queryKey, { ...laid, layout: null }),
    );
    await waitFor(() => expect(current()).toContain('Parts'));
  });
});

describe('a page behind the door', () => {
  it('sends a stranger to sign in, and remembers where they were going', async () => {
    show(
      <RequireActor action="machine.read">
        <p>machines</p>
      </RequireActor>,
      null,
    );
    expect((await screen.findByTestId('redirect')).textContent).toBe('/sign-in?next=%2Fmachines');
    expect(screen.queryByText('machines')).toBeNull();
  });

  it('tells an operator that the record is not theirs, with the reason', async () => {
    show(
      <RequireActor action="record.read">
        <p>entries</p>
      </RequireActor>,
      'operator',
    );
    expect(await screen.findByText(/This needs a lead; you are signed in as operator/)).toBeTruthy();
    expect(screen.queryByText('entries')).toBeNull();
  });

  it('asks again when it could not find out who is there', async () => {
    let up = false;
    serveWith(() => (up ? json(sessionOf('lead')) : offline()));
    show(
      <RequireActor action="machine.read">
        <p>machines</p>
      </RequireActor>,
      null,
      (client) => client.removeQueries({ queryKey: sessionQuery().queryKey }),
    );
    const retry = await screen.findByRole('button', { name: 'Try again' });
    up = true;
    await userEvent.click(retry);
    expect(await screen.findByText('machines')).toBeTruthy();
  });
});

describe('a sign-in that ends at work', () => {
  function Work() {
    const [words, setWords] = useState('');
    const machines = useQuery({ ...machinesQuery(), enabled: false });
    return (
      <>
        <TextField label="Words" value={words} onChange={setWords} />
        <button onClick={() => void machines.refetch()}>Fetch</button>
      </>
    );
  }

  it('is asked for over the page, and what was typed stays', async () => {
    let signedIn = false;
    serveWith((asked) => {
      if (asked.method === 'POST') {
        signedIn = true;
        return json(sessionOf('lead'));
      }
      return signedIn ? json({ items: [] }) : problem('signed-out');
    });
    show(
      <Frame>
        <Work />
      </Frame>,
    );
    await userEvent.type(screen.getByLabelText('Words'), 'half a sentence');
    await userEvent.click(screen.getByText('Fetch'));
    expect(await screen.findByText('Your sign-in has ended')).toBeTruthy();
    expect(screen.queryByTestId('redirect')).toBeNull();
    expect(screen.getByLabelText<HTMLInputElement>('Mail address').value).toBe('lead@quay.example');
    await userEvent.type(screen.getByLabelText('Password'), 'right password');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    await waitFor(() => expect(screen.queryByText('Your sign-in has ended')).toBeNull());
    expect(screen.getByLabelText<HTMLInputElement>('Words').value).toBe('half a sentence');
  });

  it('does not throw somebody out who was at work when the session is looked up again', async () => {
    serveWith(() => problem('signed-out'));
    const { client } = show(
      <RequireActor action="machine.read">
        <p>machines</p>
      </RequireActor>,
    );
    await act(() => client.refetchQueries({ queryKey: sessionQuery().queryKey }));
    expect(screen.getByText('machines')).toBeTruthy();
    expect(screen.queryByTestId('redirect')).toBeNull();
  });
});

describe('the list of pages', () => {
  it('offers an operator no closed door', () => {
    expect(placesOf(actorOf('operator')).map((one) => one.path)).toEqual(['/at-the-machine', '/plates', '/machines']);
  });

  it('offers the lead all of them', () => {
    expect(placesOf(actorOf('lead')).map((one) => one.path)).toContain('/record');
    expect(placesOf(actorOf('lead'))).toHaveLength(11);
  });

  it('knows which page an address belongs to', () => {
    expect(isWithin('/revisions/1', '/strategies')).toBe(true);
    expect(isWithin('/card', '/at-the-machine')).toBe(true);
    expect(isWithin('/reports/1', '/reports')).toBe(true);
    expect(isWithin('/report', '/reports')).toBe(false);
    expect(isWithin('/strategies-of-old', '/strategies')).toBe(false);
  });
});

describe('a plate card', () => {
  const asked = { machineId: ids.machine, tag: 'B-2207' };
  function Card() {
    const card = useQuery(cardQuery(asked));
    return (
      <p>{card.data === undefined ? (card.isError ? 'failed' : 'fetching') : card.data.kept ? 'kept' : 'fresh'}</p>
    );
  }

  it('is read from this device when the server is out of reach, and says so', async () => {
    let up = true;
    serveWith(() => (up ? json(cardOf()) : offline()));
    const first = show(<Card />);
    expect(await screen.findByText('fresh')).toBeTruthy();
    first.unmount();
    up = false;
    show(<Card />);
    expect(await screen.findByText('kept')).toBeTruthy();
  });

  it('is not read from this device when the server says no', async () => {
    let up = true;
    serveWith(() => (up ? json(cardOf()) : problem('not-found')));
    const first = show(<Card />);
    expect(await screen.findByText('fresh')).toBeTruthy();
    first.unmount();
    up = false;
    show(<Card />);
    expect(await screen.findByText('failed')).toBeTruthy();
  });
});
