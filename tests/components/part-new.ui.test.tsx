import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { PartNewScreen } from '@/components/parts/part-new-screen.tsx';
import type { DrawingReadingWire } from '@/shared/parts.ts';
import { circleOf, lineBetween } from '@/strategy/path/index.ts';
import { router } from '../support/expo-router.tsx';
import { json, offline, problem, serveWith, show } from '../support/page.tsx';

afterEach(() => vi.unstubAllGlobals());

const corners = [
  { x: 0, y: 0 },
  { x: 0.2, y: 0 },
  { x: 0.2, y: 0.1 },
  { x: 0, y: 0.1 },
];
const reading: DrawingReadingWire = {
  unit: 'mm',
  gapTolerance: 1e-5,
  bounds: { min: { x: 0, y: 0 }, max: { x: 0.2, y: 0.1 } },
  contours: [
    {
      id: 'c0',
      depth: 0,
      role: 'outer',
      parent: null,
      layer: 'CUT',
      segments: corners.map((start, i) => lineBetween(start, corners[(i + 1) % 4] ?? start)),
    },
    { id: 'c1', depth: 1, role: 'hole', parent: 'c0', layer: 'CUT', segments: [circleOf({ x: 0.1, y: 0.05 }, 0.02)] },
  ],
  openChains: [],
  layers: [{ name: 'CUT', pieces: 5, taken: true }],
  leftOut: [{ what: 'text', count: 3, at: [{ x: 0.1, y: 0.05 }], largest: null }],
  repaired: [],
  deviation: 0,
  crossings: [],
  aside: [],
  branches: [],
  tooDense: false,
  questions: [],
};
const asking: DrawingReadingWire = {
  ...reading,
  unit: null,
  questions: [
    {
      kind: 'unit',
      why: 'The drawing does not say its unit.',
      readings: [
        { unit: 'mm', width: 0.2, height: 0.1 },
        { unit: 'inch', width: 5.08, height: 2.54 },
      ],
    },
  ],
};

const drawing = new File(['0\nEOF\n'], 'bracket 12.dxf');
const choose = async () => userEvent.upload(screen.getByLabelText('Drawing'), drawing);
const sent = (body: unknown): unknown => {
  const data = body instanceof FormData ? body.get('data') : null;
  return typeof data === 'string' ? JSON.parse(data) : null;
};

describe('adding a part', () => {
  it('keeps the file chosen when it can’t be read and says what is wrong; the same file is not worth another try', async () => {
    serveWith(() => problem('bad-drawing', 'Line 212 ends within a polyline.'));
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect(await screen.findByText('Line 212 ends within a polyline.')).toBeTruthy();
    expect(screen.getByText('bracket 12.dxf')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull();
  });

  it('keeps a file of more than 10 MiB chosen, says so, and does not send it', async () => {
    const requests = serveWith(() => json(reading));
    show(<PartNewScreen />, 'programmer');
    const large = new File(['0'], 'nest.dxf');
    Object.defineProperty(large, 'size', { value: 10 * 1024 * 1024 + 1 });
    await userEvent.upload(screen.getByLabelText('Drawing'), large);
    expect(screen.getByText(/“nest\.dxf” has 10\.1 MiB; at most 10 MiB are taken\. Draw the part alone/)).toBeTruthy();
    expect(screen.getByText('nest.dxf')).toBeTruthy();
    expect(requests).toHaveLength(0);
  });

  it('keeps a part with gaps only when it was said what should become of them, and leaving them open is an answer', async () => {
    const gaps = {
      kind: 'gaps',
      why: 'One gap of 0.4 mm.',
      gaps: [{ at: { x: 0, y: 0 }, size: 4e-4 }],
      closesAt: 4.1e-4,
    };
    const requests = serveWith(() => json({ ...reading, questions: [gaps] }));
    show(<PartNewScreen />, 'programmer');
    await choose();
    await userEvent.click(await screen.findByRole('button', { name: 'Keep as a part' }));
    expect(await screen.findByText('Say what should become of the gaps first.')).toBeTruthy();
    expect(requests).toHaveLength(1);
    await userEvent.click(screen.getByRole('radio', { name: /Leave them open/ }));
    await waitFor(() => expect(requests).toHaveLength(2));
    expect(sent(requests[1]?.body)).toEqual({ gapTolerance: expect.closeTo(4e-4, 6) as unknown }); // vitest types matchers as any
    expect(screen.getByRole<HTMLInputElement>('radio', { name: /Leave them open/ }).checked).toBe(true);
  });

  it('keeps the file chosen when the connection is lost, and reads it again when asked', async () => {
    let up = false;
    serveWith(() => (up ? json(reading) : offline()));
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect(await screen.findByText('No connection')).toBeTruthy();
    expect(screen.getByText('bracket 12.dxf')).toBeTruthy();
    up = true;
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect(await screen.findByRole('img', { name: /200 × 100 mm, 1 outline, 1 hole/ })).toBeTruthy();
  });

  it('names what was left out, and suggests the file’s name', async () => {
    serveWith(() => json(reading));
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect(await screen.findByText('Left out: 3 × text')).toBeTruthy();
    expect(screen.getByRole<HTMLInputElement>('textbox', { name: 'Name of the part' }).value).toBe('bracket 12');
  });

  it('marks where outlines cross, and does not keep such a drawing', async () => {
    const requests = serveWith(() => json({ ...reading, crossings: [{ x: 0.1, y: 0 }] }));
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect(await screen.findByText(/cross each other at 1 place/)).toBeTruthy();
    // and the text that was left out
    expect(screen.getAllByTestId('drawing-mark')).toHaveLength(2);
    await userEvent.click(screen.getByRole('button', { name: 'Keep as a part' }));
    expect(requests).toHaveLength(1);
  });

  it('marks where something was repaired, how large it was, and takes the marks away when asked', async () => {
    const repaired = [
      {
        what: 'gap closed',
        count: 2,
        at: [
          { x: 0, y: 0 },
          { x: 0.2, y: 0 },
        ],
        largest: 4e-4,
      },
    ];
    serveWith(() => json({ ...reading, leftOut: [], repaired, branches: [{ x: 0.1, y: 0.1 }] }));
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect(await screen.findByText('Repaired: 2 × gap closed, at most 0.4 mm')).toBeTruthy();
    expect(screen.getByText(/More than two ends meet at 1 place/)).toBeTruthy();
    expect(screen.getAllByTestId('drawing-mark')).toHaveLength(3);
    await userEvent.click(screen.getByRole('checkbox', { name: 'Show on the drawing where' }));
    expect(screen.queryAllByTestId('drawing-mark')).toHaveLength(0);
  });

  it('says up to which distance ends were joined, and joins wider ones when asked', async () => {
    const requests = serveWith(() => json(reading));
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect((await screen.findAllByText('Ends up to 0.01 mm apart were joined.')).length).toBeGreaterThan(0);
    await userEvent.click(screen.getByRole('button', { name: 'Join ends that are farther apart' }));
    const field = screen.getByRole('textbox', { name: /Largest gap to close/ });
    await userEvent.clear(field);
    await userEvent.type(field, '0.25');
    await userEvent.tab();
    await waitFor(() => expect(requests).toHaveLength(2));
    expect(sent(requests[1]?.body)).toEqual({ gapTolerance: 2.5e-4 });
  });

  it('asks for the unit with the size in millimetres and inches, and does not keep a part of unknown size', async () => {
    const requests = serveWith(({ body }) =>
      json(JSON.stringify(sent(body)).includes('"unit":"inch"') ? { ...reading, unit: 'inch' } : asking),
    );
    show(<PartNewScreen />, 'programmer');
    await choose();
    expect(await screen.findByText('200 × 100 mm (7.874 × 3.937 in)')).toBeTruthy();
    await userEvent.click(screen.getByRole('button', { name: 'Keep as a part' }));
    expect(await screen.findByText(/Answer the unit first/)).toBeTruthy();
    expect(requests).toHaveLength(1);

    await userEvent.click(screen.getByRole('radio', { name: /Inches/ }));
    await waitFor(() => expect(requests).toHaveLength(2));
    expect(sent(requests[1]?.body)).toEqual({ unit: 'inch' });
    // the question stays, so that the answer can be changed
    expect(await screen.findByRole('radio', { name: /Millimetres/ })).toBeTruthy();
  });

  it('keeps everything when keeping fails, and sends the same attempt again', async () => {
    let up = false;
    const requests = serveWith(({ path, body }) => {
      if (path === '/api/drawings/read') return json(reading);
      if (!up) return offline();
      const given = sent(body) as { id: string; name: string }; // the client's own request
      return json({
        id: given.id,
        version: 1,
        name: given.name,
        fileName: drawing.name,
        fileBytes: drawing.size,
        sha256: 'x',
        reading,
        addedAt: '2031-03-03T14:02:00Z',
        addedBy: { id: given.id, name: 'Programmer' },
        cornerPlans: [],
      });
    });
    show(<PartNewScreen />, 'programmer');
    await choose();
    await userEvent.type(await screen.findByRole('textbox', { name: 'Name of the part' }), ', left');
    await userEvent.click(screen.getByRole('button', { name: 'Keep as a part' }));
    expect(await screen.findByText('No connection')).toBeTruthy();
    expect(screen.getByText('bracket 12.dxf')).toBeTruthy();
    expect(screen.getByRole<HTMLInputElement>('textbox', { name: 'Name of the part' }).value).toBe('bracket 12, left');
    up = true;
    await userEvent.click(screen.getByRole('button', { name: 'Keep as a part' }));
    await waitFor(() => expect(router.replace).toHaveBeenCalledWith(expect.stringMatching(/^\/parts\//)));
    const kept = requests.filter(({ path }) => path === '/api/parts');
    expect(kept).toHaveLength(2);
    expect(kept[0]?.headers.get('idempotency-key')).toBe(kept[1]?.headers.get('idempotency-key'));
  });
});
