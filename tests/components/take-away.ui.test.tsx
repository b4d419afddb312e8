import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { TakeAway } from '@/components/corners/take-away.tsx';
import { BlockFrameSection } from '@/components/machines/block-frame-section.tsx';
import { chooseUnitSystem } from '@/components/ui/unit-system.ts';
import { takeAwayCautions } from '@/shared/take-away.ts';
import { ids, json, problem, serveWith, show } from '../support/page.tsx';

afterEach(() => {
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
  chooseUnitSystem('metric');
});

describe('taking a cut path away', () => {
  /** What the browser was told to save: names, and the bytes under each. */
  let saved: { name: string; bytes: Blob }[];
  beforeEach(() => {
    saved = [];
    let bytes = new Blob();
    vi.spyOn(URL, 'createObjectURL').mockImplementation((given) => {
      bytes = given as Blob; // nothing else is handed to it here
      return 'blob:file';
    });
    vi.spyOn(HTMLAnchorElement.prototype, 'click').mockImplementation(function (this: HTMLAnchorElement) {
      saved.push({ name: this.download, bytes });
    });
  });
  const file = (text: string, name: string) =>
    new Response(text, { headers: { 'content-disposition': `attachment; filename=${name}` } });

  it('stands beside every caution, and says first when the strategy is not approved', () => {
    serveWith(() => json({}));
    const { unmount } = show(<TakeAway planId={ids.report} approved />, 'programmer');
    for (const caution of takeAwayCautions) expect(screen.getByText(caution)).toBeTruthy();
    expect(screen.queryByText(/not approved/)).toBeNull();
    unmount();
    show(<TakeAway planId={ids.report} approved={false} />, 'programmer');
    expect(screen.getByText('The strategy revision is not approved: every file says so.')).toBeTruthy();
  });

  it('saves the file that the server made, under the name it gave, and says so', async () => {
    const asked = serveWith(() => file('0\nSECTION', 'bracket-plan-2-mm.dxf'));
    show(<TakeAway planId={ids.report} approved />, 'programmer');
    await userEvent.click(screen.getByRole('button', { name: 'DXF drawing' }));
    expect(await screen.findByText(/bracket-plan-2-mm\.dxf is saved/)).toBeTruthy();
    expect(asked.map(({ method, path }) => `${method} ${path}`)).toEqual([
      `GET /api/corner-plans/${ids.report}/cut-path?as=dxf&unit=mm`,
    ]);
    expect(saved.map(({ name }) => name)).toEqual(['bracket-plan-2-mm.dxf']);
    expect(await saved[0]?.bytes.text()).toBe('0\nSECTION');
  });

  it('asks in the unit of this device, or in the one chosen', async () => {
    chooseUnitSystem('inch');
    const asked = serveWith(() => file('', 'sheet.pdf'));
    show(<TakeAway planId={ids.report} approved />, 'programmer');
    await userEvent.click(screen.getByRole('button', { name: 'PDF sheet' }));
    await screen.findByText(/is saved/);
    await userEvent.click(screen.getByRole('radio', { name: 'Millimetres' }));
    await userEvent.click(screen.getByRole('button', { name: 'ISO 6983 blocks' }));
    await waitFor(() => expect(saved.length).toBe(2));
    expect(asked.map(({ path }) => path.split('?')[1])).toEqual(['as=pdf&unit=inch', 'as=iso&unit=mm']);
  });

  it('says in a sentence why there is no path, and saves nothing', async () => {
    const why = 'Hole 3 has no room to be pierced: the plate’s edge is nearer than the crater and 2 mm.';
    serveWith(() => problem('no-cut-path', why));
    show(<TakeAway planId={ids.report} approved />, 'programmer');
    await userEvent.click(screen.getByRole('button', { name: 'SVG picture' }));
    expect(await screen.findByText(why)).toBeTruthy();
    expect(screen.getByRole('alert').textContent).toContain('This plan has no cut path');
    expect(saved).toEqual([]);
  });
});

describe('the lines around a machine’s blocks', () => {
  const frame = { version: 4, unit: 'mm', header: 'G71 G90\nG17', footer: 'M30' };
  const section = <BlockFrameSection machineId={ids.machine} />;
  const field = (label: RegExp) => screen.getByLabelText<HTMLTextAreaElement>(label);

  it('are read by a programmer, line by line, without fields', async () => {
    serveWith(() => json({ ...frame, footer: '' }));
    show(section, 'programmer');
    expect((await screen.findByText(/G71 G90/)).textContent).toBe('G71 G90\nG17');
    expect(screen.getByText('none')).toBeTruthy();
    expect(screen.queryByRole('textbox')).toBeNull();
  });

  it('are written by an engineer, as the version they were read at', async () => {
    const asked = serveWith(({ method }) =>
      method === 'PUT' ? json({ ...frame, version: 5, unit: 'inch', header: 'G70', footer: 'M30' }) : json(frame),
    );
    show(section, 'engineer');
    await screen.findByLabelText(/Before the blocks/);
    expect(field(/Before the blocks/).value).toBe('G71 G90\nG17');
    await userEvent.clear(field(/Before the blocks/));
    await userEvent.type(field(/Before the blocks/), 'G70');
    await userEvent.click(screen.getByRole('radio', { name: 'Inches' }));
    await userEvent.click(screen.getByRole('button', { name: 'Save the lines' }));
    expect(await screen.findByText('Saved. The next files have them.')).toBeTruthy();
    const put = asked.find(({ method }) => method === 'PUT');
    expect(put?.body).toEqual({ unit: 'inch', header: 'G70', footer: 'M30' });
    expect(put?.headers.get('if-match')).toBe('"4"');
  });

  it('say at the field which letter is none that a control reads, before anything is sent', async () => {
    const asked = serveWith(() => json(frame));
    show(section, 'lead');
    await screen.findByLabelText(/After the blocks/);
    await userEvent.type(field(/After the blocks/), '{Enter}Grüße');
    await userEvent.click(screen.getByRole('button', { name: 'Save the lines' }));
    expect(await screen.findByText(/Line 2 holds “ü”/)).toBeTruthy();
    expect(asked.every(({ method }) => method === 'GET')).toBe(true);
  });

  it('that somebody else wrote meanwhile are shown beside what was typed, which stays', async () => {
    let current = frame;
    const asked = serveWith(({ method, headers, body }) => {
      if (method === 'GET') return json(current);
      if (headers.get('if-match') !== `"${current.version}"`) return problem('stale');
      current = { ...(body as typeof frame), version: current.version + 1 }; // sent by the form under test
      return json(current);
    });
    show(section, 'engineer');
    await screen.findByLabelText(/After the blocks/);
    current = { ...frame, version: 5, footer: 'M02' };
    await userEvent.type(field(/After the blocks/), '{Enter}%');
    await userEvent.click(screen.getByRole('button', { name: 'Save the lines' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Load the newest' }));
    expect(await screen.findByText('M02')).toBeTruthy();
    expect(field(/After the blocks/).value).toBe('M30\n%');
    await userEvent.click(screen.getByRole('button', { name: 'Save the lines' }));
    expect(await screen.findByText('Saved. The next files have them.')).toBeTruthy();
    expect(current).toMatchObject({ version: 6, footer: 'M30\n%' });
    expect(asked.filter(({ method }) => method === 'PUT').length).toBe(2);
  });
});
