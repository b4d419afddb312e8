import { act, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { CornerPlanScreen } from '@/components/corners/corner-plan-screen.tsx';
import { historyOf } from '@/components/ui/history.ts';
import { formOf, layoutReduce, nextNumber, turnWithin, type LayoutDraft } from '@/components/layouts/layout-draft.ts';
import { LayoutNewScreen } from '@/components/layouts/layout-new-screen.tsx';
import { LayoutScreen } from '@/components/layouts/layout-screen.tsx';
import { LayoutsScreen } from '@/components/layouts/layouts-screen.tsx';
import { laidOut, laidPart, outlineOf, wireOutline, type Layout, type LayoutForm } from '@/shared/layouts.ts';
import { lineBetween } from '@/strategy/path/index.ts';
import { layoutJudged, plateRectangle } from '@/strategy/path/plate/index.ts';
import { router } from '../support/expo-router.tsx';
import { pathOf, planOf } from './corner-plan-fixtures.ts';
import { ids, json, offline, problem, serveWith, show, type Asked } from '../support/page.tsx';

afterEach(() => {
  vi.unstubAllGlobals();
  router.push.mockClear();
  router.replace.mockClear();
});

const rectangle = (x: number, y: number, width: number, height: number, hole = false) => {
  const corners = [
    { x, y },
    { x: x + width, y },
    { x: x + width, y: y + height },
    { x, y: y + height },
  ];
  if (hole) corners.reverse();
  return corners.map((start, i) => lineBetween(start, corners[(i + 1) % 4] ?? start));
};
/** A block 100 × 60 mm with a square hole. */
const block = {
  id: ids.plate,
  name: 'Block',
  contours: [
    {
      id: '1',
      depth: 0,
      role: 'outer' as const,
      parent: null,
      layer: 'CUT',
      segments: rectangle(0, 0, 0.1, 0.06),
    },
    {
      id: '2',
      depth: 1,
      role: 'hole' as const,
      parent: '1',
      layer: 'CUT',
      segments: rectangle(0.04, 0.02, 0.02, 0.02, true),
    },
  ],
};
const piece = (number: number, x: number, y = 0.02) => ({
  number,
  partId: block.id,
  at: { x, y },
  turn: 0,
  mirrored: false,
});

/** As the server would answer: judged by the same rules. */
function layoutOf(more: Partial<LayoutForm> = {}, version = 3): Layout {
  const form: LayoutForm = {
    name: 'Blocks',
    plate: { kind: 'rectangle', width: 1, height: 0.5 },
    kerfWidth: 7e-4,
    clearance: 8e-3,
    edgeMargin: 0.01,
    placements: [piece(1, 0.02), piece(2, 0.3)],
    order: null,
    ...more,
  };
  const parts = form.placements.length > 0 ? [block] : [];
  const outline = plateRectangle(1, 0.5);
  const judged = layoutJudged({
    parts: laidOut(parts, form.placements),
    outline,
    room: form,
    order: form.order,
  });
  return {
    ...form,
    id: ids.report,
    version,
    outline: wireOutline(outline, null),
    parts,
    order: [...judged.order],
    orderBy: form.order === null ? 'computed' : 'hand',
    problems: judged.problems.map((one) => ({ ...one, placements: [...one.placements] })),
    moreProblems: judged.moreProblems,
    travel: judged.travel,
    cutLength: judged.cutLength,
    changedAt: '2031-03-01T09:00:00Z',
    changedBy: { id: ids.other, name: 'Programmer' },
    cornerPlans: [],
  };
}

const partLine = {
  id: block.id,
  name: block.name,
  fileName: 'block.dxf',
  width: 0.1,
  height: 0.06,
  outlines: 1,
  holes: 1,
  addedAt: '2031-03-01T09:00:00Z',
  addedBy: { id: ids.other, name: 'Programmer' },
  cornerPlans: 0,
};
const listed = {
  id: ids.report,
  name: 'Blocks',
  width: 1,
  height: 0.5,
  of: 'Q-2003',
  pieces: 2,
  problems: 1,
  travel: 0.4,
  changedAt: '2031-03-01T09:00:00Z',
  changedBy: { id: ids.other, name: 'Programmer' },
};

/** A server that keeps one layout. */
function serveLayout(first: Layout, onPut?: (asked: Asked) => Response | null) {
  let kept = first;
  const requests = serveWith((asked) => {
    if (asked.path === '/api/parts') return json({ items: [partLine] });
    if (asked.path.startsWith('/api/plates')) return json({ items: [] });
    if (asked.path !== `/api/layouts/${ids.report}`) return json({ items: [] });
    if (asked.method === 'GET') return json(kept);
    const refused = onPut?.(asked);
    if (refused) return refused;
    kept = layoutOf(asked.body as Partial<LayoutForm>, kept.version + 1); // the screen's own form
    return json(kept);
  });
  return {
    requests,
    put: () => requests.filter(({ method }) => method === 'PUT'),
    keep: (one: Layout) => (kept = one),
  };
}

const open = async () => {
  show(<LayoutScreen id={ids.report} />, 'programmer');
  await screen.findByRole('heading', { name: 'Blocks' });
  return userEvent.setup();
};
const choose = (user: ReturnType<typeof userEvent.setup>, name: RegExp) => {
  const list = screen.getByRole('list', { name: 'Pieces' });
  return user.click(within(list).getByRole('button', { name }));
};

describe('the list of plate layouts', () => {
  it('tells of which plate, how many pieces, and that something is in the way', async () => {
    serveWith(() => json({ items: [listed] }));
    show(<LayoutsScreen />, 'programmer');
    const row = await screen.findByRole('link', { name: /Blocks/ });
    expect(row.textContent).toContain('Q-2003, 1000 × 500 mm');
    expect(row.textContent).toContain('2 pieces, 1 problem');
    const user = userEvent.setup();
    await user.type(screen.getByLabelText(/Find by name/), 'lug');
    expect(screen.getByText(/No layout matches/)).toBeTruthy();
  });

  it('says how the first one comes here, and what went wrong', async () => {
    let lost = true;
    serveWith(() => (lost ? offline() : json({ items: [] })));
    show(<LayoutsScreen />, 'programmer');
    const again = await screen.findByRole('button', { name: 'Try again' });
    lost = false;
    await userEvent.setup().click(again);
    expect(await screen.findByText('No plate is laid out yet')).toBeTruthy();
    expect(screen.getAllByRole('link', { name: 'Lay a plate out' }).length).toBeGreaterThan(0);
  });
});

describe('a new layout', () => {
  it('asks for its name and plate, and begins empty', async () => {
    const requests = serveWith(({ method }) => json(method === 'POST' ? layoutOf({ placements: [] }) : { items: [] }));
    show(<LayoutNewScreen />, 'programmer');
    const user = userEvent.setup();
    await user.click(screen.getByRole('button', { name: 'Begin the layout' }));
    expect(screen.getByText('A name is needed.')).toBeTruthy();
    expect(screen.getByText('Give the size of the plate.')).toBeTruthy();
    expect(requests.filter(({ method }) => method === 'POST')).toEqual([]);
    await user.type(screen.getByLabelText('Name of the layout'), 'Blocks');
    await user.type(screen.getByLabelText('Width'), '1 m');
    await user.type(screen.getByLabelText('Height'), '500');
    await user.click(screen.getByRole('button', { name: 'Begin the layout' }));
    await waitFor(() => expect(router.replace).toHaveBeenCalledWith(`/layouts/${ids.report}`));
    expect(requests.find(({ method }) => method === 'POST')?.body).toMatchObject({
      name: 'Blocks',
      plate: { kind: 'rectangle', width: 1, height: 0.5 },
      placements: [],
      order: null,
    });
  });
});

describe('a layout', () => {
  it('shows its plate, its pieces as sentences, and that nothing is in the way', async () => {
    serveLayout(layoutOf());
    await open();
    expect(
      screen.getByRole('img', { name: /Drawing of Blocks: 2 pieces on the plate, nothing in the way/ }),
    ).toBeTruthy();
    expect(screen.getByText('Nothing overlaps, and all keep their distance.')).toBeTruthy();
    const list = screen.getByRole('list', { name: 'Pieces' });
    expect(within(list).getByText('20 mm from the left, 20 mm from below')).toBeTruthy();
    expect(screen.getAllByTestId('drawing-way')).toHaveLength(1);
  });

  it('is changed by typing and pushing, says at once what is in the way, and is saved from the version that was seen', async () => {
    const { put } = serveLayout(layoutOf());
    const user = await open();
    await choose(user, /^Piece 2, Block/);
    const x = screen.getByLabelText(/^From the left/);
    await user.clear(x);
    await user.type(x, '100');
    expect(await screen.findByText(/Part 1, Block, and part 2, Block, overlap or touch/)).toBeTruthy();
    await user.clear(x);
    await user.type(x, '129.3');
    expect(await screen.findByText(/only 9.3 mm stay|Only 9.3 mm stay/)).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Push right by 1 mm' }));
    expect(await screen.findByText('Nothing overlaps, and all keep their distance.')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Quarter turn' }));
    await user.click(screen.getByRole('button', { name: 'Mirror' }));
    expect(screen.getByText('Not saved yet.')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Save the layout' }));
    await waitFor(() => expect(put()).toHaveLength(1));
    expect(put()[0]?.headers.get('if-match')).toBe('"3"');
    const sent = put()[0]?.body as LayoutForm; // the screen's own form
    expect(sent.placements[1]).toMatchObject({ number: 2, mirrored: true });
    expect(sent.placements[1]?.at.x).toBeCloseTo(0.1303, 9);
    expect(sent.placements[1]?.turn).toBeCloseTo(Math.PI / 2, 12);
    expect(await screen.findByText('Saved.')).toBeTruthy();
  });

  it('takes back what was done, step by step', async () => {
    serveLayout(layoutOf());
    const user = await open();
    await choose(user, /^Piece 1, Block/);
    await user.click(screen.getByRole('button', { name: 'Take away' }));
    expect(within(screen.getByRole('list', { name: 'Pieces' })).getAllByRole('button')).toHaveLength(1);
    await user.click(screen.getByRole('button', { name: 'Undo' }));
    expect(within(screen.getByRole('list', { name: 'Pieces' })).getAllByRole('button')).toHaveLength(2);
    await user.click(screen.getByRole('button', { name: 'Redo' }));
    expect(within(screen.getByRole('list', { name: 'Pieces' })).getAllByRole('button')).toHaveLength(1);
    // leaves nothing behind for the next test
    await user.click(screen.getByRole('button', { name: 'Undo' }));
  });

  it('takes a part in rows and columns, numbered after those that are there', async () => {
    const { put } = serveLayout(layoutOf());
    const user = await open();
    await user.selectOptions(await screen.findByLabelText('Part'), 'Block');
    for (const [label, text] of [
      ['Rows', '2'],
      ['Columns', '3'],
    ] as const) {
      const field = screen.getByLabelText(label);
      await user.clear(field);
      await user.type(field, text);
    }
    await user.click(screen.getByRole('button', { name: 'Place 6 pieces' }));
    const list = screen.getByRole('list', { name: 'Pieces' });
    expect(within(list).getAllByRole('button')).toHaveLength(8);
    expect(await screen.findByText('Nothing overlaps, and all keep their distance.')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Save the layout' }));
    await waitFor(() => expect(put()).toHaveLength(1));
    const { placements } = put()[0]?.body as LayoutForm; // the screen's own form
    expect(placements.map(({ number }) => number)).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
    const [third, fourth, , sixth] = placements.slice(2);
    expect((fourth?.at.x ?? 0) - (third?.at.x ?? 0)).toBeCloseTo(0.1 + 9.4e-3, 9);
    expect((sixth?.at.y ?? 0) - (third?.at.y ?? 0)).toBeCloseTo(0.06 + 9.4e-3, 9);
  });

  it('keeps holes before their outline when its order is changed by hand', async () => {
    const { put } = serveLayout(layoutOf());
    const user = await open();
    const order = () => screen.getByRole('list', { name: 'Cut order' });
    await user.click(within(order()).getByRole('button', { name: /2\. part 2, Block/ }));
    await user.click(screen.getByRole('button', { name: 'Cut hole 1 of part 2, Block one place later' }));
    expect(
      screen.getByText('Hole 1 of part 2, Block, must be cut before the outline around it falls out.'),
    ).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Cut part 2, Block before the part before it' }));
    await user.click(screen.getByRole('button', { name: 'Save the layout' }));
    await waitFor(() => expect(put()).toHaveLength(1));
    expect(put()[0]?.body).toMatchObject({ order: ['2.2', '2.1', '1.2', '1.1'] });
    await user.click(screen.getByRole('button', { name: 'Compute it again' }));
    await user.click(screen.getByRole('button', { name: 'Save the layout' }));
    await waitFor(() => expect(put()).toHaveLength(2));
    expect(put()[1]?.body).toMatchObject({ order: null });
  });

  it('that somebody laid out anew meanwhile is theirs or mine, as one says', async () => {
    let theirs: Layout | null = layoutOf({ name: 'Theirs' }, 4);
    const { put, keep } = serveLayout(layoutOf(), ({ headers }) => {
      if (!theirs) return null;
      keep(theirs);
      theirs = null;
      expect(headers.get('if-match')).toBe('"3"');
      return problem('stale');
    });
    const user = await open();
    await choose(user, /^Piece 1, Block/);
    await user.click(screen.getByRole('button', { name: 'Push up by 1 mm' }));
    await user.click(screen.getByRole('button', { name: 'Save the layout' }));
    await user.click(await screen.findByRole('button', { name: 'Save mine in its place' }));
    await waitFor(() => expect(put()).toHaveLength(2));
    expect(put()[1]?.headers.get('if-match')).toBe('"4"');
    expect(put()[1]?.body).toMatchObject({ name: 'Blocks' });
    expect(await screen.findByText('Saved.')).toBeTruthy();
  });

  it('keeps what was changed for whoever goes to look at something else', async () => {
    serveLayout(layoutOf());
    const user = await open();
    await choose(user, /^Piece 1, Block/);
    await user.click(screen.getByRole('button', { name: 'Push up by 1 mm' }));
    document.body.innerHTML = '';
    await open();
    expect(screen.getByText('What you changed before is still here, and not saved yet.')).toBeTruthy();
    expect(screen.getByText('20 mm from the left, 21 mm from below')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Save the layout' }));
    await screen.findByText('Saved.');
  });

  it('lets a chosen piece be pushed with the pointer', async () => {
    serveLayout(layoutOf());
    const user = await open();
    await choose(user, /^Piece 1, Block/);
    const frame = screen.getByRole('group', { name: /^Drawing\./ });
    frame.setPointerCapture = () => undefined;
    frame.hasPointerCapture = () => true;
    // the whole plate, 1 × 0.5 m, is shown in a frame 640 px wide: its lower left corner and scale are the drawing's own
    const scale = 640 - 56;
    const height = 560;
    const at = (x: number, y: number) => ({
      clientX: 320 + (x - 0.5) * scale,
      clientY: height / 2 - (y - 0.25) * scale,
    });
    const pointer = (type: string, place: object) =>
      act(() => {
        fireEvent(frame, Object.assign(new MouseEvent(type, { bubbles: true, button: 0, ...place }), { pointerId: 1 }));
      });
    pointer('pointerdown', at(0.03, 0.03));
    pointer('pointermove', at(0.08, 0.08));
    pointer('pointermove', at(0.13, 0.13));
    expect(screen.getByTestId('layout-ghost')).toBeTruthy();
    pointer('pointerup', at(0.13, 0.13));
    expect(screen.queryByTestId('layout-ghost')).toBeNull();
    expect(screen.getByText('120 mm from the left, 120 mm from below')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Undo' }));
  });
});

/** Of a plan's page all but the plan itself. */
const besidePlan = (path: string) => (path.endsWith('/path') ? pathOf(planOf()) : { items: [] });

describe('the corner plans of a layout', () => {
  const plans = [
    {
      id: ids.revision,
      strategyName: 'Bearing plate',
      revisionNumber: 3,
      layoutVersion: 2,
      changedAt: '2031-03-01T09:00:00Z',
    },
  ];

  it('are listed with the version they were made for, and made of what is saved alone', async () => {
    serveLayout({ ...layoutOf(), cornerPlans: plans });
    const user = await open();
    const row = screen.getByRole('link', { name: /Bearing plate, revision 3/ });
    expect(row.textContent).toContain('for version 2: the plate was laid out anew since then');
    expect(await screen.findByText('No strategy was handed in yet to plan with.')).toBeTruthy();
    await choose(user, /^Piece 1, Block/);
    await user.click(screen.getByRole('button', { name: 'Push up by 1 mm' }));
    expect(screen.getByText('Save the layout first: corners are planned of what is saved.')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Undo' }));
  });

  const layout = { id: ids.plate, version: 2, newest: 3, outline: wireOutline(plateRectangle(1, 0.5), null) };

  it('say that the plate was laid out anew, and are planned again for it', async () => {
    const requests = serveWith(({ method, path }) => {
      if (!path.startsWith('/api/corner-plans') || path.endsWith('/path')) return json(besidePlan(path));
      return json(planOf({ layout: method === 'PUT' ? { ...layout, version: 3 } : layout, version: 5 }));
    });
    show(<CornerPlanScreen id={ids.report} />, 'programmer');
    expect(await screen.findByText(/made for version 2 of the layout.*version 3 is the newest/)).toBeTruthy();
    expect(screen.queryByLabelText('Below')).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Plan the newest layout' }));
    await waitFor(() => expect(screen.queryByText(/made for version 2/)).toBeNull());
    expect(requests.find(({ method }) => method === 'PUT')?.headers.get('if-match')).toBe('"5"');
  });

  it('say it to an operator too, who can’t plan', async () => {
    serveWith(({ path }) =>
      json(path.startsWith('/api/corner-plans') && !path.endsWith('/path') ? planOf({ layout }) : besidePlan(path)),
    );
    show(<CornerPlanScreen id={ids.report} />, 'operator');
    expect(await screen.findByText(/made for version 2 of the layout/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Plan the newest layout' })).toBeNull();
    expect(screen.queryByRole('link', { name: 'Open the layout' })).toBeNull();
  });
});

describe('the draft of a layout', () => {
  const draft = (): LayoutDraft => {
    const layout = layoutOf();
    return { form: formOf(layout), outline: outlineOf(layout.outline), of: null, parts: layout.parts.map(laidPart) };
  };

  it('takes back what was typed into one field as one step', () => {
    let history = historyOf(draft());
    for (const x of [0.1, 0.12, 0.123]) {
      history = layoutReduce(history, { do: 'put', number: 1, change: { at: { x, y: 0 } }, field: 'x' });
    }
    expect(history.past).toHaveLength(1);
    history = layoutReduce(history, { do: 'put', number: 1, change: { turn: 1 }, field: 'turn' });
    expect(history.past).toHaveLength(2);
    history = layoutReduce(layoutReduce(history, { do: 'undo' }), { do: 'undo' });
    expect(history.draft).toEqual(draft());
  });

  it('numbers the next piece after the highest, or where one is free', () => {
    expect(nextNumber([])).toBe(1);
    expect(nextNumber([piece(1, 0), piece(7, 0)])).toBe(8);
    expect(nextNumber([piece(1, 0), piece(9999, 0)])).toBe(2);
  });

  it('turns on and on within what can be saved', () => {
    let turn = 0;
    for (let i = 0; i < 9; i++) {
      turn = turnWithin(turn + Math.PI / 2);
      expect(Math.abs(turn)).toBeLessThanOrEqual(Math.PI + 1e-12);
    }
    expect(turn).toBeCloseTo(Math.PI / 2, 9);
  });
});
