import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import type { ReactNode } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { MachinesScreen } from '@/components/machines/machines-screen.tsx';
import { PeopleScreen } from '@/components/people/people-screen.tsx';
import { PlatesScreen } from '@/components/plates/plates-screen.tsx';
import { RecordScreen } from '@/components/record/record-screen.tsx';
import { ReportsScreen } from '@/components/reports/reports-screen.tsx';
import { ReviewsScreen } from '@/components/reviews/reviews-screen.tsx';
import { machineOf } from '../support/machine-rows.ts';
import { ids, json, offline, problem, serveWith, show, type Answer } from '../support/page.tsx';

afterEach(() => vi.unstubAllGlobals());

const person = { id: ids.other, name: 'Engineer' };
const grade = { id: ids.grade, name: 'S355J2+N', group: 'S355' };
const plate = {
  id: ids.plate,
  version: 1,
  tag: 'B-2207',
  gradeId: ids.grade,
  heatNumber: '81 443',
  nominalThickness: 20_000,
  measuredThickness: 20_120,
  surface: 'mill scale',
  certificate: '',
  length: null,
  width: null,
  grade,
  changedAt: '2031-03-01T09:00:00Z',
};
const report = {
  id: ids.report,
  version: 1,
  kind: 'erupted',
  words: 'Third hole threw up.',
  by: person,
  at: '2031-03-01T09:00:00Z',
  strategy: { id: ids.strategy, name: 'Bearing plate' },
  revision: { id: ids.revision, number: 3 },
  machine: { id: ids.machine, name: 'No. 2' },
  plateTag: 'B-2207',
  photo: null,
  closed: null,
};
const waiting = {
  id: ids.strategy,
  name: 'Bearing plate',
  machine: { id: ids.machine, name: 'No. 2' },
  gradeGroup: 'S355',
  thickness: { min: 18_000, max: 22_000 },
  latest: {
    id: ids.revision,
    number: 4,
    state: 'inReview',
    changedAt: '2031-03-01T09:00:00Z',
    changedBy: person,
    reserveCold: 2.12,
    reserveHot: null,
    bands: [0.3, 0.7, 1],
  },
  approved: null,
  openReports: 0,
  submittedAt: '2031-03-01T10:00:00Z',
  submittedBy: person,
  touchedBy: [person],
};
const member = {
  id: ids.other,
  userId: ids.other,
  version: 2,
  name: 'Programmer of the quay',
  mail: 'programmer@quay.example',
  role: 'programmer',
  mayApprove: false,
  endedAt: null,
};
const entry = {
  sequence: 1,
  at: '2031-03-01T09:00:00Z',
  actorId: ids.user,
  actorName: 'Lead',
  event: 'revision.approved',
  subject: { kind: 'revision', id: ids.revision },
  facts: {},
  hash: 'ab'.repeat(32),
};

type List = {
  name: string;
  screen: ReactNode;
  path: string;
  loading: string;
  empty: string;
  item: unknown;
  content: string | RegExp;
};

const lists: List[] = [
  {
    name: 'machines',
    screen: <MachinesScreen />,
    path: '/api/machines',
    loading: 'Fetching the machines',
    empty: 'No machine yet',
    item: machineOf(),
    content: 'No. 2',
  },
  {
    name: 'plates',
    screen: <PlatesScreen />,
    path: '/api/plates',
    loading: 'Fetching the plates',
    empty: 'No plates are booked in',
    item: plate,
    content: 'B-2207',
  },
  {
    name: 'reviews',
    screen: <ReviewsScreen />,
    path: '/api/reviews',
    loading: 'Fetching what waits for a decision',
    empty: 'Nothing waits for a decision',
    item: waiting,
    content: 'S355, 18 to below 22 mm',
  },
  {
    name: 'reports',
    screen: <ReportsScreen />,
    path: '/api/reports',
    loading: 'Fetching the reports',
    empty: 'Nothing was reported',
    item: report,
    content: 'Third hole threw up.',
  },
  {
    name: 'people',
    screen: <PeopleScreen />,
    path: '/api/people',
    loading: 'Fetching the people',
    empty: 'Nobody yet',
    item: member,
    content: 'Programmer of the quay',
  },
  {
    name: 'the record',
    screen: <RecordScreen />,
    path: '/api/record',
    loading: 'Fetching the record',
    empty: 'Nothing is recorded yet',
    item: entry,
    content: /approved a revision/,
  },
];

/** Other lists on the same page are empty: they are not what is tested. */
const serveList = (list: List, answer: () => Answer) =>
  serveWith((asked) => (asked.path.split('?')[0] === list.path ? answer() : json({ items: [] })));

describe.each(lists)('the list of $name', (list) => {
  it('says that it is being fetched', async () => {
    serveList(list, () => new Promise<Response>(() => undefined));
    show(list.screen);
    expect(await screen.findByText(list.loading)).toBeTruthy();
  });

  it('says what would stand here when it is empty', async () => {
    serveList(list, () => json({ items: [] }));
    show(list.screen);
    expect(await screen.findByText(list.empty)).toBeTruthy();
  });

  it('says that the connection is lost, and fetches again when asked to', async () => {
    let up = false;
    serveList(list, () => (up ? json({ items: [list.item] }) : offline()));
    show(list.screen);
    expect(await screen.findByText('No connection')).toBeTruthy();
    expect(screen.queryByText(list.empty)).toBeNull();
    up = true;
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect((await screen.findAllByText(list.content)).length).toBeGreaterThan(0);
  });

  it('shows what there is', async () => {
    serveList(list, () => json({ items: [list.item] }));
    show(list.screen);
    expect((await screen.findAllByText(list.content)).length).toBeGreaterThan(0);
    expect(screen.queryByText(list.empty)).toBeNull();
  });
});

describe('a plate', () => {
  it('is sought by a part of its tag', async () => {
    const requests = serveWith((asked) => json({ items: asked.path.includes('tag=L-') ? [] : [plate] }));
    show(<PlatesScreen />);
    await screen.findByText('B-2207');
    await userEvent.type(screen.getByLabelText('Tag'), 'L-');
    expect(await screen.findByText('No plate’s tag holds “L-”')).toBeTruthy();
    expect(requests.some((asked) => asked.path === '/api/plates?tag=L-')).toBe(true);
  });

  it('is not booked in by an operator', async () => {
    serveWith(() => json({ items: [plate] }));
    show(<PlatesScreen />, 'operator');
    await screen.findByText('B-2207');
    expect(screen.queryByText('Book a plate in')).toBeNull();
  });
});

describe('a revision that waits for a decision', () => {
  const serve = (touchedBy: unknown[]) =>
    serveWith((asked) => json({ items: asked.path === '/api/reviews' ? [{ ...waiting, touchedBy }] : [] }));

  it('is the second person’s to decide', async () => {
    serve([person]);
    show(<ReviewsScreen />);
    expect(await screen.findByText('You may decide.')).toBeTruthy();
    expect(screen.getByText('reserve 2.12 cold, none hot')).toBeTruthy();
  });

  it('is not decided by whoever wrote in it', async () => {
    serve([person, { id: ids.user, name: 'Lead' }]);
    show(<ReviewsScreen />);
    expect(await screen.findByText(/a second person must decide/)).toBeTruthy();
  });

  it('is not decided by an engineer without the lead’s grant', async () => {
    serve([person]);
    show(<ReviewsScreen />, 'engineer');
    expect(await screen.findByText('Deciding needs the lead’s grant.')).toBeTruthy();
  });
});

describe('a person’s role', () => {
  it('is changed from the version that was seen', async () => {
    const requests = serveWith((asked) =>
      asked.method === 'GET' ? json({ items: [member] }) : json({ ...member, role: 'engineer', version: 3 }),
    );
    show(<PeopleScreen />);
    await userEvent.click(await screen.findByRole('button', { name: 'Change Programmer of the quay' }));
    await userEvent.click(screen.getByLabelText(/Applications engineer/));
    await userEvent.click(screen.getByLabelText(/May approve strategies/));
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    await waitFor(() => expect(requests.some((asked) => asked.method === 'PATCH')).toBe(true));
    const change = requests.find((asked) => asked.method === 'PATCH');
    expect(change).toMatchObject({
      path: `/api/people/${member.id}`,
      body: { role: 'engineer', mayApprove: true },
    });
    expect(change?.headers.get('if-match')).toBe('"2"');
  });

  it('is not changed over somebody else’s change', async () => {
    serveWith((asked) => (asked.method === 'GET' ? json({ items: [member] }) : problem('stale')));
    show(<PeopleScreen />);
    await userEvent.click(await screen.findByRole('button', { name: 'Change Programmer of the quay' }));
    await userEvent.click(screen.getByLabelText(/Cutting lead/));
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText('Somebody changed this meanwhile')).toBeTruthy();
    expect(screen.getByLabelText<HTMLInputElement>(/Cutting lead/).checked).toBe(true);
  });

  it('ends only after asking once more', async () => {
    const requests = serveWith((asked) =>
      asked.method === 'GET' ? json({ items: [member] }) : json({ ...member, endedAt: '2031-03-01T09:00:00Z' }),
    );
    show(<PeopleScreen />);
    await userEvent.click(await screen.findByRole('button', { name: 'Change Programmer of the quay' }));
    await userEvent.click(screen.getByRole('button', { name: 'End the membership' }));
    expect(screen.getByText('End the membership of Programmer of the quay?')).toBeTruthy();
    expect(requests.every((asked) => asked.method === 'GET')).toBe(true);
    await userEvent.click(screen.getByRole('button', { name: 'End the membership' }));
    await waitFor(() => expect(requests.find((asked) => asked.method === 'PATCH')?.body).toEqual({ ended: true }));
  });
});

describe('the record’s chain', () => {
  it('is said to be whole', async () => {
    serveWith((asked) => json(asked.path === '/api/record/check' ? { entries: 12, broken: null } : { items: [entry] }));
    show(<RecordScreen />);
    await userEvent.click(screen.getByRole('button', { name: 'Check the chain' }));
    expect(await screen.findByText('All 12 entries fit their hashes and each other.')).toBeTruthy();
  });

  it('is said to be broken, and where', async () => {
    serveWith((asked) =>
      json(
        asked.path === '/api/record/check'
          ? { entries: 12, broken: { sequence: 7, why: 'its text does not fit its hash.' } }
          : { items: [entry] },
      ),
    );
    show(<RecordScreen />);
    await userEvent.click(screen.getByRole('button', { name: 'Check the chain' }));
    expect(await screen.findByText('The chain breaks at entry 7: its text does not fit its hash.')).toBeTruthy();
  });
});
