import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { PlateCorrectForm } from '@/components/plates/plate-correct-form.tsx';
import { PlateNewScreen } from '@/components/plates/plate-new-screen.tsx';
import { FilePicker } from '@/components/ui/file-picker.tsx';
import type { Plate } from '@/shared/plates.ts';
import { router } from '../support/expo-router.tsx';
import { ids, json, offline, problem, serveWith, show } from '../support/page.tsx';

afterEach(() => {
  vi.unstubAllGlobals();
  router.replace.mockClear();
});

const grade = { id: ids.grade, name: 'S355J2+N', group: 'S355' };
const plate: Plate = {
  id: ids.plate,
  version: 1,
  tag: 'B-2207',
  gradeId: ids.grade,
  heatNumber: '81 443',
  nominalThickness: 20_000,
  measuredThickness: null,
  surface: 'mill scale',
  certificate: '',
  length: null,
  width: null,
  grade,
  changedAt: '2031-03-01T09:00:00Z',
};
const field = (label: string | RegExp) => screen.getByLabelText<HTMLInputElement>(label);
const press = (name: string) => userEvent.click(screen.getByRole('button', { name }));

describe('booking a plate in', () => {
  it('says in words what is missing at each field', async () => {
    serveWith(() => json({ items: [grade] }));
    show(<PlateNewScreen />);
    await screen.findByLabelText('Grade');
    await press('Book it in');
    expect(await screen.findByText('Type the plate’s tag.')).toBeTruthy();
    expect(screen.getByText('Choose the grade.')).toBeTruthy();
    expect(screen.getByText('Give a thickness within 1 to 60 mm.')).toBeTruthy();
    expect(document.body.textContent).not.toContain('Invalid input');
  });

  it('sends whole micrometres, and opens the plate', async () => {
    const requests = serveWith((asked) =>
      asked.method === 'GET' ? json({ items: [grade] }) : json({ ...plate, nominalThickness: 19_050 }, 201),
    );
    show(<PlateNewScreen />);
    await userEvent.selectOptions(await screen.findByLabelText('Grade'), 'S355J2+N');
    await userEvent.type(field('Tag'), ' B-2207 ');
    await userEvent.type(field('Nominal thickness'), '3/4 in');
    await press('Book it in');
    await waitFor(() => expect(router.replace).toHaveBeenCalledWith(`/plates/${ids.plate}`));
    expect(requests.find((asked) => asked.method === 'POST')?.body).toMatchObject({
      tag: 'B-2207',
      gradeId: ids.grade,
      nominalThickness: 19_050,
      measuredThickness: null,
      length: null,
    });
  });

  it('takes garbage in a field that may stay empty for a mistake, not for empty', async () => {
    serveWith(() => json({ items: [grade] }));
    show(<PlateNewScreen />);
    await userEvent.selectOptions(await screen.findByLabelText('Grade'), 'S355J2+N');
    await userEvent.type(field('Tag'), 'B-2207');
    await userEvent.type(field('Nominal thickness'), '20');
    await userEvent.type(field(/^Measured thickness/), 'about 20');
    await press('Book it in');
    expect(await screen.findByText(/does not begin with a number/)).toBeTruthy();
    expect(router.replace).not.toHaveBeenCalled();
  });

  it('makes one plate of two presses with a lost connection between them', async () => {
    let tries = 0;
    const requests = serveWith((asked) => {
      if (asked.method === 'GET') return json({ items: [grade] });
      return tries++ === 0 ? offline() : json(plate, 201);
    });
    show(<PlateNewScreen />);
    await userEvent.selectOptions(await screen.findByLabelText('Grade'), 'S355J2+N');
    await userEvent.type(field('Tag'), 'B-2207');
    await userEvent.type(field('Nominal thickness'), '20');
    await press('Book it in');
    expect(await screen.findByText('No connection')).toBeTruthy();
    expect(field('Tag').value).toBe('B-2207');
    await press('Book it in');
    await waitFor(() => expect(router.replace).toHaveBeenCalled());
    const [first, second] = requests.filter((asked) => asked.method === 'POST');
    expect(second?.headers.get('idempotency-key')).toBe(first?.headers.get('idempotency-key'));
    expect(second?.body).toEqual(first?.body);
  });
});

describe('correcting a plate', () => {
  it('keeps one’s text beside the other person’s, and takes theirs only when told to', async () => {
    const theirs: Plate = { ...plate, version: 2, heatNumber: '99 001' };
    serveWith((asked) =>
      asked.method === 'PUT' ? problem('stale') : json(asked.path === '/api/grades' ? { items: [grade] } : theirs),
    );
    show(<PlateCorrectForm plate={plate} />);
    await screen.findByLabelText('Grade');
    await userEvent.clear(field(/^Heat number/));
    await userEvent.type(field(/^Heat number/), '81 444');
    await press('Save the correction');
    await screen.findByText('Somebody changed this meanwhile');
    await press('Load the newest');
    expect(await screen.findByText('The newest is loaded')).toBeTruthy();
    expect(field(/^Heat number/).value).toBe('81 444');
    await press('Drop my text and take theirs');
    expect(field(/^Heat number/).value).toBe('99 001');
  });

  it('says that it is saved', async () => {
    serveWith((asked) =>
      asked.method === 'PUT'
        ? json({ ...plate, version: 2 })
        : json({ items: asked.path === '/api/grades' ? [grade] : [] }),
    );
    show(<PlateCorrectForm plate={plate} />);
    await screen.findByLabelText('Grade');
    await press('Save the correction');
    expect(await screen.findByText('Saved.')).toBeTruthy();
  });
});

describe('a file that is chosen', () => {
  function Chosen() {
    const [file, setFile] = useState<File | null>(null);
    return <FilePicker label="Drawing" file={file} onChange={setFile} maxBytes={20} />;
  }
  const pick = (name: string, content: string) =>
    userEvent.upload(screen.getByLabelText('Drawing'), new File([content], name));

  it('is named with its size, and can be taken away again', async () => {
    show(<Chosen />);
    await pick('bracket.dxf', '0123456789');
    expect(screen.getByText('bracket.dxf')).toBeTruthy();
    expect(screen.getByText(/10 B/)).toBeTruthy();
    await press('Remove bracket.dxf');
    expect(screen.queryByText('bracket.dxf')).toBeNull();
  });

  it('stays chosen when it is too large, with how large it may be', async () => {
    show(<Chosen />);
    await pick('nest.dxf', 'x'.repeat(30));
    expect(screen.getByText(/“nest\.dxf” has 30 B; at most 20 B are taken\./)).toBeTruthy();
    expect(screen.getByText('nest.dxf')).toBeTruthy();
    await pick('bracket.dxf', '0123456789');
    expect(screen.queryByText(/are taken\./)).toBeNull();
  });
});
